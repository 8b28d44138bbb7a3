//! Statics: effective gravity, pools and the way they pour over sills, pressures and loads.
//!
//! Knows no verdicts, no files and no screens.

mod bound;
mod cells;
mod gas;
mod gravity;
mod loads;
mod pools;
mod pour_over;
mod ramp;
mod rim;
mod rise;
mod settled;
mod tilted;
mod wetted;

pub use bound::Bound;
pub use cells::{cell_levels, cell_volumes};
pub use gas::{GasPocket, gas_pockets};
pub use gravity::{EffectiveGravity, effective_gravity};
pub use loads::{EdgeLoad, PlateLoad, Stretch, pressure_at};
pub use pools::{Body, Brim, Followed, Holder, LONGEST_STEP, Look, Pour, Spilled, Start, Stop, Trace, Turn, trace};
pub use pour_over::{Lip, MouthSpill, PourOver, highest_fill, pour_over, spills};
pub use ramp::Ramp;
pub use rim::Carried;
pub use rise::{CarriedOn, Rims, Route};
pub use settled::{PointPressure, Pool, RoofContact, Setting, Settled, settle};
pub use tilted::{Chord, Tilted, Vessel};
