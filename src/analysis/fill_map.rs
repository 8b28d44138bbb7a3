//! The fill map: the worst verdict for every fill and every size of a case's acceleration along its own direction.
//!
//! Only the direction of effective gravity moves liquid, and all sizes along one direction turn it the same way: a fill is
//! followed once, and looked at on the way at every size.

use rayon::prelude::*;

use crate::cases::{Accel, AccelUnit, LoadCase};
use crate::geom::Vec2;
use crate::plates::Bearer;
use crate::progress::Progress;
use crate::statics::{Followed, Route};
use crate::study::ValidStudy;

use super::results::{Bound, SolvedPanels, State, Verdict};
use super::rims::{SharedRims, risen_z_m, risen_z_m_on};
use super::sight::{Ground, Sight, Sighted, StillSurface};
use super::ways;

/// How many fills make a fill map that shows every percent.
pub const N_FILLS: usize = 101;

/// How many accelerations go with them.
pub const N_ACCELS: usize = 100;

/// What a fill map shows beyond the case, as a multiple of its acceleration.
const REACH: f64 = 1.5;

/// Worst verdicts over fill and acceleration.
#[derive(Clone, Debug, PartialEq)]
pub struct FillMap {
    /// The load case.
    pub case_idx: usize,
    /// The way that its acceleration points: a unit vector.
    pub direction: Vec2,
    /// Size of its acceleration, m/s2.
    pub case_m_per_s2: f64,
    /// Fills, as shares of the common capacity, from empty to full.
    pub shares: Vec<f64>,
    /// Sizes of the acceleration, m/s2, in even steps from zero, which is left out, to beyond the case.
    pub accels_m_per_s2: Vec<f64>,
    /// One a fill and acceleration, all accelerations of the first fill first; none where not worked out yet.
    pub points: Vec<Option<MapPoint>>,
}

/// The worst verdict at one fill and acceleration.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MapPoint {
    /// Its state.
    pub state: State,
    /// Its utilisation; none where not judged.
    pub utilisation: Option<f64>,
    /// Its criterion.
    pub criterion: &'static str,
    /// The bound under which it is the worse, where there are two.
    pub bound: Option<Bound>,
}

impl FillMap {
    /// The point at a fill and an acceleration, by their places in the lists.
    pub fn point(&self, fill_idx: usize, accel_idx: usize) -> Option<&MapPoint> {
        self.points[fill_idx * self.accels_m_per_s2.len() + accel_idx].as_ref()
    }

    /// An acceleration with its direction, m/s2.
    pub fn accel(&self, accel_idx: usize) -> Vec2 {
        self.direction * self.accels_m_per_s2[accel_idx]
    }
}

/// The common fill of a study as a share of the common capacity: where it stands on its fill maps.
pub fn common_share(study: &ValidStudy) -> Option<f64> {
    study.common().map(|start| start.volume_m3 / start.vessel.capacity_m3())
}

/// Why a load case has no fill map.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
pub enum NoFillMap {
    /// It has no acceleration to make larger.
    #[error("the load case has no acceleration to make larger")]
    AtRest,
    /// Every compartment has a fill of its own.
    #[error("every compartment has a fill of its own: there is no common fill to change")]
    NoCommonFill,
    /// There is no such case.
    #[error("there is no such load case")]
    NoCase,
    /// It was asked to end.
    #[error("it was stopped")]
    Stopped,
}

/// The fill map of a load case, `n_fills` by `n_accels` points (at least two each). First on a coarse grid, then on finer
/// ones; each goes to `sink`, the last one is given. Bit for bit the same on any count of threads.
pub fn fill_map(
    study: &ValidStudy,
    case_idx: usize,
    n_fills: usize,
    n_accels: usize,
    progress: &Progress,
    sink: &dyn Fn(&FillMap),
) -> Result<FillMap, NoFillMap> {
    let case = study.study().cases.get(case_idx).ok_or(NoFillMap::NoCase)?;
    let accel = case.accel.to_m_per_s2(study.study().gravity_m_per_s2);
    study.common().ok_or(NoFillMap::NoCommonFill)?;
    let size = accel.norm();
    if size == 0.0 {
        return Err(NoFillMap::AtRest);
    }
    let (n_fills, n_accels) = (n_fills.max(2), n_accels.max(2));
    let share = |i: usize, n: usize| i as f64 / n as f64;
    let mut map = FillMap {
        case_idx,
        direction: accel / size,
        case_m_per_s2: size,
        shares: (0..n_fills).map(|i| share(i, n_fills - 1)).collect(),
        accels_m_per_s2: (1..=n_accels).map(|j| REACH * size * share(j, n_accels)).collect(),
        points: vec![None; n_fills * n_accels],
    };
    let rows = Rows::new(study, case, &map);
    progress.begin(map.points.len());
    for stride in STRIDES {
        let is_on = |i: usize, n: usize| i.is_multiple_of(stride) || i + 1 == n;
        let wanted: Vec<(usize, Vec<usize>)> = (0..n_fills)
            .filter(|&i| is_on(i, n_fills))
            .map(|i| (i, (0..n_accels).filter(|&j| is_on(j, n_accels) && map.point(i, j).is_none()).collect()))
            .filter(|(_, accel_idxs): &(usize, Vec<usize>)| !accel_idxs.is_empty())
            .collect();
        let found: Option<Vec<Vec<MapPoint>>> = wanted
            .par_iter()
            .map(|(i, accel_idxs)| {
                if progress.is_stopped() {
                    return None;
                }
                let points = rows.row(map.shares[*i], accel_idxs);
                progress.advance(points.len());
                Some(points)
            })
            .collect();
        for ((i, accel_idxs), points) in wanted.iter().zip(found.ok_or(NoFillMap::Stopped)?) {
            for (j, point) in accel_idxs.iter().zip(points) {
                map.points[i * n_accels + j] = Some(point);
            }
        }
        sink(&map);
    }
    Ok(map)
}

/// Every eighth line of the grid first, then those between.
const STRIDES: [usize; 4] = [8, 4, 2, 1];

/// What all fills share.
struct Rows<'a> {
    study: &'a ValidStudy,
    cases: Vec<LoadCase>,
    bearers: Vec<Bearer<'a>>,
    /// For each bound.
    rims: Vec<SharedRims>,
}

impl<'a> Rows<'a> {
    fn new(study: &'a ValidStudy, case: &LoadCase, map: &FillMap) -> Rows<'a> {
        let with_size = |size: &f64| {
            let accel = map.direction * *size;
            let accel = Accel::Components { a_s: accel.x, a_z: accel.y, unit: AccelUnit::MPerS2 };
            LoadCase { accel, release: false, ..case.clone() }
        };
        let cases: Vec<LoadCase> = map.accels_m_per_s2.iter().map(with_size).collect();
        let ups: Vec<Vec2> = cases.iter().filter_map(|case| ways::start_of(study, case).gravity.up).collect();
        let shared = |bound: &Bound| SharedRims::new(study, *bound, ups.iter().copied());
        let rims = ways::bounds(study).iter().map(shared).collect();
        Rows { study, cases, bearers: super::bearers(study, &mut SolvedPanels::default()), rims }
    }

    /// The worst verdicts of one fill.
    fn row(&self, share: f64, accel_idxs: &[usize]) -> Vec<MapPoint> {
        let capacity_m3 = self.study.common().map_or(0.0, |start| start.vessel.capacity_m3());
        let cases = accel_idxs.iter().map(|&j| self.cases[j].clone()).collect();
        let study = &self.study.with(share * capacity_m3, cases);
        let ground = Ground { study, still: StillSurface::of(study), bearers: &self.bearers };
        let courses = ways::courses(study);
        let bounds = ways::bounds(study);
        let holders: Vec<_> = bounds.iter().map(|&bound| ways::holder(study, bound)).collect();
        let followed: Vec<Option<Followed>> = (0..bounds.len())
            .map(|b| {
                let mut turns = courses.iter().filter_map(|course| match super::route(course, b) {
                    Route::Turned(turn, turned) => Some((turn, turned)),
                    Route::One => None,
                });
                let (turn, first) = turns.next()?;
                let at: Vec<f64> = std::iter::once(first).chain(turns.map(|(_, turned)| turned)).collect();
                self.rims[b].followed(study, turn, &at)
            })
            .collect();
        let judge = |(case, course): (&LoadCase, &ways::Course)| {
            let sights: Vec<Sight> = (0..bounds.len())
                .map(|b| {
                    let settled = super::settle_case(study, &holders[b], course, b, false);
                    let route = super::route(course, b);
                    let rims = course.gravity.up.and_then(|up| self.rims[b].seen(study, up));
                    let risen_z_m = rims.as_ref().map_or(Vec::new(), |rims| match (route, &followed[b]) {
                        (Route::Turned(turn, turned), Some(on)) if on.turn == turn && on.reaches(turned) => {
                            risen_z_m_on(on, rims, turned)
                        }
                        _ => risen_z_m(study, rims, route),
                    });
                    Sight { rims, risen_z_m, route, ..Sight::without_rims(&ground, course, b, settled) }
                })
                .collect();
            let sighted = Sighted { ground: &ground, case, course, sights: &sights };
            MapPoint::of(&sighted.judge_briefly(|_| true).verdicts)
        };
        study.study().cases.iter().zip(&courses).map(judge).collect()
    }
}

impl MapPoint {
    fn of(verdicts: &[Verdict]) -> MapPoint {
        match verdicts.first() {
            Some(worst) => MapPoint {
                state: worst.state,
                utilisation: worst.utilisation,
                criterion: worst.criterion,
                bound: worst.bound,
            },
            None => MapPoint { state: State::NotJudged, utilisation: None, criterion: "", bound: None },
        }
    }
}
