//! What the plots share: ground, axes, curves, hatches, labels on the curve. No legend, no frame.

use egui::{Align2, Color32, Painter, Pos2, Rect, Shape, Stroke, Ui, UiBuilder, pos2, vec2};
use egui_plot::{AxisHints, GridMark, HoverPosition, Line, Plot, PlotPoint, PlotPoints, PlotTransform};

use crate::gui::{Look, font, marks};
use crate::units::{fixed, number};

/// A curve in shown units.
pub struct Curve<'a> {
    /// Written on it, and beside a point that is hovered.
    pub name: &'a str,
    /// Abscissa and ordinate.
    pub points: Vec<[f64; 2]>,
    /// The first curve is drawn full, the second dashed.
    pub is_second: bool,
}

/// Axes and curves of one plot.
pub struct Chart<'a> {
    /// Unique in the window.
    pub id: &'static str,
    /// Words and unit of the x axis.
    pub x_words: String,
    /// Unit of the x axis.
    pub x_unit: &'a str,
    /// Unit of the y axis.
    pub y_unit: &'a str,
    /// Ends of the x axis.
    pub x: [f64; 2],
    /// Ends of the y axis.
    pub y: [f64; 2],
    /// Curves.
    pub curves: Vec<Curve<'a>>,
    /// Ranges along x that are hatched.
    pub veiled: Vec<[f64; 2]>,
}

/// The plot in `rect`. Gives where it lies, to draw marks over it.
pub fn chart_ui(ui: &mut Ui, rect: Rect, chart: Chart, look: &Look) -> PlotTransform {
    // Clear of a number at the very top of the axis.
    let unit_at = pos2(rect.left(), rect.top() + 5.0);
    ui.painter().text(unit_at, Align2::LEFT_CENTER, chart.y_unit, font::tick(), look.ink2);
    let ground = ui.painter().add(Shape::Noop);
    let (x, y) = (chart.x, chart.y);
    let words = format!("{} {}", chart.x_words, chart.x_unit).trim().to_owned();
    let words = ui.painter().layout_no_wrap(words, font::tick(), look.ink2);
    // Ticks that would meet the words at the end of the axis stay without a number.
    let last_tick = x[1] - (x[1] - x[0]) * f64::from((words.size().x + 12.0) / (rect.width() - 34.0).max(1.0));
    let axis = |hints: AxisHints<'static>, last: f64| {
        let hints = hints.tick_label_font(font::tick()).tick_label_color(look.ink3);
        // A range without width: a tick is there or not, never half faded.
        let hints = hints.label_spacing(egui::Rangef::new(8.0, 8.0));
        hints.formatter(move |mark, _| match mark.value <= last {
            true => fixed(mark.value, decimals(mark.step_size)),
            false => String::new(),
        })
    };
    let names: Vec<(String, &str, &str)> =
        chart.curves.iter().map(|c| (c.name.to_owned(), chart.x_unit, chart.y_unit)).collect();
    let plot = Plot::new(chart.id)
        .custom_x_axes(vec![axis(AxisHints::new_x().min_thickness(16.0), last_tick)])
        .custom_y_axes(vec![axis(AxisHints::new_y().min_thickness(30.0), f64::INFINITY)])
        .x_grid_spacer(move |input| marks_every(input.bounds, rect.width() / 60.0))
        .y_grid_spacer(move |input| marks_every(input.bounds, rect.height() / 34.0))
        .show_background(false)
        .show_grid([false, true])
        .grid_color(look.grid2)
        .grid_fade(0.0)
        .allow_drag(false)
        .allow_zoom(false)
        .allow_scroll(false)
        .allow_boxed_zoom(false)
        .allow_axis_zoom_drag(false)
        .allow_double_click_reset(false)
        .set_margin_fraction(egui::Vec2::ZERO)
        .cursor_color(look.line)
        .show_crosshair(false)
        .label_formatter(move |at| hover_words(at, &names));
    let body = rect.with_min_y(rect.top() + 17.0);
    let mut child = ui.new_child(UiBuilder::new().max_rect(body).id_salt(chart.id));
    let points: Vec<Vec<PlotPoint>> = chart.curves.iter().map(|curve| thinned(&curve.points, x, y)).collect();
    let response = plot.show(&mut child, |plot_ui| {
        plot_ui.set_plot_bounds_x(x[0]..=x[1]);
        plot_ui.set_plot_bounds_y(y[0]..=y[1]);
        for (curve, points) in chart.curves.iter().zip(&points) {
            // For the hand alone: egui_plot sets points on whole pixels, which makes steep curves thin.
            plot_ui.line(Line::new(curve.name, PlotPoints::Borrowed(points)).color(look.ink).width(0.0));
        }
    });
    let transform = response.transform;
    let frame = *transform.frame();
    let mut under = Vec::new();
    for range in chart.veiled {
        let (a, b) = (transform.position_from_point_x(range[0]), transform.position_from_point_x(range[1]));
        let veil = frame.with_min_x(a.min(b).max(frame.left())).with_max_x(a.max(b).min(frame.right()));
        if veil.width() > 1.0 {
            under.push(marks::hatch(veil, 7.0, Stroke::new(1.0, look.veil)));
        }
    }
    ui.painter().set(ground, Shape::Vec(under));
    let inside = ui.painter().with_clip_rect(frame.expand(1.0).intersect(ui.clip_rect()));
    for (curve, points) in chart.curves.iter().zip(&points) {
        let path: Vec<Pos2> = points.iter().map(|p| transform.position_from_point(p)).collect();
        if curve.is_second {
            inside.extend(Shape::dashed_line(&path, (1.4, look.ink2), 5.0, 3.5));
        } else {
            inside.line(path, Stroke::new(1.75, look.ink));
        }
    }
    let base = ui.painter().round_to_pixel_center(frame.bottom());
    ui.painter().hline(frame.x_range(), base, (1.0, look.ink3));
    let end = pos2(frame.right(), frame.bottom() + 9.0);
    let at = Align2::RIGHT_CENTER.anchor_size(end, words.size());
    ui.painter().galley(at.min, words, look.ink2);
    let words = format!("Plot of {}", chart.id);
    response.response.widget_info(|| egui::WidgetInfo::labeled(egui::Role::Image, true, &words));
    transform
}

/// In the place of a plot that has nothing to show yet: what it waits for.
pub fn empty_ui(ui: &Ui, rect: Rect, words: &str, look: &Look) {
    let galley = ui.painter().layout(words.to_owned(), font::small(), look.ink3, rect.width() - 24.0);
    let at = Align2::CENTER_CENTER.anchor_size(rect.center(), galley.size());
    ui.painter().galley(at.min, galley, look.ink3);
}

/// Where a point lies on the screen.
pub fn place(transform: &PlotTransform, point: [f64; 2]) -> Pos2 {
    transform.position_from_point(&PlotPoint::new(point[0], point[1]))
}

/// The accent dot of what is now.
pub fn dot(painter: &Painter, at: Pos2, look: &Look) {
    painter.circle_filled(at, 6.0, look.board);
    painter.circle_filled(at, 4.5, look.accent);
}

/// A hollow dot.
pub fn ring(painter: &Painter, at: Pos2, radius: f32, color: Color32, look: &Look) {
    painter.circle(at, radius, look.board, Stroke::new(1.4, color));
}

/// The name of a curve beside it, at `share` of its length along x, on the side where there is room.
pub fn name(painter: &Painter, transform: &PlotTransform, curve: &[[f64; 2]], share: f64, words: &str, look: &Look) {
    let frame = transform.frame();
    let seen: Vec<Pos2> =
        curve.iter().map(|p| place(transform, *p)).filter(|p| frame.expand(1.0).contains(*p)).collect();
    let Some(at) = seen.get(((seen.len() as f64 - 1.0) * share).max(0.0) as usize) else { return };
    let above = at.y - 12.0 > frame.top() + 4.0;
    let y = if above { at.y - 12.0 } else { at.y + 12.0 };
    label(painter, frame, pos2(at.x, y), Align2::CENTER_CENTER, words, look.ink, look);
}

/// A label that is kept within the plot.
pub fn label(painter: &Painter, frame: &Rect, at: Pos2, anchor: Align2, words: &str, color: Color32, look: &Look) {
    let galley = painter.layout_no_wrap(words.to_owned(), font::tick(), color);
    let rect = anchor.anchor_size(at, galley.size());
    let shift = vec2(
        (frame.left() + 3.0 - rect.left()).max(0.0) - (rect.right() + 3.0 - frame.right()).max(0.0),
        (frame.top() + 1.0 - rect.top()).max(0.0) - (rect.bottom() + 1.0 - frame.bottom()).max(0.0),
    );
    let rect = rect.translate(shift);
    painter.rect_filled(rect.expand2(vec2(2.0, -1.0)), 0.0, look.board);
    painter.galley(rect.min, galley, color);
}

/// A range that holds all values with a little air, and never collapses.
pub fn range(values: impl Iterator<Item = f64>, with_zero: bool) -> [f64; 2] {
    let start = if with_zero { (0.0, 0.0) } else { (f64::INFINITY, f64::NEG_INFINITY) };
    let (low, high) = values.filter(|v| v.is_finite()).fold(start, |(low, high), v| (v.min(low), v.max(high)));
    if low > high {
        return [0.0, 1.0];
    }
    let span = if high > low { high - low } else { high.abs().max(1.0) };
    let air = 0.06 * span;
    [if with_zero && low == 0.0 { 0.0 } else { low - air }, if with_zero && high == 0.0 { 0.0 } else { high + air }]
}

/// Points that stand apart on the screen: a stroke has no direction where several lie in one place.
fn thinned(points: &[[f64; 2]], x: [f64; 2], y: [f64; 2]) -> Vec<PlotPoint> {
    const APART: f64 = 1.0 / 600.0;
    let mut kept: Vec<PlotPoint> = Vec::with_capacity(points.len());
    for (i, p) in points.iter().enumerate() {
        let is_apart = kept.last().is_none_or(|last| {
            (p[0] - last.x).abs() > APART * (x[1] - x[0]) || (p[1] - last.y).abs() > APART * (y[1] - y[0])
        });
        if !is_apart && i + 1 == points.len() {
            kept.pop();
        }
        if is_apart || i + 1 == points.len() {
            kept.push(PlotPoint::new(p[0], p[1]));
        }
    }
    kept
}

/// Marks at 1, 2 or 5 times a power of ten, about `n` of them and at least three.
fn marks_every((low, high): (f64, f64), n: f32) -> Vec<GridMark> {
    let n = f64::from(n.clamp(3.0, 12.0));
    let power = 10_f64.powf(((high - low) / n).log10().floor());
    if !power.is_finite() || power <= 0.0 {
        return Vec::new();
    }
    let marks = |step: f64| -> Vec<GridMark> {
        let (first, last) = ((low / step).ceil() as i64, (high / step).floor() as i64);
        (first..=last).map(|i| GridMark { value: i as f64 * step, step_size: step }).collect()
    };
    let enough = (0.6 * n).max(3.0) as usize;
    let steps = [10.0, 5.0, 2.0, 1.0, 0.5].map(|m| m * power);
    steps.into_iter().map(marks).find(|marks| marks.len() >= enough).unwrap_or_default()
}

fn decimals(step: f64) -> usize {
    (-(step.log10() + 1e-9).floor()).clamp(0.0, 6.0) as usize
}

fn hover_words(at: &HoverPosition, names: &[(String, &str, &str)]) -> Option<String> {
    let HoverPosition::NearDataPoint { plot_name, position, .. } = at else { return None };
    let (_, x_unit, y_unit) = names.iter().find(|(name, ..)| name == plot_name)?;
    Some(format!("{plot_name}\n{} {x_unit}, {} {y_unit}", number(position.x, 3), number(position.y, 3)))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_range_never_collapses_and_keeps_zero_as_a_floor() {
        assert_eq!(range([].into_iter(), false), [0.0, 1.0]);
        assert_eq!(range([f64::NAN, f64::INFINITY].into_iter(), false), [0.0, 1.0]);
        assert_eq!(range([2.0, 12.0].into_iter(), true), [0.0, 12.72]);
        let [low, high] = range([5.0, 5.0].into_iter(), false);
        assert!(low < 5.0 && high > 5.0);
    }

    #[test]
    fn thinning_keeps_both_ends_and_drops_what_lies_in_one_place() {
        let points = [[0.0, 0.0], [0.0, 0.0], [0.0, 0.0], [0.5, 2.0], [0.9999, 1.0], [1.0, 1.0]];
        let got: Vec<[f64; 2]> = thinned(&points, [0.0, 1.0], [0.0, 2.0]).iter().map(|p| [p.x, p.y]).collect();
        assert_eq!(got, [[0.0, 0.0], [0.5, 2.0], [1.0, 1.0]]);
        assert!(thinned(&[], [0.0, 1.0], [0.0, 1.0]).is_empty());
    }

    #[test]
    fn marks_are_round_and_about_as_many_as_asked() {
        for (low, high) in [(0.0, 1.0), (-37.0, 42.5), (60.0, 95.0), (0.0, 1234.0), (-1e-3, 2e-3)] {
            for n in [3.0, 5.0, 8.0] {
                let marks = marks_every((low, high), n);
                assert!((3..=9).contains(&marks.len()), "{low}..{high}, {n}: {} marks", marks.len());
                assert!(marks.iter().all(|m| low <= m.value && m.value <= high));
            }
        }
        assert!(marks_every((1.0, 1.0), 5.0).is_empty(), "no range, no marks");
    }

    #[test]
    fn ticks_have_the_decimals_of_their_step() {
        for (step, want) in [(1.0, 0), (10.0, 0), (0.5, 1), (0.1, 1), (0.02, 2)] {
            assert_eq!(decimals(step), want, "step {step}");
        }
    }
}
