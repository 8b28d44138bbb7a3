//! Scenario files: what is written is read again, and what is wrong is named with its place.

mod faults;
mod hostile;
mod reading;

use brimwright::problem::{Place, Problem};
use brimwright::scenario::parse;
use brimwright::study::Study;

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
    compartments: [
        (name: "left", s_mm: 50, z_mm: 60, liquid: (name: "Brine", density_kg_per_m3: 1200), fill: share_percent(40)),
        (name: "right", s_mm: 950, z_mm: 60, fill: level_mm(70)),
    ],
    width: table([(z_mm: 0, width_mm: 100), (z_mm: 50.5, width_mm: 200)]),
    outline: [
        (s_mm: 0, z_mm: 0, name: "floor"),
        (s_mm: 1000, z_mm: 0, sweep_deg: 90),
        (z_mm: 500, s_mm: 1000, kind: mouth),
        (s_mm: 0, z_mm: 500, kind: wall),
    ],
    obstacles: [(name: "pipe", edges: [(s_mm: 100, z_mm: 100, sweep_deg: 180), (s_mm: 200, z_mm: 100, sweep_deg: 180)])],
    plates: [
        (
            name: "sill",
            points: [(s_mm: 400, z_mm: 0), (s_mm: 400, z_mm: 250), (s_mm: 450, z_mm: 300)],
            thickness_mm: 4,
            corrosion_mm: 0.5,
            material: "steel",
            panel: (stiffener_spacing_mm: 350, edges: clamped),
            openings: [
                (name: "gap", from_mm: 0, to_mm: 20, shape: share_percent(25)),
                (from_mm: 50, to_mm: 80, shape: holes(n: 3)),
                (from_mm: 100, to_mm: 200, shape: perforated(hole_diameter_mm: 8, pitch_mm: 12, staggered: true)),
                (from_mm: 210, to_mm: 220, shape: perforated(hole_diameter_mm: 5, pitch_mm: 10)),
            ],
        ),
        (points: [(s_mm: 600, z_mm: 500), (s_mm: 600, z_mm: 200)], thickness_mm: 3, panel: (edges: simply_supported)),
    ],
    materials: [
        (name: "steel", yield_mpa: 190, modulus_gpa: 205.5, poisson: 0.3, density_kg_per_m3: 7850, factor: 1.6, source: "mill"),
    ],
    discharge_coefficient: 0.62,
    sump: (s_mm: 20, z_mm: 5),
    points: [(name: "sensor", s_mm: 10, z_mm: 20)],
    moment_about: (s_mm: 500, z_mm: -100),
    cases: [
        (name: "one", accel: components_g(s: 0.25, z: -0.1), attitude: grade_percent(4), onset_s: 1.5, duration_s: 4, release: true, source: "x", note: "y"),
        (name: "two", accel: components_m_per_s2(s: 1, z: 0), attitude: heel_deg(-3)),
        (name: "three", accel: polar_g(magnitude: 0.5, direction_deg: 30)),
        (name: "four", accel: polar_m_per_s2(magnitude: 2, direction_deg: 0), attitude: level),
    ],
    records: [
        (title: "wall", limit: wall_pressure_gage_kpa(30), clause: "1.2", edition: "2020", origin: "letter", confirmed: true),
        (title: "roof", limit: roof_pressure_gage_kpa(5)),
        (title: "freeboard", limit: freeboard_allowance_mm(50)),
        (title: "vapour", limit: vapour_margin_kpa(10)),
        (title: "cells", limit: cell_volume(at_most_m3: 7.5, or_filled_to_percent: 20, or_from_percent: 80)),
        (title: "coverage", limit: plate_coverage_percent(70)),
        (title: "spacing", limit: plate_spacing_mm(1168)),
        (title: "least open", limit: open_share_at_least_percent(5)),
        (title: "most open", limit: open_share_at_most_percent(30)),
        (title: "drain", limit: drain_path),
        (title: "vent", limit: vent_path),
        (title: "flow", limit: rated_flow(flow_m3_per_s: 0.05, difference_mm: 100)),
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
