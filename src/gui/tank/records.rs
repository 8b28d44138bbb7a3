//! Requirement records: limits from a regulation, a standard or a customer, confirmed by the user or not.

use egui::{Align, Ui, pos2};

use crate::app::Edit;
use crate::gui::field;
use crate::gui::number::Number;
use crate::gui::{Desk, font, marks};
use crate::study::{Limit, Record};

use super::TankColumn;
use super::outline::{fields_ui, list_row_ui};

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

pub(super) fn records_ui(ui: &mut Ui, desk: &mut Desk, column: &mut TankColumn) {
    let records = &desk.study().records;
    let n_unconfirmed = records.iter().filter(|r| !r.confirmed).count();
    let note = match (records.len(), n_unconfirmed) {
        (0, _) => "none".to_owned(),
        (_, 0) => String::new(),
        (_, n) => format!("{n} unconfirmed"),
    };
    field::heading_ui(ui, desk.look, "Requirement records", &note);
    let mut toggled = None;
    for (i, record) in records.iter().enumerate() {
        let rect = field::row_rect(ui);
        let is_open = column.open_record == Some(i);
        let state = if record.confirmed { "confirmed" } else { "unconfirmed" };
        let spoken = format!("Record {}, {}, {state}", i + 1, record.title);
        let response = list_row_ui(ui, rect, desk, is_open, &record.title, &spoken, 46.0);
        let mark = pos2(rect.left() + 5.0, rect.center().y);
        marks::paint_record_mark(ui.painter(), mark, record.confirmed, desk.look);
        let measure = record.limit.measure();
        let sign = if record.limit.is_ceiling() { "≤" } else { "≥" };
        let number = format!("{sign} {}", measure.number(desk.units(), 3));
        let numbers = rect.with_max_x(field::number_right(rect));
        field::paint_fitting(ui, numbers, Align::Max, &number, font::figure(), desk.look.ink);
        let unit = rect.with_min_x(rect.right() - field::UNIT_COLUMN);
        let symbol = measure.quantity.unit(desk.units()).symbol;
        field::paint_fitting(ui, unit, Align::Min, symbol, font::small(), desk.look.ink3);
        if response.clicked() {
            toggled = Some(i);
        }
        if is_open {
            record_fields_ui(ui, desk, i);
        }
    }
    if field::link_row_ui(ui, "Add a record", desk.look).clicked() {
        let mut next = records.clone();
        next.push(Record {
            title: "Wall pressure".to_owned(),
            limit: Limit::WallPressure(25_000.0),
            clause: String::new(),
            edition: String::new(),
            origin: String::new(),
            confirmed: false,
        });
        toggled = Some(records.len());
        desk.edit(Edit::Records(next));
    }
    if let Some(i) = toggled {
        column.open_record = if column.open_record == Some(i) { None } else { Some(i) };
    }
}

/// The edit that confirms a record, or takes the confirmation back.
pub(crate) fn confirm(records: &[Record], i: usize, confirmed: bool) -> Edit {
    let mut next = records.to_vec();
    if let Some(record) = next.get_mut(i) {
        record.confirmed = confirmed;
    }
    Edit::Records(next)
}

fn record_fields_ui(ui: &mut Ui, desk: &mut Desk, i: usize) {
    let records = &desk.study().records;
    let record = &records[i];
    let with = |change: &dyn Fn(&mut Record)| {
        let mut next = records.clone();
        change(&mut next[i]);
        Edit::Records(next)
    };
    fields_ui(ui, desk, |ui, desk| {
        field::text_row_ui(ui, desk, ("record title", i), "Title", &record.title, |t| with(&|r| r.title = t.clone()));
        let (kind, value) = parts(record.limit);
        if let Some(kind) = field::choice_row_ui(ui, desk.look, "Limits", kind, &KINDS) {
            desk.edit(with(&|r| r.limit = limit(kind, value)));
        }
        let measure = record.limit.measure();
        let label = if record.limit.is_ceiling() { "At most" } else { "At least" };
        Number::new(("record value", i), label, measure.si, desk.unit(measure.quantity))
            .row_ui(ui, desk, |si| with(&|r| r.limit = limit(kind, si)));
        field::text_row_ui(ui, desk, ("record clause", i), "Clause", &record.clause, |t| {
            with(&|r| r.clause = t.clone())
        });
        field::text_row_ui(ui, desk, ("record edition", i), "Edition", &record.edition, |t| {
            with(&|r| r.edition = t.clone())
        });
        field::text_row_ui(ui, desk, ("record origin", i), "Origin", &record.origin, |t| {
            with(&|r| r.origin = t.clone())
        });
        let mut confirmed = record.confirmed;
        if ui.checkbox(&mut confirmed, "Confirmed against the text").changed() {
            desk.edit(confirm(records, i, confirmed));
        }
        if field::link_row_ui(ui, "Take this record out", desk.look).clicked() {
            let mut next = records.clone();
            next.remove(i);
            desk.edit(Edit::Records(next));
        }
    });
}

fn parts(limit: Limit) -> (Kind, f64) {
    match limit {
        Limit::WallPressure(v) => (Kind::WallPressure, v),
        Limit::RoofPressure(v) => (Kind::RoofPressure, v),
        Limit::FreeboardAllowance(v) => (Kind::FreeboardAllowance, v),
        Limit::VapourMargin(v) => (Kind::VapourMargin, v),
        Limit::CellVolume { m3, .. } => (Kind::CellVolume, m3),
        Limit::PlateCoverage(v) => (Kind::PlateCoverage, v),
        Limit::PlateSpacing(v) => (Kind::PlateSpacing, v),
        Limit::OpenShareAtLeast(v) => (Kind::OpenShareAtLeast, v),
        Limit::OpenShareAtMost(v) => (Kind::OpenShareAtMost, v),
        Limit::DrainPath => (Kind::DrainPath, 0.0),
        Limit::VentPath => (Kind::VentPath, 0.0),
        Limit::RatedFlow { difference_m, .. } => (Kind::RatedFlow, difference_m),
    }
}

fn limit(kind: Kind, value: f64) -> Limit {
    match kind {
        Kind::WallPressure => Limit::WallPressure(value),
        Kind::RoofPressure => Limit::RoofPressure(value),
        Kind::FreeboardAllowance => Limit::FreeboardAllowance(value),
        Kind::VapourMargin => Limit::VapourMargin(value),
        Kind::CellVolume => Limit::CellVolume { m3: value, empty_to: 0.2, full_from: 0.8 },
        Kind::PlateCoverage => Limit::PlateCoverage(value),
        Kind::PlateSpacing => Limit::PlateSpacing(value),
        Kind::OpenShareAtLeast => Limit::OpenShareAtLeast(value),
        Kind::OpenShareAtMost => Limit::OpenShareAtMost(value),
        Kind::DrainPath => Limit::DrainPath,
        Kind::VentPath => Limit::VentPath,
        Kind::RatedFlow => Limit::RatedFlow { flow_m3_per_s: 0.01, difference_m: value },
    }
}
