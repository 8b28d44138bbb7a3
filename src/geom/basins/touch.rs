//! What touches what: strips one another, and level edges. Strips are counted in the order of [`Basins::strips`].

use super::Basins;

impl Basins<'_> {
    /// Pairs of strips that touch over the border of two slabs, the lower one first.
    pub fn contacts(&self) -> Vec<[usize; 2]> {
        let slabs = self.sublevel.slabs();
        let extent = slabs.iter().map(|s| s.width_bottom.max(s.width_top)).fold(0.0, f64::max);
        let mut contacts = Vec::new();
        for w in slabs.windows(2) {
            let (below, above) = (&w[0], &w[1]);
            for (i, (l, r)) in self.sublevel.strips(below).enumerate() {
                let own = [l.u_at(below.top), r.u_at(below.top)];
                for (j, (l, r)) in self.sublevel.strips(above).enumerate() {
                    let (a, b) = (own[0].max(l.u_at(above.bottom)), own[1].min(r.u_at(above.bottom)));
                    if b - a > 1e-12 * extent && !self.is_shut(above.bottom, a, b) {
                        contacts.push([below.first as usize / 2 + i, above.first as usize / 2 + j]);
                    }
                }
            }
        }
        contacts
    }

    /// Level edges with the strips that they bound from below or above: (edge, strip, whether it is the strip's floor).
    pub fn level_edges(&self) -> Vec<(usize, usize, bool)> {
        let slabs = self.sublevel.slabs();
        let mut beside = Vec::new();
        for flat in self.sublevel.flats() {
            let k = if flat.is_floor {
                slabs.partition_point(|s| s.bottom < flat.v)
            } else {
                slabs.partition_point(|s| s.top < flat.v)
            };
            let Some(slab) = slabs.get(k) else { continue };
            let v = flat.v.clamp(slab.bottom, slab.top);
            for (i, (l, r)) in self.sublevel.strips(slab).enumerate() {
                if l.u_at(v).max(flat.u[0]) < r.u_at(v).min(flat.u[1]) {
                    beside.push((flat.edge_idx as usize, slab.first as usize / 2 + i, flat.is_floor));
                }
            }
        }
        beside
    }
}

#[cfg(test)]
mod tests {
    use crate::geom::{Basins, Depth, Edge, Point, Vec2};

    /// A region as deep everywhere.
    struct Even;

    impl Depth for Even {
        fn constant(&self) -> Option<f64> {
            Some(1.0)
        }

        fn under(&self, _: &Edge) -> f64 {
            0.0
        }

        fn across(&self, from: Point, to: Point) -> f64 {
            (to - from).norm()
        }

        fn turned(&self, _: Point, _: Point, _: Point) -> f64 {
            0.0
        }
    }

    /// Strips of a box 2 by 1 with a level slit from its left wall to `tip`, half way up.
    /// Strips and their touches.
    type Seen = (Vec<[usize; 2]>, Vec<(usize, usize, bool)>);

    fn box_with_slit(tip: f64) -> Seen {
        let p = Point::new;
        let corners = [p(0.0, 0.0), p(2.0, 0.0), p(2.0, 1.0), p(0.0, 1.0), p(0.0, 0.5), p(tip, 0.5), p(0.0, 0.5)];
        let edges: Vec<Edge> = (0..7).map(|i| Edge::line(corners[i], corners[(i + 1) % 7])).collect();
        let basins = Basins::new(&edges, Vec2::y(), &Even, &|_| false);
        (basins.contacts(), basins.level_edges())
    }

    #[test]
    fn strips_touch_beside_a_slit_and_not_through_it() {
        let (contacts, mut level) = box_with_slit(1.2);
        assert_eq!(contacts, [[0, 1]]);
        // Floor 0, roof 2, and both sides of the slit: 4 is a floor, 5 a ceiling.
        level.sort_unstable();
        assert_eq!(level, [(0, 0, true), (2, 1, false), (4, 1, true), (5, 0, false)]);
        assert_eq!(box_with_slit(2.0).0, Vec::<[usize; 2]>::new(), "from wall to wall nothing touches");
    }
}
