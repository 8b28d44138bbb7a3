//! The board by its accessible names: what the hand does is what the study gets. No display, no graphics driver.

mod drags;
mod handles;
mod plates;
mod robust;

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

struct Desk {
    doc: Document,
    view: View,
}

impl Desk {
    fn ui(&mut self, ui: &mut egui::Ui) {
        let mut out = Vec::new();
        board::board_ui(ui, &self.doc, &mut self.view, None, Look::of(ui.theme()), &mut out);
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
            plates: vec![],
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
        compartments: vec![],
        sump: None,
        discharge_coefficient: 0.6,
        materials: Vec::new(),
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
        duration_s: None,
        release: false,
        source: String::new(),
        note: String::new(),
    }
}

fn view() -> View {
    View {
        case_idx: 0,
        selected: None,
        open_verdict: None,
        stage: None,
        units: UnitSystem::Si,
        camera: None,
        pen: None,
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
