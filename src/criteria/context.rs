//! What a criterion may look at, and the helpers that they share.

use crate::cases::LoadCase;
use crate::geom::{Point, Vec2};
use crate::plates::PlateResult;
use crate::problem::Place;
use crate::statics::{Bound, EffectiveGravity, GasPocket, PourOver, Rims, Route, Settled};
use crate::study::{Limit, ValidStudy};
use crate::units::{Measure, Phrase, Quantity, UnitSystem};

use super::{Reach, Sense, State, Trust, Verdict, by_records, unconfirmed};

/// Physics of one load case.
pub struct Context<'a> {
    /// The inputs.
    pub study: &'a ValidStudy,
    /// The load case.
    pub case: &'a LoadCase,
    /// Acceleration of the tank, m/s2.
    pub accel: Vec2,
    /// Effective gravity.
    pub gravity: EffectiveGravity,
    /// z of the still level, m.
    pub still_z_m: f64,
    /// The case under each bound, settled first.
    pub views: Vec<View<'a>>,
    /// Only states, demands and limits are asked for: no working and no mending.
    pub is_brief: bool,
}

/// Physics of one load case under one bound.
pub struct View<'a> {
    /// Which bound.
    pub bound: Bound,
    /// The way to the case; none where it leads through free fall.
    pub way: Option<&'a PourOver>,
    /// Works out the largest common fill that leaves no mouth on the way, m3, where that can be told.
    pub holds_m3: &'a dyn Fn() -> Option<f64>,
    /// The settled state, or why there is none.
    pub settled: Result<&'a Settled, &'a str>,
    /// What each plate bears; empty where there is no settled state.
    pub plates: &'a [PlateResult],
    /// The rims carried on; none where effective gravity does not point toward the floor.
    pub rims: Option<&'a Rims>,
    /// How the liquid comes to the case where the walls are carried on.
    pub route: Route,
    /// For each mouth, z of the settled surface above its brim with the walls carried on, m, where that can be told.
    pub risen_z_m: &'a [Option<f64>],
    /// Why nothing of this case can be judged: free fall, capillarity.
    pub blocked: Option<String>,
}

impl View<'_> {
    /// The settled state, or why nothing can be judged by it.
    pub fn judged(&self) -> Result<&Settled, &str> {
        match &self.blocked {
            Some(reason) => Err(reason),
            None => self.settled,
        }
    }
}

impl Context<'_> {
    /// A verdict from demand and limit. The demand is compared in `sense`.
    pub fn verdict(&self, criterion: &'static str, demand: Measure, limit: Measure, sense: Sense) -> Verdict {
        Verdict::judged(criterion, demand, limit, sense, self.trust())
    }

    /// A verdict that is not judged, and why.
    pub fn not_judged(&self, criterion: &'static str, sense: Sense, reason: String) -> Verdict {
        Verdict::not_judged(criterion, sense, reason, self.trust())
    }

    /// What to do: a fill, rounded down, so that the one shown holds.
    pub fn fill_that_holds(&self, volume_m3: f64) -> Phrase {
        let capacity = self.study.common().map_or(self.study.capacity_m3(), |s| s.vessel.capacity_m3());
        let share = (volume_m3 / capacity * 1000.0).floor() / 1000.0;
        Phrase::new("To hold, fill {}", [Measure::new(Quantity::Share, share)])
    }

    /// The trust strip of a settled result.
    pub fn trust(&self) -> Vec<Trust> {
        let rise = match self.case.onset_s {
            None => (Reach::Inside, "held for long: the settled value is the whole answer".to_owned()),
            Some(t) => (
                Reach::Near,
                format!("builds up in {t} s; the settled value leaves out what a quick onset adds on top"),
            ),
        };
        let unused = || (Reach::Inside, "not used by a settled result".to_owned());
        let roof = (Reach::Inside, "roof and dry floor are in the geometry, exactly".to_owned());
        [
            ("rise time", rise),
            ("steepness", unused()),
            ("depth to length", unused()),
            ("forcing period", unused()),
            ("roof or dry floor", roof),
        ]
        .map(|(name, (reach, words))| Trust { name, reach, words })
        .to_vec()
    }

    /// The name of a mouth with the end at which `at` lies.
    pub fn mouth_words(&self, mouth_idx: usize, at: Point) -> String {
        let mouth = &self.study.mouths()[mouth_idx];
        let (left, right) = mouth
            .edges(self.study.region())
            .map(|e| e.extent(Vec2::x()))
            .fold((f64::INFINITY, f64::NEG_INFINITY), |acc, (low, high)| (acc.0.min(low.0), acc.1.max(high.0)));
        let slack = 1e-3 * (right - left);
        if right - left <= 0.0 {
            mouth.name.clone()
        } else if at.x <= left + slack {
            format!("{}, left end", mouth.name)
        } else if at.x >= right - slack {
            format!("{}, right end", mouth.name)
        } else {
            mouth.name.clone()
        }
    }

    /// The outline edge of a mouth that is nearest to a point.
    pub fn mouth_place(&self, mouth_idx: usize, at: Point) -> Place {
        let edges = &self.study.mouths()[mouth_idx].edge_idxs;
        let distance = |&i: &usize| self.study.region().geometry()[i].nearest(at).1;
        edges.iter().min_by(|a, b| distance(a).total_cmp(&distance(b))).map_or(Place::Whole, |&i| Place::Edge(i))
    }

    /// What is used of the room that a load has, where it grows with effective gravity from nothing.
    pub fn gravity_used(load: f64, room: f64) -> Option<f64> {
        Some(if room > 0.0 {
            load.max(0.0) / room
        } else if load <= room {
            0.0
        } else {
            f64::INFINITY
        })
    }

    /// The worse verdict of both bounds, which it names where there are two.
    pub fn worse(&self, verdict: impl Fn(&View) -> Verdict) -> Verdict {
        let all = self
            .views
            .iter()
            .map(|view| (view, verdict(view)))
            .map(|(view, verdict)| self.over_gas(view, verdict))
            .map(|(view, verdict)| Verdict { bound: (self.views.len() > 1).then_some(view.bound), ..verdict });
        let worse = |a: Verdict, b: Verdict| {
            let gravity_used = Some(a.gravity_used().max(b.gravity_used()));
            Verdict { gravity_used, ..if b.order(&a).is_lt() { b } else { a } }
        };
        all.reduce(worse).expect("a case has a bound")
    }

    /// A verdict that rests on a gas pocket which touches no mouth never holds: it is not judged, since the liquid has been
    /// followed as if the gas were vented. One that fails still does, and says so. With nothing moved from rest
    /// the pocket is as it was.
    fn over_gas<'v>(&self, view: &'v View<'v>, verdict: Verdict) -> (&'v View<'v>, Verdict) {
        let has_moved = view.way.and_then(|w| w.stop.as_ref()).is_some_and(|stop| stop.turned_rad > 0.0);
        let pockets = view.settled.map_or(&[][..], |settled| &settled.gas);
        if !has_moved || pockets.is_empty() || verdict.state == State::NotJudged {
            return (view, verdict);
        }
        let compartment = verdict.at.and_then(|at| self.study.region().open().part_at(at));
        let is_beside = |p: &&GasPocket| compartment.is_none_or(|c| c == p.compartment);
        let Some(pocket) = pockets.iter().find(is_beside) else { return (view, verdict) };
        let volume = Measure::new(Quantity::Volume, pocket.volume_m3).text(UnitSystem::Si);
        let words = format!(
            "{volume} of gas in cell {} touches no mouth, and the liquid was followed as if it were vented",
            pocket.cell_idx + 1
        );
        if verdict.state == State::Fails {
            let remark = if verdict.remark.is_empty() { words } else { format!("{}; {words}", verdict.remark) };
            return (view, Verdict { remark, gravity_used: None, ..verdict });
        }
        let Verdict { place, place_words, at, source, record, unconfirmed_record, .. } = verdict;
        let unsure = self.not_judged(verdict.criterion, verdict.sense, words);
        (view, Verdict { place, place_words, at, source, record, unconfirmed_record, ..unsure })
    }

    /// The settled bound.
    pub fn settled(&self) -> &View<'_> {
        &self.views[0]
    }

    /// One verdict for each requirement record of a kind, from the record's value.
    pub fn by_records(&self, kind: fn(&Limit) -> Option<f64>, verdict: impl Fn(f64) -> Verdict) -> Vec<Verdict> {
        by_records(self.study, kind, verdict)
    }

    /// The index of a record when it is not confirmed.
    pub fn unconfirmed(&self, record_idx: Option<usize>) -> Option<usize> {
        unconfirmed(self.study, record_idx)
    }
}
