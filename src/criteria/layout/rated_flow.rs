//! Rated flow: while the tank is filled or emptied at a rated flow, the levels of neighbouring cells may differ by no more
//! than a requirement record allows.
//!
//! The whole flow passes between every two neighbouring cells of the widest ways that join them, wherever it comes in
//! and goes out: an upper bound where it can also go round about. It passes the openings, and the gaps beyond free
//! ends, as far as they lie below the still level; what flows freely over sills is not judged.
//! Source: [OrificeFlow].

use crate::flow::steady_difference;
use crate::plates::{Way, passages, widest_ways};
use crate::sources::Source;
use crate::study::Limit;
use crate::units::{Measure, Phrase, Quantity, number};

use super::{Outcome, Sense, Standing, Verdict, WorkLine, plate};

const NAME: &str = "Rated flow";

/// What a record asks.
#[derive(Clone, Copy)]
struct Rated {
    flow_m3_per_s: f64,
    difference_m: f64,
}

pub(super) fn judge(standing: &Standing) -> Outcome {
    let kind = |limit: &Limit| match *limit {
        Limit::RatedFlow { flow_m3_per_s, difference_m } => Some(Rated { flow_m3_per_s, difference_m }),
        _ => None,
    };
    let section = &standing.study.study().section;
    let all = passages(section, standing.study.region());
    let level = |cell: usize| standing.still_z_m(cell);
    let ways = widest_ways(&all, &section.width, standing.cells.len(), level);
    let verdicts = |rated| ways.iter().map(|way| verdict(standing, way, rated)).collect();
    standing.by_records(NAME, kind, verdicts, "no passage joins two cells", || {
        "no flow is asked to pass between cells".into()
    })
}

fn verdict(standing: &Standing, way: &Way, rated: Rated) -> Verdict {
    let study = standing.study.study();
    let (flow, c_d, g) = (rated.flow_m3_per_s, study.discharge_coefficient, study.gravity_m_per_s2);
    let length = |m: f64| Measure::new(Quantity::Length, m);
    let [a, b] = way.cell_idxs.map(|cell| standing.cells[cell].name.as_str());
    let place = |verdict: Verdict| Verdict {
        place: way.plate_idx.map_or(verdict.place.clone(), plate),
        place_words: format!("{a} to {b}"),
        at: Some(way.at),
        source: Source::OrificeFlow,
        ..verdict
    };
    if way.area_m2 <= 0.0 {
        let reason = "nothing between them is open below the still level, and flow over sills is not judged";
        return place(standing.not_judged(NAME, Sense::AtMost, reason.to_owned()));
    }
    let difference_m = steady_difference(flow, c_d, way.area_m2, g);
    let mut verdict = place(standing.verdict(NAME, length(difference_m), length(rated.difference_m), Sense::AtMost));
    verdict.working = vec![WorkLine {
        symbols: "Δh = (Q / (C_d A))² / 2 g".to_owned(),
        numbers: format!(
            "({} / ({} × {}))² m²/s² / (2 × {} m/s²)",
            number(flow, 4),
            number(c_d, 3),
            number(way.area_m2, 4),
            number(g, 4)
        ),
        result: length(difference_m),
    }];
    if difference_m > rated.difference_m && rated.difference_m > 0.0 {
        let needed_m2 = way.area_m2 * (difference_m / rated.difference_m).sqrt();
        let more = Measure::new(Quantity::Area, needed_m2 - way.area_m2);
        verdict.mend = vec![Phrase::new("To hold, open {} more between them below the still level", [more])];
    }
    verdict
}
