//! Bending of plates under pressure: panels between stiffeners, one-way strips, and the strength of panels.
//!
//! A [`Profile`] is the net pressure along a plate. A [`SolvedPanel`] is made once for its geometry and bent by any
//! profile; [`strength`] turns what it carries into stress, deflection and thickness for a material. A [`Strip`] is a
//! metre of plate that spans one way. Below: thin plates, small deflections; where that is left, the result says so
//! as data. Knows no section, no liquid, no load case, and judges nothing.

mod basis;
mod bending;
mod bent;
mod error;
mod panel;
mod profile;
mod strength;
mod strip;

pub use bending::{Bending, EdgeReaction, Extremes, Peak};
pub use bent::{Bent, PointState};
pub use error::PlateError;
pub use panel::{PanelGeometry, SolvedPanel, Support};
pub use profile::{Piece, Profile};
pub use strength::{
    MOST_DEFLECTION_TO_THICKNESS, MOST_THICKNESS_TO_SIDE, OutOfRange, Strength, net_thickness, strength,
};
pub use strip::{EndReaction, Strip, StripEnds};
