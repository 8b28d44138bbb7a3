//! The liquid as the board tints it: bands of equal steps of gage pressure, with an isobar between each two.
//!
//! Pure, in metres. Pressure is p = gas + rho |G| (level - v); nothing here is a result.

use crate::geom::{Point, Vec2};
use crate::units::{Quantity, UnitSystem};

use super::strips::{Side, Strip, bands, chords, extent};

/// Tints at most: one step is a round number in the shown unit.
const N_TINTS: f64 = 8.0;

/// Steps of the pressure tints.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TintScale {
    /// One step, Pa.
    pub step_pa: f64,
    /// Where the tints begin, in steps: zero unless the gas is under pressure.
    pub first: i32,
    /// Count of tints.
    pub n: usize,
}

impl TintScale {
    /// Round steps that reach `full_scale_pa` above the pressure of the gas; none where there is nothing to tint.
    pub fn new(full_scale_pa: f64, gas_pa: f64, units: UnitSystem) -> Option<TintScale> {
        let unit = Quantity::GagePressure.unit(units);
        let full = unit.from_si(full_scale_pa);
        if !(full.is_finite() && full > 0.0 && gas_pa.is_finite()) {
            return None;
        }
        let least = full / N_TINTS * (1.0 - 1e-9);
        let decade = 10f64.powf(least.log10().floor());
        let step = [1.0, 2.0, 2.5, 5.0, 10.0].map(|m| m * decade).into_iter().find(|&s| s >= least)?;
        let gas = unit.from_si(gas_pa) / step;
        let first = gas.floor();
        let last = (gas + full / step - 1e-6).ceil();
        Some(TintScale { step_pa: unit.to_si(step), first: first as i32, n: (last - first).max(1.0) as usize })
    }

    /// Pressure at the lower end of tint `i`, Pa gage.
    pub fn gage_pa(&self, i: usize) -> f64 {
        f64::from(self.first + i as i32) * self.step_pa
    }
}

/// How a band of liquid is tinted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Tint {
    /// Tint of this index.
    Step(usize),
    /// Beyond full scale: the last tint, hatched.
    AboveScale,
    /// No pressure is known.
    NotJudged,
}

/// Liquid between two isobars.
#[derive(Clone, Debug, PartialEq)]
pub struct Band {
    /// How it is tinted.
    pub tint: Tint,
    /// Where it is.
    pub strips: Vec<Strip>,
}

/// A line of equal pressure.
#[derive(Clone, Debug, PartialEq)]
pub struct Isobar {
    /// Pa gage.
    pub gage_pa: f64,
    /// Its pieces inside the liquid, from left to right.
    pub chords: Vec<[Point; 2]>,
}

/// One body of liquid, tinted.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Tinted {
    /// From the floor up.
    pub bands: Vec<Band>,
    /// From the surface down.
    pub isobars: Vec<Isobar>,
}

/// A body of liquid with one level.
#[derive(Clone, Debug)]
pub struct Body {
    /// What bounds it; what lies above its level is left out.
    pub sides: Vec<Side>,
    /// Against effective gravity.
    pub up: Vec2,
    /// Level v = up . x of its surface, m.
    pub level_m: f64,
    /// Pressure at the surface, Pa gage.
    pub gas_pa: f64,
    /// rho |G|, Pa/m; zero where no pressure is known.
    pub weight_pa_per_m: f64,
}

impl Body {
    /// Its bands and isobars. All bodies of a drawing share one scale, so that their tints compare.
    pub fn tinted(&self, tints: Option<TintScale>) -> Tinted {
        let sides = &self.sides;
        let Some((floor, roof)) = extent(sides, self.up) else { return Tinted::default() };
        let level = self.level_m.min(roof);
        if level <= floor {
            return Tinted::default();
        }
        let Some(tints) = tints.filter(|_| self.weight_pa_per_m > 0.0) else {
            let strips = bands(sides, self.up, &[floor, level]).remove(0);
            return Tinted { bands: vec![Band { tint: Tint::NotJudged, strips }], isobars: Vec::new() };
        };
        let pressure_at = |v: f64| self.gas_pa + self.weight_pa_per_m * (self.level_m - v);
        let level_of = |i: usize| self.level_m - (tints.gage_pa(i) - self.gas_pa) / self.weight_pa_per_m;
        let is_inside = |i: &usize| pressure_at(level) < tints.gage_pa(*i) && tints.gage_pa(*i) < pressure_at(floor);
        let steps: Vec<usize> = (1..=tints.n).filter(is_inside).collect();
        let isobar = |&i: &usize| Isobar { gage_pa: tints.gage_pa(i), chords: chords(sides, self.up, level_of(i)) };
        let isobars = steps.iter().map(isobar).collect();
        let mut levels = vec![floor];
        levels.extend(steps.iter().rev().map(|&i| level_of(i)));
        levels.push(level);
        let surface = (0..=tints.n).rev().find(|&i| tints.gage_pa(i) <= pressure_at(level)).unwrap_or(0);
        let deepest = steps.last().copied().unwrap_or(surface);
        let bands = (bands(sides, self.up, &levels).into_iter().enumerate())
            .map(|(i, strips)| {
                let idx = deepest.saturating_sub(i);
                Band { tint: if idx < tints.n { Tint::Step(idx) } else { Tint::AboveScale }, strips }
            })
            .collect();
        Tinted { bands, isobars }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::gui::board::strips::sides;

    #[test]
    fn steps_are_round_in_the_shown_unit() {
        let us = Quantity::GagePressure.unit(UnitSystem::UsCustomary);
        for (full_pa, gas_pa, units, step_pa, first, n) in [
            (16e3, 0.0, UnitSystem::Si, 2e3, 0, 8),
            (20e3, 0.0, UnitSystem::Si, 2.5e3, 0, 8),
            (16e3, 35e3, UnitSystem::Si, 2e3, 17, 9),
            (16e3, -3e3, UnitSystem::Si, 2e3, -2, 9),
            (us.to_si(2.32), 0.0, UnitSystem::UsCustomary, us.to_si(0.5), 0, 5),
        ] {
            let got = TintScale::new(full_pa, gas_pa, units).unwrap();
            assert!((got.step_pa - step_pa).abs() < 1e-9 * step_pa, "full {full_pa}, gas {gas_pa}: {got:?}");
            assert_eq!((got.first, got.n), (first, n), "full {full_pa}, gas {gas_pa}");
        }
        assert_eq!(TintScale::new(0.0, 0.0, UnitSystem::Si), None);
    }

    #[test]
    fn bands_follow_the_pressure() {
        // A unit square of water to z = 0.9 m, gas at 1 kPa: 1 kPa at the surface, 9.8 kPa at the floor.
        let square = [(0.0, 0.0), (1.0, 0.0), (1.0, 1.0), (0.0, 1.0)].map(|(s, z)| Point::new(s, z)).to_vec();
        let sides = sides(&square).collect();
        let body = Body { sides, up: Vec2::y(), level_m: 0.9, gas_pa: 1e3, weight_pa_per_m: 9800.0 };
        let tints = TintScale { step_pa: 2e3, first: 0, n: 4 };
        let Tinted { bands, isobars } = body.tinted(Some(tints));
        let got: Vec<(Tint, f64)> =
            bands.iter().map(|b| (b.tint, b.strips.iter().map(Strip::area).sum::<f64>())).collect();
        let thick = 2e3 / 9800.0;
        let want = [
            (Tint::AboveScale, 0.9 - 0.5 * thick - 3.0 * thick),
            (Tint::Step(3), thick),
            (Tint::Step(2), thick),
            (Tint::Step(1), thick),
            (Tint::Step(0), 0.5 * thick),
        ];
        assert_eq!(got.len(), want.len(), "{got:?}");
        for (got, want) in got.iter().zip(want) {
            assert!(got.0 == want.0 && (got.1 - want.1).abs() < 1e-12, "got {got:?}, expected {want:?}");
        }
        assert_eq!(isobars.iter().map(|i| i.gage_pa).collect::<Vec<_>>(), [2e3, 4e3, 6e3, 8e3]);
    }
}
