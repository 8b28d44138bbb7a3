//! Builders, reference tables and an independent clipper for the checks against the outside.

pub mod clip;
pub mod followed;
pub mod grid;
pub mod grid_pools;
pub mod hand_cases;
pub mod limited;
pub mod plated;
pub mod random;
pub mod shapes;
pub mod states;
pub mod table;

use brimwright::analysis::{self, CaseResult, Chord, EdgeLoad, Results, Settled, Verdict};
use brimwright::cases::{Accel, AccelUnit, Attitude, LoadCase};
use brimwright::geom::{Edge, Point, Vec2, cross};
use brimwright::liquid::Liquid;
use brimwright::problem::Place;
use brimwright::section::Section;
use brimwright::study::{Fill, NamedPoint, Study};

/// Gravity of the published worked examples, m/s2.
pub const GRAVITY: f64 = 9.81;

/// Density of the published worked examples, kg/m3.
pub const WATER: f64 = 1000.0;

/// A study of water under [`GRAVITY`], with moments about (0, 0), at rest.
pub fn study(section: Section, fill: Fill) -> Study {
    Study {
        title: "check".into(),
        author: String::new(),
        revision: String::new(),
        notes: String::new(),
        gravity_m_per_s2: GRAVITY,
        air_pressure_abs_pa: 101_325.0,
        ullage_gage_pa: 0.0,
        section,
        liquid: Liquid {
            name: "water".into(),
            density_kg_per_m3: WATER,
            vapour_pressure_abs_pa: None,
            surface_tension_n_per_m: None,
        },
        fill,
        compartments: vec![],
        sump: None,
        discharge_coefficient: 0.6,
        materials: vec![],
        cases: vec![held(0.0, 0.0)],
        points: vec![],
        moment_about: Point::origin(),
        records: vec![],
        verdict_notes: vec![],
    }
}

/// A load case: an acceleration held on a level tank, m/s2.
pub fn held(a_s: f64, a_z: f64) -> LoadCase {
    LoadCase {
        name: format!("a = ({a_s}, {a_z})"),
        accel: Accel::Components { a_s, a_z, unit: AccelUnit::MPerS2 },
        attitude: Attitude::Level,
        onset_s: None,
        duration_s: None,
        release: false,
        source: String::new(),
        note: String::new(),
    }
}

/// A point at which pressure is asked for.
pub fn named(name: &str, s: f64, z: f64) -> NamedPoint {
    NamedPoint { name: name.into(), at: Point::new(s, z) }
}

/// Results of a study that must be without faults.
pub fn judge(study: &Study) -> Results {
    match study.validate() {
        Ok(valid) => analysis::run(&valid),
        Err(problems) => {
            let words: Vec<String> = problems.iter().map(ToString::to_string).collect();
            panic!("a sound study was refused:\n{}", words.join("\n"));
        }
    }
}

/// The only case of a study, judged.
pub fn judge_case(study: &Study, case: LoadCase) -> CaseResult {
    judge(&Study { cases: vec![case], ..study.clone() }).cases.remove(0)
}

/// The settled state of a case that must have one.
pub fn settled(case: &CaseResult) -> &Settled {
    case.settled.as_ref().unwrap_or_else(|why| panic!("case {}: no settled state: {why}", case.name))
}

/// The verdict of a criterion, if it was judged.
pub fn verdict<'a>(case: &'a CaseResult, criterion: &str) -> Option<&'a Verdict> {
    case.verdicts.iter().find(|v| v.criterion == criterion)
}

/// Load on an edge of the outline.
pub fn edge_load(settled: &Settled, edge_idx: usize) -> &EdgeLoad {
    let found = settled.edges.iter().find(|load| load.place == Place::Edge(edge_idx));
    found.unwrap_or_else(|| panic!("no load for edge {edge_idx}"))
}

/// Pressure at a named point, Pa gage.
pub fn pressure_at(settled: &Settled, name: &str) -> f64 {
    let found = settled.points.iter().find(|p| p.name == name);
    found.unwrap_or_else(|| panic!("no point {name}")).gage_pa
}

/// The only surface piece.
pub fn chord(settled: &Settled) -> Chord {
    assert_eq!(settled.pools[0].surface.len(), 1, "surface pieces: {:?}", settled.pools[0].surface);
    settled.pools[0].surface[0]
}

/// z of the surface's line at `s`.
pub fn line_z(case: &CaseResult, s: f64) -> f64 {
    let slope = case.gravity.slope.expect("a surface that is not vertical");
    settled(case).pools[0].offset_m.expect("a surface that is not vertical") + slope * s
}

/// Distance from `origin` along the unit vector `along` at which a load's line of action is crossed, worked out
/// from its moment about the study's moment point; and the same from the point on the line that the load names.
pub fn acts_along(load: &EdgeLoad, moment_about: Point, origin: Point, along: Vec2) -> (f64, f64) {
    let lever = cross(along, load.force_n);
    let from_moment = (load.moment_n_m - cross(origin - moment_about, load.force_n)) / lever;
    let acts_at = load.acts_at.expect("a load that acts somewhere");
    (from_moment, cross(acts_at - origin, load.force_n) / lever)
}

/// Sum of the loads on all edges and on the side walls: force, and moment about the study's moment point.
pub fn sum_of_loads(settled: &Settled) -> (Vec2, f64) {
    settled
        .edges
        .iter()
        .fold((settled.sides_force_n, settled.sides_moment_n_m), |(f, m), e| (f + e.force_n, m + e.moment_n_m))
}

/// `edges` turned about the origin.
pub fn turned(edges: &[Edge], angle_rad: f64) -> Vec<Edge> {
    let (sin, cos) = angle_rad.sin_cos();
    let turn = |p: Point| Point::new(p.x * cos - p.y * sin, p.x * sin + p.y * cos);
    edges.iter().map(|e| Edge { start: turn(e.start), end: turn(e.end), sweep: e.sweep }).collect()
}

/// Count of connected parts of a region below a level.
pub fn n_pools(sublevel: &brimwright::geom::Sublevel, level: f64) -> usize {
    let depth = brimwright::section::WidthLaw::Constant { width_m: 1.0 };
    brimwright::geom::Basins::over(sublevel.clone(), &depth, &|_| false).n_parts(level)
}
