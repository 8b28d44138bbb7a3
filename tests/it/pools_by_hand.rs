//! Pools and pour-over against cases worked out by hand.

use brimwright::geom::{Point, Vec2};
use brimwright::statics::LONGEST_STEP;

use crate::support::followed::Followed;
use crate::support::grid::Grid;
use crate::support::grid_pools::{filled_at_rest, pour_over, turn};
use crate::support::hand_cases::hand_cases;
use crate::support::plated::Plated;
use crate::support::shapes::{polygon, rectangle};

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

#[test]
fn what_falls_on_a_level_shelf_leaves_it_over_its_nearer_free_end() {
    // A divider stands on the floor at s = 1.5; shelves lie above it, free and from the right wall.
    let tank = Plated::tank(rectangle(3.0, 2.0)).with_plate(&[(1.5, 0.0), (1.5, 0.2)]);
    let [left, right] = [0.5, 2.5];
    for (shelf, falls_at, lands) in [
        ([(0.5, 0.5), (1.9, 0.5)], 1.4, right),
        ([(1.9, 0.5), (0.5, 0.5)], 1.4, right),
        ([(0.5, 0.5), (1.9, 0.5)], 0.8, left),
        ([(1.2, 0.5), (3.0, 0.5)], 2.5, left),
    ] {
        let followed = Followed::new(tank.clone().with_plate(&shelf).section(), 0.0);
        let basins = followed.look(Vec2::y()).basins;
        let (got, want) = (basins.low_under(Point::new(falls_at, 1.0)), basins.basin_at(Point::new(lands, 0.1)));
        assert_eq!(got, want, "from s = {falls_at} on {shelf:?}, to land at s = {lands}");
    }
}

#[test]
fn a_cup_pours_over_its_lower_wall() {
    // 1 m wide, on z = 0.5, its left wall to 1.2 and its right one to 1.0; filled to 0.8 like all around it. Its surface
    // turns about its middle, and comes to 1.0 at the right where m / 2 = 0.2; around it liquid stands lower there.
    let cup = [(0.5, 1.2), (0.5, 0.5), (1.5, 0.5), (1.5, 1.0)];
    let mirrored = cup.map(|(s, z)| (3.0 - s, z));
    for (cup, a_s) in [(cup, -0.6), (mirrored, 0.6_f64)] {
        let followed = Followed::new(Plated::tank(rectangle(3.0, 2.0)).with_plate(&cup).section(), 2.4);
        let trace = followed.along(&[Vec2::y(), Vec2::new(a_s, 1.0).normalize()], LONGEST_STEP).remove(0);
        let (turned, pour) = trace.first_pour.expect("it pours");
        assert!((turned - 0.4_f64.atan()).abs() < 1e-8, "at a slope of {}, expected 0.4", turned.tan());
        assert!((pour.at - Point::new(cup[3].0, cup[3].1)).norm() < 1e-7, "over {}, expected {:?}", pour.at, cup[3]);
        assert_eq!(pour.to_right, a_s < 0.0);
    }
}

#[test]
fn a_mouth_is_a_mouth_of_what_lies_under_it_alone() {
    // A roof half wall, half mouth, either way round, and a plate up to where they meet.
    for mouth_idx in [2, 3] {
        let corners = [(0.0, 0.0), (2.0, 0.0), (2.0, 1.0), (1.0, 1.0), (0.0, 1.0)];
        let tank = Plated::tank(polygon(&corners)).with_mouth(mouth_idx);
        let followed = Followed::new(tank.with_plate(&[(1.0, 0.0), (1.0, 1.0)]).section(), 0.0);
        let basins = followed.look(Vec2::y()).basins;
        let mouths = [1.5, 0.5].map(|s| basins.all()[basins.basin_at(Point::new(s, 0.5)).unwrap()].mouth.is_some());
        assert_eq!(mouths, [mouth_idx == 2, mouth_idx == 3]);
    }
}

#[test]
fn the_least_room_is_below_the_brim_that_liquid_comes_to_first() {
    // Two cells, 1 m wide, 0.8 deep, each with a mouth in its roof, parted below a piece of roof from 0.9 to 1.1. At a slope
    // of 0.2 the right one has 0.2 - 0.1 of room below (2, 1), and the left one 0.2 - 0.08 - 0.001 below (0.9, 1).
    let corners = [(0.0, 0.0), (2.0, 0.0), (2.0, 1.0), (1.1, 1.0), (0.9, 1.0), (0.0, 1.0)];
    let tank = Plated::tank(polygon(&corners)).with_mouth(2).with_mouth(4).with_plate(&[(1.0, 0.0), (1.0, 1.0)]);
    let followed = Followed::new(tank.section(), 1.6);
    for (a_s, brim) in [(-0.2, Point::new(2.0, 1.0)), (0.2, Point::new(0.0, 1.0))] {
        let trace = followed.along(&[Vec2::y(), Vec2::new(a_s, 1.0).normalize()], LONGEST_STEP).remove(0);
        let stop = &trace.stops[0];
        let at = stop.least.expect("there are mouths").at;
        assert!((at - brim).norm() < 1e-12, "at {a_s} g the least room is below {at}, expected {brim}");
        assert!((stop.room_m3 - 0.1).abs() < 1e-12, "at {a_s} g room is {}, expected 0.1", stop.room_m3);
    }
}

#[test]
fn what_passes_a_tip_on_the_rim_beside_a_full_cell_is_gone() {
    // Full to the rim, with a plate up to it at s = 1: at a slope of 0.2 each cell loses 0.2 / 2 over its own right end.
    let tank = Plated::tank(rectangle(2.0, 1.0)).with_mouth(2).with_plate(&[(1.0, 0.0), (1.0, 1.0)]);
    let followed = Followed::new(tank.section(), 2.0);
    let trace = followed.along(&[Vec2::y(), Vec2::new(-0.2, 1.0).normalize()], LONGEST_STEP).remove(0);
    let mut lost: Vec<(f64, f64)> = trace.stops[0].spilled.iter().map(|s| (s.brim.at.x, s.volume_m3)).collect();
    lost.sort_by(|a, b| a.0.total_cmp(&b.0));
    let is_near =
        lost.len() == 2 && (0..2).all(|i| (lost[i].0 - (1 + i) as f64).abs() + (lost[i].1 - 0.1).abs() < 1e-12);
    assert!(is_near, "lost {lost:?} at s, expected 0.1 at 1 and at 2");
    let room = trace.stops[0].room_m3;
    assert!((room + 0.2).abs() < 1e-12, "room {room}, expected what is missing, -0.2");
}

#[test]
fn nothing_pours_into_a_cup_that_comes_to_be_under_the_surface() {
    // A level shelf with a wall at its right end, deep under the surface; at a slope it holds liquid of its own.
    let shelf = [(1.0, 0.5), (2.0, 0.5), (2.0, 0.7)];
    let followed = Followed::new(Plated::tank(rectangle(3.0, 2.0)).with_plate(&shelf).section(), 3.6);
    let trace = followed.along(&[Vec2::y(), Vec2::new(-0.3, 1.0).normalize()], LONGEST_STEP).remove(0);
    assert_eq!((trace.first_pour, trace.stops[0].pours.len(), trace.stops[0].bodies.len()), (None, 0, 1));
}
