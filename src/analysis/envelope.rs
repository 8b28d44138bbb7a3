//! The hold envelope: for every direction, the largest acceleration up to which everything holds at this fill.

use std::f64::consts::TAU;

use rayon::prelude::*;

use crate::cases::Attitude;
use crate::geom::Vec2;
use crate::progress::Progress;
use crate::study::ValidStudy;

use super::holding::{End, HoldLimit, Holding};

/// A closed curve about rest in the plane of the two components of the acceleration.
#[derive(Clone, Debug, PartialEq)]
pub struct Envelope {
    /// How the tank stands at rest.
    pub attitude: Attitude,
    /// Effective gravity at rest, m/s2.
    pub rest_gravity: Vec2,
    /// The largest acceleration that was looked at, m/s2.
    pub most_m_per_s2: f64,
    /// Counter-clockwise from +s, evenly; straight against gravity too, where the curve may have a corner.
    pub limits: Vec<HoldLimit>,
    /// What keeps it from holding at rest already.
    pub at_rest: Option<End>,
    /// What keeps every case from holding, whatever its acceleration; the limits leave it out.
    pub always: Option<End>,
}

/// The envelope of a tank that stands at rest in an attitude, in `n_directions`. A coarse one goes to `sink` first. None
/// where it was asked to end. Bit for bit the same on any count of threads.
pub fn envelope(
    study: &ValidStudy,
    attitude: Attitude,
    n_directions: usize,
    progress: &Progress,
    sink: &dyn Fn(&Envelope),
) -> Option<Envelope> {
    let n = n_directions.max(4);
    progress.begin(n + n / 4);
    let most_m_per_s2 = largest_looked_at(study, attitude);
    let holding = Holding::new(study, attitude, most_m_per_s2, progress)?;
    let at_rest = holding.at_rest().cloned();
    progress.advance(n / 4);
    let free_fall = holding.rest_gravity().normalize();
    let envelope = |limits: Vec<HoldLimit>| Envelope {
        attitude,
        rest_gravity: holding.rest_gravity(),
        most_m_per_s2,
        limits,
        at_rest: at_rest.clone(),
        always: holding.always().cloned(),
    };
    let mut found: Vec<Option<HoldLimit>> = vec![None; n];
    let to_free_fall = holding.limit(free_fall);
    for stride in [COARSE, 1] {
        let wanted: Vec<usize> = (0..n).filter(|&i| i.is_multiple_of(stride) && found[i].is_none()).collect();
        let limits: Option<Vec<HoldLimit>> = wanted
            .par_iter()
            .map(|&i| {
                let (sin, cos) = (TAU * i as f64 / n as f64).sin_cos();
                progress.advance(1).then(|| holding.limit(Vec2::new(cos, sin)))
            })
            .collect();
        for (i, limit) in wanted.into_iter().zip(limits?) {
            found[i] = Some(limit);
        }
        let mut limits: Vec<HoldLimit> = found.iter().flatten().cloned().collect();
        let place = limits.partition_point(|limit| limit.direction_rad() < to_free_fall.direction_rad());
        let is_there = |i: usize| limits.get(i).is_some_and(|l| (l.direction - free_fall).norm() < 1e-9);
        if !(is_there(place) || place > 0 && is_there(place - 1)) {
            limits.insert(place, to_free_fall.clone());
        }
        let envelope = envelope(limits);
        if stride == 1 {
            return Some(envelope);
        }
        sink(&envelope);
    }
    None
}

/// How many directions draw a smooth curve.
pub const N_DIRECTIONS: usize = 360;

/// Every how many directions come first.
const COARSE: usize = 10;

/// How far an envelope looks, m/s2: three times gravity, or past every case in the same attitude.
pub fn largest_looked_at(study: &ValidStudy, attitude: Attitude) -> f64 {
    let g = study.study().gravity_m_per_s2;
    let own = study.study().cases.iter().filter(|case| case.attitude == attitude);
    own.map(|case| 1.25 * case.accel.to_m_per_s2(g).norm()).fold(3.0 * g, f64::max)
}
