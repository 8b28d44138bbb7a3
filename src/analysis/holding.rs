//! What holds from one attitude at rest, for any acceleration.
//!
//! An acceleration a leaves G = G0 - a. Along a straight line of accelerations the direction of G turns one way, and all
//! lines that turn it to the same side run through the same directions: the liquid is followed once to either side. What
//! rests on the direction alone then ends at one turn of it, for all of them; what rests on the size of G too ends, in
//! every direction, at a size. DEVELOPERS.md derives it under "Hold envelope".

use std::f64::consts::{PI, TAU};

use crate::cases::{Accel, Attitude, LoadCase};
use crate::criteria::RestsOn;
use crate::geom::{Vec2, cross};
use crate::num::root_between;
use crate::plates::Bearer;
use crate::progress::Progress;
use crate::statics::{EffectiveGravity, effective_gravity};
use crate::study::ValidStudy;

use super::results::{Bound, SolvedPanels, State, Verdict};
use super::side::{Mark, Side};
use super::sight::{Ground, Sight, Sighted, StillSurface};
use super::ways::Course;

/// What holds from one attitude at rest.
pub struct Holding<'a> {
    base: Base<'a>,
    /// To the sides on which the surface's tilt falls, and grows.
    sides: [Side<'a>; 2],
    at_rest: Option<End>,
    always: Option<End>,
}

/// Where the accelerations that hold end in one direction.
#[derive(Clone, Debug, PartialEq)]
pub struct HoldLimit {
    /// The acceleration's direction: a unit vector.
    pub direction: Vec2,
    /// The largest acceleration up to which everything holds, m/s2.
    pub accel_m_per_s2: f64,
    /// What ends it there.
    pub end: End,
    /// The acceleration at which liquid first leaves, m/s2; none where it never does.
    pub spill_m_per_s2: Option<f64>,
}

impl HoldLimit {
    /// The largest acceleration, m/s2.
    pub fn accel(&self) -> Vec2 {
        self.direction * self.accel_m_per_s2
    }

    /// The direction, counter-clockwise from +s, radians, 0 to a full turn.
    pub fn direction_rad(&self) -> f64 {
        self.direction.y.atan2(self.direction.x).rem_euclid(TAU)
    }
}

/// What ends the accelerations that hold.
#[derive(Clone, Debug, PartialEq)]
pub enum End {
    /// A criterion fails beyond.
    Fails {
        /// Which one.
        criterion: &'static str,
        /// Under which bound, where there are two.
        bound: Option<Bound>,
    },
    /// Beyond, it is not judged.
    NotJudged {
        /// Why.
        reason: String,
    },
    /// Nothing up to the largest acceleration looked at.
    Beyond,
}

impl End {
    /// For reading: the criterion, `not judged`, or `beyond`.
    pub fn word(&self) -> &str {
        match self {
            End::Fails { criterion, .. } => criterion,
            End::NotJudged { .. } => State::NotJudged.word(),
            End::Beyond => "beyond",
        }
    }

    /// What the worst of some verdicts ends; nothing where it holds.
    pub(super) fn of(judged: &Judged) -> Option<End> {
        let worst = match judged {
            Ok(verdicts) => verdicts.first()?,
            Err(reason) => return Some(End::NotJudged { reason: reason.clone() }),
        };
        match worst.state {
            State::Fails => Some(End::Fails { criterion: worst.criterion, bound: worst.bound }),
            State::NotJudged => Some(End::NotJudged { reason: worst.remark.clone() }),
            State::Close | State::Holds => None,
        }
    }
}

impl<'a> Holding<'a> {
    /// For accelerations of up to `most_m_per_s2` of a tank that stands at rest in an attitude. None where it was asked to
    /// end.
    pub fn new(
        study: &'a ValidStudy,
        attitude: Attitude,
        most_m_per_s2: f64,
        progress: &'a Progress,
    ) -> Option<Holding<'a>> {
        let base = Base::new(study, attitude, most_m_per_s2, progress);
        let (left, right) = rayon::join(|| Side::new(&base, false), || Side::new(&base, true));
        let sides = [left, right];
        let always = sides[0].judge_at_rest(&base, RestsOn::Study);
        let by_direction = sides.iter().find_map(|side| side.at_rest.clone());
        let at_rest = by_direction.or_else(|| sides[0].judge_at_rest(&base, RestsOn::Size));
        (!progress.is_stopped()).then_some(Holding { base, sides, at_rest, always })
    }

    /// Effective gravity at rest, m/s2.
    pub fn rest_gravity(&self) -> Vec2 {
        self.base.rest
    }

    /// What keeps it from holding at rest already.
    pub fn at_rest(&self) -> Option<&End> {
        self.at_rest.as_ref()
    }

    /// What keeps every case from holding, whatever its acceleration; the limits leave it out.
    pub fn always(&self) -> Option<&End> {
        self.always.as_ref()
    }

    /// The limit along a direction, a unit vector: the first acceleration on the way from rest beyond which something
    /// does not hold. Accurate to rounding, as far as no criterion fails and holds again within a degree of the turn.
    pub fn limit(&self, direction: Vec2) -> HoldLimit {
        let ray = Ray::new(self.base.rest, direction);
        let side = &self.sides[usize::from(ray.grows)];
        let spill = side.spills_at.map(|turned| ray.accel_at(turned)).filter(|accel| accel.is_finite());
        let ends = |accel_m_per_s2, end| HoldLimit { direction, accel_m_per_s2, end, spill_m_per_s2: spill };
        if let Some(end) = &self.at_rest {
            return ends(0.0, end.clone());
        }
        let (mut top, mut end) = (self.base.most_m_per_s2, End::Beyond);
        if ray.meets_free_fall() {
            let reason = "free fall: there is no settled surface".to_owned();
            (top, end) = (top.min(ray.rest), End::NotJudged { reason });
        } else if ray.turns() && ray.accel_at(side.end.0) <= top {
            (top, end) = (ray.accel_at(side.end.0), side.end.1.clone());
        }
        match self.bracket(side, &ray, top) {
            None => ends(top, end),
            Some([low, high]) => {
                let tolerance = 1e-13 * (high.0 + 1e-3 * ray.rest);
                let accel = root_between(low, high, tolerance, |accel| self.excess(side, &ray, accel));
                // A limit that is reached is not yet passed: a hair further on it is.
                let beyond = [1e-9, 1e-8, 1e-7, 1e-6].map(|hair| (accel + hair * (accel + ray.rest)).min(high.0));
                let found =
                    beyond.into_iter().chain([high.0]).find_map(|accel| End::of(&self.by_size(side, &ray, accel)));
                ends(accel, found.unwrap_or(End::Beyond))
            }
        }
    }

    /// Two accelerations up to `top` between which what rests on the size of G stops holding, with its excess there.
    fn bracket(&self, side: &Side, ray: &Ray, top: f64) -> Option<[(f64, f64); 2]> {
        let at = |mark: &Mark, accel: f64| (accel, over(mark.gravity_used(ray.gravity_at(accel))));
        let mut low = at(side.marks.first()?, 0.0);
        for mark in side.marks.iter().skip(1) {
            let accel = ray.accel_at(mark.turned);
            if accel > top {
                break;
            }
            let high = at(mark, accel);
            if high.1 > 0.0 {
                return Some([low, high]);
            }
            low = high;
        }
        let far = ray.rest + self.base.most_m_per_s2;
        let is_open = side.marks.iter().any(|mark| mark.least > 0.0 || mark.most < far);
        if top <= low.0 || !is_open {
            return None;
        }
        let high = (top, self.excess(side, ray, top));
        (high.1 > 0.0).then_some([low, high])
    }

    /// By how much what rests on the size of G is used beyond what holds.
    fn excess(&self, side: &Side, ray: &Ray, accel: f64) -> f64 {
        over(gravity_used(&self.by_size(side, ray, accel)))
    }

    fn by_size(&self, side: &Side, ray: &Ray, accel: f64) -> Judged {
        side.judge(&self.base, ray.direction * accel, RestsOn::Size)
    }
}

/// Verdicts of some criteria, or why nothing can be judged.
pub(super) type Judged = Result<Vec<Verdict>, String>;

/// By how much the worst of some verdicts is used beyond its limit; above zero too where it is not judged.
pub(super) fn excess(judged: &Judged) -> f64 {
    let Ok(verdicts) = judged else { return 1.0 };
    let of = |v: &Verdict| match (v.state, v.utilisation) {
        (State::NotJudged, _) | (_, None) => 1.0,
        (State::Fails, Some(used)) => (used - 1.0).min(1e6),
        (_, Some(used)) => (used - 1.0).min(0.0),
    };
    verdicts.iter().map(of).fold(-1.0, f64::max)
}

/// By how much more than all is used; infinite is a great deal.
fn over(used: f64) -> f64 {
    used.min(1e6) - 1.0
}

/// The size of G over the largest one along its direction under which all of some verdicts hold.
pub(super) fn gravity_used(judged: &Judged) -> f64 {
    let Ok(verdicts) = judged else { return f64::INFINITY };
    verdicts.iter().map(Verdict::gravity_used).fold(0.0, f64::max)
}

/// What both sides share.
pub(super) struct Base<'a> {
    pub study: &'a ValidStudy,
    /// At rest in the attitude.
    pub case: LoadCase,
    /// Effective gravity there, m/s2.
    pub rest: Vec2,
    pub most_m_per_s2: f64,
    still: StillSurface,
    bearers: Vec<Bearer<'a>>,
    /// Once stopped, what is worked out means nothing.
    pub progress: &'a Progress,
}

impl<'a> Base<'a> {
    fn new(study: &'a ValidStudy, attitude: Attitude, most_m_per_s2: f64, progress: &'a Progress) -> Base<'a> {
        let case = LoadCase {
            name: String::new(),
            accel: Accel::REST,
            attitude,
            onset_s: None,
            duration_s: None,
            release: false,
            source: String::new(),
            note: String::new(),
        };
        let rest = effective_gravity(study.study().gravity_m_per_s2, attitude.angle_rad(), Vec2::zeros()).vec;
        let (still, bearers) = (StillSurface::of(study), super::bearers(study, &mut SolvedPanels::default()));
        Base { study, case, rest, most_m_per_s2, still, bearers, progress }
    }

    pub fn gravity(&self, accel: Vec2) -> EffectiveGravity {
        effective_gravity(self.study.study().gravity_m_per_s2, self.case.attitude.angle_rad(), accel)
    }

    /// Judges the criteria of one kind, or says why nothing can be judged.
    pub fn judge(&self, course: &Course, sights: &[Sight], rests_on: RestsOn) -> Judged {
        if let Some(reason) = sights.iter().find_map(|sight| sight.blocked.clone()) {
            return Err(reason);
        }
        let ground = self.ground();
        let sighted = Sighted { ground: &ground, case: &self.case, course, sights };
        Ok(sighted.judge_briefly(|kind| kind == rests_on).verdicts)
    }

    pub fn ground(&self) -> Ground<'_> {
        Ground { study: self.study, still: self.still, bearers: &self.bearers }
    }
}

/// Accelerations along one direction from rest: a triangle of G0, G and a, with the turn of G at its far corner.
struct Ray {
    direction: Vec2,
    /// |G0|, m/s2.
    rest: f64,
    /// Angle from G0 to the way in which G moves, 0 to pi.
    alpha: f64,
    grows: bool,
}

impl Ray {
    fn new(rest: Vec2, direction: Vec2) -> Ray {
        let way = -direction;
        let across = cross(rest, way);
        Ray { direction, rest: rest.norm(), alpha: across.abs().atan2(rest.dot(&way)), grows: across >= 0.0 }
    }

    /// The acceleration at which the direction of G has turned that far: by the law of sines,
    /// a / sin(turned) = |G0| / sin(alpha - turned). Infinite where that is only approached.
    fn accel_at(&self, turned: f64) -> f64 {
        if turned <= 0.0 {
            return 0.0;
        }
        if turned >= self.alpha || !self.turns() {
            return f64::INFINITY;
        }
        self.rest * turned.sin() / (self.alpha - turned).sin()
    }

    /// Straight along gravity the direction of G stays.
    fn turns(&self) -> bool {
        self.alpha > 1e-12 && !self.meets_free_fall()
    }

    /// Straight down: G vanishes on the way.
    fn meets_free_fall(&self) -> bool {
        self.alpha >= PI - 1e-12
    }

    /// |G| at an acceleration.
    fn gravity_at(&self, accel: f64) -> f64 {
        (self.rest + accel * self.alpha.cos()).hypot(accel * self.alpha.sin())
    }
}
