//! A study without faults.

use crate::cases::LoadCase;
use crate::geom::Vec2;
use crate::liquid::Liquid;
use crate::problem::Problem;
use crate::section::{Mouth, Region};
use crate::statics::{Start, Tilted, Vessel};

use super::{Fill, Study};

/// A study without faults: the only door to [`crate::analysis::run`].
#[derive(Clone, Debug)]
pub struct ValidStudy {
    pub(super) study: Study,
    pub(super) region: Region,
    pub(super) vessel: Vessel,
    pub(super) mouths: Vec<Mouth>,
    /// The common fill first, where there is one.
    pub(super) starts: Vec<Start>,
    /// For each compartment of the region, the compartment of the study that has a liquid of its own.
    pub(super) liquids: Vec<Option<usize>>,
    pub(super) warnings: Vec<Problem>,
}

impl ValidStudy {
    /// The inputs.
    pub fn study(&self) -> &Study {
        &self.study
    }

    /// The checked section.
    pub fn region(&self) -> &Region {
        &self.region
    }

    /// The section with its width law, plates left out.
    pub fn vessel(&self) -> &Vessel {
        &self.vessel
    }

    /// Its mouths.
    pub fn mouths(&self) -> &[Mouth] {
        &self.mouths
    }

    /// Volume of the whole section, m3.
    pub fn capacity_m3(&self) -> f64 {
        self.vessel.capacity_m3()
    }

    /// All liquid, m3.
    pub fn fill_volume_m3(&self) -> f64 {
        self.starts.iter().map(|s| s.volume_m3).sum()
    }

    /// What liquid there is, and where it stands when still; the common fill first.
    pub fn starts(&self) -> &[Start] {
        &self.starts
    }

    /// The common fill; none where every compartment has its own.
    pub fn common(&self) -> Option<&Start> {
        self.starts.first().filter(|s| s.is_common)
    }

    /// The same liquid with another volume of the common fill, m3.
    pub fn starts_with(&self, common_m3: f64) -> Vec<Start> {
        let change = |s: &Start| Start { volume_m3: if s.is_common { common_m3 } else { s.volume_m3 }, ..s.clone() };
        self.starts.iter().map(change).collect()
    }

    /// The same study with another volume of the common fill, m3, and other load cases.
    pub fn with(&self, common_m3: f64, cases: Vec<LoadCase>) -> ValidStudy {
        let study = Study { fill: Fill::Volume(common_m3), cases, ..self.study.clone() };
        ValidStudy { study, starts: self.starts_with(common_m3), ..self.clone() }
    }

    /// The liquid of a compartment of the region.
    pub fn liquid_of(&self, compartment: usize) -> &Liquid {
        let own = self.liquids[compartment].and_then(|i| self.study.compartments[i].liquid.as_ref());
        own.unwrap_or(&self.study.liquid)
    }

    /// What the user should know of the input.
    pub fn warnings(&self) -> &[Problem] {
        &self.warnings
    }

    /// The section seen along a direction, plates left out.
    pub fn tilted(&self, up: Vec2) -> Tilted<'_> {
        self.vessel.tilted(up)
    }
}
