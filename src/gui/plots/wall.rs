//! Gage pressure along the developed outline, under the case and at rest.

use egui::{Align2, Rect, Shape, Ui, pos2, vec2};

use crate::analysis::WallCurve;
use crate::gui::{Desk, font};
use crate::units::{Quantity, number};

use super::chart::{self, Chart, Curve};

pub(super) fn wall_ui(ui: &mut Ui, rect: Rect, curve: &WallCurve, desk: &Desk) {
    let look = desk.look;
    let highest = curve.points.iter().chain(&curve.at_rest).map(|p| p[1].abs()).fold(0.0, f64::max);
    let (along, pressure) = (desk.unit(Quantity::Distance), desk.unit_near(Quantity::GagePressure, highest));
    let shown = |p: &[f64; 2]| [along.from_si(p[0]), pressure.from_si(p[1])];
    let now: Vec<_> = curve.points.iter().map(shown).collect();
    let at_rest: Vec<_> = curve.at_rest.iter().map(shown).collect();
    let Some(end) = now.last().or(at_rest.last()).map(|p| p[0]) else {
        return chart::empty_ui(ui, rect, "Waits for a case with a settled surface", look);
    };
    let chart = Chart {
        id: "pressure along the wall",
        x_words: "along the outline".to_owned(),
        x_unit: along.symbol,
        y_unit: pressure.symbol,
        x: [0.0, end],
        y: with_headroom(chart::range(now.iter().chain(&at_rest).map(|p| p[1]), true)),
        curves: vec![
            Curve { name: "this case", points: now, is_second: false },
            Curve { name: "at rest", points: at_rest.clone(), is_second: true },
        ],
        veiled: Vec::new(),
    };
    let t = chart::chart_ui(ui, rect, chart, look);
    let frame = *t.frame();
    let painter = ui.painter().with_clip_rect(frame.expand2(vec2(8.0, 14.0)));
    let starts: Vec<f32> = curve.edges.iter().map(|(m, _)| t.position_from_point_x(along.from_si(*m))).collect();
    for (i, (_, name)) in curve.edges.iter().enumerate() {
        let (left, right) = (starts[i], starts.get(i + 1).copied().unwrap_or(frame.right()));
        if i > 0 {
            let x = painter.round_to_pixel_center(left);
            let ends = [pos2(x, frame.top()), pos2(x, frame.bottom())];
            painter.extend(Shape::dashed_line(&ends, (1.0, look.line), 1.5, 2.5));
        }
        let galley = painter.layout_no_wrap(name.clone(), font::tick(), look.ink3);
        if galley.size().x + 8.0 < right - left {
            let at = Align2::CENTER_CENTER.anchor_size(pos2(0.5 * (left + right), frame.top() + 4.0), galley.size());
            painter.galley(at.min, galley, look.ink3);
        }
    }
    if let Some(peak) = curve.peak {
        let at = chart::place(&t, shown(&peak));
        chart::dot(&painter, at, look);
        let words = number(pressure.from_si(peak[1]), 3);
        chart::label(&painter, &frame, at + vec2(9.0, -7.0), Align2::LEFT_CENTER, &words, look.accent, look);
    }
    if let Some(rest) = at_rest.iter().copied().max_by(|a, b| a[1].total_cmp(&b[1]))
        && rest[1] > 0.0
    {
        let at = chart::place(&t, rest) + vec2(0.0, 14.0);
        chart::label(&painter, &frame, at, Align2::CENTER_CENTER, "at rest", look.ink2, look);
    }
}

/// Room above the curve for the names of the edges.
fn with_headroom([low, high]: [f64; 2]) -> [f64; 2] {
    [low, high + 0.14 * (high - low)]
}
