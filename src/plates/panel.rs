//! The bending stiffness of a rectangular panel, made ready once and bent by any pressure along its height.
//!
//! Thin-plate theory for small deflections, solved by Ritz's method: the deflection is a sum of products of
//! polynomials that meet the supports, and its energy is least. x runs across the panel from its left side, y up
//! from its bottom edge; everything is alike left and right. Knows no material beyond Poisson's ratio and no
//! thickness: moments and reactions do not depend on them, and the deflection is given times the rigidity D.
//! Source: [PlateBending] for the theory, [PanelRitz] for this solution.

use std::f64::consts::{FRAC_PI_2, PI};

use nalgebra::{Cholesky, DMatrix, DVector};

use super::basis::{Basis, Ends, Samples};
use super::bent::Bent;
use super::{PlateError, Profile};
use crate::num::{LegendreSeries, legendre_polynomials};

/// How the edges of a panel are held.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Support {
    /// All edges are held and turn freely.
    Simple,
    /// All edges are held and cannot turn.
    Clamped,
    /// Sides and bottom are held and turn freely; the top edge is free.
    SimpleFreeTop,
    /// Sides and bottom are held and cannot turn; the top edge is free.
    ClampedFreeTop,
    /// The sides are held and turn freely; bottom and top edge are free.
    SimpleSides,
    /// The sides are held and cannot turn; bottom and top edge are free.
    ClampedSides,
}

impl Support {
    /// In words.
    pub fn words(self) -> &'static str {
        match self {
            Support::Simple => "simply supported",
            Support::Clamped => "clamped",
            Support::SimpleFreeTop => "simply supported, top edge free",
            Support::ClampedFreeTop => "clamped, top edge free",
            Support::SimpleSides => "simply supported along its sides, bottom and top edge free",
            Support::ClampedSides => "clamped along its sides, bottom and top edge free",
        }
    }

    /// Whether the held edges cannot turn.
    pub fn is_clamped(self) -> bool {
        matches!(self, Support::Clamped | Support::ClampedFreeTop | Support::ClampedSides)
    }

    /// Whether the bottom edge is free.
    pub fn is_free_at_bottom(self) -> bool {
        matches!(self, Support::SimpleSides | Support::ClampedSides)
    }

    /// Whether the top edge is free.
    pub fn is_free_at_top(self) -> bool {
        !matches!(self, Support::Simple | Support::Clamped)
    }

    /// Whether a panel that is much wider than high is a strip in its middle, held along its bottom.
    fn spans_along_height(self) -> bool {
        matches!(self, Support::Simple | Support::Clamped | Support::ClampedFreeTop)
    }
}

/// What a panel's stiffness depends on.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PanelGeometry {
    /// Across, between stiffeners or side walls, m.
    pub width_m: f64,
    /// Along the plate, m.
    pub height_m: f64,
    /// How its edges are held.
    pub support: Support,
    /// Poisson's ratio of its material.
    pub poisson: f64,
}

/// A panel whose stiffness is solved: keep it as long as its geometry holds, and bend it as often as wanted.
#[derive(Clone, Debug)]
pub struct SolvedPanel {
    geometry: PanelGeometry,
    /// Length unit of the solution, m: the shorter side.
    pub(super) unit_m: f64,
    /// Half the width and half the height in that unit.
    pub(super) half: [f64; 2],
    pub(super) x: Direction,
    pub(super) y: Direction,
    /// First and second integrals of the functions along y, for the work of a pressure.
    integrals: Vec<[LegendreSeries; 2]>,
    blocks: Vec<Block>,
}

/// Functions along one side, and their values where peaks are looked for.
#[derive(Clone, Debug)]
pub(super) struct Direction {
    pub basis: Basis,
    /// On -1..1; only the left half across.
    pub points: Vec<f64>,
    /// One row a point.
    pub samples: Samples,
    /// One column a point.
    pub samples_turned: Samples,
}

/// Functions along y that do not couple with the others, and how the panel answers to a unit of work on each: the
/// coefficients of their products with the functions along x, one column a function of them that is worked on.
#[derive(Clone, Debug)]
struct Block {
    y_idx: Vec<usize>,
    answers: DMatrix<f64>,
}

impl PanelGeometry {
    /// A panel of a plate across a tank of `tank_width_m`: between its stiffeners, or, where it has none or they
    /// stand wider apart, from side wall to side wall.
    pub fn of_plate(
        tank_width_m: f64,
        stiffener_spacing_m: Option<f64>,
        height_m: f64,
        support: Support,
        poisson: f64,
    ) -> PanelGeometry {
        let width_m = stiffener_spacing_m.filter(|spacing| *spacing < tank_width_m).unwrap_or(tank_width_m);
        PanelGeometry { width_m, height_m, support, poisson }
    }
}

impl SolvedPanel {
    /// Up to which ratio of its sides a panel is solved. A wider one whose bottom and top, or clamped bottom alone,
    /// hold it is bent as at this ratio, since its middle is a strip; other panels beyond are refused.
    pub const MOST_SLENDER: f64 = 20.0;

    /// Solves the stiffness of a panel: of the order of a millisecond for usual ratios of its sides.
    ///
    /// Accuracy between ratios of 1/10 and 10: moments and deflection 2e-4 of the largest, reactions 1 %. Beside the
    /// corner of a clamped side and a free top the theory's moment oscillates and its reaction grows without bound (a
    /// local solution behaves as r^(2.07 + 0.44 i) for Poisson's ratio 0.3): moments within 3 % and reactions within
    /// about 10 % there.
    ///
    /// Errors: a side that is no number above zero, Poisson's ratio outside 0..0.5, a panel too slender
    /// ([`SolvedPanel::MOST_SLENDER`]).
    pub fn new(geometry: PanelGeometry) -> Result<SolvedPanel, PlateError> {
        let PanelGeometry { width_m, height_m, support, poisson } = geometry;
        for (what, value_m) in [("the panel's width", width_m), ("the panel's height", height_m)] {
            if !(value_m.is_finite() && value_m > 0.0) {
                return Err(PlateError::Size { what, value_m });
            }
        }
        if !(0.0..=0.5).contains(&poisson) {
            return Err(PlateError::Poisson(poisson));
        }
        let (wide, tall, most) = (width_m / height_m, height_m / width_m, Self::MOST_SLENDER);
        if tall > most {
            return Err(PlateError::TooTall { ratio: tall, most });
        }
        if wide > most && !support.spans_along_height() {
            return Err(PlateError::TooWide { ratio: wide, most });
        }
        // Half as many across, since only even ones are wanted there; an even count of them converges best.
        SolvedPanel::with_counts(geometry, 2 * n_functions(wide).div_ceil(4), n_functions(tall))
    }

    /// As [`SolvedPanel::new`], for given counts of functions across (even ones) and along the height.
    pub(super) fn with_counts(geometry: PanelGeometry, n_x: usize, n_y: usize) -> Result<SolvedPanel, PlateError> {
        let PanelGeometry { width_m, height_m, support, poisson } = geometry;
        let unit_m = width_m.min(height_m);
        let half = [0.5 * (width_m / unit_m).min(Self::MOST_SLENDER), 0.5 * height_m / unit_m];
        let (x_ends, y_ends) = match support {
            Support::Simple => (Ends::Simple, Ends::Simple),
            Support::Clamped => (Ends::Clamped, Ends::Clamped),
            Support::SimpleFreeTop => (Ends::Simple, Ends::SimpleFree),
            Support::ClampedFreeTop => (Ends::Clamped, Ends::ClampedFree),
            Support::SimpleSides => (Ends::Simple, Ends::Free),
            Support::ClampedSides => (Ends::Clamped, Ends::Free),
        };
        let (x, y) = (Basis::even(x_ends, n_x), Basis::new(y_ends, n_y));
        // Where bottom and top are held alike, what is even along y does not couple with what is odd.
        let parts: Vec<Vec<usize>> = if support.is_free_at_top() != support.is_free_at_bottom() {
            vec![(0..n_y).collect()]
        } else {
            vec![(0..n_y).step_by(2).collect(), (1..n_y).step_by(2).collect()]
        };
        // The work of a pressure that is alike all across on each function along x.
        let across = x.means(0) * (2.0 * half[0]);
        let block = |y_idx: Vec<usize>| {
            let stiffness =
                Cholesky::new(stiffness(&x, &y, &y_idx, half, poisson)).ok_or(PlateError::OutOfNumbers)?;
            let answers = stiffness.solve(&across.kronecker(&DMatrix::identity(y_idx.len(), y_idx.len())));
            Ok(Block { y_idx, answers })
        };
        let blocks = parts.into_iter().map(block).collect::<Result<_, PlateError>>()?;
        let integrals = y.functions().iter().map(|f| [f.integral(), f.integral().integral()]).collect();
        // Points lie closer together toward the edges, as the functions' own turning points do.
        let (n_left, n_along) = (2 * n_x + 3, 2 * n_y + 5);
        let left = (0..n_left).map(|i| -(FRAC_PI_2 * i as f64 / (n_left - 1) as f64).cos()).collect();
        let along = (0..n_along).map(|i| -(PI * i as f64 / (n_along - 1) as f64).cos()).collect();
        let (x, y) = (Direction::new(x, left), Direction::new(y, along));
        Ok(SolvedPanel { geometry, unit_m, half, x, y, integrals, blocks })
    }

    /// What it was solved for.
    pub fn geometry(&self) -> PanelGeometry {
        self.geometry
    }

    /// Bends it by a net pressure along its height, from the bottom up, alike all across.
    ///
    /// Errors: sizes and pressures beyond what numbers hold.
    pub fn bend(&self, pressure: &Profile) -> Result<Bent<'_>, PlateError> {
        let along = self.work_along(pressure);
        let mut coefficients = DMatrix::zeros(self.x.basis.len(), along.len());
        for Block { y_idx, answers } in &self.blocks {
            let n = y_idx.len();
            let work = DVector::from_iterator(n, y_idx.iter().map(|&i| along[i]));
            for (k, value) in (answers * work).iter().enumerate() {
                coefficients[(k / n, y_idx[k % n])] = *value;
            }
        }
        let load_n = pressure.resultant_n_per_m(self.geometry.height_m) * self.geometry.width_m;
        // With room for what derivatives add.
        let scale = self.unit_m.powi(4);
        let is_within = scale.is_normal() && (coefficients.amax() * scale * 1e12).is_finite();
        let has_numbers = coefficients.iter().all(|c| c.is_finite()) && load_n.is_finite();
        if is_within && has_numbers {
            Ok(Bent { panel: self, coefficients, load_n })
        } else {
            Err(PlateError::OutOfNumbers)
        }
    }

    /// The work of the pressure on each function along y: integral of q f, in Pa times the length unit. Exact: with
    /// F' = f and FF' = F, the integral of q f over a straight piece is that of (q F - q' FF)'.
    fn work_along(&self, pressure: &Profile) -> Vec<f64> {
        let height_m = self.geometry.height_m;
        let mut work = vec![0.0; self.integrals.len()];
        for piece in pressure.pieces(height_m) {
            let (from, to) = (2.0 * piece.from_m / height_m - 1.0, 2.0 * piece.to_m / height_m - 1.0);
            let slope = (piece.to_pa - piece.from_pa) / (to - from);
            if !slope.is_finite() {
                // Shorter than numbers resolve: nothing presses on it.
                continue;
            }
            let n = self.integrals.iter().map(|[_, second]| second.n_coefficients()).max().unwrap_or(0);
            let [at_from, at_to] = [from, to].map(|at| legendre_polynomials(n, at));
            for (sum, [first, second]) in work.iter_mut().zip(&self.integrals) {
                let end = piece.to_pa * first.sum(&at_to) - slope * second.sum(&at_to);
                let start = piece.from_pa * first.sum(&at_from) - slope * second.sum(&at_from);
                *sum += (end - start) * self.half[1];
            }
        }
        work
    }
}

impl Direction {
    fn new(basis: Basis, points: Vec<f64>) -> Direction {
        let samples = basis.samples(&points);
        let samples_turned = samples.each_ref().map(DMatrix::transpose);
        Direction { basis, points, samples, samples_turned }
    }
}

/// How many functions go along a side that is `ratio` times as long as the other.
fn n_functions(ratio: f64) -> usize {
    (16 + 2 * ratio.ceil().min(6.0) as usize).max(18)
}

/// Energy of every pair of products of functions, for D = 1: the integral of
/// w_xx w_xx + w_yy w_yy + nu (w_xx w_yy + w_yy w_xx) + 2 (1 - nu) w_xy w_xy.
fn stiffness(x: &Basis, y: &Basis, y_idx: &[usize], half: [f64; 2], poisson: f64) -> DMatrix<f64> {
    let term = |p: usize, q: usize, r: usize, s: usize| {
        let along = y.products(r, s).select_rows(y_idx).select_columns(y_idx);
        let scale = half[0].powi(1 - (p + q) as i32) * half[1].powi(1 - (r + s) as i32);
        x.products(p, q).kronecker(&along) * scale
    };
    let mixed = term(2, 0, 0, 2);
    term(2, 2, 0, 0)
        + term(0, 0, 2, 2)
        + (&mixed + mixed.transpose()) * poisson
        + term(1, 1, 1, 1) * (2.0 * (1.0 - poisson))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The work of a uniform pressure on a square panel with `n` functions along its height.
    fn compliance(support: Support, n: usize) -> f64 {
        let geometry = PanelGeometry { width_m: 1.0, height_m: 1.0, support, poisson: 0.3 };
        let panel = SolvedPanel::with_counts(geometry, n / 2, n).unwrap();
        let pressure = Profile::linear(1.0, 1.0, 1.0).unwrap();
        let along = DVector::from_vec(panel.work_along(&pressure));
        let across = panel.x.basis.means(0) * (2.0 * panel.half[0]);
        (across.transpose() * panel.bend(&pressure).unwrap().coefficients * along)[0]
    }

    #[test]
    fn more_functions_only_soften_and_converge_at_the_corners_rate() {
        // With a deflection that behaves as r^c beside a corner, the energy's error of polynomials of degree n
        // falls as n^(-4 (c - 1)). c: 4 (times log r) for simple edges, 3.74 for clamped ones (Williams 1952,
        // values from memory), 2.07 for clamped beside free (local solution, computed); this one oscillates
        // and is slow to take its rate.
        for (support, c, slack) in [
            (Support::Simple, 4.0, 1.0),
            (Support::SimpleFreeTop, 4.0, 1.0),
            (Support::Clamped, 3.74, 1.5),
            (Support::ClampedFreeTop, 2.07, 1.5),
        ] {
            let [coarse, medium, fine] = [8, 16, 32].map(|n| compliance(support, n));
            assert!(coarse < medium && medium < fine, "{support:?}: {coarse} {medium} {fine} must grow");
            let rate = ((medium - coarse) / (fine - medium)).log2();
            let expected = 4.0 * (c - 1.0);
            assert!((rate - expected).abs() < slack, "{support:?}: rate {rate}, expected {expected} within {slack}");
        }
    }

    #[test]
    fn bad_geometry_is_refused_in_words() {
        let solve = |width_m, height_m, support, poisson| {
            SolvedPanel::new(PanelGeometry { width_m, height_m, support, poisson }).err().map(|e| e.to_string())
        };
        for (width, height, support, poisson, word) in [
            (0.0, 1.0, Support::Simple, 0.3, "width"),
            (1.0, f64::NAN, Support::Simple, 0.3, "height"),
            (f64::INFINITY, 1.0, Support::Simple, 0.3, "width"),
            (1.0, -1.0, Support::Clamped, 0.3, "height"),
            (1.0, 1.0, Support::Clamped, 0.6, "Poisson"),
            (1.0, 1.0, Support::Clamped, f64::NAN, "Poisson"),
            (1.0, 21.0, Support::Clamped, 0.3, "21 times as high as wide"),
            (21.0, 1.0, Support::SimpleFreeTop, 0.3, "hardly anything but its far sides"),
            (21.0, 1.0, Support::ClampedSides, 0.3, "hardly anything but its far sides"),
        ] {
            let error = solve(width, height, support, poisson);
            let has_word = error.as_ref().is_some_and(|e| e.contains(word));
            assert!(has_word, "{width} by {height}, {support:?}, {poisson}: {error:?} has no `{word}`");
        }
        for (width, height) in [(1e-200, 2e-200), (3e200, 1e200), (1e3, 1.0), (1.0, 20.0)] {
            assert_eq!(solve(width, height, Support::ClampedFreeTop, 0.0), None, "{width} by {height}");
        }
    }
}
