//! Marks of single places, with their names: named points, compartments, the sump, the centroid, the moment point.

use egui::{Painter, Pos2, Shape, Stroke, Vec2, vec2};

use crate::gui::{Look, font};
use crate::units::{Measure, Quantity};

use super::annotate::{Writer, around};
use super::labels::Labels;
use super::lines;

impl Writer<'_> {
    /// Named points, compartments, sump, centroid, moment point.
    pub(super) fn paint_places(&self, labels: &mut Labels) {
        let model = &self.scene.model;
        for point in &model.points {
            let at = self.scene.at(point.at);
            self.painter.circle(at, 3.0, self.look.ink, Stroke::new(2.0, self.look.board));
            let gage = point.gage_pa.map(|pa| Measure::new(Quantity::GagePressure, pa).text(self.scene.units));
            let words = [Some(point.name.clone()), gage].into_iter().flatten().collect::<Vec<_>>().join("  ");
            let text = self.text(words, font::tick(), self.look.ink);
            if let Some(rect) = labels.place(text.size(), around(at, 8.0)) {
                self.put(rect, text);
            }
        }
        for compartment in &model.compartments {
            let at = self.scene.at(compartment.at);
            let corners = [vec2(0.0, -5.0), vec2(5.0, 0.0), vec2(0.0, 5.0), vec2(-5.0, 0.0)].map(|v| at + v);
            self.painter.add(Shape::convex_polygon(
                corners.to_vec(),
                self.look.board,
                Stroke::new(1.25, self.look.ink),
            ));
            let words = if compartment.name.is_empty() { "compartment" } else { &compartment.name };
            let text = self.text(words, font::tick(), self.look.ink);
            if let Some(rect) = labels.place(text.size(), around(at, 9.0)) {
                self.put(rect, text);
            }
        }
        if let Some(sump) = model.sump {
            let at = self.scene.at(sump);
            // A funnel.
            let arms = [vec2(-6.0, -6.0), vec2(0.0, 0.0), vec2(6.0, -6.0)].map(|v| at + v).to_vec();
            for stroke in [Stroke::new(4.5, self.look.board), Stroke::new(1.5, self.look.ink)] {
                self.painter.add(Shape::line(arms.clone(), stroke));
                lines::segment(self.painter, [at, at + vec2(0.0, 6.0)], stroke);
            }
            let text = self.text("sump", font::tick(), self.look.ink);
            if let Some(rect) = labels.place(text.size(), around(at, 9.0)) {
                self.put(rect, text);
            }
        }
        if let Some(centroid) = model.centroid {
            let at = self.scene.at(centroid);
            paint_centroid(self.painter, at, self.look);
            let text = self.text("centroid", font::tick(), self.look.ink);
            if let Some(rect) = labels.place(text.size(), around(at, 10.0)) {
                self.put(rect, text);
            }
        }
        if self.scene.judged.is_some() {
            let at = self.scene.at(model.moment_about);
            for stroke in [Stroke::new(3.25, self.look.board), Stroke::new(1.25, self.look.ink3)] {
                for arm in [vec2(6.0, 0.0), vec2(0.0, 6.0)] {
                    lines::segment(self.painter, [at - arm, at + arm], stroke);
                }
            }
            self.painter.circle_stroke(at, 3.0, Stroke::new(1.0, self.look.ink3));
            let text = self.text("moment point", font::tick(), self.look.ink3);
            if let Some(rect) = labels.place(text.size(), around(at, 8.0)) {
                self.put(rect, text);
            }
        }
    }
}

/// The usual mark of a centre of gravity: a circle with two dark quarters.
fn paint_centroid(painter: &Painter, at: Pos2, look: &Look) {
    painter.circle(at, 7.5, look.board, Stroke::NONE);
    for from in [0.0, std::f32::consts::PI] {
        let arc = (0..=6).map(|i| at + 5.5 * Vec2::angled(from + std::f32::consts::FRAC_PI_2 * i as f32 / 6.0));
        let wedge = std::iter::once(at).chain(arc).collect();
        painter.add(Shape::convex_polygon(wedge, look.ink, Stroke::NONE));
    }
    painter.circle_stroke(at, 5.5, Stroke::new(1.25, look.ink));
}
