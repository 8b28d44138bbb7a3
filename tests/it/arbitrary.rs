//! Studies and edits at random, for properties. Any finite input may come, sensible or not.
//!
//! What is large is boxed: a strategy as one value would outgrow the stack of a test.

use brimwright::app::Edit;
use brimwright::cases::{Accel, AccelUnit, Attitude, LoadCase};
use brimwright::geom::Point;
use brimwright::liquid::Liquid;
use brimwright::material::Material;
use brimwright::section::{
    EdgeKind, Obstacle, Opening, OpeningShape, OutlineEdge, Panel, PanelEdges, Plate, Section, Vertex, WidthLaw,
};
use brimwright::study::{Compartment, Fill, Limit, NamedPoint, Record, Study, VerdictNote};
use proptest::collection::vec;
use proptest::option;
use proptest::prelude::*;

/// Finite, of any usual size, with all the digits that arithmetic leaves behind.
fn number() -> impl Strategy<Value = f64> {
    prop_oneof![
        Just(0.0),
        -10.0..10.0,
        (-1e9..1e9_f64),
        (-1e-9..1e-9_f64),
        (-9999..9999_i32).prop_map(|n| f64::from(n) / 1e3)
    ]
}

fn point() -> impl Strategy<Value = Point> {
    (number(), number()).prop_map(|(s, z)| Point::new(s, z))
}

/// Names and notes, with everything that a text format may trip over.
fn text() -> impl Strategy<Value = String> {
    prop_oneof![Just(String::new()), "[a-z \"\\\\(){}\\[\\]:,/*\n\r\t\u{1}Ωé°³]{0,12}"]
}

fn sweep() -> impl Strategy<Value = f64> {
    prop_oneof![2 => Just(0.0), 1 => -6.0..6.0]
}

fn outline_edge() -> impl Strategy<Value = OutlineEdge> {
    (text(), any::<bool>(), point(), sweep()).prop_map(|(name, mouth, start, sweep_rad)| OutlineEdge {
        name,
        kind: if mouth { EdgeKind::Mouth } else { EdgeKind::Wall },
        start,
        sweep_rad,
    })
}

fn obstacle() -> impl Strategy<Value = Obstacle> {
    (text(), vec((point(), sweep()), 0..5)).prop_map(|(name, vertices)| Obstacle {
        name,
        vertices: vertices.into_iter().map(|(start, sweep_rad)| Vertex { start, sweep_rad }).collect(),
    })
}

fn opening() -> impl Strategy<Value = Opening> {
    let shape = prop_oneof![
        number().prop_map(OpeningShape::Share),
        any::<u32>().prop_map(|n| OpeningShape::Holes { n }),
        (number(), number(), any::<bool>()).prop_map(|(diameter_m, pitch_m, is_staggered)| {
            OpeningShape::Perforated { diameter_m, pitch_m, is_staggered }
        }),
    ];
    (text(), number(), number(), shape).prop_map(|(name, from_m, to_m, shape)| Opening { name, from_m, to_m, shape })
}

/// Any plate.
pub fn plate() -> BoxedStrategy<Plate> {
    let panel = (option::of(number()), any::<bool>()).prop_map(|(stiffener_spacing_m, clamped)| Panel {
        stiffener_spacing_m,
        edges: if clamped { PanelEdges::Clamped } else { PanelEdges::SimplySupported },
    });
    (text(), vec(point(), 0..4), number(), number(), text(), panel, vec(opening(), 0..3))
        .prop_map(|(name, points, thickness_m, corrosion_m, material, panel, openings)| Plate {
            name,
            points,
            thickness_m,
            corrosion_m,
            material,
            panel,
            openings,
        })
        .boxed()
}

fn width() -> impl Strategy<Value = WidthLaw> {
    prop_oneof![
        number().prop_map(|width_m| WidthLaw::Constant { width_m }),
        (number(), number()).prop_map(|(diameter_m, bottom_z_m)| WidthLaw::RoundBarrel { diameter_m, bottom_z_m }),
        (number(), number(), number()).prop_map(|(width_m, height_m, bottom_z_m)| WidthLaw::Oval {
            width_m,
            height_m,
            bottom_z_m
        }),
        vec((number(), number()), 0..5).prop_map(WidthLaw::Table),
    ]
}

fn fill() -> impl Strategy<Value = Fill> {
    (0..4_usize, number())
        .prop_map(|(way, v)| [Fill::Volume(v), Fill::Share(v), Fill::Level(v), Fill::Ullage(v)][way])
}

fn liquid() -> BoxedStrategy<Liquid> {
    (text(), number(), option::of(number()), option::of(number()))
        .prop_map(|(name, rho, vapour, sigma)| Liquid {
            name,
            density_kg_per_m3: rho,
            vapour_pressure_abs_pa: vapour,
            surface_tension_n_per_m: sigma,
        })
        .boxed()
}

fn compartment() -> impl Strategy<Value = Compartment> {
    (text(), point(), option::of(liquid()), fill()).prop_map(|(name, at, liquid, fill)| Compartment {
        name,
        at,
        liquid,
        fill,
    })
}

fn accel() -> impl Strategy<Value = Accel> {
    (any::<bool>(), any::<bool>(), number(), number()).prop_map(|(g, polar, a, b)| {
        let unit = if g { AccelUnit::G } else { AccelUnit::MPerS2 };
        if polar {
            Accel::Polar { magnitude: a, direction_deg: b, unit }
        } else {
            Accel::Components { a_s: a, a_z: b, unit }
        }
    })
}

fn attitude() -> impl Strategy<Value = Attitude> {
    (0..3_usize, number())
        .prop_map(|(way, v)| [Attitude::Level, Attitude::GradePercent(v), Attitude::HeelDeg(v)][way])
}

/// Few names, so that cases share them now and then.
fn case_name() -> impl Strategy<Value = String> {
    prop_oneof!["[ab]", text()]
}

fn case() -> impl Strategy<Value = LoadCase> {
    let times = (option::of(number()), option::of(number()), any::<bool>());
    (case_name(), accel(), attitude(), times, text(), text()).prop_map(
        |(name, accel, attitude, (onset_s, duration_s, release), source, note)| LoadCase {
            name,
            accel,
            attitude,
            onset_s,
            duration_s,
            release,
            source,
            note,
        },
    )
}

fn limit() -> BoxedStrategy<Limit> {
    prop_oneof![
        number().prop_map(Limit::WallPressure),
        number().prop_map(Limit::RoofPressure),
        number().prop_map(Limit::FreeboardAllowance),
        number().prop_map(Limit::VapourMargin),
        (number(), number(), number()).prop_map(|(m3, empty_to, full_from)| Limit::CellVolume {
            m3,
            empty_to,
            full_from
        }),
        number().prop_map(Limit::PlateCoverage),
        number().prop_map(Limit::PlateSpacing),
        number().prop_map(Limit::OpenShareAtLeast),
        number().prop_map(Limit::OpenShareAtMost),
        Just(Limit::DrainPath),
        Just(Limit::VentPath),
        (number(), number())
            .prop_map(|(flow_m3_per_s, difference_m)| Limit::RatedFlow { flow_m3_per_s, difference_m }),
    ]
    .boxed()
}

fn record() -> impl Strategy<Value = Record> {
    (text(), limit(), text(), text(), text(), any::<bool>()).prop_map(
        |(title, limit, clause, edition, origin, confirmed)| Record {
            title,
            limit,
            clause,
            edition,
            origin,
            confirmed,
        },
    )
}

fn material() -> impl Strategy<Value = Material> {
    let numbers = (number(), number(), number(), number(), number());
    (text(), numbers, text()).prop_map(
        |(name, (yield_pa, modulus_pa, poisson, density_kg_per_m3, factor), source)| Material {
            name,
            yield_pa,
            modulus_pa,
            poisson,
            density_kg_per_m3,
            factor,
            source,
            status: Material::OWN_STATUS.to_owned(),
        },
    )
}

fn named_point() -> impl Strategy<Value = NamedPoint> {
    (text(), point()).prop_map(|(name, at)| NamedPoint { name, at })
}

fn note() -> impl Strategy<Value = VerdictNote> {
    (case_name(), "[pq]", text()).prop_map(|(case, criterion, text)| VerdictNote { case, criterion, text })
}

/// How properties are tried: failures are printed whole, no file is left behind.
pub fn config() -> ProptestConfig {
    ProptestConfig { failure_persistence: None, ..ProptestConfig::default() }
}

/// Any study.
pub fn study() -> BoxedStrategy<Study> {
    let words = [text(), text(), text(), text()];
    let physics = (number(), number(), number(), liquid(), fill());
    let section = (vec(outline_edge(), 0..8), vec(obstacle(), 0..3), vec(plate(), 0..3), width())
        .prop_map(|(outline, obstacles, plates, width)| Section { outline, obstacles, plates, width });
    // Few studies name another coefficient than the usual one.
    let c_d = prop_oneof![Just(0.6), number()];
    let flow = (vec(compartment(), 0..3), option::of(point()), c_d, vec(material(), 0..3));
    let rest = (vec(case(), 0..4), vec(named_point(), 0..3), point(), vec(record(), 0..3), vec(note(), 0..3));
    (words, physics, section, flow, rest)
        .prop_map(
            |(
                [title, author, revision, notes],
                (gravity_m_per_s2, air_pressure_abs_pa, ullage_gage_pa, liquid, fill),
                section,
                (compartments, sump, discharge_coefficient, materials),
                (cases, points, moment_about, records, verdict_notes),
            )| Study {
                title,
                author,
                revision,
                notes,
                gravity_m_per_s2,
                air_pressure_abs_pa,
                ullage_gage_pa,
                section,
                liquid,
                fill,
                compartments,
                sump,
                discharge_coefficient,
                materials,
                cases,
                points,
                moment_about,
                records,
                verdict_notes,
            },
        )
        .boxed()
}

/// Any edit; indices are in range or a little beyond.
pub fn edit() -> BoxedStrategy<Edit> {
    let i = || 0..9_usize;
    prop_oneof![
        study().prop_map(|s| Edit::Replace(Box::new(s))),
        text().prop_map(Edit::Title),
        text().prop_map(Edit::Author),
        text().prop_map(Edit::Revision),
        text().prop_map(Edit::Notes),
        liquid().prop_map(Edit::Liquid),
        fill().prop_map(Edit::Fill),
        number().prop_map(Edit::UllageGage),
        width().prop_map(Edit::Width),
        (i(), point()).prop_map(|(i, p)| Edit::MoveVertex(i, p)),
        (i(), sweep()).prop_map(|(i, s)| Edit::BendEdge(i, s)),
        (i(), any::<bool>()).prop_map(|(i, m)| Edit::EdgeKind(i, if m { EdgeKind::Mouth } else { EdgeKind::Wall })),
        (i(), text()).prop_map(|(i, t)| Edit::EdgeName(i, t)),
        (i(), point()).prop_map(|(i, p)| Edit::SplitEdge(i, p)),
        i().prop_map(Edit::RemoveVertex),
        vec(outline_edge(), 0..8).prop_map(Edit::Outline),
        (0..4_usize, i(), point()).prop_map(|(i, v, p)| Edit::MoveObstacleVertex(i, v, p)),
        (0..4_usize, number(), number()).prop_map(|(i, s, z)| Edit::ShiftObstacle(i, s, z)),
        obstacle().prop_map(Edit::AddObstacle),
        (0..4_usize).prop_map(Edit::RemoveObstacle),
        plate().prop_map(|p| Edit::AddPlate(Box::new(p))),
        (0..4_usize, plate()).prop_map(|(i, p)| Edit::Plate(i, Box::new(p))),
        (0..4_usize, number(), number()).prop_map(|(i, s, z)| Edit::ShiftPlate(i, s, z)),
        (0..4_usize, 0..5_usize, point()).prop_map(|(i, c, p)| Edit::MovePlatePoint(i, c, p)),
        (0..4_usize).prop_map(Edit::RemovePlate),
        vec(plate(), 0..3).prop_map(Edit::Plates),
        vec(compartment(), 0..3).prop_map(Edit::Compartments),
        vec(material(), 0..3).prop_map(Edit::Materials),
        (0..4_usize, material()).prop_map(|(i, m)| Edit::Material(i, Box::new(m))),
        option::of(point()).prop_map(Edit::Sump),
        number().prop_map(Edit::DischargeCoefficient),
        (0..5_usize, accel()).prop_map(|(i, a)| Edit::CaseAccel(i, a)),
        (0..5_usize, attitude()).prop_map(|(i, a)| Edit::CaseAttitude(i, a)),
        (0..5_usize, case()).prop_map(|(i, c)| Edit::Case(i, Box::new(c))),
        case().prop_map(|c| Edit::AddCase(Box::new(c))),
        (0..5_usize).prop_map(Edit::RemoveCase),
        (0..5_usize, 0..5_usize).prop_map(|(i, j)| Edit::ReorderCase(i, j)),
        vec(record(), 0..3).prop_map(Edit::Records),
        vec(named_point(), 0..3).prop_map(Edit::Points),
        point().prop_map(Edit::MomentAbout),
        (case_name(), "[pq]", text()).prop_map(|(c, k, t)| Edit::VerdictNote(c, k, t)),
    ]
    .boxed()
}
