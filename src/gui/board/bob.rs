//! The plumb bob: it hangs along effective gravity, and dragging it sets the acceleration.
//!
//! One scale ties points on the screen to m/s2: tip = pivot + G. Knows no section.

use egui::{Align2, Painter, Pos2, Rect, Shape, Stroke, pos2, vec2};

use crate::geom::Vec2;
use crate::gui::{Look, font};
use crate::units::{Measure, Quantity, UnitSystem};

use super::holds::Holds;
use super::labels::Labels;
use super::lines;

/// Length of the drop, points.
const DROP: f32 = 27.0;

/// Width of the block from which its words stand in one line, points.
const WIDE: f32 = 150.0;

/// Radius of the free-fall circle at the pivot, points.
const FREE_FALL: f32 = 7.0;

/// Where the bob hangs on the board, and how many points one m/s2 is long.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dial {
    /// The block at the right of the board.
    pub rect: Rect,
    /// Free fall.
    pub pivot: Pos2,
    /// Points per m/s2.
    pub scale: f32,
    /// Distance between two rings about rest, m/s2: 2 of the shown unit, or more where rings would touch.
    ring_step: f32,
}

/// What hangs there.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Hanging {
    /// Effective gravity of the case shown, m/s2; none while the section has faults.
    pub now: Option<Vec2>,
    /// Effective gravity at rest.
    pub rest: Vec2,
    /// Tilt of the settled surface, radians.
    pub tilt_rad: Option<f64>,
    /// Other cases: number as shown, effective gravity.
    pub others: Vec<(usize, Vec2)>,
    /// How far it may go.
    pub holds: Option<Holds>,
    /// The pointer is over it.
    pub is_pointed_at: bool,
}

impl Dial {
    /// A block at the right of the drawing area, in a scale in which all of `shown` stay inside it, and `others`
    /// too unless that would make it less than half as large.
    pub fn new(area: Rect, shown: &[Vec2], others: &[Vec2], units: UnitSystem) -> Dial {
        let width = (0.26 * area.width()).clamp(116.0, 196.0).min(area.width());
        let rect = Rect::from_min_max(pos2(area.right() - width - 8.0, area.top() + 8.0), area.max);
        // Under the words, and lower where the bob of some case hangs upward.
        let words = words_height(width);
        let up = if shown.iter().chain(others).any(|g| g.y > 0.0) { DROP + 30.0 } else { 28.0 };
        let top = rect.top() + words + up;
        let wanted = ((area.height() - 244.0) / 16.0).clamp(6.0, 14.0);
        let (side, down) = (rect.width() - 28.0, rect.bottom() - top - DROP - 12.0);
        let fit = |reach: Reach| {
            let rooms = [(side, reach.right - reach.left), (down, reach.down), (up - DROP, reach.up)];
            rooms.into_iter().fold(wanted, |scale, (room, needed)| scale.min(room.max(1.0) / needed.max(1e-3)))
        };
        let all = Reach::of(shown.iter().chain(others));
        let (least, scale) = (0.5 * fit(Reach::of(shown)), fit(all));
        let (reach, scale) = if scale >= least { (all, scale) } else { (Reach::of(shown), 2.0 * least) };
        let scale = scale.max(1e-6);
        // In the middle, unless that would leave a bob outside.
        let x = rect.center().x.min(rect.right() - 14.0 - reach.right * scale);
        let pivot = pos2(x.max(rect.left() + 14.0 - reach.left * scale), top);
        let unit = Quantity::Acceleration.unit(units).in_si as f32;
        let mut steps = (0..7).flat_map(|k| [2.0, 5.0, 10.0].map(|m| m * 10f32.powi(k) * unit));
        let ring_step = steps.find(|step| step * scale >= 10.0).unwrap_or(f32::MAX);
        Dial { rect, pivot, scale, ring_step }
    }

    /// Where the thread ends for an effective gravity.
    pub fn tip(&self, gravity: Vec2) -> Pos2 {
        self.pivot + vec2(gravity.x as f32, -gravity.y as f32) * self.scale
    }

    /// The effective gravity for which the thread ends at `pos`.
    pub fn gravity_at(&self, pos: Pos2) -> Vec2 {
        let off = (pos - self.pivot) / self.scale;
        Vec2::new(f64::from(off.x), f64::from(-off.y))
    }

    /// Whether `pos` is on the drop or on the end of the thread.
    pub fn is_on_drop(&self, gravity: Vec2, pos: Pos2) -> bool {
        let tip = self.tip(gravity);
        let off = pos - tip;
        let along = self.hangs_along(gravity);
        let (down, across) = (off.dot(along), off.dot(along.rot90()));
        (-6.0..=DROP + 3.0).contains(&down) && across.abs() <= 9.0
    }

    /// What the words, and the drawing under them, keep for themselves.
    pub fn areas(&self, hanging: &Hanging) -> [Rect; 2] {
        let drawing = self.drawing(hanging);
        let holds = hanging.holds.as_ref().and_then(|holds| holds.area(self));
        [self.words().expand(4.0), holds.map_or(drawing, |holds| drawing.union(holds))]
    }

    /// Where the words stand.
    pub fn words(&self) -> Rect {
        self.rect.with_max_y(self.rect.top() + words_height(self.rect.width()))
    }

    /// What is drawn round the bob and the cases.
    fn drawing(&self, hanging: &Hanging) -> Rect {
        let mark = |at: Pos2, half: f32| Rect::from_center_size(at, egui::Vec2::splat(2.0 * half));
        let rings = self.rings(hanging.rest).last().unwrap_or(0.0) * self.scale;
        let mut drawing = mark(self.pivot, 12.0).union(mark(self.tip(hanging.rest), rings + 2.0));
        let tips = hanging.others.iter().map(|(_, g)| self.tip(*g)).filter(|tip| self.shows(*tip));
        for tip in tips {
            drawing = drawing.union(mark(tip, 14.0));
        }
        if let Some(now) = hanging.now {
            drawing = drawing
                .union(mark(self.tip(now), 8.0))
                .union(mark(self.tip(now) + self.hangs_along(now) * DROP, 6.0));
        } else {
            drawing = drawing.union(self.rect.with_min_y(self.pivot.y).with_max_y(self.pivot.y + 130.0));
        }
        drawing
    }

    /// Lowest point that bob and cases need.
    pub fn lowest(&self, hanging: &Hanging) -> f32 {
        self.drawing(hanging).bottom()
    }

    fn hangs_along(&self, gravity: Vec2) -> egui::Vec2 {
        let along = (self.tip(gravity) - self.pivot).normalized();
        if along == egui::Vec2::ZERO { vec2(0.0, 1.0) } else { along }
    }

    /// Radii of the rings about rest, m/s2, as many as the block has room for.
    fn rings(&self, rest: Vec2) -> impl Iterator<Item = f32> + use<> {
        let x = self.tip(rest).x;
        let room = (x - self.rect.left()).min(self.rect.right() - x) + 6.0;
        let (step, most) = (self.ring_step, room / self.scale);
        (1..=3).map(move |k| k as f32 * step).filter(move |radius| *radius <= most)
    }

    /// Whether the block has room for a mark at `tip`.
    fn shows(&self, tip: Pos2) -> bool {
        self.rect.with_min_y(self.rect.top() + 30.0).contains(tip)
    }
}

/// Height of the words above the drawing.
fn words_height(block_width: f32) -> f32 {
    if block_width < WIDE { 52.0 } else { 36.0 }
}

/// How far effective gravities reach from the pivot, m/s2.
#[derive(Clone, Copy)]
struct Reach {
    left: f32,
    right: f32,
    up: f32,
    down: f32,
}

impl Reach {
    fn of<'g>(gravities: impl IntoIterator<Item = &'g Vec2>) -> Reach {
        let nothing = Reach { left: 0.0, right: 0.0, up: 0.0, down: 0.0 };
        gravities.into_iter().fold(nothing, |reach, g| {
            let (x, y) = (g.x as f32, -g.y as f32);
            Reach {
                left: reach.left.min(x),
                right: reach.right.max(x),
                up: reach.up.max(-y),
                down: reach.down.max(y),
            }
        })
    }
}

/// Draws the block: words, rings, cases, thread and drop.
pub fn paint_bob(painter: &Painter, dial: &Dial, hanging: &Hanging, units: UnitSystem, look: &Look) {
    let rect = dial.rect;
    painter.text(rect.left_top() + vec2(0.0, 2.0), Align2::LEFT_TOP, "Plumb bob", font::body_heavy(), look.ink);
    let Some(now) = hanging.now else {
        paint_waiting(painter, dial, look);
        return;
    };
    let gravity = Measure::new(Quantity::Acceleration, now.norm());
    let tilt = hanging.tilt_rad.map(|t| crate::units::fixed(t.to_degrees(), 1));
    let number = gravity.number(units, 4);
    let unit = format!(" {}", Quantity::Acceleration.unit(units).symbol);
    let (first, second) = match &tilt {
        Some(tilt) => ("tilt ", format!("{tilt}°")),
        None => ("free fall", String::new()),
    };
    let tilt = [(first, font::small(), look.ink3), (second.as_str(), font::small_figure(), look.ink)];
    let size = [
        ("|G| ", font::small(), look.ink3),
        (number.as_str(), font::small_figure(), look.ink),
        (unit.as_str(), font::small(), look.ink3),
    ];
    let rows = if rect.width() < WIDE {
        vec![font::runs(tilt), font::runs(size)]
    } else {
        vec![font::runs(tilt.into_iter().chain([("   ", font::small(), look.ink3)]).chain(size))]
    };
    for (i, row) in rows.into_iter().enumerate() {
        let row = painter.layout_job(row);
        painter.galley(rect.left_top() + vec2(0.0, 19.0 + 16.0 * i as f32), row, look.ink);
    }

    let mut labels = Labels::new(rect.expand(6.0));
    if let Some(holds) = &hanging.holds {
        holds.paint_ground(painter, dial, look);
    }
    paint_rings(painter, dial, hanging, &mut labels, units, look);
    paint_cases(painter, dial, hanging, &mut labels, look);
    if let Some(holds) = &hanging.holds {
        holds.paint_edge(painter, dial, &mut labels, look);
    }

    let (tip, along) = (dial.tip(now), dial.hangs_along(now));
    let across = along.rot90();
    painter.line_segment([dial.pivot, tip], Stroke::new(5.5, look.board));
    let facet = |points: [(f32, f32); 4], color| {
        let points = points.map(|(a, b)| tip + across * a + along * b).to_vec();
        Shape::convex_polygon(points, color, Stroke::NONE)
    };
    let outline = [(-2.0, 0.0), (2.0, 0.0), (6.5, 9.0), (0.0, DROP), (-6.5, 9.0)];
    let halo = outline.map(|(a, b)| tip + across * a + along * b).to_vec();
    painter.add(Shape::convex_polygon(halo, look.board, Stroke::new(4.0, look.board)));
    painter.line_segment([dial.pivot, tip], Stroke::new(1.5, look.accent));
    let lit = look.accent.lerp_to_gamma(look.board, 0.28);
    painter.add(facet([(0.0, 0.0), (2.0, 0.0), (6.5, 9.0), (0.0, DROP)], look.accent));
    painter.add(facet([(0.0, 0.0), (-2.0, 0.0), (-6.5, 9.0), (0.0, DROP)], lit));
    painter.line_segment([tip - across * 3.0, tip + across * 3.0], Stroke::new(2.0, look.accent));
    if hanging.is_pointed_at {
        painter.circle_stroke(tip + along * 11.0, 18.0, Stroke::new(1.0, look.accent));
    }
    paint_pivot(painter, dial.pivot, look.ink);
}

fn paint_waiting(painter: &Painter, dial: &Dial, look: &Look) {
    let (pivot, tip) = (dial.pivot, dial.pivot + vec2(0.0, 74.0));
    let grey = look.ink3.gamma_multiply(crate::gui::look::STALE_OPACITY);
    painter.line_segment([pivot, tip], Stroke::new(1.5, grey));
    let points = [(-2.0, 0.0), (2.0, 0.0), (6.5, 9.0), (0.0, DROP), (-6.5, 9.0)].map(|(a, b)| tip + vec2(a, b));
    painter.add(Shape::convex_polygon(points.to_vec(), grey, Stroke::NONE));
    paint_pivot(painter, pivot, grey);
    let at = tip + vec2(0.0, DROP + 12.0);
    painter.text(at, Align2::CENTER_TOP, "waits for a section", font::small(), look.ink2);
}

fn paint_pivot(painter: &Painter, pivot: Pos2, color: egui::Color32) {
    painter.line_segment(lines::crisp(painter, [pivot - vec2(12.0, 0.0), pivot + vec2(12.0, 0.0)]), (1.5, color));
    painter.circle_filled(pivot, 2.2, color);
}

fn paint_rings(
    painter: &Painter,
    dial: &Dial,
    hanging: &Hanging,
    labels: &mut Labels,
    units: UnitSystem,
    look: &Look,
) {
    let rest = dial.tip(hanging.rest);
    let ring = Stroke::new(1.0, look.line2);
    let reach = vec2(0.0, dial.rings(hanging.rest).last().unwrap_or(0.0) * dial.scale);
    lines::dashed(painter, &[rest - reach, rest + reach], ring, 1.2, 2.3);
    let unit = Quantity::Acceleration.unit(units);
    for accel in dial.rings(hanging.rest) {
        let radius = accel * dial.scale;
        painter.circle_stroke(rest, radius, ring);
        let at = rest + radius * egui::Vec2::angled(2.2);
        let text = crate::units::number(unit.from_si(f64::from(accel)), 2);
        let text = text.strip_suffix(".0").unwrap_or(&text).to_owned();
        let galley = painter.layout_no_wrap(text, font::tick(), look.ink3);
        if let Some(rect) = labels.place(galley.size(), [(at, Align2::CENTER_CENTER)]) {
            painter.rect_filled(rect.shrink2(vec2(0.0, 2.0)), 0.0, look.board);
            painter.galley(rect.min, galley, look.ink3);
        }
    }
    let n = 18;
    for i in 0..n {
        let turn = std::f32::consts::TAU * i as f32 / n as f32;
        painter.circle_filled(dial.pivot + FREE_FALL * egui::Vec2::angled(turn), 0.6, look.ink3);
    }
}

fn paint_cases(painter: &Painter, dial: &Dial, hanging: &Hanging, labels: &mut Labels, look: &Look) {
    for (_, gravity) in &hanging.others {
        labels.keep_off(Rect::from_center_size(dial.tip(*gravity), vec2(7.0, 7.0)));
    }
    if let Some(now) = hanging.now {
        let (tip, along) = (dial.tip(now), dial.hangs_along(now));
        labels.keep_off(Rect::from_center_size(tip + along * 12.0, vec2(14.0, 26.0)));
        labels.keep_off_line(&[dial.pivot, tip]);
    }
    for (number, gravity) in &hanging.others {
        let at = dial.tip(*gravity);
        if !dial.shows(at) {
            continue;
        }
        painter.circle(at, 3.2, look.board, Stroke::new(1.25, look.ink2));
        let galley = painter.layout_no_wrap(number.to_string(), font::tick_figure(), look.ink2);
        let places = [
            (at + vec2(5.5, 0.0), Align2::LEFT_CENTER),
            (at - vec2(5.5, 0.0), Align2::RIGHT_CENTER),
            (at - vec2(0.0, 4.0), Align2::CENTER_BOTTOM),
            (at + vec2(0.0, 4.0), Align2::CENTER_TOP),
        ];
        if let Some(rect) = labels.place(galley.size(), places) {
            painter.galley(rect.min, galley, look.ink2);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use Vec2;

    #[test]
    fn tip_and_gravity_invert_each_other_and_all_cases_fit() {
        let area = Rect::from_min_size(pos2(264.0, 90.0), vec2(704.0, 398.0));
        let gravities = [Vec2::new(3.92, -9.81), Vec2::new(-25.0, -4.0), Vec2::new(0.0, 6.0), Vec2::new(0.0, 0.0)];
        let dial = Dial::new(area, &gravities, &[], UnitSystem::Si);
        for g in gravities {
            let tip = dial.tip(g);
            assert!(dial.rect.contains(tip), "{g:?} hangs at {tip:?}, outside {:?}", dial.rect);
            let back = dial.gravity_at(tip);
            assert!((back - g).norm() < 1e-3, "{g:?} came back as {back:?}");
            assert!(dial.is_on_drop(g, tip));
        }
        // To the right of the pivot: the tank accelerates to the left.
        assert!(dial.tip(gravities[0]).x > dial.pivot.x && dial.tip(gravities[0]).y > dial.pivot.y);
    }

    #[test]
    fn one_extreme_case_does_not_shrink_the_others_to_nothing() {
        let area = Rect::from_min_size(pos2(0.0, 0.0), vec2(704.0, 430.0));
        let (rest, dropped) = (Vec2::new(0.0, -9.81), Vec2::new(0.0, -980.0));
        let quiet = Dial::new(area, &[rest], &[], UnitSystem::Si);
        let beside = Dial::new(area, &[rest], &[dropped], UnitSystem::Si);
        assert_eq!(beside.scale, quiet.scale);
        let shown = Dial::new(area, &[rest, dropped], &[], UnitSystem::Si);
        assert!(shown.rect.contains(shown.tip(dropped)), "its own bob is on the board");
    }

    #[test]
    fn the_scale_is_the_one_of_the_drawing_when_all_fits() {
        let area = Rect::from_min_size(pos2(0.0, 0.0), vec2(704.0, 430.0));
        let dial = Dial::new(area, &[Vec2::new(3.92, -9.81)], &[], UnitSystem::Si);
        assert!((dial.scale - 11.6).abs() < 0.1, "{}", dial.scale);
    }
}
