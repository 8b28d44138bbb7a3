//! The quasi-static way from rest to a load case: what the brims hold on the way.
//!
//! Only the direction of effective gravity matters. While the acceleration grows along a straight line, G moves
//! along a straight line too, and its direction turns one way.

use std::f64::consts::PI;

use crate::geom::{Point, Vec2, cross};
use crate::num::{golden_min, root};
use crate::section::{Mouth, Region};

use super::tilted::Vessel;

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

    /// Share of the case's acceleration, or heel, at which the direction has turned by `turned` of the way
    /// (radians, not negative); infinite where it is only approached.
    fn share(&self, turned: f64) -> f64 {
        if turned <= 0.0 {
            return 0.0;
        }
        match self.kind {
            Kind::Turn => turned / self.to_case_rad.abs(),
            Kind::Straight { start, delta } => {
                let up = self.up(turned);
                // start + share delta is parallel to -up.
                let (s, d) = (cross(start, up), cross(delta, up));
                if d == 0.0 { f64::INFINITY } else { (-s / d).max(0.0) }
            }
        }
    }

    /// Away from G where the direction has turned by `turned` radians of the way.
    fn up(&self, turned: f64) -> Vec2 {
        let sign = if self.to_end_rad == 0.0 { self.to_case_rad } else { self.to_end_rad }.signum();
        let (sin, cos) = (self.start_rad + sign * turned).sin_cos();
        Vec2::new(-sin, cos)
    }
}

/// Where liquid leaves.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Lip {
    /// Which mouth.
    pub mouth_idx: usize,
    /// Its brim there.
    pub brim: Point,
}

/// What the brims hold on the way.
#[derive(Clone, Debug, PartialEq)]
pub struct Spill {
    /// The largest volume that leaves no mouth on the way to the case, m3: the least, over the way, of the volume
    /// below the lowest brim.
    pub holds_m3: f64,
    /// The mouth that governs it; none without mouths.
    pub governs: Option<Lip>,
    /// Share of the case's acceleration (or heel) at which liquid first leaves, within the case or beyond; none
    /// where it never does.
    pub first: Option<(f64, Lip)>,
    /// On the way to the case the liquid stands in several pools: then nothing above may be used.
    pub has_several_pools: bool,
    /// Whether a larger share of the case turns effective gravity at all.
    pub turns: bool,
    /// Beyond the case, before any spill, the liquid comes to stand in several pools: `first` is then not known.
    pub has_several_pools_beyond: bool,
}

/// Directions sampled on the way to the case, and as many beyond it. The least volume is then refined between
/// samples; a dip narrower than a sample, which no brim of a plain section makes, could be missed.
const N_SAMPLES: usize = 48;

impl Spill {
    /// Follows `volume_m3` along `ramp`.
    ///
    /// Spilled volume counts as gone: after a spill the volume is what the brim left. Accuracy: the first spill to
    /// 1e-14 rad, the least volume to 1e-10 rad, volumes as [`super::Tilted`].
    /// Source: `BrimPath`.
    pub fn trace(ramp: &Ramp, region: &Region, vessel: &Vessel, mouths: &[Mouth], volume_m3: f64) -> Spill {
        let way = Way { ramp, region, vessel, mouths };
        let mut spill = Spill {
            holds_m3: f64::INFINITY,
            governs: None,
            first: None,
            has_several_pools: false,
            turns: ramp.to_end_rad != 0.0,
            has_several_pools_beyond: false,
        };
        let case = ramp.to_case_rad.abs();
        let end = ramp.to_end_rad.abs().max(case);
        let mut turns: Vec<f64> = (0..=N_SAMPLES).map(|i| case * (i as f64 / N_SAMPLES as f64)).collect();
        // The end itself is never reached by a finite acceleration.
        turns.extend((1..N_SAMPLES).map(|i| case + (end - case) * i as f64 / N_SAMPLES as f64));
        turns.dedup();
        let capacity = vessel.capacity_m3();
        let slack = 1e-12 * capacity;
        let mut left = volume_m3;
        let samples: Vec<Stop> = turns.iter().map(|&turned| way.at(turned)).collect();
        let mut before = 0.0;
        for i in 0..samples.len() {
            let mut stop = samples[i];
            let is_dip = i > 0
                && i + 1 < samples.len()
                && stop.holds_m3 <= samples[i - 1].holds_m3
                && stop.holds_m3 <= samples[i + 1].holds_m3
                && stop.holds_m3 < capacity;
            if is_dip {
                let high = if stop.turned <= case { turns[i + 1].min(case) } else { turns[i + 1] };
                let (turned, _) = golden_min(turns[i - 1], high, 1e-10, |t| way.at(t).holds_m3);
                let refined = way.at(turned);
                if refined.holds_m3 < stop.holds_m3 {
                    stop = refined;
                }
            }
            let on_the_way = turns[i] <= case;
            if way.is_parted(&stop, left.min(stop.holds_m3)) {
                if on_the_way {
                    spill.has_several_pools = true;
                    spill.first = None;
                } else {
                    spill.has_several_pools_beyond = spill.first.is_none();
                }
                break;
            }
            if on_the_way && stop.holds_m3 < spill.holds_m3 {
                spill.holds_m3 = stop.holds_m3;
                spill.governs = stop.lip;
            }
            if spill.first.is_none() && stop.holds_m3 < volume_m3 - slack {
                let turned = root(before, stop.turned, 1e-15, |t| volume_m3 - way.at(t).holds_m3);
                spill.first = way.at(turned).lip.map(|lip| (ramp.share(turned), lip));
            }
            if spill.first.is_some() && !on_the_way {
                break;
            }
            left = left.min(stop.holds_m3);
            before = stop.turned;
        }
        spill
    }
}

struct Way<'a> {
    ramp: &'a Ramp,
    region: &'a Region,
    vessel: &'a Vessel,
    mouths: &'a [Mouth],
}

/// One direction on the way.
#[derive(Clone, Copy)]
struct Stop {
    turned: f64,
    /// Volume below the lowest brim, m3; the capacity without mouths.
    holds_m3: f64,
    brim_level: f64,
    lip: Option<Lip>,
}

impl Way<'_> {
    fn at(&self, turned: f64) -> Stop {
        let up = self.ramp.up(turned);
        let brims = self.mouths.iter().enumerate().map(|(mouth_idx, m)| (m.brim(self.region, up), mouth_idx));
        match brims.min_by(|a, b| a.0.0.total_cmp(&b.0.0)) {
            None => Stop { turned, holds_m3: self.vessel.capacity_m3(), brim_level: f64::INFINITY, lip: None },
            Some(((brim_level, brim), mouth_idx)) => Stop {
                turned,
                holds_m3: self.vessel.tilted_below(up, brim_level).volume_below(brim_level),
                brim_level,
                lip: Some(Lip { mouth_idx, brim }),
            },
        }
    }

    /// Whether the liquid stands in several pools there.
    fn is_parted(&self, stop: &Stop, volume_m3: f64) -> bool {
        let tilted = self.vessel.tilted_below(self.ramp.up(stop.turned), stop.brim_level);
        !tilted.is_one_basin(stop.brim_level) && tilted.n_pools(tilted.level_for_volume(volume_m3)) > 1
    }
}
