//! Gas pockets: worked out by hand, and against a flood fill of the brute-force sampler's net.

use brimwright::analysis::{CaseResult, State};
use brimwright::geom::{Point, Vec2};
use brimwright::section::{Opening, OpeningShape, Plate};
use brimwright::statics::{LONGEST_STEP, gas_pockets};
use brimwright::study::Fill;
use proptest::prelude::*;

use crate::support::followed::Followed;
use crate::support::grid::Grid;
use crate::support::plated::{plate, plated, pull};
use crate::support::random::config;
use crate::support::shapes::{polygon, section};
use crate::support::{GRAVITY, held, judge_case, study, verdict};

/// A tank 2 m by 1 m and 1 m wide whose roof is a mouth right of s = 1.2, its liquid 0.5 m deep, under a_s = `slope` g.
fn tilted(plates: Vec<Plate>, slope: f64) -> CaseResult {
    let mut section = section(&polygon(&[(0.0, 0.0), (2.0, 0.0), (2.0, 1.0), (1.2, 1.0), (0.0, 1.0)]), &[2], 1.0);
    section.plates = plates;
    judge_case(&study(section, Fill::Level(0.5)), held(slope * GRAVITY, 0.0))
}

fn upright(s: f64, from: f64, to: f64, openings: &[(f64, f64)]) -> Plate {
    let opening =
        |&(from_m, to_m): &(f64, f64)| Opening { name: String::new(), from_m, to_m, shape: OpeningShape::Share(1.0) };
    Plate { openings: openings.iter().map(opening).collect(), ..plate(&[Point::new(s, from), Point::new(s, to)]) }
}

/// Volumes of the pockets under both bounds; the sealed one only where there is one.
fn pockets(case: &CaseResult) -> Vec<Vec<f64>> {
    case.states().map(|(_, settled)| settled.gas.iter().map(|p| p.volume_m3).collect()).collect()
}

#[track_caller]
fn check(case: &CaseResult, want: &[&[f64]]) {
    let got = pockets(case);
    let near = |a: &Vec<f64>, b: &&[f64]| a.len() == b.len() && a.iter().zip(*b).all(|(a, b)| (a - b).abs() < 1e-12);
    assert!(got.len() == want.len() && got.iter().zip(want).all(|(a, b)| near(a, b)), "{got:?}, expected {want:?}");
}

#[test]
fn gas_behind_a_hanging_plate_is_a_pocket() {
    // The plate hangs at s = 1 down to 0.3. At slope 0.4 the surface turns about (1, 0.5), from 0.9 to 0.1: left of the
    // plate (0.1 + 0.5) / 2 x 1 of gas, shut in; at rest 0.5.
    let plates = || vec![upright(1.0, 0.3, 1.0, &[])];
    let case = tilted(plates(), 0.4);
    check(&case, &[&[0.3]]);
    let contained = verdict(&case, "Contained").expect("a verdict");
    assert_eq!(contained.state, State::NotJudged, "{contained:?}");
    assert!(contained.remark.contains("300 mL") || contained.remark.contains("0.300 m³"), "{}", contained.remark);
    // Nothing has moved: what holds, holds.
    let rest = tilted(plates(), 0.0);
    check(&rest, &[&[0.5]]);
    assert_eq!(verdict(&rest, "Contained").map(|v| v.state), Some(State::Holds));
    // With its tip above the liquid there is one gas space, and it is vented.
    check(&tilted(vec![upright(1.0, 0.7, 1.0, &[])], 0.0), &[&[]]);
}

#[test]
fn gas_passes_what_is_dry_on_both_sides_shut_to_liquid_or_not() {
    // Full height. A drain gap alone: settled, 0.3 of gas as before; sealed, the left cell has kept its liquid and with it
    // its gas, as it was at rest, so that there is nothing to doubt.
    check(&tilted(vec![upright(1.0, 0.0, 1.0, &[(0.0, 0.1)])], 0.4), &[&[0.3], &[]]);
    // With a vent gap as well the gas is vented under both.
    check(&tilted(vec![upright(1.0, 0.0, 1.0, &[(0.0, 0.1), (0.95, 1.0)])], 0.4), &[&[], &[]]);
    // A shelf at 0.6 from the left wall to s = 1.0, closed there by a plate down to 0.2, and a hole in it: what is under
    // it is vented through the level opening, sealed too; without the hole 0.1 x 1 at rest.
    let shelf = |openings: &[(f64, f64)]| {
        let mut shelf = upright(0.0, 0.0, 0.0, openings);
        shelf.points = vec![Point::new(0.0, 0.6), Point::new(1.0, 0.6)];
        vec![shelf, upright(1.0, 0.2, 0.6, &[])]
    };
    check(&tilted(shelf(&[]), 0.0), &[&[0.1]]);
    check(&tilted(shelf(&[(0.4, 0.5)]), 0.0), &[&[], &[]]);
}

#[test]
fn a_failing_verdict_keeps_failing_over_a_pocket() {
    // The liquid stands to the right, above the mouth's right end, and spills; the gas left of the plate is shut in,
    // since the tip is under.
    let case = tilted(vec![upright(1.0, 0.02, 1.0, &[])], -0.7);
    let contained = verdict(&case, "Contained").expect("a verdict");
    assert!(!pockets(&case)[0].is_empty(), "no pocket");
    assert_eq!(contained.state, State::Fails, "{contained:?}");
    assert!(contained.remark.contains("touches no mouth"), "{}", contained.remark);
}

#[test]
fn pockets_agree_with_a_flood_fill() {
    proptest!(config(60, 91), |(plated in plated(), pull in pull(), share in 0.1..0.7)| {
        let area = share * plated.area();
        let followed = Followed::new(plated.section(), area);
        let traces = followed.along(&[Vec2::y(), -pull.normalize()], LONGEST_STEP);
        let Some(stop) = traces[0].stops.first() else { return Ok(()) };
        let look = followed.look(stop.up);
        let got = gas_pockets(&followed.section, &followed.region, &look, &stop.bodies);
        let grid = Grid::new(&plated, 40);
        let owners = look.owners(&stop.bodies);
        let is_wet = |p: Point| {
            let owner = look.basins.basin_at(p).and_then(|b| owners[b]);
            owner.is_some_and(|i| stop.up.dot(&p.coords) < look.level_of(&stop.bodies[i]))
        };
        let parts = filled(&grid, &vec![true; grid.at.len()]);
        let spaces = filled(&grid, &grid.at.iter().map(|&p| !is_wet(p)).collect::<Vec<_>>());
        let allowed = grid.area_tolerance(2.0);
        let part = |space: &Space| parts.iter().position(|p| p.nodes.contains(&space.nodes[0])).expect("a part");
        let large: Vec<&Space> = spaces.iter().filter(|s| s.area > allowed).collect();
        // Alone in a part without a mouth, a space cannot have changed; whether there is another one, too small for
        // the net, is left open.
        let is_alone = |s: &Space| {
            let others = large.iter().filter(|o| part(o) == part(s)).count();
            !parts[part(s)].is_vented && others == 1
        };
        let (alone, sure): (Vec<&Space>, Vec<&Space>) =
            large.iter().filter(|s| !s.is_vented).partition(|s| is_alone(s));
        let areas = |spaces: &[&Space]| spaces.iter().map(|s| s.area).collect::<Vec<f64>>();
        let (want, may) = (areas(&sure), areas(&alone));
        let mut got: Vec<f64> = got.iter().map(|p| p.volume_m3).collect();
        let mut take = |area: &f64| {
            let near = got.iter().position(|g| (g - area).abs() <= allowed);
            near.map(|i| got.remove(i)).is_some()
        };
        let is_found = want.iter().all(&mut take);
        may.iter().for_each(|area| _ = take(area));
        let is_near = is_found && got.iter().all(|a| *a <= 2.0 * allowed);
        prop_assert!(is_near, "left over {got:?}, filled {want:?} and perhaps {may:?}, allowed {allowed:e}");
    });
}

/// Nodes that hang together through nodes that are let in.
struct Space {
    nodes: Vec<usize>,
    area: f64,
    is_vented: bool,
}

fn filled(grid: &Grid, is_in: &[bool]) -> Vec<Space> {
    let mut is_seen: Vec<bool> = is_in.iter().map(|is_in| !is_in).collect();
    let mut spaces = vec![];
    for start in 0..grid.at.len() {
        if std::mem::replace(&mut is_seen[start], true) {
            continue;
        }
        let mut nodes = vec![start];
        let mut next = 0;
        while next < nodes.len() {
            for &node in &grid.links[nodes[next]] {
                if !std::mem::replace(&mut is_seen[node as usize], true) {
                    nodes.push(node as usize);
                }
            }
            next += 1;
        }
        let n_cells = nodes.iter().filter(|&&node| node < grid.n_cells).count();
        let is_vented = nodes.iter().any(|&node| grid.is_exit[node]);
        spaces.push(Space { area: n_cells as f64 * grid.cell_area(), is_vented, nodes });
    }
    spaces
}
