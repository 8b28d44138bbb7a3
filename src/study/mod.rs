//! A study: all inputs of one judgement, and the door at which all its faults are found.

mod check;
mod record;
mod shipped;
mod valid;

use crate::cases::LoadCase;
use crate::geom::Point;
use crate::liquid::Liquid;
use crate::material::{self, Material};
use crate::section::Section;

pub use record::{Limit, Record};
pub use shipped::{Known, Shipped, shipped_records};
pub use valid::ValidStudy;

/// Discharge coefficient of an opening in a thin plate where the user gives none.
///
/// Source: sharp-edged orifices 0.60 to 0.62, Brater & King, Handbook of Hydraulics (value from memory).
pub const DISCHARGE_COEFFICIENT: f64 = 0.6;

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

/// A point at which pressure is asked for.
#[derive(Clone, Debug, PartialEq)]
pub struct NamedPoint {
    /// As shown.
    pub name: String,
    /// Where, metres.
    pub at: Point,
}

/// A compartment that holds its own fill, and perhaps its own liquid: a part of the section that no opening joins to
/// the rest.
#[derive(Clone, Debug, PartialEq)]
pub struct Compartment {
    /// As shown.
    pub name: String,
    /// A point inside it, metres.
    pub at: Point,
    /// Its liquid; none: the study's.
    pub liquid: Option<Liquid>,
    /// Its fill: shares are of the compartment's capacity, ullage counts from its highest point.
    pub fill: Fill,
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
    /// How much of it, in all compartments that have no fill of their own.
    pub fill: Fill,
    /// Compartments with a fill of their own.
    pub compartments: Vec<Compartment>,
    /// Where the tank is emptied from, if it is told, metres.
    pub sump: Option<Point>,
    /// Discharge coefficient C_d of openings.
    pub discharge_coefficient: f64,
    /// Materials of its own, beside those of [`material::table`].
    pub materials: Vec<Material>,
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

impl Study {
    /// The material of that name: its own, or else the table's.
    pub fn material(&self, name: &str) -> Option<&Material> {
        self.materials.iter().find(|m| m.name == name).or_else(|| material::named(name))
    }

    /// Requirement records of one kind: index and value.
    pub fn records_of<T>(&self, kind: fn(&Limit) -> Option<T>) -> impl Iterator<Item = (usize, T)> {
        self.records.iter().enumerate().filter_map(move |(i, r)| kind(&r.limit).map(|value| (i, value)))
    }

    /// The largest freeboard allowance of the records, m, and the record; zero without one.
    pub fn freeboard_allowance_m(&self) -> (f64, Option<usize>) {
        self.largest_of(|l| if let Limit::FreeboardAllowance(m) = l { Some(*m) } else { None })
    }

    /// The largest margin over the vapour pressure of the records, Pa, and the record; zero without one.
    pub fn vapour_margin_pa(&self) -> (f64, Option<usize>) {
        self.largest_of(|l| if let Limit::VapourMargin(pa) = l { Some(*pa) } else { None })
    }

    fn largest_of(&self, kind: fn(&Limit) -> Option<f64>) -> (f64, Option<usize>) {
        self.records_of(kind).max_by(|a, b| a.1.total_cmp(&b.1)).map_or((0.0, None), |(i, x)| (x, Some(i)))
    }
}
