//! The hold envelope round the plumb bob, in the bob's own scale: a bob inside it holds.

use std::sync::Arc;

use egui::{Align2, Color32, Mesh, Painter, Pos2, Rect, Shape, Stroke, vec2};

use crate::analysis::{End, Envelope, HoldLimit, State};
use crate::gui::look::STALE_OPACITY;
use crate::gui::{Look, font};

use super::bob::Dial;
use super::labels::Labels;
use super::lines;

/// Room under the curve for the legend of the tints, points.
const LEGEND: f32 = 66.0;

/// The envelope that is drawn.
#[derive(Clone, Debug, PartialEq)]
pub struct Holds {
    /// In m/s2.
    pub envelope: Arc<Envelope>,
    /// It belongs to an older state of the study.
    pub is_old: bool,
}

impl Holds {
    /// What the drawing keeps for itself; none where there is no curve.
    pub fn area(&self, dial: &Dial) -> Option<Rect> {
        let room = room(dial);
        let tips = self.tips(dial).into_iter().filter(|tip| room.contains(*tip));
        tips.map(|tip| Rect::from_min_max(tip, tip)).reduce(Rect::union).map(|rect| rect.expand(2.0))
    }

    /// The ground inside the curve. Nothing is raised where something fails in every case.
    pub fn paint_ground(&self, painter: &Painter, dial: &Dial, look: &Look) {
        if self.envelope.always.is_some() || self.envelope.at_rest.is_some() {
            return;
        }
        let tips = self.tips(dial);
        let mut mesh = Mesh::default();
        mesh.colored_vertex(dial.tip(self.envelope.rest_gravity), look.raised);
        tips.iter().for_each(|tip| mesh.colored_vertex(*tip, look.raised));
        let n = tips.len() as u32;
        (0..n).for_each(|i| mesh.add_triangle(0, 1 + i, 1 + (i + 1) % n));
        painter.with_clip_rect(room(dial).intersect(painter.clip_rect())).add(mesh);
    }

    /// The curve, the limit of spill alone, and what they are.
    pub fn paint_edge(&self, painter: &Painter, dial: &Dial, labels: &mut Labels, look: &Look) {
        let room = room(dial);
        let (writer, painter) = (painter, painter.with_clip_rect(room.intersect(painter.clip_rect())));
        let faded = |color: Color32| if self.is_old { color.gamma_multiply(STALE_OPACITY) } else { color };
        if let Some(words) = self.words() {
            let at = dial.tip(self.envelope.rest_gravity) + vec2(0.0, 44.0);
            let galley = painter.layout(words, font::small(), look.ink2, room.width() - 8.0);
            let rect = labels.place_anyway(galley.size(), &[(at, Align2::CENTER_TOP)]);
            painter.rect_filled(rect.expand(2.0), 0.0, look.board);
            painter.galley(rect.min, galley, look.ink2);
        }
        if self.envelope.at_rest.is_some() {
            return;
        }
        let limits = &self.envelope.limits;
        let tips = self.tips(dial);
        let spill = |limit: &HoldLimit| {
            let accel = limit.spill_m_per_s2.filter(|spill| *spill > limit.accel_m_per_s2 * (1.0 + 1e-6))?;
            Some(dial.tip(self.envelope.rest_gravity - limit.direction * accel))
        };
        let spills: Vec<Option<Pos2>> = limits.iter().map(spill).collect();
        for path in runs(&spills) {
            lines::dashed(&painter, &path, Stroke::new(1.0, faded(look.ink3)), 4.0, 3.0);
        }
        let edges = |wanted: fn(&End) -> bool| -> Vec<Vec<Pos2>> {
            let places = limits.iter().zip(&tips).map(|(limit, tip)| wanted(&limit.end).then_some(*tip));
            runs(&places.collect::<Vec<_>>())
        };
        for path in edges(|end| matches!(end, End::NotJudged { .. })) {
            lines::dashed(&painter, &path, Stroke::new(1.25, faded(look.state(State::NotJudged))), 2.0, 2.0);
        }
        for path in edges(|end| matches!(end, End::Fails { .. })) {
            painter.add(Shape::line(path.clone(), Stroke::new(1.75, faded(look.ink))));
            labels.keep_off_line(&path);
        }
        let rest = dial.tip(self.envelope.rest_gravity);
        for (word, places) in self.named(&tips, &spills) {
            let galley = painter.layout_no_wrap(word, font::tick(), faded(look.ink2));
            let beside = places.into_iter().map(|place| {
                let aside = (place - rest).normalized() * 7.0;
                let align = match (aside.y > 2.0 * aside.x.abs(), aside.x >= 0.0) {
                    (true, _) => Align2::CENTER_TOP,
                    (false, true) => Align2::LEFT_CENTER,
                    (false, false) => Align2::RIGHT_CENTER,
                };
                (place + aside, align)
            });
            // Whole, or not at all.
            let whole = |(at, align): &(Pos2, Align2)| {
                room.expand2(vec2(6.0, 0.0)).contains_rect(align.anchor_size(*at, galley.size()))
            };
            if let Some(rect) = labels.place(galley.size(), beside.filter(whole)) {
                writer.rect_filled(rect.expand2(vec2(2.0, -1.0)), 0.0, look.board);
                writer.galley(rect.min, galley, look.ink2);
            }
        }
    }

    /// Words to write on the curve, each with places beside which it may stand.
    fn named(&self, tips: &[Pos2], spills: &[Option<Pos2>]) -> Vec<(String, Vec<Pos2>)> {
        let mut named: Vec<(String, Vec<Pos2>)> = Vec::new();
        for (limit, tip) in self.envelope.limits.iter().zip(tips) {
            let End::Fails { criterion, .. } = limit.end else { continue };
            let word = criterion.to_lowercase();
            match named.iter_mut().find(|(known, _)| *known == word) {
                Some((_, places)) => places.push(*tip),
                None => named.push((word, vec![*tip])),
            }
        }
        let spills: Vec<Pos2> = spills.iter().flatten().copied().collect();
        named.push(("spills".to_owned(), spills));
        // From the middle of each stretch outward, so that a word stands well within it.
        for (_, places) in &mut named {
            let n = places.len();
            *places = [0.5, 0.35, 0.65, 0.2, 0.8, 0.1, 0.9, 0.02, 0.98]
                .into_iter()
                .filter_map(|share| places.get((share * n as f32) as usize).copied())
                .collect();
        }
        named
    }

    /// What has no curve.
    fn words(&self) -> Option<String> {
        let said = |end: &End, when: &str| match end {
            End::Fails { criterion, .. } => format!("{criterion} fails {when}"),
            End::NotJudged { .. } | End::Beyond => format!("not judged {when}"),
        };
        let at_rest = self.envelope.at_rest.as_ref().map(|end| said(end, "at rest"));
        at_rest.or_else(|| self.envelope.always.as_ref().map(|end| said(end, "in every case")))
    }

    /// Where the thread ends at every limit.
    fn tips(&self, dial: &Dial) -> Vec<Pos2> {
        self.envelope.limits.iter().map(|limit| dial.tip(self.envelope.rest_gravity - limit.accel())).collect()
    }
}

/// The part of the block that the curve may fill.
fn room(dial: &Dial) -> Rect {
    let top = dial.words().bottom();
    dial.rect.with_min_y(top).with_max_y((dial.rect.bottom() - LEGEND).max(top))
}

/// The stretches of a closed row of places.
fn runs(places: &[Option<Pos2>]) -> Vec<Vec<Pos2>> {
    let n = places.len();
    let Some(gap) = places.iter().position(Option::is_none) else {
        let closed = places.iter().chain(places.first()).flatten().copied().collect();
        return vec![closed];
    };
    let from_gap = (0..=n).map(|i| places[(gap + i) % n]);
    let mut runs = vec![Vec::new()];
    for place in from_gap {
        match place {
            Some(place) => runs.last_mut().expect("there is a run").push(place),
            None => runs.push(Vec::new()),
        }
    }
    runs.retain(|run| run.len() > 1);
    runs
}

#[cfg(test)]
mod tests {
    use super::*;
    use egui::pos2;

    #[test]
    fn runs_go_on_over_the_end_of_the_row() {
        let at = |i: i32| Some(pos2(i as f32, 0.0));
        let len = |places: &[Option<Pos2>]| runs(places).iter().map(Vec::len).collect::<Vec<_>>();
        assert_eq!(len(&[at(0), at(1), at(2)]), [4], "closed");
        assert_eq!(len(&[at(0), None, at(2), at(3)]), [3], "from 2 over 3 to 0");
        assert_eq!(len(&[at(0), at(1), None, at(3), at(4), None]), [2, 2]);
        assert!(len(&[None, at(1), None]).is_empty());
    }
}
