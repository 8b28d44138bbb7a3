//! Published hydrostatic forces and centres of pressure.

use std::f64::consts::{FRAC_PI_2, PI};

use brimwright::analysis::EdgeLoad;
use brimwright::geom::{Edge, Point, Vec2};
use brimwright::section::WidthLaw;
use brimwright::study::Fill;

use crate::support::shapes::{circle, polygon, rectangle, section};
use crate::support::table::{Findings, Row, table};
use crate::support::*;

/// Compares a plane wall: its force is at right angles to it, and both ways of giving its place agree.
fn compare_plane_wall(findings: &mut Findings, row: &Row, load: &EdgeLoad, surface: Point, down: Vec2) {
    row.compare(findings, "force_n", load.force_n.norm());
    let off_normal = load.force_n.dot(&down).abs();
    assert!(off_normal <= 1e-9 * load.force_n.norm(), "{}: {off_normal} N along the wall", row.id());
    let (from_moment, from_point) = acts_along(load, Point::origin(), surface, down);
    row.compare(findings, "centre_of_pressure_m", from_moment);
    row.compare(findings, "centre_of_pressure_m", from_point);
}

#[test]
fn plane_rectangular_walls() {
    let mut findings = Findings::default();
    for row in &table("wall_rectangle.csv").rows {
        let (sin, cos) = row.number("incline_deg").to_radians().sin_cos();
        let down = Vec2::new(-cos, -sin);
        let top = Point::origin() + down * row.number("top_edge_m");
        let bottom = top + down * 3.0;
        let floor_z = bottom.y - 0.5;
        // The wall is edge 0; above it the plane goes on to the surface at z = 0 and beyond.
        let beyond = Point::new(0.5 * cos, 0.5 * sin);
        let corners = [bottom, top, Point::origin(), beyond, Point::new(6.0, beyond.y), Point::new(6.0, floor_z)];
        let mut points: Vec<(f64, f64)> = corners.iter().map(|p| (p.x, p.y)).collect();
        points.push((bottom.x, floor_z));
        points.dedup();
        let study = study(section(&polygon(&points), &[], 2.0), Fill::Level(0.0));
        let case = judge_case(&study, held(0.0, 0.0));
        compare_plane_wall(&mut findings, row, edge_load(settled(&case), 0), Point::origin(), down);
    }
    findings.report(12);
}

#[test]
fn plane_triangular_walls() {
    let mut findings = Findings::default();
    for row in &table("wall_triangle.csv").rows {
        let (top, bottom) = (-row.number("top_depth_m"), -row.number("bottom_depth_m"));
        // The wall is edge 0; above it the tank goes on to z = 1 and widens, so that liquid stands above the apex.
        let points = [(0.0, top), (0.0, bottom), (2.0, bottom), (2.0, 1.0), (0.0, 1.0)];
        let (top_width, bottom_width) = (row.number("top_width_m"), row.number("bottom_width_m"));
        let mut tank = section(&polygon(&points), &[], 1.0);
        tank.width = WidthLaw::Table(vec![(bottom, bottom_width), (top, top_width), (1.0, top_width + 1.0)]);
        let case = judge_case(&study(tank, Fill::Level(0.0)), held(0.0, 0.0));
        let surface = Point::origin();
        compare_plane_wall(&mut findings, row, edge_load(settled(&case), 0), surface, Vec2::new(0.0, -1.0));
    }
    findings.report(9);
}

#[test]
fn round_end_walls() {
    let mut findings = Findings::default();
    for row in &table("wall_round_end.csv").rows {
        let level = 2.0 * row.number("depth_share");
        let mut barrel = section(&rectangle(5.0, 2.0), &[], 1.0);
        barrel.width = WidthLaw::RoundBarrel { diameter_m: 2.0, bottom_z_m: 0.0 };
        let case = judge_case(&study(barrel, Fill::Level(level)), held(0.0, 0.0));
        for end in [1, 3] {
            let (load, surface) =
                (edge_load(settled(&case), end), Point::new(if end == 1 { 5.0 } else { 0.0 }, level));
            compare_plane_wall(&mut findings, row, load, surface, Vec2::new(0.0, -1.0));
        }
    }
    findings.report(24);
}

#[test]
fn curved_walls() {
    let quarter_turn = |mut edges: Vec<Edge>, sweep: f64| {
        edges[0].sweep = sweep;
        edges
    };
    let rows = table("wall_curved.csv").rows;
    let mut findings = Findings::default();
    for row in &rows {
        // The wall is edge 0, the surface at z = 0.
        let (outline, outward) = match row.id() {
            // Centre of the arc at (0, 0): liquid inside the quarter disc, the wall to its left.
            "3-quarter-concave" => (
                quarter_turn(polygon(&[(-2.0, 0.0), (0.0, -2.0), (0.0, 0.5), (-2.0, 0.5)]), FRAC_PI_2),
                Vec2::new(-1.0, 0.0),
            ),
            // Centre at (0, -2), on the dry side: the wall climbs from the floor and ends level with the surface.
            "3-quarter-convex" => (
                quarter_turn(polygon(&[(0.0, 0.0), (2.0, -2.0), (5.0, -2.0), (5.0, 1.0), (0.0, 1.0)]), -FRAC_PI_2),
                Vec2::new(-1.0, 0.0),
            ),
            // Lowest point at (0, -1).
            "3-half-shell" => {
                let down_by_one = |p: Point| Point::new(p.x, p.y - 1.0);
                let lowered = |e: &Edge| Edge { start: down_by_one(e.start), end: down_by_one(e.end), ..*e };
                (circle(1.0).iter().map(lowered).collect(), Vec2::new(1.0, 0.0))
            }
            other => panic!("no wall {other}"),
        };
        let case = judge_case(&study(section(&outline, &[], 1.0), Fill::Level(0.0)), held(0.0, 0.0));
        let load = edge_load(settled(&case), 0);
        row.compare(&mut findings, "outward_n", load.force_n.dot(&outward));
        row.compare(&mut findings, "up_n", load.force_n.y);
        row.compare(&mut findings, "resultant_n", load.force_n.norm());
        row.compare(
            &mut findings,
            "angle_below_horizontal_deg",
            (-load.force_n.y).atan2(load.force_n.dot(&outward)).to_degrees(),
        );
        if row.given("resultant_n").is_some() {
            // Through the centre of the arc, about which the moments are taken.
            assert!(load.moment_n_m.abs() < 1e-9 * load.force_n.norm(), "moment {} N m", load.moment_n_m);
        }
    }
    findings.report(8);
}

#[test]
fn loads_under_modified_gravity() {
    let length = 4.0;
    let box_tank = study(section(&rectangle(length, 4.0), &[2], 2.0), Fill::Level(1.5));
    let box_case = judge_case(&box_tank, held(3.0, 1.0));
    let in_box = settled(&box_case);
    let (floor, front, rear) = (edge_load(in_box, 0), edge_load(in_box, 1), edge_load(in_box, 3));
    let (right, up) = (Vec2::new(1.0, 0.0), Vec2::new(0.0, 1.0));
    let mut half_full = study(section(&circle(1.0), &[], 1.0), Fill::Level(1.0));
    half_full.moment_about = Point::new(0.0, 1.0);
    let round_case = judge_case(&half_full, held(GRAVITY / 2.0, 0.0));
    let in_round = settled(&round_case);
    let mut findings = Findings::default();
    for row in &table("wall_modified_gravity.csv").rows {
        let got = match row.id() {
            "box-rear-force_n" => -rear.force_n.x,
            "box-rear-centre-above-floor_m" => acts_along(rear, Point::origin(), Point::origin(), up).0,
            "box-front-force_n" => front.force_n.x,
            "box-difference_n" => -sum_of_loads(in_box).0.x,
            "box-floor-force_n" => -floor.force_n.y,
            "box-floor-acts-from-front_m" => length - acts_along(floor, Point::origin(), Point::origin(), right).0,
            "round-resultant_n" => in_round.total_force_n.norm(),
            "round-rear_n" => -sum_of_loads(in_round).0.x,
            "round-down_n" => -sum_of_loads(in_round).0.y,
            "round-peak_pa" => in_round.peak_pa,
            other => panic!("no value {other}"),
        };
        row.compare(&mut findings, "value", got);
    }
    findings.report(10);
    let (force, moment) = sum_of_loads(in_round);
    assert!(moment.abs() < 1e-9 * force.norm(), "pressures on a circle pass through its centre: {moment} N m");
    let lowest = Vec2::new(0.0, 1.0) - round_case.gravity.up.unwrap();
    let off = (in_round.peak_at.coords - lowest).norm();
    assert!(off < 1e-6, "the peak is at the lowest point along effective gravity {lowest}, got {}", in_round.peak_at);
    assert!((PI / 2.0 * WATER - in_round.volume_m3 * WATER).abs() < 1e-8);
}
