//! How long levels take to even out through openings, against how long the load case lasts: which bound is near.
//!
//! From the sealed state of a case, as if the openings were opened there, under the case's effective gravity. Every basin
//! has one level, all gas the same pressure. An estimate beside the verdicts: they rest on the worse bound either way.

mod vessels;

use crate::cases::LoadCase;
use crate::flow::{COARSE, Cell, Equalisation, FlowError, Network, Opening, Passage};
use crate::geom::{Depth, Vec2};
use crate::plates::passages;
use crate::statics::{Bound, Look};
use crate::study::ValidStudy;
use crate::units::number;

use super::results::Transfer;
use super::ways::{self, Course};
use vessels::Vessels;

/// Share of what moves after which the settled bound counts as reached.
const NEARLY_ALL: f64 = 0.95;

/// Share of what moves below which the sealed bound counts as kept.
const NEARLY_NONE: f64 = 0.05;

/// Less than this share of the capacity is nothing that moves.
const LEAST_SHARE: f64 = 1e-6;

/// How far beside a wall a point lies that tells its side, as a share of the section's diagonal.
const HAIR: f64 = 1e-6;

/// From the sealed state of a case to even levels; none where there is no sealed state. `has_gas` says that some touches no
/// mouth.
///
/// Source: [OrificeFlow], by [`crate::flow`]; over sills by the same law.
pub(super) fn transfer(
    study: &ValidStudy,
    case: &LoadCase,
    course: &Course,
    has_gas: bool,
) -> Option<Result<Transfer, String>> {
    let b = ways::bounds(study).iter().position(|&bound| bound == Bound::Sealed)?;
    let stop = course.ways[b].as_ref()?.stop.as_ref()?;
    let look = ways::holder(study, Bound::Sealed).look(stop.up);
    let bodies: Vec<(usize, f64)> = stop.bodies.iter().map(|b| (b.basin, look.level_of(b))).collect();
    let lasts_s = case.duration_s.map(|duration_s| case.onset_s.unwrap_or(0.0) + duration_s);
    Some(match evened(study, &look, &bodies, course.gravity.magnitude) {
        Ok(way) => Ok(told(way, study.capacity_m3(), lasts_s, has_gas)),
        Err(error) => Err(error.to_string()),
    })
}

/// Lets the liquid flow from bodies, each a basin and a level.
fn evened(
    study: &ValidStudy,
    look: &Look,
    bodies: &[(usize, f64)],
    g_m_per_s2: f64,
) -> Result<Equalisation, FlowError> {
    let (width, basins) = (&study.study().section.width, &look.basins);
    let openings = openings(study, look);
    let counts = |low: usize| openings.iter().any(|o| o.lows.contains(&low));
    let mouth_area_m2 = |edge_idx: u32| {
        let edge = look.cut.edges()[edge_idx as usize];
        width.across(edge.start, edge.end).abs()
    };
    let vessels = Vessels::new(basins, &counts, &mouth_area_m2);
    let mut volumes_m3 = vec![0.0; vessels.all.len()];
    for &(basin, level_m) in bodies {
        for i in vessels.under(basins, basin) {
            volumes_m3[i] = vessels.all[i].volume_below(level_m);
        }
    }
    let levels: Vec<_> = vessels.all.iter().map(|vessel| |volume: f64| vessel.level(volume)).collect();
    let cells = vessels.all.iter().zip(&levels).zip(&volumes_m3);
    let cells = cells.map(|((vessel, level), &volume_m3)| Cell {
        capacity_m3: vessel.capacity_m3,
        volume_m3,
        level_for_volume: level,
    });
    let c_d = study.study().discharge_coefficient;
    let mut passages: Vec<Passage> = Vec::new();
    for o in &openings {
        let [Some(from_idx), Some(to)] = o.lows.map(|low| vessels.of_low(low)) else { continue };
        if from_idx != to {
            // A wall is never below the bottom of what it bounds, but a table may be a hair off.
            let bottom_m = vessels.all[from_idx].bottom_m.max(vessels.all[to].bottom_m);
            let low_m = o.span_m[0].max(bottom_m);
            let opening = Opening { low_m, high_m: o.span_m[1].max(low_m), area_m2: o.area_m2, c_d };
            passages.push(Passage { from_idx, to_idx: Some(to), opening });
        }
    }
    passages.extend(vessels.crossings.iter().map(|c| Passage {
        from_idx: c.from_idx,
        to_idx: c.to_idx,
        opening: Opening { low_m: c.low_m, high_m: c.high_m, area_m2: c.area_m2, c_d },
    }));
    Network::new(cells.collect(), passages, g_m_per_s2)?.equalise(COARSE)
}

/// An opening in a plate, seen along a direction.
struct Hole {
    /// The low points under it on both sides.
    lows: [usize; 2],
    /// Levels of its ends.
    span_m: [f64; 2],
    area_m2: f64,
}

/// Every opening in a plate with liquid's ground on both sides.
fn openings(study: &ValidStudy, look: &Look) -> Vec<Hole> {
    let section = &study.study().section;
    let hair = HAIR * study.region().diagonal_m();
    let in_plate = passages(section, study.region()).into_iter().filter(|p| p.plate_idx.is_some());
    let hole = |p: crate::plates::Passage| {
        let along = p.edge.tangent_at(0.5);
        let across = Vec2::new(along.y, -along.x) * hair;
        let lows = [look.basins.low_under(p.middle() - across)?, look.basins.low_under(p.middle() + across)?];
        let ((low_m, _), (high_m, _)) = p.edge.extent(look.up);
        Some(Hole { lows, span_m: [low_m, high_m], area_m2: p.area_m2(&section.width) })
    };
    in_plate.filter_map(hole).collect()
}

/// What it means for the case.
fn told(way: Equalisation, capacity_m3: f64, lasts_s: Option<f64>, has_gas: bool) -> Transfer {
    let least_m3 = LEAST_SHARE * capacity_m3;
    let moves = way.moved_m3 > least_m3;
    let moved_share = if moves { lasts_s.map_or(1.0, |t| way.share_at(t)) } else { 1.0 };
    let near = match moved_share {
        share if share >= NEARLY_ALL => Some(Bound::Settled),
        share if share <= NEARLY_NONE => Some(Bound::Sealed),
        _ => None,
    };
    let time = |share: f64| if moves { way.time_for_share(share) } else { 0.0 };
    let mut transfer = Transfer {
        moved_m3: if moves { way.moved_m3 } else { 0.0 },
        left_m3: if way.drained_m3 > least_m3 { way.drained_m3 } else { 0.0 },
        half_s: time(0.5),
        nearly_all_s: time(NEARLY_ALL),
        end_s: if moves { way.end_s } else { Some(0.0) },
        lasts_s,
        moved_share,
        near,
        words: String::new(),
    };
    transfer.words = words(&transfer, has_gas);
    transfer
}

/// What the bounds mean for the case, in a sentence.
fn words(transfer: &Transfer, has_gas: bool) -> String {
    if transfer.moved_m3 == 0.0 {
        return "nothing flows through the openings: both bounds are the same".to_owned();
    }
    let seconds = |t: f64| number(t, 2);
    let near = match (transfer.lasts_s, transfer.near) {
        (None, _) => "held for long: the settled bound is near".to_owned(),
        (Some(t), Some(Bound::Settled)) => format!("the case lasts {} s: the settled bound is near", seconds(t)),
        (Some(t), Some(Bound::Sealed)) => format!("the case lasts {} s: the sealed bound is near", seconds(t)),
        (Some(t), None) => {
            let share = number(100.0 * transfer.moved_share, 2);
            format!("the case lasts {} s, by then {share} % has passed: neither bound is near", seconds(t))
        }
    };
    let gas = if has_gas { "; gas that touches no mouth would slow it" } else { "" };
    let (half, most) = (seconds(transfer.half_s), seconds(transfer.nearly_all_s));
    format!("{near}. Half of what moves passes the openings in {half} s, 95 % in {most} s{gas}")
}
