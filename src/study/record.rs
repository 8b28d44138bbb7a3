//! Requirement records: limits that come from outside.

use crate::units::{Measure, Quantity};

/// What a requirement record limits.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Limit {
    /// Gage pressure at any wall: at most, Pa.
    WallPressure(f64),
    /// Gage pressure of liquid against a shut roof: at most, Pa.
    RoofPressure(f64),
    /// Allowance on top of the rise when freeboard is judged: at least, m.
    FreeboardAllowance(f64),
    /// Margin of the lowest absolute pressure over the vapour pressure: at least, Pa.
    VapourMargin(f64),
    /// Volume of a cell between walls and plates: at most `m3`, or else filled up to `empty_to` or from `full_from`
    /// on, as shares of its capacity.
    CellVolume {
        /// At most, m3.
        m3: f64,
        /// A larger cell may be filled up to this share.
        empty_to: f64,
        /// A larger cell may be filled from this share on.
        full_from: f64,
    },
    /// Solid area of a plate as a share of the cross-section of the tank where it stands: at least.
    PlateCoverage(f64),
    /// Clear distance between neighbouring plates, or plate and end, along s: at most, m.
    PlateSpacing(f64),
    /// Open area of a plate as a share of the cross-section of the tank where it stands: at least.
    OpenShareAtLeast(f64),
    /// The same: at most.
    OpenShareAtMost(f64),
    /// Every cell drains to the sump with the tank level and at rest.
    DrainPath,
    /// The gas of every cell reaches a mouth with the tank level and at rest.
    VentPath,
    /// Filling or emptying at a rated flow: levels of neighbouring cells differ by at most `difference_m`.
    RatedFlow {
        /// Flow, m3/s.
        flow_m3_per_s: f64,
        /// Difference of levels across a plate: at most, m.
        difference_m: f64,
    },
}

impl Limit {
    /// The limit's value with its unit.
    pub fn measure(self) -> Measure {
        match self {
            Limit::WallPressure(pa) | Limit::RoofPressure(pa) => Measure::new(Quantity::GagePressure, pa),
            Limit::FreeboardAllowance(m) => Measure::new(Quantity::Length, m),
            Limit::VapourMargin(pa) => Measure::new(Quantity::AbsolutePressure, pa),
            Limit::CellVolume { m3, .. } => Measure::new(Quantity::Volume, m3),
            Limit::PlateCoverage(share) | Limit::OpenShareAtLeast(share) | Limit::OpenShareAtMost(share) => {
                Measure::new(Quantity::Share, share)
            }
            Limit::PlateSpacing(m) => Measure::new(Quantity::Length, m),
            Limit::DrainPath | Limit::VentPath => Measure::new(Quantity::Count, 0.0),
            Limit::RatedFlow { difference_m, .. } => Measure::new(Quantity::Length, difference_m),
        }
    }

    /// Whether it asks for a layout of plates, rather than of a load case.
    pub fn is_of_layout(self) -> bool {
        !matches!(
            self,
            Limit::WallPressure(_) | Limit::RoofPressure(_) | Limit::FreeboardAllowance(_) | Limit::VapourMargin(_)
        )
    }

    /// Whether the value is a ceiling rather than a floor.
    pub fn is_ceiling(self) -> bool {
        !matches!(
            self,
            Limit::FreeboardAllowance(_)
                | Limit::VapourMargin(_)
                | Limit::PlateCoverage(_)
                | Limit::OpenShareAtLeast(_)
        )
    }
}

/// A limit that comes from a regulation, a standard or a customer: data, not code.
#[derive(Clone, Debug, PartialEq)]
pub struct Record {
    /// As shown.
    pub title: String,
    /// Value and what it limits.
    pub limit: Limit,
    /// Clause.
    pub clause: String,
    /// Edition.
    pub edition: String,
    /// Where the value came from.
    pub origin: String,
    /// The user has checked it against the text.
    pub confirmed: bool,
}
