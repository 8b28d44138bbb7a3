//! The quasi-static way from rest to a load case.
//!
//! Only the direction of effective gravity matters. While the acceleration grows along a straight line, G moves
//! along a straight line too, and its direction turns one way.

use std::f64::consts::PI;

use crate::geom::{Vec2, cross};

use super::pools::Turn;

/// A ramp of the direction of effective gravity, by tilt angle.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ramp {
    /// Tilt at its start, radians.
    start_rad: f64,
    /// Signed turn to the case, radians.
    to_case_rad: f64,
    /// Signed turn that the ramp could make if it went on for ever, radians.
    to_end_rad: f64,
    kind: Kind,
}

#[derive(Clone, Copy, Debug, PartialEq)]
enum Kind {
    /// G = start + share delta.
    Straight { start: Vec2, delta: Vec2 },
    /// The tank is turned at rest.
    Turn,
}

impl Ramp {
    /// The acceleration grows from nothing; none where the way leads through free fall, or starts in it.
    pub fn accelerate(g_at_rest: Vec2, accel: Vec2) -> Option<Ramp> {
        let delta = -accel;
        let end = g_at_rest + delta;
        let tilt = |g: Vec2| g.x.atan2(-g.y);
        let turn = |to: Vec2| cross(g_at_rest, to).atan2(g_at_rest.dot(&to));
        let to_case = turn(end);
        // Along gravity the direction does not turn, however hard the tank accelerates.
        let is_along = cross(g_at_rest, delta).abs() <= 1e-12 * g_at_rest.norm() * accel.norm();
        let to_end = if is_along { to_case } else { turn(delta) };
        let rounding = 1e-12 * (g_at_rest.norm() + accel.norm());
        let through_zero = end.norm() <= rounding || to_case.abs() >= PI - 1e-12;
        (!through_zero && g_at_rest.norm() > 0.0).then_some(Ramp {
            start_rad: tilt(g_at_rest),
            to_case_rad: to_case,
            to_end_rad: to_end,
            kind: Kind::Straight { start: g_at_rest, delta },
        })
    }

    /// The tank is turned from level to `phi` (positive: right side up), and could be turned on to a half turn.
    pub fn turn(phi_rad: f64) -> Ramp {
        let to_end_rad = if phi_rad > 0.0 { -PI } else { PI };
        Ramp { start_rad: 0.0, to_case_rad: -phi_rad, to_end_rad, kind: Kind::Turn }
    }

    /// The turn of the direction.
    pub fn direction(&self) -> Turn {
        Turn { start_rad: self.start_rad, grows: self.end_or_case() >= 0.0 }
    }

    /// How far the direction turns to the case, radians, not negative.
    pub fn to_case_rad(&self) -> f64 {
        self.to_case_rad.abs()
    }

    /// How far it could turn if the ramp went on for ever, radians; at least as far as to the case.
    pub fn to_end_rad(&self) -> f64 {
        self.to_end_rad.abs().max(self.to_case_rad())
    }

    /// Whether a larger share of the case turns effective gravity at all.
    pub fn turns(&self) -> bool {
        self.to_end_rad != 0.0
    }

    fn end_or_case(&self) -> f64 {
        if self.to_end_rad == 0.0 { self.to_case_rad } else { self.to_end_rad }
    }

    /// Share of the case's acceleration, or heel, at which the direction has turned by `turned` of the way
    /// (radians, not negative); infinite where it is only approached.
    pub fn share(&self, turned: f64) -> f64 {
        if turned <= 0.0 {
            return 0.0;
        }
        match self.kind {
            Kind::Turn => turned / self.to_case_rad.abs(),
            Kind::Straight { start, delta } => {
                let up = self.direction().up(turned);
                // start + share delta is parallel to -up.
                let (s, d) = (cross(start, up), cross(delta, up));
                if d == 0.0 { f64::INFINITY } else { (-s / d).max(0.0) }
            }
        }
    }
}
