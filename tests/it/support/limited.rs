//! Random studies with plates and with a limit for everything, as a proptest strategy.

use brimwright::cases::Attitude;
use brimwright::section::{Opening, OpeningShape};
use brimwright::study::{Fill, Limit, Record, Study};
use proptest::prelude::*;

use super::plated::plated;
use super::{GRAVITY, WATER, study};

/// A record with nothing but its limit.
pub fn record(limit: Limit) -> Record {
    Record {
        title: format!("{limit:?}"),
        limit,
        clause: String::new(),
        edition: String::new(),
        origin: String::new(),
        confirmed: true,
    }
}

/// A random tank at rest, level or heeled, some of its plates with an opening; limits to pressure, to pressure on the roof,
/// an allowance of freeboard, a vapour pressure.
pub fn limited() -> impl Strategy<Value = Study> {
    let limits = (0.5..4.0, 0.05..1.0, 0.0..0.1);
    let opening = proptest::option::weighted(0.3, 0.1..0.4);
    let heel = proptest::option::of(-5.0..5.0);
    (plated(), 0.05..0.95, heel, limits, opening).prop_map(|(plated, share, heel, limits, opening)| {
        let mut study = study(plated.section(), Fill::Share(share));
        let size = plated.area().sqrt();
        let weight_pa = WATER * GRAVITY * size;
        study.cases[0].attitude = heel.map_or(Attitude::Level, Attitude::HeelDeg);
        study.records = vec![
            record(Limit::WallPressure(limits.0 * weight_pa)),
            record(Limit::RoofPressure(limits.1 * weight_pa)),
            record(Limit::FreeboardAllowance(limits.2 * size)),
        ];
        study.liquid.vapour_pressure_abs_pa = Some(2339.0);
        if let (Some(share), Some(plate)) = (opening, study.section.plates.first_mut()) {
            let length = plate.length_m();
            plate.openings = vec![Opening {
                name: String::new(),
                from_m: 0.3 * length,
                to_m: (0.3 + share) * length,
                shape: OpeningShape::Share(1.0),
            }];
        }
        study
    })
}
