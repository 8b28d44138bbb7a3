//! A panel bent by a pressure: its state at any point.

use nalgebra::DMatrix;

use super::bending::{self, Bending, Summits};
use super::panel::SolvedPanel;

/// A panel under a pressure.
#[derive(Clone, Debug)]
pub struct Bent<'a> {
    pub(super) panel: &'a SolvedPanel,
    /// Of the products of functions: one row a function across, one column a function along the height.
    pub(super) coefficients: DMatrix<f64>,
    pub(super) load_n: f64,
}

/// A bent panel at a point. Positive: pressed back, and hollowed, as a positive pressure does it, so that the face
/// away from the pressure is stretched.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PointState {
    /// Deflection times the rigidity D = E t^3 / (12 (1 - nu^2)), N m2.
    pub deflection_n_m2: f64,
    /// Bending moment that spans across, Mx = -D (w_xx + nu w_yy), N m a metre.
    pub across_n: f64,
    /// Bending moment that spans along the height, My, N m a metre.
    pub along_n: f64,
    /// Twisting moment Mxy = -D (1 - nu) w_xy, N m a metre.
    pub twist_n: f64,
}

impl PointState {
    /// The principal bending moment of largest magnitude, signed.
    pub fn principal_n(&self) -> f64 {
        PointState::principal_of(self.across_n, self.along_n, self.twist_n)
    }

    /// The moment whose surface stress is von Mises's equivalent of this state's.
    pub fn von_mises_n(&self) -> f64 {
        PointState::von_mises_of(self.across_n, self.along_n, self.twist_n)
    }

    /// Of moments that span across and along, and twist.
    pub(super) fn principal_of(x: f64, y: f64, xy: f64) -> f64 {
        let (mean, half) = (0.5 * (x + y), 0.5 * (x - y));
        mean + (half * half + xy * xy).sqrt().copysign(mean)
    }

    pub(super) fn von_mises_of(x: f64, y: f64, xy: f64) -> f64 {
        (x * x + y * y - x * y + 3.0 * xy * xy).sqrt()
    }
}

impl Bent<'_> {
    /// The state at a point, in metres from the left side and from the bottom edge; beyond the panel, at its edge. In
    /// a panel wider than [`SolvedPanel::MOST_SLENDER`] heights, places across are stretched to its width.
    pub fn at(&self, x_m: f64, y_m: f64) -> PointState {
        let geometry = self.panel.geometry();
        let point = |at: f64, side: f64| (2.0 * (at / side) - 1.0).clamp(-1.0, 1.0);
        let x = self.panel.x.basis.samples(&[point(x_m, geometry.width_m)]);
        let y = self.panel.y.basis.samples(&[point(y_m, geometry.height_m)]);
        let [hx, hy] = self.panel.half;
        let along = [0, 1, 2].map(|q| &self.coefficients * y[q].row(0).transpose() / hy.powi(q as i32));
        let derived = |p: usize, q: usize| (x[p].row(0) * &along[q])[0] / hx.powi(p as i32);
        self.state(derived(0, 0), derived(2, 0), derived(0, 2), derived(1, 1))
    }

    /// What its strength is judged by: the part of [`Bent::bending`] that is soon had.
    pub fn summits(&self) -> Summits {
        bending::summits_of(self)
    }

    /// The force of largest magnitude along its sides, N/m, signed.
    pub fn side_force_n_per_m(&self) -> f64 {
        bending::side_force_of(self)
    }

    /// The largest of everything.
    pub fn bending(&self) -> Bending {
        bending::of(self)
    }

    /// From the deflection and its second derivatives in the panel's own length unit.
    fn state(&self, w: f64, w_xx: f64, w_yy: f64, w_xy: f64) -> PointState {
        let (poisson, square) = (self.panel.geometry().poisson, self.panel.unit_m * self.panel.unit_m);
        PointState {
            deflection_n_m2: w * square * square,
            across_n: -(w_xx + poisson * w_yy) * square,
            along_n: -(w_yy + poisson * w_xx) * square,
            twist_n: -(1.0 - poisson) * w_xy * square,
        }
    }
}
