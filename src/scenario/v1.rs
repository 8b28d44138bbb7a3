//! Scenario file, version 1: frozen. A change of these structs is a new version in a module of its own.

use std::fmt;
use std::marker::PhantomData;

use serde::Deserialize;
use serde::de::{Deserializer, Error, SeqAccess, Visitor};

use crate::cases::{self, AccelUnit, LoadCase};
use crate::geom::Point;
use crate::liquid;
use crate::section::{self, OutlineEdge, Section, WidthLaw};
use crate::study::{self, NamedPoint, Study};
use crate::units::{STANDARD_ATMOSPHERE_PA, STANDARD_GRAVITY_M_PER_S2};

use super::limits::*;
use super::number::Num;

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
    width: Width,
    outline: List<Edge, MAX_OUTLINE_EDGES>,
    #[serde(default)]
    obstacles: List<Obstacle, MAX_OBSTACLES>,
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
struct Liquid {
    name: String,
    density_kg_per_m3: Num,
    vapour_pressure_abs_kpa: Option<Num>,
    surface_tension_n_per_m: Option<Num>,
}

#[derive(Deserialize)]
#[serde(rename_all = "snake_case")]
enum Fill {
    VolumeM3(Num),
    SharePercent(Num),
    LevelMm(Num),
    UllageMm(Num),
}

#[derive(Deserialize)]
#[serde(rename_all = "snake_case", deny_unknown_fields)]
enum Width {
    Constant { width_mm: Num },
    RoundBarrel { diameter_mm: Num, bottom_z_mm: Num },
    Oval { width_mm: Num, height_mm: Num, bottom_z_mm: Num },
    Table(List<WidthRow, MAX_WIDTH_ROWS>),
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct WidthRow {
    z_mm: Num,
    width_mm: Num,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Edge {
    s_mm: Num,
    z_mm: Num,
    #[serde(default)]
    sweep_deg: Num,
    #[serde(default)]
    kind: EdgeKind,
    #[serde(default)]
    name: String,
}

#[derive(Default, Deserialize)]
#[serde(rename_all = "snake_case")]
enum EdgeKind {
    #[default]
    Wall,
    Mouth,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Obstacle {
    name: String,
    edges: List<ObstacleEdge, MAX_OBSTACLE_EDGES>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct ObstacleEdge {
    s_mm: Num,
    z_mm: Num,
    #[serde(default)]
    sweep_deg: Num,
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
struct Case {
    name: String,
    accel: Accel,
    #[serde(default)]
    attitude: Attitude,
    onset_s: Option<Num>,
    #[serde(default)]
    source: String,
    #[serde(default)]
    note: String,
}

#[derive(Deserialize)]
#[serde(rename_all = "snake_case", deny_unknown_fields)]
enum Accel {
    #[serde(rename = "components_m_per_s2")]
    ComponentsSi {
        s: Num,
        z: Num,
    },
    ComponentsG {
        s: Num,
        z: Num,
    },
    #[serde(rename = "polar_m_per_s2")]
    PolarSi {
        magnitude: Num,
        direction_deg: Num,
    },
    PolarG {
        magnitude: Num,
        direction_deg: Num,
    },
}

#[derive(Default, Deserialize)]
#[serde(rename_all = "snake_case")]
enum Attitude {
    #[default]
    Level,
    GradePercent(Num),
    HeelDeg(Num),
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Record {
    title: String,
    limit: Limit,
    #[serde(default)]
    clause: String,
    #[serde(default)]
    edition: String,
    #[serde(default)]
    origin: String,
    #[serde(default)]
    confirmed: bool,
}

#[derive(Deserialize)]
#[serde(rename_all = "snake_case", deny_unknown_fields)]
enum Limit {
    WallPressureGageKpa(Num),
    RoofPressureGageKpa(Num),
    FreeboardAllowanceMm(Num),
    VapourMarginKpa(Num),
    CellVolume { at_most_m3: Num, or_filled_to_percent: Num, or_from_percent: Num },
    PlateCoveragePercent(Num),
    PlateSpacingMm(Num),
    OpenShareAtLeastPercent(Num),
    OpenShareAtMostPercent(Num),
    DrainPath,
    VentPath,
    RatedFlow { flow_m3_per_s: Num, difference_mm: Num },
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct VerdictNote {
    case: String,
    criterion: String,
    text: String,
}

/// A list of at most `MAX` items.
struct List<T, const MAX: usize>(Vec<T>);

impl<T, const MAX: usize> List<T, MAX> {
    fn map<U>(self, into: impl FnMut(T) -> U) -> Vec<U> {
        self.0.into_iter().map(into).collect()
    }
}

impl<T, const MAX: usize> Default for List<T, MAX> {
    fn default() -> Self {
        List(Vec::new())
    }
}

impl<'de, T: Deserialize<'de>, const MAX: usize> Deserialize<'de> for List<T, MAX> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        struct Items<T, const MAX: usize>(PhantomData<T>);

        impl<'de, T: Deserialize<'de>, const MAX: usize> Visitor<'de> for Items<T, MAX> {
            type Value = List<T, MAX>;

            fn expecting(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
                write!(f, "a list")
            }

            fn visit_seq<A: SeqAccess<'de>>(self, mut items: A) -> Result<Self::Value, A::Error> {
                let mut list = Vec::new();
                while let Some(item) = items.next_element()? {
                    if list.len() == MAX {
                        return Err(A::Error::custom(format!(
                            "a list has more than {MAX} items\nthe limit here is {MAX}; take some out"
                        )));
                    }
                    list.push(item);
                }
                Ok(List(list))
            }
        }

        deserializer.deserialize_seq(Items(PhantomData))
    }
}

fn point(s_mm: Num, z_mm: Num) -> Point {
    Point::new(s_mm.mm(), z_mm.mm())
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
                obstacles: file.obstacles.map(section::Obstacle::from),
                plates: Vec::new(),
                width: file.width.into(),
            },
            liquid: liquid::Liquid {
                name: file.liquid.name,
                density_kg_per_m3: file.liquid.density_kg_per_m3.si(),
                vapour_pressure_abs_pa: file.liquid.vapour_pressure_abs_kpa.map(Num::kpa),
                surface_tension_n_per_m: file.liquid.surface_tension_n_per_m.map(Num::si),
            },
            fill: match file.fill {
                Fill::VolumeM3(v) => study::Fill::Volume(v.si()),
                Fill::SharePercent(v) => study::Fill::Share(v.percent()),
                Fill::LevelMm(v) => study::Fill::Level(v.mm()),
                Fill::UllageMm(v) => study::Fill::Ullage(v.mm()),
            },
            compartments: Vec::new(),
            sump: None,
            discharge_coefficient: study::DISCHARGE_COEFFICIENT,
            materials: Vec::new(),
            cases: file.cases.map(LoadCase::from),
            points: file.points.map(|p| NamedPoint { name: p.name, at: point(p.s_mm, p.z_mm) }),
            moment_about: point(file.moment_about.s_mm, file.moment_about.z_mm),
            records: file.records.map(study::Record::from),
            verdict_notes: file.verdict_notes.map(|n| study::VerdictNote {
                case: n.case,
                criterion: n.criterion,
                text: n.text,
            }),
        }
    }
}

impl From<Edge> for OutlineEdge {
    fn from(edge: Edge) -> OutlineEdge {
        OutlineEdge {
            name: edge.name,
            kind: match edge.kind {
                EdgeKind::Wall => section::EdgeKind::Wall,
                EdgeKind::Mouth => section::EdgeKind::Mouth,
            },
            start: point(edge.s_mm, edge.z_mm),
            sweep_rad: edge.sweep_deg.deg(),
        }
    }
}

impl From<Obstacle> for section::Obstacle {
    fn from(obstacle: Obstacle) -> section::Obstacle {
        let vertex = |e: ObstacleEdge| section::Vertex { start: point(e.s_mm, e.z_mm), sweep_rad: e.sweep_deg.deg() };
        section::Obstacle { name: obstacle.name, vertices: obstacle.edges.map(vertex) }
    }
}

impl From<Width> for WidthLaw {
    fn from(width: Width) -> WidthLaw {
        match width {
            Width::Constant { width_mm } => WidthLaw::Constant { width_m: width_mm.mm() },
            Width::RoundBarrel { diameter_mm, bottom_z_mm } => {
                WidthLaw::RoundBarrel { diameter_m: diameter_mm.mm(), bottom_z_m: bottom_z_mm.mm() }
            }
            Width::Oval { width_mm, height_mm, bottom_z_mm } => {
                WidthLaw::Oval { width_m: width_mm.mm(), height_m: height_mm.mm(), bottom_z_m: bottom_z_mm.mm() }
            }
            Width::Table(rows) => WidthLaw::Table(rows.map(|row| (row.z_mm.mm(), row.width_mm.mm()))),
        }
    }
}

impl From<Case> for LoadCase {
    fn from(case: Case) -> LoadCase {
        let components = |s: Num, z: Num, unit| cases::Accel::Components { a_s: s.si(), a_z: z.si(), unit };
        let polar = |size: Num, direction: Num, unit| cases::Accel::Polar {
            magnitude: size.si(),
            direction_deg: direction.si(),
            unit,
        };
        LoadCase {
            name: case.name,
            accel: match case.accel {
                Accel::ComponentsSi { s, z } => components(s, z, AccelUnit::MPerS2),
                Accel::ComponentsG { s, z } => components(s, z, AccelUnit::G),
                Accel::PolarSi { magnitude, direction_deg } => polar(magnitude, direction_deg, AccelUnit::MPerS2),
                Accel::PolarG { magnitude, direction_deg } => polar(magnitude, direction_deg, AccelUnit::G),
            },
            attitude: match case.attitude {
                Attitude::Level => cases::Attitude::Level,
                Attitude::GradePercent(percent) => cases::Attitude::GradePercent(percent.si()),
                Attitude::HeelDeg(deg) => cases::Attitude::HeelDeg(deg.si()),
            },
            onset_s: case.onset_s.map(Num::si),
            duration_s: None,
            release: false,
            source: case.source,
            note: case.note,
        }
    }
}

impl From<Record> for study::Record {
    fn from(record: Record) -> study::Record {
        study::Record {
            title: record.title,
            limit: match record.limit {
                Limit::WallPressureGageKpa(v) => study::Limit::WallPressure(v.kpa()),
                Limit::RoofPressureGageKpa(v) => study::Limit::RoofPressure(v.kpa()),
                Limit::FreeboardAllowanceMm(v) => study::Limit::FreeboardAllowance(v.mm()),
                Limit::VapourMarginKpa(v) => study::Limit::VapourMargin(v.kpa()),
                Limit::CellVolume { at_most_m3, or_filled_to_percent, or_from_percent } => study::Limit::CellVolume {
                    m3: at_most_m3.si(),
                    empty_to: or_filled_to_percent.percent(),
                    full_from: or_from_percent.percent(),
                },
                Limit::PlateCoveragePercent(v) => study::Limit::PlateCoverage(v.percent()),
                Limit::PlateSpacingMm(v) => study::Limit::PlateSpacing(v.mm()),
                Limit::OpenShareAtLeastPercent(v) => study::Limit::OpenShareAtLeast(v.percent()),
                Limit::OpenShareAtMostPercent(v) => study::Limit::OpenShareAtMost(v.percent()),
                Limit::DrainPath => study::Limit::DrainPath,
                Limit::VentPath => study::Limit::VentPath,
                Limit::RatedFlow { flow_m3_per_s, difference_mm } => {
                    study::Limit::RatedFlow { flow_m3_per_s: flow_m3_per_s.si(), difference_m: difference_mm.mm() }
                }
            },
            clause: record.clause,
            edition: record.edition,
            origin: record.origin,
            confirmed: record.confirmed,
        }
    }
}
