//! Puts liquid in place along a direction: over its low points, up to a sill or a brim, and beyond it to the neighbour.

use crate::geom::{Point, Vec2};
use crate::section::{Attached, Wall};

use super::look::{Body, Look};
use super::still::Holder;

/// A body on its way from one direction to another: its volume, and the low points that it covers there.
#[derive(Clone, Debug)]
pub(super) struct Claim {
    pub volume_m3: f64,
    pub compartment: usize,
    pub lows: Vec<usize>,
    /// The bodies that it was.
    pub from: Vec<usize>,
}

/// Liquid that left a mouth.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spilled {
    /// By which mouth.
    pub brim: Brim,
    /// How much, m3.
    pub volume_m3: f64,
    /// The compartment that it came from.
    pub compartment: usize,
}

/// The mouth by which a body would leave.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Brim {
    /// The face that is the mouth.
    pub face_idx: u32,
    /// Its lowest point.
    pub at: Point,
}

/// Liquid that went over a sill.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pour {
    /// What the sill is.
    pub wall: Wall,
    /// Where.
    pub at: Point,
    /// Whether it went to the right, seen along effective gravity.
    pub to_right: bool,
    /// How much, m3.
    pub volume_m3: f64,
}

/// Where everything stands.
#[derive(Clone, Debug, Default)]
pub(super) struct Placed {
    pub bodies: Vec<Body>,
    /// For each claim, the body that it became.
    pub became: Vec<usize>,
    pub spilled: Vec<Spilled>,
    pub pours: Vec<Pour>,
    /// The least room between a body and the mouth that it would leave by, m3; below zero by what left. Of bodies
    /// of the common fill only.
    pub room_m3: f64,
    /// That mouth.
    pub least: Option<Brim>,
}

/// The claim that is nearest to parting.
#[derive(Clone, Debug)]
pub(super) struct Parting {
    pub claim_idx: usize,
    /// The basin that holds all its low points.
    pub basin: usize,
    /// How far it is from parting.
    pub room: Room,
}

/// How far a body is from parting, and at what.
#[derive(Clone, Debug)]
pub(super) struct Room {
    /// As a volume; below zero where it has parted.
    pub m3: f64,
    to: Event,
}

/// What parts a body.
#[derive(Clone, Debug)]
enum Event {
    /// It falls to the highest sill between its low points; the basins of its sides.
    Sill(Vec<usize>),
    /// The sill over which this part of it pours to others sinks to that one.
    OtherSill(usize),
    /// This mouth, a face, sinks to it.
    Mouth(u32),
}

/// What keeps liquid from being put in place.
#[derive(Clone, Debug)]
pub(super) enum Unplaced {
    /// A body has fallen to a sill within it, or a mouth has sunk to one.
    Parted,
    /// It went on for ever, or its parts never meet.
    Lost,
}

impl Holder<'_> {
    /// Puts claims in place along a look.
    pub(super) fn place(&self, look: &Look, claims: Vec<Claim>) -> Result<Placed, Unplaced> {
        let basins = &look.basins;
        let mut bodies = Vec::with_capacity(claims.len());
        let mut has_parted = false;
        for claim in &claims {
            let Some(basin) = basins.join(&claim.lows) else { return Err(Unplaced::Lost) };
            has_parted |= self.room_over_sills(look, basin, claim).is_some_and(|room| room.m3 < 0.0);
            let (volume_m3, compartment) = (claim.volume_m3, claim.compartment);
            bodies.push(Body { volume_m3, compartment, basin, lows: claim.lows.clone() });
        }
        if has_parted {
            return Err(Unplaced::Parted);
        }
        let n_before = claims.iter().flat_map(|c| &c.from).max().map_or(0, |m| m + 1);
        let mut placed = Placed { bodies, room_m3: self.capacity_m3, ..Placed::default() };
        let mut became: Vec<usize> = (0..claims.len()).collect();
        self.pour(look, &mut placed, &mut became)?;
        let mut of_before = vec![0; n_before];
        for (claim, body) in claims.iter().zip(&became) {
            claim.from.iter().for_each(|&f| of_before[f] = *body);
        }
        placed.became = of_before;
        Ok(placed)
    }

    /// The claim that is nearest to parting, and how far it stands above the highest sill within it, as a volume.
    pub(super) fn least_room_over_sills(&self, look: &Look, claims: &[Claim]) -> Option<Parting> {
        let mut least: Option<Parting> = None;
        for (claim_idx, claim) in claims.iter().enumerate() {
            let basin = look.basins.join(&claim.lows);
            let room = basin.and_then(|basin| Some((basin, self.room_over_sills(look, basin, claim)?)));
            if let Some((basin, room)) = room
                && least.as_ref().is_none_or(|l| room.m3 < l.room.m3)
            {
                least = Some(Parting { claim_idx, basin, room });
            }
        }
        least
    }

    /// How far a body of several low points is from falling apart, as a volume; none for one. It does where it falls to the
    /// highest sill between them; where a sill to others sinks to that one; and where a mouth does.
    fn room_over_sills(&self, look: &Look, basin: usize, claim: &Claim) -> Option<Room> {
        let all = look.basins.all();
        let b = &all[basin];
        if b.children.is_empty() {
            return None;
        }
        let mut parts = Vec::with_capacity(b.children.len());
        let mut outer = (if b.parent.is_some() { b.top } else { f64::INFINITY }, basin);
        let mut brim: Option<(f64, u32)> = None;
        for &child in &b.children {
            // Its own low points alone: others there may be dry, or another body's.
            let lows: Vec<usize> = claim.lows.iter().copied().filter(|&l| look.basins.is_within(l, child)).collect();
            let Some(part) = look.basins.join(&lows) else {
                outer = (b.bottom, child);
                continue;
            };
            if part != child && all[part].top < outer.0 {
                outer = (all[part].top, part);
            }
            let mouths = (0..=part).filter(|&i| all[i].mouth.is_some() && look.basins.is_within(i, part));
            for mouth in mouths.filter_map(|i| all[i].mouth) {
                if brim.is_none_or(|m| mouth.0 < m.0) {
                    brim = Some(mouth);
                }
            }
            parts.push(part);
        }
        let held: f64 = parts.iter().map(|&part| all[part].volume_at_top).sum();
        let mut room = Room { m3: claim.volume_m3 - held, to: Event::Sill(parts) };
        let outer_m3 = (outer.0 - b.bottom) * self.scale_m2;
        if outer_m3 < room.m3 {
            room = Room { m3: outer_m3, to: Event::OtherSill(outer.1) };
        }
        if let Some((level, face_idx)) = brim
            && (level - b.bottom) * self.scale_m2 < room.m3
        {
            room = Room { m3: (level - b.bottom) * self.scale_m2, to: Event::Mouth(face_idx) };
        }
        Some(room)
    }

    /// How fast that room grows as the direction turns counter-clockwise, m3/rad, where that can be told.
    pub(super) fn room_rate(&self, look: &Look, parting: &Parting) -> Option<f64> {
        let child = *look.basins.all()[parting.basin].children.first()?;
        let sill = || look.basins.outlet(child).map(|o| o.at);
        // Levels of points turn about each other.
        let right = Vec2::new(look.up.y, -look.up.x);
        let rise = |p: Point, q: Point| -right.dot(&(p - q)) * self.scale_m2;
        match &parting.room.to {
            Event::Sill(parts) => parts.iter().map(|&part| look.capacity_rate(part).map(|r| -r)).sum(),
            Event::OtherSill(basin) => Some(rise(look.basins.outlet(*basin)?.at, sill()?)),
            Event::Mouth(face_idx) => Some(rise(look.lowest_on(*face_idx), sill()?)),
        }
    }

    /// Lets what stands above a sill or a brim go, until nothing does.
    fn pour(&self, look: &Look, placed: &mut Placed, became: &mut [usize]) -> Result<(), Unplaced> {
        let slack = 1e-14 * self.capacity_m3;
        let most = 64 + 16 * look.basins.all().len();
        for _ in 0..most {
            let bodies = &placed.bodies;
            let is_over = |&i: &usize| {
                !bodies[i].lows.is_empty() && bodies[i].volume_m3 - look.capacity_of(bodies[i].basin) > slack
            };
            let has_mouth = |i: &usize| look.basins.all()[bodies[*i].basin].mouth.is_some();
            // What leaves by a mouth goes first: it is not there to fill anything up to a sill.
            let spills = (0..bodies.len()).filter(has_mouth).find(is_over);
            let Some(i) = spills.or_else(|| (0..bodies.len()).find(is_over)) else {
                self.note_room(look, placed);
                return Ok(());
            };
            let body = &placed.bodies[i];
            let (basin, compartment) = (body.basin, body.compartment);
            let capacity = look.capacity_of(basin);
            let excess = body.volume_m3 - capacity;
            if let Some((_, face_idx)) = look.basins.all()[basin].mouth {
                placed.bodies[i].volume_m3 = capacity;
                match self.beyond_tip(look, basin, face_idx, placed) {
                    Some(low) => self.pour_into(look, placed, low, excess, compartment),
                    None => {
                        let brim = Brim { face_idx, at: look.lowest_on(face_idx) };
                        placed.spilled.push(Spilled { brim, volume_m3: excess, compartment });
                    }
                }
                continue;
            }
            let Some(parent) = look.basins.all()[basin].parent else {
                // Shut above and full: what is over is rounding.
                if excess > 1e-9 * self.capacity_m3 {
                    return Err(Unplaced::Lost);
                }
                placed.bodies[i].volume_m3 = capacity;
                continue;
            };
            let Some(outlet) = look.basins.outlet(basin) else { return Err(Unplaced::Lost) };
            let is_full = |child: usize| {
                let body = placed.bodies.iter().position(|b| b.basin == child && !b.lows.is_empty());
                let has_mouth = look.basins.all()[child].mouth.is_some();
                body.filter(|&b| {
                    !has_mouth && placed.bodies[b].volume_m3 >= look.basins.all()[child].volume_at_top - slack
                })
            };
            let others: Vec<usize> =
                look.basins.all()[parent].children.iter().copied().filter(|&c| c != basin).collect();
            let not_full = others.iter().copied().find(|&c| is_full(c).is_none());
            match (is_full(outlet.neighbour), not_full) {
                (Some(_), None) => {
                    // All stand at the sill: one body.
                    let mut all: Vec<usize> = others.iter().filter_map(|&c| is_full(c)).collect();
                    all.sort_unstable();
                    for j in all {
                        let other = std::mem::take(&mut placed.bodies[j].lows);
                        let volume = std::mem::take(&mut placed.bodies[j].volume_m3);
                        placed.bodies[i].lows.extend(other);
                        placed.bodies[i].volume_m3 += volume;
                        became.iter_mut().filter(|b| **b == j).for_each(|b| *b = i);
                    }
                    placed.bodies[i].basin = parent;
                }
                (full, not_full) => {
                    placed.bodies[i].volume_m3 = capacity;
                    let low = match (full, not_full) {
                        (Some(_), Some(other)) => look.lows_of(other)[0],
                        _ => outlet.low,
                    };
                    placed.pours.push(Pour {
                        wall: look.cut.faces()[outlet.edge_idx as usize].wall,
                        at: outlet.at,
                        to_right: outlet.is_to_right,
                        volume_m3: excess,
                    });
                    self.pour_into(look, placed, low, excess, compartment);
                }
            }
        }
        Err(Unplaced::Lost)
    }

    /// Adds liquid to the body over a low point, or makes one.
    fn pour_into(&self, look: &Look, placed: &mut Placed, low: usize, volume_m3: f64, compartment: usize) {
        let over = |b: &Body| !b.lows.is_empty() && look.basins.is_within(low, b.basin);
        match placed.bodies.iter_mut().find(|b| over(b)) {
            Some(body) => body.volume_m3 += volume_m3,
            None => placed.bodies.push(Body { volume_m3, compartment, basin: low, lows: vec![low] }),
        }
    }

    /// The low point beyond a plate that ends on the rim line where liquid leaves, if there is room: what passes over
    /// its tip falls into the neighbour first.
    fn beyond_tip(&self, look: &Look, basin: usize, face_idx: u32, placed: &Placed) -> Option<usize> {
        let at = look.lowest_on(face_idx);
        let is_tip = |p: &crate::section::Placed| {
            let ends = [(p.ends[0], p.points[0]), (p.ends[1], p.points[p.points.len() - 1])];
            ends.iter().any(|(end, q)| matches!(end, Attached::Outline { is_mouth: true, .. }) && *q == at)
        };
        let plate_idx = self.plates.iter().position(is_tip)?;
        for (i, face) in look.cut.faces().iter().enumerate() {
            let is_own = matches!(face.wall, Wall::Plate { plate_idx: p, .. } if p == plate_idx);
            let t = if face.edge.start == at {
                0.0
            } else if face.edge.end == at {
                1.0
            } else {
                continue;
            };
            if !is_own {
                continue;
            }
            let Some((beside, _)) = look.basins.basin_beside(i as u32, t) else { continue };
            let root = look.basins.root(beside);
            if look.basins.is_within(basin, root) {
                continue;
            }
            let low = look.basins.descend_from(i as u32, t)?;
            // Its neighbour's brim is the same rim: it has room while it stands below it.
            let held: f64 = placed
                .bodies
                .iter()
                .filter(|b| !b.lows.is_empty() && look.basins.is_within(b.basin, root))
                .map(|b| b.volume_m3)
                .sum();
            let brim = look.basins.all()[root].mouth.map_or(f64::INFINITY, |m| m.0);
            let room = look.basins.volume_below(root, brim) - held;
            return (room > 1e-12 * self.capacity_m3).then_some(low);
        }
        None
    }

    fn note_room(&self, look: &Look, placed: &mut Placed) {
        let is_common = |compartment: usize| self.is_common[compartment];
        let spilled = placed.spilled.iter().filter(|s| is_common(s.compartment));
        let (sum, brim) = spilled.fold((0.0, None), |(sum, _), s| (sum + s.volume_m3, Some(s.brim)));
        if let Some(brim) = brim {
            (placed.room_m3, placed.least) = (-sum, Some(brim));
            return;
        }
        for b in placed.bodies.iter().filter(|b| !b.lows.is_empty() && is_common(b.compartment)) {
            if let Some((_, face_idx)) = look.basins.all()[b.basin].mouth {
                let room = look.capacity_of(b.basin) - b.volume_m3;
                if placed.least.is_none() || room < placed.room_m3 {
                    let brim = Brim { face_idx, at: look.lowest_on(face_idx) };
                    (placed.room_m3, placed.least) = (room, Some(brim));
                }
            }
        }
    }
}

/// Claims on one low point are one. Gives pairs of bodies that became one so.
pub(super) fn merge_shared(claims: &mut Vec<Claim>, n_basins: usize) -> Vec<(usize, usize)> {
    let mut pairs = Vec::new();
    loop {
        let mut owner = vec![None; n_basins];
        let mut shared = None;
        'all: for (i, claim) in claims.iter().enumerate() {
            for &low in &claim.lows {
                match owner[low] {
                    Some(j) if j != i => {
                        shared = Some((j, i));
                        break 'all;
                    }
                    _ => owner[low] = Some(i),
                }
            }
        }
        let Some((j, i)) = shared else { return pairs };
        let other = claims.remove(i);
        let claim = &mut claims[j];
        pairs.push((claim.from[0], other.from[0]));
        claim.volume_m3 += other.volume_m3;
        claim.from.extend(other.from);
        claim.lows.extend(other.lows);
        claim.lows.sort_unstable();
        claim.lows.dedup();
    }
}
