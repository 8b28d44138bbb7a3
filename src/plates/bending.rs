//! The largest of everything in a bent panel: what its strength and its welds are judged by.

use nalgebra::{DMatrix, DVector};

use super::bent::{Bent, PointState};
use super::panel::SolvedPanel;

/// A largest value and where it is; panels are alike left and right, and the left place is given. In a panel wider
/// than [`SolvedPanel::MOST_SLENDER`] heights, places across are stretched to its width.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Peak {
    /// The value, signed.
    pub value: f64,
    /// Across from the left side, m.
    pub x_m: f64,
    /// Up from the bottom edge, m.
    pub y_m: f64,
}

/// The most positive and the most negative value over a panel; zero where there is none of that sign.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Extremes {
    /// Zero or above.
    pub high: Peak,
    /// Zero or below.
    pub low: Peak,
}

/// What an edge hands to its support, for a weld. Positive forces press the support the way a positive pressure does.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EdgeReaction {
    /// Mean force along the edge, N/m, without the forces in its corners.
    pub mean_n_per_m: f64,
    /// Force of largest magnitude along the edge (Kirchhoff's), N/m, signed. The tenth of a clamped side beside a
    /// free edge is left out, where the theory's grows without bound.
    pub peak_n_per_m: f64,
    /// Where: m from the left end of a bottom or top edge, from the lower end of a side.
    pub peak_at_m: f64,
    /// Bending moment of largest magnitude along the edge, N m a metre, signed; zero where the edge turns freely.
    pub moment_n: f64,
    /// Where.
    pub moment_at_m: f64,
}

/// What a panel's strength is judged by. Moments are N m a metre.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Summits {
    /// Deflection of largest magnitude, times the rigidity D, N m2.
    pub deflection_n_m2: Peak,
    /// Principal bending moment of largest magnitude: the one that handbooks tabulate.
    pub principal: Peak,
    /// Largest moment by von Mises's equivalent surface stress.
    pub von_mises: Peak,
}

/// The largest of everything over a bent panel. Moments are N m a metre.
#[derive(Clone, Debug, PartialEq)]
pub struct Bending {
    /// All of the pressure, N.
    pub load_n: f64,
    /// What its strength is judged by.
    pub summits: Summits,
    /// Bending moment that spans across.
    pub across: Extremes,
    /// Bending moment that spans along the height.
    pub along: Extremes,
    /// Each of the two sides.
    pub sides: EdgeReaction,
    /// The bottom edge; none where it is free.
    pub bottom: Option<EdgeReaction>,
    /// The top edge; none where it is free.
    pub top: Option<EdgeReaction>,
    /// Force in each bottom corner, N, below zero where the corner must be held down; zero where edges are clamped.
    pub bottom_corner_n: f64,
    /// Force in each top corner, N.
    pub top_corner_n: f64,
}

impl Summits {
    /// The moment M to judge by, stress = 6 M / t^2, without sign: the larger of the handbooks' principal moment and
    /// of von Mises's. The latter is larger only where twist rules: in the corners of simply supported panels (a
    /// square one by 18 %) and beside a free top.
    pub fn governing(&self) -> Peak {
        let principal = Peak { value: self.principal.value.abs(), ..self.principal };
        if self.von_mises.value > principal.value { self.von_mises } else { principal }
    }
}

/// The largest of everything in `bent`.
pub(super) fn of(bent: &Bent) -> Bending {
    let geometry = bent.panel.geometry();
    let grid = Grid::new(bent);
    let twist_at = |y_m: f64| if geometry.support.is_clamped() { 0.0 } else { bent.at(0.0, y_m).twist_n };
    let last = grid.across.ncols() - 1;
    let support = geometry.support;
    let bottom = (!support.is_free_at_bottom()).then(|| grid.level_edge(0, 1.0));
    let top = (!support.is_free_at_top()).then(|| grid.level_edge(last, -1.0));
    let mut sides = grid.side();
    if support.is_clamped() && top.is_none() {
        // A spike beside the free edge escapes the integral along the side: by equilibrium.
        let SolvedPanel { half: [hx, _], unit_m, .. } = bent.panel;
        let at_bottom = bottom.map_or(0.0, |edge| edge.mean_n_per_m);
        sides.mean_n_per_m = hx * unit_m * (bent.load_n / geometry.width_m - at_bottom) / geometry.height_m;
    }
    Bending {
        load_n: bent.load_n,
        summits: grid.summits(),
        across: grid.extremes(&grid.across, |s| s.across_n),
        along: grid.extremes(&grid.along, |s| s.along_n),
        sides,
        bottom,
        top,
        bottom_corner_n: 2.0 * twist_at(0.0),
        top_corner_n: -2.0 * twist_at(geometry.height_m),
    }
}

/// What the strength of `bent` is judged by.
pub(super) fn summits_of(bent: &Bent) -> Summits {
    Grid::new(bent).summits()
}

/// The force of largest magnitude along the sides of `bent`, N/m, signed.
pub(super) fn side_force_of(bent: &Bent) -> f64 {
    side_force(bent).1
}

/// A bent panel at the points where peaks are looked for: one row a place across, one column a height.
struct Grid<'a> {
    bent: &'a Bent<'a>,
    deflection: DMatrix<f64>,
    across: DMatrix<f64>,
    along: DMatrix<f64>,
    twist: DMatrix<f64>,
}

/// By how much at most a summit stands above the highest point where it was looked for, as a share: twice and more what
/// it does.
const SUMMIT_SHARE: f64 = 0.1;

impl<'a> Grid<'a> {
    fn new(bent: &'a Bent<'a>) -> Grid<'a> {
        let SolvedPanel { x, y, half: [hx, hy], unit_m, .. } = bent.panel;
        let (poisson, square) = (bent.panel.geometry().poisson, unit_m * unit_m);
        let turned = |q: usize| product(1.0 / hy.powi(q as i32), &bent.coefficients, &y.samples_turned[q]);
        let (plain, sloped, curved) = (turned(0), turned(1), turned(2));
        let mut across = product(-square / (hx * hx), &x.samples[2], &plain);
        let mut along = product(-square, &x.samples[0], &curved);
        for (x, y) in across.as_mut_slice().iter_mut().zip(along.as_mut_slice()) {
            (*x, *y) = (*x + poisson * *y, *y + poisson * *x);
        }
        let twist = product(-(1.0 - poisson) * square / hx, &x.samples[1], &sloped);
        let deflection = product(square * square, &x.samples[0], &plain);
        Grid { bent, deflection, across, along, twist }
    }

    fn summits(&self) -> Summits {
        let principal = self.largest(&self.moments(PointState::principal_of), PointState::principal_n);
        let von_mises = self.moments(PointState::von_mises_of);
        Summits {
            deflection_n_m2: self.largest(&self.deflection, |s| s.deflection_n_m2),
            principal,
            von_mises: self.summit(&von_mises, 1.0, 0.0, PointState::von_mises_n),
        }
    }

    /// A value of the moments that span across and along, and the twist.
    fn moments(&self, of: impl Fn(f64, f64, f64) -> f64) -> DMatrix<f64> {
        let mut values = self.across.clone();
        let others = self.along.as_slice().iter().zip(self.twist.as_slice());
        values.as_mut_slice().iter_mut().zip(others).for_each(|(x, (y, xy))| *x = of(*x, *y, *xy));
        values
    }

    /// The value of largest magnitude.
    fn largest(&self, values: &DMatrix<f64>, of: impl Fn(&PointState) -> f64) -> Peak {
        let low = self.summit(values, -1.0, highest(values, 1.0).1, &of);
        let high = self.summit(values, 1.0, -low.value, &of);
        if -low.value > high.value { low } else { high }
    }

    fn extremes(&self, values: &DMatrix<f64>, of: impl Fn(&PointState) -> f64) -> Extremes {
        Extremes { high: self.summit(values, 1.0, 0.0, &of), low: self.summit(values, -1.0, 0.0, &of) }
    }

    /// The summit of a value on the side of `sign`: the outermost point, moved to where the value bends over and taken there,
    /// unless that is far below what `matters`; zero where all is on the other side.
    fn summit(&self, values: &DMatrix<f64>, sign: f64, matters: f64, of: impl Fn(&PointState) -> f64) -> Peak {
        let SolvedPanel { x, y, .. } = self.bent.panel;
        let (k, top) = highest(values, sign);
        if top <= 0.0 {
            return Peak { value: 0.0, x_m: 0.0, y_m: 0.0 };
        }
        let (i, j) = (k % values.nrows(), k / values.nrows());
        let on_point = Peak { value: sign * top, x_m: self.x_m(x.points[i]), y_m: self.y_m(y.points[j]) };
        let is_corner = (i == 0 || i + 1 == values.nrows()) && (j == 0 || j + 1 == values.ncols());
        if is_corner || top < (1.0 - SUMMIT_SHARE) * matters {
            return on_point;
        }
        let x_m = self.x_m(summit(&x.points, values.column(j).iter().map(|v| sign * v), i).0);
        let y_m = self.y_m(summit(&y.points, values.row(i).iter().map(|v| sign * v), j).0);
        let value = of(&self.bent.at(x_m, y_m));
        if sign * value > top { Peak { value, x_m, y_m } } else { on_point }
    }

    fn side(&self) -> EdgeReaction {
        let y = &self.bent.panel.y;
        let (mean_n_per_m, peak_n_per_m, peak_at) = side_force(self.bent);
        let moments: Vec<f64> = self.across.row(0).iter().copied().collect();
        let (moment_at, moment_n) = self.edge_moment(&y.points, &moments);
        EdgeReaction {
            mean_n_per_m,
            peak_n_per_m,
            peak_at_m: self.y_m(peak_at),
            moment_n,
            moment_at_m: self.y_m(moment_at),
        }
    }

    /// The bottom edge (`j` first, `sign` 1) or the top edge (`j` last, `sign` -1):
    /// V = -sign (w_yyy + (2 - nu) w_xxy).
    fn level_edge(&self, j: usize, sign: f64) -> EdgeReaction {
        let SolvedPanel { x, y, half: [hx, hy], unit_m, .. } = self.bent.panel;
        let poisson = self.bent.panel.geometry().poisson;
        let at_edge = |q: usize| -> DVector<f64> { &self.bent.coefficients * y.samples[q].row(j).transpose() };
        let (slope, third) = (at_edge(1) * (2.0 - poisson) / *hy / (hx * hx), at_edge(3) / hy.powi(3));
        let force = (&x.samples[0] * &third + &x.samples[2] * &slope) * (-sign * unit_m);
        let mean = (x.basis.means(0).dot(&third) + x.basis.means(2).dot(&slope)) * (-sign * unit_m);
        let (peak_at, peak) = largest_along(&x.points, force.as_slice());
        let moments: Vec<f64> = self.along.column(j).iter().copied().collect();
        let (moment_at, moment_n) = self.edge_moment(&x.points, &moments);
        EdgeReaction {
            mean_n_per_m: mean,
            peak_n_per_m: peak,
            peak_at_m: self.x_m(peak_at),
            moment_n,
            moment_at_m: self.x_m(moment_at),
        }
    }

    fn edge_moment(&self, points: &[f64], moments: &[f64]) -> (f64, f64) {
        if self.bent.panel.geometry().support.is_clamped() { largest_along(points, moments) } else { (-1.0, 0.0) }
    }

    fn x_m(&self, xi: f64) -> f64 {
        0.5 * (xi + 1.0) * self.bent.panel.geometry().width_m
    }

    fn y_m(&self, eta: f64) -> f64 {
        0.5 * (eta + 1.0) * self.bent.panel.geometry().height_m
    }
}

/// The highest of all values on the side of `sign`, above zero there, and its place among them.
fn highest(values: &DMatrix<f64>, sign: f64) -> (usize, f64) {
    let (mut best, mut top) = (0, 0.0);
    for (i, value) in values.as_slice().iter().enumerate() {
        if sign * value > top {
            (best, top) = (i, sign * value);
        }
    }
    (best, top)
}

fn product(scale: f64, a: &DMatrix<f64>, b: &DMatrix<f64>) -> DMatrix<f64> {
    let mut product = DMatrix::zeros(a.nrows(), b.ncols());
    product.gemm(scale, a, b, 0.0);
    product
}

/// The force along a side, N/m, V = -(w_xxx + (2 - nu) w_xyy) at its left end: its mean, its value of largest magnitude, and
/// where on -1..1 that is.
fn side_force(bent: &Bent) -> (f64, f64, f64) {
    let SolvedPanel { x, y, half: [hx, hy], unit_m, .. } = bent.panel;
    let geometry = bent.panel.geometry();
    let slope = x.samples[1].row(0) * &bent.coefficients * (2.0 - geometry.poisson) / *hx / (hy * hy);
    let third = x.samples[3].row(0) * &bent.coefficients / hx.powi(3);
    let force = -(&third * &y.samples_turned[0] + &slope * &y.samples_turned[2]) * *unit_m;
    let mean = -(third * y.basis.means(0) + slope * y.basis.means(2))[0] * unit_m;
    // -1..1 is the whole side, and a tenth of it 0.2.
    let is_spiked = |is_free| geometry.support.is_clamped() && is_free;
    let from = if is_spiked(geometry.support.is_free_at_bottom()) { -0.8 } else { -1.0 };
    let to = if is_spiked(geometry.support.is_free_at_top()) { 0.8 } else { 1.0 };
    let kept = y.points.iter().copied().zip(force.iter().copied()).filter(|(eta, _)| (from..=to).contains(eta));
    let (points, forces): (Vec<f64>, Vec<f64>) = kept.unzip();
    let (peak_at, peak) = largest_along(&points, &forces);
    (mean, peak, peak_at)
}

/// Where the value of largest magnitude along an edge is, and the value, signed.
fn largest_along(points: &[f64], values: &[f64]) -> (f64, f64) {
    let best = values.iter().enumerate().max_by(|a, b| a.1.abs().total_cmp(&b.1.abs()));
    let Some((i, value)) = best else { return (-1.0, 0.0) };
    let sign = if *value < 0.0 { -1.0 } else { 1.0 };
    let (at, over) = summit(points, values.iter().map(|v| sign * v), i);
    (at, value + sign * over)
}

/// The summit near the highest of sampled values, at index `i`, by the parabola through it and its neighbours: where
/// it is, and how far it stands above the sample. At either end, the sample itself.
fn summit(points: &[f64], values: impl Iterator<Item = f64>, i: usize) -> (f64, f64) {
    if i == 0 || i + 1 >= points.len() {
        return (points[i], 0.0);
    }
    let near: Vec<f64> = values.skip(i - 1).take(3).collect();
    let (left, right) = (points[i] - points[i - 1], points[i + 1] - points[i]);
    let (rise, fall) = ((near[1] - near[0]) / left, (near[2] - near[1]) / right);
    let curvature = (fall - rise) / (left + right);
    if curvature >= 0.0 || curvature.is_nan() {
        return (points[i], 0.0);
    }
    let slope = rise + curvature * left;
    let step = (-slope / (2.0 * curvature)).clamp(-left, right);
    (points[i] + step, step * (slope + curvature * step))
}
