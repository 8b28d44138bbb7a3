//! The one facade: a valid study in, results out. Pure: no files, no clock, no screen.

mod curves;
mod results;

use rayon::prelude::*;

use crate::cases::LoadCase;
use crate::criteria::{self, Context, Outcome};
use crate::geom::{Point, Vec2};
use crate::statics::{Ramp, Rims, Setting, Spill, effective_gravity, pressure_at, settle};
use crate::study::ValidStudy;
use crate::units::{Measure, Quantity, number};

pub use curves::curves;
pub use results::*;

/// Judges every load case.
pub fn run(study: &ValidStudy) -> Results {
    let inputs = study.study();
    let still_tilted = study.tilted(Vec2::y());
    let volume = study.fill_volume_m3();
    let level = still_tilted.level_for_volume(volume);
    let (bottom, top) = still_tilted.span();
    let surface = still_tilted.chords(level);
    let still_length_m = length_m(&surface);
    let judged: Vec<(CaseResult, Option<f64>)> =
        inputs.cases.par_iter().map(|case| judge_case(study, case, level, still_length_m)).collect();
    let holds = judged.iter().filter_map(|(_, holds)| *holds).reduce(f64::min);
    let cases: Vec<CaseResult> = judged.into_iter().map(|(case, _)| case).collect();
    let rest_pa = inputs.liquid.weight_pa_per_m(inputs.gravity_m_per_s2) * (level - bottom);
    let highest_pa = cases
        .iter()
        .filter_map(|c| c.settled.as_ref().ok())
        .map(|s| s.peak_pa - inputs.ullage_gage_pa)
        .fold(rest_pa, f64::max);
    let capacity_m3 = study.capacity_m3();
    Results {
        capacity_m3,
        still: Still {
            volume_m3: volume,
            share: volume / capacity_m3,
            level_z_m: level,
            ullage_m: top - level,
            depth_m: level - bottom,
            mass_kg: volume * inputs.liquid.density_kg_per_m3,
            surface,
            highest_share: holds.map(|v| v.min(capacity_m3) / capacity_m3),
        },
        cases,
        pressure_scale_pa: nice_scale(highest_pa),
        warnings: study.warnings().to_vec(),
    }
}

/// Gage pressure at a place in the settled liquid of a load case, gas included; none outside the liquid.
pub fn gage_pressure_at(study: &ValidStudy, case: &CaseResult, p: Point) -> Option<Measure> {
    let (settled, up) = (case.settled.as_ref().ok()?, case.gravity.up?);
    let inputs = study.study();
    let weight = inputs.liquid.weight_pa_per_m(case.gravity.magnitude);
    let liquid_pa = pressure_at(p, settled.level_m, up, weight);
    let is_liquid = liquid_pa >= 0.0 && inputs.section.contains(p);
    is_liquid.then(|| Measure::new(Quantity::GagePressure, inputs.ullage_gage_pa + liquid_pa))
}

/// The load case, judged, and the volume that its way holds, where that could be judged.
fn judge_case(study: &ValidStudy, case: &LoadCase, still_z_m: f64, still_length_m: f64) -> (CaseResult, Option<f64>) {
    let inputs = study.study();
    let accel = case.accel.to_m_per_s2(inputs.gravity_m_per_s2);
    let phi = case.attitude.angle_rad();
    let gravity = effective_gravity(inputs.gravity_m_per_s2, phi, accel);
    let is_turn = accel.norm() == 0.0 && phi != 0.0;
    let at_rest = effective_gravity(inputs.gravity_m_per_s2, phi, Vec2::zeros()).vec;
    let ramp = if is_turn { Some(Ramp::turn(phi)) } else { Ramp::accelerate(at_rest, accel) };
    let volume = study.fill_volume_m3();
    let spill = ramp.map(|ramp| Spill::trace(&ramp, study.region(), study.vessel(), study.mouths(), volume));
    let settled = settle_case(study, &gravity, spill.as_ref());
    let rims = gravity.up.and_then(|up| Rims::new(study.region(), &inputs.section.width, study.mouths(), up));
    let context = Context {
        study,
        case,
        accel,
        gravity,
        still_z_m,
        spill: spill.as_ref(),
        settled: settled.as_ref().map_err(String::as_str),
        rims: rims.as_ref(),
        blocked: blocked(study, &gravity, settled.as_ref().ok(), still_length_m),
    };
    let Outcome { verdicts, absent } = criteria::judge(&context);
    let can_tell = |s: &&Spill| !s.has_several_pools && context.blocked.is_none();
    let holds = spill.as_ref().filter(can_tell).map(|s| s.holds_m3);
    (CaseResult { name: case.name.clone(), gravity, accel, settled, verdicts, absent }, holds)
}

fn settle_case(study: &ValidStudy, gravity: &EffectiveGravity, spill: Option<&Spill>) -> Result<Settled, String> {
    let Some(up) = gravity.up else {
        return Err("free fall: effective gravity is zero and there is no settled surface".to_owned());
    };
    let Some(spill) = spill else {
        return Err("the way from rest to this case leads through free fall".to_owned());
    };
    let inputs = study.study();
    let filled = study.fill_volume_m3();
    let volume_m3 = if spill.has_several_pools { filled } else { filled.min(spill.holds_m3) };
    let tilted = study.tilted(up);
    if spill.has_several_pools || tilted.n_pools(tilted.level_for_volume(volume_m3)) > 1 {
        return Err("several pools: the liquid parts into pools with levels of their own".to_owned());
    }
    let points: Vec<(&str, Point)> = inputs.points.iter().map(|p| (p.name.as_str(), p.at)).collect();
    let setting = Setting {
        volume_m3,
        spilled_m3: filled - volume_m3,
        weight_pa_per_m: inputs.liquid.weight_pa_per_m(gravity.magnitude),
        gas_pa: inputs.ullage_gage_pa,
        air_pa: inputs.air_pressure_abs_pa,
        moment_about: inputs.moment_about,
        points: &points,
    };
    Ok(settle(&inputs.section, study.region(), &tilted, &setting))
}

/// Bond number rho |G| L^2 / sigma below which capillarity rules the surface. Source: [BondNumber].
const LEAST_BOND_NUMBER: f64 = 10.0;

/// Why nothing of the case can be judged. Capillarity is measured by the longer of the still and the settled surface:
/// the few drops that a spill leaves must not hide the spill.
fn blocked(
    study: &ValidStudy,
    gravity: &EffectiveGravity,
    settled: Option<&Settled>,
    still_length_m: f64,
) -> Option<String> {
    if gravity.up.is_none() {
        return Some("free fall: there is no settled surface".to_owned());
    }
    let liquid = &study.study().liquid;
    let length = length_m(&settled?.surface).max(still_length_m);
    let bond = liquid.weight_pa_per_m(gravity.magnitude) * length * length / liquid.surface_tension();
    (length > 0.0 && bond < LEAST_BOND_NUMBER).then(|| {
        format!(
            "capillarity: Bond number {} is below {LEAST_BOND_NUMBER:.0}, surface tension shapes the surface",
            number(bond, 2)
        )
    })
}

/// Length of a surface over all its pieces, m.
fn length_m(surface: &[Chord]) -> f64 {
    surface.iter().map(Chord::length).sum()
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
