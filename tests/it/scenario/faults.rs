//! What is wrong is named, with its place and what to do.

use brimwright::problem::Place;
use brimwright::scenario::parse;

use super::{GOOD, check_fault, listed};

#[test]
fn a_wrong_unit_is_named_with_the_right_key() {
    check_fault(
        "density_kg_per_m3: 870",
        "density_g_per_cm3: 0.87",
        "density_g",
        "`density_g_per_cm3` is not a key",
        "use `density_kg_per_m3`",
    );
    check_fault("fill: ullage_mm(300)", "fill: level_m(0.3)", "level_m(", "not one of the choices", "use `level_mm`");
    check_fault("ullage_gage_kpa", "ullage_gage_bar", "ullage_gage_bar", "is not a key", "use `ullage_gage_kpa`");
    check_fault("wall_pressure_gage_kpa", "wall_pressure_bar", "wall_pressure_bar", "", "`wall_pressure_gage_kpa`");
    check_fault("components_g(s: 0.25", "components_g(s_g: 0.25", "s_g:", "`s_g` is not a key here", "use `s`");
    check_fault("sweep_deg: 90", "sweep_rad: 1.5", "sweep_rad", "is not a key", "use `sweep_deg`");
    check_fault("thickness_mm: 4", "thickness: 4", "thickness:", "is not a key", "use `thickness_mm`");
    check_fault("from_mm: 0", "from_m: 0", "from_m:", "`from_m` is not a key", "use `from_mm`: the unit is part");
    check_fault("share_percent(25)", "share(0.25)", "share(0", "not one of the choices", "use `share_percent`");
    check_fault("hole_diameter_mm: 8", "hole_diameter_m: 8", "hole_diameter_m:", "", "use `hole_diameter_mm`");
    check_fault("pitch_mm: 12", "pitch_in: 0.5", "pitch_in", "", "use `pitch_mm`");
    check_fault("stiffener_spacing_mm", "stiffener_spacing", "stiffener_spacing:", "", "use `stiffener_spacing_mm`");
    check_fault("duration_s: 4", "duration_min: 1", "duration_min", "is not a key", "use `duration_s`");
    check_fault("sump: (s_mm", "sump: (s_m", "s_m: 20", "is not a key", "use `s_mm`");
    check_fault("plate_spacing_mm(", "plate_spacing_in(", "plate_spacing_in", "choices", "use `plate_spacing_mm`");
    check_fault("difference_mm: 100", "difference_kpa: 1", "difference_kpa", "", "use `difference_mm`");
    check_fault("accel: components_g", "accel: component_g", "component_g", "choices", "use `components_g`");
}

#[test]
fn an_unknown_key_lists_the_known_ones() {
    check_fault("onset_s: 1.5", "colour: 3", "colour", "`colour` is not a key", "known here: name, accel");
    check_fault("holes(n: 3)", "holes(diameter_mm: 3)", "diameter_mm: 3", "", "known here: n");
    check_fault("edges: clamped", "edges: welded", "welded", "choices", "known here: simply_supported, clamped");
    check_fault("shape: holes(n: 3)", "shape: slot", "slot", "choices", "known here: share_percent, holes");
    check_fault("(name: \"right\", s", "(name: \"right\", tight: true, s", "tight", "", "known here: name, s_mm");
    check_fault("corrosion_mm: 0.5", "colour: 1", "colour", "is not a key", "known here: name, points, thickness_mm");
    check_fault("author:", "autor:", "autor", "is not a key", "use `author`");
    let long = "k".repeat(100_000);
    check_fault("author:", &format!("{long}:"), &long, "kkk...", "known here");
}

#[test]
fn a_missing_key_is_named() {
    check_fault(
        "density_kg_per_m3: 870,",
        "",
        "),\n    fill",
        "`density_kg_per_m3` is missing",
        "add `density_kg_per_m3",
    );
    check_fault(
        "(s_mm: 0, z_mm: 0, name: \"floor\")",
        "(s_mm: 0)",
        "),\n        (s_mm: 1000",
        "`z_mm` is missing",
        "",
    );
    check_fault(", shape: holes(n: 3))", ")", "),\n                (from_mm: 100", "`shape` is missing", "add");
    check_fault("thickness_mm: 4,", "", "),\n        (points", "`thickness_mm` is missing", "add `thickness_mm");
    check_fault(", fill: level_mm(70)", "", "),\n    ],\n    width", "`fill` is missing", "add `fill");
    check_fault("author:", "title: \"again\", author:", "title: \"again\"", "`title` stands here a second time", "");
}

#[test]
fn numbers_that_are_not_finite_are_refused() {
    for bad in ["NaN", "inf", "-inf", "1e999", "-NaN", "inff64"] {
        for good in ["870", "thickness_mm: 4", "from_mm: 50", "pitch_mm: 12", "duration_s: 4", "share_percent(40"] {
            let key = good.trim_end_matches(|c: char| c.is_ascii_digit());
            check_fault(good, &format!("{key}{bad}"), bad, "not finite", "plain number");
        }
    }
}

#[test]
fn wrong_types_are_named() {
    check_fault("870", "\"870\"", "\"870\"", "a number is needed", "without unit");
    check_fault("870", "870 kg", "kg,\n", "comma", "");
    check_fault("\"Oil\"", "12", "12,\n", "a text is needed", "quotes");
    check_fault("confirmed: true", "confirmed: 1", "1),\n        (title: \"roof\"", "`true` or `false`", "");
    check_fault("points: [(name: \"sensor\", s_mm: 10, z_mm: 20)]", "points: 3", "3,\n    moment", "a list", "`[`");
    for bad in ["3.5", "-3", "5000000000", "NaN"] {
        check_fault("holes(n: 3)", &format!("holes(n: {bad})"), bad, "no count", "a whole number of zero or more");
    }
    check_fault("holes(n: 3)", "holes(n: three)", "three", "a number is needed", "");
    check_fault("staggered: true", "staggered: yes", "yes", "`true` or `false`", "without quotes");
    check_fault("release: true", "release: 1", "1, source", "`true` or `false`", "");
    check_fault("sump: (s_mm: 20, z_mm: 5)", "sump: 20", "20,\n    points", "an opening `(`", "");
    check_fault("accel: polar_g(", "accel: 5 (", "5 (", "a key", "");
    check_fault("density_kg_per_m3: 870", "density_kg_per_m3: 0,87", "87", "a key is needed", "point");
    check_fault("\"Oil\"", "\"O\\il\"", "l\"", "backslash", "`\\\\`");
}

#[test]
fn a_file_cut_short_is_refused_wherever_it_is_cut() {
    let end = GOOD.trim_end().len();
    for cut in (0..end).filter(|&i| GOOD.is_char_boundary(i)) {
        let problems = parse(&GOOD.as_bytes()[..cut]).expect_err(&GOOD[..cut]);
        let Place::Text { line, column } = problems[0].place else { panic!("{}", listed(&problems)) };
        let n_lines = GOOD[..cut].matches('\n').count() + 1;
        assert!(line <= n_lines && column >= 1, "cut at {cut}: {}", listed(&problems));
        assert!(
            !problems[0].message.is_empty() && !problems[0].hint.is_empty(),
            "cut at {cut}: {}",
            listed(&problems)
        );
    }
    let after_a_case = GOOD.find("        (name: \"two\"").unwrap();
    let problems = parse(&GOOD.as_bytes()[..after_a_case]).unwrap_err();
    assert!(problems[0].message.contains("ends too early"), "{}", listed(&problems));
}

#[test]
fn other_files_and_versions_are_told_apart() {
    check_fault("version: 1", "version: 2", "2,", "newer scenario version; this program reads version 1", "newer");
    check_fault("version: 1", "version: 99999999999999999999999", "99", "newer", "");
    check_fault("version: 1", "version: 0", "0,", "no scenario version 0", "version 1");
    check_fault("version: 1", "version: \"1\"", "\"1\"", "not a whole number", "");
    check_fault("version: 1,", "", "title:", "does not begin like a scenario", "");
    // A newer version is named even where its keys are not known here.
    check_fault("version: 1,", "version: 7, baffles: [],", "7,", "newer", "");
    for text in ["", "   ", "%PDF-1.7", "{\"version\": 1}", "/* never closed", "(version"] {
        let problems = parse(text.as_bytes()).expect_err(text);
        assert!(problems[0].message.contains("begin like a scenario"), "{text:?}: {}", listed(&problems));
    }
}

#[test]
fn bytes_that_are_not_text_are_placed() {
    let mut bytes = GOOD.as_bytes().to_vec();
    let at = GOOD.find("Oil").unwrap();
    bytes[at + 1] = 0xff;
    let problems = parse(&bytes).expect_err("not UTF-8");
    let line = 1 + GOOD[..at].matches('\n').count();
    assert_eq!(problems[0].place, Place::Text { line, column: 17 }, "{}", listed(&problems));
    assert!(problems[0].message.contains("0xff is not UTF-8"), "{}", listed(&problems));
}
