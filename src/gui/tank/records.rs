//! Requirement records: limits from a regulation, a standard or a customer, confirmed by the user or not.

use egui::{Align, Ui, pos2};

use crate::app::Edit;
use crate::gui::{Desk, field, font, marks};
use crate::study::{Limit, Record};

use super::outline::{fields_ui, list_row_ui};
use super::{TankColumn, limits};

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
        if limits::has_number(record.limit) {
            let measure = record.limit.measure();
            let sign = if record.limit.is_ceiling() { "≤" } else { "≥" };
            let number = format!("{sign} {}", measure.number(desk.units(), 3));
            let numbers = rect.with_max_x(field::number_right(rect));
            field::paint_fitting(ui, numbers, Align::Max, &number, font::figure(), desk.look.ink);
            let unit = rect.with_min_x(rect.right() - field::UNIT_COLUMN);
            let symbol = measure.quantity.unit(desk.units()).symbol;
            field::paint_fitting(ui, unit, Align::Min, symbol, font::small(), desk.look.ink3);
        } else {
            field::paint_fitting(ui, rect, Align::Max, "from every cell", font::small(), desk.look.ink2);
        }
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
        limits::limit_ui(ui, desk, i, record.limit, &|limit| with(&|r| r.limit = limit));
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
