//! What the JSON says of plates as they bear their loads: welds, panels, and what is largest over all load cases.

use serde::Serialize;

use crate::analysis::{EndReaction, PanelStrength, PlatePeak, PlateResult, Weld};

use super::super::Report;
use super::{Num, coordinates, num};

#[derive(Clone, Debug, Serialize)]
pub(super) struct PeakRow {
    name: &'static str,
    value: Num,
    unit: &'static str,
    at_s_m: Num,
    at_z_m: Num,
    case: String,
    bound: &'static str,
}

impl PeakRow {
    pub(super) fn new(report: &Report, peak: &PlatePeak) -> PeakRow {
        let (at_s_m, at_z_m) = coordinates(peak.at);
        PeakRow {
            name: peak.name,
            value: num(peak.load.si),
            unit: peak.load.quantity.si_symbol(),
            at_s_m,
            at_z_m,
            case: report.results.cases[peak.case_idx].name.clone(),
            bound: peak.bound.word(),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
pub(super) struct StrengthRow {
    plate: String,
    bound: &'static str,
    welds: Vec<WeldRow>,
    panel: Option<PanelRow>,
    reason: Option<String>,
}

impl StrengthRow {
    pub(super) fn new(report: &Report, result: &PlateResult) -> StrengthRow {
        let (panel, reason) = match &result.panel {
            Some(Ok(panel)) => (Some(PanelRow::new(panel)), None),
            Some(Err(reason)) => (None, Some(reason.clone())),
            None => (None, Some("the plate has no material".to_owned())),
        };
        StrengthRow {
            plate: report.study.section.plates[result.plate_idx].label(result.plate_idx),
            bound: result.bound.word(),
            welds: result.welds.iter().map(WeldRow::new).collect(),
            panel,
            reason,
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct WeldRow {
    at_s_m: Num,
    at_z_m: Num,
    alone: Option<Reaction>,
    hinged: Option<Reaction>,
    clamped: Option<Reaction>,
}

impl WeldRow {
    fn new(weld: &Weld) -> WeldRow {
        let (at_s_m, at_z_m) = coordinates(Some(weld.at));
        let [alone, hinged, clamped] = [weld.alone, weld.hinged, weld.clamped].map(|r| r.map(Reaction::new));
        WeldRow { at_s_m, at_z_m, alone, hinged, clamped }
    }
}

#[derive(Clone, Debug, Serialize)]
struct Reaction {
    force_n_per_m: Num,
    moment_n: Num,
}

impl Reaction {
    fn new(reaction: EndReaction) -> Reaction {
        Reaction { force_n_per_m: num(reaction.force_n_per_m), moment_n: num(reaction.moment_n) }
    }
}

#[derive(Clone, Debug, Serialize)]
struct PanelRow {
    from_m: Num,
    to_m: Num,
    width_m: Num,
    net_thickness_m: Num,
    stress_pa: Num,
    allowable_pa: Num,
    required_thickness_m: Num,
    deflection_m: Num,
    side_force_n_per_m: Num,
    is_in_range: bool,
}

impl PanelRow {
    fn new(panel: &PanelStrength) -> PanelRow {
        let strength = &panel.strength;
        PanelRow {
            from_m: num(panel.span.from_m),
            to_m: num(panel.span.to_m),
            width_m: num(panel.span.width_m),
            net_thickness_m: num(strength.net_thickness_m),
            stress_pa: num(strength.stress_pa),
            allowable_pa: num(strength.allowable_pa),
            required_thickness_m: num(strength.required_thickness_m),
            deflection_m: num(strength.deflection_m),
            side_force_n_per_m: num(panel.side_force_n_per_m()),
            is_in_range: strength.out_of_range.is_empty(),
        }
    }
}
