//! Bearing: a plate of the section under the net pressure along it, its panels and its welds. Knows the section, and of
//! statics only that pressure; knows no limit.

mod bearer;
mod pressure;
mod span;
mod weld;

pub use bearer::{Bearer, PanelStrength, PlateResult, SolvedPanels};
pub use span::{Span, spans};
pub use weld::{Weld, welds};
