//! Load cases as text.

use crate::cases::{Accel, AccelUnit, Attitude, LoadCase};

use super::super::number::number;
use super::lines::{Text, quoted};

pub(super) fn write(out: &mut Text, case: &LoadCase) {
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
    if let Some(duration_s) = case.duration_s {
        out.key("duration_s", &number(duration_s));
    }
    if case.release {
        out.key("release", "true");
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
