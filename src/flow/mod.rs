//! Flow of liquid through openings between cells: how long levels take to equalise, how far they differ at a rated flow.
//!
//! Quasi-steady, in numbers of SI: a cell is a function from volume to level, an opening a span of levels with an area, all
//! along one effective gravity. Knows no section, no plates and no load cases. Not modelled: the inertia of the liquid in an
//! opening and of the sloshing on both sides, gas that cannot get out or in, viscosity.

mod equalise;
mod fault;
mod motion;
mod network;
mod opening;
mod steady;

pub use equalise::{COARSE, Equalisation, FINE};
pub use fault::FlowError;
pub use network::{Cell, Network, Passage};
pub use opening::{DEFAULT_DISCHARGE_COEFFICIENT, Opening, orifice};
pub use steady::steady_levels;
