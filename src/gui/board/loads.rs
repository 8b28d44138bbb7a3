//! Loads on the drawing: resultants as arrows, net pressures across plates as prisms.

use egui::{Color32, Painter, Pos2, Shape, Stroke, pos2};

use crate::gui::font;
use crate::units::{Measure, Quantity};

use super::annotate::{Writer, align_toward, around};
use super::labels::Labels;
use super::lines;
use super::model::{Load, PrismPart};

/// Length of the largest pressure of all prisms, points.
const LARGEST_PRESSURE: f64 = 40.0;

/// Distance of the lines within a prism, points.
const STEP: f32 = 9.0;

impl Writer<'_> {
    /// Net pressures across plates, on the side from which they push.
    pub(super) fn paint_prisms(&self, labels: &mut Labels) {
        let prisms = &self.scene.model.prisms;
        let peaks = prisms.iter().flat_map(|p| &p.parts).flat_map(|part| part.pa);
        let largest_pa = peaks.map(f64::abs).fold(0.0, f64::max);
        if !(largest_pa > 0.0 && largest_pa.is_finite()) {
            return;
        }
        for prism in prisms {
            let parts = prism.parts.iter().flat_map(PrismPart::of_one_sign);
            let sides: Vec<[[Pos2; 2]; 2]> = parts.map(|part| self.prism_sides(&part, largest_pa)).collect();
            for sides in &sides {
                self.paint_prism_part(*sides);
                labels.keep_off_line(&[sides[0][1], sides[1][1]]);
            }
            let Some((pa, at)) = prism.peak else { continue };
            let at = self.scene.at(at);
            let tip = sides.iter().flatten().min_by(|a, b| (a[0] - at).length().total_cmp(&(b[0] - at).length()));
            let text = Measure::new(Quantity::GagePressure, pa.abs()).text(self.scene.units);
            let text = self.text(text, font::small_figure(), self.look.ink);
            if let Some(rect) = tip.and_then(|tip| labels.place(text.size(), around(tip[1], 5.0))) {
                self.put(rect, text);
            }
        }
    }

    /// Both ends of a part: on the plate, and as far off it as the pressure is large.
    fn prism_sides(&self, part: &PrismPart, largest_pa: f64) -> [[Pos2; 2]; 2] {
        let back = -self.scene.screen.screen_vec(part.toward).normalized();
        [0, 1].map(|end| {
            let foot = self.scene.at(part.line[end]);
            [foot, foot + back * (part.pa[end] / largest_pa * LARGEST_PRESSURE) as f32]
        })
    }

    fn paint_prism_part(&self, [a, b]: [[Pos2; 2]; 2]) {
        let paper = self.look.board.gamma_multiply(0.72);
        self.painter.add(Shape::convex_polygon(vec![a[0], a[1], b[1], b[0]], paper, Stroke::NONE));
        let thin = Stroke::new(0.75, self.look.ink2);
        let n = ((b[0] - a[0]).length() / STEP).clamp(1.0, 500.0) as usize;
        for k in 0..=n {
            let t = k as f32 / n as f32;
            push(self.painter, a[1] + (b[1] - a[1]) * t, a[0] + (b[0] - a[0]) * t, thin, self.look.ink2);
        }
        lines::segment(self.painter, [a[1], b[1]], Stroke::new(1.25, self.look.ink));
    }

    /// Resultants as arrows with their size, the largest first.
    pub(super) fn paint_loads(&self, labels: &mut Labels) {
        let model = &self.scene.model;
        let loads: Vec<&Load> =
            model.loads.iter().chain(model.prisms.iter().filter_map(|p| p.load.as_ref())).collect();
        let largest = loads.iter().map(|l| l.force_n.norm()).fold(0.0, f64::max);
        let mut sorted: Vec<_> = loads.into_iter().filter(|l| l.force_n.norm() > 1e-3 * largest).collect();
        sorted.sort_by(|a, b| b.force_n.norm().total_cmp(&a.force_n.norm()));
        for load in sorted {
            let along = self.scene.screen.screen_vec(load.force_n).normalized();
            let on_edge = self.scene.at(load.on_edge);
            let wanted = 14.0 + 40.0 * (load.force_n.norm() / largest).sqrt() as f32;
            let room = self.scene.screen.rect.shrink(4.0);
            // Outward from the wall; toward it from inside where the board ends before.
            let lengths = (0..).map(|k| wanted - k as f32).take_while(|l| *l >= wanted.min(20.0));
            let outward = lengths.into_iter().find(|l| room.contains(on_edge + along * *l));
            let (tail, tip, out) = match outward {
                Some(length) => (on_edge, on_edge + along * length, along),
                None => (on_edge - along * wanted, on_edge, -along),
            };
            lines::arrow(self.painter, tail, tip, Stroke::new(1.4, self.look.ink), self.look.board);
            labels.keep_off_line(&[tail, tip]);
            let force = Measure::new(Quantity::Force, load.force_n.norm()).text(self.scene.units);
            let text = self.text(force, font::small_figure(), self.look.ink);
            let (end, middle) = (if out == along { tip } else { tail }, tail + (tip - tail) * 0.5);
            let side = along.rot90();
            let places = [
                (end + out * 5.0, align_toward(out)),
                (end + side * 8.0, align_toward(side)),
                (end - side * 8.0, align_toward(-side)),
                (middle + side * 8.0, align_toward(side)),
                (middle - side * 8.0, align_toward(-side)),
            ];
            if let Some(rect) = labels.place(text.size(), places) {
                self.put(rect, text);
            }
        }
    }
}

/// A thin line with a small head at its end, where there is room for one.
fn push(painter: &Painter, tail: Pos2, tip: Pos2, stroke: Stroke, color: Color32) {
    let length = (tip - tail).length();
    if length < 0.5 {
        return;
    }
    let along = (tip - tail) / length;
    lines::segment(painter, [tail, tip], stroke);
    if length > 7.0 {
        let neck = tip - along * 5.0;
        let head = vec![pos2(tip.x, tip.y), neck + along.rot90() * 1.75, neck - along.rot90() * 1.75];
        painter.add(Shape::convex_polygon(head, color, Stroke::NONE));
    }
}
