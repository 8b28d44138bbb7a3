//! Drags and double clicks.

use super::*;

#[test]
fn dragging_a_vertex_puts_it_on_the_grid_in_one_step() {
    let mut board = open(study());
    let before = board.state().doc.study().clone();
    let (from, to) = (center(vertex(&board, 3)), at(&board, 0.8, 0.9) + vec2(1.5, -1.5));
    drag(&mut board, from, to);
    assert_eq!(start_of(&board, 2), Point::new(0.8, 0.9));
    assert_eq!(board.state().doc.undo_label(), Some("Move vertex 3"));
    board.state_mut().doc.undo();
    assert_eq!(*board.state().doc.study(), before, "one undo takes the whole drag back");
    assert_eq!(board.state().doc.undo_label(), None);
}

#[test]
fn with_ctrl_a_vertex_goes_exactly_where_the_pointer_is() {
    let mut board = open(study());
    let from = center(vertex(&board, 3));
    // Off the grid, and level with no other vertex.
    let (s, z) = (0.733_1, 0.861_7);
    let to = at(&board, s, z);
    board.key_down_modifiers(Modifiers::CTRL, Key::A);
    board.event(Event::ModifiersChanged(Modifiers::CTRL));
    drag(&mut board, from, to);
    let got = start_of(&board, 2);
    // A tenth of a point: what the transform to the screen and back may lose.
    let tolerance = 0.1 / f64::from(scale(&board));
    assert!((got - Point::new(s, z)).norm() < tolerance, "got {got}, expected ({s}, {z}), within {tolerance}");
}

#[test]
fn a_vertex_aligns_with_another_and_the_status_says_so() {
    let mut board = open(study());
    let (from, to) = (center(vertex(&board, 3)), at(&board, -0.4, 1.0) + vec2(3.0, -2.0));
    press(&mut board, from, to);
    assert_eq!(start_of(&board, 2), Point::new(-0.4, 1.0));
    let status = board.state().view.status.clone();
    assert!(status.contains("plumb with obstacle 1") && status.contains("level with vertex 4"), "{status}");
}

#[test]
fn escape_calls_a_drag_off() {
    let mut board = open(study());
    let before = board.state().doc.study().clone();
    let (from, to) = (center(vertex(&board, 3)), at(&board, 0.5, 0.7));
    press(&mut board, from, to);
    assert_ne!(*board.state().doc.study(), before, "the drag shows at once");
    board.key_press(Key::Escape);
    board.run_steps(2);
    assert_eq!(*board.state().doc.study(), before);
    board.hover_at(at(&board, 0.2, 0.2));
    board.step();
    board.drop_at(to);
    board.run_steps(2);
    assert_eq!(*board.state().doc.study(), before, "the rest of the movement changes nothing");
    assert_eq!(board.state().doc.undo_label(), None);
}

#[test]
fn an_undo_in_the_middle_of_a_drag_ends_it() {
    let mut board = open(study());
    let before = board.state().doc.study().clone();
    let (from, to) = (center(vertex(&board, 3)), at(&board, 0.5, 0.7));
    press(&mut board, from, to);
    board.key_down_modifiers(Modifiers::COMMAND, Key::Z);
    board.step();
    // What the window does when the command's key is pressed.
    board.state_mut().doc.undo();
    board.key_up_modifiers(Modifiers::COMMAND, Key::Z);
    board.step();
    board.hover_at(at(&board, 0.2, 0.6));
    board.step();
    board.drop_at(to);
    board.run_steps(2);
    assert_eq!(*board.state().doc.study(), before);
    assert_eq!(board.state().doc.undo_label(), None, "no step is left behind");
}

#[test]
fn the_bob_hangs_under_the_pointer_that_drags_it() {
    let mut board = open(study());
    let bob = |board: &Board| center(board.get_by_label_contains("Plumb bob"));
    let rest = bob(&board);
    // The scale of the dial, from the tank column's side: type an acceleration, see how far the bob moves.
    let typed = Accel::Components { a_s: -2.0, a_z: 0.0, unit: AccelUnit::MPerS2 };
    board.state_mut().doc.edit(&Edit::CaseAccel(0, typed));
    board.run_steps(2);
    let from = bob(&board);
    let per_accel = (from.x - rest.x) / 2.0;
    assert!(per_accel > 3.0 && (from.y - rest.y).abs() < 0.1, "it moves to the right: {rest:?} to {from:?}");

    let to = from + vec2(-41.0, 22.0);
    drag(&mut board, from, to);
    let want = Vec2::new(-2.0 + f64::from(41.0 / per_accel), f64::from(22.0 / per_accel));
    let got = accel(&board, 0).to_m_per_s2(STANDARD_GRAVITY_M_PER_S2);
    // It is rounded to 0.01 m/s2.
    assert!((got - want).norm() < 0.01, "got {got}, expected {want}, within 0.01 m/s2");
    assert!((bob(&board) - to).length() < 0.2, "it hangs at {:?}, the pointer was at {to:?}", bob(&board));
    board.state_mut().doc.undo();
    assert_eq!(accel(&board, 0), typed, "one undo takes the whole drag back");
}

#[test]
fn shift_keeps_the_vertical_part_and_the_unit_stays_as_typed() {
    let mut board = open(study());
    board.state_mut().view.case_idx = 1;
    board.run_steps(2);
    let from = center(board.get_by_label_contains("Plumb bob"));
    board.event(Event::ModifiersChanged(Modifiers::SHIFT));
    drag(&mut board, from, from + vec2(-30.0, 25.0));
    let Accel::Components { a_s, a_z, unit } = accel(&board, 1) else { panic!("not components") };
    assert_eq!((a_z, unit), (0.0, AccelUnit::G));
    assert!(a_s > 0.1 && (a_s * 1e3 - (a_s * 1e3).round()).abs() < 1e-9, "a round number of thousandths: {a_s}");
}

#[test]
fn the_middle_of_an_edge_bends_it_to_a_half_circle_and_back() {
    let mut board = open(study());
    // The right wall, 1 m high: its half circle reaches 0.5 m to the right.
    let from = center(board.get_by_label_contains("Middle of edge 2"));
    let to = at(&board, 1.5, 0.5) + vec2(-2.0, 1.0);
    drag(&mut board, from, to);
    let sweep = board.state().doc.study().section.outline[1].sweep_rad;
    assert!((sweep - std::f64::consts::PI).abs() < 1e-12, "got {sweep}, expected a half turn");
    assert_eq!(board.state().doc.undo_label(), Some("Bend edge 2, right wall"));
    let from = center(board.get_by_label_contains("Middle of edge 2"));
    let to = at(&board, 1.0, 0.5) + vec2(3.0, 0.0);
    drag(&mut board, from, to);
    assert_eq!(board.state().doc.study().section.outline[1].sweep_rad, 0.0, "straight again");
}

#[test]
fn a_double_click_inserts_a_vertex_where_it_was() {
    let mut board = open(study());
    let pos = at(&board, 0.5, 0.0) + vec2(1.0, 0.0);
    for _ in 0..2 {
        click(&mut board, pos, PointerButton::Primary, Modifiers::NONE);
    }
    board.run_steps(2);
    assert_eq!(board.state().doc.study().section.outline.len(), 5);
    assert_eq!(start_of(&board, 1), Point::new(0.5, 0.0));
}

#[test]
fn obstacles_points_and_edges_can_be_dragged() {
    let mut board = open(study());
    let (from, to) = (at(&board, -0.3, 0.22), at(&board, 0.0, 0.42));
    drag(&mut board, from, to);
    let moved = board.state().doc.study().section.obstacles[0].vertices[0].start;
    assert!((moved - Point::new(-0.1, 0.3)).norm() < 1e-9, "the duct is at {moved}");
    let (from, to) = (at(&board, 0.6, 0.2), at(&board, 0.3, 0.6) + vec2(1.0, 1.0));
    drag(&mut board, from, to);
    assert_eq!(board.state().doc.study().points[0].at, Point::new(0.3, 0.6));
    // The right wall moves outward, both its ends together.
    let (from, to) = (at(&board, 1.0, 0.25), at(&board, 1.2, 0.25));
    drag(&mut board, from, to);
    assert_eq!((start_of(&board, 1), start_of(&board, 2)), (Point::new(1.2, 0.0), Point::new(1.2, 1.0)));
}

#[test]
fn the_still_level_sets_the_fill_in_the_way_it_was_given() {
    let mut board = open(study());
    // Half of a capacity of 2.0 - 0.04 m3 stands at z = 0.51 m, with the duct below it.
    let (from, to) = (at(&board, 0.7, 0.51), at(&board, 0.7, 0.7) + vec2(0.0, 1.0));
    drag(&mut board, from, to);
    let Fill::Share(share) = board.state().doc.study().fill else {
        panic!("given as {:?}", board.state().doc.study().fill)
    };
    let want = (2.0 * 0.7 - 0.04) / (2.0 - 0.04);
    assert!((share - want).abs() < 1e-9, "got {share}, expected {want}");
    assert_eq!(board.state().doc.undo_label(), Some("Set the fill"));
}
