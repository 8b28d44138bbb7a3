//! Statics: effective gravity, the settled surface, pressures and loads, and the quasi-static way to a load case.
//!
//! Knows no verdicts, no files and no screens.

mod gravity;
mod loads;
mod path;
mod rim;
mod rise;
mod settled;
mod tilted;

pub use gravity::{EffectiveGravity, effective_gravity};
pub use loads::{EdgeLoad, pressure_at};
pub use path::{Lip, Ramp, Spill};
pub use rim::Carried;
pub use rise::Rims;
pub use settled::{PointPressure, RoofContact, Setting, Settled, settle};
pub use tilted::{Chord, Tilted, Vessel};
