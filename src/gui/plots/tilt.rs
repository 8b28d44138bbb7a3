//! Tilt of the settled surface against the size of the acceleration, along the case's own direction.

use egui::{Align2, Rect, Ui, pos2, vec2};

use crate::analysis::{State, TiltCurve};
use crate::gui::Desk;
use crate::units::{Measure, Quantity};

use super::chart::{self, Chart, Curve};

pub(super) fn tilt_ui(ui: &mut Ui, rect: Rect, curve: &TiltCurve, desk: &Desk) {
    let look = desk.look;
    let (accel, angle) = (desk.unit(Quantity::Acceleration), desk.unit(Quantity::Angle));
    let shown = |p: &[f64; 2]| [accel.from_si(p[0]), angle.from_si(p[1])];
    let points: Vec<_> = curve.points.iter().map(shown).collect();
    let x = match (points.first(), points.last()) {
        (Some(first), Some(last)) if first[0] < last[0] => [first[0], last[0]],
        _ => return chart::empty_ui(ui, rect, "Waits for a case with an acceleration", look),
    };
    let spills_at = curve.spills_at.map(|a| accel.from_si(a));
    let chart = Chart {
        id: "tilt against acceleration",
        x_words: curve.axis_words.to_owned(),
        x_unit: accel.symbol,
        y_unit: "degrees",
        x,
        y: chart::range(points.iter().map(|p| p[1]), false),
        curves: vec![Curve { name: "tilt", points, is_second: false }],
        veiled: spills_at.map(|a| if a < 0.0 { [x[0], a] } else { [a, x[1]] }).into_iter().collect(),
    };
    let t = chart::chart_ui(ui, rect, chart, look);
    let frame = *t.frame();
    let painter = ui.painter().with_clip_rect(frame.expand(8.0));
    if let (Some(a), Some(si)) = (spills_at, curve.spills_at) {
        let x = painter.round_to_pixel_center(t.position_from_point_x(a));
        let fails = look.state(State::Fails);
        painter.vline(x, frame.y_range(), (1.25, fails));
        let words = format!("spills at {}", Measure::new(Quantity::Acceleration, si).number(desk.units(), 3));
        let is_left = x > frame.center().x;
        let anchor = if is_left { Align2::RIGHT_CENTER } else { Align2::LEFT_CENTER };
        let aside = if is_left { -6.0 } else { 6.0 };
        chart::label(&painter, &frame, pos2(x + aside, frame.bottom() - 12.0), anchor, &words, fails, look);
    }
    for (i, point) in &curve.others {
        let at = chart::place(&t, shown(point));
        chart::ring(&painter, at, 2.8, look.ink2, look);
        chart::label(
            &painter,
            &frame,
            at + vec2(0.0, 11.0),
            Align2::CENTER_CENTER,
            &(i + 1).to_string(),
            look.ink2,
            look,
        );
    }
    if let Some(now) = curve.now {
        let at = chart::place(&t, shown(&now));
        chart::dot(&painter, at, look);
        let number = (desk.view.case_idx + 1).to_string();
        chart::label(&painter, &frame, at + vec2(8.0, -9.0), Align2::LEFT_CENTER, &number, look.accent, look);
    }
}
