//! Everything on the board that carries words: levels, brims, pressures, loads, points, faults, the legend.
//!
//! In order of weight, so that what matters most gets its place first.

use std::sync::Arc;

use egui::{Align2, Color32, FontId, Galley, Painter, Pos2, Rect, Shape, Stroke, Vec2, pos2, vec2};

use crate::analysis::State;
use crate::geom::Point;
use crate::gui::{Look, font, marks};
use crate::problem::Severity;
use crate::units::{Measure, Quantity, number};

use super::dims::paint_freeboard;
use super::drag::Feedback;
use super::labels::Labels;
use super::legend::{legend_areas, paint_legend};
use super::lines;
use super::scene::Scene;

/// Draws all of it.
pub fn annotate(painter: &Painter, scene: &Scene, look: &Look) {
    let mut labels = off_walls(scene);
    scene.dial.areas(&scene.hanging).into_iter().for_each(|area| labels.keep_off(area));
    legend_areas(scene).into_iter().for_each(|(_, paper)| labels.keep_off(paper));
    for piece in scene.model.surface() {
        labels.keep_off_line(&[scene.at(piece.left), scene.at(piece.right)]);
    }
    let named = scene.model.points.iter().chain(&scene.model.compartments).map(|p| p.at);
    let marks = named.chain(scene.model.sump).chain(scene.model.centroid);
    for at in marks.chain(scene.judged.map(|_| scene.model.moment_about)) {
        labels.keep_off(Rect::from_center_size(scene.at(at), Vec2::splat(11.0)));
    }
    let writer = Writer { painter, scene, look };
    writer.paint_reason(&mut labels);
    writer.paint_faults(&mut labels);
    let still = writer.paint_still_level();
    if let Some(freeboard) = &scene.model.freeboard {
        paint_freeboard(painter, scene, freeboard, &mut labels, look);
    }
    writer.paint_brims(&mut labels);
    if let Some(still) = still {
        writer.paint_still_label(&mut labels, still);
    }
    writer.paint_governs(&mut labels);
    writer.paint_prisms(&mut labels);
    writer.paint_loads(&mut labels);
    writer.paint_sills(&mut labels);
    writer.paint_isobar_labels(&mut labels);
    writer.paint_places(&mut labels);
    paint_legend(painter, scene, look);
}

/// The dotted cross at what is held, the lines to what it aligned with, and the numbers beside it.
pub fn paint_feedback(painter: &Painter, scene: &Scene, pos: Pos2, feedback: &Feedback, look: &Look) {
    let hint = Stroke::new(1.2, look.accent);
    let at = feedback.at.map_or(pos, |p| scene.at(p));
    if let Some(line) = feedback.line {
        let ends = line.map(|p| scene.at(p));
        lines::segment(painter, ends, Stroke::new(6.25, look.board));
        lines::segment(painter, ends, Stroke::new(2.25, look.accent));
    }
    if feedback.at.is_some() {
        for arm in [vec2(58.0, 0.0), vec2(0.0, 58.0)] {
            lines::dashed(painter, &[at - arm, at + arm], hint, 2.0, 3.0);
        }
    }
    for p in &feedback.aligned_with {
        lines::dashed(painter, &[at, scene.at(*p)], hint, 2.0, 3.0);
        painter.circle_stroke(scene.at(*p), 5.0, hint);
    }
    if feedback.words.is_empty() {
        return;
    }
    let words = painter.layout_no_wrap(feedback.words.clone(), font::small_figure(), look.accent);
    let mut labels = off_walls(scene);
    let places = [
        (at + vec2(14.0, -10.0), Align2::LEFT_BOTTOM),
        (at + vec2(-14.0, -10.0), Align2::RIGHT_BOTTOM),
        (at + vec2(14.0, 14.0), Align2::LEFT_TOP),
        (at + vec2(-14.0, 14.0), Align2::RIGHT_TOP),
    ];
    let rect = labels.place_anyway(words.size(), &places);
    painter.rect_filled(rect.expand2(vec2(4.0, 1.0)), 0.0, look.board);
    painter.galley(rect.min, words, look.accent);
}

/// Labels that shall not cover a wall, a mouth, an obstacle or a plate.
fn off_walls(scene: &Scene) -> Labels {
    let mut labels = Labels::new(scene.screen.rect);
    for edge in &scene.model.edges {
        labels.keep_off_line(&scene.screen.line(&edge.points));
    }
    for points in scene.model.obstacles.iter().chain(scene.model.plates.iter().map(|plate| &plate.points)) {
        labels.keep_off_line(&scene.screen.line(points));
    }
    labels
}

/// The still level on the screen.
struct Still {
    text: Arc<Galley>,
    y: f32,
    left: f32,
    right: f32,
}

/// Writes on the drawing.
pub(super) struct Writer<'a> {
    pub(super) painter: &'a Painter,
    pub(super) scene: &'a Scene<'a>,
    pub(super) look: &'a Look,
}

impl Writer<'_> {
    pub(super) fn text(&self, text: impl Into<String>, font: FontId, color: Color32) -> Arc<Galley> {
        self.painter.layout_no_wrap(text.into(), font, color)
    }

    /// Text on a piece of paper of its own.
    pub(super) fn put(&self, rect: Rect, text: Arc<Galley>) {
        self.painter.rect_filled(rect.expand2(vec2(2.0, -1.0)), 0.0, self.look.board);
        self.painter.galley(rect.min, text, self.look.ink);
    }

    fn paint_reason(&self, labels: &mut Labels) {
        let Some(reason) = &self.scene.model.not_judged else { return };
        let area = self.scene.screen.rect;
        let width = (self.scene.dial.rect.left() - area.left() - 60.0).max(80.0);
        let text = self.painter.layout(format!("Not judged: {reason}"), font::small(), self.look.ink, width);
        let rect = Rect::from_min_size(area.min + vec2(36.0, 8.0), text.size());
        marks::paint_cup(self.painter, area.min + vec2(20.0, 16.0), 16.0, State::NotJudged, self.look);
        labels.keep_off(rect.expand(4.0));
        self.put(rect, text);
    }

    fn paint_faults(&self, labels: &mut Labels) {
        for fault in &self.scene.model.faults {
            // Off the board it waits at the edge.
            let room = self.scene.screen.rect.shrink2(vec2(18.0, 18.0).min(0.5 * self.scene.screen.rect.size()));
            let at = room.clamp(self.scene.at(fault.at));
            let state = if fault.severity == Severity::Fault { State::Fails } else { State::Close };
            let color = self.look.state(state);
            let halo = Stroke::new(6.0, self.look.board);
            let stroke = Stroke::new(2.0, color);
            match fault.severity {
                Severity::Fault => {
                    self.painter.circle_stroke(at, 12.0, halo);
                    self.painter.circle_stroke(at, 12.0, stroke);
                }
                Severity::Warning => {
                    let corners = [vec2(0.0, -14.0), vec2(13.0, 9.0), vec2(-13.0, 9.0)].map(|v| at + v);
                    self.painter.add(Shape::closed_line(corners.to_vec(), halo));
                    self.painter.add(Shape::closed_line(corners.to_vec(), stroke));
                }
            }
            let number = self.text(fault.number.to_string(), font::heading(), color);
            let off = |x: f32, y: f32, align| (at + vec2(x, y), align);
            let places = [
                off(12.0, -8.0, Align2::LEFT_BOTTOM),
                off(-12.0, -8.0, Align2::RIGHT_BOTTOM),
                off(12.0, 8.0, Align2::LEFT_TOP),
                off(-12.0, 8.0, Align2::RIGHT_TOP),
                off(24.0, -8.0, Align2::LEFT_BOTTOM),
                off(-24.0, -8.0, Align2::RIGHT_BOTTOM),
            ];
            let rect = labels.place_anyway(number.size(), &places);
            self.put(rect, number);
        }
        if let Some(middle) = self.scene.model.last_good.first().map(|points| points[points.len() / 2]) {
            let text = self.text("last good outline, dashed", font::small(), self.look.ink2);
            let at = self.scene.at(middle);
            let places = around(at, 10.0);
            if let Some(rect) = labels.place(text.size(), places) {
                self.put(rect, text);
            }
        }
    }

    fn paint_brims(&self, labels: &mut Labels) {
        for brim in &self.scene.model.brims {
            let at = self.scene.at(brim.at);
            let ink = if brim.governs { self.look.ink } else { self.look.ink3 };
            let corners = vec![at, at + vec2(-5.0, -8.0), at + vec2(5.0, -8.0)];
            self.painter.add(Shape::convex_polygon(corners, self.look.board, Stroke::new(1.25, ink)));
            labels.keep_off(Rect::from_min_max(at + vec2(-5.0, -8.0), at + vec2(5.0, 0.0)));
            let text = self.text("brim", font::small(), self.look.ink2);
            let places = [
                (at + vec2(9.0, -2.0), Align2::LEFT_BOTTOM),
                (at + vec2(-9.0, -2.0), Align2::RIGHT_BOTTOM),
                (at + vec2(0.0, -10.0), Align2::CENTER_BOTTOM),
            ];
            if let Some(rect) = labels.place(text.size(), places).filter(|_| brim.governs) {
                self.put(rect, text);
            }
        }
    }

    /// What liquid went over on the way, and how much.
    fn paint_sills(&self, labels: &mut Labels) {
        for sill in &self.scene.model.sills {
            let at = self.scene.at(sill.at);
            let corners = vec![at + vec2(0.0, -8.0), at + vec2(5.0, 0.0), at + vec2(-5.0, 0.0)];
            self.painter.add(Shape::convex_polygon(corners, self.look.board, Stroke::new(1.25, self.look.ink)));
            labels.keep_off(Rect::from_min_max(at + vec2(-5.0, -8.0), at + vec2(5.0, 0.0)));
            let unit = Quantity::Volume.unit_near(self.scene.units, sill.volume_m3);
            let text = format!("{} {} over", number(unit.from_si(sill.volume_m3), 3), unit.symbol);
            let text = self.text(text, font::tick(), self.look.ink);
            if let Some(rect) = labels.place(text.size(), around(at - vec2(0.0, 4.0), 9.0)) {
                self.put(rect, text);
            }
        }
    }

    /// The dashed line, and the words that go to it.
    fn paint_still_level(&self) -> Option<Still> {
        let z = self.scene.model.still_z_m?;
        let y = self.painter.round_to_pixel_center(self.scene.at(Point::new(0.0, z)).y);
        let level = Measure::new(Quantity::Length, z).text_to(self.scene.units, 4);
        let text = self.text(format!("still {level}"), font::small(), self.look.ink2);
        let area = self.scene.screen.rect;
        let bounds = self.scene.bounds();
        let left = (bounds.left() - text.size().x - 10.0).max(area.left() + 6.0);
        let right = (bounds.right() + 14.0).min(area.right());
        lines::dashed(self.painter, &[pos2(left, y), pos2(right, y)], Stroke::new(1.0, self.look.ink3), 6.0, 4.0);
        area.y_range().contains(y).then_some(Still { text, y, left, right })
    }

    fn paint_still_label(&self, labels: &mut Labels, still: Still) {
        let Still { text, y, left, right } = still;
        let bounds = self.scene.bounds();
        let beside = [
            (pos2(left, y - 2.0), Align2::LEFT_BOTTOM),
            (pos2(left, y + 2.0), Align2::LEFT_TOP),
            (pos2(bounds.right() + 6.0, y - 2.0), Align2::LEFT_BOTTOM),
            (pos2(bounds.right() + 6.0, y + 2.0), Align2::LEFT_TOP),
        ];
        let along = (0..)
            .map(|k| left + 12.0 * k as f32)
            .take_while(|x| *x < right)
            .flat_map(|x| [(pos2(x, y - 2.0), Align2::LEFT_BOTTOM), (pos2(x, y + 2.0), Align2::LEFT_TOP)]);
        if let Some(rect) = labels.place(text.size(), beside.into_iter().chain(along)) {
            self.put(rect, text);
        }
    }

    fn paint_governs(&self, labels: &mut Labels) {
        let Some((at, measure)) = self.scene.model.governs.at else { return };
        let at = self.scene.at(at);
        // The dimension says it already.
        if self.scene.model.freeboard.is_some_and(|f| self.scene.at(f.brim) == at) {
            return;
        }
        self.painter.circle(at, 6.5, self.look.board, Stroke::NONE);
        self.painter.circle_filled(at, 4.5, self.look.accent);
        labels.keep_off(Rect::from_center_size(at, Vec2::splat(13.0)));
        if let Some(measure) = measure {
            let text = self.text(measure.text(self.scene.units), font::body_heavy(), self.look.accent);
            if let Some(rect) = labels.place(text.size(), around(at, 11.0)) {
                self.put(rect, text);
            }
        }
    }
}

/// Places for a label round a mark, as far off.
pub(super) fn around(at: Pos2, off: f32) -> [(Pos2, Align2); 6] {
    [
        (at + vec2(off, 0.0), Align2::LEFT_CENTER),
        (at - vec2(off, 0.0), Align2::RIGHT_CENTER),
        (at - vec2(0.0, off), Align2::CENTER_BOTTOM),
        (at + vec2(0.0, off), Align2::CENTER_TOP),
        (at + vec2(off, -off), Align2::LEFT_BOTTOM),
        (at + vec2(off, off), Align2::LEFT_TOP),
    ]
}

/// Aligns a label that lies in this direction from its thing.
pub(super) fn align_toward(out: Vec2) -> Align2 {
    let axis = |v: f32| {
        if v > 0.4 {
            egui::Align::Min
        } else if v < -0.4 {
            egui::Align::Max
        } else {
            egui::Align::Center
        }
    };
    Align2([axis(out.x), axis(out.y)])
}
