//! What a plate is made of. A small table in `assets/materials.ron` says for every row where its numbers come from;
//! users add rows of their own. Knows no plate and no load.

use std::sync::LazyLock;

use serde::Deserialize;

/// A material. All values SI.
#[derive(Clone, Debug, PartialEq, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Material {
    /// As shown.
    pub name: String,
    /// Yield or 0.2 % proof stress as welded, Pa.
    pub yield_pa: f64,
    /// Young's modulus E, Pa.
    pub modulus_pa: f64,
    /// Poisson's ratio.
    pub poisson: f64,
    /// kg/m3.
    pub density_kg_per_m3: f64,
    /// Yield stress over allowable stress.
    pub factor: f64,
    /// Where the numbers come from.
    pub source: String,
    /// How the project knows them: seen, from memory, common practice.
    pub status: String,
}

impl Material {
    /// Yield over allowable stress where nobody says otherwise: common practice, unconfirmed.
    pub const USUAL_FACTOR: f64 = 1.5;

    /// How one that a scenario brings is known: whoever made the scenario answers for it.
    pub const OWN_STATUS: &str = "given in the scenario";

    /// Allowable stress: yield stress over the factor, Pa.
    pub fn allowable_pa(&self) -> f64 {
        self.yield_pa / self.factor
    }
}

static TABLE: LazyLock<Vec<Material>> = LazyLock::new(|| {
    ron::from_str(include_str!("../assets/materials.ron")).expect("assets/materials.ron is tested to parse")
});

/// The table, metals first.
pub fn table() -> &'static [Material] {
    &TABLE
}

/// The row of that name.
pub fn named(name: &str) -> Option<&'static Material> {
    TABLE.iter().find(|material| material.name == name)
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeSet;

    use super::*;

    #[test]
    fn rows_are_sound_and_say_where_they_come_from() {
        let names: BTreeSet<&str> = table().iter().map(|m| m.name.as_str()).collect();
        assert_eq!(names.len(), table().len(), "a name is used twice");
        for m in table() {
            assert!(m.yield_pa >= 1e6 && m.yield_pa <= 1e9, "{}: yield {}", m.name, m.yield_pa);
            assert!(m.modulus_pa > 20.0 * m.yield_pa, "{}: modulus {}", m.name, m.modulus_pa);
            assert!((0.2..0.5).contains(&m.poisson), "{}: Poisson's ratio {}", m.name, m.poisson);
            assert!((800.0..9000.0).contains(&m.density_kg_per_m3), "{}: density", m.name);
            assert!(m.factor >= Material::USUAL_FACTOR, "{}: factor {}", m.name, m.factor);
            let says = ["seen", "from memory", "common practice"];
            assert!(says.iter().any(|word| m.status.contains(word)), "{}: status `{}`", m.name, m.status);
            assert!(m.source.len() > 10, "{}: source", m.name);
            assert_eq!(named(&m.name), Some(m));
        }
        assert_eq!(named("unobtainium"), None);
    }

    #[test]
    fn allowable_stress_is_yield_over_factor() {
        // EN 10025-2, S235 up to 16 mm: 235 MPa; over 1.5.
        let steel = named("structural steel S235").expect("a row");
        assert!((steel.allowable_pa() - 156.666_667e6).abs() < 1.0, "{}", steel.allowable_pa());
    }
}
