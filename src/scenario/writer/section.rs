//! The section as text: width law, outline, obstacles, plates.

use crate::section::{EdgeKind, Obstacle, OutlineEdge, Section, WidthLaw};

use super::super::number::mm;
use super::lines::{Text, at, quoted, sweep};
use super::plates;

pub(super) fn write(out: &mut Text, section: &Section) {
    width(out, &section.width);
    out.list("outline", &section.outline, |out, edge| out.line(&format!("{},", outline_edge(edge))));
    out.optional_list("obstacles", &section.obstacles, obstacle);
    out.optional_list("plates", &section.plates, plates::write);
}

fn width(out: &mut Text, width: &WidthLaw) {
    let value = match *width {
        WidthLaw::Constant { width_m } => format!("constant(width_mm: {})", mm(width_m)),
        WidthLaw::RoundBarrel { diameter_m, bottom_z_m } => {
            format!("round_barrel(diameter_mm: {}, bottom_z_mm: {})", mm(diameter_m), mm(bottom_z_m))
        }
        WidthLaw::Oval { width_m, height_m, bottom_z_m } => {
            let [w, h, z] = [width_m, height_m, bottom_z_m].map(mm);
            format!("oval(width_mm: {w}, height_mm: {h}, bottom_z_mm: {z})")
        }
        WidthLaw::Table(ref rows) => {
            out.open("width: table([");
            for &(z_m, w_m) in rows {
                out.line(&format!("(z_mm: {}, width_mm: {}),", mm(z_m), mm(w_m)));
            }
            return out.close("]),");
        }
    };
    out.key("width", &value);
}

fn outline_edge(edge: &OutlineEdge) -> String {
    let mut text = format!("({}{}", at(edge.start), sweep(edge.sweep_rad));
    if edge.kind == EdgeKind::Mouth {
        text += ", kind: mouth";
    }
    if !edge.name.is_empty() {
        text += &format!(", name: {}", quoted(&edge.name));
    }
    text + ")"
}

fn obstacle(out: &mut Text, obstacle: &Obstacle) {
    out.open("(");
    out.key("name", &quoted(&obstacle.name));
    out.list("edges", &obstacle.vertices, |out, vertex| {
        out.line(&format!("({}{}),", at(vertex.start), sweep(vertex.sweep_rad)));
    });
    out.close("),");
}
