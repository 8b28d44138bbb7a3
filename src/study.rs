//! A study: all inputs of one judgement, and the door at which all its faults are found.

use crate::cases::LoadCase;
use crate::geom::Point;
use crate::liquid::Liquid;
use crate::problem::Problem;
use crate::section::{Region, Section};
use crate::units::{Measure, Quantity};

/// How much liquid, as it was given. Levels are of the tank standing level and at rest.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Fill {
    /// Volume, m3.
    Volume(f64),
    /// Share of capacity, 0 to 1.
    Share(f64),
    /// Still level: z of the surface, m.
    Level(f64),
    /// Ullage height: from the highest point of the outline down to the surface, m.
    Ullage(f64),
}

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
}

impl Limit {
    /// The limit's value with its unit.
    pub fn measure(self) -> Measure {
        match self {
            Limit::WallPressure(pa) | Limit::RoofPressure(pa) => Measure::new(Quantity::GagePressure, pa),
            Limit::FreeboardAllowance(m) => Measure::new(Quantity::Length, m),
            Limit::VapourMargin(pa) => Measure::new(Quantity::AbsolutePressure, pa),
        }
    }

    /// Whether the value is a ceiling rather than a floor.
    pub fn is_ceiling(self) -> bool {
        matches!(self, Limit::WallPressure(_) | Limit::RoofPressure(_))
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

/// A point at which pressure is asked for.
#[derive(Clone, Debug, PartialEq)]
pub struct NamedPoint {
    /// As shown.
    pub name: String,
    /// Where, metres.
    pub at: Point,
}

/// A note that someone left beside a verdict.
#[derive(Clone, Debug, PartialEq)]
pub struct VerdictNote {
    /// Name of the load case.
    pub case: String,
    /// Name of the criterion.
    pub criterion: String,
    /// The text.
    pub text: String,
}

/// All inputs. SI units, section axes s (right) and z (up).
#[derive(Clone, Debug, PartialEq)]
pub struct Study {
    /// Title of the scenario.
    pub title: String,
    /// Who made it.
    pub author: String,
    /// Issue or revision mark.
    pub revision: String,
    /// Free text.
    pub notes: String,
    /// Gravity, m/s2; above zero.
    pub gravity_m_per_s2: f64,
    /// Outside air pressure, Pa absolute.
    pub air_pressure_abs_pa: f64,
    /// Pressure of the gas above the liquid, Pa gage.
    pub ullage_gage_pa: f64,
    /// The cross-section.
    pub section: Section,
    /// The liquid.
    pub liquid: Liquid,
    /// How much of it.
    pub fill: Fill,
    /// Load cases, in the order shown.
    pub cases: Vec<LoadCase>,
    /// Points at which pressure is asked for.
    pub points: Vec<NamedPoint>,
    /// Point about which moments are taken, metres.
    pub moment_about: Point,
    /// Requirement records.
    pub records: Vec<Record>,
    /// Notes beside verdicts.
    pub verdict_notes: Vec<VerdictNote>,
}

/// A study without faults: the only door to [`crate::analysis::run`].
#[derive(Clone, Debug)]
pub struct ValidStudy {
    study: Study,
    region: Region,
    fill_volume_m3: f64,
    warnings: Vec<Problem>,
}

impl Study {
    /// The door: a valid study, or every fault and warning.
    pub fn validate(&self) -> Result<ValidStudy, Vec<Problem>> {
        todo!()
    }
}

impl ValidStudy {
    /// The inputs.
    pub fn study(&self) -> &Study {
        &self.study
    }

    /// The checked section.
    pub fn region(&self) -> &Region {
        &self.region
    }

    /// The fill as a volume, m3.
    pub fn fill_volume_m3(&self) -> f64 {
        self.fill_volume_m3
    }

    /// What the user should know of the input.
    pub fn warnings(&self) -> &[Problem] {
        &self.warnings
    }
}
