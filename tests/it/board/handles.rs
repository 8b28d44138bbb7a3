//! Handles, keys, menus, the status line and the view.

use super::*;

#[test]
fn handles_move_with_the_arrow_keys_and_vanish_with_delete() {
    let mut board = open(study());
    vertex(&board, 3).focus();
    board.run_steps(2);
    assert_eq!(board.state().view.selected, Some(Selected::Vertex(2)));
    board.key_press(Key::ArrowUp);
    board.step();
    board.key_press_modifiers(Modifiers::SHIFT, Key::ArrowRight);
    board.run_steps(2);
    assert_eq!(start_of(&board, 2), Point::new(1.01, 1.001));
    assert!(vertex(&board, 3).is_focused(), "the arrow keys do not move the focus");
    board.key_press(Key::Delete);
    board.run_steps(2);
    assert_eq!(board.state().doc.study().section.outline.len(), 3);

    let mut board = open(study());
    board.get_by_label_contains("Plumb bob").focus();
    board.run_steps(2);
    board.key_press(Key::ArrowRight);
    board.run_steps(2);
    let got = accel(&board, 0).to_m_per_s2(STANDARD_GRAVITY_M_PER_S2);
    assert!((got - Vec2::new(-0.1, 0.0)).norm() < 1e-12, "the bob moves right as the tank accelerates left: {got}");
    board.get_by_label_contains("Still level").focus();
    board.run_steps(2);
    board.key_press_modifiers(Modifiers::SHIFT, Key::ArrowUp);
    board.run_steps(2);
    let Derived::Judged { results, .. } = board.state().doc.derived() else { panic!("not judged") };
    assert!((results.still.level_z_m - 0.52).abs() < 1e-9, "10 mm higher: {}", results.still.level_z_m);
}

#[test]
fn every_handle_is_spoken_and_reached_with_tab() {
    let mut board = open(study());
    let names = [
        "Vertex 1, s −1.000 m, z 0.000 m",
        "Middle of edge 1, floor, straight, 2\u{2009}000 mm",
        "Vertex 3, s 1.000 m, z 1.000 m",
        "Obstacle 1, duct, s −0.400 m, z 0.100 m",
        "Point 1, sensor, s 0.600 m, z 0.200 m",
        "Moment point, s 0.000 m, z 0.000 m",
        "Still level, 510.0 mm",
        "Plumb bob, a_s 0.00 m/s², a_z 0.00 m/s²",
    ];
    for name in names {
        board.get_by_label(name);
    }
    // The board, four vertices, four middles, duct, point, moment point, level, bob.
    let mut focused = Vec::new();
    for _ in 0..14 {
        board.key_press(Key::Tab);
        board.run_steps(2);
        let name = board.root().children_recursive().find(|n| n.accesskit_node().is_focused());
        focused.push(name.and_then(|n| n.accesskit_node().label()).unwrap_or_default());
    }
    focused.sort();
    focused.dedup();
    assert_eq!(focused.len(), 14, "each Tab reaches another handle: {focused:#?}");
}

#[test]
fn the_right_button_offers_what_can_be_done() {
    let mut board = open(study());
    let pos = at(&board, 0.5, 0.0);
    click(&mut board, pos, PointerButton::Secondary, Modifiers::NONE);
    board.run_steps(3);
    board.get_by_label("Mouth, open to air").click();
    board.run_steps(3);
    assert_eq!(board.state().doc.study().section.outline[0].kind, EdgeKind::Mouth);

    let mut board = open(study());
    let pos = at(&board, 0.4, 0.8) + vec2(1.0, 0.0);
    click(&mut board, pos, PointerButton::Secondary, Modifiers::NONE);
    board.run_steps(3);
    board.get_by_label("Add point here").click();
    board.run_steps(3);
    assert_eq!(board.state().doc.study().points.last().map(|p| p.at), Some(Point::new(0.4, 0.8)));
}

#[test]
fn the_status_line_names_what_is_under_the_pointer() {
    let mut board = open(study());
    for (s, z, want) in [
        (1.0, 1.0, "on vertex 3"),
        (1.0, 0.3, "on edge 2, right wall, wall, straight, 1\u{2009}000 mm"),
        (0.3, 1.0, "on edge 3, rim, mouth, straight, 2\u{2009}000 mm"),
        (-0.3, 0.25, "on Obstacle 1, duct"),
        (0.6, 0.2, "on point 1, sensor"),
        (0.2, 0.51, "on Still level, 510.0 mm"),
        (0.3, 0.75, "s 0.300 m, z 0.750 m"),
    ] {
        let pos = at(&board, s, z);
        board.hover_at(pos);
        board.run_steps(2);
        let status = board.state().view.status.clone();
        assert!(status.contains(want), "at s {s}, z {z}: {status:?}, expected {want:?}");
    }
    board.remove_cursor();
    board.run_steps(2);
    assert_eq!(board.state().view.status, "", "nothing is under a pointer that has left");
}

#[test]
fn wheel_and_drag_move_the_view_and_home_fits() {
    let mut board = open(study());
    let fitted = scale(&board);
    let pos = at(&board, 0.3, 0.75);
    board.hover_at(pos);
    board.step();
    let wheel = Event::MouseWheel {
        unit: egui::MouseWheelUnit::Point,
        delta: vec2(0.0, 120.0),
        phase: egui::TouchPhase::Move,
        source: egui::MouseWheelSource::Unknown,
        modifiers: Modifiers::NONE,
    };
    board.event(wheel);
    board.run_steps(20);
    assert!(scale(&board) > 1.1 * fitted, "zoomed in: {} from {fitted}", scale(&board));
    assert!((at(&board, 0.3, 0.75) - pos).length() < 0.5, "the point under the pointer stands still");
    let before = center(vertex(&board, 1));
    let empty = at(&board, 0.3, 0.8);
    drag(&mut board, empty, empty + vec2(30.0, -20.0));
    let moved = center(vertex(&board, 1)) - before;
    assert!((moved - vec2(30.0, -20.0)).length() < 0.1, "moved by {moved:?}");
    assert!(!board.state().doc.is_unsaved(), "a look is not an edit");
    board.get_by_label("Board").focus();
    board.run_steps(2);
    let before = scale(&board);
    board.key_press(Key::Plus);
    board.run_steps(2);
    assert!((scale(&board) / before - 1.25).abs() < 1e-3, "from {before} to {}", scale(&board));
    board.key_press(Key::Home);
    board.run_steps(2);
    assert_eq!(scale(&board), fitted);
}
