//! The board by its accessible names: what the hand does is what the study gets. No display, no graphics driver.

use brimwright::app::{Derived, Document, Edit};
use brimwright::cases::{Accel, AccelUnit, Attitude, LoadCase};
use brimwright::geom::{Point, Vec2};
use brimwright::gui::{Camera, Look, Proposal, Selected, View, board, look};
use brimwright::liquid::Liquid;
use brimwright::section::{EdgeKind, Obstacle, OutlineEdge, Section, Vertex, WidthLaw};
use brimwright::study::{Fill, NamedPoint, Study};
use brimwright::units::{STANDARD_ATMOSPHERE_PA, STANDARD_GRAVITY_M_PER_S2, UnitSystem};
use egui::{Event, Key, Modifiers, PointerButton, Pos2, vec2};
use egui_kittest::kittest::{NodeT, Queryable};
use egui_kittest::{Harness, Node};
use proptest::prelude::*;

use crate::arbitrary;

struct Desk {
    doc: Document,
    view: View,
}

impl Desk {
    fn ui(&mut self, ui: &mut egui::Ui) {
        let mut out = Vec::new();
        board::board_ui(ui, &self.doc, &mut self.view, Look::of(ui.theme()), &mut out);
        for proposal in out {
            match proposal {
                Proposal::Edit(edit) => self.doc.edit(&edit),
                Proposal::BeginGesture(label) => self.doc.begin_gesture(label),
                Proposal::EndGesture => self.doc.end_gesture(),
                Proposal::CancelGesture => self.doc.cancel_gesture(),
                Proposal::Run(command) => panic!("the board runs no command: {command:?}"),
            }
        }
    }
}

type Board = Harness<'static, Desk>;

/// A box of 2 m by 1 m with a pipe in it, half full, at rest.
fn study() -> Study {
    let edge =
        |name: &str, kind, s, z| OutlineEdge { name: name.to_owned(), kind, start: Point::new(s, z), sweep_rad: 0.0 };
    let corner = |s, z| Vertex { start: Point::new(s, z), sweep_rad: 0.0 };
    Study {
        title: "Wash tank".to_owned(),
        author: String::new(),
        revision: "A".to_owned(),
        notes: String::new(),
        gravity_m_per_s2: STANDARD_GRAVITY_M_PER_S2,
        air_pressure_abs_pa: STANDARD_ATMOSPHERE_PA,
        ullage_gage_pa: 0.0,
        section: Section {
            outline: vec![
                edge("floor", EdgeKind::Wall, -1.0, 0.0),
                edge("right wall", EdgeKind::Wall, 1.0, 0.0),
                edge("rim", EdgeKind::Mouth, 1.0, 1.0),
                edge("left wall", EdgeKind::Wall, -1.0, 1.0),
            ],
            obstacles: vec![Obstacle {
                name: "duct".to_owned(),
                vertices: vec![corner(-0.4, 0.1), corner(-0.2, 0.1), corner(-0.2, 0.3), corner(-0.4, 0.3)],
            }],
            width: WidthLaw::Constant { width_m: 1.0 },
        },
        liquid: Liquid {
            name: "water".to_owned(),
            density_kg_per_m3: 998.2,
            vapour_pressure_abs_pa: None,
            surface_tension_n_per_m: None,
        },
        fill: Fill::Share(0.5),
        cases: vec![case("Rest", 0.0, AccelUnit::MPerS2), case("Stop", 0.1, AccelUnit::G)],
        points: vec![NamedPoint { name: "sensor".to_owned(), at: Point::new(0.6, 0.2) }],
        moment_about: Point::new(0.0, 0.0),
        records: Vec::new(),
        verdict_notes: Vec::new(),
    }
}

fn case(name: &str, a_s: f64, unit: AccelUnit) -> LoadCase {
    LoadCase {
        name: name.to_owned(),
        accel: Accel::Components { a_s, a_z: 0.0, unit },
        attitude: Attitude::Level,
        onset_s: None,
        source: String::new(),
        note: String::new(),
    }
}

fn view() -> View {
    View {
        case_idx: 0,
        selected: None,
        open_verdict: None,
        units: UnitSystem::Si,
        camera: None,
        status: String::new(),
    }
}

fn open(study: Study) -> Board {
    let desk = Desk { doc: Document::new(study, None), view: view() };
    let mut board = Harness::builder()
        .with_size(vec2(728.0, 416.0))
        .with_step_dt(0.05)
        .with_context_setup(look::install)
        .build_ui_state(|ui, desk: &mut Desk| desk.ui(ui), desk);
    board.run_steps(3);
    board
}

fn vertex(board: &Board, number: usize) -> Node<'_> {
    let start = ["Vertex 1,", "Vertex 2,", "Vertex 3,", "Vertex 4,"][number - 1];
    board.get_by_label_contains(start)
}

fn center(node: Node<'_>) -> Pos2 {
    node.rect().center()
}

/// Points a metre, from the two ends of the floor.
fn scale(board: &Board) -> f32 {
    let (left, right) = (center(vertex(board, 1)), center(vertex(board, 2)));
    let [a, b] = [0, 1].map(|i| board.state().doc.study().section.outline[i].start);
    (right.x - left.x) / (b.x - a.x) as f32
}

/// Where a section point is on the screen.
fn at(board: &Board, s: f64, z: f64) -> Pos2 {
    let origin = board.state().doc.study().section.outline[0].start;
    let scale = scale(board);
    center(vertex(board, 1)) + vec2((s - origin.x) as f32 * scale, (origin.y - z) as f32 * scale)
}

fn press(board: &mut Board, from: Pos2, to: Pos2) {
    board.hover_at(from);
    board.step();
    board.drag_at(from);
    board.step();
    for k in 1..=4 {
        board.hover_at(from + (to - from) * (k as f32 / 4.0));
        board.step();
    }
}

fn drag(board: &mut Board, from: Pos2, to: Pos2) {
    press(board, from, to);
    board.drop_at(to);
    board.run_steps(2);
}

fn click(board: &mut Board, pos: Pos2, button: PointerButton, modifiers: Modifiers) {
    board.hover_at(pos);
    board.step();
    for pressed in [true, false] {
        board.event(Event::PointerButton { pos, button, pressed, modifiers });
        board.step();
    }
}

fn start_of(board: &Board, edge_idx: usize) -> Point {
    board.state().doc.study().section.outline[edge_idx].start
}

fn accel(board: &Board, case_idx: usize) -> Accel {
    board.state().doc.study().cases[case_idx].accel
}

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
    board.step();
    board.key_press(Key::Home);
    board.run_steps(2);
    assert_eq!(scale(&board), fitted);
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 96, ..Default::default() })]

    /// Any study, faulty or not, in any window and at any zoom: drawn, tessellated, and left alone.
    #[test]
    fn nothing_that_can_be_read_breaks_the_board(
        study in arbitrary::study(),
        (width, height) in (0.0..2000.0_f32, 0.0..1200.0_f32),
        camera in prop::option::of((-2.0..6.0_f32, -20.0..20.0_f64, -20.0..20.0_f64)),
        (case_idx, selected, pointer) in (0..5_usize, 0..9_usize, (0.0..1.0_f32, 0.0..1.0_f32)),
    ) {
        let mut desk = Desk { doc: Document::new(study.clone(), None), view: view() };
        desk.view.case_idx = case_idx;
        desk.view.open_verdict = Some((case_idx, selected));
        desk.view.selected = [
            Selected::Edge(case_idx), Selected::Vertex(case_idx), Selected::Obstacle(0),
            Selected::ObstacleVertex(0, 1), Selected::Point(0), Selected::Bob,
        ].get(selected).copied();
        desk.view.camera = camera.map(|(exponent, s, z)| Camera { points_per_m: 10f32.powf(exponent), center_m: [s, z] });
        let ctx = egui::Context::default();
        look::install(&ctx);
        let rect = egui::Rect::from_min_size(Pos2::ZERO, vec2(width, height));
        let pos = egui::pos2(pointer.0 * width, pointer.1 * height);
        for _ in 0..2 {
            let input = egui::RawInput {
                screen_rect: Some(rect),
                events: vec![Event::PointerMoved(pos)],
                ..Default::default()
            };
            let mut output = ctx.run_ui(input, |ui| desk.ui(ui));
            let meshes = ctx.tessellate(std::mem::take(&mut output.shapes), 1.0);
            prop_assert!(!meshes.is_empty() || width < 60.0 || height < 60.0, "nothing drawn in {width} by {height}");
            output.drop_without_applying_deltas();
        }
        prop_assert_eq!(desk.doc.study(), &study, "looking changes nothing");
    }
}
