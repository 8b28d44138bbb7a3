//! A way that was followed to many places, ready to be looked at anywhere in between.

use super::still::Holder;
use super::trace::{LONGEST_STEP, Stop, Trace, trace};
use super::turn::Turn;

/// A way from the still levels, with the places at which it was looked at.
pub struct Followed<'a> {
    /// What holds the liquid.
    pub holder: Holder<'a>,
    /// Which way the direction turns.
    pub turn: Turn,
    /// What happened on the way to the last place.
    pub trace: Trace,
}

impl<'a> Followed<'a> {
    /// Follows the liquid of `holder` to each of `at`: turns that rise from zero, radians.
    pub fn new(holder: Holder<'a>, turn: Turn, at: &[f64]) -> Followed<'a> {
        let trace = trace(&holder, turn, None, at, at.last().copied().unwrap_or(0.0), LONGEST_STEP);
        Followed { holder, turn, trace }
    }

    /// Whether the way was followed as far as `turned`.
    pub fn reaches(&self, turned: f64) -> bool {
        self.trace.stops.last().is_some_and(|stop| turned <= stop.turned_rad)
    }

    /// Where everything stands at `turned`, followed on from the nearest place before it; what went over sills is left
    /// out there. None where it cannot be followed.
    pub fn at(&self, turned: f64) -> Option<Stop> {
        let n_before = self.trace.stops.partition_point(|stop| stop.turned_rad <= turned);
        let from = &self.trace.stops[n_before.checked_sub(1)?];
        if from.turned_rad == turned {
            return Some(from.clone());
        }
        let ahead = turned - from.turned_rad;
        let mut stop =
            trace(&self.holder, self.turn.on_from(from.turned_rad), Some(from), &[ahead], ahead, LONGEST_STEP)
                .stops
                .pop()?;
        stop.turned_rad = turned;
        stop.had_several |= from.had_several;
        if stop.room_m3 < 0.0 {
            stop.room_m3 += from.room_m3.min(0.0);
        } else if from.room_m3 < stop.room_m3 {
            (stop.room_m3, stop.least) = (from.room_m3, from.least);
        }
        Some(stop)
    }
}
