//! Roots, quadrature, differential equations. Knows no geometry.

mod newton;
mod ode;
mod quad;
mod root;

pub use newton::newton;
pub use ode::{Implicit, Moment, Stalled, between, integrate};
pub use quad::{gauss, tanh_sinh};
pub use root::{bisect, golden_min, root};
