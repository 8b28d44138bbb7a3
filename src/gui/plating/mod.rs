//! Plates in the hand: what becomes of a plate and its openings when it is moved, bent, split or copied.
//!
//! Pure: a section in, plates out. Where plates go along walls the functions of [`crate::app`] say; this adds what the hand
//! asks for. Knows no screen and no snapping.

mod opening;
mod shape;
mod stand;

pub use opening::{room, roomiest_m, with_opening};
pub use shape::{along, corner_word, longest_middle, with_corner, with_point, without_corner};
pub use stand::{
    Line, Stands, copied, drawn, equally_spaced, joined, lines, new_plate, roomiest_place, stands_on, upright_at,
};
