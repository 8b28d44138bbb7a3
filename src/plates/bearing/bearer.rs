//! A plate of the section, made ready once and loaded as often as wanted.

use std::sync::Arc;

use crate::geom::Point;
use crate::material::Material;
use crate::plates::{PanelGeometry, PlateError, SolvedPanel, Strength, Support, strength};
use crate::section::{PanelEdges, Placed, Plate, WidthLaw};
use crate::statics::{Bound, PlateLoad, Stretch};

use super::pressure::profile;
use super::span::{Span, spans};
use super::weld::{Weld, welds};

/// A plate with the stiffness of its panels solved.
#[derive(Clone, Debug)]
pub struct Bearer<'a> {
    plate: &'a Plate,
    placed: &'a Placed,
    width: &'a WidthLaw,
    /// None where the plate has no material.
    panels: Option<(&'a Material, Vec<(Span, Panel)>)>,
    /// What they bear where no side is pressed more than the other: all are alike then.
    idle: WorstPanel,
}

/// The worst panel, or why there is none, and how much of its load is used.
type WorstPanel = (Option<Result<PanelStrength, String>>, f64);

/// A solved panel, or why it cannot be calculated.
type Panel = Result<Arc<SolvedPanel>, PlateError>;

/// Panels that are solved: many plates have the same, and keep them while other things change.
#[derive(Clone, Debug, Default)]
pub struct SolvedPanels(Vec<(PanelGeometry, Panel)>);

/// What one plate bears under one bound of a load case.
#[derive(Clone, Debug, PartialEq)]
pub struct PlateResult {
    /// Which plate.
    pub plate_idx: usize,
    /// Under which bound.
    pub bound: Bound,
    /// What its attached ends hand to their welds.
    pub welds: Vec<Weld>,
    /// Its worst panel, or why there is none; none where the plate has no material.
    pub panel: Option<Result<PanelStrength, String>>,
    /// The load over the largest one of the same form under which every panel holds and is judged; infinite where none is.
    pub load_used: f64,
}

/// The panel of a plate with the largest stress.
#[derive(Clone, Debug, PartialEq)]
pub struct PanelStrength {
    /// The span that is its height.
    pub span: Span,
    /// How its edges are held.
    pub support: Support,
    /// Where the stress is largest.
    pub at: Point,
    /// Its strength under the net pressure over (1 - the open share of its width): moments and stresses pass what
    /// openings leave.
    pub strength: Strength,
}

impl PanelStrength {
    /// The moment that the stress comes from, N m a metre of the panel's whole width.
    pub fn moment_n(&self) -> f64 {
        self.strength.summits.governing().value * (1.0 - self.span.open_share)
    }

    /// The largest force along its sides, to stiffeners or side walls, N/m.
    pub fn side_force_n_per_m(&self) -> f64 {
        self.strength.side_force_n_per_m * (1.0 - self.span.open_share)
    }
}

impl<'a> Bearer<'a> {
    /// Solves the panels of a plate, if they are not among `earlier` ones or those that are `solved` already; from there on
    /// they are.
    pub fn new(
        plate: &'a Plate,
        placed: &'a Placed,
        width: &'a WidthLaw,
        material: Option<&'a Material>,
        earlier: &SolvedPanels,
        solved: &mut SolvedPanels,
    ) -> Bearer<'a> {
        let panels = material.map(|material| {
            let panel = |span: Span| {
                let (width_m, height_m) = (span.width_m, span.length_m());
                let support = support(plate.panel.edges, span.is_held);
                (span, solved.panel(earlier, PanelGeometry { width_m, height_m, support, poisson: material.poisson }))
            };
            (material, spans(plate, placed, width).into_iter().map(panel).collect())
        });
        let mut bearer = Bearer { plate, placed, width, panels, idle: (None, f64::INFINITY) };
        bearer.idle = bearer.worst_panel(&[], 1);
        bearer
    }

    /// What it bears under the net load across it.
    pub fn under(&self, plate_idx: usize, bound: Bound, load: &PlateLoad) -> PlateResult {
        // Pressures beyond what numbers hold leave no welds; the panel says why.
        let welds = welds(self.plate, self.placed, self.width, &load.stretches).unwrap_or_default();
        let is_idle = load.stretches.iter().all(|s| s.from_pa == 0.0 && s.to_pa == 0.0);
        let (panel, load_used) =
            if is_idle { self.idle.clone() } else { self.worst_panel(&load.stretches, usize::MAX) };
        PlateResult { plate_idx, bound, welds, panel, load_used }
    }

    fn worst_panel(&self, stretches: &[Stretch], most: usize) -> WorstPanel {
        let Some((material, panels)) = &self.panels else { return (None, f64::INFINITY) };
        let mut worst: Option<PanelStrength> = None;
        let mut load_used = 0.0;
        for (span, panel) in panels.iter().take(most) {
            let found = match panel {
                Ok(panel) => self.panel_strength(span, panel, material, stretches).map_err(|e| e.to_string()),
                Err(error) => Err(error.to_string()),
            };
            match found {
                Ok(found) => {
                    load_used = f64::max(load_used, found.strength.load_used());
                    if worst.as_ref().is_none_or(|w| is_worse(&found.strength, &w.strength)) {
                        worst = Some(found);
                    }
                }
                Err(reason) => return (Some(Err(reason)), f64::INFINITY),
            }
        }
        match worst {
            Some(worst) => (Some(Ok(worst)), load_used),
            None => (Some(Err("openings leave nothing of the plate".to_owned())), f64::INFINITY),
        }
    }

    fn panel_strength(
        &self,
        span: &Span,
        panel: &SolvedPanel,
        material: &Material,
        stretches: &[Stretch],
    ) -> Result<PanelStrength, PlateError> {
        let height_m = span.length_m();
        let pressure = profile(self.plate, stretches, [span.from_m, span.to_m])?;
        // A panel's free edge is its top.
        let is_turned = !span.is_held[0] && span.is_held[1];
        let pressure = if is_turned { pressure.turned(height_m) } else { pressure };
        let pressure = pressure.times(1.0 / (1.0 - span.open_share));
        let (thickness, corrosion) = (self.plate.thickness_m, self.plate.corrosion_m);
        let strength = strength(panel, &pressure, material, thickness, corrosion)?;
        let y_m = strength.summits.governing().y_m;
        let along = if is_turned { span.to_m - y_m } else { span.from_m + y_m };
        let support = panel.geometry().support;
        Ok(PanelStrength { span: *span, support, at: self.plate.point_at(along), strength })
    }
}

impl SolvedPanels {
    fn find(&self, geometry: PanelGeometry) -> Option<&Panel> {
        self.0.iter().find(|s| s.0 == geometry).map(|s| &s.1)
    }

    fn panel(&mut self, earlier: &SolvedPanels, geometry: PanelGeometry) -> Panel {
        if let Some(panel) = self.find(geometry) {
            return panel.clone();
        }
        let known = earlier.find(geometry).cloned();
        let panel = known.unwrap_or_else(|| SolvedPanel::new(geometry).map(Arc::new));
        self.0.push((geometry, panel.clone()));
        panel
    }
}

/// What fails comes before what is out of range, and that before what holds; then the larger stress.
fn is_worse(a: &Strength, b: &Strength) -> bool {
    let rank = |s: &Strength| match (s.out_of_range.is_empty(), s.utilisation > 1.0) {
        (true, true) => 2,
        (false, _) => 1,
        (true, false) => 0,
    };
    rank(a).cmp(&rank(b)).then(a.utilisation.total_cmp(&b.utilisation)).is_gt()
}

fn support(edges: PanelEdges, is_held: [bool; 2]) -> Support {
    let n_held = is_held.into_iter().filter(|held| *held).count();
    match (edges, n_held) {
        (PanelEdges::SimplySupported, 2) => Support::Simple,
        (PanelEdges::SimplySupported, 1) => Support::SimpleFreeTop,
        (PanelEdges::SimplySupported, _) => Support::SimpleSides,
        (PanelEdges::Clamped, 2) => Support::Clamped,
        (PanelEdges::Clamped, 1) => Support::ClampedFreeTop,
        (PanelEdges::Clamped, _) => Support::ClampedSides,
    }
}
