//! The study that `New` starts from: a plain open box, half full of water, at rest.

use crate::cases::{Accel, Attitude, LoadCase};
use crate::geom::Point;
use crate::liquid::Liquid;
use crate::section::{EdgeKind, OutlineEdge, Section, WidthLaw};
use crate::study::{DISCHARGE_COEFFICIENT, Fill, Study};
use crate::units::{STANDARD_ATMOSPHERE_PA, STANDARD_GRAVITY_M_PER_S2};

/// A box of 2 m by 1 m, open above, 1 m wide.
pub fn study() -> Study {
    let edge =
        |name: &str, kind, s, z| OutlineEdge { name: name.to_owned(), kind, start: Point::new(s, z), sweep_rad: 0.0 };
    Study {
        title: "Untitled".to_owned(),
        author: String::new(),
        revision: "A".to_owned(),
        notes: String::new(),
        gravity_m_per_s2: STANDARD_GRAVITY_M_PER_S2,
        air_pressure_abs_pa: STANDARD_ATMOSPHERE_PA,
        ullage_gage_pa: 0.0,
        section: Section {
            outline: vec![
                edge("floor", EdgeKind::Wall, -1.0, 0.0),
                edge("right wall", EdgeKind::Wall, 1.0, 0.0),
                edge("rim", EdgeKind::Mouth, 1.0, 1.0),
                edge("left wall", EdgeKind::Wall, -1.0, 1.0),
            ],
            obstacles: Vec::new(),
            plates: Vec::new(),
            width: WidthLaw::Constant { width_m: 1.0 },
        },
        liquid: Liquid {
            name: "water".to_owned(),
            // Source: IAPWS-95 at 20 °C and 101.325 kPa (value from memory).
            density_kg_per_m3: 998.2,
            vapour_pressure_abs_pa: None,
            surface_tension_n_per_m: None,
        },
        fill: Fill::Share(0.5),
        compartments: Vec::new(),
        sump: None,
        discharge_coefficient: DISCHARGE_COEFFICIENT,
        materials: Vec::new(),
        cases: vec![LoadCase {
            name: "Rest".to_owned(),
            accel: Accel::REST,
            attitude: Attitude::Level,
            onset_s: None,
            duration_s: None,
            release: false,
            source: String::new(),
            note: String::new(),
        }],
        points: Vec::new(),
        moment_about: Point::origin(),
        records: Vec::new(),
        verdict_notes: Vec::new(),
    }
}
