//! Net pressure along a plate: a chain of straight pieces.

use super::PlateError;

/// Net pressure along a plate, linear between points; nothing presses before the first and beyond the last. Two
/// points at one place are a step.
#[derive(Clone, Debug, PartialEq)]
pub struct Profile {
    points: Vec<(f64, f64)>,
}

/// A straight piece of a profile; its length is above zero.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Piece {
    /// Where it starts, m along the plate.
    pub from_m: f64,
    /// Where it ends.
    pub to_m: f64,
    /// Pressure at its start, Pa.
    pub from_pa: f64,
    /// Pressure at its end.
    pub to_pa: f64,
}

impl Profile {
    /// From points (distance along the plate in m, net pressure in Pa), in order.
    ///
    /// Errors: fewer than two points, a point behind the one before it, a number that is not finite.
    pub fn new(points: Vec<(f64, f64)>) -> Result<Profile, PlateError> {
        if points.len() < 2 {
            return Err(PlateError::Pressure(format!("{} point is too few", points.len())));
        }
        for (i, (at, pressure)) in points.iter().enumerate() {
            if !at.is_finite() || !pressure.is_finite() {
                return Err(PlateError::Pressure(format!("point {} is {pressure} Pa at {at} m", i + 1)));
            }
        }
        if let Some(i) = points.windows(2).position(|pair| pair[1].0 < pair[0].0) {
            let (before, at) = (points[i].0, points[i + 1].0);
            return Err(PlateError::Pressure(format!("point {} at {at} m lies before {before} m", i + 2)));
        }
        Ok(Profile { points })
    }

    /// Linear from one pressure at the start to another at `length_m`.
    pub fn linear(length_m: f64, start_pa: f64, end_pa: f64) -> Result<Profile, PlateError> {
        Profile::new(vec![(0.0, start_pa), (length_m, end_pa)])
    }

    /// As seen from the other end of a plate of `length_m`.
    pub fn turned(&self, length_m: f64) -> Profile {
        Profile { points: self.points.iter().rev().map(|(at, pressure)| (length_m - at, *pressure)).collect() }
    }

    /// The same, `factor` times as strong.
    pub fn times(&self, factor: f64) -> Profile {
        Profile { points: self.points.iter().map(|(at, pressure)| (*at, factor * pressure)).collect() }
    }

    /// The parts of its pieces between the start of the plate and `length_m`.
    pub fn pieces(&self, length_m: f64) -> impl Iterator<Item = Piece> {
        self.points.windows(2).filter_map(move |pair| {
            let ((a, p), (b, q)) = (pair[0], pair[1]);
            let (from_m, to_m) = (a.max(0.0), b.min(length_m));
            let pressure_at = |x: f64| p + (q - p) * ((x - a) / (b - a));
            (from_m < to_m).then(|| Piece { from_m, to_m, from_pa: pressure_at(from_m), to_pa: pressure_at(to_m) })
        })
    }

    /// The resultant between the start of the plate and `length_m`, N per metre of its depth.
    pub fn resultant_n_per_m(&self, length_m: f64) -> f64 {
        self.pieces(length_m).map(|p| 0.5 * (p.from_pa + p.to_pa) * (p.to_m - p.from_m)).sum()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn pieces_are_cut_to_the_plate() {
        // A ramp that starts before the plate, a step, and a piece that runs beyond the end.
        let profile = Profile::new(vec![(-1.0, 0.0), (1.0, 4.0), (1.0, -2.0), (3.0, -6.0)]).unwrap();
        let pieces: Vec<Piece> = profile.pieces(2.0).collect();
        let want = [
            Piece { from_m: 0.0, to_m: 1.0, from_pa: 2.0, to_pa: 4.0 },
            Piece { from_m: 1.0, to_m: 2.0, from_pa: -2.0, to_pa: -4.0 },
        ];
        assert_eq!(pieces, want);
        assert_eq!(profile.resultant_n_per_m(2.0), 0.0);
        let turned: Vec<(f64, f64)> = profile.turned(2.0).pieces(2.0).map(|p| (p.from_pa, p.to_pa)).collect();
        assert_eq!(turned, [(-4.0, -2.0), (4.0, 2.0)]);
    }

    #[test]
    fn bad_points_are_named() {
        for (points, word) in [
            (vec![(0.0, 1.0)], "too few"),
            (vec![(0.0, 1.0), (1.0, f64::NAN)], "point 2 is NaN"),
            (vec![(0.0, 1.0), (f64::INFINITY, 1.0)], "point 2"),
            (vec![(1.0, 1.0), (0.5, 1.0)], "point 2 at 0.5 m lies before 1 m"),
        ] {
            let error = Profile::new(points.clone()).expect_err("bad points").to_string();
            assert!(error.contains(word), "{points:?}: {error}");
        }
    }
}
