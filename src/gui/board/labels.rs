//! Where labels go: inside the drawing area, off the lines, off each other.
//!
//! Knows no text and no study: only sizes and places.

use egui::{Align2, Pos2, Rect, Vec2};

use super::lines;

/// Least distance of a label from a line, points: half a wall and the paper round the text.
const LINE_GAP: f32 = 3.0;

/// What is taken already.
#[derive(Clone, Debug)]
pub struct Labels {
    bounds: Rect,
    taken: Vec<Rect>,
    lines: Vec<[Pos2; 2]>,
}

impl Labels {
    /// Nothing taken yet inside `bounds`.
    pub fn new(bounds: Rect) -> Labels {
        Labels { bounds, taken: Vec::new(), lines: Vec::new() }
    }

    /// Labels shall not cover `rect`.
    pub fn keep_off(&mut self, rect: Rect) {
        self.taken.push(rect);
    }

    /// Labels shall not cover this line.
    pub fn keep_off_line(&mut self, path: &[Pos2]) {
        let inside = path.windows(2).filter_map(|pair| lines::clip(self.bounds, [pair[0], pair[1]]));
        self.lines.extend(inside);
    }

    /// The first of `places` where a label of `size` is free; it is taken from then on.
    pub fn place(&mut self, size: Vec2, places: impl IntoIterator<Item = (Pos2, Align2)>) -> Option<Rect> {
        let rect = places.into_iter().map(|(pos, align)| align.anchor_size(pos, size)).find(|r| self.is_free(*r))?;
        self.taken.push(rect);
        Some(rect)
    }

    /// Like [`Labels::place`], for a label that must be shown: where no place is free, the first one, moved
    /// inside the drawing area.
    pub fn place_anyway(&mut self, size: Vec2, places: &[(Pos2, Align2)]) -> Rect {
        if let Some(rect) = self.place(size, places.iter().copied()) {
            return rect;
        }
        let (pos, align) = places.first().copied().unwrap_or((self.bounds.center(), Align2::CENTER_CENTER));
        let rect = align.anchor_size(pos, size);
        let room = self.bounds.shrink(2.0);
        let into = |low: f32, high: f32, from: f32, to: f32| (from - low).max(0.0) + (to - high).min(0.0);
        let rect = rect.translate(Vec2::new(
            into(rect.left(), rect.right(), room.left(), room.right()),
            into(rect.top(), rect.bottom(), room.top(), room.bottom()),
        ));
        self.taken.push(rect);
        rect
    }

    fn is_free(&self, rect: Rect) -> bool {
        self.bounds.shrink(2.0).contains_rect(rect)
            && !self.taken.iter().any(|t| t.intersects(rect))
            && !self.lines.iter().any(|l| lines::clip(rect.expand(LINE_GAP), *l).is_some())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use egui::{pos2, vec2};

    #[test]
    fn labels_leave_lines_and_each_other_alone() {
        let mut labels = Labels::new(Rect::from_min_size(pos2(0.0, 0.0), vec2(100.0, 100.0)));
        let (size, here, there) = (vec2(20.0, 10.0), pos2(10.0, 10.0), pos2(50.0, 50.0));
        let places = [(here, Align2::LEFT_TOP), (there, Align2::LEFT_TOP)];
        assert_eq!(labels.place(size, places).unwrap().min, here);
        assert_eq!(labels.place(size, places).unwrap().min, there, "the first place is taken");
        assert_eq!(labels.place(size, places), None);
        let mut labels = Labels::new(labels.bounds);
        labels.keep_off_line(&[pos2(0.0, 15.0), pos2(100.0, 15.0)]);
        assert_eq!(labels.place(size, places).unwrap().min, there, "a line runs through the first place");
        let squeezed = labels.place_anyway(size, &[(pos2(95.0, -3.0), Align2::LEFT_TOP)]);
        assert!(labels.bounds.contains_rect(squeezed), "{squeezed:?}");
    }
}
