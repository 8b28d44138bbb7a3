//! Marks at single places: brims, the freeboard dimension, named points, faults.

use crate::analysis::{CaseResult, FREEBOARD, Pour, Sense, State};
use crate::geom::{Point, Vec2};
use crate::problem::{Place, Severity};
use crate::study::{Study, ValidStudy};
use crate::units::Measure;

/// The lowest point of a mouth as effective gravity sees it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Brim {
    /// Where.
    pub at: Point,
    /// Whether it is the one that governs.
    pub governs: bool,
}

/// Required against available freeboard at a mouth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Freeboard {
    /// The mouth's lowest point.
    pub brim: Point,
    /// z of the still surface, m.
    pub still_z_m: f64,
    /// m.
    pub available_m: f64,
    /// m.
    pub required_m: f64,
    /// State of the verdict.
    pub state: State,
}

/// The place at which the chosen verdict governs.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Governs {
    /// Lines that glow.
    pub glow: Vec<Vec<Point>>,
    /// The point, with the number asked for there.
    pub at: Option<(Point, Option<Measure>)>,
}

/// A sill that liquid went over on the way to the case.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sill {
    /// Where.
    pub at: Point,
    /// How much, m3.
    pub volume_m3: f64,
}

impl Sill {
    /// Of what went over it.
    pub fn new(pour: &Pour) -> Sill {
        Sill { at: pour.at, volume_m3: pour.volume_m3 }
    }
}

/// A named point.
#[derive(Clone, Debug, PartialEq)]
pub struct PointMark {
    /// Where.
    pub at: Point,
    /// Its name.
    pub name: String,
    /// Pa gage, when judged.
    pub gage_pa: Option<f64>,
}

/// A numbered fault or warning.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FaultMark {
    /// As in the list of problems, from one.
    pub number: usize,
    /// Fault or warning.
    pub severity: Severity,
    /// Where.
    pub at: Point,
}

/// The point of a place on the section, where it has one.
pub(super) fn place_of(study: &Study, place: &Place) -> Option<Point> {
    let section = &study.section;
    let at = match *place {
        Place::Edge(i) if i < section.outline.len() => section.edge(i).point_at(0.5),
        Place::Vertex(i) => section.outline.get(i)?.start,
        Place::Crossing { at_m: [s, z], .. } => Point::new(s, z),
        Place::Obstacle { obstacle_idx, edge_idx } => {
            let edges = section.obstacles.get(obstacle_idx)?.edges();
            match edge_idx {
                Some(i) => edges.get(i)?.point_at(0.5),
                None => Point::from(edges.iter().map(|e| e.start.coords).sum::<Vec2>() / edges.len().max(1) as f64),
            }
        }
        Place::Plate { plate_idx, opening_idx } => {
            let plate = section.plates.get(plate_idx).filter(|plate| plate.points.len() > 1)?;
            match opening_idx {
                Some(i) => plate.openings.get(i).map(|o| plate.point_at(0.5 * (o.from_m + o.to_m)))?,
                None => plate.point_at(0.5 * plate.length_m()),
            }
        }
        Place::Compartment(i) => study.compartments.get(i)?.at,
        Place::Field("sump") => study.sump?,
        Place::Point(i) => study.points.get(i)?.at,
        _ => return None,
    };
    at.coords.iter().all(|c| c.is_finite()).then_some(at)
}

/// The brim of each mouth, and which one governs: that of the dimension, else the lowest.
pub(super) fn brims(study: &ValidStudy, up: Vec2, governing: Option<Point>) -> Vec<Brim> {
    let found: Vec<(f64, Point)> = study.mouths().iter().map(|m| m.brim(study.region(), up)).collect();
    let rank = |(level, at): &(f64, Point)| governing.map_or(*level, |g| (at - g).norm());
    let governs = (0..found.len()).min_by(|&a, &b| rank(&found[a]).total_cmp(&rank(&found[b])));
    found.iter().enumerate().map(|(i, &(_, at))| Brim { at, governs: governs == Some(i) }).collect()
}

pub(super) fn freeboard(case: &CaseResult, still_z_m: f64) -> Option<Freeboard> {
    let verdict = case.verdicts.iter().find(|v| v.criterion == FREEBOARD)?;
    let (demand, limit) = (verdict.demand?.si, verdict.limit?.si);
    let (required_m, available_m) = match verdict.sense {
        Sense::AtMost => (demand, limit),
        Sense::AtLeast => (limit, demand),
    };
    Some(Freeboard { brim: verdict.at?, still_z_m, available_m, required_m, state: verdict.state })
}
