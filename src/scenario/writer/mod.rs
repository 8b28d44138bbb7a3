//! A study as the text of a version 1 scenario: one key a line, one edge a line, in an order that never changes, so
//! that two issues of a scenario can be compared line by line. What a scenario may leave out is written only where it
//! says something.

mod cases;
mod contents;
mod lines;
mod materials;
mod plates;
mod records;
mod section;

use crate::study::{DISCHARGE_COEFFICIENT, Study};

use super::VERSION;
use super::number::{kpa, number};

use lines::{Text, at, quoted};

const HEAD: &str = "\
// A brimwright scenario. The unit of a number is part of its key: _mm, _kpa, _deg.
// Axes: s to the right, z up. An edge of the outline begins at (s, z) and ends where the next one begins;
// sweep_deg bends it into an arc, positive to the left. Comments are lost when the program saves.
";

/// The whole text.
pub(super) fn text(study: &Study) -> String {
    let mut out = Text::default();
    out.open("(");
    out.key("version", &VERSION.to_string());
    out.key("title", &quoted(&study.title));
    out.key("author", &quoted(&study.author));
    out.key("revision", &quoted(&study.revision));
    out.key("notes", &quoted(&study.notes));
    out.key("gravity_m_per_s2", &number(study.gravity_m_per_s2));
    out.key("air_pressure_abs_kpa", &kpa(study.air_pressure_abs_pa));
    out.key("ullage_gage_kpa", &kpa(study.ullage_gage_pa));
    contents::liquid(&mut out, &study.liquid);
    out.key("fill", &contents::fill(study.fill));
    out.optional_list("compartments", &study.compartments, contents::compartment);
    section::write(&mut out, &study.section);
    out.optional_list("materials", &study.materials, materials::write);
    // As text, so that what is left out is what is read again.
    let c_d = number(study.discharge_coefficient);
    if c_d != number(DISCHARGE_COEFFICIENT) {
        out.key("discharge_coefficient", &c_d);
    }
    if let Some(sump) = study.sump {
        out.key("sump", &format!("({})", at(sump)));
    }
    out.optional_list("points", &study.points, |out, point| {
        out.line(&format!("(name: {}, {}),", quoted(&point.name), at(point.at)));
    });
    out.key("moment_about", &format!("({})", at(study.moment_about)));
    out.optional_list("cases", &study.cases, cases::write);
    out.optional_list("records", &study.records, records::write);
    out.optional_list("verdict_notes", &study.verdict_notes, |out, note| {
        out.open("(");
        out.key("case", &quoted(&note.case));
        out.key("criterion", &quoted(&note.criterion));
        out.key("text", &quoted(&note.text));
        out.close("),");
    });
    out.close(")");
    HEAD.to_owned() + &out.into_string()
}
