//! What is in the tank, in a version 1 file: liquid, fill, compartments.

use serde::Deserialize;

use crate::liquid;
use crate::study;

use super::super::number::Num;
use super::point;

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Liquid {
    name: String,
    density_kg_per_m3: Num,
    vapour_pressure_abs_kpa: Option<Num>,
    surface_tension_n_per_m: Option<Num>,
}

#[derive(Deserialize)]
#[serde(rename_all = "snake_case")]
pub(super) enum Fill {
    VolumeM3(Num),
    SharePercent(Num),
    LevelMm(Num),
    UllageMm(Num),
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Compartment {
    name: String,
    s_mm: Num,
    z_mm: Num,
    liquid: Option<Liquid>,
    fill: Fill,
}

impl From<Liquid> for liquid::Liquid {
    fn from(liquid: Liquid) -> liquid::Liquid {
        liquid::Liquid {
            name: liquid.name,
            density_kg_per_m3: liquid.density_kg_per_m3.si(),
            vapour_pressure_abs_pa: liquid.vapour_pressure_abs_kpa.map(Num::kpa),
            surface_tension_n_per_m: liquid.surface_tension_n_per_m.map(Num::si),
        }
    }
}

impl From<Fill> for study::Fill {
    fn from(fill: Fill) -> study::Fill {
        match fill {
            Fill::VolumeM3(v) => study::Fill::Volume(v.si()),
            Fill::SharePercent(v) => study::Fill::Share(v.percent()),
            Fill::LevelMm(v) => study::Fill::Level(v.mm()),
            Fill::UllageMm(v) => study::Fill::Ullage(v.mm()),
        }
    }
}

impl From<Compartment> for study::Compartment {
    fn from(compartment: Compartment) -> study::Compartment {
        study::Compartment {
            name: compartment.name,
            at: point(compartment.s_mm, compartment.z_mm),
            liquid: compartment.liquid.map(liquid::Liquid::from),
            fill: compartment.fill.into(),
        }
    }
}
