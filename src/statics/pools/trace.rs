//! Follows bodies of liquid while the direction turns: events are found as roots, not stepped over.
//!
//! Between events each body keeps its volume, or stands at a sill or brim and loses what its capacity loses. A body
//! that falls to a sill within it parts there, each side keeping what then stands on it.

use crate::geom::Vec2;
use crate::num::{bracket, root_between};

use super::look::{Body, Look};
use super::place::{Brim, Claim, Parting, Placed, Pour, Spilled, Unplaced, merge_shared};
use super::still::Holder;
use super::turn::Turn;

/// The bodies where the way was asked to be looked at.
#[derive(Clone, Debug)]
pub struct Stop {
    /// How far it had turned, radians.
    pub turned_rad: f64,
    /// The direction.
    pub up: Vec2,
    /// Bodies of liquid; basins are those of the holder's look along `up`.
    pub bodies: Vec<Body>,
    /// What left by mouths so far, one entry a mouth face and compartment.
    pub spilled: Vec<Spilled>,
    /// What went over sills so far.
    pub pours: Vec<Pour>,
    /// The least room so far between a body of the common fill and the mouth that it would leave by, m3; below zero by
    /// what left.
    pub room_m3: f64,
    /// That mouth.
    pub least: Option<Brim>,
    /// Whether there was more than one body at any time so far.
    pub had_several: bool,
}

/// A way, followed.
#[derive(Clone, Debug, Default)]
pub struct Trace {
    /// One for each place asked for, as far as it was followed.
    pub stops: Vec<Stop>,
    /// Turn at which liquid first left a mouth, and where.
    pub first_spill: Option<(f64, Spilled)>,
    /// Turn at which liquid first went over a sill, and over which.
    pub first_pour: Option<(f64, Pour)>,
    /// Turn at which it could be followed no further.
    pub lost_at: Option<f64>,
}

/// The longest step, radians. Steps only bound how narrow a dip of a capacity could be missed: events between them are
/// found as roots, and volumes do not depend on where steps end.
pub const LONGEST_STEP: f64 = 3.0 * std::f64::consts::PI / 180.0;

/// Events in one step beyond which it is given up.
const MOST_EVENTS: usize = 200;

/// Follows the liquid of `holder` along `turn`, from the bodies given or from its still levels, to each of `at` (turns
/// that rise, radians), and on to `end` until liquid first leaves; steps no longer than `step_rad`.
///
/// Accuracy: events to 1e-13 rad, volumes as [`crate::geom::Basins`]. Volume is conserved to rounding.
/// Source: `BrimPath`.
pub fn trace(holder: &Holder, turn: Turn, from: Option<&Stop>, at: &[f64], end: f64, step_rad: f64) -> Trace {
    let mut way = Way { holder, turn, trace: Trace::default(), now: None };
    if way.start(from).is_err() {
        way.trace.lost_at = Some(0.0);
        return way.trace;
    }
    for &goal in at {
        if way.go(goal, step_rad, false).is_err() {
            return way.trace;
        }
        let now = way.now.as_ref().expect("a way has a start");
        way.trace.stops.push(now.stop.clone());
    }
    if way.trace.first_spill.is_none() {
        // Beyond what was asked for only the first spill is of interest; where it is lost, there is none to tell.
        let lost = way.go(end, step_rad, true).is_err();
        if !lost && way.trace.first_spill.is_none() {
            way.trace.lost_at = None;
        }
    }
    way.trace
}

struct Way<'h, 'a> {
    holder: &'h Holder<'a>,
    turn: Turn,
    trace: Trace,
    now: Option<Now<'a>>,
}

/// Where everything stands at present.
struct Now<'a> {
    look: Look<'a>,
    stop: Stop,
    /// Of its bodies, m.
    levels: Vec<f64>,
    /// For each basin, the body that it lies in.
    owners: Vec<Option<usize>>,
}

impl<'a> Now<'a> {
    fn new(look: Look<'a>, stop: Stop) -> Now<'a> {
        let levels = stop.bodies.iter().map(|b| look.level_of(b)).collect();
        let owners = look.owners(&stop.bodies);
        Now { look, stop, levels, owners }
    }
}

struct Lost;

impl<'a> Way<'_, 'a> {
    fn start(&mut self, from: Option<&Stop>) -> Result<(), Lost> {
        let look = self.look(0.0);
        let bodies = match from {
            Some(stop) => stop.bodies.clone(),
            None => self.holder.still(&look),
        };
        let claims = bodies.iter().enumerate().map(|(i, b)| Claim {
            volume_m3: b.volume_m3,
            compartment: b.compartment,
            lows: b.lows.clone(),
            from: vec![i],
        });
        let claims: Vec<Claim> = claims.collect();
        let placed = match self.holder.place(&look, claims) {
            Ok(placed) => placed,
            // A still level exactly at a sill: as it stands.
            Err(Unplaced::Parted) => Placed { bodies, room_m3: self.holder.capacity_m3, ..Placed::default() },
            Err(Unplaced::Lost) => return Err(Lost),
        };
        let mut stop = Stop {
            turned_rad: 0.0,
            up: look.up,
            bodies: Vec::new(),
            spilled: from.map_or(Vec::new(), |s| s.spilled.clone()),
            pours: Vec::new(),
            room_m3: self.holder.capacity_m3,
            least: None,
            had_several: false,
        };
        take(&mut stop, placed);
        if from.is_none()
            && let Some(first) = stop.spilled.first()
        {
            self.trace.first_spill = Some((0.0, *first));
        }
        self.now = Some(Now::new(look, stop));
        Ok(())
    }

    /// On to `goal`, or until liquid first leaves.
    fn go(&mut self, goal: f64, step_rad: f64, until_spill: bool) -> Result<(), Lost> {
        let from = self.now.as_ref().map_or(0.0, |n| n.stop.turned_rad);
        let n_steps = ((goal - from) / step_rad).ceil().max(0.0) as usize;
        for i in 1..=n_steps {
            let to = if i == n_steps { goal } else { from + (goal - from) * i as f64 / n_steps as f64 };
            for n_events in 0.. {
                let turned = self.now.as_ref().map_or(0.0, |n| n.stop.turned_rad);
                if turned >= to {
                    break;
                }
                if n_events > MOST_EVENTS || self.advance(to).is_err() {
                    self.trace.lost_at = Some(turned);
                    return Err(Lost);
                }
            }
            if until_spill && self.trace.first_spill.is_some() {
                return Ok(());
            }
        }
        Ok(())
    }

    /// One stretch toward `to`: to it, or to the first event before it.
    fn advance(&mut self, to: f64) -> Result<(), Lost> {
        let now = self.now.take().ok_or(Lost)?;
        let from = now.stop.turned_rad;
        let look = self.look(to);
        let (claims, met) = self.claims(&now, &look);
        match self.holder.place(&look, claims) {
            Ok(mut placed) => {
                if let Some(dip) = self.dip(&now, &look, &placed, to) {
                    self.now = Some(now);
                    return self.advance(dip);
                }
                placed.pours.extend(met.into_iter().filter_map(|pair| over_a_sill_that_went(&now, pair)));
                self.note_firsts(&now, &placed, to);
                let mut stop = Stop { turned_rad: to, up: look.up, ..now.stop };
                take(&mut stop, placed);
                self.now = Some(Now::new(look, stop));
                Ok(())
            }
            Err(Unplaced::Parted) => {
                // Up to the last direction at which nothing has parted yet, and then a hair beyond it.
                let [before, after] = bracket(from, to, 1e-13, |turned| {
                    if turned == from {
                        self.parting(&now, &now.look)
                    } else {
                        self.parting(&now, &self.look(turned))
                    }
                });
                self.now = Some(now);
                if before > from {
                    self.advance(before)?;
                }
                self.part(after)
            }
            Err(Unplaced::Lost) => Err(Lost),
        }
    }

    /// Parts the body that has fallen to a sill within it at `turned`; each side keeps what stands on it.
    fn part(&mut self, turned: f64) -> Result<(), Lost> {
        let now = self.now.take().ok_or(Lost)?;
        let look = self.look(turned);
        let (mut claims, _) = self.claims(&now, &look);
        let Parting { claim_idx: culprit, basin, .. } =
            self.holder.least_room_over_sills(&look, &claims).ok_or(Lost)?;
        let basins = &look.basins;
        let claim = claims[culprit].clone();
        let children = basins.all()[basin].children.clone();
        let mut parts: Vec<Claim> = Vec::new();
        let mut left = claim.volume_m3;
        for child in children {
            let lows: Vec<usize> = claim.lows.iter().copied().filter(|&l| basins.is_within(l, child)).collect();
            // Over its own low points alone: others of the child may be dry, or another body's.
            let own = basins.join(&lows);
            let volume_m3 = own.map_or(0.0, |own| basins.all()[own].volume_at_top.min(left));
            if volume_m3 > 0.0 {
                left -= volume_m3;
                parts.push(Claim { volume_m3, lows, ..claim.clone() });
            }
        }
        if parts.len() < 2 {
            return Err(Lost);
        }
        // What is over is rounding, unless a mouth has sunk to the sill: then it stands above the sill and leaves.
        parts[0].volume_m3 += left;
        claims.splice(culprit..=culprit, parts);
        let mut stop = Stop { turned_rad: turned, up: look.up, ..now.stop.clone() };
        stop.bodies = claims
            .into_iter()
            .filter_map(|c| {
                let basin = look.basins.join(&c.lows)?;
                Some(Body { volume_m3: c.volume_m3, compartment: c.compartment, basin, lows: c.lows })
            })
            .collect();
        self.now = Some(Now::new(look, stop));
        Ok(())
    }

    /// By how much the body nearest to parting has fallen below its sill along `look`, as a volume, and how fast that grows.
    fn parting(&self, now: &Now, look: &Look) -> (f64, Option<f64>) {
        let (claims, _) = self.claims(now, look);
        match self.holder.least_room_over_sills(look, &claims) {
            None => (-self.holder.capacity_m3, None),
            Some(parting) => {
                let rate = self.holder.room_rate(look, &parting);
                (-parting.room.m3, rate.map(|r| -self.sign() * r))
            }
        }
    }

    /// The look where it has turned that far.
    fn look(&self, turned: f64) -> Look<'a> {
        self.holder.look(self.turn.up(turned))
    }

    /// +1 where the tilt grows.
    fn sign(&self) -> f64 {
        if self.turn.grows { 1.0 } else { -1.0 }
    }

    /// What the present bodies claim along another look: the low points that their own ones lead down to, and those
    /// that lie under them.
    /// With them, pairs of bodies that became one because the sill between them is there no more.
    fn claims(&self, now: &Now, look: &Look) -> (Vec<Claim>, Vec<(usize, usize)>) {
        let bodies = &now.stop.bodies;
        let mut claims: Vec<Claim> = bodies
            .iter()
            .enumerate()
            .map(|(i, b)| Claim {
                volume_m3: b.volume_m3,
                compartment: b.compartment,
                lows: Vec::new(),
                from: vec![i],
            })
            .collect();
        for (claim, body) in claims.iter_mut().zip(bodies) {
            for &low in &body.lows {
                let leads_to =
                    now.look.basins.low_point(low).iter().find_map(|&(e, t)| look.basins.descend_from(e, t));
                claim.lows.extend(leads_to);
            }
        }
        for low in (0..look.basins.all().len()).filter(|&b| look.basins.is_leaf(b)) {
            let beside = look.basins.low_point(low).iter().find_map(|&(e, t)| now.look.basins.basin_beside(e, t));
            if let Some((basin, level)) = beside
                && let Some(i) = now.owners[basin]
                && level < now.levels[i]
            {
                claims[i].lows.push(low);
            }
        }
        for claim in &mut claims {
            claim.lows.sort_unstable();
            claim.lows.dedup();
        }
        let met = merge_shared(&mut claims, look.basins.all().len());
        (claims, met)
    }

    /// Where, before `to`, the capacity of some body is least, if that is within the stretch and may matter.
    fn dip(&self, now: &Now, look: &Look, placed: &Placed, to: f64) -> Option<f64> {
        let from = now.stop.turned_rad;
        let sign = self.sign();
        let width = to - from;
        if width < 1e-7 {
            return None;
        }
        for (i, body) in now.stop.bodies.iter().enumerate() {
            let after = &placed.bodies[*placed.became.get(i)?];
            let Some(rate) = now.look.capacity_rate(body.basin).map(|r| sign * r).filter(|r| *r < 0.0) else {
                continue;
            };
            let Some(rate_after) = look.capacity_rate(after.basin).map(|r| sign * r).filter(|r| *r > 0.0) else {
                continue;
            };
            let (c0, c1) = (now.look.capacity_of(body.basin), look.capacity_of(after.basin));
            // Where the tangents at both ends meet lies below the least capacity.
            let x = ((c1 - c0 - rate_after * width) / (rate - rate_after)).clamp(0.0, width);
            let least = c0 + rate * x;
            let may_spill = now.look.basins.all()[body.basin].mouth.is_some();
            let threshold = if may_spill { now.stop.room_m3.max(0.0) } else { 0.0 };
            if least - body.volume_m3.max(after.volume_m3) >= threshold {
                continue;
            }
            let rate_at = |turned: f64| {
                let middle = self.look(turned);
                let (claims, _) = self.claims(now, &middle);
                let claim = claims.iter().find(|c| c.from.contains(&i));
                let basin = claim.and_then(|c| middle.basins.join(&c.lows));
                basin.and_then(|b| middle.capacity_rate(b)).map_or(rate, |r| sign * r)
            };
            let dip = root_between((from, rate), (to, rate_after), 1e-9, rate_at);
            if dip > from + 1e-8 && dip < to - 1e-8 {
                return Some(dip);
            }
        }
        None
    }

    /// Notes when liquid first left a mouth, and first went over a sill.
    fn note_firsts(&mut self, now: &Now, placed: &Placed, to: f64) {
        let slack = 1e-12 * self.holder.capacity_m3;
        let spilled: f64 = placed.spilled.iter().map(|s| s.volume_m3).sum();
        if self.trace.first_spill.is_none() && spilled > slack {
            let turned = self.first_over(now, (to, spilled), 1e-15, true);
            self.trace.first_spill = Some((turned, placed.spilled[0]));
        }
        let poured: f64 = placed.pours.iter().map(|p| p.volume_m3).sum();
        if self.trace.first_pour.is_none() && poured > slack {
            let turned = self.first_over(now, (to, poured), 1e-9, false);
            self.trace.first_pour = Some((turned, placed.pours[0]));
        }
    }

    /// Where some body first stands over its mouth, or its sill, up to a turn at which it does so by a volume.
    fn first_over(&self, now: &Now, to: (f64, f64), tolerance: f64, by_mouth: bool) -> f64 {
        let from = (now.stop.turned_rad, self.over(now, &now.look, by_mouth));
        root_between(from, to, tolerance, |turned| self.over(now, &self.look(turned), by_mouth))
    }

    /// By how much some body stands over its mouth, or its sill, along `look`, m3; below zero by its room.
    fn over(&self, now: &Now, look: &Look, by_mouth: bool) -> f64 {
        match self.holder.place(look, self.claims(now, look).0) {
            Ok(placed) => {
                let over: f64 = if by_mouth {
                    placed.spilled.iter().map(|s| s.volume_m3).sum()
                } else {
                    placed.pours.iter().map(|p| p.volume_m3).sum()
                };
                if over > 0.0 {
                    return over;
                }
                let has_mouth = |b: &&Body| look.basins.all()[b.basin].mouth.is_some() == by_mouth;
                let room = placed.bodies.iter().filter(|b| !b.lows.is_empty()).filter(has_mouth);
                let room =
                    room.map(|b| look.capacity_of(b.basin) - b.volume_m3).fold(self.holder.capacity_m3, f64::min);
                // A body that brims but pours elsewhere has no room, and yet nothing leaves.
                -room.max(1e-15 * self.holder.capacity_m3)
            }
            Err(_) => -self.holder.capacity_m3,
        }
    }
}

/// What went from the higher to the lower of two bodies over a sill that is there no more: all of the higher one.
fn over_a_sill_that_went(now: &Now, (i, j): (usize, usize)) -> Option<Pour> {
    let (a, b) = (&now.stop.bodies[i], &now.stop.bodies[j]);
    let from = if now.levels[i] > now.levels[j] { a } else { b };
    let outlet = now.look.basins.outlet(from.basin)?;
    Some(Pour {
        wall: now.look.cut.faces()[outlet.edge_idx as usize].wall,
        at: outlet.at,
        to_right: outlet.is_to_right,
        volume_m3: from.volume_m3,
    })
}

/// Moves what was placed into the present.
fn take(stop: &mut Stop, placed: Placed) {
    let slack = 0.0;
    stop.bodies = placed.bodies.into_iter().filter(|b| b.volume_m3 > slack && !b.lows.is_empty()).collect();
    for spilled in placed.spilled {
        let same =
            |s: &&mut Spilled| s.brim.face_idx == spilled.brim.face_idx && s.compartment == spilled.compartment;
        match stop.spilled.iter_mut().find(same) {
            Some(s) => *s = Spilled { volume_m3: s.volume_m3 + spilled.volume_m3, ..spilled },
            None => stop.spilled.push(spilled),
        }
    }
    for pour in placed.pours {
        let same = |p: &&mut Pour| p.wall == pour.wall && p.to_right == pour.to_right;
        match stop.pours.iter_mut().find(same) {
            Some(p) => *p = Pour { volume_m3: p.volume_m3 + pour.volume_m3, ..pour },
            None => stop.pours.push(pour),
        }
    }
    // Once something has left, all of it counts.
    let room_m3 = if placed.room_m3 < 0.0 { stop.room_m3.min(0.0) + placed.room_m3 } else { placed.room_m3 };
    if room_m3 < stop.room_m3 {
        (stop.room_m3, stop.least) = (room_m3, placed.least);
    }
    stop.had_several |= stop.bodies.len() > 1;
}
