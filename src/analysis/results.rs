//! What a judgement gives: every number that is shown to anyone comes from here.

use crate::geom::{Point, Vec2};
use crate::problem::Problem;
use crate::units::Measure;

pub use crate::criteria::{
    Absent, CONTAINED, FREEBOARD, LAYOUT, Outcome, Reach, Sense, State, Trust, Verdict, WorkLine,
};
pub use crate::plates::{
    Cell, EndReaction, OutOfRange, PanelStrength, PlateResult, SolvedPanels, Span, Strength, Support, Weld,
};
pub use crate::statics::{
    Bound, Chord, EdgeLoad, EffectiveGravity, GasPocket, MouthSpill, PlateLoad, PointPressure, Pool, Pour,
    RoofContact, Route, Settled, Stretch,
};

/// The tank standing level and at rest, and the fill in every way of giving it.
#[derive(Clone, Debug, PartialEq)]
pub struct Still {
    /// Volume of liquid, m3.
    pub volume_m3: f64,
    /// Share of capacity.
    pub share: f64,
    /// z of the surface, m.
    pub level_z_m: f64,
    /// From the highest point of the outline down to the surface, m.
    pub ullage_m: f64,
    /// Depth: from the lowest point of the outline up to the surface, m.
    pub depth_m: f64,
    /// Mass, kg.
    pub mass_kg: f64,
    /// Surface pieces.
    pub surface: Vec<Chord>,
    /// Highest fill, as a share of capacity, that no judged load case spills; none where none could be judged.
    pub highest_share: Option<f64>,
}

/// One load case, judged.
#[derive(Clone, Debug, PartialEq)]
pub struct CaseResult {
    /// Its name.
    pub name: String,
    /// Effective gravity.
    pub gravity: EffectiveGravity,
    /// The acceleration of the tank, m/s2.
    pub accel: Vec2,
    /// The settled state, or why there is none.
    pub settled: Result<Settled, String>,
    /// The state with openings shut; none where no plate has an opening.
    pub sealed: Option<Result<Settled, String>>,
    /// After the release back to rest, where the case asks for it; under the settled bound.
    pub released: Option<Result<Settled, String>>,
    /// What stays trapped behind sills after the release; empty where nothing does.
    pub trapped: Vec<Trapped>,
    /// How the liquid comes to it, under each bound.
    pub routes: Vec<(Bound, Route)>,
    /// What went over sills on the way, under the settled bound.
    pub pours: Vec<Pour>,
    /// From the sealed to the settled bound, in time, or why that was not worked out; none where they do not differ.
    pub transfer: Option<Result<Transfer, String>>,
    /// What the plates bear, one a plate and bound, the settled bound first.
    pub plates: Vec<PlateResult>,
    /// Verdicts, worst first.
    pub verdicts: Vec<Verdict>,
    /// Checks that do not apply.
    pub absent: Vec<Absent>,
}

impl CaseResult {
    /// The state under a bound, or why there is none.
    pub fn state(&self, bound: Bound) -> Option<&Result<Settled, String>> {
        match bound {
            Bound::Settled => Some(&self.settled),
            Bound::Sealed => self.sealed.as_ref(),
        }
    }

    /// The states that there are, with their bounds.
    pub fn states(&self) -> impl Iterator<Item = (Bound, &Settled)> {
        let state = |bound| Some((bound, self.state(bound)?.as_ref().ok()?));
        [Bound::Settled, Bound::Sealed].into_iter().filter_map(state)
    }

    /// The worst verdict.
    pub fn worst(&self) -> Option<&Verdict> {
        self.verdicts.first()
    }
}

/// A tight part of the section.
#[derive(Clone, Debug, PartialEq)]
pub struct Compartment {
    /// As shown.
    pub name: String,
    /// Its entry in the study, where it has a fill of its own.
    pub own_idx: Option<usize>,
}

/// Liquid that a cell holds after a release beyond what it held at rest before.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Trapped {
    /// Which cell.
    pub cell_idx: usize,
    /// How much more, m3.
    pub volume_m3: f64,
}

/// The largest load of a kind that a plate carries, and in which load case.
#[derive(Clone, Debug, PartialEq)]
pub struct PlatePeak {
    /// Which plate.
    pub plate_idx: usize,
    /// `net load`, `net pressure`, `weld force`, `weld moment`.
    pub name: &'static str,
    /// Signed like the load of a plate: positive toward the right-hand side.
    pub load: Measure,
    /// Where it acts; of a weld, the end that it holds.
    pub at: Option<Point>,
    /// In which load case.
    pub case_idx: usize,
    /// Under which bound.
    pub bound: Bound,
}

/// How long liquid takes from the sealed state of a case through the openings, until all levels are even.
#[derive(Clone, Debug, PartialEq)]
pub struct Transfer {
    /// How much changes places, or leaves, m3.
    pub moved_m3: f64,
    /// How much of it leaves by mouths, m3.
    pub left_m3: f64,
    /// Time until half of it has, s.
    pub half_s: f64,
    /// Time until 95 % of it has, s.
    pub nearly_all_s: f64,
    /// Time until all of it has, s; none where the last of it runs ever more slowly.
    pub end_s: Option<f64>,
    /// How long the case lasts, from the start of its onset to the end of its duration, s; none: held for long.
    pub lasts_s: Option<f64>,
    /// Share of what moves that has moved by then.
    pub moved_share: f64,
    /// The bound that is near: settled from 95 % on, sealed up to 5 %, none between.
    pub near: Option<Bound>,
    /// The same in a sentence.
    pub words: String,
}

/// Results of a study.
#[derive(Clone, Debug, PartialEq)]
pub struct Results {
    /// Capacity of the section times its width, m3.
    pub capacity_m3: f64,
    /// The still tank.
    pub still: Still,
    /// The cells between walls and plates.
    pub cells: Vec<Cell>,
    /// The compartments: cells that openings join.
    pub compartments: Vec<Compartment>,
    /// The layout of plates, judged once for the tank standing level and at rest; worst first.
    pub layout: Outcome,
    /// The largest loads of every plate over all load cases and bounds.
    pub plate_peaks: Vec<PlatePeak>,
    /// One a load case, in the study's order.
    pub cases: Vec<CaseResult>,
    /// Full scale of the pressure tints, Pa: one nice number for all cases.
    pub pressure_scale_pa: f64,
    /// What the user should know of the input.
    pub warnings: Vec<Problem>,
}

impl Results {
    /// Count of verdicts in a state, of the layout and over all cases.
    pub fn count(&self, state: State) -> usize {
        let of_cases = self.cases.iter().flat_map(|c| &c.verdicts);
        self.layout.verdicts.iter().chain(of_cases).filter(|v| v.state == state).count()
    }

    /// Indices (case, verdict) of all verdicts, worst first.
    pub fn ranked(&self) -> Vec<(usize, usize)> {
        let mut order: Vec<(usize, usize)> = self
            .cases
            .iter()
            .enumerate()
            .flat_map(|(c, case)| (0..case.verdicts.len()).map(move |v| (c, v)))
            .collect();
        order.sort_by(|&a, &b| {
            let (va, vb) = (&self.cases[a.0].verdicts[a.1], &self.cases[b.0].verdicts[b.1]);
            va.order(vb).then(a.cmp(&b))
        });
        order
    }
}

/// A point on a curve: abscissa and ordinate, SI.
pub type CurvePoint = [f64; 2];

/// Surface tilt against the size of a case's acceleration, along its own direction.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct TiltCurve {
    /// (multiple of the case's acceleration as m/s2 along its direction, tilt in radians).
    pub points: Vec<CurvePoint>,
    /// The case itself.
    pub now: Option<CurvePoint>,
    /// Other cases whose acceleration lies along the same line: (case index, point).
    pub others: Vec<(usize, CurvePoint)>,
    /// Signed acceleration at first spill, m/s2, where it spills within the range.
    pub spills_at: Option<f64>,
    /// `sideways`, `lengthwise`, `along the case`: the words for the axis.
    pub axis_words: &'static str,
}

/// Gage pressure along the developed perimeter of the outline, from the start of its first edge.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct WallCurve {
    /// (arc length m, Pa gage) under the case; zero where dry.
    pub points: Vec<CurvePoint>,
    /// The same at rest.
    pub at_rest: Vec<CurvePoint>,
    /// Highest pressure.
    pub peak: Option<CurvePoint>,
    /// Where each edge starts, m, and its name.
    pub edges: Vec<(f64, String)>,
}

/// Required and available freeboard at the governing mouth against fill.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct FreeboardCurve {
    /// (share of capacity, required m).
    pub required: Vec<CurvePoint>,
    /// (share of capacity, available m).
    pub available: Vec<CurvePoint>,
    /// Present fill: (share, required).
    pub now: Option<CurvePoint>,
    /// Highest share at which it holds, and the freeboard there.
    pub holds_to: Option<CurvePoint>,
    /// Name of the mouth.
    pub mouth: String,
    /// Why there is no curve.
    pub absent: Option<String>,
}

/// The quick curves of one load case.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Curves {
    /// Tilt against acceleration.
    pub tilt: TiltCurve,
    /// Pressure along the wall.
    pub wall: WallCurve,
}
