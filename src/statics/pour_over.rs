//! Pour-over: the quasi-static way to one load case, as the mouths and sills see it.

use crate::geom::Point;
use crate::section::{Mouth, Wall};

use super::pools::{Brim, Holder, LONGEST_STEP, Pour, Spilled, Start, Stop, Trace, trace};
use super::ramp::Ramp;

/// Where liquid leaves.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Lip {
    /// Which mouth.
    pub mouth_idx: usize,
    /// Its brim there.
    pub brim: Point,
}

/// Liquid that left by one mouth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MouthSpill {
    /// Which mouth.
    pub mouth_idx: usize,
    /// How much, m3.
    pub volume_m3: f64,
}

/// The way to a load case under one bound.
#[derive(Clone, Debug)]
pub struct PourOver {
    /// Where everything stands at the case, and what has gone; none where the way was lost before.
    pub stop: Option<Stop>,
    /// The largest volume of the common fill that leaves no mouth on the way to the case, m3; infinite where nothing
    /// can leave, none where that was not found.
    pub holds_m3: Option<f64>,
    /// The mouth that governs it; none without mouths.
    pub governs: Option<Lip>,
    /// Share of the case's acceleration (or heel) at which liquid first leaves, within the case or beyond; none where
    /// it never does.
    pub first: Option<(f64, Lip)>,
    /// Share of the case at which liquid first goes over a sill on the way to it, and over which.
    pub first_pour: Option<(f64, Pour)>,
    /// Whether a larger share of the case turns effective gravity at all.
    pub turns: bool,
    /// The way beyond the case was lost before anything left: `first` is then not known.
    pub is_lost_beyond: bool,
}

/// Follows the liquid along several ramps that turn the same way from the same start, in one go.
pub fn pour_over(holder: &Holder, mouths: &[Mouth], ramps: &[Ramp]) -> Vec<PourOver> {
    let Some(first) = ramps.first() else { return Vec::new() };
    let mut at: Vec<f64> = ramps.iter().map(Ramp::to_case_rad).collect();
    at.sort_unstable_by(f64::total_cmp);
    at.dedup();
    let end = ramps.iter().map(Ramp::to_end_rad).fold(0.0, f64::max);
    // The end itself is never reached by a finite acceleration.
    let trace = trace(holder, first.direction(), None, &at, end * (1.0 - 1e-9), LONGEST_STEP);
    ramps.iter().map(|ramp| PourOver::new(holder, mouths, ramp, &at, &trace)).collect()
}

/// What left by each mouth, in the order in which they first spilled.
pub fn spills(holder: &Holder, mouths: &[Mouth], spilled: &[Spilled]) -> Vec<MouthSpill> {
    let mut spills: Vec<MouthSpill> = Vec::new();
    for s in spilled {
        let Some(mouth_idx) = mouth_of(holder, mouths, s.brim) else { continue };
        match spills.iter_mut().find(|m| m.mouth_idx == mouth_idx) {
            Some(m) => m.volume_m3 += s.volume_m3,
            None => spills.push(MouthSpill { mouth_idx, volume_m3: s.volume_m3 }),
        }
    }
    spills
}

fn mouth_of(holder: &Holder, mouths: &[Mouth], brim: Brim) -> Option<usize> {
    match holder.wall(brim.face_idx) {
        Wall::Outline { edge_idx, .. } => mouths.iter().position(|m| m.edge_idxs.contains(&edge_idx)),
        _ => None,
    }
}

impl PourOver {
    fn new(holder: &Holder, mouths: &[Mouth], ramp: &Ramp, at: &[f64], trace: &Trace) -> PourOver {
        let goal = at.iter().position(|&t| t == ramp.to_case_rad());
        PourOver::to_stop(holder, mouths, ramp, goal.and_then(|i| trace.stops.get(i)).cloned(), trace)
    }

    /// Along `ramp`, whose end is `stop`; `trace` knows what happens first, also beyond it.
    pub fn to_stop(holder: &Holder, mouths: &[Mouth], ramp: &Ramp, stop: Option<Stop>, trace: &Trace) -> PourOver {
        let lip = |brim: Brim| Some(Lip { mouth_idx: mouth_of(holder, mouths, brim)?, brim: brim.at });
        let is_reached = |turned: f64| turned < ramp.to_end_rad() || turned <= ramp.to_case_rad();
        let first = trace.first_spill.filter(|&(turned, _)| is_reached(turned));
        let first = first.and_then(|(turned, s)| Some((ramp.share(turned), lip(s.brim)?)));
        let first_pour = trace.first_pour.filter(|(turned, _)| *turned <= ramp.to_case_rad());
        PourOver {
            holds_m3: stop.as_ref().and_then(|stop| holds(holder, mouths, stop)),
            governs: stop.as_ref().and_then(|s| s.least).and_then(lip),
            first,
            first_pour: first_pour.map(|(turned, pour)| (ramp.share(turned), pour)),
            turns: ramp.turns(),
            is_lost_beyond: trace.lost_at.is_some() && trace.first_spill.is_none(),
            stop,
        }
    }
}

/// The largest volume that leaves no mouth, where one body alone was on the way: its room is then all that counts.
fn holds(holder: &Holder, mouths: &[Mouth], stop: &Stop) -> Option<f64> {
    if mouths.is_empty() || stop.least.is_none() && !stop.had_several {
        return Some(f64::INFINITY);
    }
    (!stop.had_several).then(|| holder.common_volume_m3() + stop.room_m3)
}

/// The largest volume of the common fill that leaves no mouth on the way along `ramp`, by following fills one after
/// another: a root of the room that is left, since more liquid never leaves more room. Relative to the capacity,
/// accurate to 1e-7.
pub fn highest_fill(holder_of: &dyn Fn(&[Start]) -> f64, starts: &[Start]) -> f64 {
    let Some(common) = starts.iter().position(|s| s.is_common) else { return 0.0 };
    let capacity = starts[common].vessel.capacity_m3();
    let over = |volume_m3: f64| {
        let mut starts = starts.to_vec();
        starts[common].volume_m3 = volume_m3;
        -holder_of(&starts)
    };
    if over(capacity) <= 0.0 {
        return capacity;
    }
    crate::num::root(0.0, capacity, 1e-7 * capacity, over)
}
