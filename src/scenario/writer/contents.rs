//! What is in the tank, as text: liquid, fill, compartments.

use crate::liquid::Liquid;
use crate::study::{Compartment, Fill};

use super::super::number::{kpa, mm, number, percent};
use super::lines::{Text, at, quoted};

pub(super) fn liquid(out: &mut Text, liquid: &Liquid) {
    out.open("liquid: (");
    out.key("name", &quoted(&liquid.name));
    out.key("density_kg_per_m3", &number(liquid.density_kg_per_m3));
    if let Some(pa) = liquid.vapour_pressure_abs_pa {
        out.key("vapour_pressure_abs_kpa", &kpa(pa));
    }
    if let Some(n_per_m) = liquid.surface_tension_n_per_m {
        out.key("surface_tension_n_per_m", &number(n_per_m));
    }
    out.close("),");
}

pub(super) fn fill(fill: Fill) -> String {
    match fill {
        Fill::Volume(m3) => format!("volume_m3({})", number(m3)),
        Fill::Share(share) => format!("share_percent({})", percent(share)),
        Fill::Level(m) => format!("level_mm({})", mm(m)),
        Fill::Ullage(m) => format!("ullage_mm({})", mm(m)),
    }
}

pub(super) fn compartment(out: &mut Text, compartment: &Compartment) {
    out.open("(");
    out.key("name", &quoted(&compartment.name));
    out.line(&format!("{},", at(compartment.at)));
    if let Some(own) = &compartment.liquid {
        liquid(out, own);
    }
    out.key("fill", &fill(compartment.fill));
    out.close("),");
}
