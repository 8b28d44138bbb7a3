//! Pools and pour-over against cases worked out by hand.

use brimwright::geom::Vec2;
use brimwright::statics::LONGEST_STEP;

use crate::support::followed::Followed;
use crate::support::grid::Grid;
use crate::support::grid_pools::{filled_at_rest, pour_over, turn};
use crate::support::hand_cases::hand_cases;

/// The brute-force sampler's own check, before anything is compared with it.
#[test]
fn the_sampler_finds_what_was_worked_out_by_hand() {
    const N_STEPS: usize = 16;
    let mut faults = vec![];
    for case in hand_cases() {
        let grid = Grid::new(&case.section, 56);
        let mut ups = vec![Vec2::y()];
        for i in 0..case.stops.len() {
            ups.extend(turn(case.up(i.checked_sub(1)), case.up(Some(i)), N_STEPS));
        }
        let full = filled_at_rest(&grid, Vec2::y(), case.liquid);
        let got = pour_over(&grid, &full, &ups);
        let (up, surface) = (ups[ups.len() - 1], 2.0 * case.section.outline[0].length());
        let allowed = grid.area_tolerance(surface);
        let mut expect = |what: String, want: f64, got: f64, allowed: f64| {
            let is_near = (got - want).abs() <= allowed;
            if !is_near {
                faults.push(format!(
                    "{}, {what}: worked out {want:.4}, sampled {got:.4}, allowed {allowed:.4}",
                    case.name
                ));
            }
        };
        for pool in &case.pools {
            let Some(got) = got.end.pool_at(pool.inside) else {
                expect(format!("liquid at {}", pool.inside), pool.area, 0.0, 0.0);
                continue;
            };
            expect(format!("area at {}", pool.inside), pool.area, got.area, allowed);
            if let Some(place) = pool.surface {
                // The highest of its cells lies less than a square from the surface.
                expect(format!("level at {}", pool.inside), up.dot(&place.coords), got.level, grid.step);
            }
        }
        let n_pools = got.end.pools().iter().filter(|pool| pool.area > allowed).count();
        expect("count of pools".into(), case.pools.len() as f64, n_pools as f64, 0.0);
        expect("area gone".into(), case.spilled, got.end.left(), allowed);
        if let Some(share) = case.first_spill {
            let (a_s, a_z) = case.stops[0];
            let turned = |share: f64| (share * a_s).atan2(1.0 + share * a_z) / a_s.atan2(1.0 + a_z);
            let n_dry = got.left.iter().take_while(|&&left| left == 0.0).count();
            expect("first spill, in steps".into(), turned(share) * N_STEPS as f64, n_dry as f64 - 0.5, 1.5);
        }
    }
    assert!(faults.is_empty(), "{}", faults.join("\n"));
}

#[test]
fn the_kernel_finds_what_was_worked_out_by_hand() {
    let mut faults = vec![];
    for case in hand_cases() {
        let followed = Followed::new(case.section.section(), case.liquid);
        let mut ups = vec![case.up(None)];
        ups.extend((0..case.stops.len()).map(|i| case.up(Some(i))));
        let traces = followed.along(&ups, LONGEST_STEP);
        let Some(end) = traces.last().and_then(|t| t.stops.first()).filter(|_| traces.len() == case.stops.len())
        else {
            faults.push(format!("{}: lost at {:?}", case.name, traces.last().map(|t| t.lost_at)));
            continue;
        };
        let look = followed.look(end.up);
        let owners = look.owners(&end.bodies);
        // The numbers were worked out to rounding; roots of the way are good to 1e-13 rad.
        let allowed = 1e-11 * case.section.area();
        let mut expect = |what: String, want: f64, got: f64, allowed: f64| {
            let is_near = (got - want).abs() <= allowed;
            if !is_near {
                faults.push(format!(
                    "{}, {what}: worked out {want:.12}, got {got:.12}, allowed {allowed:e}",
                    case.name
                ));
            }
        };
        for pool in &case.pools {
            let body = look.basins.basin_at(pool.inside).and_then(|basin| owners[basin]);
            let Some(body) = body.map(|i| &end.bodies[i]) else {
                expect(format!("liquid at {}", pool.inside), pool.area, 0.0, 0.0);
                continue;
            };
            expect(format!("area at {}", pool.inside), pool.area, body.volume_m3, allowed);
            if let Some(place) = pool.surface {
                let want = end.up.dot(&place.coords);
                expect(format!("level at {}", pool.inside), want, look.level_of(body), 1e-11);
            }
        }
        let n_pools = end.bodies.iter().filter(|b| b.volume_m3 > allowed).count();
        expect("count of pools".into(), case.pools.len() as f64, n_pools as f64, 0.0);
        let left: f64 = end.spilled.iter().map(|s| s.volume_m3).sum();
        expect("area gone".into(), case.spilled, left, allowed);
        if let Some(share) = case.first_spill {
            let (a_s, a_z) = case.stops[0];
            let want = (share * a_s).atan2(1.0 + share * a_z).abs();
            let got = traces[0].first_spill.map_or(f64::NAN, |(turned, _)| turned);
            expect("first spill, rad".into(), want, got, 1e-11);
        }
    }
    assert!(faults.is_empty(), "{}", faults.join("\n"));
}
