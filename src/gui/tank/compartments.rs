//! Compartments with a fill, and perhaps a liquid, of their own.

use egui::{Align, Ui};

use crate::app::Edit;
use crate::geom::Point;
use crate::gui::number::Number;
use crate::gui::{Desk, Selected, field, font, plating};
use crate::liquid::Liquid;
use crate::study::{Compartment, Fill};
use crate::units::{Measure, Quantity};

use super::TankColumn;
use super::outline::{fields_ui, list_row_ui};

/// A way of giving a fill, without its number.
#[derive(Clone, Copy, PartialEq)]
enum Way {
    Share,
    Volume,
    Level,
    Ullage,
}

const WAYS: [(Way, &str); 4] =
    [(Way::Share, "share"), (Way::Volume, "volume"), (Way::Level, "still level"), (Way::Ullage, "ullage height")];

pub(super) fn compartments_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    let all = &desk.study().compartments;
    field::heading_ui(ui, desk.look, "Compartments", if all.is_empty() { "none with an own fill" } else { "fill" });
    let mut chosen = None;
    for (i, compartment) in all.iter().enumerate() {
        let this = Selected::Compartment(i);
        let is_open = desk.view.selected == Some(this);
        let own =
            if compartment.name.is_empty() { format!("compartment {}", i + 1) } else { compartment.name.clone() };
        let rect = field::row_rect(ui);
        let response = list_row_ui(ui, rect, desk, is_open, &own, &format!("Compartment {}, {own}", i + 1), 46.0);
        let fill = measure(compartment.fill);
        let numbers = rect.with_max_x(field::number_right(rect));
        let number = fill.number(desk.units(), 3);
        field::paint_fitting(ui, numbers, Align::Max, &number, font::figure(), desk.look.ink);
        let unit = rect.with_min_x(rect.right() - field::UNIT_COLUMN);
        let symbol = desk.unit(fill.quantity).symbol;
        field::paint_fitting(ui, unit, Align::Min, symbol, font::small(), desk.look.ink3);
        if response.clicked() {
            chosen = Some(Some(this).filter(|_| !is_open));
        }
        if is_open {
            fields_ui(ui, desk, |ui, desk| compartment_fields_ui(ui, desk, i, compartment));
        }
    }
    if field::link_row_ui(ui, "Add a compartment", desk.look).clicked()
        && let Some(at) = plating::roomiest_place(&desk.study().section)
    {
        let mut next = all.clone();
        next.push(Compartment { name: String::new(), at, liquid: None, fill: desk.study().fill });
        desk.edit(Edit::Compartments(next));
        chosen = Some(Some(Selected::Compartment(all.len())));
    }
    if let Some(selected) = chosen {
        desk.view.selected = selected;
    }
}

fn compartment_fields_ui(ui: &mut Ui, desk: &mut Desk, i: usize, this: &Compartment) {
    let study = desk.study();
    let with = |change: &dyn Fn(&mut Compartment)| {
        let mut next = study.compartments.clone();
        change(&mut next[i]);
        Edit::Compartments(next)
    };
    let length = desk.unit(Quantity::Length);
    field::text_row_ui(ui, desk, ("compartment name", i), "Name", &this.name, |n| with(&|c| c.name = n.clone()));
    let at = this.at;
    Number::new(("compartment s", i), "A point inside, s", at.x, length)
        .row_ui(ui, desk, |s| with(&|c| c.at = Point::new(s, at.y)));
    Number::new(("compartment z", i), "A point inside, z", at.y, length)
        .row_ui(ui, desk, |z| with(&|c| c.at = Point::new(at.x, z)));
    let way = way_of(this.fill);
    if let Some(to) = field::choice_row_ui(ui, desk.look, "Filled by", way, &WAYS) {
        desk.edit(with(&|c| c.fill = first_fill(to, at)));
    }
    let fill = measure(this.fill);
    let label = match way {
        Way::Share => "Own fill",
        Way::Volume => "Own volume",
        Way::Level => "Own still level, z",
        Way::Ullage => "Own ullage height",
    };
    Number::new(("compartment fill", i), label, fill.si, desk.unit(fill.quantity))
        .row_ui(ui, desk, |si| with(&|c| c.fill = filled(way, si)));
    let mut has_liquid = this.liquid.is_some();
    if ui.checkbox(&mut has_liquid, "A liquid of its own").changed() {
        desk.edit(with(&|c| c.liquid = has_liquid.then(|| study.liquid.clone())));
    }
    if let Some(liquid) = &this.liquid {
        let with = |change: &dyn Fn(&mut Liquid)| {
            let mut next = liquid.clone();
            change(&mut next);
            with(&|c| c.liquid = Some(next.clone()))
        };
        field::text_row_ui(ui, desk, ("compartment liquid", i), "Liquid", &liquid.name, |name| {
            with(&|l| l.name = name.clone())
        });
        Number::new(
            ("compartment density", i),
            "Its density",
            liquid.density_kg_per_m3,
            desk.unit(Quantity::Density),
        )
        .row_ui(ui, desk, |si| with(&|l| l.density_kg_per_m3 = si));
        Number::new(("compartment vapour", i), "Its vapour pressure", 0.0, desk.unit(Quantity::AbsolutePressure))
            .or_none(liquid.vapour_pressure_abs_pa)
            .optional()
            .try_row_ui(ui, desk, |si| Ok(with(&|l| l.vapour_pressure_abs_pa = si)));
        Number::new(("compartment tension", i), "Its surface tension", 0.0, desk.unit(Quantity::SurfaceTension))
            .or_none(liquid.surface_tension_n_per_m)
            .optional()
            .try_row_ui(ui, desk, |si| Ok(with(&|l| l.surface_tension_n_per_m = si)));
    }
    if field::link_row_ui(ui, "Take this compartment out", desk.look).clicked() {
        let removal = Selected::Compartment(i).removal(study);
        removal.into_iter().for_each(|edit| desk.edit(edit));
        desk.view.selected = None;
    }
}

fn way_of(fill: Fill) -> Way {
    match fill {
        Fill::Share(_) => Way::Share,
        Fill::Volume(_) => Way::Volume,
        Fill::Level(_) => Way::Level,
        Fill::Ullage(_) => Way::Ullage,
    }
}

fn measure(fill: Fill) -> Measure {
    match fill {
        Fill::Share(si) => Measure::new(Quantity::Share, si),
        Fill::Volume(si) => Measure::new(Quantity::Volume, si),
        Fill::Level(si) | Fill::Ullage(si) => Measure::new(Quantity::Length, si),
    }
}

fn filled(way: Way, si: f64) -> Fill {
    match way {
        Way::Share => Fill::Share(si),
        Way::Volume => Fill::Volume(si),
        Way::Level => Fill::Level(si),
        Way::Ullage => Fill::Ullage(si),
    }
}

/// A fill to begin with, given another way: half full, empty, up to the compartment's point, or full.
fn first_fill(way: Way, at: Point) -> Fill {
    match way {
        Way::Share => Fill::Share(0.5),
        Way::Volume => Fill::Volume(0.0),
        Way::Level => Fill::Level(at.y),
        Way::Ullage => Fill::Ullage(0.0),
    }
}
