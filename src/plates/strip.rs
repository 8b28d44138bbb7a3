//! A one-way strip: a metre of plate that spans along the plate only, as a beam does.
//!
//! Beam statics, exact for every straight piece of pressure (their integrands are polynomials, which the quadrature
//! integrates exactly). Source: [BeamFormulas].

use super::{PlateError, Profile};
use crate::num::gauss;

/// How the ends of a strip are held; it starts at 0 and ends at its length.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum StripEnds {
    /// Cannot turn at its start; its end is free: a plate that stands.
    HeldAtStart,
    /// Cannot turn at its end; its start is free: a plate that hangs.
    HeldAtEnd,
    /// Turns freely at both ends.
    Hinged,
    /// Cannot turn at either end.
    Clamped,
}

/// What an end of a strip hands to its support, a metre of the plate's depth; zero at a free end.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct EndReaction {
    /// Force that presses the support the way a positive pressure does, N/m.
    pub force_n_per_m: f64,
    /// Bending moment at the end, N m a metre; above zero where the face away from a positive pressure is stretched.
    pub moment_n: f64,
}

/// A loaded strip.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Strip {
    /// At its start.
    pub start: EndReaction,
    /// At its end.
    pub end: EndReaction,
    /// The most positive bending moment along it, N m a metre, zero or above, and where, m.
    pub high: (f64, f64),
    /// The most negative one, zero or below, and where.
    pub low: (f64, f64),
}

impl Strip {
    /// Loads a strip of `length_m` by a net pressure along it.
    ///
    /// Errors: a length that is no number above zero; sums beyond what numbers hold.
    pub fn load(length_m: f64, ends: StripEnds, pressure: &Profile) -> Result<Strip, PlateError> {
        if !(length_m.is_finite() && length_m > 0.0) {
            return Err(PlateError::Size { what: "the strip's length", value_m: length_m });
        }
        // Force, force times share along, and the fixed-end moments at start and end: of a unit force at share x
        // these are L x (1 - x)^2 and L x^2 (1 - x).
        let mut sums = [0.0; 4];
        for piece in pressure.pieces(length_m) {
            let piece_m = piece.to_m - piece.from_m;
            let part = gauss(1, |t| {
                let x = (piece.from_m + t * piece_m) / length_m;
                let force = (piece.from_pa + t * (piece.to_pa - piece.from_pa)) * piece_m;
                [force, force * x, force * x * (1.0 - x) * (1.0 - x), force * x * x * (1.0 - x)]
            });
            sums.iter_mut().zip(part).for_each(|(sum, part)| *sum += part);
        }
        let [force, at_end, fixed_start, fixed_end] = sums;
        let reaction = |force_n_per_m, moment_n| EndReaction { force_n_per_m, moment_n };
        let (start, end) = match ends {
            StripEnds::HeldAtStart => (reaction(force, -at_end * length_m), EndReaction::default()),
            StripEnds::HeldAtEnd => (EndReaction::default(), reaction(force, -(force - at_end) * length_m)),
            StripEnds::Hinged => (reaction(force - at_end, 0.0), reaction(at_end, 0.0)),
            StripEnds::Clamped => {
                let shift = fixed_start - fixed_end;
                let at_start = reaction(force - at_end + shift, -fixed_start * length_m);
                (at_start, reaction(at_end - shift, -fixed_end * length_m))
            }
        };
        if ![start.force_n_per_m, start.moment_n, end.force_n_per_m, end.moment_n].iter().all(|v| v.is_finite()) {
            return Err(PlateError::OutOfNumbers);
        }
        let mut strip = Strip { start, end, high: (0.0, 0.0), low: (0.0, 0.0) };
        strip.find_moments(length_m, pressure);
        Ok(strip)
    }

    /// Walks along the strip with shear V and moment M: M' = V and V' = -p.
    fn find_moments(&mut self, length_m: f64, pressure: &Profile) {
        let (mut at_m, mut shear, mut moment) = (0.0, self.start.force_n_per_m, self.start.moment_n);
        self.note(moment, 0.0);
        for piece in pressure.pieces(length_m) {
            moment += shear * (piece.from_m - at_m);
            self.note(moment, piece.from_m);
            let span = piece.to_m - piece.from_m;
            let (p, slope) = (piece.from_pa, (piece.to_pa - piece.from_pa) / span);
            let moment_at = |t: f64| moment + t * (shear - t * (p / 2.0 + t * slope / 6.0));
            for t in roots(-slope / 2.0, -p, shear).into_iter().filter(|t| *t > 0.0 && *t < span) {
                self.note(moment_at(t), piece.from_m + t);
            }
            moment = moment_at(span);
            shear -= span * (p + piece.to_pa) / 2.0;
            at_m = piece.to_m;
            self.note(moment, at_m);
        }
        self.note(self.end.moment_n, length_m);
    }

    fn note(&mut self, moment: f64, at_m: f64) {
        if moment > self.high.0 {
            self.high = (moment, at_m);
        }
        if moment < self.low.0 {
            self.low = (moment, at_m);
        }
    }
}

/// Real roots of a x^2 + b x + c, without loss of figures; not finite where there are none.
fn roots(a: f64, b: f64, c: f64) -> [f64; 2] {
    let q = -0.5 * (b + b.signum() * (b * b - 4.0 * a * c).sqrt());
    [q / a, c / q]
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Start force and moment, end force and moment, most positive moment and where.
    type Expected = [f64; 6];

    fn check(ends: StripEnds, points: &[(f64, f64)], expected: Expected) {
        let strip = Strip::load(2.0, ends, &Profile::new(points.to_vec()).unwrap()).unwrap();
        let Strip { start, end, high, .. } = strip;
        let got = [start.force_n_per_m, start.moment_n, end.force_n_per_m, end.moment_n, high.0, high.1];
        for (i, (got, want)) in got.iter().zip(expected).enumerate() {
            assert!((got - want).abs() < 1e-13, "{ends:?} under {points:?}, value {i}: {got}, expected {want}");
        }
    }

    #[test]
    fn beam_formulas() {
        // Standard beam formulas (q L^2 / 8, / 12, / 24; triangular q0 L^2 / (9 sqrt 3) at L / sqrt 3, / 20, / 30),
        // for L = 2 and q = 3.
        let uniform = [(0.0, 3.0), (2.0, 3.0)];
        let rising = [(0.0, 0.0), (2.0, 3.0)];
        let root3 = 3.0_f64.sqrt();
        check(StripEnds::Hinged, &uniform, [3.0, 0.0, 3.0, 0.0, 1.5, 1.0]);
        check(StripEnds::Clamped, &uniform, [3.0, -1.0, 3.0, -1.0, 0.5, 1.0]);
        check(StripEnds::HeldAtStart, &uniform, [6.0, -6.0, 0.0, 0.0, 0.0, 0.0]);
        check(StripEnds::HeldAtEnd, &uniform, [0.0, 0.0, 6.0, -6.0, 0.0, 0.0]);
        check(StripEnds::Hinged, &rising, [1.0, 0.0, 2.0, 0.0, 12.0 / (9.0 * root3), 2.0 / root3]);
        check(StripEnds::HeldAtStart, &rising, [3.0, -4.0, 0.0, 0.0, 0.0, 0.0]);
        check(StripEnds::HeldAtEnd, &rising, [0.0, 0.0, 3.0, -2.0, 0.0, 0.0]);
        // Clamped under a triangle: V = 3 q0 L / 20 - q0 x^2 / (2 L) vanishes at x = L sqrt 0.3.
        let x = 0.3_f64.sqrt();
        let most = 12.0 * (-1.0 / 30.0 + 0.15 * x - x * x * x / 6.0);
        check(StripEnds::Clamped, &rising, [0.9, -0.4, 2.1, -0.6, most, 2.0 * x]);
    }

    #[test]
    fn a_narrow_load_is_a_point_load() {
        // A force P at a of a clamped beam: P a b^2 / L^2 and P a^2 b / L^2 (standard beam formulas), here with
        // P = 1, a = 0.5, b = 1.5; a width of w changes them by the order of w^2.
        let (w, a, b) = (1e-3, 0.5, 1.5);
        let load = [(a - w / 2.0, 1.0 / w), (a + w / 2.0, 1.0 / w)];
        let strip = Strip::load(2.0, StripEnds::Clamped, &Profile::new(load.to_vec()).unwrap()).unwrap();
        for (got, want) in [
            (strip.start.moment_n, -a * b * b / 4.0),
            (strip.end.moment_n, -a * a * b / 4.0),
            (strip.start.force_n_per_m, b * b * (3.0 * a + b) / 8.0),
        ] {
            assert!((got - want).abs() < 2.0 * w * w, "{got}, expected {want}");
        }
    }

    #[test]
    fn a_turned_load_bends_the_other_way() {
        let profile =
            |sign: f64| Profile::new(vec![(0.2, sign), (0.9, 4.0 * sign), (0.9, -sign), (1.7, 0.0)]).unwrap();
        for ends in [StripEnds::HeldAtStart, StripEnds::HeldAtEnd, StripEnds::Hinged, StripEnds::Clamped] {
            let [one, other] = [1.0, -1.0].map(|sign| Strip::load(2.0, ends, &profile(sign)).unwrap());
            assert_eq!(one.high.0, -other.low.0, "{ends:?}");
            assert_eq!(one.start.force_n_per_m, -other.start.force_n_per_m, "{ends:?}");
            let force = one.start.force_n_per_m + one.end.force_n_per_m;
            assert!((force - profile(1.0).resultant_n_per_m(2.0)).abs() < 1e-14, "{ends:?}: {force}");
        }
    }

    #[test]
    fn bad_lengths_are_refused() {
        let load = Profile::linear(1.0, 1.0, 1.0).unwrap();
        for length in [0.0, -1.0, f64::NAN, f64::INFINITY] {
            assert!(
                matches!(Strip::load(length, StripEnds::Hinged, &load), Err(PlateError::Size { .. })),
                "{length}"
            );
        }
        let huge = Profile::linear(1e10, f64::MAX, f64::MAX).unwrap();
        assert_eq!(Strip::load(1e10, StripEnds::Clamped, &huge), Err(PlateError::OutOfNumbers));
    }
}
