//! A study as the text of a version 1 scenario: one key a line, one edge a line, in an order that never changes, so
//! that two issues of a scenario can be compared line by line.

use crate::cases::{Accel, AccelUnit, Attitude, LoadCase};
use crate::geom::Point;
use crate::section::{EdgeKind, Obstacle, OutlineEdge, WidthLaw};
use crate::study::{Fill, Limit, Record, Study};

use super::VERSION;
use super::number::{deg, kpa, mm, number, percent};

const HEAD: &str = "\
// A brimwright scenario. The unit of a number is part of its key: _mm, _kpa, _deg.
// Axes: s to the right, z up. An edge of the outline begins at (s, z) and ends where the next one begins;
// sweep_deg bends it into an arc, positive to the left. Comments are lost when the program saves.
";

/// The whole text.
pub(super) fn text(study: &Study) -> String {
    let mut out = Text { text: HEAD.to_owned(), depth: 0 };
    out.open("(");
    out.key("version", &VERSION.to_string());
    out.key("title", &quoted(&study.title));
    out.key("author", &quoted(&study.author));
    out.key("revision", &quoted(&study.revision));
    out.key("notes", &quoted(&study.notes));
    out.key("gravity_m_per_s2", &number(study.gravity_m_per_s2));
    out.key("air_pressure_abs_kpa", &kpa(study.air_pressure_abs_pa));
    out.key("ullage_gage_kpa", &kpa(study.ullage_gage_pa));
    liquid(&mut out, study);
    out.key("fill", &fill(study.fill));
    width(&mut out, &study.section.width);
    out.list("outline", &study.section.outline, |out, edge| out.line(&format!("{},", outline_edge(edge))));
    out.list("obstacles", &study.section.obstacles, obstacle);
    out.list("points", &study.points, |out, point| {
        out.line(&format!("(name: {}, {}),", quoted(&point.name), at(point.at)));
    });
    out.key("moment_about", &format!("({})", at(study.moment_about)));
    out.list("cases", &study.cases, case);
    out.list("records", &study.records, record);
    out.list("verdict_notes", &study.verdict_notes, |out, note| {
        out.open("(");
        out.key("case", &quoted(&note.case));
        out.key("criterion", &quoted(&note.criterion));
        out.key("text", &quoted(&note.text));
        out.close("),");
    });
    out.close(")");
    out.text
}

/// Lines, indented by the depth of brackets.
struct Text {
    text: String,
    depth: usize,
}

impl Text {
    fn line(&mut self, line: &str) {
        self.text.extend(std::iter::repeat_n("    ", self.depth));
        self.text.push_str(line);
        self.text.push('\n');
    }

    fn open(&mut self, line: &str) {
        self.line(line);
        self.depth += 1;
    }

    fn close(&mut self, line: &str) {
        self.depth -= 1;
        self.line(line);
    }

    fn key(&mut self, key: &str, value: &str) {
        self.line(&format!("{key}: {value},"));
    }

    /// A text that may be left out when there is none.
    fn optional_text(&mut self, key: &str, text: &str) {
        if !text.is_empty() {
            self.key(key, &quoted(text));
        }
    }

    fn list<T>(&mut self, key: &str, items: &[T], item: impl Fn(&mut Text, &T)) {
        if items.is_empty() {
            return self.key(key, "[]");
        }
        self.open(&format!("{key}: ["));
        for i in items {
            item(self, i);
        }
        self.close("],");
    }
}

fn liquid(out: &mut Text, study: &Study) {
    let liquid = &study.liquid;
    out.open("liquid: (");
    out.key("name", &quoted(&liquid.name));
    out.key("density_kg_per_m3", &number(liquid.density_kg_per_m3));
    if let Some(pa) = liquid.vapour_pressure_abs_pa {
        out.key("vapour_pressure_abs_kpa", &kpa(pa));
    }
    if let Some(n_per_m) = liquid.surface_tension_n_per_m {
        out.key("surface_tension_n_per_m", &number(n_per_m));
    }
    out.close("),");
}

fn fill(fill: Fill) -> String {
    match fill {
        Fill::Volume(m3) => format!("volume_m3({})", number(m3)),
        Fill::Share(share) => format!("share_percent({})", percent(share)),
        Fill::Level(m) => format!("level_mm({})", mm(m)),
        Fill::Ullage(m) => format!("ullage_mm({})", mm(m)),
    }
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

fn case(out: &mut Text, case: &LoadCase) {
    out.open("(");
    out.key("name", &quoted(&case.name));
    out.key("accel", &accel(case.accel));
    match case.attitude {
        Attitude::Level => {}
        Attitude::GradePercent(grade) => out.key("attitude", &format!("grade_percent({})", number(grade))),
        Attitude::HeelDeg(heel) => out.key("attitude", &format!("heel_deg({})", number(heel))),
    }
    if let Some(onset_s) = case.onset_s {
        out.key("onset_s", &number(onset_s));
    }
    out.optional_text("source", &case.source);
    out.optional_text("note", &case.note);
    out.close("),");
}

fn accel(accel: Accel) -> String {
    let suffix = |unit| match unit {
        AccelUnit::MPerS2 => "m_per_s2",
        AccelUnit::G => "g",
    };
    match accel {
        Accel::Components { a_s, a_z, unit } => {
            format!("components_{}(s: {}, z: {})", suffix(unit), number(a_s), number(a_z))
        }
        Accel::Polar { magnitude, direction_deg, unit } => {
            let [size, direction] = [magnitude, direction_deg].map(number);
            format!("polar_{}(magnitude: {size}, direction_deg: {direction})", suffix(unit))
        }
    }
}

fn record(out: &mut Text, record: &Record) {
    let limit = match record.limit {
        Limit::WallPressure(pa) => format!("wall_pressure_gage_kpa({})", kpa(pa)),
        Limit::RoofPressure(pa) => format!("roof_pressure_gage_kpa({})", kpa(pa)),
        Limit::FreeboardAllowance(m) => format!("freeboard_allowance_mm({})", mm(m)),
        Limit::VapourMargin(pa) => format!("vapour_margin_kpa({})", kpa(pa)),
        Limit::CellVolume { m3, empty_to, full_from } => format!(
            "cell_volume(at_most_m3: {}, or_filled_to_percent: {}, or_from_percent: {})",
            number(m3),
            percent(empty_to),
            percent(full_from)
        ),
        Limit::PlateCoverage(share) => format!("plate_coverage_percent({})", percent(share)),
        Limit::PlateSpacing(m) => format!("plate_spacing_mm({})", mm(m)),
        Limit::OpenShareAtLeast(share) => format!("open_share_at_least_percent({})", percent(share)),
        Limit::OpenShareAtMost(share) => format!("open_share_at_most_percent({})", percent(share)),
        Limit::DrainPath => "drain_path".to_owned(),
        Limit::VentPath => "vent_path".to_owned(),
        Limit::RatedFlow { flow_m3_per_s, difference_m } => {
            format!("rated_flow(flow_m3_per_s: {}, difference_mm: {})", number(flow_m3_per_s), mm(difference_m))
        }
    };
    out.open("(");
    out.key("title", &quoted(&record.title));
    out.key("limit", &limit);
    out.optional_text("clause", &record.clause);
    out.optional_text("edition", &record.edition);
    out.optional_text("origin", &record.origin);
    out.key("confirmed", &record.confirmed.to_string());
    out.close("),");
}

fn at(point: Point) -> String {
    format!("s_mm: {}, z_mm: {}", mm(point.x), mm(point.y))
}

fn sweep(sweep_rad: f64) -> String {
    if sweep_rad == 0.0 { String::new() } else { format!(", sweep_deg: {}", deg(sweep_rad)) }
}

/// A text between quotes, on one line.
fn quoted(text: &str) -> String {
    let mut out = String::with_capacity(text.len() + 2);
    out.push('"');
    for c in text.chars() {
        match c {
            '"' => out.push_str("\\\""),
            '\\' => out.push_str("\\\\"),
            '\n' => out.push_str("\\n"),
            '\t' => out.push_str("\\t"),
            c if c.is_control() => out.push_str(&format!("\\u{{{:x}}}", c as u32)),
            c => out.push(c),
        }
    }
    out.push('"');
    out
}
