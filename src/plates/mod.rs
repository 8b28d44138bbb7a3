//! Plates: how they bend under pressure, and how they part the tank. Judges nothing.
//!
//! Bending, of panels between stiffeners and one-way strips, and the strength of panels: knows no section and no liquid.
//! A [`Profile`] is the net pressure along a plate. A [`SolvedPanel`] is made once for its geometry and bent by any
//! profile; [`strength`] turns what it carries into stress, deflection and thickness for a material. A [`Strip`] is a
//! metre of plate that spans one way. Below: thin plates, small deflections; where that is left, the result says so
//! as data.
//!
//! Bearing: a plate of the section under the net pressure along it, by those.
//!
//! Layout, in a module of its own: facts of the section, its plates and its liquid at rest.

mod basis;
mod bearing;
mod bending;
mod bent;
mod error;
mod layout;
mod panel;
mod profile;
mod strength;
mod strip;

pub use bearing::{Bearer, PanelStrength, PlateResult, SolvedPanels, Span, Weld, spans, welds};
pub use bending::{Bending, EdgeReaction, Extremes, Peak};
pub use bent::{Bent, PointState};
pub use error::PlateError;
pub use layout::{Cell, Divider, Gap, Passage, Remnant, cells, dividers, gaps, passages, undrained, unvented};
pub use panel::{PanelGeometry, SolvedPanel, Support};
pub use profile::{Piece, Profile};
pub use strength::{
    MOST_DEFLECTION_TO_THICKNESS, MOST_THICKNESS_TO_SIDE, OutOfRange, Strength, net_thickness, strength,
};
pub use strip::{EndReaction, Strip, StripEnds};
