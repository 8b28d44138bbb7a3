//! Scenario files: what is written is read again, and what is wrong is named with its place.

use brimwright::cases::{Accel, AccelUnit, Attitude};
use brimwright::problem::{Place, Problem};
use brimwright::scenario::{self, parse, write};
use brimwright::section::{EdgeKind, WidthLaw};
use brimwright::study::{Fill, Limit, Study};
use proptest::prelude::*;

use crate::arbitrary;

/// One of everything, as a person may write it.
const GOOD: &str = r#"/* a /* nested */ comment */
(
    version: 1, // the first key
    title: "Test tank",
    author: "A. Tester",
    revision: "B",
    notes: "two\nlines, \"quoted\"",
    gravity_m_per_s2: 9.81,
    air_pressure_abs_kpa: 100,
    ullage_gage_kpa: 2.5,
    liquid: (
        name: "Oil",
        density_kg_per_m3: 870,
        vapour_pressure_abs_kpa: 0.5,
        surface_tension_n_per_m: 0.03,
    ),
    fill: ullage_mm(300),
    width: table([(z_mm: 0, width_mm: 100), (z_mm: 50.5, width_mm: 200)]),
    outline: [
        (s_mm: 0, z_mm: 0, name: "floor"),
        (s_mm: 1000, z_mm: 0, sweep_deg: 90),
        (z_mm: 500, s_mm: 1000, kind: mouth),
        (s_mm: 0, z_mm: 500, kind: wall),
    ],
    obstacles: [(name: "pipe", edges: [(s_mm: 100, z_mm: 100, sweep_deg: 180), (s_mm: 200, z_mm: 100, sweep_deg: 180)])],
    points: [(name: "sensor", s_mm: 10, z_mm: 20)],
    moment_about: (s_mm: 500, z_mm: -100),
    cases: [
        (name: "one", accel: components_g(s: 0.25, z: -0.1), attitude: grade_percent(4), onset_s: 1.5, source: "x", note: "y"),
        (name: "two", accel: components_m_per_s2(s: 1, z: 0), attitude: heel_deg(-3)),
        (name: "three", accel: polar_g(magnitude: 0.5, direction_deg: 30)),
        (name: "four", accel: polar_m_per_s2(magnitude: 2, direction_deg: 0), attitude: level),
    ],
    records: [
        (title: "wall", limit: wall_pressure_gage_kpa(30), clause: "1.2", edition: "2020", origin: "letter", confirmed: true),
        (title: "roof", limit: roof_pressure_gage_kpa(5)),
        (title: "freeboard", limit: freeboard_allowance_mm(50)),
        (title: "vapour", limit: vapour_margin_kpa(10)),
    ],
    verdict_notes: [(case: "one", criterion: "Contained", text: "seen")],
)
"#;

fn good() -> Study {
    parse(GOOD.as_bytes()).unwrap_or_else(|problems| panic!("{}", listed(&problems)))
}

fn listed(problems: &[Problem]) -> String {
    problems.iter().map(Problem::to_string).collect::<Vec<_>>().join("\n")
}

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
    assert_eq!((study.cases[0].onset_s, study.cases[1].onset_s), (Some(1.5), None));
    let limits: Vec<Limit> = study.records.iter().map(|r| r.limit).collect();
    assert_eq!(
        limits,
        [
            Limit::WallPressure(30e3),
            Limit::RoofPressure(5e3),
            Limit::FreeboardAllowance(0.05),
            Limit::VapourMargin(10e3)
        ]
    );
    assert_eq!((study.records[0].confirmed, study.records[1].confirmed), (true, false));
    assert_eq!(study.verdict_notes[0].text, "seen");
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
        "    notes: \"two\\nlines, \\\"quoted\\\"\",",
    ] {
        assert!(text.lines().any(|l| l == line), "no line {line:?} in\n{text}");
    }
    assert!(text.lines().all(|l| l.len() <= 118), "{text}");
}

/// `text` with one change gives one fault, at the place of `mark` in the changed text, with these words.
#[track_caller]
fn check_fault(from: &str, to: &str, mark: &str, message: &str, hint: &str) {
    assert!(GOOD.contains(from), "{from:?} is not in the good text");
    let text = GOOD.replacen(from, to, 1);
    let at = text.find(mark).unwrap_or_else(|| panic!("{mark:?} is not in the changed text"));
    let line = 1 + text[..at].matches('\n').count();
    let column = 1 + text[..at].chars().rev().take_while(|&c| c != '\n').count();
    let problems = parse(text.as_bytes()).expect_err("the text is faulty");
    let [problem] = &problems[..] else { panic!("one fault expected, got {}", listed(&problems)) };
    assert_eq!(problem.place, Place::Text { line, column }, "{from:?} to {to:?}: {problem}");
    assert!(problem.message.contains(message), "{from:?} to {to:?}: wanted {message:?}, got {problem}");
    assert!(problem.hint.contains(hint), "{from:?} to {to:?}: wanted hint {hint:?}, got {problem}");
}

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
    check_fault("accel: components_g", "accel: component_g", "component_g", "choices", "use `components_g`");
}

#[test]
fn an_unknown_key_lists_the_known_ones() {
    check_fault("onset_s: 1.5", "colour: 3", "colour", "`colour` is not a key", "known here: name, accel");
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
    check_fault("author:", "title: \"again\", author:", "title: \"again\"", "`title` stands here a second time", "");
}

#[test]
fn numbers_that_are_not_finite_are_refused() {
    for bad in ["NaN", "inf", "-inf", "1e999", "-NaN", "inff64"] {
        check_fault("870", bad, bad, "not finite", "plain number");
    }
}

#[test]
fn wrong_types_are_named() {
    check_fault("870", "\"870\"", "\"870\"", "a number is needed", "without unit");
    check_fault("870", "870 kg", "kg,\n", "comma", "");
    check_fault("\"Oil\"", "12", "12,\n", "a text is needed", "quotes");
    check_fault("confirmed: true", "confirmed: 1", "1),\n        (title: \"roof\"", "`true` or `false`", "");
    check_fault("points: [(name: \"sensor\", s_mm: 10, z_mm: 20)]", "points: 3", "3,\n    moment", "a list", "`[`");
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

#[test]
fn sizes_are_bounded() {
    let spaces = vec![b' '; scenario::MAX_FILE_BYTES + 1];
    assert!(parse(&spaces).unwrap_err()[0].message.contains("larger than 4 MiB"));

    let edges = |n: usize| GOOD.replacen("outline: [", &format!("outline: [{}", "(s_mm: 0, z_mm: 0),".repeat(n)), 1);
    let n_before = good().section.outline.len();
    assert!(parse(edges(scenario::MAX_OUTLINE_EDGES - n_before).as_bytes()).is_ok());
    let problems = parse(edges(scenario::MAX_OUTLINE_EDGES).as_bytes()).unwrap_err();
    assert!(problems[0].message.contains("more than 2000 items"), "{}", listed(&problems));

    let cases = "(name: \"c\", accel: components_g(s: 0, z: 0)),".repeat(scenario::MAX_CASES);
    let problems = parse(GOOD.replacen("cases: [", &format!("cases: [{cases}"), 1).as_bytes()).unwrap_err();
    assert!(problems[0].hint.contains("the limit here is 200"), "{}", listed(&problems));
}

#[test]
fn deep_nesting_ends_in_a_fault() {
    for (open, close) in [("(", ")"), ("[", "]"), ("Some(", ")"), ("/*", "*/"), ("table([", "])"), ("{", "}")] {
        for n in [20, 200, 50_000] {
            for key in ["title: ", "vapour_pressure_abs_kpa: ", "outline: ", "width: ", ""] {
                let nested = format!("{key}{}{}", open.repeat(n), close.repeat(n));
                for text in
                    [format!("(version: 1, {nested}"), GOOD.replacen("author: ", &format!("{nested}author: "), 1)]
                {
                    let is_comment = open == "/*";
                    assert!(parse(text.as_bytes()).is_err() || is_comment, "{open} {n} after {key:?}");
                }
            }
        }
    }
}

#[test]
fn the_readers_switches_stay_off() {
    for head in ["#![enable(unwrap_newtypes)]", "#![enable(implicit_some)]", "#![type = \"x\"]"] {
        let problems = parse(format!("{head}{GOOD}").as_bytes()).expect_err(head);
        assert!(problems[0].message.contains("begin like a scenario"), "{}", listed(&problems));
    }
}

/// Bytes thrown at the reader must give a study or faults with places, and never a panic.
fn survives(bytes: &[u8]) {
    if let Err(problems) = parse(bytes) {
        assert!(!problems.is_empty());
        for problem in &problems {
            assert!(matches!(problem.place, Place::Text { .. }) && !problem.message.is_empty(), "{problem}");
        }
    }
}

#[test]
fn every_byte_changed_or_taken_out_is_survived() {
    let good = GOOD.as_bytes();
    for at in 0..good.len() {
        let mut without = good.to_vec();
        without.remove(at);
        survives(&without);
        for byte in [0, b'(', b'"', b'9', b'\\', 0xff] {
            let mut changed = good.to_vec();
            changed[at] = byte;
            survives(&changed);
        }
    }
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

    #[test]
    fn any_bytes_are_survived(bytes in proptest::collection::vec(any::<u8>(), 0..200)) {
        survives(&bytes);
        let mut after_head = b"(version: 1,".to_vec();
        after_head.extend(bytes);
        survives(&after_head);
    }

    #[test]
    fn any_mutation_is_survived(
        changes in proptest::collection::vec((any::<prop::sample::Index>(), any::<prop::sample::Index>(), 0..60_usize), 1..6),
    ) {
        // Pieces of the text are copied over other pieces: brackets and keys in the wrong places.
        let mut bytes = GOOD.as_bytes().to_vec();
        for (from, to, n) in changes {
            let (from, to) = (from.index(bytes.len()), to.index(bytes.len()));
            let piece = bytes[from..(from + n).min(bytes.len())].to_vec();
            bytes.splice(to..(to + n / 2).min(bytes.len()), piece);
        }
        survives(&bytes);
    }
}
