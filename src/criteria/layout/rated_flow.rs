//! Rated flow: while the tank is emptied at its sump at a rated flow, the levels of neighbouring cells may differ by no more
//! than a requirement record allows.
//!
//! The flow comes from one cell, whichever is the worst, and leaves at the sump, whose cell stands at its still level;
//! without a sump it leaves at whichever cell is the worst. Between cells it passes openings and the gaps beyond free ends,
//! drowned or freely over their sills, and each may part into several ways. A level above a roof is the head that the flow
//! would need.
//! Source: [OrificeFlow].

use crate::flow::{Opening, Passage, orifice, steady_levels};
use crate::geom::{Point, Vec2};
use crate::plates::passages;
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
    let ways = Ways::new(standing);
    let verdicts = |rated| ways.verdict(standing, rated).into_iter().collect();
    standing.by_records(NAME, kind, verdicts, "no passage joins two cells", || {
        "no flow is asked to pass between cells".into()
    })
}

/// What joins the cells.
struct Ways {
    passages: Vec<Passage>,
    /// For each passage, the plate that it is an opening of, and its middle.
    places: Vec<(Option<usize>, Point)>,
    /// Cells that the flow may leave from.
    outlets: Vec<usize>,
}

impl Ways {
    fn new(standing: &Standing) -> Ways {
        let study = standing.study.study();
        let region = standing.study.region();
        let width = &study.section.width;
        let (mut joints, mut places) = (Vec::new(), Vec::new());
        for p in passages(&study.section, region) {
            let [from_idx, to_idx] = p.cell_idxs;
            if from_idx == to_idx {
                continue;
            }
            let ((low_m, _), (high_m, _)) = p.edge.extent(Vec2::y());
            let opening = Opening { low_m, high_m, area_m2: p.area_m2(width), c_d: study.discharge_coefficient };
            joints.push(Passage { from_idx, to_idx: Some(to_idx), opening });
            places.push((p.plate_idx, p.middle()));
        }
        let sump = study.sump.and_then(|at| region.cells().part_at(at));
        let outlets = sump.map_or_else(|| (0..standing.cells.len()).collect(), |cell| vec![cell]);
        Ways { passages: joints, places, outlets }
    }

    /// The worst of all ways that the flow may take; none where no passage joins two cells.
    fn verdict(&self, standing: &Standing, rated: Rated) -> Option<Verdict> {
        let g = standing.study.study().gravity_m_per_s2;
        let mut worst: Option<(f64, usize, [f64; 2])> = None;
        for &outlet in &self.outlets {
            let outlet_m = standing.still_z_m(outlet);
            let compartment = standing.cells[outlet].compartment;
            for inlet in (0..standing.cells.len()).filter(|&i| i != outlet) {
                if standing.cells[inlet].compartment != compartment {
                    continue;
                }
                let (from, to) = ((inlet, rated.flow_m3_per_s), (outlet, outlet_m));
                let levels = match steady_levels(standing.cells.len(), &self.passages, from, to, g) {
                    Ok(levels) => levels,
                    Err(error) => return Some(standing.not_judged(NAME, Sense::AtMost, error.to_string())),
                };
                for (i, passage) in self.passages.iter().enumerate() {
                    let level = |cell: usize| levels[cell].filter(|m| m.is_finite());
                    let (a, b) = (level(passage.from_idx), passage.to_idx.and_then(level));
                    let (Some(a), Some(b)) = (a, b) else { continue };
                    if worst.is_none_or(|w| (a - b).abs() > w.0) {
                        worst = Some(((a - b).abs(), i, [a, b]));
                    }
                }
            }
        }
        let (difference_m, i, levels_m) = worst?;
        Some(self.told(standing, rated, difference_m, i, levels_m))
    }

    fn told(&self, standing: &Standing, rated: Rated, difference_m: f64, i: usize, levels_m: [f64; 2]) -> Verdict {
        let g = standing.study.study().gravity_m_per_s2;
        let length = |m: f64| Measure::new(Quantity::Length, m);
        let cell_idxs = [self.passages[i].from_idx, self.passages[i].to_idx.unwrap_or_default()];
        // All passages between the two cells, from the first to the second.
        let between = self.passages.iter().filter_map(|p| {
            let ends = [p.from_idx, p.to_idx?];
            (ends == cell_idxs || ends == [cell_idxs[1], cell_idxs[0]]).then_some(p.opening)
        });
        let between: Vec<Opening> = between.collect();
        let flow_at = |a: f64, b: f64| between.iter().map(|o| orifice(o, a, b, g)).sum::<f64>().abs();
        let flow = flow_at(levels_m[0], levels_m[1]);
        let (low_m, high_m) = (levels_m[0].min(levels_m[1]), levels_m[0].max(levels_m[1]));
        let mut verdict = standing.verdict(NAME, length(difference_m), length(rated.difference_m), Sense::AtMost);
        let [a, b] = cell_idxs.map(|cell| standing.cells[cell].name.as_str());
        let (plate_idx, at) = self.places[i];
        if let Some(plate_idx) = plate_idx {
            verdict.place = plate(plate_idx);
        }
        (verdict.place_words, verdict.at, verdict.source) = (format!("{a} to {b}"), Some(at), Source::OrificeFlow);
        verdict.working = vec![WorkLine {
            symbols: "Q = C_d ∫ √(2 g h) dA, Δh = z_{from} − z_{to}".to_owned(),
            numbers: format!(
                "{} m³/s through {} m² with {}, from {} m to {} m",
                number(flow, 4),
                number(between.iter().map(|o| o.area_m2).sum(), 4),
                number(standing.study.study().discharge_coefficient, 3),
                number(high_m, 4),
                number(low_m, 4)
            ),
            result: length(difference_m),
        }];
        if difference_m > rated.difference_m && rated.difference_m > 0.0 {
            // What the openings do not carry at the difference that is allowed, through a drowned one.
            let missing = flow - flow_at(low_m + rated.difference_m, low_m);
            let speed = (2.0 * g * rated.difference_m).sqrt();
            let more_m2 = missing / (standing.study.study().discharge_coefficient * speed);
            let more = Measure::new(Quantity::Area, more_m2);
            verdict.mend = vec![Phrase::new("To hold, open {} more between them below the still level", [more])];
        }
        verdict
    }
}
