//! Load cases: what the tank is put through. Steady for now: one acceleration held for long, on a grade.
//!
//! Knows no section and no liquid. The unit that the user typed is kept, so that a file is not reworded.

use crate::geom::Vec2;

/// The unit in which an acceleration was given.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum AccelUnit {
    /// Metres per second squared.
    #[default]
    MPerS2,
    /// Multiples of the scenario's gravity.
    G,
}

/// The tank's acceleration, as it was given.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Accel {
    /// Components along the section's s and z axes, in `unit`.
    Components {
        /// Along s, to the right.
        a_s: f64,
        /// Along z, up.
        a_z: f64,
        /// Unit of both.
        unit: AccelUnit,
    },
    /// Magnitude and direction; the direction is measured from +s toward +z.
    Polar {
        /// In `unit`, not negative.
        magnitude: f64,
        /// Degrees, counter-clockwise from +s.
        direction_deg: f64,
        /// Unit of the magnitude.
        unit: AccelUnit,
    },
}

impl Accel {
    /// No acceleration.
    pub const REST: Accel = Accel::Components { a_s: 0.0, a_z: 0.0, unit: AccelUnit::MPerS2 };

    /// The acceleration of the tank along (s, z), m/s2; `gravity` is what one g stands for.
    pub fn to_m_per_s2(self, gravity_m_per_s2: f64) -> Vec2 {
        let scale = |unit| if unit == AccelUnit::G { gravity_m_per_s2 } else { 1.0 };
        match self {
            Accel::Components { a_s, a_z, unit } => Vec2::new(a_s, a_z) * scale(unit),
            Accel::Polar { magnitude, direction_deg, unit } => {
                let (sin, cos) = direction_deg.to_radians().sin_cos();
                Vec2::new(cos, sin) * (magnitude * scale(unit))
            }
        }
    }
}

/// How the section stands on what carries it. Positive: its right side is up.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub enum Attitude {
    /// Level.
    #[default]
    Level,
    /// A road grade or crossfall: rise over run, in percent.
    GradePercent(f64),
    /// A heel, trim or tilt angle, in degrees.
    HeelDeg(f64),
}

impl Attitude {
    /// The angle phi, radians.
    pub fn angle_rad(self) -> f64 {
        match self {
            Attitude::Level => 0.0,
            Attitude::GradePercent(percent) => (percent / 100.0).atan(),
            Attitude::HeelDeg(deg) => deg.to_radians(),
        }
    }
}

/// One event that the tank must stand.
#[derive(Clone, Debug, PartialEq)]
pub struct LoadCase {
    /// As shown.
    pub name: String,
    /// Acceleration of the tank.
    pub accel: Accel,
    /// Grade or heel.
    pub attitude: Attitude,
    /// Time over which the acceleration builds up, s. Kept and shown; the settled verdicts do not use it.
    pub onset_s: Option<f64>,
    /// Time for which it is then held, s; none: for long.
    pub duration_s: Option<f64>,
    /// Whether it is followed by a slow release back to rest, which shows what stays trapped behind sills.
    pub release: bool,
    /// Where the numbers come from.
    pub source: String,
    /// Free text.
    pub note: String,
}
