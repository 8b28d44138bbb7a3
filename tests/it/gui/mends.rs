//! Problems with one obvious mend: a button beside the hint, one step of the history.

use brimwright::app::Edit;
use brimwright::geom::Point;
use brimwright::section::{Opening, OpeningShape, Plate};

use super::*;

/// The plain box with one plate from floor to rim, and what was wrong put into it.
fn with_plate(change: impl Fn(&mut Plate)) -> Driven {
    let mut harness = window_of_size(1280.0, 1400.0);
    run(&mut harness, Command::New);
    harness.get_by_label("Add a plate").click();
    harness.run();
    let mut plate = plates(&harness)[0].clone();
    plate.name = "Bulkhead".to_owned();
    change(&mut plate);
    let mut study = doc(&harness).study().clone();
    study.section.plates = vec![plate];
    let dir = tempfile::tempdir().unwrap();
    let path = dir.path().join("faulty.ron");
    std::fs::write(&path, brimwright::scenario::write(&study)).unwrap();
    harness.state_mut().as_mut().unwrap().open(&path);
    harness.run();
    assert_eq!(doc(&harness).path.as_deref(), Some(path.as_path()), "opened");
    harness
}

fn plates(harness: &Driven) -> &[Plate] {
    &doc(harness).study().section.plates
}

/// Presses the button; what it gives is judged, and one undo takes it back.
fn mend(harness: &mut Driven, words: &str) -> Vec<Plate> {
    let before = doc(harness).study().clone();
    harness.get_by_label(words).click();
    harness.run();
    let mended = plates(harness).to_vec();
    assert!(matches!(doc(harness).derived(), Derived::Judged { .. }), "{words}: judged again");
    assert!(doc(harness).problems().iter().all(|p| !p.place.to_string().contains("plate")), "{words}: gone");
    assert!(harness.query_by_label(words).is_none(), "{words}: the button goes with the problem");
    run(harness, Command::Undo);
    assert_eq!(*doc(harness).study(), before, "{words}: one step");
    mended
}

#[test]
fn a_plate_through_a_wall_ends_on_it() {
    // The box is 2 m by 1 m about s = 0, open at z = 1.
    let mut harness = with_plate(|plate| plate.points = vec![Point::new(0.2, -0.3), Point::new(0.2, 0.6)]);
    let mended = mend(&mut harness, "End Bulkhead on the wall");
    assert_eq!(mended[0].points, [Point::new(0.2, 0.0), Point::new(0.2, 0.6)], "the free end stays");
    let mut harness = with_plate(|plate| plate.points = vec![Point::new(-3.0, 0.5), Point::new(4.0, 0.5)]);
    let mended = mend(&mut harness, "End Bulkhead on the wall");
    assert_eq!(mended[0].points, [Point::new(-1.0, 0.5), Point::new(1.0, 0.5)]);
}

#[test]
fn a_plate_outside_the_tank_or_without_length_is_removed() {
    for points in [[(2.0, 0.1), (2.0, 0.9)], [(0.3, 0.4), (0.3, 0.4)]] {
        let mut harness = with_plate(|plate| plate.points = points.map(|(s, z)| Point::new(s, z)).to_vec());
        assert_eq!(mend(&mut harness, "Remove Bulkhead"), [], "{points:?}");
    }
}

#[test]
fn an_opening_off_its_plate_is_cut_or_removed() {
    let opening = |from_m, to_m| Opening { name: String::new(), from_m, to_m, shape: OpeningShape::Share(0.5) };
    for (from_m, to_m, words, want) in [
        (0.8, 1.4, "Cut opening 1 to the plate", vec![opening(0.8, 1.0)]),
        (0.5, 0.2, "Cut opening 1 to the plate", vec![opening(0.2, 0.5)]),
        (1.3, 1.5, "Remove opening 1", vec![]),
    ] {
        let mut harness = with_plate(|plate| plate.openings = vec![opening(from_m, to_m)]);
        assert_eq!(mend(&mut harness, words)[0].openings, want, "{from_m} to {to_m}");
    }
}

#[test]
fn an_unknown_material_is_replaced_from_the_table() {
    let mut harness = with_plate(|plate| plate.material = "unobtainium".to_owned());
    let mended = mend(&mut harness, "Make Bulkhead of structural steel S235");
    assert_eq!(mended[0].material, "structural steel S235");
}

#[test]
fn what_takes_thought_has_no_button() {
    let harness = with_plate(|plate| plate.thickness_m = -0.004);
    assert!(matches!(doc(&harness).derived(), Derived::Faulty { .. }));
    assert_eq!(doc(&harness).mends(), [None]);
}

/// A mend that would only put another fault in its place is not offered.
#[test]
fn a_mend_that_leaves_a_fault_is_not_offered() {
    let harness = with_plate(|plate| {
        plate.points = vec![Point::new(0.2, -0.3), Point::new(0.2, 0.6)];
        plate.thickness_m = 0.0;
    });
    assert!(doc(&harness).mends().iter().all(Option::is_none), "{:?}", doc(&harness).mends());
    let mut mended = doc(&harness).study().clone();
    brimwright::app::apply(&mut mended, &Edit::RemovePlate(0));
    assert!(mended.validate().is_ok(), "removing it would help, but is not obvious");
}
