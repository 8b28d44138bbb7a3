//! The bibliography: typed keys into `assets/sources.ron`.

use std::collections::BTreeMap;
use std::sync::LazyLock;

use serde::Deserialize;

/// A source. The text is in `assets/sources.ron`, under the variant's name.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Deserialize)]
pub enum Source {
    /// Hydrostatics in a uniformly accelerated frame.
    RigidAcceleration,
    /// The project's own derivation of the quasi-static spill path.
    BrimPath,
    /// Limit of capillarity.
    BondNumber,
    /// Vapour pressure margin.
    VapourMargin,
    /// The project's own derivation of layout facts.
    LayoutGeometry,
    /// Flow through openings.
    OrificeFlow,
    /// Effective gravity and standard gravity.
    StandardGravity,
    /// Thin plates in bending.
    PlateBending,
    /// The project's own solution for rectangular panels.
    PanelRitz,
    /// Beams of one span.
    BeamFormulas,
}

/// One entry of the bibliography.
#[derive(Clone, Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Entry {
    /// Short form, as in a verdict.
    pub short: String,
    /// Full form.
    pub full: String,
    /// How the project knows it: seen, from memory, common practice, own derivation.
    pub status: String,
}

static BIBLIOGRAPHY: LazyLock<BTreeMap<Source, Entry>> = LazyLock::new(|| {
    ron::from_str(include_str!("../assets/sources.ron")).expect("assets/sources.ron is tested to parse")
});

impl Source {
    /// Its entry.
    pub fn entry(self) -> &'static Entry {
        &BIBLIOGRAPHY[&self]
    }
}

/// All entries, for the list of sources.
pub fn all() -> impl Iterator<Item = (Source, &'static Entry)> {
    BIBLIOGRAPHY.iter().map(|(k, v)| (*k, v))
}
