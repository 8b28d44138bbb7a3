//! The width law: which, and its numbers.

use egui::{Align, Ui};

use crate::app::Edit;
use crate::gui::field;
use crate::gui::number::Number;
use crate::gui::{Desk, font};
use crate::section::WidthLaw;
use crate::units::Quantity;

use super::TankColumn;

/// The laws, without their numbers.
#[derive(Clone, Copy, PartialEq)]
enum Law {
    Constant,
    RoundBarrel,
    Oval,
    Table,
}

const LAWS: [(Law, &str); 4] = [
    (Law::Constant, "constant"),
    (Law::RoundBarrel, "round barrel, lengthwise"),
    (Law::Oval, "oval barrel, lengthwise"),
    (Law::Table, "table"),
];

pub(super) fn width_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    field::heading_ui(ui, desk.look, "Width law", "");
    let width = &desk.study().section.width;
    let law = match width {
        WidthLaw::Constant { .. } => Law::Constant,
        WidthLaw::RoundBarrel { .. } => Law::RoundBarrel,
        WidthLaw::Oval { .. } => Law::Oval,
        WidthLaw::Table(_) => Law::Table,
    };
    if let Some(to) = field::choice_row_ui(ui, desk.look, "Law", law, &LAWS) {
        desk.edit(Edit::Width(converted(desk, to)));
    }
    let length = desk.unit(Quantity::Length);
    match *width {
        WidthLaw::Constant { width_m } => {
            Number::new("width", "Width", width_m, length)
                .row_ui(ui, desk, |width_m| Edit::Width(WidthLaw::Constant { width_m }));
        }
        WidthLaw::RoundBarrel { diameter_m, bottom_z_m } => {
            Number::new("barrel diameter", "Diameter", diameter_m, length)
                .row_ui(ui, desk, |diameter_m| Edit::Width(WidthLaw::RoundBarrel { diameter_m, bottom_z_m }));
            Number::new("barrel bottom", "Lowest line, z", bottom_z_m, length)
                .row_ui(ui, desk, |bottom_z_m| Edit::Width(WidthLaw::RoundBarrel { diameter_m, bottom_z_m }));
        }
        WidthLaw::Oval { width_m, height_m, bottom_z_m } => {
            let law = |width_m, height_m, bottom_z_m| Edit::Width(WidthLaw::Oval { width_m, height_m, bottom_z_m });
            Number::new("oval width", "Full width", width_m, length)
                .row_ui(ui, desk, |si| law(si, height_m, bottom_z_m));
            Number::new("oval height", "Full height", height_m, length)
                .row_ui(ui, desk, |si| law(width_m, si, bottom_z_m));
            Number::new("oval bottom", "Lowest line, z", bottom_z_m, length)
                .row_ui(ui, desk, |si| law(width_m, height_m, si));
        }
        WidthLaw::Table(ref rows) => table_ui(ui, desk, rows),
    }
}

fn table_ui(ui: &mut Ui, desk: &mut Desk, rows: &[(f64, f64)]) {
    let length = desk.unit(Quantity::Length);
    let with = |i: usize, row: (f64, f64)| {
        let mut next = rows.to_vec();
        next[i] = row;
        Ok(Edit::Width(WidthLaw::Table(next)))
    };
    for (i, &(z, w)) in rows.iter().enumerate() {
        let rect = field::row_rect(ui);
        let (left, right) = rect.split_left_right_at_fraction(0.5);
        let labels = (format!("Height of width row {}", i + 1), format!("Width of row {}", i + 1));
        field::paint_fitting(ui, left, Align::Min, "z", font::body(), desk.look.ink2);
        Number::new(("width z", i), &labels.0, z, length).number_ui(
            ui,
            left.with_min_x(left.left() + 10.0),
            desk,
            |si| with(i, (si.unwrap_or(z), w)),
        );
        field::paint_fitting(ui, right, Align::Min, "w", font::body(), desk.look.ink2);
        Number::new(("width w", i), &labels.1, w, length).number_ui(
            ui,
            right.with_min_x(right.left() + 12.0),
            desk,
            |si| with(i, (z, si.unwrap_or(w))),
        );
    }
    if field::link_row_ui(ui, "Add a row", desk.look).clicked() {
        let mut next = rows.to_vec();
        let step = rows.windows(2).next_back().map_or(1.0, |pair| pair[1].0 - pair[0].0);
        let (z, w) = rows.last().copied().unwrap_or((0.0, 1.0));
        next.push((z + step, w));
        desk.edit(Edit::Width(WidthLaw::Table(next)));
    }
    if rows.len() > 2 && field::link_row_ui(ui, "Take the last row out", desk.look).clicked() {
        desk.edit(Edit::Width(WidthLaw::Table(rows[..rows.len() - 1].to_vec())));
    }
}

/// Another law that starts from the size of the section and of the present law.
fn converted(desk: &Desk, to: Law) -> WidthLaw {
    let zs = || desk.study().section.outline.iter().map(|edge| edge.start.y);
    let (low, high) = (zs().fold(f64::INFINITY, f64::min), zs().fold(f64::NEG_INFINITY, f64::max));
    let (low, high) = if low < high { (low, high) } else { (0.0, 1.0) };
    let width_m = match desk.study().section.width {
        WidthLaw::Constant { width_m } | WidthLaw::Oval { width_m, .. } => width_m,
        WidthLaw::RoundBarrel { diameter_m, .. } => diameter_m,
        WidthLaw::Table(ref rows) => rows.iter().map(|row| row.1).fold(0.0, f64::max),
    };
    match to {
        Law::Constant => WidthLaw::Constant { width_m },
        Law::RoundBarrel => WidthLaw::RoundBarrel { diameter_m: high - low, bottom_z_m: low },
        Law::Oval => WidthLaw::Oval { width_m, height_m: high - low, bottom_z_m: low },
        Law::Table => WidthLaw::Table(vec![(low, width_m), (high, width_m)]),
    }
}
