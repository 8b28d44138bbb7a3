//! Layout: how plates part the section, what they cover, how far apart they stand, what stays behind between them. Of
//! the tank standing level and at rest; knows no load case and no limit.

mod cell;
mod divider;
mod gap;
mod left_behind;
mod passage;

pub use cell::{Cell, cells};
pub use divider::{Divider, dividers};
pub use gap::{Gap, gaps};
pub use left_behind::{Remnant, undrained, unvented};
pub use passage::{Passage, passages};
