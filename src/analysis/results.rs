//! What a judgement gives: every number that is shown to anyone comes from here.

use crate::geom::{Point, Vec2};
use crate::problem::{Place, Problem};
use crate::sources::Source;
use crate::units::Measure;

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
    pub mend: Vec<String>,
    /// The source of the method.
    pub source: Source,
    /// The trust strip, always five.
    pub trust: Vec<Trust>,
    /// Why it was not judged, or a caution; may be empty.
    pub remark: String,
    /// Index of an unconfirmed requirement record that it rests on.
    pub unconfirmed_record: Option<usize>,
}

/// A check that does not apply, and why; never silently left out.
#[derive(Clone, Debug, PartialEq)]
pub struct Absent {
    /// Name of the criterion.
    pub criterion: &'static str,
    /// Where, in words.
    pub place_words: String,
    /// Why it does not apply, and what is judged instead.
    pub reason: String,
}

/// Effective gravity of a load case: what the liquid feels, G = g(phi) - a.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EffectiveGravity {
    /// In the section's axes, m/s2.
    pub vec: Vec2,
    /// |G|, m/s2.
    pub magnitude: f64,
    /// Unit vector away from G, none in free fall.
    pub up: Option<Vec2>,
    /// Angle of the settled surface against the section's s axis, radians, counter-clockwise, within
    /// (-pi, pi]; beyond a quarter turn the liquid lies toward the roof. None in free fall.
    pub tilt_rad: Option<f64>,
    /// dz/ds of the surface; none where it is vertical, or in free fall.
    pub slope: Option<f64>,
}

/// One piece of a liquid surface inside the tank.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Chord {
    /// Its two ends; seen along effective gravity, `left` is on the left.
    pub left: Point,
    /// The right end.
    pub right: Point,
}

/// The load of the liquid on one edge, of the liquid on the tank.
#[derive(Clone, Debug, PartialEq)]
pub struct EdgeLoad {
    /// Which edge: [`Place::Edge`] or [`Place::Obstacle`].
    pub place: Place,
    /// Its name.
    pub name: String,
    /// Length that the liquid wets, m.
    pub wetted_length_m: f64,
    /// Resultant, N, along s and z.
    pub force_n: Vec2,
    /// Moment about the study's moment point, N m, counter-clockwise positive.
    pub moment_n_m: f64,
    /// A point on the line of action; none where the resultant is zero.
    pub acts_at: Option<Point>,
    /// Highest gage pressure on it, Pa, and where; none when dry.
    pub peak: Option<(f64, Point)>,
}

/// Pressure at a named point.
#[derive(Clone, Debug, PartialEq)]
pub struct PointPressure {
    /// Its name.
    pub name: String,
    /// Where.
    pub at: Point,
    /// Pa gage; the gas pressure where the point is dry.
    pub gage_pa: f64,
    /// Whether liquid covers it.
    pub wet: bool,
}

/// How the liquid presses on the shut roof.
#[derive(Clone, Debug, PartialEq)]
pub struct RoofContact {
    /// Length of roof that the liquid wets, m.
    pub wetted_length_m: f64,
    /// Highest gage pressure on the roof, Pa.
    pub peak_pa: f64,
    /// Where.
    pub at: Point,
    /// The edge.
    pub edge_idx: usize,
}

/// The settled state of a load case: one pool, one level.
#[derive(Clone, Debug, PartialEq)]
pub struct Settled {
    /// Liquid left in the tank, m3.
    pub volume_m3: f64,
    /// Liquid that left on the way, m3.
    pub spilled_m3: f64,
    /// Count of pools; one here.
    pub n_pools: usize,
    /// Level v = up . x of the surface, m.
    pub level_m: f64,
    /// z of the surface's line at s = 0, m; none where the surface is vertical.
    pub offset_m: Option<f64>,
    /// The surface pieces, from left to right.
    pub surface: Vec<Chord>,
    /// Centroid of the liquid.
    pub centroid: Point,
    /// Highest point of the liquid along the tank's z.
    pub highest_wetted: Point,
    /// Highest gage pressure on any wall, Pa.
    pub peak_pa: f64,
    /// Where.
    pub peak_at: Point,
    /// The edge or obstacle.
    pub peak_place: Place,
    /// Lowest absolute pressure in the liquid, Pa.
    pub lowest_abs_pa: f64,
    /// Loads on every edge of the outline, then on every edge of the obstacles.
    pub edges: Vec<EdgeLoad>,
    /// Load on the side walls that the width law shapes (zero for a constant width), N and N m.
    pub sides_force_n: Vec2,
    /// Moment of that load about the study's moment point, N m.
    pub sides_moment_n_m: f64,
    /// Sum of all loads: liquid mass times effective gravity, N.
    pub total_force_n: Vec2,
    /// Moment of the sum about the study's moment point, N m.
    pub total_moment_n_m: f64,
    /// Pressures at the named points.
    pub points: Vec<PointPressure>,
    /// Contact with the roof, if any.
    pub roof: Option<RoofContact>,
}

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
    /// Verdicts, worst first.
    pub verdicts: Vec<Verdict>,
    /// Checks that do not apply.
    pub absent: Vec<Absent>,
}

impl CaseResult {
    /// The worst verdict.
    pub fn worst(&self) -> Option<&Verdict> {
        self.verdicts.first()
    }
}

/// Results of a study.
#[derive(Clone, Debug, PartialEq)]
pub struct Results {
    /// Capacity of the section times its width, m3.
    pub capacity_m3: f64,
    /// The still tank.
    pub still: Still,
    /// One a load case, in the study's order.
    pub cases: Vec<CaseResult>,
    /// Full scale of the pressure tints, Pa: one nice number for all cases.
    pub pressure_scale_pa: f64,
    /// What the user should know of the input.
    pub warnings: Vec<Problem>,
}

impl Results {
    /// Count of verdicts in a state, over all cases.
    pub fn count(&self, state: State) -> usize {
        self.cases.iter().flat_map(|c| &c.verdicts).filter(|v| v.state == state).count()
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
            verdict_order(va, vb).then(a.cmp(&b))
        });
        order
    }
}

/// Worst first: state, then utilisation.
pub fn verdict_order(a: &Verdict, b: &Verdict) -> std::cmp::Ordering {
    a.state.cmp(&b.state).then(b.utilisation.unwrap_or(0.0).total_cmp(&a.utilisation.unwrap_or(0.0)))
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

/// The curves of one load case.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Curves {
    /// Tilt against acceleration.
    pub tilt: TiltCurve,
    /// Pressure along the wall.
    pub wall: WallCurve,
    /// Freeboard against fill.
    pub freeboard: FreeboardCurve,
}
