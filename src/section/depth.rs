//! The width law as a depth of the plane: what edges enclose, and what lies along lines.

use crate::geom::{Depth, Edge, Point, Vec2};
use crate::num::{gauss, tanh_sinh};

use super::WidthLaw;

impl Depth for WidthLaw {
    fn constant(&self) -> Option<f64> {
        WidthLaw::constant(self)
    }

    /// Minus the integral of Omega ds: the volume between the edge and the law's lowest height, m3. In closed form on straight
    /// edges, by quadrature on arcs.
    fn under(&self, e: &Edge) -> f64 {
        if !e.is_arc() {
            let (ds, dz) = (e.end.x - e.start.x, e.end.y - e.start.y);
            if ds == 0.0 {
                return 0.0;
            }
            let (low, high) = self.range().unwrap_or((0.0, 0.0));
            // The difference quotient loses figures over short rises; there Omega is smooth enough for quadrature.
            let mean = if dz.abs() > 1e-5 * (high - low) {
                (self.omega2(e.end.y) - self.omega2(e.start.y)) / dz
            } else {
                gauss(1, |t| [self.omega(e.start.y + t * dz)])[0]
            };
            return -mean * ds;
        }
        let parts = self.between_kinks(e);
        parts
            .map(|part| {
                let length = part.length();
                -tanh_sinh(|t| [self.omega(part.point_at(t).y) * part.tangent_at(t).x * length])[0]
            })
            .sum()
    }

    fn across(&self, from: Point, to: Point) -> f64 {
        let dz = to.y - from.y;
        let (low, high) = self.range().unwrap_or((0.0, 0.0));
        let mean = if dz.abs() > 1e-6 * (high - low) {
            (self.omega(to.y) - self.omega(from.y)) / dz
        } else {
            self.width(0.5 * (from.y + to.y))
        };
        mean * (to - from).norm()
    }

    fn turned(&self, from: Point, to: Point, pivot: Point) -> f64 {
        let line = to - from;
        let length = line.norm();
        if length == 0.0 {
            return 0.0;
        }
        let start: f64 = (from - pivot).dot(&line) / length;
        match self.constant() {
            Some(width) => width * length * (start + 0.5 * length),
            None => gauss(2, |t| [self.width(from.y + t * line.y) * (start + t * length) * length])[0],
        }
    }
}

impl WidthLaw {
    /// The edge cut where the law is not smooth, and where an arc turns round in z: there it may touch the lowest or
    /// highest line of the law without crossing it.
    pub fn between_kinks<'e>(&self, e: &'e Edge) -> impl Iterator<Item = Edge> + 'e {
        let mut stops = vec![0.0];
        stops.extend(e.turning_points(Vec2::y()));
        for kink in self.kinks() {
            stops.extend(e.crossings(Vec2::y(), kink));
        }
        stops.push(1.0);
        stops.sort_unstable_by(f64::total_cmp);
        stops.dedup();
        (1..stops.len()).map(move |i| e.part(stops[i - 1], stops[i]))
    }
}
