//! A frame of the window: laying out, painting and tessellating, without a screen. What the graphics driver adds is
//! not in it.

use brimwright::gui::{Dialogs, Settings, Window};
use egui::{Event, Pos2, RawInput, Rect, pos2, vec2};

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

    fn frame(&mut self, events: Vec<Event>) {
        let input =
            RawInput { screen_rect: Some(Rect::from_min_size(Pos2::ZERO, self.size)), events, ..Default::default() };
        let output = self.ctx.run_ui(input, |ui| self.window.ui(ui));
        std::hint::black_box(self.ctx.tessellate(output.shapes.clone(), output.pixels_per_point));
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
