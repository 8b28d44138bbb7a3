//! Settled states under both bounds straight from the kernel, with no criterion judged: what many random sections can
//! be put through in little time.

use brimwright::geom::{Point, Vec2, cross};
use brimwright::section::{Region, Section, check};
use brimwright::statics::{
    Bound, Holder, LONGEST_STEP, Setting, Settled, Start, Stop, Turn, Vessel, settle, spills, trace,
};

use super::WATER;

/// A section made ready, with water on one common still level; moments are taken about `about`.
pub struct Tank {
    pub section: Section,
    pub region: Region,
    pub starts: Vec<Start>,
    pub about: Point,
}

/// Where everything stands under one effective gravity.
pub struct State {
    pub stop: Stop,
    pub settled: Settled,
    /// Effective gravity, m/s2.
    pub gravity: Vec2,
    /// The way to it.
    turn: Turn,
    turned_rad: f64,
}

impl Tank {
    pub fn new(section: Section, share: f64) -> Tank {
        let region = check(&section).unwrap_or_else(|faults| panic!("{faults:?}"));
        let vessel = Vessel::new(region.geometry().to_vec(), section.width.clone());
        let compartments = (0..region.open().n_parts()).collect();
        let starts = vec![Start { compartments, volume_m3: share * vessel.capacity_m3(), vessel, is_common: true }];
        Tank { section, region, starts, about: Point::new(0.7, -0.3) }
    }

    pub fn capacity_m3(&self) -> f64 {
        self.starts.iter().map(|s| s.vessel.capacity_m3()).sum()
    }

    /// Volume at the start, m3.
    pub fn liquid_m3(&self) -> f64 {
        self.starts.iter().map(|s| s.volume_m3).sum()
    }

    /// Steadily from rest to an effective gravity; none where the way is lost.
    pub fn state(&self, bound: Bound, gravity: Vec2) -> Option<State> {
        let tilt_rad = cross(-Vec2::y(), gravity).atan2(-gravity.y);
        let turn = Turn { start_rad: 0.0, grows: tilt_rad >= 0.0 };
        self.follow(bound, None, turn, tilt_rad.abs(), gravity)
    }

    /// Back to rest.
    pub fn released(&self, bound: Bound, from: &State) -> Option<State> {
        let rest = Vec2::new(0.0, -from.gravity.norm());
        self.follow(bound, Some(&from.stop), from.turn.back_from(from.turned_rad), from.turned_rad, rest)
    }

    fn follow(&self, bound: Bound, from: Option<&Stop>, turn: Turn, turned_rad: f64, gravity: Vec2) -> Option<State> {
        let cut = bound.cut(&self.region);
        let holder = Holder::new(&self.region, cut, &self.section.width, &self.starts);
        let trace = trace(&holder, turn, from, &[turned_rad], turned_rad, LONGEST_STEP);
        let stop = trace.stops.into_iter().next()?;
        let setting = Setting {
            spills: &spills(&holder, &self.section.mouths(), &stop.spilled),
            gravity_m_per_s2: gravity.norm(),
            density_kg_per_m3: &|_| WATER,
            gas_pa: 0.0,
            air_pa: 0.0,
            moment_about: self.about,
            points: &[],
            in_full: true,
        };
        let settled = settle(&self.section, &self.region, &holder.look(stop.up), &stop.bodies, &setting);
        Some(State { stop, settled, gravity, turn, turned_rad })
    }
}
