//! Required and available freeboard against fill, at the mouth that governs.

use egui::{Align2, Rect, Ui, pos2, vec2};

use crate::analysis::{FreeboardCurve, State};
use crate::gui::Desk;
use crate::units::{Quantity, fixed};

use super::chart::{self, Chart, Curve};

pub(super) fn freeboard_ui(ui: &mut Ui, rect: Rect, curve: &FreeboardCurve, desk: &Desk) {
    let look = desk.look;
    if let Some(why) = &curve.absent {
        return chart::empty_ui(ui, rect, why, look);
    }
    let (fill, length) = (desk.unit(Quantity::Share), desk.unit(Quantity::Length));
    let shown = |p: &[f64; 2]| [fill.from_si(p[0]), length.from_si(p[1])];
    let required: Vec<_> = curve.required.iter().map(shown).collect();
    let available: Vec<_> = curve.available.iter().map(shown).collect();
    let x = match (required.first(), required.last()) {
        (Some(first), Some(last)) if first[0] < last[0] => [first[0], last[0]],
        _ => return chart::empty_ui(ui, rect, "Waits for a fill and a mouth", look),
    };
    let holds_to = curve.holds_to.as_ref().map(shown);
    let now = curve.now.as_ref().map(shown);
    // Near a full tank the required freeboard can grow without bound: it may leave the plot.
    let highest = available.iter().chain(&holds_to).chain(&now).map(|p| p[1]).fold(0.0, f64::max);
    let y = chart::range(required.iter().chain(&available).map(|p| p[1].clamp(-0.1 * highest, 1.4 * highest)), true);
    let chart = Chart {
        id: "freeboard against fill",
        x_words: "fill".to_owned(),
        x_unit: fill.symbol,
        y_unit: length.symbol,
        x,
        y,
        curves: vec![
            Curve { name: "required", points: required.clone(), is_second: false },
            Curve { name: "available", points: available.clone(), is_second: true },
        ],
        veiled: holds_to.map(|p| [p[0], x[1]]).into_iter().collect(),
    };
    let t = chart::chart_ui(ui, rect, chart, look);
    let painter = ui.painter().with_clip_rect(t.frame().expand(8.0));
    chart::name(&painter, &t, &required, 0.12, "required", look);
    chart::name(&painter, &t, &available, 0.35, "available", look);
    if let Some(now) = now {
        let at = chart::place(&t, now);
        painter.vline(painter.round_to_pixel_center(at.x), t.frame().y_range(), (1.25, look.accent));
        chart::dot(&painter, at, look);
    }
    if let Some(holds_to) = holds_to {
        let at = chart::place(&t, holds_to);
        let fails = look.state(State::Fails);
        chart::ring(&painter, at, 3.5, fails, look);
        let words = format!("holds to {} {}", fixed((holds_to[0] * 10.0).floor() / 10.0, 1), fill.symbol);
        chart::label(&painter, t.frame(), at - vec2(8.0, 20.0), Align2::RIGHT_CENTER, &words, fails, look);
    }
    if !curve.mouth.is_empty() {
        let at = pos2(rect.right(), rect.top() + 6.0);
        ui.painter().text(at, Align2::RIGHT_CENTER, &curve.mouth, crate::gui::font::tick(), look.ink3);
    }
}
