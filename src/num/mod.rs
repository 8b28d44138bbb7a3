//! Roots and quadrature.
