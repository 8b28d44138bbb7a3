//! Roots, quadrature, series and differential equations. Knows no geometry.

mod legendre;
mod newton;
mod ode;
mod quad;
mod root;

pub use legendre::{LegendreSeries, legendre_polynomials};
pub use newton::newton;
pub use ode::{Implicit, Moment, Stalled, between, integrate};
pub use quad::{gauss, tanh_sinh};
pub use root::{bisect, bracket, golden_min, root, root_between};
