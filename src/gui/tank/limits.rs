//! What a requirement record limits, and its numbers.

use egui::Ui;

use crate::app::Edit;
use crate::gui::number::Number;
use crate::gui::{Desk, field};
use crate::study::Limit;
use crate::units::Quantity;

/// What a record limits, without its value.
#[derive(Clone, Copy, PartialEq)]
enum Kind {
    WallPressure,
    RoofPressure,
    FreeboardAllowance,
    VapourMargin,
    CellVolume,
    PlateCoverage,
    PlateSpacing,
    OpenShareAtLeast,
    OpenShareAtMost,
    DrainPath,
    VentPath,
    RatedFlow,
}

const KINDS: [(Kind, &str); 12] = [
    (Kind::WallPressure, "wall pressure"),
    (Kind::RoofPressure, "roof pressure"),
    (Kind::FreeboardAllowance, "freeboard allowance"),
    (Kind::VapourMargin, "vapour margin"),
    (Kind::CellVolume, "cell volume"),
    (Kind::PlateCoverage, "plate coverage"),
    (Kind::PlateSpacing, "plate spacing"),
    (Kind::OpenShareAtLeast, "open share, least"),
    (Kind::OpenShareAtMost, "open share, most"),
    (Kind::DrainPath, "drain path"),
    (Kind::VentPath, "vent path"),
    (Kind::RatedFlow, "rated flow"),
];

/// The kind of the limit, and its numbers.
pub(super) fn limit_ui(ui: &mut Ui, desk: &mut Desk, i: usize, limit: Limit, edit: &dyn Fn(Limit) -> Edit) {
    let kind = kind_of(limit);
    if let Some(to) = field::choice_row_ui(ui, desk.look, "Limits", kind, &KINDS) {
        let next = first(to);
        let is_alike = has_number(limit) && next.measure().quantity == limit.measure().quantity;
        desk.edit(edit(if is_alike { with_value(next, limit.measure().si) } else { next }));
    }
    let number = |ui: &mut Ui, desk: &mut Desk, label: &str, si: f64, quantity, make: &dyn Fn(f64) -> Limit| {
        Number::new(("record number", label, i), label, si, desk.unit(quantity)).row_ui(ui, desk, |si| edit(make(si)))
    };
    if has_number(limit) {
        let measure = limit.measure();
        let label = if limit.is_ceiling() { "At most" } else { "At least" };
        number(ui, desk, label, measure.si, measure.quantity, &|si| with_value(limit, si));
    }
    match limit {
        Limit::CellVolume { m3, empty_to, full_from } => {
            number(ui, desk, "Or filled up to", empty_to, Quantity::Share, &|empty_to| Limit::CellVolume {
                m3,
                empty_to,
                full_from,
            })
            .on_hover_text("A larger cell may stay as empty as this");
            number(ui, desk, "Or filled from", full_from, Quantity::Share, &|full_from| Limit::CellVolume {
                m3,
                empty_to,
                full_from,
            })
            .on_hover_text("A larger cell may be as full as this, or fuller");
        }
        Limit::RatedFlow { flow_m3_per_s, difference_m } => {
            number(ui, desk, "At a flow of", flow_m3_per_s, Quantity::Flow, &|flow_m3_per_s| Limit::RatedFlow {
                flow_m3_per_s,
                difference_m,
            })
            .on_hover_text("Levels on both sides of a plate may differ by the limit while this flow passes");
        }
        _ => {}
    }
}

/// Whether the limit is a number: a path is there or not.
pub(super) fn has_number(limit: Limit) -> bool {
    !matches!(limit, Limit::DrainPath | Limit::VentPath)
}

/// The limit with another value.
fn with_value(limit: Limit, value: f64) -> Limit {
    match limit {
        Limit::WallPressure(_) => Limit::WallPressure(value),
        Limit::RoofPressure(_) => Limit::RoofPressure(value),
        Limit::FreeboardAllowance(_) => Limit::FreeboardAllowance(value),
        Limit::VapourMargin(_) => Limit::VapourMargin(value),
        Limit::CellVolume { empty_to, full_from, .. } => Limit::CellVolume { m3: value, empty_to, full_from },
        Limit::PlateCoverage(_) => Limit::PlateCoverage(value),
        Limit::PlateSpacing(_) => Limit::PlateSpacing(value),
        Limit::OpenShareAtLeast(_) => Limit::OpenShareAtLeast(value),
        Limit::OpenShareAtMost(_) => Limit::OpenShareAtMost(value),
        Limit::DrainPath => Limit::DrainPath,
        Limit::VentPath => Limit::VentPath,
        Limit::RatedFlow { flow_m3_per_s, .. } => Limit::RatedFlow { flow_m3_per_s, difference_m: value },
    }
}

fn kind_of(limit: Limit) -> Kind {
    match limit {
        Limit::WallPressure(_) => Kind::WallPressure,
        Limit::RoofPressure(_) => Kind::RoofPressure,
        Limit::FreeboardAllowance(_) => Kind::FreeboardAllowance,
        Limit::VapourMargin(_) => Kind::VapourMargin,
        Limit::CellVolume { .. } => Kind::CellVolume,
        Limit::PlateCoverage(_) => Kind::PlateCoverage,
        Limit::PlateSpacing(_) => Kind::PlateSpacing,
        Limit::OpenShareAtLeast(_) => Kind::OpenShareAtLeast,
        Limit::OpenShareAtMost(_) => Kind::OpenShareAtMost,
        Limit::DrainPath => Kind::DrainPath,
        Limit::VentPath => Kind::VentPath,
        Limit::RatedFlow { .. } => Kind::RatedFlow,
    }
}

/// A limit of this kind to begin with: round numbers that limit nothing in particular, for the user to type over.
fn first(kind: Kind) -> Limit {
    match kind {
        Kind::WallPressure => Limit::WallPressure(25_000.0),
        Kind::RoofPressure => Limit::RoofPressure(10_000.0),
        Kind::FreeboardAllowance => Limit::FreeboardAllowance(0.05),
        Kind::VapourMargin => Limit::VapourMargin(10_000.0),
        Kind::CellVolume => Limit::CellVolume { m3: 5.0, empty_to: 0.2, full_from: 0.8 },
        Kind::PlateCoverage => Limit::PlateCoverage(0.7),
        Kind::PlateSpacing => Limit::PlateSpacing(1.5),
        Kind::OpenShareAtLeast => Limit::OpenShareAtLeast(0.05),
        Kind::OpenShareAtMost => Limit::OpenShareAtMost(0.3),
        Kind::DrainPath => Limit::DrainPath,
        Kind::VentPath => Limit::VentPath,
        Kind::RatedFlow => Limit::RatedFlow { flow_m3_per_s: 0.01, difference_m: 0.1 },
    }
}
