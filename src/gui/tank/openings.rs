//! Openings of one plate: from where to where along it, and how much of that is open.

use egui::{Align, Ui};

use crate::app::Edit;
use crate::gui::number::Number;
use crate::gui::{Desk, Selected, field, font, plating};
use crate::section::{Opening, OpeningShape, Plate};
use crate::units::{Measure, Quantity};

use super::outline::{fields_ui, list_row_ui};

/// Length of a new opening as a share of the plate's.
const NEW_SHARE: f64 = 0.2;

/// Numbers of a perforated field until the user gives others, m.
const NEW_PERFORATION: (f64, f64) = (0.02, 0.04);

/// A shape without its numbers.
#[derive(Clone, Copy, PartialEq)]
enum Kind {
    Share,
    Holes,
    Perforated,
}

const KINDS: [(Kind, &str); 3] =
    [(Kind::Share, "share of the width"), (Kind::Holes, "round holes"), (Kind::Perforated, "perforated")];

pub(super) fn openings_ui(ui: &mut Ui, desk: &mut Desk, plate_idx: usize, plate: &Plate) {
    let mut chosen = None;
    for (o, opening) in plate.openings.iter().enumerate() {
        let this = Selected::Opening(plate_idx, o);
        let is_open = desk.view.selected == Some(this);
        let own = if opening.name.is_empty() { format!("opening {}", o + 1) } else { opening.name.clone() };
        let rect = field::row_rect(ui);
        let spoken = format!("Opening {}, {own}", o + 1);
        let response = list_row_ui(ui, rect, desk, is_open, &own, &spoken, 60.0);
        let number = |m: f64| Measure::new(Quantity::Length, m).number(desk.units(), 4);
        let reach = format!("{} to {}", number(opening.from_m), number(opening.to_m));
        let numbers = rect.with_max_x(field::number_right(rect));
        field::paint_fitting(ui, numbers, Align::Max, &reach, font::body(), desk.look.ink);
        let unit = rect.with_min_x(rect.right() - field::UNIT_COLUMN);
        let symbol = desk.unit(Quantity::Length).symbol;
        field::paint_fitting(ui, unit, Align::Min, symbol, font::small(), desk.look.ink3);
        if response.clicked() {
            chosen = Some(if is_open { Selected::Plate(plate_idx) } else { this });
        }
        if is_open {
            fields_ui(ui, desk, |ui, desk| opening_fields_ui(ui, desk, plate_idx, plate, o));
        }
    }
    if field::link_row_ui(ui, "Add an opening", desk.look).clicked() {
        let (at_m, length_m) = (plating::roomiest_m(plate), NEW_SHARE * plate.length_m());
        if let Some((next, o)) = plating::with_opening(plate, at_m, length_m) {
            desk.edit(Edit::Plate(plate_idx, Box::new(next)));
            chosen = Some(Selected::Opening(plate_idx, o));
        }
    }
    if chosen.is_some() {
        desk.view.selected = chosen;
    }
}

fn opening_fields_ui(ui: &mut Ui, desk: &mut Desk, plate_idx: usize, plate: &Plate, o: usize) {
    let opening = &plate.openings[o];
    let length = desk.unit(Quantity::Length);
    let with = |change: &dyn Fn(&mut Opening)| {
        let mut next = plate.clone();
        change(&mut next.openings[o]);
        Edit::Plate(plate_idx, Box::new(next))
    };
    let id = |what: &'static str| (what, plate_idx, o);
    field::text_row_ui(ui, desk, id("opening name"), "Name", &opening.name, |name| with(&|o| o.name = name.clone()));
    let from = plating::corner_word(plate, 0).to_lowercase();
    Number::new(id("opening from"), "From", opening.from_m, length)
        .row_ui(ui, desk, |si| with(&|o| o.from_m = si))
        .on_hover_text(format!("Along the plate, counted from its {from}"));
    Number::new(id("opening to"), "To", opening.to_m, length)
        .row_ui(ui, desk, |si| with(&|o| o.to_m = si))
        .on_hover_text(format!("Along the plate, counted from its {from}"));
    let kind = match opening.shape {
        OpeningShape::Share(_) => Kind::Share,
        OpeningShape::Holes { .. } => Kind::Holes,
        OpeningShape::Perforated { .. } => Kind::Perforated,
    };
    if let Some(to) = field::choice_row_ui(ui, desk.look, "Open as", kind, &KINDS) {
        desk.edit(with(&|o| o.shape = first_shape(to)));
    }
    let mut shape = |ui: &mut Ui, label: &str, si: f64, quantity: Quantity, make: &dyn Fn(f64) -> OpeningShape| {
        Number::new(("opening number", label, plate_idx, o), label, si, desk.unit(quantity))
            .row_ui(ui, desk, |si| with(&|o| o.shape = make(si)));
    };
    match opening.shape {
        OpeningShape::Share(share) => shape(ui, "Open share", share, Quantity::Share, &OpeningShape::Share),
        OpeningShape::Holes { n } => shape(ui, "Number of holes", f64::from(n), Quantity::Count, &|n| {
            OpeningShape::Holes { n: n.round().clamp(0.0, f64::from(u32::MAX)) as u32 }
        }),
        OpeningShape::Perforated { diameter_m, pitch_m, is_staggered } => {
            let field_of = |diameter_m, pitch_m| OpeningShape::Perforated { diameter_m, pitch_m, is_staggered };
            shape(ui, "Hole diameter", diameter_m, Quantity::Length, &|si| field_of(si, pitch_m));
            shape(ui, "Hole pitch", pitch_m, Quantity::Length, &|si| field_of(diameter_m, si));
            let mut staggered = is_staggered;
            if ui.checkbox(&mut staggered, "Rows staggered").changed() {
                let next = OpeningShape::Perforated { diameter_m, pitch_m, is_staggered: staggered };
                desk.edit(with(&|o| o.shape = next));
            }
        }
    }
    if field::link_row_ui(ui, "Take this opening out", desk.look).clicked() {
        let removal = Selected::Opening(plate_idx, o).removal(desk.study());
        removal.into_iter().for_each(|edit| desk.edit(edit));
        desk.view.selected = Some(Selected::Plate(plate_idx));
    }
}

fn first_shape(kind: Kind) -> OpeningShape {
    let (diameter_m, pitch_m) = NEW_PERFORATION;
    match kind {
        Kind::Share => OpeningShape::Share(1.0),
        Kind::Holes => OpeningShape::Holes { n: 1 },
        Kind::Perforated => OpeningShape::Perforated { diameter_m, pitch_m, is_staggered: false },
    }
}
