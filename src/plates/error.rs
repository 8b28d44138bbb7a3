//! What can be wrong with a plate's numbers, in words.

use thiserror::Error;

/// Why a plate cannot be calculated.
#[derive(Clone, Debug, PartialEq, Error)]
pub enum PlateError {
    /// A profile of pressure with fewer than two points, one that goes backward, or a number that is not finite.
    #[error("the pressure along the plate: {0}; give at least two points with finite numbers, in order along it")]
    Pressure(String),
    /// A side of a panel, or the length of a strip.
    #[error("{what} is {value_m} m; it must be a number above zero")]
    Size {
        /// Which.
        what: &'static str,
        /// As given.
        value_m: f64,
    },
    /// Poisson's ratio.
    #[error("Poisson's ratio is {0}; it must lie between 0 and 0.5")]
    Poisson(f64),
    /// Too tall for its width.
    #[error(
        "the panel is {ratio:.0} times as high as wide, at most {most:.0} times can be calculated; set the stiffeners wider apart"
    )]
    TooTall {
        /// Height by width.
        ratio: f64,
        /// What can be calculated.
        most: f64,
    },
    /// Free at the top, not clamped along the bottom, and too wide for its sides to hold it.
    #[error(
        "the panel is {ratio:.0} times as wide as high and its top is free, so hardly anything but its far sides holds it; clamp its bottom, hold its top or set stiffeners at most {most:.0} heights apart"
    )]
    TooWide {
        /// Width by height.
        ratio: f64,
        /// What can be calculated.
        most: f64,
    },
    /// A material's value that must be above zero.
    #[error("material {name}: {what} is {value}; it must be a number above zero")]
    Material {
        /// The material.
        name: String,
        /// Which value.
        what: &'static str,
        /// As given.
        value: f64,
    },
    /// The panel was solved for another Poisson's ratio than the material has.
    #[error(
        "the panel was solved for Poisson's ratio {panel} and material {name} has {material}; solve it for the material's"
    )]
    OtherPoisson {
        /// The panel's.
        panel: f64,
        /// The material.
        name: String,
        /// The material's.
        material: f64,
    },
    /// Thickness or corrosion allowance is no length.
    #[error("{what} is {value_m} m; it must be a number, and not below zero")]
    Thickness {
        /// Which.
        what: &'static str,
        /// As given.
        value_m: f64,
    },
    /// The allowance takes the whole plate.
    #[error(
        "nothing is left of the plate: it is {thickness_mm} mm thick and {allowance_mm} mm of that may corrode; the allowance never counts as strength, so take a thicker plate or a smaller allowance"
    )]
    NothingLeft {
        /// As built.
        thickness_mm: f64,
        /// Corrosion allowance.
        allowance_mm: f64,
    },
    /// Beyond what numbers can hold.
    #[error("the numbers are too large or too small to calculate with; check the units of sizes and pressures")]
    OutOfNumbers,
}
