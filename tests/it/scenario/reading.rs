//! What is written is read again, in its unit.

use brimwright::cases::{Accel, AccelUnit, Attitude};
use brimwright::geom::Point;
use brimwright::scenario::{parse, write};
use brimwright::section::{EdgeKind, Opening, OpeningShape, Panel, PanelEdges, Plate, WidthLaw};
use brimwright::study::{Fill, Limit, Study};
use proptest::prelude::*;

use super::{GOOD, good, listed};
use crate::arbitrary;

#[test]
fn every_key_is_read_in_its_unit() {
    let study = good();
    assert_eq!(
        (study.title.as_str(), study.author.as_str(), study.revision.as_str()),
        ("Test tank", "A. Tester", "B")
    );
    assert_eq!(study.notes, "two\nlines, \"quoted\"");
    assert_eq!((study.gravity_m_per_s2, study.air_pressure_abs_pa, study.ullage_gage_pa), (9.81, 100e3, 2.5e3));
    assert_eq!(study.liquid.density_kg_per_m3, 870.0);
    assert_eq!(study.liquid.vapour_pressure_abs_pa, Some(500.0));
    assert_eq!(study.liquid.surface_tension_n_per_m, Some(0.03));
    assert_eq!(study.fill, Fill::Ullage(0.3));
    assert_eq!(study.section.width, WidthLaw::Table(vec![(0.0, 0.1), (0.0505, 0.2)]));
    let edge = &study.section.outline[1];
    assert_eq!((edge.start.x, edge.start.y, edge.kind), (1.0, 0.0, EdgeKind::Wall));
    assert!((edge.sweep_rad - std::f64::consts::FRAC_PI_2).abs() < 1e-15, "{}", edge.sweep_rad);
    assert_eq!(study.section.outline[2].kind, EdgeKind::Mouth);
    assert_eq!(study.section.outline[0].name, "floor");
    assert_eq!(study.section.obstacles[0].vertices[1].start.x, 0.2);
    assert_eq!((study.points[0].at.x, study.points[0].at.y), (0.01, 0.02));
    assert_eq!((study.moment_about.x, study.moment_about.y), (0.5, -0.1));
    let accels: Vec<Accel> = study.cases.iter().map(|c| c.accel).collect();
    assert_eq!(
        accels,
        [
            Accel::Components { a_s: 0.25, a_z: -0.1, unit: AccelUnit::G },
            Accel::Components { a_s: 1.0, a_z: 0.0, unit: AccelUnit::MPerS2 },
            Accel::Polar { magnitude: 0.5, direction_deg: 30.0, unit: AccelUnit::G },
            Accel::Polar { magnitude: 2.0, direction_deg: 0.0, unit: AccelUnit::MPerS2 },
        ]
    );
    let attitudes: Vec<Attitude> = study.cases.iter().map(|c| c.attitude).collect();
    assert_eq!(attitudes, [Attitude::GradePercent(4.0), Attitude::HeelDeg(-3.0), Attitude::Level, Attitude::Level]);
    let times: Vec<_> = study.cases[..2].iter().map(|c| (c.onset_s, c.duration_s, c.release)).collect();
    assert_eq!(times, [(Some(1.5), Some(4.0), true), (None, None, false)]);
    let limits: Vec<Limit> = study.records.iter().map(|r| r.limit).collect();
    assert_eq!(
        limits,
        [
            Limit::WallPressure(30e3),
            Limit::RoofPressure(5e3),
            Limit::FreeboardAllowance(0.05),
            Limit::VapourMargin(10e3),
            Limit::CellVolume { m3: 7.5, empty_to: 0.2, full_from: 0.8 },
            Limit::PlateCoverage(0.7),
            Limit::PlateSpacing(1.168),
            Limit::OpenShareAtLeast(0.05),
            Limit::OpenShareAtMost(0.3),
            Limit::DrainPath,
            Limit::VentPath,
            Limit::RatedFlow { flow_m3_per_s: 0.05, difference_m: 0.1 },
        ]
    );
    assert_eq!((study.records[0].confirmed, study.records[1].confirmed), (true, false));
    assert_eq!(study.verdict_notes[0].text, "seen");
}

#[test]
fn plates_and_what_hangs_on_them_are_read() {
    let study = good();
    let opening = |name: &str, from_m, to_m, shape| Opening { name: name.into(), from_m, to_m, shape };
    let [sill, hanging] = &study.section.plates[..] else { panic!("two plates, not {:?}", study.section.plates) };
    assert_eq!(
        *sill,
        Plate {
            name: "sill".into(),
            points: [(0.4, 0.0), (0.4, 0.25), (0.45, 0.3)].map(|(s, z)| Point::new(s, z)).to_vec(),
            thickness_m: 0.004,
            corrosion_m: 0.0005,
            material: "steel".into(),
            panel: Panel { stiffener_spacing_m: Some(0.35), edges: PanelEdges::Clamped },
            openings: vec![
                opening("gap", 0.0, 0.02, OpeningShape::Share(0.25)),
                opening("", 0.05, 0.08, OpeningShape::Holes { n: 3 }),
                opening(
                    "",
                    0.1,
                    0.2,
                    OpeningShape::Perforated { diameter_m: 0.008, pitch_m: 0.012, is_staggered: true }
                ),
                opening(
                    "",
                    0.21,
                    0.22,
                    OpeningShape::Perforated { diameter_m: 0.005, pitch_m: 0.01, is_staggered: false }
                ),
            ],
        }
    );
    assert_eq!(
        *hanging,
        Plate {
            name: String::new(),
            points: vec![Point::new(0.6, 0.5), Point::new(0.6, 0.2)],
            thickness_m: 0.003,
            corrosion_m: 0.0,
            material: String::new(),
            panel: Panel { stiffener_spacing_m: None, edges: PanelEdges::SimplySupported },
            openings: vec![],
        }
    );
    assert_eq!((study.discharge_coefficient, study.sump), (0.62, Some(Point::new(0.02, 0.005))));
    let [left, right] = &study.compartments[..] else { panic!("two compartments, not {:?}", study.compartments) };
    assert_eq!((left.name.as_str(), left.at, left.fill), ("left", Point::new(0.05, 0.06), Fill::Share(0.4)));
    assert_eq!(left.liquid.as_ref().map(|l| (l.name.as_str(), l.density_kg_per_m3)), Some(("Brine", 1200.0)));
    assert_eq!(
        (right.name.as_str(), right.at, right.liquid.as_ref(), right.fill),
        ("right", Point::new(0.95, 0.06), None, Fill::Level(0.07))
    );
}

#[test]
fn each_way_of_giving_fill_and_width_is_read() {
    let with = |from: &str, to: &str| {
        let text = GOOD.replace(from, to);
        parse(text.as_bytes()).unwrap_or_else(|problems| panic!("{to}: {}", listed(&problems)))
    };
    for (text, want) in [
        ("volume_m3(5.2)", Fill::Volume(5.2)),
        ("share_percent(55)", Fill::Share(0.55)),
        ("level_mm(900)", Fill::Level(0.9)),
        ("ullage_mm(1)", Fill::Ullage(0.001)),
    ] {
        assert_eq!(with("ullage_mm(300)", text).fill, want);
    }
    let table = "table([(z_mm: 0, width_mm: 100), (z_mm: 50.5, width_mm: 200)])";
    for (text, want) in [
        ("constant(width_mm: 3800)", WidthLaw::Constant { width_m: 3.8 }),
        (
            "round_barrel(diameter_mm: 1800, bottom_z_mm: -20)",
            WidthLaw::RoundBarrel { diameter_m: 1.8, bottom_z_m: -0.02 },
        ),
        (
            "oval(width_mm: 2400, height_mm: 1700, bottom_z_mm: 0)",
            WidthLaw::Oval { width_m: 2.4, height_m: 1.7, bottom_z_m: 0.0 },
        ),
    ] {
        assert_eq!(with(table, text).section.width, want);
    }
}

#[test]
fn optional_keys_have_defaults() {
    let text = r#"(version: 1, title: "t", liquid: (name: "w", density_kg_per_m3: 1000), fill: level_mm(1),
        width: constant(width_mm: 1), outline: [])"#;
    let study = parse(text.as_bytes()).unwrap_or_else(|problems| panic!("{}", listed(&problems)));
    // Source: standard gravity and atmosphere, BIPM (3rd and 10th CGPM).
    assert_eq!((study.gravity_m_per_s2, study.air_pressure_abs_pa, study.ullage_gage_pa), (9.80665, 101_325.0, 0.0));
    assert!(study.cases.is_empty() && study.records.is_empty() && study.section.obstacles.is_empty());
    assert!(study.section.plates.is_empty() && study.compartments.is_empty());
    // Source: as DISCHARGE_COEFFICIENT documents it, common practice for sharp edges.
    assert_eq!((study.sump, study.discharge_coefficient), (None, 0.6));
}

#[test]
fn materials_of_its_own_are_read_in_their_units() {
    let steel = &good().materials[0];
    let numbers = (steel.yield_pa, steel.modulus_pa, steel.poisson, steel.density_kg_per_m3, steel.factor);
    assert_eq!(numbers, (190e6, 205.5e9, 0.3, 7850.0, 1.6));
    assert_eq!((steel.name.as_str(), steel.source.as_str()), ("steel", "mill"));
}

#[test]
fn what_may_be_left_out_is_written_only_where_it_says_something() {
    let text = r#"(version: 1, title: "t", liquid: (name: "w", density_kg_per_m3: 1000), fill: level_mm(1),
        width: constant(width_mm: 1), outline: [],
        plates: [(points: [], thickness_mm: 1, corrosion_mm: 0, material: "", panel: (), openings: [])],
        cases: [(name: "c", accel: components_g(s: 0, z: 0), release: false)], compartments: [],
        records: [], discharge_coefficient: 0.6)"#;
    let study = parse(text.as_bytes()).unwrap_or_else(|problems| panic!("{}", listed(&problems)));
    let written = write(&study);
    let keys = "compartments obstacles corrosion_mm material panel openings discharge_coefficient sump \
                onset_s duration_s release records verdict_notes";
    for key in keys.split(' ') {
        assert!(!written.contains(key), "{key} stands in\n{written}");
    }
    for key in ["outline: [],", "points: [],", "thickness_mm: 1,"] {
        assert!(written.contains(key), "{key} does not stand in\n{written}");
    }
    assert_eq!(parse(written.as_bytes()), Ok(study));
}

#[test]
fn a_byte_order_mark_and_windows_line_ends_do_no_harm() {
    let text = format!("\u{feff}{}", GOOD.replace('\n', "\r\n"));
    assert_eq!(parse(text.as_bytes()), Ok(good()));
}

#[test]
fn one_edge_a_line_and_no_conversion_noise() {
    let text = write(&good());
    for line in [
        "    version: 1,",
        "    gravity_m_per_s2: 9.81,",
        "        (s_mm: 1000, z_mm: 0, sweep_deg: 90),",
        "        (s_mm: 1000, z_mm: 500, kind: mouth),",
        "        (s_mm: 0, z_mm: 500),",
        "            accel: components_g(s: 0.25, z: -0.1),",
        "            attitude: grade_percent(4),",
        "                (s_mm: 400, z_mm: 250),",
        "            thickness_mm: 4,",
        "            panel: (stiffener_spacing_mm: 350, edges: clamped),",
        "                (name: \"gap\", from_mm: 0, to_mm: 20, shape: share_percent(25)),",
        "                (from_mm: 50, to_mm: 80, shape: holes(n: 3)),",
        "            duration_s: 4,",
        "            release: true,",
        "    sump: (s_mm: 20, z_mm: 5),",
        "    notes: \"two\\nlines, \\\"quoted\\\"\",",
    ] {
        assert!(text.lines().any(|l| l == line), "no line {line:?} in\n{text}");
    }
    assert!(text.lines().all(|l| l.len() <= 118), "{text}");
}

proptest! {
    #![proptest_config(arbitrary::config())]

    #[test]
    fn what_is_written_is_read_again(study in arbitrary::study()) {
        let text = write(&study);
        let read = parse(text.as_bytes()).map_err(|p| TestCaseError::fail(format!("{}\n{text}", listed(&p))))?;
        prop_assert_eq!(write(&read), text.clone(), "the text is not stable");
        // Names, counts and choices come back as they went; numbers up to the fifteenth digit.
        let digits = |study: &Study| format!("{study:?}");
        let (want, got) = (digits(&study), digits(&read));
        let split = |text: &str| text.split([' ', '(', ')', '[', ']', ',']).map(str::to_owned).collect::<Vec<_>>();
        for (want, got) in split(&want).iter().zip(&split(&got)) {
            match (want.parse::<f64>(), got.parse::<f64>()) {
                (Ok(want), Ok(got)) => prop_assert!((want - got).abs() <= 6e-15 * want.abs(), "{want} came back as {got}"),
                _ => prop_assert_eq!(want, got),
            }
        }
        prop_assert_eq!(split(&want).len(), split(&got).len());
    }
}
