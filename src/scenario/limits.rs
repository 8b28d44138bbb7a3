//! How much a scenario file may hold. Far above any tank, low enough that a hostile file costs little.

/// Size of a file, bytes; checked before anything is parsed.
pub const MAX_FILE_BYTES: usize = 4 << 20;

/// Edges of the outline.
pub const MAX_OUTLINE_EDGES: usize = 2000;

/// Obstacles.
pub const MAX_OBSTACLES: usize = 100;

/// Edges of one obstacle.
pub const MAX_OBSTACLE_EDGES: usize = 500;

/// Plates.
pub const MAX_PLATES: usize = 200;

/// Corners of one plate, its ends included.
pub const MAX_PLATE_POINTS: usize = 50;

/// Openings of one plate.
pub const MAX_OPENINGS: usize = 100;

/// Compartments with a fill of their own.
pub const MAX_COMPARTMENTS: usize = 100;

/// Materials of the scenario's own.
pub const MAX_MATERIALS: usize = 100;

/// Rows of the width table.
pub const MAX_WIDTH_ROWS: usize = 2000;

/// Load cases.
pub const MAX_CASES: usize = 200;

/// Named points.
pub const MAX_POINTS: usize = 200;

/// Requirement records.
pub const MAX_RECORDS: usize = 200;

/// Notes beside verdicts.
pub const MAX_VERDICT_NOTES: usize = 2000;

/// Brackets within brackets, as the reader counts them; a good file needs ten.
pub(super) const MAX_NESTING: usize = 32;
