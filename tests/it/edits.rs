//! Edits: what each changes, what none may do, and what undo gives back.

use brimwright::app::{
    Derived, Document, Edit, apply, equally_spaced, plate_across, shifted_along_walls, with_length_kept_openings,
};
use brimwright::geom::{Edge, Point, Vec2};
use brimwright::section::{EdgeKind, OutlineEdge};
use brimwright::study::{Fill, Study};
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
        (Edit::MovePlatePoint(0, 1, Point::origin()), "Move corner 2 of plate 1"),
        (Edit::RemovePlate(3), "Remove plate 4"),
    ] {
        assert_eq!(edit.label(), want);
    }
}

#[test]
fn a_gesture_is_one_step_and_can_be_called_off() {
    let mut document = Document::new(study(), None);
    document.edit(&Edit::Title("first".into()));
    document.begin_gesture("Drag the fill");
    for level in [0.31, 0.32, 0.33] {
        document.edit(&Edit::Fill(Fill::Level(level)));
    }
    document.end_gesture();
    assert_eq!(document.undo_label(), Some("Drag the fill"));
    document.undo();
    assert_eq!((document.study().fill, document.redo_label()), (Fill::Level(0.3), Some("Drag the fill")));
    document.redo();
    assert_eq!(document.study().fill, Fill::Level(0.33));

    document.begin_gesture("Drag the fill");
    document.edit(&Edit::Fill(Fill::Level(0.5)));
    document.cancel_gesture();
    assert_eq!((document.study().fill, document.undo_label()), (Fill::Level(0.33), Some("Drag the fill")));
    document.undo();
    document.undo();
    document.undo();
    assert_eq!(*document.study(), study());
    assert_eq!((document.undo_label(), document.redo_label()), (None, Some("Set title")));
}

#[test]
fn only_a_changed_study_is_unsaved() {
    let mut document = Document::new(study(), None);
    let revision = document.revision();
    document.edit(&Edit::Title("t".into()));
    assert_eq!((document.is_unsaved(), document.undo_label(), document.revision()), (false, None, revision));
    document.edit(&Edit::Title("new".into()));
    assert!(document.is_unsaved() && document.revision() > revision);
    document.mark_saved("tank.ron".into());
    assert!(!document.is_unsaved());
    document.undo();
    assert!(document.is_unsaved(), "the file holds what was undone");
    document.redo();
    assert!(!document.is_unsaved());
}

#[test]
fn a_faulty_study_keeps_the_last_results_as_stale() {
    let mut document = Document::new(study(), None);
    let Derived::Judged { results: good, .. } = document.derived().clone() else { panic!("the study is good") };
    for level in [-5.0, -6.0] {
        document.edit(&Edit::Fill(Fill::Level(level)));
        let Derived::Faulty { problems, stale: Some((_, stale)) } = document.derived() else {
            panic!("a level of {level} m is faulty, and earlier results exist")
        };
        assert!(!problems.is_empty());
        assert_eq!(**stale, *good);
    }
    document.undo();
    document.undo();
    assert!(matches!(document.derived(), Derived::Judged { results, .. } if **results == *good));
}

#[test]
fn the_oldest_steps_are_forgotten() {
    let mut document = Document::new(Study { cases: vec![], ..study() }, None);
    for i in 0..510 {
        document.edit(&Edit::Title(i.to_string()));
    }
    let mut n_undone = 0;
    while document.undo_label().is_some() {
        document.undo();
        n_undone += 1;
    }
    assert_eq!((n_undone, document.study().title.as_str()), (500, "9"));
}

/// What a user may do with a document.
#[derive(Clone, Debug)]
enum Act {
    Edit(Edit),
    Undo,
    Redo,
    Begin,
    End,
    Cancel,
}

fn act() -> impl Strategy<Value = Act> {
    prop_oneof![
        6 => arbitrary::edit().prop_map(Act::Edit),
        3 => Just(Act::Undo),
        2 => Just(Act::Redo),
        1 => Just(Act::Begin),
        1 => Just(Act::End),
        1 => Just(Act::Cancel),
    ]
}

/// A document as plainly as it can be written: all states, and which one is shown.
struct Plain {
    states: Vec<Study>,
    shown: usize,
    gesture: Option<Study>,
}

impl Plain {
    fn study(&self) -> &Study {
        self.gesture.as_ref().unwrap_or(&self.states[self.shown])
    }

    fn push(&mut self, study: Study) {
        if study != self.states[self.shown] {
            self.states.truncate(self.shown + 1);
            self.states.push(study);
            self.shown += 1;
        }
    }

    fn act(&mut self, act: &Act) {
        let gesture = if matches!(act, Act::Edit(_)) { None } else { self.gesture.take() };
        match (act, gesture) {
            (Act::Edit(edit), _) => {
                let mut study = self.study().clone();
                apply(&mut study, edit);
                match &mut self.gesture {
                    Some(gesture) if study != *gesture => *gesture = study,
                    Some(_) => {}
                    None => self.push(study),
                }
            }
            (Act::Cancel, _) => {}
            (_, Some(study)) => self.push(study),
            (_, None) => {}
        }
        match act {
            Act::Undo => self.shown = self.shown.saturating_sub(1),
            Act::Redo => self.shown = (self.shown + 1).min(self.states.len() - 1),
            Act::Begin => self.gesture = Some(self.states[self.shown].clone()),
            _ => {}
        }
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
        let plates = &before.section.plates;
        let is_beyond = match edit {
            Edit::MoveVertex(i, _) | Edit::BendEdge(i, _) | Edit::EdgeKind(i, _) | Edit::EdgeName(i, _)
            | Edit::SplitEdge(i, _) | Edit::RemoveVertex(i) => i >= n,
            Edit::MoveObstacleVertex(i, v, _) => i >= m || v >= before.section.obstacles[i].vertices.len(),
            Edit::ShiftObstacle(i, ..) | Edit::RemoveObstacle(i) => i >= m,
            Edit::Plate(i, _) | Edit::ShiftPlate(i, ..) | Edit::RemovePlate(i) => i >= plates.len(),
            Edit::MovePlatePoint(i, c, _) => i >= plates.len() || c >= plates[i].points.len(),
            Edit::CaseAccel(i, _) | Edit::CaseAttitude(i, _) | Edit::Case(i, _) | Edit::RemoveCase(i) => i >= k,
            Edit::ReorderCase(i, j) => i >= k || j >= k,
            _ => false,
        };
        if is_beyond {
            prop_assert_eq!(study, before);
        }
    }
}

proptest! {
    #![proptest_config(arbitrary::config())]

    #[test]
    fn plates_are_proposed_for_any_section(
        mut study in arbitrary::study(), other in arbitrary::plate(), ds_m in -2.0..2.0_f64,
        ends in [-5.0..5.0, -5.0..5.0, -5.0..5.0, -5.0..5.0], shares in [0.0..=1.0_f64, 0.0..=1.0],
    ) {
        let [low, high] = [shares[0].min(shares[1]), shares[0].max(shares[1])];
        for plate in &mut study.section.plates {
            let length_m = plate.length_m();
            plate.openings.iter_mut().for_each(|o| (o.from_m, o.to_m) = (low * length_m, high * length_m));
        }
        let section = &study.section;
        let n = section.plates.len();
        let idxs: Vec<usize> = (0..n + 1).collect();
        let spaced = equally_spaced(section, &idxs);
        prop_assert_eq!(spaced.len(), n);
        let [from_s, from_z, to_s, to_z] = ends;
        let across = plate_across(section, Point::new(from_s, from_z), Point::new(to_s, to_z));
        prop_assert_eq!((across.points.len(), across.openings.len()), (2, 0));
        for (i, plate) in section.plates.iter().enumerate() {
            let shifted = shifted_along_walls(section, i, Vec2::new(ds_m, 0.0)).expect("the plate is there");
            for after in [&shifted, &spaced[i], &with_length_kept_openings(plate, other.clone())] {
                prop_assert_eq!(after.openings.len(), plate.openings.len());
                let length_m = after.length_m();
                for opening in &after.openings {
                    let is_on = opening.from_m >= 0.0 && opening.from_m <= opening.to_m && opening.to_m <= length_m;
                    prop_assert!(is_on, "{opening:?} of {plate:?} runs off {length_m} m of {after:?}");
                }
            }
        }
        prop_assert_eq!(shifted_along_walls(section, n, Vec2::new(ds_m, 0.0)), None);
    }

    #[test]
    fn a_full_plate_stays_full_wherever_it_is_moved(
        sag in -0.3..0.3_f64, bulge in -1.2..1.2, from_s in 0.1..3.9_f64, to_s in 0.1..3.9_f64,
    ) {
        // A box 4 m long with a bent floor (sagging by `sag` in the middle) and an arc for a roof.
        let mut study = study();
        let corners = [(0.0, 0.0), (2.0, -sag), (4.0, 0.0), (4.0, 2.0), (0.0, 2.0)];
        let outline = corners.map(|(s, z)| OutlineEdge { start: Point::new(s, z), ..study.section.outline[0].clone() });
        study.section.outline = outline.to_vec();
        study.section.outline[3].sweep_rad = bulge;
        let drawn = plate_across(&study.section, Point::new(from_s, 0.9), Point::new(from_s, 1.1));
        study.section.plates = vec![drawn];
        let moved = shifted_along_walls(&study.section, 0, Vec2::new(to_s - from_s, 0.0)).expect("the plate is there");
        let want = plate_across(&study.section, Point::new(to_s, 0.9), Point::new(to_s, 1.1));
        for (got, want) in moved.points.iter().zip(&want.points) {
            prop_assert!((got - want).norm() < 1e-12, "moved to {moved:?}, drawn there it is {want:?}");
        }
        // The floor by hand; the roof by the outline's own edge.
        let floor = -sag * (1.0 - (to_s - 2.0).abs() / 2.0);
        prop_assert!((moved.points[0].y - floor).abs() < 1e-12, "foot {}, floor {floor}", moved.points[0]);
        let off = study.section.edge(3).nearest(moved.points[1]).1;
        prop_assert!(off < 1e-12, "the head is {off} m from the roof: {moved:?}");
    }
}

proptest! {
    // Each edit judges the study again: fewer tries.
    #![proptest_config(ProptestConfig { cases: 64, ..arbitrary::config() })]

    #[test]
    fn undo_and_redo_give_back_every_bit(acts in proptest::collection::vec(act(), 1..24)) {
        let mut document = Document::new(study(), None);
        let mut plain = Plain { states: vec![study()], shown: 0, gesture: None };
        for (i, act) in acts.iter().enumerate() {
            match act {
                Act::Edit(edit) => document.edit(edit),
                Act::Undo => document.undo(),
                Act::Redo => document.redo(),
                Act::Begin => document.begin_gesture("gesture"),
                Act::End => document.end_gesture(),
                Act::Cancel => document.cancel_gesture(),
            }
            plain.act(act);
            // The text of a number tells all its bits, the sign of zero included.
            let (got, want) = (format!("{:?}", document.study()), format!("{:?}", plain.study()));
            prop_assert_eq!(got, want, "after act {} of {:?}", i, &acts);
            if plain.gesture.is_none() {
                prop_assert_eq!(document.undo_label().is_some(), plain.shown > 0, "undo after act {}", i);
                prop_assert_eq!(document.redo_label().is_some(), plain.shown + 1 < plain.states.len());
            }
        }
    }
}
