//! A verdict: one judged check of one load case.

use crate::geom::Point;
use crate::problem::Place;
use crate::sources::Source;
use crate::statics::Bound;
use crate::units::{Measure, Phrase};

/// State of a verdict. Ordered as they are listed: the worst first.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum State {
    /// Utilisation above one.
    Fails,
    /// Outside the method's range; never passes silently.
    NotJudged,
    /// Utilisation above 0.9.
    Close,
    /// Utilisation up to 0.9.
    Holds,
}

impl State {
    /// All states, in the order of listing.
    pub const ALL: [State; 4] = [State::Fails, State::NotJudged, State::Close, State::Holds];

    /// The word shown for it.
    pub fn word(self) -> &'static str {
        match self {
            State::Fails => "fails",
            State::NotJudged => "not judged",
            State::Close => "close",
            State::Holds => "holds",
        }
    }
}

/// Whether the demand may reach the limit from below or from above.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Sense {
    /// The demand must not exceed the limit.
    AtMost,
    /// The demand must not fall below the limit.
    AtLeast,
}

impl Sense {
    /// The words shown between demand and limit.
    pub fn words(self) -> &'static str {
        match self {
            Sense::AtMost => "at most",
            Sense::AtLeast => "at least",
        }
    }
}

/// How far one assumption of a method holds.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Reach {
    /// Well inside its range, or not used by the method.
    Inside,
    /// Near the edge of its range.
    Near,
    /// Outside; the verdict is then not judged.
    Outside,
}

/// One square of the trust strip.
#[derive(Clone, Debug, PartialEq)]
pub struct Trust {
    /// Rise time, steepness, depth to length, forcing period, roof or dry floor.
    pub name: &'static str,
    /// How far inside.
    pub reach: Reach,
    /// With the numbers.
    pub words: String,
}

/// One line of a worked formula.
#[derive(Clone, Debug, PartialEq)]
pub struct WorkLine {
    /// The formula in symbols; `_x` marks a subscript, `_{ab}` a longer one.
    pub symbols: String,
    /// The same with the numbers put in, units SI.
    pub numbers: String,
    /// The result.
    pub result: Measure,
}

/// One judged check of one load case.
#[derive(Clone, Debug, PartialEq)]
pub struct Verdict {
    /// Name of the criterion.
    pub criterion: &'static str,
    /// Its state.
    pub state: State,
    /// What is asked of the tank; none where not judged.
    pub demand: Option<Measure>,
    /// What the tank, or a record, allows.
    pub limit: Option<Measure>,
    /// Direction of the comparison.
    pub sense: Sense,
    /// Demand to limit, or limit to demand; none where not judged. Infinite where the limit is zero.
    pub utilisation: Option<f64>,
    /// Where it governs.
    pub place: Place,
    /// The place in words, with names: `hatch 1, right end`.
    pub place_words: String,
    /// The point on the section, where there is one.
    pub at: Option<Point>,
    /// Formulas with numbers put in.
    pub working: Vec<WorkLine>,
    /// What would make it hold, with the number: `To hold, fill 84.0 %`.
    pub mend: Vec<Phrase>,
    /// The source of the method.
    pub source: Source,
    /// The trust strip, always five.
    pub trust: Vec<Trust>,
    /// Why it was not judged, or a caution; may be empty.
    pub remark: String,
    /// Index of the requirement record that its limit rests on.
    pub record: Option<usize>,
    /// The same where that record is unconfirmed.
    pub unconfirmed_record: Option<usize>,
    /// The bound under which it is the worse; none where there is but one.
    pub bound: Option<Bound>,
    /// Where the size of effective gravity decides it: that over the largest one along the same direction under which it
    /// holds and is judged, under every bound.
    pub gravity_used: Option<f64>,
}

/// A check that does not apply, and why; never silently left out.
#[derive(Clone, Debug, PartialEq)]
pub struct Absent {
    /// Name of the criterion.
    pub criterion: &'static str,
    /// Where, in words.
    pub place_words: String,
    /// Why it does not apply, and what is judged instead.
    pub reason: Phrase,
}

/// Utilisation beyond which a verdict is close.
const CLOSE_ABOVE: f64 = 0.9;

/// Rounding of a utilisation: a brim that is exactly reached is not yet passed.
const UTILISATION_ROUNDING: f64 = 1e-9;

impl Verdict {
    /// From demand and limit. The demand is compared in `sense`.
    pub fn judged(
        criterion: &'static str,
        demand: Measure,
        limit: Measure,
        sense: Sense,
        trust: Vec<Trust>,
    ) -> Verdict {
        let (smaller, larger) = match sense {
            Sense::AtMost => (demand.si, limit.si),
            Sense::AtLeast => (limit.si, demand.si),
        };
        // Nothing is a share of zero or less: then the comparison alone decides.
        let utilisation = if larger > 0.0 {
            smaller.max(0.0) / larger
        } else if smaller <= larger {
            0.0
        } else {
            f64::INFINITY
        };
        let state = if utilisation > 1.0 + UTILISATION_ROUNDING {
            State::Fails
        } else if utilisation > CLOSE_ABOVE {
            State::Close
        } else {
            State::Holds
        };
        let (demand, limit, utilisation) = (Some(demand), Some(limit), Some(utilisation));
        Verdict { state, demand, limit, utilisation, ..Verdict::not_judged(criterion, sense, String::new(), trust) }
    }

    /// Not judged, and why.
    pub fn not_judged(criterion: &'static str, sense: Sense, reason: String, trust: Vec<Trust>) -> Verdict {
        Verdict {
            criterion,
            state: State::NotJudged,
            demand: None,
            limit: None,
            sense,
            utilisation: None,
            place: Place::Whole,
            place_words: "tank".to_owned(),
            at: None,
            working: Vec::new(),
            mend: Vec::new(),
            source: Source::RigidAcceleration,
            trust,
            remark: reason,
            record: None,
            unconfirmed_record: None,
            bound: None,
            gravity_used: None,
        }
    }

    /// The size of effective gravity over the largest one along the same direction under which it holds; infinite where none
    /// makes it hold.
    pub fn gravity_used(&self) -> f64 {
        match self.state {
            State::Fails | State::NotJudged => self.gravity_used.unwrap_or(f64::INFINITY),
            State::Close | State::Holds => self.gravity_used.unwrap_or(0.0),
        }
    }

    /// Worst first: state, then utilisation.
    pub fn order(&self, other: &Verdict) -> std::cmp::Ordering {
        let used = |v: &Verdict| v.utilisation.unwrap_or(0.0);
        self.state.cmp(&other.state).then(used(other).total_cmp(&used(self)))
    }
}
