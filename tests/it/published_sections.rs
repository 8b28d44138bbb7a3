//! Published mensuration: partly filled sections and tanks, at rest and tilted.

use std::f64::consts::{FRAC_PI_2, PI};

use brimwright::geom::{Edge, Point, Sublevel, Vec2};
use brimwright::section::{Section, WidthLaw};
use brimwright::study::Fill;

use crate::support::shapes::{circle, ellipse, polygon, rectangle, rounded_rectangle, section};
use crate::support::table::{Findings, Tolerance, table};
use crate::support::*;

const UP: Vec2 = Vec2::new(0.0, 1.0);

/// The centroid's z of a section at rest, filled to a level.
fn resting_centroid_z(outline: &[Edge], level: f64) -> f64 {
    let case = judge_case(&study(section(outline, &[], 1.0), Fill::Level(level)), held(0.0, 0.0));
    settled(&case).centroid.y
}

#[test]
fn circle_areas_and_their_inverses() {
    let sublevel = Sublevel::new(&circle(1.0), UP);
    let mut findings = Findings::default();
    for row in &table("circle.csv").rows {
        let level = 2.0 * row.number("depth_share");
        let width: f64 = sublevel.chords(level).iter().map(|c| (c.1 - c.0).norm()).sum();
        row.compare(&mut findings, "area_m2", sublevel.area_below(level));
        row.compare(&mut findings, "area_share", sublevel.area_below(level) / sublevel.total_area());
        row.compare(&mut findings, "surface_width_m", width);
        row.compare(&mut findings, "centroid_z_m", resting_centroid_z(&circle(1.0), level));
    }
    for row in &table("circle_inverse.csv").rows {
        let area = row.number("area_share") * sublevel.total_area();
        row.compare(&mut findings, "depth_share", sublevel.level_for_area(area) / 2.0);
        let still = judge(&study(section(&circle(1.0), &[], 3.0), Fill::Share(row.number("area_share")))).still;
        row.compare(&mut findings, "depth_share", still.depth_m / 2.0);
    }
    findings.report(78);
}

#[test]
fn tilted_ellipses() {
    let mut findings = Findings::default();
    for row in &table("ellipse.csv").rows {
        assert_eq!(row.tolerance(), Tolerance::Deviation);
        let semi_axis_z = row.number("semi_axis_z_m");
        let (outline, deviation) = ellipse(row.number("semi_axis_s_m"), semi_axis_z, 200);
        assert!(deviation < 2e-6, "{}: deviation {deviation}", row.id());
        // The surface lies within the deviation of the true one; where it meets the wall at a slant, the end of
        // the chord moves by a few times as much.
        let allowed = 2.0 * deviation + 1e-9;
        let fill = Fill::Level(2.0 * semi_axis_z * row.number("depth_share"));
        let case = judge_case(&study(section(&outline, &[], 1.0), fill), held(row.number("slope") * GRAVITY, 0.0));
        let settled = settled(&case);
        let surface = chord(settled);
        row.compare_within(&mut findings, "offset_m", settled.pools[0].offset_m.unwrap(), allowed);
        row.compare_within(&mut findings, "centroid_x_m", -settled.centroid.x, allowed);
        row.compare_within(&mut findings, "centroid_z_m", settled.centroid.y, allowed);
        row.compare_within(&mut findings, "chord_x1_m", -surface.right.x, 4.0 * allowed);
        row.compare_within(&mut findings, "chord_x2_m", -surface.left.x, 4.0 * allowed);
    }
    findings.report(25);
}

#[test]
fn rounded_rectangles_and_capsules() {
    let mut findings = Findings::default();
    for row in &table("rounded_rectangle.csv").rows {
        let height = row.number("height_m");
        let outline = rounded_rectangle(row.number("width_m"), height, row.number("radius_m"));
        let level = height * row.number("depth_share");
        let area = Sublevel::new(&outline, UP).area_below(level);
        row.compare(&mut findings, "area_m2", area);
        row.compare(&mut findings, "centroid_z_m", resting_centroid_z(&outline, level));
        // Upside down, the rest lies below the same line.
        let rest = Sublevel::new(&outline, -UP).area_below(-level);
        let total = Sublevel::new(&outline, -UP).total_area();
        row.compare(&mut findings, "area_m2", total - rest);
    }
    findings.report(72);
}

#[test]
fn tilted_rounded_rectangles() {
    let mut findings = Findings::default();
    for row in &table("rounded_rectangle_tilted.csv").rows {
        let height = row.number("height_m");
        let outline = rounded_rectangle(row.number("width_m"), height, row.number("radius_m"));
        let fill = Fill::Level(height * row.number("depth_share"));
        let case = judge_case(&study(section(&outline, &[], 1.0), fill), held(row.number("slope") * GRAVITY, 0.0));
        let settled = settled(&case);
        row.compare(&mut findings, "offset_m", settled.pools[0].offset_m.unwrap());
        row.compare(&mut findings, "centroid_x_m", -settled.centroid.x);
        row.compare(&mut findings, "centroid_z_m", settled.centroid.y);
    }
    findings.report(18);
}

#[test]
fn tilted_round_barrels() {
    let mut findings = Findings::default();
    for row in &table("barrel_tilted.csv").rows {
        let length = row.number("length_m");
        let mut barrel = section(&rectangle(length, 2.0), &[], 1.0);
        barrel.width = WidthLaw::RoundBarrel { diameter_m: 2.0, bottom_z_m: 0.0 };
        let study = study(barrel, Fill::Level(2.0 * row.number("depth_share")));
        let results = judge(&study);
        row.compare(&mut findings, "volume_m3", results.still.volume_m3);
        assert!((results.capacity_m3 - PI * length).abs() < 1e-9 * length, "capacity {}", results.capacity_m3);
        let case = judge_case(&study, held(row.number("slope") * GRAVITY, 0.0));
        row.compare(&mut findings, "volume_m3", settled(&case).volume_m3);
        row.compare(&mut findings, "low_end_m", line_z(&case, length));
        row.compare(&mut findings, "high_end_m", line_z(&case, 0.0));
        row.compare(&mut findings, "centroid_from_low_end_m", length - settled(&case).centroid.x);
        row.compare(&mut findings, "centroid_z_m", settled(&case).centroid.y);
    }
    findings.report(60);
}

/// A section whose horizontal slices have the area of those of a solid; and the deviation of its outline.
fn solid(name: &str) -> (Section, f64) {
    match name {
        // Slice pi r2 = 2 r x pi r/2, with r the half chord of the circle.
        "sphere" => {
            let mut sphere = section(&circle(1.0), &[], 1.0);
            sphere.width = WidthLaw::Oval { width_m: FRAC_PI_2, height_m: 2.0, bottom_z_m: 0.0 };
            (sphere, 0.0)
        }
        // The same with r from 0.5 m to 1.5 m.
        "frustum" => {
            let mut frustum = section(&polygon(&[(-0.5, 0.0), (0.5, 0.0), (1.5, 2.0), (-1.5, 2.0)]), &[], 1.0);
            frustum.width = WidthLaw::Table(vec![(0.0, 0.5 * FRAC_PI_2), (2.0, 1.5 * FRAC_PI_2)]);
            (frustum, 0.0)
        }
        // Slice 2 r L + pi r2/2 = 2 r (L + 2 x pi r/8): a box of length L, and half ellipses of semi-axis pi R/8.
        "heads" => {
            let (radius, length) = (1.2_f64, 8.0_f64);
            let (heads, deviation) = ellipse(PI * radius / 8.0, radius, 200);
            // The chain starts at the right end and runs counter-clockwise: a quarter of it is the crown.
            let apart = |edge: &Edge, shift: f64| {
                let move_by = Vec2::new(shift, 0.0);
                Edge { start: edge.start + move_by, end: edge.end + move_by, sweep: edge.sweep }
            };
            let mut outline: Vec<Edge> = heads[150..].iter().chain(&heads[..50]).map(|e| apart(e, 4.0)).collect();
            outline.push(Edge::line(Point::new(4.0, 2.0 * radius), Point::new(-4.0, 2.0 * radius)));
            outline.extend(heads[50..150].iter().map(|e| apart(e, -4.0)));
            outline.push(Edge::line(Point::new(-4.0, 0.0), Point::new(4.0, 0.0)));
            for i in 0..outline.len() {
                outline[i].end = outline[(i + 1) % outline.len()].start;
            }
            let mut tank = section(&outline, &[], 1.0);
            tank.width = WidthLaw::RoundBarrel { diameter_m: 2.0 * radius, bottom_z_m: 0.0 };
            // A shift of both heads by the deviation, over the whole height.
            (tank, 2.0 * deviation * length.max(PI * radius * radius))
        }
        other => panic!("no solid {other}"),
    }
}

/// Went wrong once: an arc that touches the lowest line of its width law was integrated across the kink there.
#[test]
fn solids_with_the_same_horizontal_slices() {
    let mut findings = Findings::default();
    for row in &table("solids.csv").rows {
        let (section, deviation) = solid(row.text("solid"));
        let still = judge(&study(section, Fill::Level(row.number("depth_m")))).still;
        match row.tolerance() {
            Tolerance::Deviation => row.compare_within(&mut findings, "volume_m3", still.volume_m3, deviation + 6e-8),
            _ => row.compare(&mut findings, "volume_m3", still.volume_m3),
        }
    }
    findings.report(9);
}
