//! Load cases in a version 1 file.

use serde::Deserialize;

use crate::cases::{self, AccelUnit, LoadCase};

use super::super::number::Num;

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Case {
    name: String,
    accel: Accel,
    #[serde(default)]
    attitude: Attitude,
    onset_s: Option<Num>,
    duration_s: Option<Num>,
    #[serde(default)]
    release: bool,
    #[serde(default)]
    source: String,
    #[serde(default)]
    note: String,
}

#[derive(Deserialize)]
#[serde(rename_all = "snake_case", deny_unknown_fields)]
enum Accel {
    #[serde(rename = "components_m_per_s2")]
    ComponentsSi {
        s: Num,
        z: Num,
    },
    ComponentsG {
        s: Num,
        z: Num,
    },
    #[serde(rename = "polar_m_per_s2")]
    PolarSi {
        magnitude: Num,
        direction_deg: Num,
    },
    PolarG {
        magnitude: Num,
        direction_deg: Num,
    },
}

#[derive(Default, Deserialize)]
#[serde(rename_all = "snake_case")]
enum Attitude {
    #[default]
    Level,
    GradePercent(Num),
    HeelDeg(Num),
}

impl From<Case> for LoadCase {
    fn from(case: Case) -> LoadCase {
        let components = |s: Num, z: Num, unit| cases::Accel::Components { a_s: s.si(), a_z: z.si(), unit };
        let polar = |size: Num, direction: Num, unit| cases::Accel::Polar {
            magnitude: size.si(),
            direction_deg: direction.si(),
            unit,
        };
        LoadCase {
            name: case.name,
            accel: match case.accel {
                Accel::ComponentsSi { s, z } => components(s, z, AccelUnit::MPerS2),
                Accel::ComponentsG { s, z } => components(s, z, AccelUnit::G),
                Accel::PolarSi { magnitude, direction_deg } => polar(magnitude, direction_deg, AccelUnit::MPerS2),
                Accel::PolarG { magnitude, direction_deg } => polar(magnitude, direction_deg, AccelUnit::G),
            },
            attitude: match case.attitude {
                Attitude::Level => cases::Attitude::Level,
                Attitude::GradePercent(percent) => cases::Attitude::GradePercent(percent.si()),
                Attitude::HeelDeg(deg) => cases::Attitude::HeelDeg(deg.si()),
            },
            onset_s: case.onset_s.map(Num::si),
            duration_s: case.duration_s.map(Num::si),
            release: case.release,
            source: case.source,
            note: case.note,
        }
    }
}
