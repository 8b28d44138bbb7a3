//! The freeboard dimension: available and required, side by side at the mouth that governs.

use std::sync::Arc;

use egui::{Align2, Color32, Galley, Painter, Pos2, Rect, Stroke, Vec2, pos2, vec2};

use crate::analysis::State;
use crate::geom::Point;
use crate::gui::{Look, font, marks};
use crate::units::{Measure, Quantity};

use super::labels::Labels;
use super::lines;
use super::model::Freeboard;
use super::scene::Scene;

/// Draws the dimension, and takes its place among the labels.
pub fn paint_freeboard(painter: &Painter, scene: &Scene, freeboard: &Freeboard, labels: &mut Labels, look: &Look) {
    let brim = scene.at(freeboard.brim);
    let still_y = scene.at(Point::new(0.0, freeboard.still_z_m)).y;
    let required_y = still_y - (freeboard.required_m * scene.screen.scale()) as f32;
    let fails = freeboard.state == State::Fails;
    let required_ink = if fails { look.state(State::Fails) } else { look.ink2 };
    let length = |m: f64| Measure::new(Quantity::Length, m).text(scene.units);
    let short_m = freeboard.required_m - freeboard.available_m;
    let short = fails.then(|| format!("{} short", length(short_m)));
    let quiet = |ink: Color32| if fails { required_ink } else { ink };
    let available = [Some(length(freeboard.available_m)), Some("available".to_owned()), None];
    let required = [Some(length(freeboard.required_m)), Some("required".to_owned()), short];
    let texts = [(available, look.ink, look.ink2), (required, quiet(look.ink), quiet(look.ink2))].map(
        |(lines, number_ink, words_ink)| {
            let fonts = [(font::body_heavy(), number_ink), (font::small(), words_ink), (font::small(), words_ink)];
            let lines = lines
                .into_iter()
                .zip(fonts)
                .filter_map(|(line, (font, ink))| line.map(|line| painter.layout_no_wrap(line, font, ink)));
            Block::new(lines.collect())
        },
    );

    let side = Side::choose(scene, brim.x, texts[0].size.x, texts[1].size.x);
    let [x_available, x_required] = side.lines.map(|x| painter.round_to_pixel_center(x));
    let end = x_required + 8.0 * side.sign;
    for (x, top) in [(x_available, brim.y), (x_required, required_y)] {
        lines::segment(painter, [pos2(x, top), pos2(x, still_y)], Stroke::new(3.5, look.board));
    }
    lines::segment(painter, [brim, pos2(end, brim.y)], Stroke::new(1.0, look.ink3));
    let bounds = scene.bounds().x_range();
    let edge = if side.sign > 0.0 { bounds.max.min(end) } else { bounds.min.max(end) };
    lines::dashed(painter, &[pos2(edge, still_y), pos2(end, still_y)], Stroke::new(1.0, look.ink3), 6.0, 4.0);
    lines::dimension(painter, [pos2(x_available, brim.y), pos2(x_available, still_y)], Stroke::new(1.0, look.ink2));
    let pen = if fails { Stroke::new(1.5, required_ink) } else { Stroke::new(1.0, required_ink) };
    lines::dimension(painter, [pos2(x_required, required_y), pos2(x_required, still_y)], pen);
    for x in [x_available, x_required] {
        labels.keep_off(Rect::from_x_y_ranges(x - 3.0..=x + 3.0, required_y.min(brim.y)..=still_y.max(brim.y)));
    }
    if freeboard.state == State::Fails || freeboard.state == State::Close {
        let cup = pos2(x_required, required_y.min(brim.y) - 13.0);
        if scene.screen.rect.shrink(9.0).contains(cup) {
            marks::paint_cup(painter, cup, 16.0, freeboard.state, look);
            labels.keep_off(Rect::from_center_size(cup, Vec2::splat(18.0)));
        }
    }
    let middle = 0.5 * (brim.y + still_y);
    let apart = if side.is_stacked { 0.5 * (texts[0].size.y + texts[1].size.y) + 2.0 } else { 0.0 };
    for (i, block) in texts.into_iter().enumerate() {
        let (x, outward) = match (i, side.is_stacked) {
            (0, false) => (x_available, -side.sign),
            _ => (x_required, side.sign),
        };
        let y = middle + if i == 0 { -0.5 * apart } else { 0.5 * apart };
        let align = mirrored(-outward);
        // Along the line first, then further out, past a wall that stands in the way; else between brim and line.
        let steps = (0..9).map(|k| if k % 2 == 0 { 9 * k } else { -9 * (k + 1) });
        let off = |out: i32, dy: i32| vec2((6 + 14 * out) as f32, dy as f32);
        let outside = (0..5).flat_map(|out| steps.clone().map(move |dy| off(out, dy)));
        let outside = outside.map(|v| (pos2(x + v.x * outward, y + v.y), align));
        let inside = (0..3).flat_map(|out| steps.clone().map(move |dy| off(out, dy)));
        let inside = inside.map(|v| (pos2(x_available - v.x * side.sign, y + v.y), mirrored(side.sign)));
        let places: Vec<(Pos2, Align2)> = outside.chain(inside).collect();
        let rect = labels.place_anyway(block.size, &places);
        block.paint(painter, rect, outward, look);
    }
}

/// Aligns text that lies on this side of a line, its near edge at the line.
fn mirrored(side: f32) -> Align2 {
    if side > 0.0 { Align2::RIGHT_CENTER } else { Align2::LEFT_CENTER }
}

/// Lines of text one under the other.
struct Block {
    lines: Vec<Arc<Galley>>,
    size: Vec2,
}

impl Block {
    fn new(lines: Vec<Arc<Galley>>) -> Block {
        let size = lines.iter().fold(Vec2::ZERO, |all, line| vec2(all.x.max(line.size().x), all.y + line.size().y));
        Block { lines, size }
    }

    /// Flush with the side that faces the dimension.
    fn paint(self, painter: &Painter, rect: Rect, outward: f32, look: &Look) {
        painter.rect_filled(rect.expand2(vec2(2.0, 0.0)), 0.0, look.board);
        let mut top = rect.top();
        for line in self.lines {
            let left = if outward > 0.0 { rect.left() } else { rect.right() - line.size().x };
            let height = line.size().y;
            painter.galley(pos2(left, top), line, look.ink);
            top += height;
        }
    }
}

/// On which side of the brim the two lines stand.
struct Side {
    /// 1 to the right, -1 to the left.
    sign: f32,
    /// x of available and required.
    lines: [f32; 2],
    /// Both texts outside the second line, one above the other.
    is_stacked: bool,
}

impl Side {
    fn choose(scene: &Scene, brim_x: f32, available_width: f32, required_width: f32) -> Side {
        let area = scene.screen.rect;
        let room = |sign: f32| if sign > 0.0 { scene.dial.rect.left() - brim_x } else { brim_x - area.left() };
        let nearer = if brim_x >= scene.bounds().center().x { 1.0 } else { -1.0 };
        let least = 30.0 + 6.0 + available_width.max(required_width) + 6.0;
        let sign = if room(nearer) < least && room(-nearer) > least { -nearer } else { nearer };
        let apart = available_width + 26.0;
        if room(sign) >= apart + 24.0 + 6.0 + required_width + 6.0 {
            Side { sign, lines: [brim_x + sign * apart, brim_x + sign * (apart + 24.0)], is_stacked: false }
        } else {
            Side { sign, lines: [brim_x + sign * 14.0, brim_x + sign * 30.0], is_stacked: true }
        }
    }
}
