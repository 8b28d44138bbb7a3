//! Properties of whole judgements on random sections that keep the liquid in one pool.

use brimwright::analysis::{CaseResult, Settled};
use brimwright::cases::Attitude;
use brimwright::geom::{Edge, Point, Vec2, cross, rotate};
use brimwright::section::{Section, WidthLaw};
use brimwright::study::Fill;
use proptest::prelude::*;

use crate::support::clip::quadrature;
use crate::support::random::{Sample, config, convex, rounded, share};
use crate::support::shapes::{rectangle, section};
use crate::support::*;

fn one_pool() -> impl Strategy<Value = Sample> {
    prop_oneof![2 => convex(true), 1 => convex(false), 1 => rounded()]
}

/// Up to three times gravity sideways, and vertically from free fall's far side to three times gravity; never straight
/// up or down, where the way may lead through free fall.
fn accel() -> impl Strategy<Value = (f64, f64)> {
    (prop_oneof![-30.0..-0.01, 0.01..30.0], prop_oneof![Just(0.0), -25.0..30.0])
}

fn near(got: f64, expected: f64, allowed: f64, what: &str) -> Result<(), TestCaseError> {
    prop_assert!(
        (got - expected).abs() <= allowed,
        "{what}: expected {expected:e}, got {got:e}, off by {:e}, tolerance {allowed:e}",
        got - expected
    );
    Ok(())
}

/// Sizes to which forces and moments are compared.
struct Scale {
    force_n: f64,
    moment_n_m: f64,
    length_m: f64,
}

fn scale(sample: &Sample, settled: &Settled) -> Scale {
    let (low, high) = sample.extent(Vec2::new(0.0, 1.0));
    let (left, right) = sample.extent(Vec2::new(1.0, 0.0));
    let length_m =
        [high - low, right - left, low.abs(), high.abs(), left.abs(), right.abs()].into_iter().fold(0.0, f64::max);
    // A thin wedge of liquid far along a wall presses little in sum though its parts press much.
    let pressed: f64 = settled.edges.iter().map(|e| e.force_n.norm()).sum();
    let weight_n = (settled.volume_m3 + settled.spilled_m3) * WATER * GRAVITY;
    let force_n = pressed + weight_n;
    Scale { force_n, moment_n_m: force_n * length_m, length_m }
}

#[test]
fn volume_is_conserved() {
    proptest!(config(80, 41), |(sample in one_pool(), share in share(), (a_s, a_z) in accel(), width in 0.1..5.0)| {
        let study = study(sample.section(&[], width), Fill::Share(share));
        let case = judge_case(&study, held(a_s, a_z));
        let settled = settled(&case);
        let want = share * width * quadrature(&sample.edges(), Vec2::new(0.0, 1.0), f64::MAX).area;
        near(settled.volume_m3, want, 1e-11 * want, "volume")?;
        prop_assert_eq!(settled.spilled_m3, 0.0);
        let below = width * quadrature(&sample.edges(), case.gravity.up.unwrap(), settled.pools[0].level_m).area;
        near(below, want, 1e-11 * want / share, "volume below the surface")?;
    });
}

#[test]
fn loads_sum_to_mass_times_effective_gravity_at_the_centroid() {
    proptest!(config(100, 42), |(sample in one_pool(), share in share(), (a_s, a_z) in accel(), width in 0.1..5.0,
                                 about in (-3.0..3.0, -3.0..3.0))| {
        let mut study = study(sample.section(&[], width), Fill::Share(share));
        study.moment_about = Point::new(about.0, about.1);
        study.ullage_gage_pa = 2.0e4;
        let case = judge_case(&study, held(a_s, a_z));
        let settled = settled(&case);
        let (force, moment) = sum_of_loads(settled);
        let weight = Vec2::new(-a_s, -GRAVITY - a_z) * (WATER * settled.volume_m3);
        let arm = settled.centroid - study.moment_about;
        let scale = scale(&sample, settled);
        near(force.x, weight.x, 1e-11 * scale.force_n, "force along s")?;
        near(force.y, weight.y, 1e-11 * scale.force_n, "force along z")?;
        let reach = scale.length_m + study.moment_about.coords.norm();
        near(moment, cross(arm, weight), 1e-11 * scale.force_n * reach, "moment")?;
        near(settled.total_force_n.x, weight.x, 1e-11 * scale.force_n, "total along s")?;
        near(settled.total_force_n.y, weight.y, 1e-11 * scale.force_n, "total along z")?;
        near(settled.total_moment_n_m, cross(arm, weight), 1e-11 * scale.force_n * reach, "total moment")?;
    });
}

#[test]
fn shaped_side_walls_carry_what_their_slope_takes() {
    // The side walls of a box whose width follows a table lean by w'/2 on each side. They press only along z:
    // F_z = - sum over the rows of w' x integral of the pressure over the part of the section between two rows.
    let rows = (0.2..2.0, 0.2..2.0, 0.2..2.0, 0.2..2.0);
    proptest!(config(60, 43), |(size in (0.5..6.0, 0.5..3.0), (w0, w1, w2, w3) in rows, share in share(), (a_s, a_z) in accel())| {
        let (length, height) = size;
        let z = [0.0, 0.3 * height, 0.55 * height, height];
        let mut tank = section(&rectangle(length, height), &[], 1.0);
        tank.width = WidthLaw::Table(vec![(z[0], w0), (z[1], w1), (z[2], w2), (z[3], w3)]);
        let case = judge_case(&study(tank, Fill::Share(share)), held(a_s, a_z));
        let (settled, up) = (settled(&case), case.gravity.up.unwrap());
        let weight = WATER * case.gravity.magnitude;
        let w = [w0, w1, w2, w3];
        let (mut force_z, mut moment) = (0.0, 0.0);
        for i in 0..3 {
            let strip: Vec<Edge> = rectangle(length, z[i + 1] - z[i])
                .iter()
                .map(|e| Edge::line(e.start + Vec2::new(0.0, z[i]), e.end + Vec2::new(0.0, z[i])))
                .collect();
            let slope = (w[i + 1] - w[i]) / (z[i + 1] - z[i]);
            let below = quadrature(&strip, up, settled.pools[0].level_m);
            if below.pressed > 0.0 {
                force_z -= slope * weight * below.pressed;
                moment -= slope * weight * below.pressed * below.pressed_at.x;
            }
        }
        let force_n = settled.total_force_n.norm() + settled.edges.iter().map(|e| e.force_n.norm()).sum::<f64>();
        near(settled.sides_force_n.x, 0.0, 1e-9 * force_n, "side walls along s")?;
        near(settled.sides_force_n.y, force_z, 1e-9 * force_n, "side walls along z")?;
        near(settled.sides_moment_n_m, moment, 1e-9 * force_n * length, "moment of the side walls")?;
    });
}

#[test]
fn shaped_side_walls_never_push_along_s() {
    // Their normals have no part along s, so the edges alone must carry mass times acceleration that way.
    proptest!(config(60, 49), |(sample in one_pool(), share in share(), (a_s, a_z) in accel(),
                                 law in 0..3_usize, below in prop_oneof![Just(0.0), 0.0..0.5], above in prop_oneof![Just(0.0), 0.0..0.5])| {
        let (low, high) = sample.extent(Vec2::new(0.0, 1.0));
        let height_m = (high - low) * (1.0 + below + above);
        let bottom_z_m = low - below * (high - low);
        let mut section = sample.section(&[], 1.0);
        section.width = match law {
            0 => WidthLaw::RoundBarrel { diameter_m: height_m, bottom_z_m },
            1 => WidthLaw::Oval { width_m: 0.3 * height_m, height_m, bottom_z_m },
            _ => WidthLaw::Table(vec![(bottom_z_m, 0.0), (low + 0.4 * (high - low), 2.0), (bottom_z_m + height_m, 0.5)]),
        };
        let case = judge_case(&study(section, Fill::Share(share)), held(a_s, a_z));
        let settled = settled(&case);
        let edges: Vec2 = settled.edges.iter().map(|e| e.force_n).sum();
        let want = -a_s * WATER * settled.volume_m3;
        near(edges.x, want, 1e-9 * scale(&sample, settled).force_n, "edges along s")?;
    });
}

#[test]
fn a_turned_section_is_a_heeled_one() {
    proptest!(config(60, 44), |(sample in one_pool(), share in share(), (a_s, a_z) in accel(), heel_deg in -170.0..170.0)| {
        let phi = f64::to_radians(heel_deg);
        let mut heeled = held(a_s, a_z);
        heeled.attitude = Attitude::HeelDeg(heel_deg);
        let along = rotate(Vec2::new(a_s, a_z), phi);
        let turned = Sample {
            center: sample.center,
            outline: turned(&sample.outline, phi),
            obstacles: sample.obstacles.iter().map(|o| turned(o, phi)).collect(),
        };
        let before = judge_case(&study(sample.section(&[], 1.0), Fill::Share(share)), heeled);
        let after = judge_case(&study(turned.section(&[], 1.0), Fill::Share(share)), held(along.x, along.y));
        let (one, other) = (settled(&before), settled(&after));
        let scale = scale(&sample, one);
        near(other.pools[0].level_m, one.pools[0].level_m, 1e-9 * scale.length_m, "level")?;
        let centroid = rotate(one.centroid.coords, phi) - other.centroid.coords;
        near(centroid.norm(), 0.0, 1e-9 * scale.length_m, "centroid")?;
        near(other.peak_pa, one.peak_pa, 1e-9 * one.peak_pa, "peak pressure")?;
        for (a, b) in one.edges.iter().zip(&other.edges) {
            near((rotate(a.force_n, phi) - b.force_n).norm(), 0.0, 1e-9 * scale.force_n, &a.name)?;
            near(b.moment_n_m, a.moment_n_m, 1e-9 * scale.moment_n_m, &a.name)?;
        }
    });
}

/// The outline run the other way round: edge `i` becomes edge `n - 1 - i`.
fn reversed(section: &Section) -> Section {
    let n = section.outline.len();
    let mut out = section.clone();
    for i in 0..n {
        let old = n - 1 - i;
        out.outline[i] = section.outline[old].clone();
        out.outline[i].start = section.outline[(old + 1) % n].start;
        out.outline[i].sweep_rad = -section.outline[old].sweep_rad;
    }
    for obstacle in &mut out.obstacles {
        let n = obstacle.vertices.len();
        let old = obstacle.vertices.clone();
        for i in 0..n {
            obstacle.vertices[i].start = old[(n - i) % n].start;
            obstacle.vertices[i].sweep_rad = -old[n - 1 - i].sweep_rad;
        }
    }
    out
}

#[test]
fn the_sense_of_the_outline_changes_nothing() {
    proptest!(config(30, 45), |(sample in one_pool(), share in share(), (a_s, a_z) in accel())| {
        let section = sample.section(&[0], 1.3);
        let one = judge_case(&study(section.clone(), Fill::Share(share)), held(a_s, a_z));
        let other = judge_case(&study(reversed(&section), Fill::Share(share)), held(a_s, a_z));
        prop_assert_eq!(one.settled.is_ok(), other.settled.is_ok());
        if let (Ok(a), Ok(b)) = (&one.settled, &other.settled) {
            let scale = scale(&sample, a);
            near(b.volume_m3, a.volume_m3, 1e-9 * (a.volume_m3 + a.spilled_m3), "volume")?;
            prop_assert_eq!(a.pools.len(), b.pools.len());
            for (a, b) in a.pools.iter().zip(&b.pools) {
                near(b.level_m, a.level_m, 1e-9 * scale.length_m, "level")?;
            }
            let n = section.outline.len();
            for i in 0..n {
                let gap = (edge_load(a, i).force_n - edge_load(b, n - 1 - i).force_n).norm();
                near(gap, 0.0, 1e-9 * scale.force_n, "load on an edge")?;
            }
        }
    });
}

#[test]
fn the_loads_on_two_parts_of_an_edge_add_up() {
    proptest!(config(60, 46), |(sample in one_pool(), share in share(), (a_s, a_z) in accel(), at in 0.05..0.95, which in 0..99_usize)| {
        let idx = which % sample.outline.len();
        let edge = sample.outline[idx];
        let mut split = sample.clone();
        split.outline.splice(idx..=idx, [edge.part(0.0, at), edge.part(at, 1.0)]);
        let one = judge_case(&study(sample.section(&[], 1.0), Fill::Share(share)), held(a_s, a_z));
        let two = judge_case(&study(split.section(&[], 1.0), Fill::Share(share)), held(a_s, a_z));
        let (one, two) = (settled(&one), settled(&two));
        let scale = scale(&sample, one);
        let (whole, a, b) = (edge_load(one, idx), edge_load(two, idx), edge_load(two, idx + 1));
        near((a.force_n + b.force_n - whole.force_n).norm(), 0.0, 1e-10 * scale.force_n, "force")?;
        near(a.moment_n_m + b.moment_n_m, whole.moment_n_m, 1e-10 * scale.moment_n_m, "moment")?;
        near(a.wetted_length_m + b.wetted_length_m, whole.wetted_length_m, 1e-9 * scale.length_m, "wetted length")?;
    });
}

#[test]
fn the_mirror_image_under_the_opposite_acceleration_is_the_same_judgement() {
    proptest!(config(30, 47), |(sample in one_pool(), share in share(), (a_s, a_z) in accel(), mouth in 0..99_usize)| {
        let n = sample.outline.len();
        let mirror = |edges: &[Edge]| -> Vec<Edge> {
            let flip = |p: Point| Point::new(-p.x, p.y);
            edges.iter().rev().map(|e| Edge { start: flip(e.end), end: flip(e.start), sweep: e.sweep }).collect()
        };
        let image = Sample {
            center: Point::new(-sample.center.x, sample.center.y),
            outline: mirror(&sample.outline),
            obstacles: sample.obstacles.iter().map(|o| mirror(o)).collect(),
        };
        let mouth = mouth % n;
        let one = judge_case(&study(sample.section(&[mouth], 1.0), Fill::Share(share)), held(a_s, a_z));
        let other = judge_case(&study(image.section(&[n - 1 - mouth], 1.0), Fill::Share(share)), held(-a_s, a_z));
        prop_assert_eq!(one.settled.is_ok(), other.settled.is_ok());
        if let (Ok(a), Ok(b)) = (&one.settled, &other.settled) {
            near(b.volume_m3, a.volume_m3, 1e-8 * (a.volume_m3 + a.spilled_m3), "volume left")?;
            near(b.peak_pa, a.peak_pa, 1e-8 * a.peak_pa.abs().max(1.0), "peak pressure")?;
        }
        let limit = |case: &CaseResult| verdict(case, "Contained").and_then(|v| v.limit).map(|m| m.si);
        if let (Some(a), Some(b)) = (limit(&one), limit(&other)) {
            near(b, a, 1e-7 * a.abs().max(GRAVITY), "first spill")?;
        }
    });
}

#[test]
fn what_the_brim_leaves_agrees_with_sampling_the_ramp() {
    // On its way effective gravity turns by the angle between its ends. At many directions between them the liquid
    // below the lowest point of the mouth is found by quadrature; the least of them, or the fill, is left. Between
    // samples the least lies lower by the square of a step at most.
    const N_TURNS: usize = 120;
    proptest!(config(30, 48), |(sample in convex(true), share in share(), (a_s, a_z) in accel(), mouth in 0..99_usize)| {
        let mouth = mouth % sample.outline.len();
        let case = judge_case(&study(sample.section(&[mouth], 1.0), Fill::Share(share)), held(a_s, a_z));
        let settled = settled(&case);
        let (edges, at_rest, delta) = (sample.edges(), Vec2::new(0.0, -GRAVITY), -Vec2::new(a_s, a_z));
        let end = at_rest + delta;
        let angle = cross(at_rest, end).atan2(at_rest.dot(&end));
        let whole = quadrature(&edges, Vec2::new(0.0, 1.0), f64::MAX).area;
        let (mut least, mut first_spill) = (share * whole, None);
        for i in 0..=N_TURNS {
            let gravity = rotate(at_rest, angle * i as f64 / N_TURNS as f64);
            let up = -gravity / gravity.norm();
            let held = quadrature(&edges, up, sample.outline[mouth].extent(up).0.0).area;
            if held < least {
                // Share of the acceleration at which gravity points this way: at_rest + share delta.
                first_spill.get_or_insert(-cross(at_rest, gravity) / cross(delta, gravity));
                least = held;
            }
        }
        near(settled.volume_m3 + settled.spilled_m3, share * whole, 1e-11 * whole, "left and spilled")?;
        let left = settled.volume_m3;
        prop_assert!(left <= least + 1e-9 * whole, "left {left}, samples allow {least}");
        prop_assert!(left >= least - 2e-3 * whole, "left {left}, samples allow {least}");
        let size = a_s.hypot(a_z);
        if let (Some(first), Some(limit)) = (first_spill, verdict(&case, "Contained").expect("judged").limit) {
            let first = first * size;
            prop_assert!(limit.si <= first + 1e-6 * size, "first spill {}, a sample spills at {first}", limit.si);
        }
    });
}
