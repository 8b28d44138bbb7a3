//! A frame of the window: laying out, painting and tessellating, without a screen. What the graphics driver adds is
//! not in it.

use std::hint::black_box;

use brimwright::analysis;
use brimwright::app::{Derived, EXAMPLES};
use brimwright::gui::{Command, Dialogs, Settings, Window, look};
use egui::{Event, Pos2, RawInput, Rect, pos2, vec2};
use egui_kittest::Harness;
use egui_kittest::kittest::Queryable;

use crate::timing::{median_s, print_rate};

/// Frames of the first example, idle and with a number that changes every frame.
pub fn frame() {
    for (width, height) in [(1280.0, 800.0), (1920.0, 1080.0)] {
        let mut stage = Stage::new(width, height);
        let frame = median_s(|| stage.frame(Vec::new()));
        print_rate(&format!("{width} x {height}, all regions and plots"), 1.0 / frame, 250.0);
        let mut right = false;
        stage.frame(vec![Event::PointerMoved(stage.on_fill_bar(0.9)), press(stage.on_fill_bar(0.9), true)]);
        let drag = median_s(|| {
            right = !right;
            stage.frame(vec![Event::PointerMoved(stage.on_fill_bar(if right { 0.86 } else { 0.9 }))]);
        });
        print_rate(&format!("{width} x {height}, the fill dragged, all cases judged"), 1.0 / drag, 60.0);
    }
}

/// Frames while the first plate of an example goes to and fro by hand: nothing of the window's own work is left out. What
/// of it is judging, and a frame without any, stand below.
pub fn plate_drag() {
    let size = vec2(1280.0, 800.0);
    for file_name in ["fire-tank-lengthwise.ron", "fire-tank-crosswise.ron", "tanker-barrel-surge-plates.ron"] {
        let at = on_first_plate(size, file_name);
        let mut stage = Stage::new(size.x, size.y);
        stage.open(file_name);
        stage.frame(vec![Event::PointerMoved(at), press(at, true)]);
        let mut n_frames = 0;
        let drag = median_s(|| {
            n_frames += 1;
            // To and fro over 24 points, so that no two frames in a row are alike.
            let off = (n_frames * 3 % 48 - 24_i32).abs() as f32;
            stage.frame(vec![Event::PointerMoved(at + vec2(off - 8.0, 0.0))]);
        });
        stage.frame(vec![press(at, false)]);
        let moved = stage.window.document().undo_label().unwrap_or("nothing moved").to_owned();
        print_rate(&format!("{} x {}, {file_name}: {moved}", size.x, size.y), 1.0 / drag, 50.0);
        let idle = median_s(|| stage.frame(Vec::new()));
        let Derived::Judged { study, .. } = stage.window.document().derived() else { continue };
        let judging = median_s(|| _ = black_box(analysis::run(study)));
        println!("    judging anew {:.1} ms, a frame at rest {:.1} ms", 1e3 * judging, 1e3 * idle);
    }
}

/// Where on the screen the first plate of an example is taken hold of.
fn on_first_plate(size: egui::Vec2, file_name: &str) -> Pos2 {
    let mut harness = Harness::builder().with_size(size).with_context_setup(look::install).build_ui_state(
        |ui, window: &mut Option<Window>| {
            let start = || Window::new(ui.ctx(), None, Settings::default(), Dialogs::Own);
            window.get_or_insert_with(start).ui(ui);
        },
        None,
    );
    harness.step();
    let ctx = harness.ctx.clone();
    harness.state_mut().as_mut().expect("a window").run(&ctx, example(file_name));
    harness.run_steps(3);
    let on_board = |at: &Pos2| at.x > 250.0 && at.x < 960.0;
    let places = harness.get_all_by_label_contains("Plate 1, ").map(|node| node.rect().center());
    places.into_iter().find(on_board).expect("the plate on the board")
}

fn example(file_name: &str) -> Command {
    Command::OpenExample(EXAMPLES.iter().position(|e| e.file_name == file_name).expect("an example"))
}

/// A window on a bare context.
struct Stage {
    ctx: egui::Context,
    window: Window,
    size: egui::Vec2,
}

impl Stage {
    fn new(width: f32, height: f32) -> Stage {
        let ctx = egui::Context::default();
        let window = Window::new(&ctx, None, Settings::default(), Dialogs::Own);
        let mut stage = Stage { ctx, window, size: vec2(width, height) };
        for _ in 0..3 {
            stage.frame(Vec::new());
        }
        stage
    }

    fn open(&mut self, file_name: &str) {
        self.window.run(&self.ctx, example(file_name));
        for _ in 0..3 {
            self.frame(Vec::new());
        }
    }

    fn frame(&mut self, events: Vec<Event>) {
        let input =
            RawInput { screen_rect: Some(Rect::from_min_size(Pos2::ZERO, self.size)), events, ..Default::default() };
        let output = self.ctx.run_ui(input, |ui| self.window.ui(ui));
        black_box(self.ctx.tessellate(output.shapes.clone(), output.pixels_per_point));
        output.drop_without_applying_deltas();
    }

    /// A place on the fill bar of the tank column, at `share` of it.
    fn on_fill_bar(&self, share: f32) -> Pos2 {
        let column = if self.size.x < 1600.0 { 240.0 } else { 288.0 };
        pos2(16.0 + share * (column - 32.0), 186.0)
    }
}

fn press(pos: Pos2, pressed: bool) -> Event {
    Event::PointerButton { pos, button: egui::PointerButton::Primary, pressed, modifiers: egui::Modifiers::NONE }
}
