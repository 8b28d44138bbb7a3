//! The kernel's pour-over, driven along stops as the hand cases give them.

use brimwright::geom::{Vec2, cross};
use brimwright::section::{Region, Section, check};
use brimwright::statics::{Bound, Holder, Look, Start, Stop, Trace, Turn, Vessel, trace};

/// A section made ready, with liquid on one common still level.
pub struct Followed {
    pub section: Section,
    pub region: Region,
    starts: Vec<Start>,
}

impl Followed {
    pub fn new(section: Section, volume_m3: f64) -> Followed {
        let region = check(&section).unwrap_or_else(|faults| panic!("{faults:?}"));
        let vessel = Vessel::new(region.geometry().to_vec(), section.width.clone());
        let compartments = (0..region.open().n_parts()).collect();
        let starts = vec![Start { compartments, volume_m3, vessel, is_common: true }];
        Followed { section, region, starts }
    }

    pub fn holder(&self) -> Holder<'_> {
        Holder::new(&self.region, Bound::Settled.cut(&self.region), &self.section.width, &self.starts)
    }

    pub fn look(&self, up: Vec2) -> Look<'_> {
        self.holder().look(up)
    }

    /// From `ups[0]` to each of the others in turn; one trace each.
    pub fn along(&self, ups: &[Vec2], step_rad: f64) -> Vec<Trace> {
        let holder = self.holder();
        let mut from: Option<Stop> = None;
        let mut traces = Vec::new();
        for pair in ups.windows(2) {
            let turned = cross(pair[0], pair[1]).atan2(pair[0].dot(&pair[1]));
            let turn = Turn { start_rad: (-pair[0].x).atan2(pair[0].y), grows: turned >= 0.0 };
            let trace = trace(&holder, turn, from.as_ref(), &[turned.abs()], turned.abs(), step_rad);
            from = trace.stops.first().cloned();
            traces.push(trace);
            if from.is_none() {
                break;
            }
        }
        traces
    }
}
