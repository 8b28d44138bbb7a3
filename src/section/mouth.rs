//! Mouths: runs of outline edges that are open to air.

use crate::geom::{Edge, Point, Vec2};

use super::{EdgeKind, Region, Section};

/// One mouth: neighbouring mouth edges of the outline.
#[derive(Clone, Debug, PartialEq)]
pub struct Mouth {
    /// As shown: the first name among its edges, or `mouth 2`.
    pub name: String,
    /// Its edges in the outline, in the section's order.
    pub edge_idxs: Vec<usize>,
}

impl Section {
    /// All mouths, in the order of the outline.
    pub fn mouths(&self) -> Vec<Mouth> {
        let n = self.outline.len();
        let is_mouth = |i: usize| self.outline[i % n].kind == EdgeKind::Mouth;
        // Start behind a wall, so that no run is cut in two.
        let Some(start) = (0..n).find(|&i| !is_mouth(i)) else { return Vec::new() };
        let mut mouths: Vec<Mouth> = Vec::new();
        for i in start + 1..start + n {
            if !is_mouth(i) {
                continue;
            }
            if is_mouth(i - 1) && !mouths.is_empty() {
                mouths.last_mut().expect("a run is under way").edge_idxs.push(i % n);
            } else {
                mouths.push(Mouth { name: String::new(), edge_idxs: vec![i % n] });
            }
        }
        mouths.sort_by_key(|m| m.edge_idxs[0]);
        for (i, mouth) in mouths.iter_mut().enumerate() {
            let named = mouth.edge_idxs.iter().map(|&e| &self.outline[e].name).find(|name| !name.is_empty());
            mouth.name = named.cloned().unwrap_or_else(|| format!("mouth {}", i + 1));
        }
        mouths
    }
}

impl Mouth {
    /// Its edges as geometry.
    pub fn edges<'a>(&'a self, region: &'a Region) -> impl Iterator<Item = &'a Edge> {
        self.edge_idxs.iter().map(|&i| &region.geometry()[i])
    }

    /// The brim: the lowest point of the mouth as seen along `up`, and its level.
    pub fn brim(&self, region: &Region, up: Vec2) -> (f64, Point) {
        self.edges(region)
            .map(|e| {
                let ((level, t), _) = e.extent(up);
                (level, e.point_at(t))
            })
            .min_by(|a, b| a.0.total_cmp(&b.0))
            .unwrap_or((f64::INFINITY, Point::origin()))
    }
}
