//! Any study in any window, and a wild hand.

use brimwright::gui::{Pen, Stage, VerdictAt};
use brimwright::section::{Opening, OpeningShape, Panel, Plate};
use egui::{Event, Key, Modifiers, PointerButton, RawInput, Rect};
use proptest::prelude::*;

use super::*;
use crate::arbitrary;

/// One frame of a desk without a harness: drawn and tessellated.
fn frame(ctx: &egui::Context, desk: &mut Desk, rect: Rect, events: Vec<Event>) -> usize {
    let input = RawInput { screen_rect: Some(rect), events, ..Default::default() };
    let mut output = ctx.run_ui(input, |ui| desk.ui(ui));
    let n_meshes = ctx.tessellate(std::mem::take(&mut output.shapes), 1.0).len();
    output.drop_without_applying_deltas();
    n_meshes
}

/// A plate between two points with an opening in its middle third.
fn plate((from, to): ((f64, f64), (f64, f64))) -> Plate {
    let points = vec![Point::new(from.0, from.1), Point::new(to.0, to.1)];
    let length_m = (points[1] - points[0]).norm();
    let (from_m, to_m) = (length_m / 3.0, 2.0 * length_m / 3.0);
    Plate {
        name: String::new(),
        points,
        thickness_m: 0.006,
        corrosion_m: 0.0,
        material: String::new(),
        panel: Panel::default(),
        openings: vec![Opening { name: String::new(), from_m, to_m, shape: OpeningShape::Share(0.5) }],
    }
}

/// A star-shaped tank of 3 to 9 vertices, some edges bent, one of them a mouth, with plates in it or across its walls, under
/// one acceleration.
fn tank() -> impl Strategy<Value = Study> {
    let corner = (0.4..1.5_f64, prop_oneof![Just(0.0), -0.4..0.4_f64]);
    let plates = prop::collection::vec(((-1.0..1.0_f64, -1.0..1.0_f64), (-1.0..1.0_f64, -1.0..1.0_f64)), 0..3);
    (prop::collection::vec(corner, 3..9), plates, 0.0..1.0_f64, (-15.0..15.0_f64, -15.0..15.0_f64)).prop_map(
        |(corners, plates, share, (a_s, a_z))| {
            let mut tank = study();
            let n = corners.len();
            let edge = |(i, (r, sweep_rad)): (usize, (f64, f64))| {
                let (sin, cos) = (std::f64::consts::TAU * i as f64 / n as f64).sin_cos();
                OutlineEdge {
                    name: String::new(),
                    kind: if i == 1 { EdgeKind::Mouth } else { EdgeKind::Wall },
                    start: Point::new(r * cos, r * sin),
                    sweep_rad,
                }
            };
            tank.section.outline = corners.into_iter().enumerate().map(edge).collect();
            tank.section.obstacles.clear();
            tank.section.plates = plates.into_iter().map(plate).collect();
            tank.fill = Fill::Share(share);
            tank.cases[0].accel = Accel::Components { a_s, a_z, unit: AccelUnit::MPerS2 };
            tank
        },
    )
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 48, ..Default::default() })]

    /// Any study, faulty or not, in any window and at any zoom: drawn, tessellated, and left alone.
    #[test]
    fn nothing_that_can_be_read_breaks_the_board(
        study in prop_oneof![arbitrary::study(), tank()],
        (width, height) in (0.0..2000.0_f32, 0.0..1200.0_f32),
        camera in prop::option::of((-2.0..6.0_f32, -20.0..20.0_f64, -20.0..20.0_f64)),
        (case_idx, selected, pointer) in (0..5_usize, 0..13_usize, (0.0..1.0_f32, 0.0..1.0_f32)),
        (stage, has_pen) in (prop::option::of(prop::sample::select(Stage::ALL.to_vec())), any::<bool>()),
    ) {
        let mut desk = Desk { doc: Document::new(study.clone(), None), view: view() };
        desk.view.case_idx = case_idx;
        desk.view.open_verdict = Some(match selected % 2 {
            0 => VerdictAt::Case(case_idx, selected),
            _ => VerdictAt::Layout(selected / 2),
        });
        desk.view.selected = [
            Selected::Edge(case_idx), Selected::Vertex(case_idx), Selected::Obstacle(0),
            Selected::ObstacleVertex(0, 1), Selected::Point(0), Selected::Bob, Selected::Plate(case_idx),
            Selected::PlatePoint(0, case_idx), Selected::Opening(0, case_idx), Selected::Compartment(0), Selected::Sump,
        ].get(selected).copied();
        desk.view.stage = stage;
        desk.view.pen = has_pen.then(Pen::default);
        desk.view.camera = camera.map(|(exponent, s, z)| Camera { points_per_m: 10f32.powf(exponent), center_m: [s, z] });
        let ctx = egui::Context::default();
        look::install(&ctx);
        let rect = Rect::from_min_size(Pos2::ZERO, vec2(width, height));
        let pos = egui::pos2(pointer.0 * width, pointer.1 * height);
        for _ in 0..2 {
            let n_meshes = frame(&ctx, &mut desk, rect, vec![Event::PointerMoved(pos)]);
            prop_assert!(n_meshes > 0 || width < 60.0 || height < 60.0, "nothing drawn in {width} by {height}");
        }
        prop_assert_eq!(desk.doc.study(), &study, "looking changes nothing");
    }

    /// Whatever is dragged, clicked twice or deleted, undo leads back to where it began.
    #[test]
    fn undo_leads_back_from_a_wild_hand(
        study in tank(),
        moves in prop::collection::vec(((0.0..1.0_f32, 0.0..1.0_f32), (-80.0..80.0_f32, -80.0..80.0_f32), 0..8_u8), 1..8),
    ) {
        let mut desk = Desk { doc: Document::new(study.clone(), None), view: view() };
        let ctx = egui::Context::default();
        look::install(&ctx);
        let rect = Rect::from_min_size(Pos2::ZERO, vec2(728.0, 416.0));
        let button = |pos, pressed| Event::PointerButton {
            pos, button: PointerButton::Primary, pressed, modifiers: Modifiers::NONE,
        };
        let key = |key, pressed| Event::Key { key, physical_key: None, pressed, repeat: false, modifiers: Modifiers::NONE };
        frame(&ctx, &mut desk, rect, vec![]);
        for ((x, y), (dx, dy), ending) in moves {
            let anywhere = egui::pos2(x * 728.0, y * 416.0);
            let to = anywhere + vec2(dx, dy);
            if ending >= 6 {
                desk.view.pen = Some(Pen::default());
            }
            frame(&ctx, &mut desk, rect, vec![Event::PointerMoved(anywhere)]);
            frame(&ctx, &mut desk, rect, vec![button(anywhere, true)]);
            for k in 1..=3 {
                frame(&ctx, &mut desk, rect, vec![Event::PointerMoved(anywhere + (to - anywhere) * (k as f32 / 3.0))]);
            }
            if ending == 0 {
                frame(&ctx, &mut desk, rect, vec![key(Key::Escape, true), key(Key::Escape, false)]);
            }
            frame(&ctx, &mut desk, rect, vec![button(to, false)]);
            if ending == 1 {
                frame(&ctx, &mut desk, rect, vec![key(Key::Delete, true), key(Key::Delete, false)]);
            }
            if ending == 2 {
                for pressed in [true, false, true, false] {
                    frame(&ctx, &mut desk, rect, vec![button(to, pressed)]);
                }
            }
        }
        frame(&ctx, &mut desk, rect, vec![Event::PointerGone]);
        while desk.doc.undo_label().is_some() {
            desk.doc.undo();
        }
        prop_assert_eq!(desk.doc.study(), &study);
    }
}
