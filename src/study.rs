//! A study: all inputs of one judgement, and the door at which all its faults are found.

use crate::cases::{Accel, LoadCase};
use crate::geom::{Path, Point, Vec2};
use crate::liquid::Liquid;
use crate::problem::{Place, Problem, Severity};
use crate::section::{self, Mouth, Region, Section};
use crate::statics::{Tilted, Vessel};
use crate::units::{Measure, Quantity};

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
    vessel: Vessel,
    mouths: Vec<Mouth>,
    capacity_m3: f64,
    fill_volume_m3: f64,
    warnings: Vec<Problem>,
}

impl Study {
    /// Requirement records of one kind: index and value.
    pub fn records_of(&self, kind: fn(&Limit) -> Option<f64>) -> impl Iterator<Item = (usize, f64)> {
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

    /// The door: a valid study, or every fault and warning, each with its place.
    pub fn validate(&self) -> Result<ValidStudy, Vec<Problem>> {
        let mut problems = Vec::new();
        self.check_numbers(&mut problems);
        self.check_cases(&mut problems);
        let region = match section::check(&self.section) {
            Ok(region) => Some(region),
            Err(faults) => {
                problems.extend(faults);
                None
            }
        };
        let mouths = self.section.mouths();
        let vessel = region.as_ref().map(|r| Vessel::new(r.geometry().to_vec(), self.section.width.clone()));
        let filled = vessel.as_ref().map(|vessel| self.fill_volume(vessel, &mut problems));
        if let Some(region) = &region {
            self.check_points(region, &mut problems);
            if mouths.is_empty() {
                problems.push(Problem::warning(
                    Place::Field("mouths"),
                    "no edge is a mouth: nothing can spill, and the gas is taken as vented all the same",
                    "mark the rim, hatch or breather as a mouth",
                ));
            }
        }
        let has_fault = problems.iter().any(|p| p.severity == Severity::Fault);
        match (region, vessel, filled) {
            (Some(region), Some(vessel), Some((capacity_m3, fill_volume_m3))) if !has_fault => Ok(ValidStudy {
                study: self.clone(),
                region,
                vessel,
                mouths,
                capacity_m3,
                fill_volume_m3,
                warnings: problems,
            }),
            _ => {
                problems.sort_by_key(|p| p.severity);
                Err(problems)
            }
        }
    }

    fn check_numbers(&self, problems: &mut Vec<Problem>) {
        let mut must = |ok: bool, field: &'static str, message: String, hint: &str| {
            if !ok {
                problems.push(Problem::fault(Place::Field(field), message, hint));
            }
        };
        let above_zero = |x: f64| x.is_finite() && x > 0.0;
        let g = self.gravity_m_per_s2;
        must(above_zero(g), "gravity", format!("{g} m/s2"), "give a gravity above zero; 9.80665 is standard");
        let air = self.air_pressure_abs_pa;
        must(above_zero(air), "air pressure", format!("{air} Pa"), "give an absolute pressure above zero");
        let gas = self.ullage_gage_pa;
        let is_gas = gas.is_finite() && gas > -air;
        must(is_gas, "gas pressure", format!("{gas} Pa gage"), "give a gage pressure above a perfect vacuum");
        let density = self.liquid.density_kg_per_m3;
        must(above_zero(density), "density", format!("{density} kg/m3"), "give a density above zero");
        if let Some(pv) = self.liquid.vapour_pressure_abs_pa {
            let hint = "give an absolute pressure of zero or more, or leave it out";
            must(pv.is_finite() && pv >= 0.0, "vapour pressure", format!("{pv} Pa"), hint);
        }
        if let Some(sigma) = self.liquid.surface_tension_n_per_m {
            let hint = "give a tension above zero, or leave it out";
            must(above_zero(sigma), "surface tension", format!("{sigma} N/m"), hint);
        }
        let about = self.moment_about;
        let is_place = about.x.is_finite() && about.y.is_finite();
        must(is_place, "moment point", format!("s {} m, z {} m", about.x, about.y), "give finite coordinates");
        for (i, record) in self.records.iter().enumerate() {
            let value = record.limit.measure().si;
            if !(value.is_finite() && value >= 0.0) {
                let message = format!("the limit of {:?} is {value}", record.title);
                problems.push(Problem::fault(Place::Record(i), message, "give a limit of zero or more"));
            }
        }
    }

    fn check_cases(&self, problems: &mut Vec<Problem>) {
        if self.cases.is_empty() {
            problems.push(Problem::fault(Place::Field("load cases"), "there is no load case", "add one"));
        }
        for (i, case) in self.cases.iter().enumerate() {
            let numbers = match case.accel {
                Accel::Components { a_s, a_z, .. } => [a_s, a_z],
                Accel::Polar { magnitude, direction_deg, .. } => [magnitude, direction_deg],
            };
            let onset = case.onset_s.unwrap_or(0.0);
            let phi = case.attitude.angle_rad();
            // Ten thousand times gravity: beyond any tank, and well within what f64 carries.
            let is_sane = numbers.iter().all(|x| x.is_finite() && x.abs() <= 1e5) && phi.is_finite();
            if !(is_sane && onset.is_finite() && onset >= 0.0) {
                let hint = "give finite numbers, accelerations up to 100 000, and an onset of zero or more";
                problems.push(Problem::fault(Place::Case(i), "a number is not finite or out of range", hint));
            }
            if matches!(case.accel, Accel::Polar { magnitude, .. } if magnitude < 0.0) {
                let hint = "give the size, and turn the direction by 180°";
                problems.push(Problem::fault(Place::Case(i), "the magnitude is below zero", hint));
            }
            if self.cases[..i].iter().any(|other| other.name == case.name) {
                let message = format!("an earlier case is called {:?} too", case.name);
                problems.push(Problem::warning(Place::Case(i), message, "give each case its own name"));
            }
        }
    }

    fn check_points(&self, region: &Region, problems: &mut Vec<Problem>) {
        let outline = Path::new(self.section.edges());
        let slack = 1e-9 * region.diagonal_m();
        for (i, point) in self.points.iter().enumerate() {
            let p = point.at;
            if !(p.x.is_finite() && p.y.is_finite()) {
                let hint = "give finite coordinates";
                problems.push(Problem::fault(Place::Point(i), "a coordinate is not finite", hint));
            } else if !outline.contains(p) && outline.edges().iter().all(|e| e.nearest(p).1 > slack) {
                let message = format!("{:?} lies outside the outline", point.name);
                problems.push(Problem::warning(Place::Point(i), message, "move it inside, or delete it"));
            }
        }
    }

    /// Capacity and fill, m3; a fault where the fill lies outside the tank.
    fn fill_volume(&self, vessel: &Vessel, problems: &mut Vec<Problem>) -> (f64, f64) {
        let tilted = vessel.tilted(Vec2::y());
        let capacity = vessel.capacity_m3();
        let (bottom, top) = tilted.span();
        let slack = 1e-9;
        let (value, low, high, unit) = match self.fill {
            Fill::Volume(v) => (v, 0.0, capacity, "m3"),
            Fill::Share(share) => (share, 0.0, 1.0, "of capacity"),
            Fill::Level(z) => (z, bottom, top, "m"),
            Fill::Ullage(d) => (d, 0.0, top - bottom, "m"),
        };
        let span = high - low;
        if !(value.is_finite() && value >= low - slack * span && value <= high + slack * span) {
            problems.push(Problem::fault(
                Place::Field("fill"),
                format!("{value} {unit} is not between {low:.6} and {high:.6}"),
                "give a fill between empty and full",
            ));
        }
        let volume = match self.fill {
            Fill::Volume(v) => v,
            Fill::Share(share) => share * capacity,
            Fill::Level(z) => tilted.volume_below(z),
            Fill::Ullage(d) => tilted.volume_below(top - d),
        };
        (capacity, volume.clamp(0.0, capacity))
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

    /// The section with its width law.
    pub fn vessel(&self) -> &Vessel {
        &self.vessel
    }

    /// Its mouths.
    pub fn mouths(&self) -> &[Mouth] {
        &self.mouths
    }

    /// Volume of the whole section, m3.
    pub fn capacity_m3(&self) -> f64 {
        self.capacity_m3
    }

    /// The fill as a volume, m3.
    pub fn fill_volume_m3(&self) -> f64 {
        self.fill_volume_m3
    }

    /// What the user should know of the input.
    pub fn warnings(&self) -> &[Problem] {
        &self.warnings
    }

    /// The section seen along a direction.
    pub fn tilted(&self, up: Vec2) -> Tilted<'_> {
        self.vessel.tilted(up)
    }
}
