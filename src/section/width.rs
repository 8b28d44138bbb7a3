//! The out-of-plane width of the tank as a function of height.

/// Width law w(z).
#[derive(Clone, Debug, PartialEq)]
pub enum WidthLaw {
    /// The same at every height, m.
    Constant {
        /// w, m.
        width_m: f64,
    },
    /// A horizontal round barrel seen lengthwise: w = 2 sqrt(r2 - (z - z_axis)2).
    RoundBarrel {
        /// Inside diameter, m.
        diameter_m: f64,
        /// z of its lowest line, m.
        bottom_z_m: f64,
    },
    /// A horizontal barrel of elliptical cross-section seen lengthwise.
    Oval {
        /// Full width of the ellipse, m.
        width_m: f64,
        /// Full height of the ellipse, m.
        height_m: f64,
        /// z of its lowest line, m.
        bottom_z_m: f64,
    },
    /// Straight lines between rows (z, w), z rising, m.
    Table(Vec<(f64, f64)>),
}
