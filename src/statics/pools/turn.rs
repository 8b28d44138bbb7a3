//! A turn of the direction of effective gravity.

use crate::geom::Vec2;

/// A turn of the direction: from a tilt, one way round.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Turn {
    /// Tilt of the surface at its start, radians.
    pub start_rad: f64,
    /// Whether the tilt grows.
    pub grows: bool,
}

impl Turn {
    /// Away from effective gravity where it has turned by `turned_rad` of the way.
    pub fn up(&self, turned_rad: f64) -> Vec2 {
        let sign = if self.grows { 1.0 } else { -1.0 };
        let (sin, cos) = (self.start_rad + sign * turned_rad).sin_cos();
        let snap = |x: f64| if x.abs() < 4.0 * f64::EPSILON { 0.0 } else { x };
        Vec2::new(snap(-sin), snap(cos))
    }

    /// The same way from where it has turned by `turned_rad`.
    pub fn on_from(&self, turned_rad: f64) -> Turn {
        let sign = if self.grows { 1.0 } else { -1.0 };
        Turn { start_rad: self.start_rad + sign * turned_rad, ..*self }
    }

    /// The way back from there.
    pub fn back_from(&self, turned_rad: f64) -> Turn {
        Turn { grows: !self.grows, ..self.on_from(turned_rad) }
    }
}
