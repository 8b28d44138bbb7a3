//! A study and its results, made by hand so that every kind of entry occurs, numbers that are not finite too.

use crate::analysis::*;
use crate::cases::{Accel, Attitude, LoadCase};
use crate::geom::{Point, Vec2};
use crate::liquid::Liquid;
use crate::problem::{Place, Problem};
use crate::section::{
    EdgeKind, Obstacle, Opening, OpeningShape, OutlineEdge, Panel, Plate, Section, Vertex, Wall, WidthLaw,
};
use crate::sources::Source;
use crate::study::{Fill, Limit, NamedPoint, Record, Study, VerdictNote};
use crate::units::{Measure, Quantity};

/// A box 2 m by 1 m with a duct and a sill inside, open at its top.
pub(super) fn study() -> Study {
    let corner =
        |name: &str, kind, s, z| OutlineEdge { name: name.into(), kind, start: Point::new(s, z), sweep_rad: 0.0 };
    let duct = [(0.9, 0.1), (1.1, 0.1), (1.1, 0.2), (0.9, 0.2)];
    Study {
        title: "Rinse tray".into(),
        author: "Workshop".into(),
        revision: "B".into(),
        notes: "Two beakers a minute.".into(),
        gravity_m_per_s2: 9.80665,
        air_pressure_abs_pa: 101_325.0,
        ullage_gage_pa: 0.0,
        section: Section {
            outline: vec![
                corner("floor", EdgeKind::Wall, 0.0, 0.0),
                corner("right wall", EdgeKind::Wall, 2.0, 0.0),
                corner("rim", EdgeKind::Mouth, 2.0, 1.0),
                corner("", EdgeKind::Wall, 0.0, 1.0),
            ],
            plates: vec![Plate {
                name: "sill".into(),
                points: vec![Point::new(0.5, 0.0), Point::new(0.5, 0.7)],
                thickness_m: 0.003,
                corrosion_m: 0.0005,
                material: "structural steel S235".into(),
                panel: Panel::default(),
                openings: vec![Opening {
                    name: "drain gap".into(),
                    from_m: 0.0,
                    to_m: 0.05,
                    shape: OpeningShape::Share(0.4),
                }],
            }],
            obstacles: vec![Obstacle {
                name: "duct".into(),
                vertices: duct.map(|(s, z)| Vertex { start: Point::new(s, z), sweep_rad: 0.0 }).into(),
            }],
            width: WidthLaw::Constant { width_m: 0.5 },
        },
        liquid: Liquid {
            name: "rinse water".into(),
            density_kg_per_m3: 998.2,
            vapour_pressure_abs_pa: Some(2339.0),
            surface_tension_n_per_m: None,
        },
        fill: Fill::Level(0.8),
        compartments: vec![],
        sump: None,
        discharge_coefficient: crate::study::DISCHARGE_COEFFICIENT,
        materials: vec![],
        cases: vec![
            LoadCase {
                name: "Transfer stop".into(),
                accel: Accel::Components { a_s: -1.5, a_z: 0.0, unit: Default::default() },
                attitude: Attitude::GradePercent(1.0),
                onset_s: Some(0.4),
                duration_s: Some(3.0),
                release: true,
                source: "drive data sheet".into(),
                note: "with full load".into(),
            },
            LoadCase {
                name: "Dropped".into(),
                accel: Accel::Components { a_s: 0.0, a_z: -9.80665, unit: Default::default() },
                attitude: Attitude::Level,
                onset_s: None,
                duration_s: None,
                release: false,
                source: String::new(),
                note: String::new(),
            },
        ],
        points: vec![
            NamedPoint { name: "probe".into(), at: Point::new(0.2, 0.1) },
            NamedPoint { name: "float".into(), at: Point::new(1.9, 0.98) },
        ],
        moment_about: Point::new(1.0, 0.0),
        records: vec![Record {
            title: "Tray wall".into(),
            limit: Limit::WallPressure(9000.0),
            clause: "4.2".into(),
            edition: "2021".into(),
            origin: "customer".into(),
            confirmed: false,
        }],
        verdict_notes: vec![VerdictNote {
            case: "Transfer stop".into(),
            criterion: "Contained".into(),
            text: "lid is planned".into(),
        }],
    }
}

/// A pool between two ends of its surface, in one cell.
fn pool(volume_m3: f64, level_m: f64, left: Point, right: Point, cell_idx: usize) -> Pool {
    Pool {
        volume_m3,
        level_m,
        offset_m: Some(level_m - 0.14),
        surface: vec![Chord { left, right }],
        deepest: Point::new(right.x, 0.0),
        centroid: Point::new(0.5 * (left.x + right.x), 0.41),
        compartment: 0,
        cell_idxs: vec![cell_idx],
        weight_pa_per_m: 9900.0,
        wetted: vec![],
    }
}

fn settled() -> Settled {
    Settled {
        volume_m3: 0.78,
        spilled_m3: 0.01,
        spills: vec![MouthSpill { mouth_idx: 0, volume_m3: 0.01 }],
        mass_kg: 778.6,
        pools: vec![
            pool(0.62, 0.79, Point::new(0.5, 0.72), Point::new(2.0, 0.95), 1),
            pool(0.16, 0.67, Point::new(0.0, 0.53), Point::new(0.5, 0.61), 0),
        ],
        centroid: Point::new(1.04, 0.41),
        highest_wetted: Point::new(2.0, 0.95),
        peak_pa: 9300.0,
        peak_at: Point::new(2.0, 0.0),
        peak_place: Place::Edge(1),
        lowest_abs_pa: 101_325.0,
        edges: vec![
            EdgeLoad {
                place: Place::Edge(0),
                name: "floor".into(),
                is_wall: true,
                wetted_length_m: 2.0,
                force_n: Vec2::new(0.0, -7700.0),
                moment_n_m: -300.0,
                acts_at: Some(Point::new(1.04, 0.0)),
                peak: Some((9300.0, Point::new(2.0, 0.0))),
            },
            EdgeLoad {
                place: Place::Edge(2),
                name: "rim".into(),
                is_wall: false,
                wetted_length_m: 0.0,
                force_n: Vec2::zeros(),
                moment_n_m: -0.0,
                acts_at: None,
                peak: None,
            },
        ],
        plates: vec![PlateLoad {
            name: "sill".into(),
            force_n: Vec2::new(-410.0, 0.0),
            moment_n_m: 120.0,
            acts_at: Some(Point::new(0.5, 0.293)),
            net_n: -410.0,
            peak: Some((-1190.0, Point::new(0.5, 0.05))),
            stretches: vec![Stretch { from_m: 0.05, to_m: 0.7, from_pa: -1190.0, to_pa: -150.0 }],
            highest: Some((7200.0, Point::new(0.5, 0.05))),
        }],
        sides_force_n: Vec2::zeros(),
        sides_moment_n_m: 0.0,
        total_force_n: Vec2::new(1170.0, -7636.0),
        total_moment_n_m: -780.0,
        points: vec![
            PointPressure { name: "probe".into(), at: Point::new(0.2, 0.1), gage_pa: 5700.0, wet: true },
            PointPressure { name: "float".into(), at: Point::new(1.9, 0.98), gage_pa: 0.0, wet: false },
        ],
        roof: Some(RoofContact { wetted_length_m: 0.1, peak_pa: 120.0, at: Point::new(2.0, 1.0), edge_idx: 3 }),
        cells_m3: vec![0.16, 0.62],
        gas: vec![GasPocket { cell_idx: 0, volume_m3: 0.012, at: Point::new(0.1, 0.95), compartment: 0 }],
    }
}

/// The same with the sill's opening shut.
fn sealed() -> Settled {
    let mut sealed = settled();
    sealed.cells_m3 = vec![0.19, 0.59];
    (sealed.pools[0].volume_m3, sealed.pools[1].volume_m3) = (0.59, 0.19);
    sealed.plates[0].net_n = 230.0;
    sealed
}

/// Results as they might be for [`study`]; the numbers are invented.
pub(super) fn results() -> Results {
    let cell = |name: &str, s, area_m2, still_m3| Cell {
        name: name.into(),
        inside: Point::new(s, 0.5),
        compartment: 0,
        area_m2,
        capacity_m3: 0.5 * area_m2,
        still_m3,
        still_z_m: Some(0.8),
    };
    Results {
        capacity_m3: 0.99,
        still: Still {
            volume_m3: 0.79,
            share: 0.798,
            level_z_m: 0.8,
            ullage_m: 0.2,
            depth_m: 0.8,
            mass_kg: 788.6,
            surface: vec![Chord { left: Point::new(0.0, 0.8), right: Point::new(2.0, 0.8) }],
            highest_share: Some(0.786),
        },
        cells: vec![cell("cell 1", 0.25, 0.5, 0.2), cell("cell 2", 1.4, 1.48, 0.59)],
        compartments: vec![Compartment { name: "compartment 1".into(), own_idx: None }],
        layout: Outcome {
            verdicts: vec![verdict("Plate coverage", State::Holds, Some(0.9), Quantity::Share, 0.7, 0.63)],
            absent: vec![Absent {
                criterion: "Vent path",
                place_words: "tank".into(),
                reason: "none is asked".into(),
            }],
        },
        plate_peaks: vec![PlatePeak {
            plate_idx: 0,
            name: "weld force",
            load: Measure::new(Quantity::ForcePerLength, 180.0),
            at: Some(Point::new(0.5, 0.0)),
            case_idx: 0,
            bound: Bound::Sealed,
        }],
        cases: vec![
            CaseResult {
                name: "Transfer stop".into(),
                gravity: EffectiveGravity {
                    vec: Vec2::new(1.5, -9.8),
                    magnitude: 9.92,
                    up: Some(Vec2::new(-0.151, 0.988)),
                    tilt_rad: Some(0.152),
                    slope: Some(0.153),
                },
                accel: Vec2::new(-1.5, 0.0),
                settled: Ok(settled()),
                sealed: Some(Ok(sealed())),
                released: Some(Ok(Settled { cells_m3: vec![0.17, 0.61], ..settled() })),
                trapped: vec![Trapped { cell_idx: 1, volume_m3: 0.02 }],
                routes: vec![],
                plates: vec![PlateResult {
                    plate_idx: 0,
                    bound: Bound::Sealed,
                    welds: vec![Weld {
                        end: 0,
                        at: Point::new(0.5, 0.0),
                        alone: Some(EndReaction { force_n_per_m: 180.0, moment_n: -40.0 }),
                        hinged: None,
                        clamped: None,
                    }],
                    panel: None,
                    load_used: 0.0,
                }],
                pours: vec![Pour {
                    wall: Wall::Plate { plate_idx: 0, span_m: [0.05, 0.7], is_left: true },
                    at: Point::new(0.5, 0.7),
                    to_right: true,
                    volume_m3: 0.03,
                }],
                transfer: Some(Ok(Transfer {
                    moved_m3: 0.02,
                    left_m3: 0.0,
                    half_s: 0.9,
                    nearly_all_s: 2.6,
                    end_s: Some(3.4),
                    lasts_s: Some(3.4),
                    moved_share: 1.0,
                    near: Some(Bound::Settled),
                    words: "the settled bound is near".into(),
                })),
                verdicts: vec![
                    verdict("Contained", State::Fails, Some(f64::INFINITY), Quantity::Volume, 0.01, 0.0),
                    Verdict {
                        unconfirmed_record: Some(0),
                        ..verdict("Wall pressure", State::Fails, Some(1.033), Quantity::GagePressure, 9300.0, 9000.0)
                    },
                    Verdict {
                        bound: Some(Bound::Sealed),
                        ..verdict("Freeboard", State::Holds, Some(0.75), Quantity::Length, 0.15, 0.2)
                    },
                ],
                absent: vec![Absent {
                    criterion: "Roof contact",
                    place_words: "tank".into(),
                    reason: "no edge of the outline is a shut roof".into(),
                }],
            },
            CaseResult {
                name: "Dropped".into(),
                gravity: EffectiveGravity {
                    vec: Vec2::zeros(),
                    magnitude: 0.0,
                    up: None,
                    tilt_rad: None,
                    slope: None,
                },
                accel: Vec2::new(0.0, -9.80665),
                settled: Err("free fall: effective gravity is zero".into()),
                sealed: Some(Err("free fall with openings shut, too".into())),
                released: None,
                trapped: vec![],
                routes: vec![],
                pours: vec![],
                transfer: None,
                plates: vec![],
                verdicts: vec![Verdict {
                    demand: None,
                    limit: None,
                    at: None,
                    remark: "capillarity rules the surface".into(),
                    ..verdict("Contained", State::NotJudged, None, Quantity::Volume, f64::NAN, f64::NAN)
                }],
                absent: vec![],
            },
        ],
        pressure_scale_pa: 10_000.0,
        warnings: vec![Problem::warning(Place::Edge(3), "no name", "give it one")],
    }
}

fn verdict(
    criterion: &'static str,
    state: State,
    utilisation: Option<f64>,
    quantity: Quantity,
    demand: f64,
    limit: f64,
) -> Verdict {
    let reaches = [Reach::Inside, Reach::Inside, Reach::Near, Reach::Inside, Reach::Inside];
    let names = ["rise time", "steepness", "depth to length", "forcing period", "roof or dry floor"];
    Verdict {
        criterion,
        state,
        demand: Some(Measure::new(quantity, demand)),
        limit: Some(Measure::new(quantity, limit)),
        sense: Sense::AtMost,
        utilisation,
        place: Place::Edge(2),
        place_words: "rim, right end".into(),
        at: Some(Point::new(2.0, 1.0)),
        working: vec![WorkLine {
            symbols: "tan theta = a_s / (g + a_z)".into(),
            numbers: "1.5 / 9.80665".into(),
            result: Measure::new(Quantity::Ratio, f64::NAN),
        }],
        mend: vec!["To hold, fill 78.6 %".into()],
        source: Source::BrimPath,
        trust: reaches
            .into_iter()
            .zip(names)
            .map(|(reach, name)| Trust { name, reach, words: format!("{name} 0.3") })
            .collect(),
        remark: String::new(),
        record: None,
        unconfirmed_record: None,
        bound: None,
        gravity_used: None,
    }
}
