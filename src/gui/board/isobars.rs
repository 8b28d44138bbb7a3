//! Numbers on paper at the ends of the isobars.

use egui::{Pos2, Stroke, Vec2, vec2};

use crate::geom::{Edge, Point};
use crate::gui::font;
use crate::units::{Quantity, fixed};

use super::annotate::{Writer, align_toward};
use super::labels::Labels;
use super::legend::decimals_of;
use super::lines;
use super::liquid::Isobar;

/// How near a plate an end must be to lie on it, points.
const ON_PLATE: f64 = 2.0;

impl Writer<'_> {
    /// At the lower ends, outside the walls; the first one bears the unit. Inside the tank, at a plate, only what stands
    /// nowhere else.
    pub(super) fn paint_isobar_labels(&self, labels: &mut Labels) {
        let mut written: Vec<f64> = Vec::new();
        for at_walls in [true, false] {
            for isobar in self.scene.model.isobars() {
                if (at_walls || !written.contains(&isobar.gage_pa))
                    && self.paint_isobar_label(labels, isobar, at_walls, written.is_empty())
                {
                    written.push(isobar.gage_pa);
                }
            }
        }
    }

    fn paint_isobar_label(&self, labels: &mut Labels, isobar: &Isobar, at_walls: bool, needs_unit: bool) -> bool {
        let (Some(first), Some(last)) = (isobar.chords.first(), isobar.chords.last()) else { return false };
        let Some(tints) = self.scene.model.tints else { return false };
        let (left, right) = (self.scene.at(first[0]), self.scene.at(last[1]));
        let along = (right - left).normalized();
        let mut ends = [(left, first[0], -along), (right, last[1], along)];
        if right.y > left.y + 1.0 {
            ends.swap(0, 1);
        }
        let unit = Quantity::GagePressure.unit(self.scene.units);
        let value = fixed(unit.from_si(isobar.gage_pa), decimals_of(unit.from_si(tints.step_pa)));
        let words = if needs_unit { format!("{value} {}", unit.symbol) } else { value };
        let text = self.text(words, font::tick(), self.look.ink2);
        let down = vec2(0.0, 1.0);
        let ends = ends.into_iter().filter(|(_, p, _)| self.is_on_plate(*p) != at_walls);
        let ways = ends.flat_map(|(end, _, out)| [out, (out + down).normalized(), down].map(|way| (end, way)));
        let free: Option<(Pos2, Vec2, egui::Rect)> = ways.into_iter().find_map(|(end, out)| {
            labels.place(text.size(), [(end + out * 10.0, align_toward(out))]).map(|rect| (end, out, rect))
        });
        let Some((end, out, rect)) = free else { return false };
        let tick = [end + out * 2.0, end + out * 8.0];
        lines::segment(self.painter, tick, Stroke::new(0.75, self.look.ink.gamma_multiply(0.55)));
        self.put(rect, text);
        true
    }

    fn is_on_plate(&self, p: Point) -> bool {
        let reach_m = ON_PLATE / self.scene.screen.scale();
        let lines = self.scene.model.plates.iter().flat_map(|plate| plate.points.windows(2));
        lines.into_iter().any(|pair| Edge::line(pair[0], pair[1]).nearest(p).1 <= reach_m)
    }
}
