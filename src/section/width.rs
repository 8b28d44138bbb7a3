//! The out-of-plane width of the tank as a function of height, and its integrals.

use std::f64::consts::PI;

/// Width law w(z).
#[derive(Clone, Debug, PartialEq)]
pub enum WidthLaw {
    /// The same at every height, m.
    Constant {
        /// w, m.
        width_m: f64,
    },
    /// A horizontal round barrel seen lengthwise: w = 2 sqrt(r2 - (z - z_axis)2).
    RoundBarrel {
        /// Inside diameter, m.
        diameter_m: f64,
        /// z of its lowest line, m.
        bottom_z_m: f64,
    },
    /// A horizontal barrel of elliptical cross-section seen lengthwise.
    Oval {
        /// Full width of the ellipse, m.
        width_m: f64,
        /// Full height of the ellipse, m.
        height_m: f64,
        /// z of its lowest line, m.
        bottom_z_m: f64,
    },
    /// Straight lines between rows (z, w), z rising, m. Zero width outside the rows.
    Table(Vec<(f64, f64)>),
}

impl WidthLaw {
    /// The width if it is the same everywhere.
    pub fn constant(&self) -> Option<f64> {
        match self {
            WidthLaw::Constant { width_m } => Some(*width_m),
            _ => None,
        }
    }

    /// The heights between which the law is given; none for a constant width.
    pub fn range(&self) -> Option<(f64, f64)> {
        match self {
            WidthLaw::Constant { .. } => None,
            WidthLaw::RoundBarrel { diameter_m, bottom_z_m } => Some((*bottom_z_m, bottom_z_m + diameter_m)),
            WidthLaw::Oval { height_m, bottom_z_m, .. } => Some((*bottom_z_m, bottom_z_m + height_m)),
            WidthLaw::Table(rows) => Some((rows.first()?.0, rows.last()?.0)),
        }
    }

    /// Heights at which the law is not smooth.
    pub fn kinks(&self) -> Vec<f64> {
        match self {
            WidthLaw::Table(rows) => rows.iter().map(|row| row.0).collect(),
            _ => self.range().map_or(Vec::new(), |(low, high)| vec![low, high]),
        }
    }

    /// w(z), m.
    pub fn width(&self, z: f64) -> f64 {
        match self {
            WidthLaw::Constant { width_m } => *width_m,
            WidthLaw::Table(rows) => {
                let after = rows.partition_point(|row| row.0 <= z);
                match (after.checked_sub(1).map(|i| rows[i]), rows.get(after)) {
                    (Some((z0, w0)), Some(&(z1, w1))) => w0 + (w1 - w0) * ((z - z0) / (z1 - z0)),
                    (Some((z0, w0)), None) if z == z0 => w0,
                    _ => 0.0,
                }
            }
            _ => {
                let (factor, r, t) = self.ellipse(z);
                if t.abs() >= r { 0.0 } else { 2.0 * factor * ((r - t) * (r + t)).sqrt() }
            }
        }
    }

    /// The largest width between two heights, m.
    pub fn widest(&self, low_z: f64, high_z: f64) -> f64 {
        let axis = self.range().map(|(low, high)| 0.5 * (low + high));
        let inner = self.kinks().into_iter().chain(axis).filter(|z| low_z < *z && *z < high_z);
        inner.chain([low_z, high_z]).map(|z| self.width(z)).fold(0.0, f64::max)
    }

    /// Omega(z): integral of w from the lowest height, m2. For a constant width, from z = 0.
    pub fn omega(&self, z: f64) -> f64 {
        self.integrals(z)[0]
    }

    /// Integral of Omega, m3.
    pub fn omega2(&self, z: f64) -> f64 {
        self.integrals(z)[1]
    }

    /// Omega and its integral in closed form.
    ///
    /// Round: with t = z - z_axis, q = sqrt(r2 - t2):
    /// Omega = t q + r2 asin(t/r) + pi r2/2,
    /// Omega2 = -q^3/3 + r2 (t asin(t/r) + q) + pi r2 t/2. The oval is the same, stretched sideways.
    /// Source: integrals of elementary functions (own derivation; tested against quadrature).
    fn integrals(&self, z: f64) -> [f64; 2] {
        match self {
            WidthLaw::Constant { width_m } => [width_m * z, 0.5 * width_m * z * z],
            WidthLaw::Table(rows) => {
                let (mut omega, mut omega2) = (0.0, 0.0);
                let Some(&(mut z0, mut w0)) = rows.first() else { return [0.0; 2] };
                for &(z1, w1) in &rows[1..] {
                    if z <= z0 {
                        return [omega, omega2];
                    }
                    let d = z.min(z1) - z0;
                    let gain = (w1 - w0) / (z1 - z0);
                    omega2 += d * (omega + d * (w0 / 2.0 + d * gain / 6.0));
                    omega += d * (w0 + d * gain / 2.0);
                    (z0, w0) = (z1, w1);
                }
                [omega, omega2 + omega * (z - z0).max(0.0)]
            }
            _ => {
                let (factor, r, t) = self.ellipse(z);
                if t <= -r {
                    return [0.0; 2];
                }
                let r2 = r * r;
                if t >= r {
                    return [factor * PI * r2, factor * PI * r2 * t];
                }
                let q = ((r - t) * (r + t)).sqrt();
                let angle = t.atan2(q);
                let omega = t * q + r2 * angle + PI * r2 / 2.0;
                let omega2 = -q * q * q / 3.0 + r2 * (t * angle + q) + PI * r2 * t / 2.0;
                [factor * omega, factor * omega2]
            }
        }
    }

    /// (sideways stretch, half height, height above the axis) of the barrel laws.
    fn ellipse(&self, z: f64) -> (f64, f64, f64) {
        match self {
            WidthLaw::RoundBarrel { diameter_m, bottom_z_m } => {
                let r = diameter_m / 2.0;
                (1.0, r, z - bottom_z_m - r)
            }
            WidthLaw::Oval { width_m, height_m, bottom_z_m } => {
                let r = height_m / 2.0;
                (width_m / height_m, r, z - bottom_z_m - r)
            }
            _ => (0.0, 0.0, 0.0),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::num::tanh_sinh;

    #[test]
    fn omega_and_its_integral_agree_with_quadrature() {
        let laws = [
            WidthLaw::RoundBarrel { diameter_m: 1.9, bottom_z_m: -0.3 },
            WidthLaw::Oval { width_m: 2.4, height_m: 1.5, bottom_z_m: 0.1 },
            WidthLaw::Table(vec![(0.0, 0.5), (0.4, 1.5), (0.9, 1.5), (1.7, 0.2)]),
        ];
        for law in laws {
            let (low, high) = law.range().unwrap();
            for share in [0.03, 0.2, 0.5, 0.77, 1.0] {
                let z = low + share * (high - low);
                let mut stops: Vec<f64> = law.kinks().into_iter().filter(|&k| k < z).collect();
                stops.push(z);
                let mut want = [0.0; 2];
                for pair in stops.windows(2) {
                    let d = pair[1] - pair[0];
                    let part = tanh_sinh(|t| {
                        let x = pair[0] + t * d;
                        [d * law.width(x), d * law.width(x) * (z - x)]
                    });
                    want = [want[0] + part[0], want[1] + part[1]];
                }
                let got = law.integrals(z);
                for i in 0..2 {
                    assert!((got[i] - want[i]).abs() < 1e-13, "{law:?} at {z}: {got:?} against {want:?}");
                }
            }
            let above = law.integrals(high + 1.0);
            assert!((above[1] - law.omega2(high) - law.omega(high)).abs() < 1e-13, "{law:?} above its top");
        }
    }
}
