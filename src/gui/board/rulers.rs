//! The grid, and the rulers at the top and at the left of the board.

use egui::{Align2, Painter, Pos2, Rect, Stroke, pos2};

use crate::gui::{Look, font};
use crate::units::{Quantity, UnitSystem, fixed};

use super::lines;
use super::screen::{Screen, round_step};

/// Height of the ruler at the top.
pub const TOP: f32 = 18.0;

/// Width of the ruler at the left.
pub const LEFT: f32 = 30.0;

/// Least distance between two lines of the grid, points.
const LEAST_STEP: f64 = 12.0;

/// The drawing area inside the rulers of a board.
pub fn drawing_area(board: Rect) -> Rect {
    let min = board.min + egui::vec2(LEFT.min(board.width()), TOP.min(board.height()));
    Rect::from_min_max(min, board.max)
}

/// Distance between two fine lines of the grid, m.
pub fn grid_step_m(screen: &Screen, units: UnitSystem) -> f64 {
    round_step(LEAST_STEP / screen.scale(), units).0
}

/// The grid, over the whole drawing area.
pub fn paint_grid(painter: &Painter, screen: &Screen, units: UnitSystem, look: &Look) {
    let steps = Steps::of(screen, units);
    let area = screen.rect;
    for major in [false, true] {
        let stroke = Stroke::new(1.0, if major { look.grid2 } else { look.grid });
        for (x, _) in steps.along_s(screen).filter(|t| steps.is_major(t.1) == major) {
            painter.vline(painter.round_to_pixel_center(x), area.y_range(), stroke);
        }
        for (y, _) in steps.along_z(screen).filter(|t| steps.is_major(t.1) == major) {
            painter.hline(area.x_range(), painter.round_to_pixel_center(y), stroke);
        }
    }
}

/// The rulers; `pointer` is marked on both.
pub fn paint_rulers(
    painter: &Painter,
    board: Rect,
    screen: &Screen,
    units: UnitSystem,
    pointer: Option<Pos2>,
    look: &Look,
) {
    let area = screen.rect;
    let (top, left) = (board.with_max_y(area.top()), board.with_max_x(area.left()));
    for ruler in [top, left] {
        painter.rect_filled(ruler, 0.0, look.board);
    }
    let steps = Steps::of(screen, units);
    let major_m = steps.fine_m * steps.n as f64;
    let (unit, least_decimals) = match major_m {
        m if m < 0.02 => (Quantity::Length.unit(units), 0),
        _ => (Quantity::Distance.unit(units), 1),
    };
    let decimals = decimals(unit.from_si(major_m), least_decimals);
    let label = |k: i64| fixed(unit.from_si(k as f64 * steps.fine_m), decimals);
    let (tick, ink) = (Stroke::new(1.0, look.line), look.ink3);

    let top_painter = painter.with_clip_rect(painter.clip_rect().intersect(top));
    for (x, k) in steps.along_s(screen) {
        let x = painter.round_to_pixel_center(x);
        let length = if steps.is_major(k) { 5.0 } else { 3.0 };
        top_painter.vline(x, egui::Rangef::new(area.top() - length, area.top()), tick);
        if steps.is_major(k) {
            let text = top_painter.layout_no_wrap(label(k), font::tick(), ink);
            let rect = Align2::CENTER_BOTTOM.anchor_size(pos2(x, area.top() - 4.0), text.size());
            if rect.left() > area.left() && rect.right() < area.right() {
                top_painter.galley(rect.min, text, ink);
            }
        }
    }
    let left_painter = painter.with_clip_rect(painter.clip_rect().intersect(left.with_min_y(area.top())));
    for (y, k) in steps.along_z(screen) {
        let y = painter.round_to_pixel_center(y);
        let length = if steps.is_major(k) { 5.0 } else { 3.0 };
        left_painter.hline(egui::Rangef::new(area.left() - length, area.left()), y, tick);
        if steps.is_major(k) && y > area.top() + 6.0 && y < area.bottom() - 6.0 {
            left_painter.text(pos2(area.left() - 7.0, y), Align2::RIGHT_CENTER, label(k), font::tick(), ink);
        }
    }
    painter.text(board.min + egui::vec2(8.0, 3.0), Align2::LEFT_TOP, unit.symbol, font::tick(), ink);
    let border = Stroke::new(1.0, look.line2);
    for line in [
        [pos2(board.left(), area.top()), pos2(board.right(), area.top())],
        [pos2(area.left(), area.top()), pos2(area.left(), board.bottom())],
    ] {
        painter.line_segment(lines::crisp(painter, line), border);
    }
    if let Some(p) = pointer.filter(|p| area.contains(*p)) {
        let mark = Stroke::new(1.0, look.accent);
        painter.vline(p.x, egui::Rangef::new(area.top() - 6.0, area.top()), mark);
        painter.hline(egui::Rangef::new(area.left() - 6.0, area.left()), p.y, mark);
    }
}

/// Fine steps of the grid, and how many make one with a label.
struct Steps {
    fine_m: f64,
    n: usize,
}

impl Steps {
    fn of(screen: &Screen, units: UnitSystem) -> Steps {
        let (fine_m, n) = round_step(LEAST_STEP / screen.scale(), units);
        Steps { fine_m, n }
    }

    fn is_major(&self, k: i64) -> bool {
        k.rem_euclid(self.n as i64) == 0
    }

    /// Screen x of each fine line, with its count from the origin.
    fn along_s(&self, screen: &Screen) -> impl Iterator<Item = (f32, i64)> {
        let from = screen.section_from_screen(screen.rect.left_top()).x;
        let to = screen.section_from_screen(screen.rect.right_top()).x;
        self.between(from, to).map(|(v, k)| (screen.screen_from_section(crate::geom::Point::new(v, 0.0)).x, k))
    }

    fn along_z(&self, screen: &Screen) -> impl Iterator<Item = (f32, i64)> {
        let from = screen.section_from_screen(screen.rect.left_bottom()).y;
        let to = screen.section_from_screen(screen.rect.left_top()).y;
        self.between(from, to).map(|(v, k)| (screen.screen_from_section(crate::geom::Point::new(0.0, v)).y, k))
    }

    fn between(&self, from: f64, to: f64) -> impl Iterator<Item = (f64, i64)> + use<> {
        let fine_m = self.fine_m;
        let (first, last) = ((from / fine_m).ceil() as i64, (to / fine_m).floor() as i64);
        (first..=last).map(move |k| (k as f64 * fine_m, k))
    }
}

/// Decimals that a multiple of `step` needs.
fn decimals(step: f64, least: usize) -> usize {
    let is_whole = |d: &usize| {
        let scaled = step * 10f64.powi(*d as i32);
        (scaled - scaled.round()).abs() < 1e-6
    };
    (least..5).find(is_whole).unwrap_or(5)
}
