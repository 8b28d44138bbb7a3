//! Text and JSON of tanks with plates.

use brimwright::analysis::Results;
use brimwright::cases::LoadCase;
use brimwright::geom::Point;
use brimwright::report::{Report, json, table};
use brimwright::section::{Opening, OpeningShape};
use brimwright::study::{Fill, Study};
use brimwright::units::UnitSystem;
use proptest::prelude::*;
use serde_json::Value;

use crate::json::adds_up;
use crate::support::plated::{self, Plated};
use crate::support::random::config;
use crate::support::shapes::rectangle;
use crate::support::{GRAVITY, WATER, held, judge, study};

fn json_of(study: &Study, results: &Results) -> Value {
    let text = json::text(&[json::Run::judged(&Report::new("check.ron", study, results))]);
    serde_json::from_str(&text).unwrap_or_else(|e| panic!("{e}: {text}"))
}

fn text_of(study: &Study, results: &Results) -> String {
    table::text(&Report::new("check.ron", study, results), UnitSystem::Si)
}

/// A tank 2 m by 2 m by 1 m, open above, with a sill 0.5 m high on the middle of its floor and 0.8 m3 in it, put
/// through an acceleration of one g to the right and released.
fn weir(opening: Option<Opening>) -> Study {
    let tank = Plated::tank(rectangle(2.0, 2.0)).with_mouth(2).with_plate(&[(1.0, 0.0), (1.0, 0.5)]);
    let mut section = tank.section();
    section.plates[0].name = "sill".into();
    section.plates[0].openings.extend(opening);
    let case = LoadCase { release: true, ..held(GRAVITY, 0.0) };
    Study { cases: vec![case], ..study(section, Fill::Volume(0.8)) }
}

#[test]
fn a_sill_that_traps_liquid_reads_as_worked_out() {
    // Own derivation, plane geometry. At rest 0.4 m deep. At a slope of -1 the right cell keeps the triangle below the
    // tip, 0.5^2 / 2 = 0.125 m3, and pours 0.275 m3 to the left, which then stands 0.175 m deep at the sill (0.675 m3 =
    // (0.175 + 1.175) / 2). Going back, the left cell pours what is over its tip and keeps 0.5 m3: 0.1 m3 more than before.
    // Loads on the sill by depth below the surface: left less right, 0.175 - 0.5 m up to where the left surface meets it.
    let study = weir(None);
    let results = judge(&study);
    let run = json_of(&study, &results);
    adds_up(&run);
    let case = &run["cases"][0];
    let weight = WATER * GRAVITY;
    for (pointer, want) in [
        ("/settled/n_pools", 2.0),
        ("/settled/pools/0/volume_m3", 0.675),
        ("/settled/pools/1/volume_m3", 0.125),
        ("/settled/cells_m3/0", 0.675),
        ("/settled/plates/0/net_n", weight * (0.175_f64.powi(2) - 0.5_f64.powi(2)) / 2.0),
        ("/settled/plates/0/peak_net_pa", weight * (0.175 - 0.5)),
        ("/settled/plates/0/highest_gage_pa", weight * 0.5),
        ("/settled/plates/0/stretches/0/to_m", 0.175),
        ("/settled/plates/0/stretches/0/to_net_pa", weight * (0.175 - 0.5)),
        ("/settled/plates/0/stretches/1/to_net_pa", 0.0),
        ("/pours/0/volume_m3", 0.275),
        ("/pours/0/s_m", 1.0),
        ("/pours/0/z_m", 0.5),
        ("/released/cells_m3/0", 0.5),
        ("/released/cells_m3/1", 0.3),
        ("/released/pools/0/level_m", 0.5),
        ("/released/plates/0/net_n", weight * (0.5_f64.powi(2) - 0.3_f64.powi(2)) / 2.0),
        ("/trapped/0/volume_m3", 0.1),
    ] {
        let got = case.pointer(pointer).and_then(Value::as_f64).unwrap_or_else(|| panic!("{pointer} of {case:#}"));
        assert!((got - want).abs() <= 1e-9 * want.abs().max(1.0), "{pointer}: want {want}, got {got}");
    }
    for (pointer, want) in [
        ("/pours/0/sill", "sill"),
        ("/trapped/0/cell", "cell 1"),
        ("/settled/pools/0/cells/0", "cell 1"),
        ("/settled/pools/1/cells/0", "cell 2"),
    ] {
        assert_eq!(case.pointer(pointer).and_then(Value::as_str), Some(want), "{pointer} of {case:#}");
    }
    assert_eq!((&case["pours"][0]["to_right"], &case["sealed"]), (&Value::Bool(false), &Value::Null));
    let text = text_of(&study, &results);
    for want in [
        "   poured    0.275 m³ to the left over sill at s 1\u{2009}000 mm, z 500.0 mm\n",
        "   trapped   after the release 0.100 m³ more in cell 1 than before\n",
    ] {
        assert!(text.contains(want), "want\n{want}in\n{text}");
    }
    has_row(&text, "state still settled released");
    has_row(&text, "cell 1 0.4000 m³ 0.6750 m³ 0.5000 m³");
    has_row(&text, "sill settled −1.08 kN z 181.8 mm −3.19 kPa at z 0.000 mm");
}

#[test]
fn both_bounds_stand_beside_one_another_and_the_worse_is_named() {
    // The sill of the tank above carried up to 1.5 m, with a gap at its foot: sealed, each side keeps its 0.4 m3 and its
    // own slope of 1, 0.4 m deep in its middle; settled, all 0.8 m3 are one triangle 1.265 m deep at the left.
    let gap = Opening { name: "gap".into(), from_m: 0.0, to_m: 0.1, shape: OpeningShape::Share(0.5) };
    let mut study = weir(Some(gap));
    study.section.plates[0].points[1] = Point::new(1.0, 1.5);
    let results = judge(&study);
    let run = json_of(&study, &results);
    adds_up(&run);
    let case = &run["cases"][0];
    for (pointer, want) in [
        ("/settled/cells_m3/0", 0.8 - (1.6_f64.sqrt() - 1.0).powi(2) / 2.0),
        ("/sealed/cells_m3/0", 0.4),
        ("/sealed/cells_m3/1", 0.4),
        ("/sealed/pools/0/volume_m3", 0.4),
    ] {
        let got = case.pointer(pointer).and_then(Value::as_f64).unwrap_or_else(|| panic!("{pointer} of {case:#}"));
        assert!((got - want).abs() <= 1e-9, "{pointer}: want {want}, got {got}");
    }
    let freeboard = case["verdicts"].as_array().expect("verdicts").iter().find(|v| v["criterion"] == "Freeboard");
    assert_eq!(freeboard.map(|v| &v["bound"]), Some(&Value::from("settled")), "{case:#}");
    let text = text_of(&study, &results);
    assert!(text.contains(" · settled bound"), "{text}");
    has_row(&text, "state still settled sealed released");
    has_row(&text, "cell 2 0.4000 m³ 0.03509 m³ 0.4000 m³ 0.4000 m³");
}

/// Whether a text has a line of these words, however far apart.
fn has_row(text: &str, row: &str) {
    let words = |line: &str| line.split_whitespace().collect::<Vec<_>>().join(" ");
    assert!(text.lines().any(|line| words(line) == row), "no line {row} in\n{text}");
}

#[test]
fn a_plate_within_one_pool_carries_nothing() {
    // Both sides of it are pressed alike, wherever its openings lie. Settled, on a slope, with liquid over its tip.
    for i in 0..24 {
        let (from_m, to_m) = (0.017 * f64::from(i), 0.017 * f64::from(i) + 0.071);
        let gap = Opening { name: "gap".into(), from_m, to_m, shape: OpeningShape::Share(0.5) };
        let mut study = weir(Some(gap));
        (study.fill, study.cases) = (Fill::Volume(2.4), vec![held(0.3 * GRAVITY, 0.0)]);
        let plate = json_of(&study, &judge(&study))["cases"][0]["settled"]["plates"][0].clone();
        assert_eq!(plate["net_n"], 0.0, "gap from {from_m} to {to_m} m: {plate:#}");
        for key in ["acts_at_s_m", "acts_at_z_m", "peak_net_pa", "peak_s_m", "peak_z_m"] {
            assert_eq!(plate[key], Value::Null, "gap from {from_m} to {to_m} m, {key}: {plate:#}");
        }
        assert!(plate["highest_gage_pa"].as_f64().is_some_and(|pa| pa > 0.6 * WATER * GRAVITY), "{plate:#}");
    }
}

#[test]
fn a_tank_without_plates_has_neither_cells_nor_bounds_in_its_text() {
    let study = study(Plated::tank(rectangle(2.0, 2.0)).with_mouth(2).section(), Fill::Volume(0.8));
    let text = text_of(&study, &judge(&study));
    for word in ["cell", "plate", "sealed", "bound", "pools", "released"] {
        assert!(!text.contains(word), "{word} in\n{text}");
    }
}

proptest! {
    #![proptest_config(config(16, 0x7e57))]

    #[test]
    fn whatever_the_plates_text_keeps_its_width_and_numbers_add_up(
        plated in plated::plated(), pull in plated::pull(), share in 0.05..0.9, gap in any::<bool>(),
    ) {
        let mut section = plated.section();
        for plate in section.plates.iter_mut().filter(|_| gap) {
            let half = 0.5 * plate.length_m();
            let shape = OpeningShape::Share(0.5);
            plate.openings.push(Opening { name: String::new(), from_m: 0.0, to_m: half, shape });
        }
        let case = LoadCase { release: true, ..held(-pull.x * GRAVITY, -(1.0 + pull.y) * GRAVITY) };
        let study = Study { cases: vec![case], ..study(section, Fill::Share(share)) };
        let Ok(valid) = study.validate() else { return Ok(()) };
        let results = brimwright::analysis::run(&valid);
        adds_up(&json_of(&study, &results));
        let text = text_of(&study, &results);
        for line in text.lines() {
            let n = line.chars().count();
            prop_assert!(n <= 80 && !line.ends_with(' ') && !line.contains("NaN"), "{n} columns: {line}\n{text}");
        }
    }
}
