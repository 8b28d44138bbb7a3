//! The freeboard dimension: available and required, side by side at the mouth that governs.

use egui::{Align2, Painter, Rect, Stroke, Vec2, pos2, vec2};

use crate::analysis::State;
use crate::geom::Point;
use crate::gui::{Look, font, marks};
use crate::units::{Measure, Quantity};

use super::labels::Labels;
use super::lines;
use super::model::Freeboard;
use super::scene::Scene;

/// Draws the dimension, and takes its place among the labels. Gives the x that the still level has to reach.
pub fn paint_freeboard(
    painter: &Painter,
    scene: &Scene,
    freeboard: &Freeboard,
    labels: &mut Labels,
    look: &Look,
) -> f32 {
    let brim = scene.at(freeboard.brim);
    let still_y = scene.at(Point::new(0.0, freeboard.still_z_m)).y;
    let required_y = still_y - (freeboard.required_m * scene.screen.scale()) as f32;
    let fails = freeboard.state == State::Fails;
    let required_ink = if fails { look.state(State::Fails) } else { look.ink2 };
    let length = |m: f64| Measure::new(Quantity::Length, m).text(scene.units);
    let short_m = freeboard.required_m - freeboard.available_m;
    let required_words = if fails { format!("required, {} short", length(short_m)) } else { "required".to_owned() };
    let texts = [
        (length(freeboard.available_m), "available".to_owned(), look.ink, look.ink2),
        (length(freeboard.required_m), required_words, if fails { required_ink } else { look.ink }, required_ink),
    ]
    .map(|(number, words, number_ink, words_ink)| {
        let number = painter.layout_no_wrap(number, font::body_heavy(), number_ink);
        let words = painter.layout_no_wrap(words, font::small(), words_ink);
        let size = vec2(number.size().x.max(words.size().x), number.size().y + words.size().y);
        (number, words, size)
    });

    let side = Side::choose(scene, brim.x, texts[0].2.x, texts[1].2.x);
    let [x_available, x_required] = side.lines.map(|x| painter.round_to_pixel_center(x));
    let end = x_required + 8.0 * side.sign;
    lines::segment(painter, [brim, pos2(end, brim.y)], Stroke::new(1.0, look.ink3));
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
    let stacked = side.is_stacked.then_some(0.5 * texts[0].2.y + 2.0).unwrap_or_default();
    for (i, (number, words, size)) in texts.into_iter().enumerate() {
        let (x, outward) =
            if i == 0 && !side.is_stacked { (x_available, -side.sign) } else { (x_required, side.sign) };
        let y = middle + if i == 0 { -stacked } else { stacked };
        let align = if outward > 0.0 { Align2::LEFT_CENTER } else { Align2::RIGHT_CENTER };
        let at = |dy: f32| (pos2(x + 8.0 * outward, y + dy), align);
        let rect = labels.place_anyway(size, &[at(0.0), at(-18.0), at(18.0), at(-36.0), at(36.0)]);
        painter.rect_filled(rect.expand2(vec2(2.0, 0.0)), 0.0, look.board);
        let left = |width: f32| if outward > 0.0 { rect.left() } else { rect.right() - width };
        painter.galley(pos2(left(words.size().x), rect.top() + number.size().y), words, look.ink);
        painter.galley(pos2(left(number.size().x), rect.top()), number, look.ink);
    }
    end
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
        let sign = if brim_x >= scene.bounds().center().x { 1.0 } else { -1.0 };
        let area = scene.screen.rect;
        let room = if sign > 0.0 { scene.dial.rect.left() - brim_x } else { brim_x - area.left() };
        let apart = available_width + 26.0;
        if room >= apart + 24.0 + 8.0 + required_width {
            Side { sign, lines: [brim_x + sign * apart, brim_x + sign * (apart + 24.0)], is_stacked: false }
        } else {
            Side { sign, lines: [brim_x + sign * 18.0, brim_x + sign * 38.0], is_stacked: true }
        }
    }
}
