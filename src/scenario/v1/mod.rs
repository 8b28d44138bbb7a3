//! Scenario file, version 1: frozen once it has been released. From then on a change of these structs is a new version
//! in a module of its own.

mod cases;
mod contents;
mod materials;
mod plates;
mod records;
mod section;

use serde::Deserialize;

use crate::cases::LoadCase;
use crate::geom::Point;
use crate::section::{OutlineEdge, Section};
use crate::study::{self, NamedPoint, Study};
use crate::units::{STANDARD_ATMOSPHERE_PA, STANDARD_GRAVITY_M_PER_S2};

use super::limits::*;
use super::list::List;
use super::number::Num;

use cases::Case;
use contents::{Compartment, Fill, Liquid};
use materials::Material;
use plates::Plate;
use records::Record;
use section::{Edge, Obstacle, Width};

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Scenario {
    #[serde(rename = "version")]
    _version: u64,
    title: String,
    #[serde(default)]
    author: String,
    #[serde(default)]
    revision: String,
    #[serde(default)]
    notes: String,
    gravity_m_per_s2: Option<Num>,
    air_pressure_abs_kpa: Option<Num>,
    #[serde(default)]
    ullage_gage_kpa: Num,
    liquid: Liquid,
    fill: Fill,
    #[serde(default)]
    compartments: List<Compartment, MAX_COMPARTMENTS>,
    width: Width,
    outline: List<Edge, MAX_OUTLINE_EDGES>,
    #[serde(default)]
    obstacles: List<Obstacle, MAX_OBSTACLES>,
    #[serde(default)]
    plates: List<Plate, MAX_PLATES>,
    #[serde(default)]
    materials: List<Material, MAX_MATERIALS>,
    discharge_coefficient: Option<Num>,
    sump: Option<At>,
    #[serde(default)]
    points: List<PointAt, MAX_POINTS>,
    #[serde(default)]
    moment_about: At,
    #[serde(default)]
    cases: List<Case, MAX_CASES>,
    #[serde(default)]
    records: List<Record, MAX_RECORDS>,
    #[serde(default)]
    verdict_notes: List<VerdictNote, MAX_VERDICT_NOTES>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct PointAt {
    name: String,
    s_mm: Num,
    z_mm: Num,
}

#[derive(Default, Deserialize)]
#[serde(deny_unknown_fields)]
struct At {
    s_mm: Num,
    z_mm: Num,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct VerdictNote {
    case: String,
    criterion: String,
    text: String,
}

impl From<Scenario> for Study {
    fn from(file: Scenario) -> Study {
        Study {
            title: file.title,
            author: file.author,
            revision: file.revision,
            notes: file.notes,
            gravity_m_per_s2: file.gravity_m_per_s2.map_or(STANDARD_GRAVITY_M_PER_S2, Num::si),
            air_pressure_abs_pa: file.air_pressure_abs_kpa.map_or(STANDARD_ATMOSPHERE_PA, Num::kpa),
            ullage_gage_pa: file.ullage_gage_kpa.kpa(),
            section: Section {
                outline: file.outline.map(OutlineEdge::from),
                obstacles: file.obstacles.map(crate::section::Obstacle::from),
                plates: file.plates.map(crate::section::Plate::from),
                width: file.width.into(),
            },
            liquid: file.liquid.into(),
            fill: file.fill.into(),
            compartments: file.compartments.map(study::Compartment::from),
            sump: file.sump.map(Point::from),
            discharge_coefficient: file.discharge_coefficient.map_or(study::DISCHARGE_COEFFICIENT, Num::si),
            materials: file.materials.map(crate::material::Material::from),
            cases: file.cases.map(LoadCase::from),
            points: file.points.map(|p| NamedPoint { name: p.name, at: point(p.s_mm, p.z_mm) }),
            moment_about: file.moment_about.into(),
            records: file.records.map(study::Record::from),
            verdict_notes: file.verdict_notes.map(|n| study::VerdictNote {
                case: n.case,
                criterion: n.criterion,
                text: n.text,
            }),
        }
    }
}

impl From<At> for Point {
    fn from(at: At) -> Point {
        point(at.s_mm, at.z_mm)
    }
}

fn point(s_mm: Num, z_mm: Num) -> Point {
    Point::new(s_mm.mm(), z_mm.mm())
}
