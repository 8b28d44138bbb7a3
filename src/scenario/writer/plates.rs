//! Plates and their openings as text.

use crate::section::{Opening, OpeningShape, Panel, PanelEdges, Plate};

use super::super::number::{mm, percent};
use super::lines::{Text, at, quoted};

pub(super) fn write(out: &mut Text, plate: &Plate) {
    out.open("(");
    out.optional_text("name", &plate.name);
    out.list("points", &plate.points, |out, point| out.line(&format!("({}),", at(*point))));
    out.key("thickness_mm", &mm(plate.thickness_m));
    if plate.corrosion_m != 0.0 {
        out.key("corrosion_mm", &mm(plate.corrosion_m));
    }
    out.optional_text("material", &plate.material);
    if plate.panel != Panel::default() {
        out.key("panel", &panel(plate.panel));
    }
    out.optional_list("openings", &plate.openings, |out, o| out.line(&format!("{},", opening(o))));
    out.close("),");
}

fn panel(panel: Panel) -> String {
    let edges = match panel.edges {
        PanelEdges::SimplySupported => "simply_supported",
        PanelEdges::Clamped => "clamped",
    };
    let spacing = panel.stiffener_spacing_m.map(|m| format!("stiffener_spacing_mm: {}, ", mm(m)));
    format!("({}edges: {edges})", spacing.unwrap_or_default())
}

fn opening(opening: &Opening) -> String {
    let name = match opening.name.as_str() {
        "" => String::new(),
        name => format!("name: {}, ", quoted(name)),
    };
    let [from, to] = [opening.from_m, opening.to_m].map(mm);
    format!("({name}from_mm: {from}, to_mm: {to}, shape: {})", shape(opening.shape))
}

fn shape(shape: OpeningShape) -> String {
    match shape {
        OpeningShape::Share(share) => format!("share_percent({})", percent(share)),
        OpeningShape::Holes { n } => format!("holes(n: {n})"),
        OpeningShape::Perforated { diameter_m, pitch_m, is_staggered } => {
            let [diameter, pitch] = [diameter_m, pitch_m].map(mm);
            let rows = if is_staggered { ", staggered: true" } else { "" };
            format!("perforated(hole_diameter_mm: {diameter}, pitch_mm: {pitch}{rows})")
        }
    }
}
