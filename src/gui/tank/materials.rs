//! Materials of the scenario's own, typed exactly; and the choice among them and those that the program brings.

use egui::{Align, Label, Popup, RichText, ScrollArea, Ui};

use crate::app::Edit;
use crate::gui::number::Number;
use crate::gui::{Desk, field, font};
use crate::material::{self, Material};
use crate::units::{Measure, Quantity};

use super::TankColumn;
use super::outline::{fields_ui, list_row_ui};
use super::plates::measure_ui;

pub(super) fn materials_ui(ui: &mut Ui, desk: &mut Desk, column: &mut TankColumn) {
    let all = &desk.study().materials;
    field::heading_ui(ui, desk.look, "Own materials", if all.is_empty() { "none" } else { "yield" });
    let mut toggled = None;
    for (i, material) in all.iter().enumerate() {
        let is_open = column.open_material == Some(i);
        let name = if material.name.is_empty() { "without a name" } else { &material.name };
        let rect = field::row_rect(ui);
        let spoken = format!("Material {}, {name}", i + 1);
        let response = list_row_ui(ui, rect, desk, is_open, name, &spoken, 36.0);
        if material.yield_pa.is_finite() {
            measure_ui(ui, rect, desk, Measure::new(Quantity::Stress, material.yield_pa), 3);
        }
        if response.clicked() {
            toggled = Some(i);
        }
        if is_open {
            fields_ui(ui, desk, |ui, desk| material_fields_ui(ui, desk, i, material));
        }
    }
    if field::link_row_ui(ui, "Add a material", desk.look).clicked() {
        let mut next = all.clone();
        next.push(first_material(all));
        toggled = Some(all.len());
        desk.edit(Edit::Materials(next));
    }
    if let Some(i) = toggled {
        column.open_material = if column.open_material == Some(i) { None } else { Some(i) };
    }
}

/// Where the numbers of a plate's material come from, and the choice of another one by name.
pub(super) fn material_choice_ui(ui: &mut Ui, desk: &Desk, now: &str) -> Option<String> {
    let (look, study) = (desk.look, desk.study());
    if !now.is_empty() {
        let (words, hint) = match study.material(now) {
            Some(m) => (source_words(m), format!("{}; {}", source_words(m), m.status)),
            None => ("not known", "Neither among the own materials nor in the table".to_owned()),
        };
        let rect = field::row_rect(ui);
        let response = ui.interact(rect, ui.next_auto_id().with("material source"), egui::Sense::hover());
        let spoken = format!("Source of the material, {words}");
        response.widget_info(|| egui::WidgetInfo::labeled(egui::Role::Label, true, &spoken));
        field::paint_fitting(ui, rect, Align::Min, "Source", font::body(), look.ink2);
        let right = rect.with_min_x(rect.left() + 76.0);
        field::paint_fitting(ui, right, Align::Max, words, font::small(), look.ink2);
        response.on_hover_text(hint);
    }
    let rect = field::row_rect(ui);
    field::paint_fitting(ui, rect.with_max_x(rect.center().x), Align::Min, "From the table", font::body(), look.ink2);
    let right = rect.with_min_x(rect.center().x);
    let response = field::link_ui(ui, right, Align::Max, "choose", "From the table, choose", look);
    let mut chosen = None;
    Popup::menu(&response).accessible_name("Materials").width(300.0).show(|ui| {
        ScrollArea::vertical().max_height(420.0).show(ui, |ui| {
            let own = |m: &Material| study.materials.iter().any(|own| own.name == m.name);
            let shipped = material::table().iter().filter(|m| !own(m));
            for m in study.materials.iter().chain(shipped) {
                if ui.selectable_label(m.name == now, &m.name).clicked() {
                    chosen = Some(m.name.clone());
                }
                let own = if own(m) { "own; " } else { "" };
                let stress = desk.text(Measure::new(Quantity::Stress, m.yield_pa));
                let words = format!("{own}yield {stress}; {}", source_words(m));
                ui.add(Label::new(RichText::new(words).font(font::small()).color(look.ink3)).truncate());
            }
        });
    });
    chosen
}

fn material_fields_ui(ui: &mut Ui, desk: &mut Desk, i: usize, this: &Material) {
    let with = |change: &dyn Fn(&mut Material)| {
        let mut next = this.clone();
        change(&mut next);
        Edit::Material(i, Box::new(next))
    };
    field::text_row_ui(ui, desk, ("material name", i), "Name", &this.name, |name| with(&|m| m.name = name.clone()));
    let stress = desk.unit(Quantity::Stress);
    Number::new(("material yield", i), "Yield stress", this.yield_pa, stress)
        .row_ui(ui, desk, |si| with(&|m| m.yield_pa = si))
        .on_hover_text("Yield or 0.2 % proof stress as welded");
    Number::new(("material modulus", i), "Young's modulus", this.modulus_pa, stress)
        .row_ui(ui, desk, |si| with(&|m| m.modulus_pa = si));
    let ratio = desk.unit(Quantity::Ratio);
    Number::new(("material poisson", i), "Poisson's ratio", this.poisson, ratio)
        .row_ui(ui, desk, |si| with(&|m| m.poisson = si));
    Number::new(("material density", i), "Its density", this.density_kg_per_m3, desk.unit(Quantity::Density)).row_ui(
        ui,
        desk,
        |si| with(&|m| m.density_kg_per_m3 = si),
    );
    Number::new(("material factor", i), "Factor", this.factor, ratio)
        .row_ui(ui, desk, |si| with(&|m| m.factor = si))
        .on_hover_text("Yield over allowable stress: the code that applies sets it");
    field::text_row_ui(ui, desk, ("material source", i), "Source", &this.source, |t| with(&|m| m.source = t.clone()));
    let study = desk.study();
    let plates = study.section.plates.iter().enumerate().filter(|(_, plate)| plate.material == this.name);
    let users: Vec<String> = plates.map(|(k, plate)| plate.label(k)).collect();
    if !users.is_empty() {
        let words = format!("Stays while it is used by {}", users.join(", "));
        ui.add(Label::new(RichText::new(words).font(font::small()).color(desk.look.ink2)).wrap());
    } else if field::link_row_ui(ui, "Take this material out", desk.look).clicked() {
        let mut next = study.materials.clone();
        next.remove(i);
        desk.edit(Edit::Materials(next));
    }
}

/// A material to begin with: the numbers of the first of the table, under a name that is free.
fn first_material(own: &[Material]) -> Material {
    let is_taken = |name: &str| own.iter().any(|m| m.name == name) || material::named(name).is_some();
    let name = (1..).map(|k| format!("material {k}")).find(|name| !is_taken(name)).unwrap_or_default();
    let like = &material::table()[0];
    Material { name, source: String::new(), status: Material::OWN_STATUS.to_owned(), ..like.clone() }
}

fn source_words(material: &Material) -> &str {
    if material.source.is_empty() { "no source given" } else { &material.source }
}
