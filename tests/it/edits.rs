//! Edits: what each changes, what none may do, and what undo gives back.

use brimwright::app::{Edit, apply};
use brimwright::geom::{Edge, Point};
use brimwright::section::EdgeKind;
use brimwright::study::Study;
use proptest::prelude::*;

use crate::arbitrary;

/// A box 2 m by 1 m whose right wall is a half circle outward, with a mouth on top.
fn study() -> Study {
    let text = r#"(version: 1, title: "t", liquid: (name: "w", density_kg_per_m3: 1000), fill: level_mm(300),
        width: constant(width_mm: 1000),
        outline: [
            (s_mm: 0, z_mm: 0, name: "floor"),
            (s_mm: 2000, z_mm: 0, sweep_deg: 180, name: "bow"),
            (s_mm: 2000, z_mm: 1000, kind: mouth, name: "rim"),
            (s_mm: 0, z_mm: 1000),
        ],
        cases: [
            (name: "a", accel: components_g(s: 0, z: 0)),
            (name: "b", accel: components_g(s: 0.1, z: 0)),
            (name: "c", accel: components_g(s: 0.2, z: 0)),
        ],
        verdict_notes: [(case: "a", criterion: "x", text: "on a"), (case: "b", criterion: "x", text: "on b")])"#;
    brimwright::scenario::parse(text.as_bytes()).expect("the text is good")
}

fn after(edit: Edit) -> Study {
    let mut study = study();
    apply(&mut study, &edit);
    study
}

#[test]
fn a_split_arc_stays_on_its_circle() {
    let study = after(Edit::SplitEdge(1, Point::new(2.9, 0.9)));
    assert_eq!(study.section.outline.len(), 5);
    for idx in [1, 2] {
        let edge = study.section.edge(idx);
        let center = edge.center().expect("an arc");
        assert!((edge.radius() - 0.5).abs() < 1e-15, "radius {} of half {idx}, expected 0.5", edge.radius());
        assert!((center - Point::new(2.0, 0.5)).norm() < 1e-15, "center {center}, expected (2, 0.5)");
    }
    let names: Vec<&str> = study.section.outline.iter().map(|e| e.name.as_str()).collect();
    assert_eq!(names, ["floor", "bow", "", "rim", ""]);
}

#[test]
fn a_split_far_from_the_edge_or_at_its_end_changes_nothing() {
    for at in [Point::new(-1.0, -1.0), Point::new(0.0, 0.0), Point::new(5.0, 0.0), Point::new(f64::NAN, 0.0)] {
        assert_eq!(after(Edit::SplitEdge(0, at)), study(), "split at {at}");
    }
}

#[test]
fn half_a_mouth_is_a_mouth() {
    let study = after(Edit::SplitEdge(2, Point::new(1.0, 1.2)));
    assert_eq!((study.section.outline[2].kind, study.section.outline[3].kind), (EdgeKind::Mouth, EdgeKind::Mouth));
    assert_eq!(study.section.outline[3].start, Point::new(1.0, 1.0));
}

#[test]
fn the_longer_neighbour_gives_kind_and_name() {
    // The left wall, 1 m, joins the rim, 2 m, when the vertex between them goes.
    let study = after(Edit::RemoveVertex(3));
    let joined = &study.section.outline[2];
    assert_eq!((joined.name.as_str(), joined.kind, joined.start), ("rim", EdgeKind::Mouth, Point::new(2.0, 1.0)));
    assert_eq!(study.section.outline.len(), 3);
    // The first vertex: the left wall, 1 m, joins the floor, 2 m; the chain goes on from its first edge.
    let study = after(Edit::RemoveVertex(0));
    let joined = study.section.outline.last().unwrap();
    assert_eq!((joined.name.as_str(), joined.kind, joined.start), ("floor", EdgeKind::Wall, Point::new(0.0, 1.0)));
}

#[test]
fn three_edges_stay_or_two_with_an_arc() {
    let mut study = study();
    for n_left in [3, 2, 2] {
        // Always the vertex after the arc's, so that the arc stays.
        let arc = study.section.outline.iter().position(|e| e.sweep_rad != 0.0).expect("the arc stays");
        let n = study.section.outline.len();
        apply(&mut study, &Edit::RemoveVertex((arc + 2) % n));
        assert_eq!(study.section.outline.len(), n_left, "{:?}", study.section.outline);
    }
    study.section.outline.iter_mut().for_each(|e| e.sweep_rad = 0.0);
    apply(&mut study, &Edit::SplitEdge(0, Point::new(1.0, 0.0)));
    let before = study.clone();
    apply(&mut study, &Edit::RemoveVertex(1));
    assert_eq!(study, before, "a triangle of straight edges keeps its three");
}

#[test]
fn notes_follow_their_case() {
    let mut renamed = study().cases[0].clone();
    renamed.name = "d".into();
    let notes =
        |study: &Study| study.verdict_notes.iter().map(|n| (n.case.clone(), n.text.clone())).collect::<Vec<_>>();
    let owned =
        |pairs: &[(&str, &str)]| pairs.iter().map(|(a, b)| (a.to_string(), b.to_string())).collect::<Vec<_>>();
    assert_eq!(notes(&after(Edit::Case(0, Box::new(renamed)))), owned(&[("d", "on a"), ("b", "on b")]));
    assert_eq!(notes(&after(Edit::RemoveCase(0))), owned(&[("b", "on b")]));
    let set = |text: &str| Edit::VerdictNote("a".into(), "x".into(), text.into());
    assert_eq!(notes(&after(set("new"))), owned(&[("a", "new"), ("b", "on b")]));
    assert_eq!(notes(&after(set(" "))), owned(&[("b", "on b")]));
    let more = Edit::VerdictNote("c".into(), "x".into(), "on c".into());
    assert_eq!(notes(&after(more)), owned(&[("a", "on a"), ("b", "on b"), ("c", "on c")]));
}

#[test]
fn cases_are_moved_not_swapped() {
    let names = |edit| after(edit).cases.iter().map(|c| c.name.clone()).collect::<String>();
    assert_eq!(names(Edit::ReorderCase(0, 2)), "bca");
    assert_eq!(names(Edit::ReorderCase(2, 0)), "cab");
    assert_eq!(names(Edit::ReorderCase(0, 3)), "abc");
}

#[test]
fn labels_count_from_one() {
    for (edit, want) in [
        (Edit::MoveVertex(2, Point::origin()), "Move vertex 3"),
        (Edit::Fill(study().fill), "Set fill"),
        (Edit::EdgeKind(0, EdgeKind::Mouth), "Make edge 1 a mouth"),
        (Edit::MoveObstacleVertex(0, 3, Point::origin()), "Move vertex 4 of obstacle 1"),
        (Edit::VerdictNote("a".into(), "x".into(), String::new()), "Remove note"),
    ] {
        assert_eq!(edit.label(), want);
    }
}

/// Whether the two edges are the same curve up to rounding at their size.
fn same_curve(a: Edge, b: Edge) -> bool {
    let size = 1.0 + a.start.coords.norm() + a.end.coords.norm();
    (a.start - b.start).norm() + (a.end - b.end).norm() <= 1e-14 * size && (a.sweep - b.sweep).abs() <= 1e-14
}

proptest! {
    #![proptest_config(arbitrary::config())]

    #[test]
    fn split_then_remove_gives_the_outline_back(
        before in arbitrary::study(), idx in 0..8_usize, s in -10.0..10.0, z in -10.0..10.0,
    ) {
        let mut study = before.clone();
        apply(&mut study, &Edit::SplitEdge(idx, Point::new(s, z)));
        if study != before {
            apply(&mut study, &Edit::RemoveVertex(idx + 1));
            if before.section.outline.len() < 3 && before.section.outline.iter().all(|e| e.sweep_rad == 0.0) {
                return Ok(()); // Not an area: the third edge stays.
            }
            prop_assert_eq!(study.section.outline.len(), before.section.outline.len());
            for (i, (got, want)) in study.section.outline.iter().zip(&before.section.outline).enumerate() {
                prop_assert_eq!((&got.name, got.kind), (&want.name, want.kind), "edge {}", i);
                let (got, want) = (study.section.edge(i), before.section.edge(i));
                prop_assert!(same_curve(got, want), "edge {i} came back as {got:?}, was {want:?}");
            }
        }
    }

    #[test]
    fn no_edit_panics_and_beyond_the_end_none_changes_anything(before in arbitrary::study(), edit in arbitrary::edit()) {
        let mut study = before.clone();
        apply(&mut study, &edit);
        prop_assert!(!edit.label().is_empty());
        let n = before.section.outline.len();
        let (m, k) = (before.section.obstacles.len(), before.cases.len());
        let is_beyond = match edit {
            Edit::MoveVertex(i, _) | Edit::BendEdge(i, _) | Edit::EdgeKind(i, _) | Edit::EdgeName(i, _)
            | Edit::SplitEdge(i, _) | Edit::RemoveVertex(i) => i >= n,
            Edit::MoveObstacleVertex(i, v, _) => i >= m || v >= before.section.obstacles[i].vertices.len(),
            Edit::ShiftObstacle(i, ..) | Edit::RemoveObstacle(i) => i >= m,
            Edit::CaseAccel(i, _) | Edit::CaseAttitude(i, _) | Edit::Case(i, _) | Edit::RemoveCase(i) => i >= k,
            Edit::ReorderCase(i, j) => i >= k || j >= k,
            _ => false,
        };
        if is_beyond {
            prop_assert_eq!(study, before);
        }
    }
}
