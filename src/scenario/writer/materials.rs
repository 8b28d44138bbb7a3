//! Materials of its own as text.

use crate::material::Material;

use super::super::number::{gpa, mpa, number};
use super::lines::{Text, quoted};

pub(super) fn write(out: &mut Text, material: &Material) {
    out.open("(");
    out.key("name", &quoted(&material.name));
    out.key("yield_mpa", &mpa(material.yield_pa));
    out.key("modulus_gpa", &gpa(material.modulus_pa));
    out.key("poisson", &number(material.poisson));
    out.key("density_kg_per_m3", &number(material.density_kg_per_m3));
    out.key("factor", &number(material.factor));
    out.optional_text("source", &material.source);
    out.close("),");
}
