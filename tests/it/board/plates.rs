//! Plates: drawn with the pen, moved, bent, opened and taken out by hand.

use brimwright::gui::Pen;
use brimwright::section::{Opening, OpeningShape, Panel, Plate};

use super::*;

/// The wash tank with these plates.
fn plated(plates: &[&[(f64, f64)]]) -> Study {
    let mut study = study();
    study.section.plates = plates.iter().map(|points| plate(points)).collect();
    study
}

fn plate(points: &[(f64, f64)]) -> Plate {
    Plate {
        name: String::new(),
        points: points.iter().map(|&(s, z)| Point::new(s, z)).collect(),
        thickness_m: 0.006,
        corrosion_m: 0.0,
        material: String::new(),
        panel: Panel::default(),
        openings: vec![],
    }
}

/// A baffle of 0.6 m on the floor with an opening from 0.2 m to 0.4 m.
fn baffled() -> Study {
    let mut study = plated(&[&[(0.4, 0.0), (0.4, 0.6)]]);
    let shape = OpeningShape::Share(1.0);
    study.section.plates[0].openings = vec![Opening { name: "port".to_owned(), from_m: 0.2, to_m: 0.4, shape }];
    study
}

fn points(board: &Board, plate_idx: usize) -> Vec<(f64, f64)> {
    board.state().doc.study().section.plates[plate_idx].points.iter().map(|p| (p.x, p.y)).collect()
}

fn opening(board: &Board) -> (f64, f64) {
    let opening = &board.state().doc.study().section.plates[0].openings[0];
    (opening.from_m, opening.to_m)
}

fn check_near(got: (f64, f64), want: (f64, f64), what: &str) {
    let off = (got.0 - want.0).abs().max((got.1 - want.1).abs());
    assert!(off < 1e-9, "{what}: got {got:?}, expected {want:?}, within 1e-9 m");
}

fn menu(board: &mut Board, pos: Pos2, words: &str) {
    click(board, pos, PointerButton::Secondary, Modifiers::NONE);
    board.run_steps(3);
    board.get_by_label(words).click();
    board.run_steps(3);
}

#[test]
fn the_pen_draws_from_wall_to_wall_in_one_step() {
    let mut board = open(study());
    let before = board.state().doc.study().clone();
    board.state_mut().view.pen = Some(Pen::default());
    board.run_steps(2);
    // From the duct's top, drawn downward onto it from the rim: the foot comes first all the same.
    let (from, to) = (at(&board, -0.3, 1.0) + vec2(2.0, 3.0), at(&board, -0.3, 0.3) + vec2(-2.0, -3.0));
    press(&mut board, from, to);
    assert_eq!(*board.state().doc.study(), before, "nothing is drawn before the button is let go");
    let status = board.state().view.status.clone();
    assert!(status.contains("on duct") && status.contains("700.0 mm long"), "{status}");
    board.drop_at(to);
    board.run_steps(2);
    assert_eq!(points(&board, 0), [(-0.3, 0.3), (-0.3, 1.0)]);
    let view = &board.state().view;
    assert_eq!((view.pen, view.selected), (None, Some(Selected::Plate(0))), "the pen is put away");
    assert_eq!(board.state().doc.undo_label(), Some("Add plate"));
    board.state_mut().doc.undo();
    assert_eq!(*board.state().doc.study(), before);
}

#[test]
fn two_clicks_draw_too_and_an_end_may_stay_free() {
    let mut board = open(study());
    let pos = at(&board, 0.5, 0.0);
    menu(&mut board, pos, "Draw a plate from here");
    assert_eq!(board.state().view.pen, Some(Pen { from: Some(Point::new(0.5, 0.0)) }));
    let pos = at(&board, 0.5, 0.8) + vec2(3.0, 2.0);
    board.hover_at(pos);
    board.run_steps(2);
    let status = board.state().view.status.clone();
    assert!(status.contains("plumb with its beginning"), "{status}");
    click(&mut board, pos, PointerButton::Primary, Modifiers::NONE);
    board.run_steps(2);
    assert_eq!(points(&board, 0), [(0.5, 0.0), (0.5, 0.8)]);
}

#[test]
fn escape_puts_the_pen_away() {
    let mut board = open(study());
    let before = board.state().doc.study().clone();
    board.state_mut().view.pen = Some(Pen::default());
    board.run_steps(2);
    let (from, to) = (at(&board, 0.5, 0.0), at(&board, 0.5, 0.8));
    press(&mut board, from, to);
    board.key_press(Key::Escape);
    board.run_steps(2);
    board.drop_at(to);
    board.run_steps(2);
    assert_eq!(board.state().view.pen, None);
    assert_eq!(*board.state().doc.study(), before);
}

#[test]
fn an_upright_plate_is_added_where_the_menu_was_called() {
    let mut board = open(study());
    let pos = at(&board, 0.3, 0.7) + vec2(1.0, 1.0);
    menu(&mut board, pos, "Add upright plate here");
    assert_eq!(points(&board, 0), [(0.3, 0.0), (0.3, 1.0)]);
}

#[test]
fn a_plate_that_is_dragged_stays_on_its_wall() {
    let mut board = open(plated(&[&[(0.4, 0.0), (0.4, 0.6)]]));
    let before = board.state().doc.study().clone();
    let (from, to) = (at(&board, 0.4, 0.3), at(&board, 0.7, 0.45) + vec2(1.0, 0.0));
    drag(&mut board, from, to);
    assert_eq!(points(&board, 0), [(0.7, 0.0), (0.7, 0.6)]);
    assert_eq!(board.state().doc.undo_label(), Some("Move plate 1"));
    board.state_mut().doc.undo();
    assert_eq!(*board.state().doc.study(), before, "one undo takes the whole drag back");
}

#[test]
fn a_plate_takes_along_what_stands_on_it() {
    let mut board = open(plated(&[&[(0.4, 0.0), (0.4, 1.0)], &[(0.4, 0.5), (1.0, 0.5)]]));
    let (from, to) = (at(&board, 0.4, 0.8), at(&board, 0.6, 0.8));
    press(&mut board, from, to);
    assert_eq!(points(&board, 1), [(0.6, 0.5), (1.0, 0.5)]);
    board.hover_at(from);
    board.run_steps(2);
    board.drop_at(from);
    board.run_steps(2);
    assert_eq!(points(&board, 1), [(0.4, 0.5), (1.0, 0.5)], "back where it was");
    assert_eq!(board.state().doc.undo_label(), None, "and nothing is left to undo");
}

#[test]
fn ends_go_onto_walls_and_corners_anywhere() {
    let mut board = open(plated(&[&[(0.4, 0.0), (0.4, 0.6)]]));
    let top = center(board.get_by_label_contains("Top of plate 1"));
    let to = at(&board, 1.0, 0.7) + vec2(-5.0, 0.0);
    press(&mut board, top, to);
    let status = board.state().view.status.clone();
    assert!(status.contains("on right wall"), "{status}");
    board.drop_at(to);
    board.run_steps(2);
    assert_eq!(points(&board, 0), [(0.4, 0.0), (1.0, 0.7)]);
    assert_eq!(board.state().doc.undo_label(), Some("Move corner 2 of plate 1"));
}

#[test]
fn a_double_click_adds_a_corner_and_delete_takes_it_out() {
    let mut board = open(plated(&[&[(0.4, 0.0), (0.4, 0.6)]]));
    let pos = at(&board, 0.4, 0.3);
    for _ in 0..2 {
        click(&mut board, pos, PointerButton::Primary, Modifiers::NONE);
    }
    board.run_steps(2);
    assert_eq!(points(&board, 0), [(0.4, 0.0), (0.4, 0.3), (0.4, 0.6)]);
    board.get_by_label_contains("Corner 2 of plate 1").focus();
    board.run_steps(2);
    board.key_press_modifiers(Modifiers::SHIFT, Key::ArrowRight);
    board.run_steps(2);
    assert_eq!(points(&board, 0)[1], (0.41, 0.3));
    assert_eq!(board.state().doc.undo_label(), Some("Move corner 2 of plate 1"));
    board.key_press(Key::Delete);
    board.run_steps(2);
    assert_eq!(points(&board, 0), [(0.4, 0.0), (0.4, 0.6)]);
    board.get_by_label_contains("Plate 1, ").focus();
    board.run_steps(2);
    board.key_press(Key::Delete);
    board.run_steps(2);
    assert!(board.state().doc.study().section.plates.is_empty());
}

#[test]
fn openings_are_added_moved_stretched_and_stopped_by_the_plates_end() {
    let mut board = open(plated(&[&[(0.4, 0.0), (0.4, 0.6)]]));
    let pos = at(&board, 0.4, 0.3);
    menu(&mut board, pos, "Add an opening here");
    let (from_m, to_m) = opening(&board);
    assert!(from_m > 0.1 && to_m < 0.5 && to_m - from_m > 0.1, "from {from_m} m to {to_m} m");
    assert_eq!(board.state().view.selected, Some(Selected::Opening(0, 0)));

    let mut board = open(baffled());
    // The gap itself moves along the plate, however far to the side the pointer goes.
    let (from, to) = (at(&board, 0.4, 0.3), at(&board, 0.45, 0.4));
    drag(&mut board, from, to);
    check_near(opening(&board), (0.3, 0.5), "the whole opening");
    assert_eq!(board.state().doc.undo_label(), Some("Move opening 1 of plate 1"));
    let (from, to) = (at(&board, 0.4, 0.5), at(&board, 0.4, 0.9));
    press(&mut board, from, to);
    let status = board.state().view.status.clone();
    assert!(status.contains("at the end of the plate") && status.contains("300.0 mm open"), "{status}");
    board.drop_at(to);
    board.run_steps(2);
    check_near(opening(&board), (0.3, 0.6), "its upper end");
    let (from, to) = (at(&board, 0.4, 0.3), at(&board, 0.4, 0.1));
    drag(&mut board, from, to);
    check_near(opening(&board), (0.1, 0.6), "its lower end");
    assert_eq!(board.state().doc.undo_label(), Some("Change opening 1 of plate 1"));
    board.get_by_label_contains("Opening 1 of plate 1, port").focus();
    board.run_steps(2);
    board.key_press(Key::ArrowDown);
    board.run_steps(2);
    check_near(opening(&board), (0.099, 0.599), "one press of an arrow key");
    board.key_press(Key::Delete);
    board.run_steps(2);
    assert!(board.state().doc.study().section.plates[0].openings.is_empty());
}

#[test]
fn a_vent_at_the_top_stays_there_when_the_plate_grows() {
    let mut study = baffled();
    (study.section.plates[0].openings[0].from_m, study.section.plates[0].openings[0].to_m) = (0.5, 0.6);
    let mut board = open(study);
    let top = center(board.get_by_label_contains("Top of plate 1"));
    let to = at(&board, 0.4, 0.8);
    drag(&mut board, top, to);
    assert_eq!(points(&board, 0), [(0.4, 0.0), (0.4, 0.8)]);
    check_near(opening(&board), (0.7, 0.8), "the vent");
}

#[test]
fn plates_and_openings_are_spoken_and_named_in_the_status_line() {
    let mut board = open(baffled());
    for name in [
        "Plate 1, 600.0 mm, 6.000 mm thick",
        "Foot of plate 1, s 0.400 m, z 0.000 m",
        "Top of plate 1, s 0.400 m, z 0.600 m",
        "Opening 1 of plate 1, port, from 200.0 mm to 400.0 mm",
        "Beginning of opening 1 of plate 1, port, at 200.0 mm",
        "End of opening 1 of plate 1, port, at 400.0 mm",
    ] {
        board.get_by_label(name);
    }
    for (z, want) in [(0.1, "on Plate 1"), (0.3, "on Opening 1 of plate 1"), (0.6, "on top of plate 1")] {
        let pos = at(&board, 0.4, z);
        board.hover_at(pos);
        board.run_steps(2);
        let status = board.state().view.status.clone();
        assert!(status.contains(want), "at z {z}: {status:?}, expected {want:?}");
    }
}

#[test]
fn plates_are_duplicated_beside_themselves() {
    let mut board = open(baffled());
    let pos = at(&board, 0.4, 0.1);
    menu(&mut board, pos, "Duplicate");
    assert_eq!(points(&board, 1), [(0.5, 0.0), (0.5, 0.6)]);
    assert_eq!(board.state().doc.study().section.plates[1].openings.len(), 1);
    assert_eq!(board.state().view.selected, Some(Selected::Plate(1)));
}

#[test]
fn the_sump_and_compartments_are_put_where_the_menu_was_called_and_dragged() {
    let mut board = open(study());
    let pos = at(&board, 0.6, 0.6) + vec2(1.0, 0.0);
    menu(&mut board, pos, "Put the sump here");
    assert_eq!(board.state().doc.study().sump, Some(Point::new(0.6, 0.6)));
    let (from, to) = (center(board.get_by_label_contains("Sump, ")), at(&board, 0.8, 0.0));
    drag(&mut board, from, to);
    assert_eq!(board.state().doc.study().sump, Some(Point::new(0.8, 0.0)));
    assert_eq!(board.state().doc.undo_label(), Some("Move the sump"));
    let pos = at(&board, 0.2, 0.8);
    menu(&mut board, pos, "Add compartment here");
    assert_eq!(board.state().view.selected, Some(Selected::Compartment(0)));
    let (from, to) = (center(board.get_by_label_contains("Compartment 1, ")), at(&board, 0.3, 0.7));
    drag(&mut board, from, to);
    assert_eq!(board.state().doc.study().compartments[0].at, Point::new(0.3, 0.7));
}

#[test]
fn plates_are_spaced_equally_in_one_step() {
    let mut board = open(plated(&[&[(0.4, 0.0), (0.4, 0.6)], &[(0.7, 0.0), (0.7, 0.9)]]));
    let before = board.state().doc.study().clone();
    let pos = at(&board, 0.4, 0.3);
    menu(&mut board, pos, "Space the plates equally");
    // Bays of 2/3 m in a tank of 2 m.
    for (plate_idx, s, top) in [(0, -1.0 / 3.0, 0.6), (1, 1.0 / 3.0, 0.9)] {
        for (got, want) in points(&board, plate_idx).into_iter().zip([(s, 0.0), (s, top)]) {
            check_near(got, want, "a corner");
        }
    }
    board.state_mut().doc.undo();
    assert_eq!(*board.state().doc.study(), before);
}
