//! Passages: what lets liquid through between neighbouring cells, openings of plates and the gaps beyond their free ends.

use crate::geom::{Depth, Edge, Point, Vec2};
use crate::section::{Face, Region, Section, Wall, WidthLaw};

/// A straight open stretch with a cell on either side.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Passage {
    /// The cells on its two sides; one and the same where a plate ends inside it.
    pub cell_idxs: [usize; 2],
    /// The plate that it is an opening of; none for a gap beyond a free end.
    pub plate_idx: Option<usize>,
    /// Its open share.
    pub share: f64,
    /// From end to end.
    pub edge: Edge,
}

impl Passage {
    /// Its open area, m2.
    pub fn area_m2(&self, width: &WidthLaw) -> f64 {
        self.share * across(width, self.edge)
    }

    /// Its open area below a level, m2.
    pub fn area_below_m2(&self, width: &WidthLaw, level_z_m: f64) -> f64 {
        let below = self.edge.parts_below(Vec2::y(), level_z_m).into_iter();
        self.share * below.map(|(from, to)| across(width, self.edge.part(from, to))).sum::<f64>()
    }

    /// Its middle.
    pub fn middle(&self) -> Point {
        self.edge.point_at(0.5)
    }
}

/// Every passage of the region.
pub fn passages(section: &Section, region: &Region) -> Vec<Passage> {
    let cells = region.cells();
    let faces = cells.faces();
    let open = |face: &Face| match face.wall {
        Wall::Carried => Some((None, 1.0)),
        Wall::Plate { plate_idx, span_m: [from, to], .. } => {
            let middle = 0.5 * (from + to);
            let opening =
                section.plates[plate_idx].openings.iter().find(|o| o.from_m <= middle && middle <= o.to_m)?;
            let length = face.edge.length();
            // Its mean width, so that round holes keep their area.
            Some((Some(plate_idx), opening.open_share(across(&section.width, face.edge) / length)))
        }
        _ => None,
    };
    let mut passages = Vec::new();
    for (i, face) in faces.iter().enumerate() {
        let Some((plate_idx, share)) = open(face) else { continue };
        let other = faces.iter().skip(i + 1).position(|f| f.edge == face.edge.reversed());
        let Some(other) = other.map(|k| i + 1 + k) else { continue };
        let cell_idxs = [cells.part_of(i), cells.part_of(other)];
        passages.push(Passage { cell_idxs, plate_idx, share, edge: face.edge });
    }
    passages
}

/// Area across the tank along an edge, m2.
fn across(width: &WidthLaw, edge: Edge) -> f64 {
    width.across(edge.start, edge.end)
}

/// The passages between two neighbouring cells together, under a level.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Way {
    /// The cells.
    pub cell_idxs: [usize; 2],
    /// A plate that parts them.
    pub plate_idx: Option<usize>,
    /// Open area below the level, m2; zero where they are joined above it only.
    pub area_m2: f64,
    /// The middle of the largest passage.
    pub at: Point,
}

/// The widest ways that join all cells which any way joins: what flows from one cell to another need take no narrower one.
/// `level_z_m` is the level that counts for each cell.
pub fn widest_ways(
    passages: &[Passage],
    width: &WidthLaw,
    n_cells: usize,
    level_z_m: impl Fn(usize) -> f64,
) -> Vec<Way> {
    let mut ways: Vec<(Way, f64)> = Vec::new();
    for passage in passages.iter().filter(|p| p.cell_idxs[0] != p.cell_idxs[1]) {
        let cell_idxs =
            [passage.cell_idxs[0].min(passage.cell_idxs[1]), passage.cell_idxs[0].max(passage.cell_idxs[1])];
        let area_m2 = passage.area_below_m2(width, level_z_m(cell_idxs[0]));
        let here = Way { cell_idxs, plate_idx: passage.plate_idx, area_m2, at: passage.middle() };
        match ways.iter_mut().find(|w| w.0.cell_idxs == cell_idxs) {
            Some((way, largest)) => {
                if area_m2 > *largest {
                    (way.at, *largest) = (here.at, area_m2);
                }
                way.area_m2 += area_m2;
                way.plate_idx = way.plate_idx.or(here.plate_idx);
            }
            None => ways.push((here, area_m2)),
        }
    }
    let mut ways: Vec<Way> = ways.into_iter().map(|w| w.0).collect();
    ways.sort_by(|a, b| b.area_m2.total_cmp(&a.area_m2));
    let mut group: Vec<usize> = (0..n_cells).collect();
    ways.retain(|way| {
        let [a, b] = way.cell_idxs.map(|cell| group[cell]);
        group.iter_mut().filter(|g| **g == b).for_each(|g| *g = a);
        a != b
    });
    ways
}
