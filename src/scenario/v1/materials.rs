//! Materials of its own in a version 1 file.

use serde::Deserialize;

use crate::material;

use super::super::number::Num;

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Material {
    name: String,
    yield_mpa: Num,
    modulus_gpa: Num,
    poisson: Num,
    density_kg_per_m3: Num,
    factor: Num,
    #[serde(default)]
    source: String,
}

impl From<Material> for material::Material {
    fn from(file: Material) -> material::Material {
        material::Material {
            name: file.name,
            yield_pa: file.yield_mpa.mpa(),
            modulus_pa: file.modulus_gpa.gpa(),
            poisson: file.poisson.si(),
            density_kg_per_m3: file.density_kg_per_m3.si(),
            factor: file.factor.si(),
            source: file.source,
            status: material::Material::OWN_STATUS.to_owned(),
        }
    }
}
