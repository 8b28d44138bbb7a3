//! Pools: bodies of liquid with one level each, and how they pour over sills while effective gravity turns.
//!
//! Knows no pressure, no load case and no limit: a way is a turn of the direction.

mod followed;
mod look;
mod place;
mod still;
mod trace;
mod turn;

pub use followed::Followed;
pub use look::{Body, Look};
pub use place::{Brim, Pour, Spilled};
pub use still::{Holder, Start};
pub use trace::{LONGEST_STEP, Stop, Trace, trace};
pub use turn::Turn;
