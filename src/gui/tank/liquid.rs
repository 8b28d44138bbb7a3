//! Liquid, fill, and the gas above it.

use egui::Ui;

use crate::app::Edit;
use crate::gui::Desk;
use crate::gui::field;
use crate::gui::number::Number;
use crate::liquid::Liquid;
use crate::units::Quantity;

use super::{TankColumn, fill};

pub(super) fn liquid_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    field::heading_ui(ui, desk.look, "Liquid", "");
    let liquid = &desk.study().liquid;
    let with = |change: &dyn Fn(&mut Liquid)| {
        let mut next = liquid.clone();
        change(&mut next);
        Edit::Liquid(next)
    };
    field::text_row_ui(ui, desk, "liquid name", "Name", &liquid.name, |name| with(&|l| l.name = name.clone()));
    Number::new("density", "Density", liquid.density_kg_per_m3, desk.unit(Quantity::Density)).row_ui(
        ui,
        desk,
        |si| with(&|l| l.density_kg_per_m3 = si),
    );
    Number::new("vapour pressure", "Vapour pressure", 0.0, desk.unit(Quantity::AbsolutePressure))
        .or_none(liquid.vapour_pressure_abs_pa)
        .optional()
        .try_row_ui(ui, desk, |si| Ok(with(&|l| l.vapour_pressure_abs_pa = si)));
    Number::new("surface tension", "Surface tension", 0.0, desk.unit(Quantity::SurfaceTension))
        .or_none(liquid.surface_tension_n_per_m)
        .optional()
        .try_row_ui(ui, desk, |si| Ok(with(&|l| l.surface_tension_n_per_m = si)))
        .on_hover_text("Where none is given, that of water at 20 °C stands in: it errs to the careful side");
    fill::fill_ui(ui, desk);
}

pub(super) fn gas_ui(ui: &mut Ui, desk: &mut Desk, _: &mut TankColumn) {
    field::heading_ui(ui, desk.look, "Gas and air", "");
    let study = desk.study();
    Number::new("ullage pressure", "Gas, gage", study.ullage_gage_pa, desk.unit(Quantity::GagePressure))
        .row_ui(ui, desk, Edit::UllageGage)
        .on_hover_text("Pressure of the gas above the liquid, over the outside air");
    Number::new("air pressure", "Outside air", study.air_pressure_abs_pa, desk.unit(Quantity::AbsolutePressure))
        .row_ui(ui, desk, Edit::AirPressure);
    Number::new("gravity", "Gravity", study.gravity_m_per_s2, desk.unit(Quantity::Acceleration)).row_ui(
        ui,
        desk,
        Edit::Gravity,
    );
}
