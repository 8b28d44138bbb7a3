//! The one facade: a valid study in, results out. Pure: no files, no clock, no screen.

mod cells;
mod compartments;
mod curves;
mod envelope;
mod fill_map;
mod holding;
mod results;
mod rims;
mod side;
mod sight;
mod transfer;
mod ways;
mod worst;

use rayon::prelude::*;

use crate::cases::LoadCase;
use crate::criteria::{self, Standing};
use crate::geom::{Point, Vec2};
use crate::plates::{Bearer, dividers};
use crate::section::{Placed, Plate};
use crate::statics::{Body, Holder, Setting, Stop, pressure_at, settle, spills};
use crate::study::ValidStudy;
use crate::units::{Measure, Quantity, number};

use sight::{Ground, Sight, Sighted, StillSurface};
use ways::Course;

pub use curves::{curves, freeboard_curve};
pub use envelope::{Envelope, N_DIRECTIONS, envelope, largest_looked_at};
pub use fill_map::{FillMap, MapPoint, N_ACCELS, N_FILLS, NoFillMap, common_share, fill_map};
pub use holding::{End, HoldLimit, Holding};
pub use results::*;

/// Judges every load case.
pub fn run(study: &ValidStudy) -> Results {
    run_again(study, &mut SolvedPanels::default())
}

/// The same, sooner where an earlier run has solved panels of the same plates; those are kept that this one needs.
pub fn run_again(study: &ValidStudy, panels: &mut SolvedPanels) -> Results {
    let inputs = study.study();
    let still_tilted = study.tilted(Vec2::y());
    let volume = study.fill_volume_m3();
    let common = study.common();
    let level = still_level_m(study);
    let (bottom, top) = still_tilted.span();
    let surface = surface_at_rest(study);
    let still_surface = StillSurface { z_m: level, length_m: length_m(surface.iter()) };
    let courses = ways::courses(study);
    let bearers = bearers(study, panels);
    let ground = Ground { study, still: still_surface, bearers: &bearers };
    let judged: Vec<(CaseResult, Option<f64>)> =
        inputs.cases.par_iter().zip(&courses).map(|(case, course)| judge_case(&ground, case, course)).collect();
    let holds = judged.iter().filter_map(|(_, holds)| *holds).reduce(f64::min);
    let cases: Vec<CaseResult> = judged.into_iter().map(|(case, _)| case).collect();
    let rest_pa = inputs.liquid.weight_pa_per_m(inputs.gravity_m_per_s2) * (level - bottom);
    let highest_pa =
        cases.iter().flat_map(|c| c.states()).map(|(_, s)| s.peak_pa - inputs.ullage_gage_pa).fold(rest_pa, f64::max);
    let capacity_m3 = study.capacity_m3();
    let cells = cells::still(study);
    let dividers = dividers(&inputs.section, study.region());
    let layout = criteria::judge_layout(&Standing { study, cells: &cells, dividers });
    let common_capacity = common.map_or(capacity_m3, |start| start.vessel.capacity_m3());
    Results {
        capacity_m3,
        still: Still {
            volume_m3: volume,
            share: volume / capacity_m3,
            level_z_m: level,
            ullage_m: top - level,
            depth_m: level - bottom,
            mass_kg: study
                .starts()
                .iter()
                .map(|s| s.volume_m3 * study.liquid_of(s.compartments[0]).density_kg_per_m3)
                .sum(),
            surface,
            highest_share: holds.map(|v| v.min(common_capacity) / common_capacity),
        },
        plate_peaks: worst::plate_peaks(inputs.section.plates.len(), &cases),
        cells,
        compartments: compartments::compartments(study),
        layout,
        cases,
        pressure_scale_pa: nice_scale(highest_pa),
        warnings: study.warnings().to_vec(),
    }
}

/// Level of the common fill at rest, or else of all liquid, m.
fn still_level_m(study: &ValidStudy) -> f64 {
    match study.common() {
        Some(start) => start.vessel.tilted(Vec2::y()).level_for_volume(start.volume_m3),
        None => study.tilted(Vec2::y()).level_for_volume(study.fill_volume_m3()),
    }
}

/// Surface of the still liquid, level and at rest, plates cutting it.
fn surface_at_rest(study: &ValidStudy) -> Vec<Chord> {
    let holder = ways::holder(study, Bound::Sealed);
    let look = holder.look(Vec2::y());
    let bodies = holder.still(&look);
    let surface = |b: &Body| look.basins.surface(b.basin, look.level_of(b));
    bodies.iter().flat_map(surface).map(|(left, right)| Chord { left, right }).collect()
}

/// Gage pressure at a place in the liquid of a load case under a bound, gas included; none outside the liquid.
pub fn gage_pressure_at(study: &ValidStudy, case: &CaseResult, bound: Bound, p: Point) -> Option<Measure> {
    let state = case.state(bound)?.as_ref().ok()?;
    let up = case.gravity.up?;
    // The pool whose part of the section holds the place: the one that it is connected with.
    let look = ways::holder(study, bound).look(up);
    let basin = look.basins.basin_at(p)?;
    let holds = |pool: &&Pool| {
        let own = look.basins.basin_at(pool.deepest + up * (1e-6 * study.region().diagonal_m()));
        own.is_some_and(|own| {
            let join = look.basins.join(&[own, basin]);
            join.is_some_and(|j| look.basins.all()[j].bottom < pool.level_m)
        })
    };
    let pool = state.pools.iter().find(holds)?;
    let liquid_pa = pressure_at(p, pool.level_m, up, pool.weight_pa_per_m);
    (liquid_pa >= 0.0).then(|| Measure::new(Quantity::GagePressure, study.study().ullage_gage_pa + liquid_pa))
}

/// The load case, judged, and the volume that its way holds, where that could be judged.
fn judge_case(ground: &Ground, case: &LoadCase, course: &Course) -> (CaseResult, Option<f64>) {
    let study = ground.study;
    let gravity = course.gravity;
    let bounds = ways::bounds(study);
    let sights: Vec<Sight> = (0..bounds.len()).map(|b| Sight::of_course(ground, course, b)).collect();
    let holds: Vec<Option<f64>> =
        sights.iter().enumerate().map(|(b, sight)| holds(study, course, b, &sight.blocked)).collect();
    let sighted = Sighted { ground, case, course, sights: &sights };
    let Outcome { verdicts, absent } = sighted.judge(&|b| holds[b]);
    let holds = holds.into_iter().flatten().reduce(f64::min);
    let released = case.release.then(|| settle_released(study, course));
    let trapped = match (&released, course.ramp) {
        (Some(Ok(released)), Some(ramp)) => compartments::trapped(study, &ramp, released),
        _ => Vec::new(),
    };
    let pours = course.ways.first().and_then(|w| w.as_ref()).and_then(|w| w.stop.as_ref());
    let pours = pours.map_or(Vec::new(), |stop| stop.pours.clone());
    let has_gas = sights.iter().any(|sight| sight.settled.as_ref().is_ok_and(|settled| !settled.gas.is_empty()));
    let transfer = transfer::transfer(study, case, course, has_gas);
    let (states, plates): (Vec<_>, Vec<_>) = sights.into_iter().map(|sight| (sight.settled, sight.plates)).unzip();
    let mut states = states.into_iter();
    let settled = states.next().expect("there is a settled bound");
    let result = CaseResult {
        name: case.name.clone(),
        gravity,
        accel: course.accel,
        settled,
        sealed: states.next(),
        released,
        trapped,
        routes: bounds.iter().enumerate().map(|(b, &bound)| (bound, route(course, b))).collect(),
        pours,
        transfer,
        plates: plates.into_iter().flatten().collect(),
        verdicts,
        absent,
    };
    (result, holds)
}

/// Every plate, ready to be loaded.
fn bearers<'s>(study: &'s ValidStudy, panels: &mut SolvedPanels) -> Vec<Bearer<'s>> {
    let inputs = study.study();
    let earlier = std::mem::take(panels);
    let width = &inputs.section.width;
    let plates = inputs.section.plates.iter().zip(study.region().plates());
    let bearer = |(plate, placed): (&'s Plate, &'s Placed)| {
        Bearer::new(plate, placed, width, inputs.material(&plate.material), &earlier, panels)
    };
    plates.map(bearer).collect()
}

/// What the plates bear in a state, in the order of the plates; nothing without one.
fn borne(bearers: &[Bearer], bound: Bound, state: &Result<Settled, String>) -> Vec<PlateResult> {
    let loads = state.iter().flat_map(|settled| &settled.plates);
    bearers.iter().zip(loads).enumerate().map(|(i, (bearer, load))| bearer.under(i, bound, load)).collect()
}

/// The largest common fill that leaves no mouth on the way, where that can be told.
fn holds(study: &ValidStudy, course: &Course, bound_idx: usize, blocked: &Option<String>) -> Option<f64> {
    let (ramp, way) = (course.ramp?, course.ways[bound_idx].as_ref()?);
    way.stop.as_ref()?;
    if blocked.is_some() {
        return None;
    }
    Some(way.holds_m3.unwrap_or_else(|| ways::highest(study, &ramp, ways::bounds(study)[bound_idx])))
}

/// How the liquid comes to the case where the walls are carried on.
fn route(course: &Course, bound_idx: usize) -> Route {
    let stop = course.ways[bound_idx].as_ref().and_then(|w| w.stop.as_ref());
    match (course.ramp, stop) {
        (Some(ramp), Some(stop)) if stop.had_several => Route::Turned(ramp.direction(), ramp.to_case_rad()),
        _ => Route::One,
    }
}

fn settle_case(
    study: &ValidStudy,
    holder: &Holder,
    course: &Course,
    bound_idx: usize,
    with_cells: bool,
) -> Result<Settled, String> {
    if course.gravity.up.is_none() {
        return Err("free fall: effective gravity is zero and there is no settled surface".to_owned());
    }
    let Some(way) = &course.ways[bound_idx] else {
        return Err("the way from rest to this case leads through free fall".to_owned());
    };
    let stop = way.stop.as_ref().ok_or("the liquid could not be followed to this case")?;
    Ok(settle_at(study, holder, stop, course.gravity.magnitude, with_cells))
}

/// After the release: back at rest, under the settled bound.
fn settle_released(study: &ValidStudy, course: &Course) -> Result<Settled, String> {
    let trace = ways::release(study, course, 0).ok_or("there is no way to this case, and so none back")?;
    let stop = trace.stops.first().ok_or("the liquid could not be followed back to rest")?;
    let holder = ways::holder(study, Bound::Settled);
    Ok(settle_at(study, &holder, stop, study.study().gravity_m_per_s2, true))
}

fn settle_at(study: &ValidStudy, holder: &Holder, stop: &Stop, gravity_m_per_s2: f64, with_cells: bool) -> Settled {
    let inputs = study.study();
    let points: Vec<(&str, Point)> = inputs.points.iter().map(|p| (p.name.as_str(), p.at)).collect();
    let setting = Setting {
        spills: &spills(holder, study.mouths(), &stop.spilled),
        gravity_m_per_s2,
        density_kg_per_m3: &|compartment| study.liquid_of(compartment).density_kg_per_m3,
        gas_pa: inputs.ullage_gage_pa,
        air_pa: inputs.air_pressure_abs_pa,
        moment_about: inputs.moment_about,
        points: &points,
        with_cells,
    };
    let look = holder.look(stop.up);
    settle(&inputs.section, study.region(), &look, &stop.bodies, &setting)
}

/// Bond number rho |G| L^2 / sigma below which capillarity rules the surface. Source: [BondNumber].
const LEAST_BOND_NUMBER: f64 = 10.0;

/// Why nothing of the case can be judged.
fn blocked(
    study: &ValidStudy,
    gravity: &EffectiveGravity,
    settled: Option<&Settled>,
    still_length_m: f64,
) -> Option<String> {
    if gravity.up.is_none() {
        return Some("free fall: there is no settled surface".to_owned());
    }
    let bond = gravity.magnitude * bond_per_gravity(study, settled?, still_length_m);
    (bond < LEAST_BOND_NUMBER).then(|| {
        format!(
            "capillarity: Bond number {} is below {LEAST_BOND_NUMBER:.0}, surface tension shapes the surface",
            number(bond, 2)
        )
    })
}

/// The Bond number of a state under an effective gravity of 1 m/s2; infinite where there is no surface. Capillarity is
/// measured by the longer of the still and the settled surface: the few drops that a spill leaves must not hide the
/// spill.
fn bond_per_gravity(study: &ValidStudy, settled: &Settled, still_length_m: f64) -> f64 {
    let liquid = &study.study().liquid;
    let length = length_m(settled.pools.iter().flat_map(|p| &p.surface)).max(still_length_m);
    if length > 0.0 {
        liquid.weight_pa_per_m(1.0) * length * length / liquid.surface_tension()
    } else {
        f64::INFINITY
    }
}

/// Length of a surface over all its pieces, m.
fn length_m<'a>(surface: impl Iterator<Item = &'a Chord>) -> f64 {
    surface.map(Chord::length).sum()
}

/// Eight equal tints: the least nice step that reaches `highest`, times eight.
fn nice_scale(highest_pa: f64) -> f64 {
    const N_TINTS: f64 = 8.0;
    if !(highest_pa > 0.0 && highest_pa.is_finite()) {
        return N_TINTS;
    }
    let least = highest_pa / N_TINTS;
    let decade = 10f64.powf(least.log10().floor());
    let step = [1.0, 2.0, 2.5, 5.0, 10.0].into_iter().map(|m| m * decade).find(|&s| s >= least * (1.0 - 1e-12));
    N_TINTS * step.unwrap_or(10.0 * decade)
}
