//! Lines in the hand of the look: cut at the drawing area, dashed and dotted along their whole length, hatched.
//!
//! Knows no study.

use egui::{Painter, Pos2, Rect, Shape, Stroke, Vec2, pos2, vec2};

/// The part of a segment inside `rect`; none when it stays outside.
pub fn clip(rect: Rect, [a, b]: [Pos2; 2]) -> Option<[Pos2; 2]> {
    let (t0, t1) = clip_range(rect, a, b)?;
    Some([a + (b - a) * t0, a + (b - a) * t1])
}

/// A straight line inside the painter's area, however far its ends lie.
pub fn segment(painter: &Painter, points: [Pos2; 2], stroke: impl Into<Stroke>) {
    if let Some(points) = clip(painter.clip_rect().expand(8.0), points) {
        painter.line_segment(points, stroke);
    }
}

/// A dashed line along `path`.
pub fn dashed(painter: &Painter, path: &[Pos2], stroke: Stroke, dash: f32, gap: f32) {
    dashes(painter, path, stroke, dash, dash + gap, 0.0);
}

/// A line of long dashes and dots.
pub fn dash_dot(painter: &Painter, path: &[Pos2], stroke: Stroke) {
    dashes(painter, path, stroke, 8.0, 15.5, 0.0);
    dashes(painter, path, stroke, 1.5, 15.5, 11.0);
}

/// A dash every `period`, the first one after `offset`.
fn dashes(painter: &Painter, path: &[Pos2], stroke: Stroke, dash: f32, period: f32, offset: f32) {
    let area = painter.clip_rect().expand(8.0);
    let period = f64::from(period);
    let mut walked = -f64::from(offset);
    for pair in path.windows(2) {
        let (a, b) = (pair[0], pair[1]);
        let length = f64::from((b - a).length());
        if let Some((t0, t1)) = clip_range(area, a, b).filter(|_| length > 0.0) {
            let (seen_from, seen_to) = (f64::from(t0) * length, f64::from(t1) * length);
            let at = |along: f64| a + (b - a) * (along / length) as f32;
            let first = ((walked + seen_from) / period).floor();
            let n = ((seen_to - seen_from) / period).ceil() as usize + 2;
            for k in 0..n {
                let start = (first + k as f64) * period - walked;
                let (start, end) = (start.max(seen_from), (start + f64::from(dash)).min(seen_to));
                if end > start {
                    painter.line_segment([at(start), at(end)], stroke);
                }
            }
        }
        walked += length;
    }
}

/// Dots along `path`, as between the posts of a mouth.
pub fn dotted(painter: &Painter, path: &[Pos2], stroke: Stroke) {
    dashed(painter, path, stroke, 1.2, 2.3);
}

/// A dimension line between two points, with oblique ticks.
pub fn dimension(painter: &Painter, ends: [Pos2; 2], stroke: Stroke) {
    segment(painter, ends, stroke);
    let tick = vec2(4.0, -4.0) * std::f32::consts::FRAC_1_SQRT_2;
    for end in ends {
        segment(painter, [end - tick, end + tick], Stroke::new(1.25, stroke.color));
    }
}

/// An arrow from tail to tip, its head 10 long and 7 wide, on a halo.
pub fn arrow(painter: &Painter, tail: Pos2, tip: Pos2, stroke: Stroke, halo: egui::Color32) {
    let along = (tip - tail).normalized();
    if along == Vec2::ZERO {
        return;
    }
    let neck = tip - along * 10.0;
    let head = vec![tip, neck + along.rot90() * 3.5, neck - along.rot90() * 3.5];
    painter.line_segment([tail, neck], Stroke::new(stroke.width + 4.0, halo));
    painter.add(Shape::convex_polygon(head.clone(), halo, Stroke::new(4.0, halo)));
    painter.line_segment([tail, neck], stroke);
    painter.add(Shape::convex_polygon(head, stroke.color, Stroke::NONE));
}

/// A line that stays sharp: moved to the middle of its pixels.
pub fn crisp(painter: &Painter, [a, b]: [Pos2; 2]) -> [Pos2; 2] {
    let round = |v| painter.round_to_pixel_center(v);
    if a.x == b.x {
        [pos2(round(a.x), a.y), pos2(round(b.x), b.y)]
    } else if a.y == b.y {
        [pos2(a.x, round(a.y)), pos2(b.x, round(b.y))]
    } else {
        [a, b]
    }
}

/// Parameters between which a segment is inside `rect` (Liang and Barsky).
fn clip_range(rect: Rect, a: Pos2, b: Pos2) -> Option<(f32, f32)> {
    let d = b - a;
    let (mut t0, mut t1) = (0.0_f32, 1.0_f32);
    let sides =
        [(-d.x, a.x - rect.left()), (d.x, rect.right() - a.x), (-d.y, a.y - rect.top()), (d.y, rect.bottom() - a.y)];
    for (toward, room) in sides {
        if toward == 0.0 {
            if room < 0.0 {
                return None;
            }
        } else if toward < 0.0 {
            t0 = t0.max(room / toward);
        } else {
            t1 = t1.min(room / toward);
        }
    }
    (t0 <= t1).then_some((t0, t1))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_dashed_line_of_any_length_ends() {
        let ctx = egui::Context::default();
        let mut n = 0;
        ctx.run_ui(Default::default(), |ui| {
            let painter = ui.painter().with_clip_rect(Rect::from_min_size(pos2(0.0, 0.0), vec2(100.0, 100.0)));
            let before = painter.add(Shape::Noop);
            dashed(&painter, &[pos2(-1e9, 50.0), pos2(1e9, 50.0)], Stroke::new(1.0, egui::Color32::BLACK), 3.0, 3.0);
            painter.for_each_shape(|_| n += 1);
            painter.set(before, Shape::Noop);
        })
        .drop_without_applying_deltas();
        assert!((10..40).contains(&n), "{n} shapes for 116 points of dashes and gaps of 3");
    }

    #[test]
    fn segments_are_cut_at_the_area() {
        let rect = Rect::from_min_size(pos2(0.0, 0.0), vec2(10.0, 10.0));
        assert_eq!(clip(rect, [pos2(-5.0, 5.0), pos2(15.0, 5.0)]), Some([pos2(0.0, 5.0), pos2(10.0, 5.0)]));
        assert_eq!(clip(rect, [pos2(2.0, 2.0), pos2(3.0, 3.0)]), Some([pos2(2.0, 2.0), pos2(3.0, 3.0)]));
        assert_eq!(clip(rect, [pos2(-5.0, 11.0), pos2(15.0, 11.0)]), None);
        assert_eq!(clip(rect, [pos2(-5.0, 4.0), pos2(4.0, -5.0)]), None, "past a corner");
    }
}
