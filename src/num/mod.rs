//! Roots and quadrature. Knows no geometry.

mod quad;
mod root;

pub use quad::{gauss, tanh_sinh};
pub use root::{bisect, bracket, root};
