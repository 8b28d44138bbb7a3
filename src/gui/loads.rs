//! The settled state of the chosen case in numbers: the liquid, and its load on every edge. Computes nothing.

use egui::{Align, Key, Layout, RichText, Ui};
use egui_extras::{Column, TableBuilder};

use crate::analysis::{CaseResult, EdgeLoad, Settled};
use crate::geom::{Point, Vec2};
use crate::units::{Measure, Quantity, UnitSystem};

use super::{Look, font, modals};

/// Shows the box. Gives whether it was closed.
pub fn loads_ui(ctx: &egui::Context, look: &Look, case: &CaseResult, units: UnitSystem) -> bool {
    let mut is_closed = false;
    let modal = modals::modal("settled state and loads", look).show(ctx, |ui| {
        ui.set_width(760.0);
        let title = format!("{}, settled state and loads", case.name);
        ui.label(RichText::new(title).font(font::title()).color(look.ink));
        match &case.settled {
            Ok(settled) => settled_ui(ui, look, settled, units),
            Err(reason) => {
                ui.label(RichText::new(format!("not judged: {reason}")).color(look.ink2));
            }
        }
        ui.add_space(8.0);
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            is_closed = ui.button("Close").clicked() || ui.input(|i| i.key_pressed(Key::Enter));
        });
    });
    is_closed || modal.should_close()
}

fn settled_ui(ui: &mut Ui, look: &Look, settled: &Settled, units: UnitSystem) {
    let text = |quantity, si| Measure::new(quantity, si).text(units);
    let place = |p: Point| place_words(p, units);
    let facts = [
        format!(
            "{} stays, {} spilled, {} of liquid",
            text(Quantity::Volume, settled.volume_m3),
            text(Quantity::Volume, settled.spilled_m3),
            if settled.pools.len() == 1 { "one pool".to_owned() } else { format!("{} pools", settled.pools.len()) },
        ),
        format!("centroid {}, highest liquid {}", place(settled.centroid), place(settled.highest_wetted)),
        format!(
            "gage pressure up to {} at {}, absolute pressure down to {}",
            text(Quantity::GagePressure, settled.peak_pa),
            place(settled.peak_at),
            text(Quantity::AbsolutePressure, settled.lowest_abs_pa),
        ),
    ];
    for fact in facts {
        ui.label(RichText::new(fact).color(look.ink2));
    }
    ui.add_space(6.0);
    let words = "Load of the liquid on each edge, gas left out; moments about the moment point, counter-clockwise.";
    ui.label(RichText::new(words).font(font::small()).color(look.ink3));
    ui.add_space(4.0);
    table_ui(ui, look, settled, units);
}

fn table_ui(ui: &mut Ui, look: &Look, settled: &Settled, units: UnitSystem) {
    const HEADS: [&str; 7] = ["Edge", "wetted", "force s", "force z", "moment", "acts at s, z", "peak"];
    let figure = |text: String| RichText::new(text).font(font::figure()).color(look.ink);
    let rows: Vec<&EdgeLoad> = settled.edges.iter().filter(|e| e.is_wall).collect();
    let mut sums = vec![("all together", settled.total_force_n, settled.total_moment_n_m)];
    if settled.sides_force_n != Vec2::zeros() {
        sums.insert(0, ("side walls, by the width law", settled.sides_force_n, settled.sides_moment_n_m));
    }
    TableBuilder::new(ui)
        .striped(false)
        .cell_layout(Layout::right_to_left(Align::Center))
        .column(Column::exact(170.0).clip(true))
        .columns(Column::exact(78.0), 4)
        .column(Column::exact(128.0))
        .column(Column::remainder())
        .max_scroll_height(300.0)
        .header(21.0, |mut header| {
            for (i, head) in HEADS.into_iter().enumerate() {
                header.col(|ui| cell_ui(ui, i == 0, RichText::new(head).color(look.ink3)));
            }
        })
        .body(|body| {
            body.rows(21.0, rows.len() + sums.len(), |mut row| {
                let cells = match rows.get(row.index()) {
                    Some(edge) => edge_cells(edge, units),
                    None => {
                        let (name, force, moment) = sums[row.index() - rows.len()];
                        load_cells(name, String::new(), force, moment, units)
                    }
                };
                for (i, cell) in cells.into_iter().enumerate() {
                    row.col(|ui| cell_ui(ui, i == 0, figure(cell)));
                }
            });
        });
}

fn cell_ui(ui: &mut Ui, is_name: bool, text: RichText) {
    if is_name {
        ui.with_layout(Layout::left_to_right(Align::Center), |ui| ui.label(text));
    } else {
        ui.label(text);
    }
}

fn edge_cells(edge: &EdgeLoad, units: UnitSystem) -> [String; 7] {
    let Some((peak_pa, _)) = edge.peak else {
        return [edge.name.clone(), "dry".to_owned(), "".into(), "".into(), "".into(), "".into(), "".into()];
    };
    let wetted = Measure::new(Quantity::Length, edge.wetted_length_m).text(units);
    let mut cells = load_cells(&edge.name, wetted, edge.force_n, edge.moment_n_m, units);
    cells[5] = edge.acts_at.map_or_else(String::new, |p| place_words(p, units));
    cells[6] = Measure::new(Quantity::GagePressure, peak_pa).text(units);
    cells
}

fn load_cells(name: &str, wetted: String, force: Vec2, moment: f64, units: UnitSystem) -> [String; 7] {
    let load = |si| Measure::new(Quantity::Force, si).text(units);
    let moment = Measure::new(Quantity::Moment, moment).text(units);
    [name.to_owned(), wetted, load(force.x), load(force.y), moment, String::new(), String::new()]
}

fn place_words(p: Point, units: UnitSystem) -> String {
    let [s, z] = [p.x, p.y].map(|x| Measure::new(Quantity::Length, x).number(units, 4));
    format!("{s}, {z} {}", Quantity::Length.unit(units).symbol)
}
