//! The way of the liquid to one side, and what holds along every direction on it.

use std::f64::consts::PI;

use rayon::prelude::*;

use crate::criteria::RestsOn;
use crate::geom::Vec2;
use crate::num::{golden_min, root};
use crate::statics::{Followed, LONGEST_STEP, PourOver, Ramp, Rims, Route, Stop, Trace, Turn, trace};

use super::holding::{Base, End, Judged, excess, gravity_used};
use super::results::CONTAINED;
use super::rims::{SharedRims, risen_z_m, risen_z_m_on};
use super::sight::{Ground, Sight};
use super::ways::{self, Course};

/// Distance of the directions that are looked at first, radians: a degree. Where something changes between two of them is
/// found as a root; only what fails and holds again in between is missed.
const STEP: f64 = PI / 180.0;

/// The way to one side.
pub(super) struct Side<'a> {
    /// Under each bound, with what happens first.
    ways: Vec<(Followed<'a>, Trace)>,
    /// What does not hold at rest already, of what rests on the direction alone.
    pub at_rest: Option<End>,
    /// The turn beyond which something does not hold whatever the size of G, radians, and what.
    pub end: (f64, End),
    /// The turn at which liquid first leaves, radians, where it does.
    pub spills_at: Option<f64>,
    /// What holds along directions from rest to the end.
    pub marks: Vec<Mark>,
}

/// Between which sizes of G, m/s2, everything holds along one direction.
#[derive(Clone, Copy, Debug)]
pub(super) struct Mark {
    pub turned: f64,
    pub least: f64,
    pub most: f64,
}

impl Mark {
    /// That size of G over the largest one that holds; infinite where it is too small to be judged.
    pub fn gravity_used(&self, gravity: f64) -> f64 {
        if gravity < self.least { f64::INFINITY } else { gravity / self.most }
    }
}

impl<'a> Side<'a> {
    pub fn new(base: &Base<'a>, grows: bool) -> Side<'a> {
        let study = base.study;
        let sideways =
            if grows { Vec2::new(base.rest.y, -base.rest.x) } else { Vec2::new(-base.rest.y, base.rest.x) };
        let start_rad = Ramp::accelerate(base.rest, sideways).map_or(0.0, |ramp| ramp.direction().start_rad);
        let turn = Turn { start_rad, grows };
        let bounds = ways::bounds(study);
        // Straight up the direction is never quite.
        let far = PI * (1.0 - 1e-9);
        let firsts: Vec<Trace> = bounds
            .par_iter()
            .map(|&bound| trace(&ways::holder(study, bound), turn, None, &[], far, LONGEST_STEP))
            .collect();
        let spills_at = firsts.iter().filter_map(|t| t.first_spill).map(|(turned, _)| turned).reduce(f64::min);
        let mut end = (far, End::Beyond);
        for (first, &bound) in firsts.iter().zip(bounds) {
            let bound = (bounds.len() > 1).then_some(bound);
            let own = match (first.first_spill, first.lost_at) {
                (Some((turned, _)), _) => (turned, End::Fails { criterion: CONTAINED, bound }),
                (None, Some(turned)) => (turned, End::NotJudged { reason: LOST.to_owned() }),
                (None, None) => continue,
            };
            if own.0 < end.0 {
                end = own;
            }
        }
        let at = turns_to(end.0);
        let follow = |(first, &bound): (Trace, &_)| (Followed::new(ways::holder(study, bound), turn, &at), first);
        let ways = firsts.into_par_iter().zip(bounds).map(follow).collect();
        let mut side = Side { ways, at_rest: None, end, spills_at, marks: Vec::new() };
        side.end_by_direction(base, turn, &at);
        side.mark(base, turn);
        side
    }

    /// Ends the side where a criterion that rests on the direction alone stops holding.
    fn end_by_direction(&mut self, base: &Base, turn: Turn, at: &[f64]) {
        let study = base.study;
        let has_several = |b: usize| {
            let last = self.ways[b].0.trace.stops.last();
            last.is_some_and(|stop| stop.had_several)
        };
        let rims: Vec<SharedRims> = ways::bounds(study)
            .iter()
            .map(|&bound| SharedRims::new(study, bound, at.iter().map(|t| turn.up(*t))))
            .collect();
        let on: Vec<Option<Followed>> = rims
            .par_iter()
            .enumerate()
            .map(|(b, rims)| has_several(b).then(|| rims.followed(study, turn, at))?)
            .collect();
        // Along any size of G: one that no capillarity hides.
        let gravity = base.rest.norm() + base.most_m_per_s2;
        let verdicts = |turned: f64| {
            let accel = base.rest + turn.up(turned) * gravity;
            let Some(stops) = self.stops(base, turned) else { return lost() };
            let course = self.course(base, accel, &stops);
            let ground = Ground { bearers: &[], ..base.ground() };
            let risen = |b: usize, seen: &Rims, route: Route| match (route, &on[b]) {
                (Route::Turned(..), Some(on)) if on.reaches(turned) => risen_z_m_on(on, seen, turned),
                _ => risen_z_m(study, seen, route),
            };
            let sights: Vec<Sight> = (0..stops.len())
                .map(|b| {
                    let holder = &self.ways[b].0.holder;
                    let settled = Ok(super::settle_at(study, holder, &stops[b], course.gravity.magnitude, false));
                    let route = if stops[b].had_several { Route::Turned(turn, turned) } else { Route::One };
                    let seen = course.gravity.up.and_then(|up| rims[b].seen(study, up));
                    let risen_z_m = seen.as_ref().map_or(Vec::new(), |seen| risen(b, seen, route));
                    Sight { rims: seen, risen_z_m, route, ..Sight::without_rims(&ground, &course, b, settled) }
                })
                .collect();
            base.judge(&course, &sights, RestsOn::Direction)
        };
        let over = |turned: f64| excess(&verdicts(turned));
        let all: Vec<f64> = at.par_iter().map(|t| over(*t)).collect();
        let mut ends: Option<(f64, f64)> = None;
        for i in 0..at.len() {
            if all[i] > 0.0 {
                ends = Some((at[i.saturating_sub(1)], at[i]));
                break;
            }
            // A peak between the places looked at may reach the limit.
            let is_peak = i > 0 && i + 1 < at.len() && all[i - 1] < all[i] && all[i] > all[i + 1];
            if is_peak && all[i] > -0.1 {
                let (peak, low) = golden_min(at[i - 1], at[i + 1], 1e-6, |t| -over(t));
                if low < 0.0 {
                    ends = Some((at[i - 1], peak));
                    break;
                }
            }
        }
        let at_rest = End::of(&verdicts(0.0));
        let end = ends.map(|(low, high)| {
            let turned = if high > low { root(low, high, 1e-14, over) } else { 0.0 };
            // A limit that is reached is not yet passed: a hair further on it is.
            let beyond = [1e-10, 1e-8, 1e-6].map(|hair| (turned + hair).min(high));
            let found = beyond.into_iter().chain([high]).find_map(|t| End::of(&verdicts(t)));
            (turned, found.unwrap_or(End::Beyond))
        });
        self.at_rest = at_rest;
        self.end = end.unwrap_or_else(|| self.end.clone());
    }

    /// Marks what holds along directions up to the end, those between at which it holds least included.
    fn mark(&mut self, base: &Base, turn: Turn) {
        let marks: Vec<Mark> = turns_to(self.end.0).par_iter().map(|t| self.mark_at(base, turn, *t)).collect();
        let far = base.rest.norm() + base.most_m_per_s2;
        let dips: Vec<Mark> = marks
            .par_windows(3)
            .filter(|w| w[1].most < far && w[1].most < w[0].most && w[1].most <= w[2].most)
            .map(|w| {
                let most = |turned: f64| self.mark_at(base, turn, turned).most;
                let (turned, _) = golden_min(w[0].turned, w[2].turned, 1e-4, most);
                self.mark_at(base, turn, turned)
            })
            .collect();
        self.marks = marks;
        self.marks.extend(dips);
        self.marks.sort_by(|a, b| a.turned.total_cmp(&b.turned));
    }

    fn mark_at(&self, base: &Base, turn: Turn, turned: f64) -> Mark {
        let nothing = Mark { turned, least: f64::INFINITY, most: 0.0 };
        let Some(stops) = self.stops(base, turned) else { return nothing };
        let far = base.rest.norm() + base.most_m_per_s2;
        let course = self.course(base, base.rest + turn.up(turned) * far, &stops);
        let sights = self.sights(base, &course, &stops);
        // Loads grow with the size of G, the surface does not change with it.
        let bond = |sight: &Sight| {
            let settled = sight.settled.as_ref().ok()?;
            Some(super::bond_per_gravity(base.study, settled, base.ground().still.length_m))
        };
        let bond = sights.iter().filter_map(bond).fold(f64::INFINITY, f64::min);
        let least = super::LEAST_BOND_NUMBER / bond;
        let used = gravity_used(&base.judge(&course, &sights, RestsOn::Size));
        let most = far / used;
        if most <= least.max(1e-9 * far) || least >= far {
            return nothing;
        }
        Mark { turned, least, most }
    }

    /// What rests on the study, or on the size of G, at rest; nothing where it holds.
    pub fn judge_at_rest(&self, base: &Base, rests_on: RestsOn) -> Option<End> {
        let Some(stops) = self.stops(base, 0.0) else { return End::of(&lost()) };
        End::of(&self.judge_at(base, Vec2::zeros(), &stops, rests_on))
    }

    /// Judges the criteria of one kind at an acceleration to this side, those that need no rims.
    pub fn judge(&self, base: &Base, accel: Vec2, rests_on: RestsOn) -> Judged {
        let turned = Ramp::accelerate(base.rest, accel).map(|ramp| ramp.to_case_rad());
        match turned.and_then(|turned| self.stops(base, turned)) {
            Some(stops) => self.judge_at(base, accel, &stops, rests_on),
            None => lost(),
        }
    }

    fn judge_at(&self, base: &Base, accel: Vec2, stops: &[Stop], rests_on: RestsOn) -> Judged {
        let course = self.course(base, accel, stops);
        base.judge(&course, &self.sights(base, &course, stops), rests_on)
    }

    /// Under each bound, without what freeboard needs.
    fn sights(&self, base: &Base, course: &Course, stops: &[Stop]) -> Vec<Sight> {
        let ground = base.ground();
        let sight = |(b, (stop, (way, _))): (usize, (&Stop, &(Followed, Trace)))| {
            let settled = super::settle_at(base.study, &way.holder, stop, course.gravity.magnitude, false);
            Sight::without_rims(&ground, course, b, Ok(settled))
        };
        stops.iter().zip(&self.ways).enumerate().map(sight).collect()
    }

    fn course(&self, base: &Base, accel: Vec2, stops: &[Stop]) -> Course {
        let ramp = Ramp::accelerate(base.rest, accel);
        let to_stop = |(stop, (way, first)): (&Stop, &(Followed, Trace))| {
            let ramp = ramp.as_ref()?;
            Some(PourOver::to_stop(&way.holder, base.study.mouths(), ramp, Some(stop.clone()), first))
        };
        let ways = stops.iter().zip(&self.ways).map(to_stop).collect();
        Course { accel, gravity: base.gravity(accel), ramp, ways }
    }

    /// Where everything stands under each bound.
    fn stops(&self, base: &Base, turned: f64) -> Option<Vec<Stop>> {
        if base.progress.is_stopped() {
            return None;
        }
        self.ways.iter().map(|(way, _)| way.at(turned)).collect()
    }
}

const LOST: &str = "the liquid could not be followed further";

fn lost() -> Judged {
    Err(LOST.to_owned())
}

/// Turns from zero to `end`, no more than a step apart, and closer beside zero: rest is where vents close and surfaces
/// leave a roof.
fn turns_to(end: f64) -> Vec<f64> {
    let n = (end / STEP).ceil().max(0.0) as usize;
    let even = (0..n).map(|i| end * i as f64 / n as f64);
    let mut turns: Vec<f64> =
        even.chain([0.02, 0.1, 0.25, 0.5].map(|share| share * end.min(STEP))).chain([end]).collect();
    turns.sort_unstable_by(f64::total_cmp);
    turns.dedup();
    turns
}
