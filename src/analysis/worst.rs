//! What every plate carries at most over all load cases and bounds, toward either side.

use crate::geom::Point;
use crate::statics::PlateLoad;
use crate::units::{Measure, Quantity};

use super::results::{Bound, CaseResult, PlatePeak, Weld};

/// What is rounding, as a share of the highest pressure or of the greatest force on the tank.
const ROUNDING_SHARE: f64 = 1e-9;

/// The largest loads of every plate, in the order of plates; nothing of a plate that never carries any.
pub(super) fn plate_peaks(n_plates: usize, cases: &[CaseResult]) -> Vec<PlatePeak> {
    let states = || cases.iter().flat_map(|case| case.states());
    let highest_pa = states().map(|(_, state)| state.peak_pa).fold(0.0, f64::max);
    let greatest_n = states().map(|(_, state)| state.total_force_n.norm()).fold(0.0, f64::max);
    let mut peaks = Vec::new();
    for plate_idx in 0..n_plates {
        let scenes = scenes(plate_idx, cases);
        let net = scenes.iter().map(|s| s.peak("net load", Quantity::Force, s.load.net_n, s.load.acts_at));
        let net: Vec<PlatePeak> = net.filter(|p| p.load.si.abs() > ROUNDING_SHARE * greatest_n).collect();
        let pressure = scenes.iter().filter_map(|s| {
            let (pa, at) = s.load.peak?;
            Some(s.peak("net pressure", Quantity::GagePressure, pa, Some(at)))
        });
        let pressure: Vec<PlatePeak> = pressure.filter(|p| p.load.si.abs() > ROUNDING_SHARE * highest_pa).collect();
        if pressure.is_empty() {
            continue;
        }
        for all in [net, pressure] {
            peaks.extend(largest(all.iter().filter(|p| p.load.si > 0.0)));
            peaks.extend(largest(all.iter().filter(|p| p.load.si < 0.0)));
        }
        for end in 0..2 {
            let of = |name, quantity, si: fn(&Weld) -> f64| -> Vec<PlatePeak> {
                let at_end = |s: &Scene| {
                    let weld = s.welds.iter().find(|weld| weld.end == end)?;
                    Some(s.peak(name, quantity, si(weld), Some(weld.at)))
                };
                scenes.iter().filter_map(at_end).collect()
            };
            peaks.extend(largest(of("weld force", Quantity::ForcePerLength, Weld::force_n_per_m).iter()));
            peaks.extend(largest(of("weld moment", Quantity::MomentPerLength, Weld::moment_n).iter()));
        }
    }
    peaks
}

/// A plate in a load case under a bound.
struct Scene<'a> {
    plate_idx: usize,
    case_idx: usize,
    bound: Bound,
    load: &'a PlateLoad,
    welds: &'a [Weld],
}

fn scenes(plate_idx: usize, cases: &[CaseResult]) -> Vec<Scene<'_>> {
    let mut scenes = Vec::new();
    for (case_idx, case) in cases.iter().enumerate() {
        for (bound, state) in case.states() {
            let Some(load) = state.plates.get(plate_idx) else { continue };
            let own = case.plates.iter().find(|plate| plate.plate_idx == plate_idx && plate.bound == bound);
            let welds = own.map_or(&[][..], |plate| &plate.welds);
            scenes.push(Scene { plate_idx, case_idx, bound, load, welds });
        }
    }
    scenes
}

impl Scene<'_> {
    fn peak(&self, name: &'static str, quantity: Quantity, si: f64, at: Option<Point>) -> PlatePeak {
        let Scene { plate_idx, case_idx, bound, .. } = *self;
        PlatePeak { plate_idx, name, load: Measure::new(quantity, si), at, case_idx, bound }
    }
}

/// The first one that none is larger than in size.
fn largest<'a>(peaks: impl Iterator<Item = &'a PlatePeak>) -> Option<PlatePeak> {
    peaks.reduce(|a, b| if b.load.si.abs() > a.load.si.abs() { b } else { a }).cloned()
}
