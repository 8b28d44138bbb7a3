//! The strength of a panel: stress, deflection and required thickness for a material, with the corrosion allowance
//! taken off first.
//!
//! Stress at the surface is 6 M / t^2 with M the panel's governing moment and t the net thickness, so it falls as 1 /
//! t^2 and the required thickness is a closed form. Where thin-plate theory of small deflections is left, the result
//! says so; it judges nothing itself. Source: [PlateBending].

use super::{PlateError, Profile, SolvedPanel, Summits};
use crate::material::Material;

/// A panel's strength under a pressure.
#[derive(Clone, Debug, PartialEq)]
pub struct Strength {
    /// Thickness that counts: as built, less the corrosion allowance, m.
    pub net_thickness_m: f64,
    /// Largest surface stress at the net thickness, Pa: principal or von Mises's, whichever is larger.
    pub stress_pa: f64,
    /// Largest principal surface stress, Pa, without sign: the one that handbooks tabulate.
    pub principal_stress_pa: f64,
    /// Yield stress over the material's factor, Pa.
    pub allowable_pa: f64,
    /// Stress over allowable stress.
    pub utilisation: f64,
    /// Least thickness as built, allowance included, at which the stress is the allowable one, m.
    pub required_thickness_m: f64,
    /// Largest deflection at the net thickness, m, without sign.
    pub deflection_m: f64,
    /// Where the method is out of its range; empty where it is not.
    pub out_of_range: Vec<OutOfRange>,
    /// Least thickness as built, allowance included, at which the deflection stays in range, m.
    pub in_range_from_m: f64,
    /// The moments and the deflection that it rests on.
    pub summits: Summits,
    /// Force of largest magnitude along its sides, N/m, signed.
    pub side_force_n_per_m: f64,
}

impl Strength {
    /// The load over the largest one of the same form under which it holds and is in range; infinite where none is.
    pub fn load_used(&self) -> f64 {
        if self.out_of_range.iter().any(|out| matches!(out, OutOfRange::ThickPlate { .. })) {
            return f64::INFINITY;
        }
        self.utilisation.max(self.deflection_m / (MOST_DEFLECTION_TO_THICKNESS * self.net_thickness_m))
    }
}

/// How a panel leaves the range of the theory: its strength is then not judged.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum OutOfRange {
    /// It deflects so far that it also stretches. Common practice: half the thickness.
    LargeDeflection {
        /// How far, m.
        deflection_m: f64,
        /// How far it may, m.
        most_m: f64,
    },
    /// So thick that it also shears. Common practice: a tenth of the shorter side.
    ThickPlate {
        /// Net thickness, m.
        net_thickness_m: f64,
        /// How thick it may be, m.
        most_m: f64,
    },
}

/// Deflection over net thickness above which deflections are not small. Common practice.
pub const MOST_DEFLECTION_TO_THICKNESS: f64 = 0.5;

/// Net thickness over the shorter side above which a plate is not thin. Common practice.
pub const MOST_THICKNESS_TO_SIDE: f64 = 0.1;

/// The strength of a panel of a material under a net pressure along its height. The panel must have been solved for
/// the material's Poisson's ratio.
///
/// Errors: values of the material or thicknesses that make no sense, an allowance that leaves nothing of the plate.
pub fn strength(
    panel: &SolvedPanel,
    pressure: &Profile,
    material: &Material,
    thickness_m: f64,
    corrosion_allowance_m: f64,
) -> Result<Strength, PlateError> {
    check(panel, material)?;
    let net_thickness_m = net_thickness(thickness_m, corrosion_allowance_m)?;
    let bent = panel.bend(pressure)?;
    let summits = bent.summits();
    let geometry = panel.geometry();
    let stress = |moment_n: f64| 6.0 * moment_n.abs() / (net_thickness_m * net_thickness_m);
    let (governing_n, allowable_pa) = (summits.governing().value, material.allowable_pa());
    // w = D w / D with D = E t^3 / (12 (1 - nu^2)).
    let times_cube =
        12.0 * (1.0 - geometry.poisson.powi(2)) / material.modulus_pa * summits.deflection_n_m2.value.abs();
    let deflection_m = times_cube / net_thickness_m.powi(3);
    let mut out_of_range = vec![];
    let most_m = MOST_DEFLECTION_TO_THICKNESS * net_thickness_m;
    if deflection_m > most_m {
        out_of_range.push(OutOfRange::LargeDeflection { deflection_m, most_m });
    }
    let most_m = MOST_THICKNESS_TO_SIDE * geometry.width_m.min(geometry.height_m);
    if net_thickness_m > most_m {
        out_of_range.push(OutOfRange::ThickPlate { net_thickness_m, most_m });
    }
    let result = Strength {
        net_thickness_m,
        stress_pa: stress(governing_n),
        principal_stress_pa: stress(summits.principal.value),
        allowable_pa,
        utilisation: stress(governing_n) / allowable_pa,
        required_thickness_m: (6.0 * governing_n / allowable_pa).sqrt() + corrosion_allowance_m,
        deflection_m,
        out_of_range,
        in_range_from_m: (times_cube / MOST_DEFLECTION_TO_THICKNESS).powf(0.25) + corrosion_allowance_m,
        summits,
        side_force_n_per_m: bent.side_force_n_per_m(),
    };
    let finite = [result.utilisation, result.required_thickness_m, result.deflection_m, result.in_range_from_m];
    if finite.iter().all(|value| value.is_finite()) { Ok(result) } else { Err(PlateError::OutOfNumbers) }
}

/// What is left of a plate once its allowance has corroded, m; refused where nothing is.
pub fn net_thickness(thickness_m: f64, corrosion_allowance_m: f64) -> Result<f64, PlateError> {
    for (what, value_m) in [("the thickness", thickness_m), ("the corrosion allowance", corrosion_allowance_m)] {
        if !(value_m.is_finite() && value_m >= 0.0) {
            return Err(PlateError::Thickness { what, value_m });
        }
    }
    if thickness_m <= corrosion_allowance_m {
        let (thickness_mm, allowance_mm) = (1e3 * thickness_m, 1e3 * corrosion_allowance_m);
        return Err(PlateError::NothingLeft { thickness_mm, allowance_mm });
    }
    Ok(thickness_m - corrosion_allowance_m)
}

fn check(panel: &SolvedPanel, material: &Material) -> Result<(), PlateError> {
    let name = || material.name.clone();
    for (what, value) in [
        ("yield stress in Pa", material.yield_pa),
        ("modulus in Pa", material.modulus_pa),
        ("factor on yield", material.factor),
    ] {
        if !(value.is_finite() && value > 0.0) {
            return Err(PlateError::Material { name: name(), what, value });
        }
    }
    let solved_for = panel.geometry().poisson;
    if solved_for != material.poisson {
        return Err(PlateError::OtherPoisson { panel: solved_for, name: name(), material: material.poisson });
    }
    Ok(())
}
