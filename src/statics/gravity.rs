//! Effective gravity: what the liquid feels in the tank's frame.

use crate::geom::{Vec2, rotate};

/// G = g(phi) - a in the section's axes, with what follows from its direction.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EffectiveGravity {
    /// In the section's axes, m/s2.
    pub vec: Vec2,
    /// |G|, m/s2.
    pub magnitude: f64,
    /// Unit vector away from G; none in free fall.
    pub up: Option<Vec2>,
    /// Angle of the settled surface against the section's s axis, radians, counter-clockwise, within
    /// (-pi, pi]; beyond a quarter turn the liquid lies toward the roof. None in free fall.
    pub tilt_rad: Option<f64>,
    /// dz/ds of the surface; none where it is vertical, or in free fall.
    pub slope: Option<f64>,
}

/// Effective gravity of a tank that accelerates with `accel` (m/s2, section axes) while its section stands turned
/// by `phi` (radians, positive: right side up) under `gravity` (m/s2).
///
/// On a level tank the surface slopes by dz/ds = -a_s / (g + a_z). |G| below 1e-12 of the accelerations that make
/// it up counts as free fall: that is the rounding of their difference.
/// Source: `RigidAcceleration`.
pub fn effective_gravity(gravity_m_per_s2: f64, phi_rad: f64, accel: Vec2) -> EffectiveGravity {
    // Turning the section's right side up by phi turns gravity by -phi in the section's own axes.
    let vec = rotate(Vec2::new(0.0, -gravity_m_per_s2), -phi_rad) - accel;
    let magnitude = vec.norm();
    if magnitude <= 1e-12 * (gravity_m_per_s2 + accel.norm()) {
        return EffectiveGravity { vec, magnitude, up: None, tilt_rad: None, slope: None };
    }
    let mut up = -vec / magnitude;
    // A direction within rounding of an axis is that axis, so that levels along edges are exact.
    for i in 0..2 {
        if up[i].abs() < 4.0 * f64::EPSILON {
            up[i] = 0.0;
            up[1 - i] = up[1 - i].signum();
        }
    }
    let tilt = (-up.x).atan2(up.y);
    let slope = (up.y != 0.0).then(|| -up.x / up.y);
    EffectiveGravity { vec, magnitude, up: Some(up), tilt_rad: Some(tilt), slope }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_level_tank_tilts_by_the_textbook_formula() {
        // Source: published worked example, tan theta = a_h / (g + a_v); 2.4 / 9.81 = 0.2446483.
        let g = effective_gravity(9.81, 0.0, Vec2::new(-2.4, 0.0));
        assert!((g.slope.unwrap() - 0.244_648_3).abs() < 1e-7);
        let g = effective_gravity(9.81, 0.0, Vec2::new(3.0, -2.0));
        assert!((g.slope.unwrap() + 3.0 / 7.81).abs() < 1e-15);
    }

    #[test]
    fn free_fall_sideways_and_upside_down_have_no_nan() {
        assert_eq!(effective_gravity(9.81, 0.0, Vec2::new(0.0, -9.81)).up, None);
        let sideways = effective_gravity(9.81, 0.0, Vec2::new(5.0, -9.81));
        assert_eq!((sideways.up, sideways.slope), (Some(Vec2::new(1.0, 0.0)), None));
        let upward = effective_gravity(9.81, 0.0, Vec2::new(0.0, -20.0));
        assert_eq!(upward.up, Some(Vec2::new(0.0, -1.0)));
        assert!((upward.tilt_rad.unwrap().abs() - std::f64::consts::PI).abs() < 1e-15);
    }

    #[test]
    fn a_heel_to_the_left_runs_to_the_left_side() {
        // Right side up: the left side is the low one, the surface falls to the right in the section's axes.
        let g = effective_gravity(9.81, 0.1, Vec2::zeros());
        assert!((g.slope.unwrap() + 0.1_f64.tan()).abs() < 1e-15, "{g:?}");
    }
}
