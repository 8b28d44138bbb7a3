//! Small marks that every panel shares: the cup, the bar, the trust strip, rings and triangles, hatches.
//!
//! They only draw; whoever shows them gives them room and words for AccessKit. Knows no panel.

use egui::{Align2, CornerRadius, Painter, Pos2, Rect, Response, Shape, Stroke, StrokeKind, Vec2, pos2, vec2};

use crate::analysis::{Reach, State, Trust};

use super::{Look, font};

/// Utilisation at which a bar ends; what is above is told by the number.
pub const BAR_SCALE: f32 = 1.25;

/// The mark of a state: low, at the brim, tipped and spilling, dashed and empty with a question mark.
pub fn paint_cup(painter: &Painter, center: Pos2, size: f32, state: State, look: &Look) {
    let color = look.state(state);
    // Unit cup: y down, brim at -0.44, floor at 0.44; walls lean outward.
    let at = |x: f32, y: f32| center + vec2(x, y) * size;
    match state {
        State::Holds | State::Close => {
            let surface = if state == State::Holds { 0.04 } else { -0.33 };
            let lean = |y: f32| 0.36 + 0.09 * (0.44 - y) / 0.88;
            painter.add(Shape::convex_polygon(
                vec![at(-lean(surface), surface), at(lean(surface), surface), at(0.36, 0.44), at(-0.36, 0.44)],
                color,
                Stroke::NONE,
            ));
            let wall = Stroke::new((0.09 * size).max(1.25), color);
            painter.line_segment([at(-0.43, -0.44), at(-0.35, 0.4)], wall);
            painter.line_segment([at(0.43, -0.44), at(0.35, 0.4)], wall);
        }
        State::Fails => {
            let turned = |x: f32, y: f32| {
                let (sin, cos) = 0.42_f32.sin_cos();
                at(x * cos - y * sin - 0.09, x * sin + y * cos)
            };
            let body = [(-0.44, -0.40), (-0.06, -0.47), (0.40, -0.40), (0.34, 0.40), (-0.34, 0.40)];
            painter.add(Shape::convex_polygon(body.map(|(x, y)| turned(x, y)).to_vec(), color, Stroke::NONE));
            let drop = at(0.43, 0.26);
            painter.circle_filled(drop, 0.1 * size, color);
            painter.add(Shape::convex_polygon(
                vec![drop + vec2(0.0, -0.24) * size, drop + vec2(0.1, 0.0) * size, drop + vec2(-0.1, 0.0) * size],
                color,
                Stroke::NONE,
            ));
        }
        State::NotJudged => {
            let stroke = Stroke::new((0.08 * size).max(1.0), color);
            let path = [at(-0.44, -0.44), at(-0.36, 0.42), at(0.36, 0.42), at(0.44, -0.44)];
            painter.extend(Shape::dashed_line(&path, stroke, 0.14 * size, 0.11 * size));
            let question = egui::FontId::new(0.66 * size, font::heading().family);
            painter.text(at(0.0, 0.0), Align2::CENTER_CENTER, "?", question, color);
        }
    }
}

/// Draws a utilisation bar, 6 high, in the middle of `rect`.
pub fn paint_bar(painter: &Painter, rect: Rect, utilisation: Option<f64>, state: State, look: &Look) {
    let x_of = |u: f32| rect.left() + rect.width() * (u / BAR_SCALE).clamp(0.0, 1.0);
    let limit_x = painter.round_to_pixel_center(x_of(1.0));
    let track = Rect::from_center_size(rect.center(), vec2(rect.width(), 6.0));
    painter.rect_filled(track, CornerRadius::ZERO, look.line2);
    match utilisation {
        _ if state == State::NotJudged => {
            let hatched = track.with_max_x(limit_x);
            painter.rect_filled(hatched, CornerRadius::ZERO, look.panel);
            painter.add(hatch(hatched, 4.0, Stroke::new(1.0, look.state_fill(state))));
        }
        None => {}
        Some(u) => {
            let end = x_of(u as f32);
            painter.rect_filled(track.with_max_x(end.min(limit_x)), CornerRadius::ZERO, look.state_fill(state));
            if end > limit_x {
                let over = track.with_min_x(limit_x).with_max_x(end).expand2(vec2(0.0, 1.5));
                painter.rect_filled(over, CornerRadius::ZERO, look.state(state));
            }
        }
    }
    painter.vline(limit_x, egui::Rangef::new(track.center().y - 6.0, track.center().y + 6.0), (1.25, look.ink));
    let close_x = painter.round_to_pixel_center(x_of(0.9));
    painter.vline(close_x, egui::Rangef::new(track.bottom(), track.bottom() + 3.0), (1.0, look.ink3));
}

/// Width of a trust strip of `n` squares.
pub fn trust_width(n: usize) -> f32 {
    8.0 * n as f32 - 2.0
}

/// Draws a trust strip that ends at `right`.
pub fn paint_trust(painter: &Painter, right: Pos2, trust: &[Trust], look: &Look) {
    let left = painter.round_to_pixel_center(right.x - trust_width(trust.len())) - 0.5;
    for (i, square) in trust.iter().enumerate() {
        let min = pos2(left + 8.0 * i as f32, painter.round_to_pixel_center(right.y - 3.0) - 0.5);
        let rect = Rect::from_min_size(min, Vec2::splat(6.0));
        let ink = look.ink2;
        match square.reach {
            Reach::Inside => {
                painter.rect_filled(rect, CornerRadius::ZERO, ink);
            }
            Reach::Near => {
                painter.rect_stroke(rect, CornerRadius::ZERO, (1.0, ink), StrokeKind::Inside);
                let half = vec![rect.left_top(), rect.right_top(), rect.left_bottom()];
                painter.add(Shape::convex_polygon(half, ink, Stroke::NONE));
            }
            Reach::Outside => {
                painter.rect_stroke(rect, CornerRadius::ZERO, (1.0, ink), StrokeKind::Inside);
                painter.line_segment([rect.left_bottom(), rect.right_top()], Stroke::new(1.0, ink));
            }
        }
    }
}

/// All squares of a trust strip in words, one a line.
pub fn trust_words(trust: &[Trust]) -> String {
    trust.iter().map(|t| format!("{}, {}", t.name, t.words)).collect::<Vec<_>>().join("\n")
}

/// The mark of a requirement record: a dashed ochre ring while unconfirmed, a dot once confirmed.
pub fn paint_record_mark(painter: &Painter, center: Pos2, confirmed: bool, look: &Look) {
    if confirmed {
        painter.circle_filled(center, 3.8, look.ink2);
        return;
    }
    let (n, radius) = (7, 3.9);
    let on = |turn: f32| center + radius * Vec2::angled(std::f32::consts::TAU * turn / n as f32);
    for i in 0..n {
        let from = i as f32;
        painter.line_segment([on(from), on(from + 0.5)], Stroke::new(1.25, look.state(State::Close)));
    }
}

/// A numbered ring: a fault.
pub fn paint_fault(painter: &Painter, center: Pos2, radius: f32, number: usize, look: &Look) {
    let color = look.state(State::Fails);
    painter.circle(center, radius, look.board, Stroke::new(1.75, color));
    painter.text(center, Align2::CENTER_CENTER, number.to_string(), font::small_figure(), color);
}

/// A numbered triangle: a warning.
pub fn paint_warning(painter: &Painter, center: Pos2, radius: f32, number: usize, look: &Look) {
    let color = look.state(State::Close);
    let corner = |x: f32, y: f32| center + radius * vec2(x, y);
    let path = vec![corner(0.0, -1.1), corner(1.1, 0.85), corner(-1.1, 0.85)];
    painter.add(Shape::convex_polygon(path, look.board, Stroke::new(1.75, color)));
    painter.text(corner(0.0, 0.28), Align2::CENTER_CENTER, number.to_string(), font::tick_figure(), color);
}

/// A 45 degree hatch that fills `rect`.
pub fn hatch(rect: Rect, spacing: f32, stroke: Stroke) -> Shape {
    let n = ((rect.width() + rect.height()) / spacing) as i32;
    let lines = (1..=n).map(|i| {
        // The line x + y = reach, cut off at the sides of `rect`.
        let reach = i as f32 * spacing;
        let on = |y: f32| pos2(rect.left() + reach - y, rect.top() + y);
        Shape::line_segment([on((reach - rect.width()).max(0.0)), on(reach.min(rect.height()))], stroke)
    });
    Shape::Vec(lines.collect())
}

/// The focus ring round `rect`, when `response` has the keyboard.
pub fn paint_focus(painter: &Painter, rect: Rect, response: &Response, look: &Look) {
    if response.has_focus() {
        let ring = rect.expand(super::look::FOCUS_RING);
        painter.rect_stroke(ring, CornerRadius::same(5), (super::look::FOCUS_RING, look.accent), StrokeKind::Outside);
    }
}
