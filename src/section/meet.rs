//! Where two edges meet.

use crate::geom::{Edge, Point, Vec2, cross};

/// Points at which two edges meet, shared ends included.
pub(super) fn meetings(a: &Edge, b: &Edge, slack: f64) -> Vec<Point> {
    let mut out: Vec<Point> = Vec::new();
    if (a.start - b.start).norm() > reach(a) + reach(b) + slack {
        return out;
    }
    // Ends of one on the other: touching, and overlap of edges on one line or circle.
    for (edge, other) in [(a, b), (b, a)] {
        for p in [edge.start, edge.end] {
            if other.nearest(p).1 <= slack {
                out.push(p);
            }
        }
    }
    match (a.center(), b.center()) {
        (None, None) => {
            let (d, e) = (a.chord(), b.chord());
            let det = cross(d, e);
            if det != 0.0 {
                let w = b.start - a.start;
                let (t, u) = (cross(w, e) / det, cross(w, d) / det);
                if (0.0..=1.0).contains(&t) && (0.0..=1.0).contains(&u) {
                    out.push(a.point_at(t));
                }
            }
        }
        (Some(center), None) => line_on_circle(b, center, a, slack, &mut out),
        (None, Some(center)) => line_on_circle(a, center, b, slack, &mut out),
        (Some(p), Some(q)) => {
            let (r, s) = (a.radius().abs(), b.radius().abs());
            let d = q - p;
            let dist = d.norm();
            if dist > 0.0 && dist <= r + s + slack && dist >= (r - s).abs() - slack {
                let along = (dist * dist + r * r - s * s) / (2.0 * dist);
                let off = (r * r - along * along).max(0.0).sqrt();
                let (d, n) = (d / dist, Vec2::new(-d.y, d.x) / dist);
                for sign in [1.0, -1.0] {
                    let x = p + d * along + n * (sign * off);
                    if a.nearest(x).1 <= slack && b.nearest(x).1 <= slack {
                        out.push(x);
                    }
                }
            }
        }
    }
    out
}

/// No point of the edge is further from its start.
fn reach(e: &Edge) -> f64 {
    if e.sweep.abs() <= std::f64::consts::PI { e.chord().norm() } else { 2.0 * e.radius().abs() }
}

fn line_on_circle(line: &Edge, center: Point, arc: &Edge, slack: f64, out: &mut Vec<Point>) {
    let d = line.chord();
    let n2 = d.norm_squared();
    let foot = (center - line.start).dot(&d) / n2;
    let off2 = (line.start + d * foot - center).norm_squared();
    let r2 = arc.radius() * arc.radius();
    if off2 > r2 {
        return;
    }
    let half = ((r2 - off2) / n2).sqrt();
    for t in [foot - half, foot + half] {
        let p = line.start + d * t;
        if line.nearest(p).1 <= slack && arc.nearest(p).1 <= slack {
            out.push(p);
        }
    }
}
