//! Roots, quadrature and series. Knows no geometry.

mod legendre;
mod quad;
mod root;

pub use legendre::{LegendreSeries, legendre_polynomials};
pub use quad::{gauss, tanh_sinh};
pub use root::{bisect, bracket, golden_min, root};
