//! The legend of the tints: which colour stands for which gage pressure.

use egui::{Align2, Painter, Rect, pos2, vec2};

use crate::gui::{Look, font};
use crate::units::{Quantity, fixed, number};

use super::liquid::Tint;
use super::scene::Scene;

/// Where it stands: under the bob, where there is room and something is tinted. Gives its bar, and the paper under all
/// of it.
pub fn legend_areas(scene: &Scene) -> Option<(Rect, Rect)> {
    let dial = &scene.dial;
    let bottom = scene.screen.rect.bottom() - 10.0;
    let width = dial.rect.width() - 34.0;
    let bar =
        Rect::from_min_max(pos2(dial.rect.left(), bottom - 28.0), pos2(dial.rect.left() + width, bottom - 17.0));
    let is_tinted = scene.model.bands().any(|b| b.tint != Tint::NotJudged);
    if bar.top() - 20.0 < dial.lowest(&scene.hanging) || !is_tinted {
        return None;
    }
    Some((bar, Rect::from_min_max(bar.min - vec2(6.0, 18.0), pos2(dial.rect.right(), bottom + 2.0))))
}

/// The tints with their pressures.
pub fn paint_legend(painter: &Painter, scene: &Scene, look: &Look) {
    let text = |words: String, font, ink| painter.layout_no_wrap(words, font, ink);
    let (Some(tints), Some((bar, paper))) = (scene.model.tints, legend_areas(scene)) else { return };
    painter.rect_filled(paper, 0.0, look.board);
    let title = text("Gage pressure".to_owned(), font::small(), look.ink2);
    painter.galley(bar.left_top() - vec2(0.0, title.size().y + 1.0), title, look.ink2);
    let x = |i: usize| bar.left() + bar.width() * i as f32 / tints.n as f32;
    for i in 0..tints.n {
        let swatch = Rect::from_x_y_ranges(x(i)..=x(i + 1), bar.y_range());
        painter.rect_filled(swatch, 0.0, look.band(i, tints.n));
    }
    let unit = Quantity::GagePressure.unit(scene.units);
    let every = if tints.n > 5 { 2 } else { 1 };
    let labelled: Vec<usize> = (0..=tints.n).filter(|i| (tints.n - i).is_multiple_of(every)).collect();
    let value = |i: usize| unit.from_si(tints.gage_pa(i));
    let decimals = labelled.iter().map(|&i| decimals_of(value(i))).max().unwrap_or(0);
    for i in labelled {
        let number = text(fixed(value(i), decimals), font::tick(), look.ink3);
        let rect = Align2::CENTER_TOP.anchor_size(pos2(x(i), bar.bottom() + 2.0), number.size());
        painter.galley(rect.min, number, look.ink3);
        if i == tints.n {
            let symbol = text(unit.symbol.to_owned(), font::tick(), look.ink3);
            painter.galley(rect.right_top() + vec2(3.0, 0.0), symbol, look.ink3);
        }
    }
}

/// Decimals that a round number needs.
pub fn decimals_of(step: f64) -> usize {
    let text = number(step, 3);
    let digits = text.split_once('.').map_or("", |(_, fraction)| fraction);
    digits.trim_end_matches('0').len()
}
