//! The settled surface: rates, the same work by polygon clipping, and the error of volumes.

use std::f64::consts::TAU;
use std::hint::black_box;

use brimwright::analysis;
use brimwright::app::EXAMPLES;
use brimwright::geom::{Edge, Sublevel, Until, Vec2};
use brimwright::scenario;
use geo::{Area, MultiPolygon};
use proptest::strategy::{Strategy, ValueTree};
use proptest::test_runner::{Config, RngAlgorithm, TestRng, TestRunner};

use crate::support::clip::{geo_below, geo_measure, geo_region, quadrature};
use crate::support::random::{direction, share, star};
use crate::timing::{median_s, print_rate};

const N_EDGES: usize = 40;
const N_FILLS: usize = 1000;

/// Rates on sections of 40 edges, on one core.
pub fn run() {
    for (what, arcs) in [("straight edges", false), ("edges, half of them arcs", true)] {
        let outline = draw(star(N_EDGES..=N_EDGES, arcs), 1).remove(0).outline;
        let ups = directions();
        let sublevel = Sublevel::new(&outline, ups[7]);
        let areas: Vec<f64> =
            (0..N_FILLS).map(|i| sublevel.total_area() * (0.01 + 0.98 * i as f64 / N_FILLS as f64)).collect();
        let level = median_s(|| areas.iter().for_each(|&area| _ = black_box(sublevel.level_for_area(area))));
        let given = format!("{N_EDGES} {what}, direction given, fills differ");
        print_rate(&given, N_FILLS as f64 / level, 1e6);
        let surface = median_s(|| {
            areas.iter().for_each(|&area| _ = black_box(sublevel.chords(sublevel.level_for_area(area))));
        });
        print_rate("  the same with the ends of the surface", N_FILLS as f64 / surface, 1e6);
        let half = 0.5 * sublevel.total_area();
        let fresh = median_s(|| ups.iter().for_each(|&up| _ = black_box(settle(&outline, up, half))));
        print_rate(&format!("{N_EDGES} {what}, a new direction each"), ups.len() as f64 / fresh, 1e5);
        if !arcs {
            compare_with_clipping(&outline, &ups, surface / N_FILLS as f64, fresh / ups.len() as f64);
        }
    }
}

/// The same surfaces by polygon clipping under a bracketing root finder, in the same run. To a clipper a direction
/// that it has seen before is worth nothing.
fn compare_with_clipping(outline: &[Edge], ups: &[Vec2], given_s: f64, fresh_s: f64) {
    let region = geo_region(outline, &[]);
    let want = 0.5 * region.unsigned_area();
    let few = &ups[..20];
    let clip = || few.iter().for_each(|&up| _ = black_box(settle_by_clipping(&region, outline, up, want)));
    let clip_s = median_s(clip) / few.len() as f64;
    println!("  the same by clipping with `geo` under an Illinois root finder {:>9.0} /s", 1.0 / clip_s);
    for (what, ours_s) in [("direction given, fills differ", given_s), ("a new direction each", fresh_s)] {
        let ratio = clip_s / ours_s;
        let word = if ratio >= 50.0 { "reached" } else { "missed" };
        println!("    ours, {what:<50} {ratio:>6.0} times   aim        50 times   {word}");
    }
    let apart =
        few.iter().map(|&up| (settle(outline, up, want) - settle_by_clipping(&region, outline, up, want)).abs());
    println!("    levels agree to {:.1e} of the section's size", apart.fold(0.0, f64::max) / size(outline));
}

/// The level of an area, along a direction never seen before.
fn settle(outline: &[Edge], up: Vec2, want: f64) -> f64 {
    Sublevel::up_to(outline, up, Until::Area(want)).level_for_area(want)
}

fn settle_by_clipping(region: &MultiPolygon, outline: &[Edge], up: Vec2, want: f64) -> f64 {
    let (mut low, mut high) = outline.iter().fold((f64::MAX, f64::MIN), |(low, high), e| {
        let level = up.dot(&e.start.coords);
        (low.min(level), high.max(level))
    });
    let size = high - low;
    let (mut at_low, mut at_high) = (-want, want);
    let mut last_side = 0;
    loop {
        let level = (low * at_high - high * at_low) / (at_high - at_low);
        let error = geo_measure(&geo_below(region, up, level)).0 - want;
        // The clipper's own grid.
        if error.abs() <= 1e-9 * want || high - low <= 1e-10 * size {
            return level;
        }
        let side = if error < 0.0 { -1 } else { 1 };
        if side < 0 {
            (low, at_low) = (level, error);
            at_high *= if last_side == side { 0.5 } else { 1.0 };
        } else {
            (high, at_high) = (level, error);
            at_low *= if last_side == side { 0.5 } else { 1.0 };
        }
        last_side = side;
    }
}

/// Errors of volumes over random sections, fills and directions.
pub fn precision() {
    const N_SECTIONS: usize = 10_000;
    println!("  relative error of the volume, {N_SECTIONS} random sections of 5 to 40 edges, fill 1 % to 99 %");
    for (what, arcs, aim) in [("straight edges", false, 1e-12), ("with arcs", true, 1e-11)] {
        let (mut back, mut outside) = (Vec::new(), Vec::new());
        for (sample, up, share) in draw((star(5..=40, arcs), direction(), share()), N_SECTIONS) {
            let edges = sample.edges();
            let sublevel = Sublevel::new(&edges, up);
            let area = share * sublevel.total_area();
            let level = sublevel.level_for_area(area);
            back.push((sublevel.area_below(level) - area).abs() / area);
            outside.push((quadrature(&edges, up, level).area - area).abs() / area);
        }
        print_errors(&format!("{what}: area of the level found"), back, aim);
        print_errors(&format!("{what}: the same area by quadrature"), outside, aim);
    }
}

fn print_errors(name: &str, mut errors: Vec<f64>, aim: f64) {
    errors.sort_unstable_by(f64::total_cmp);
    let at = |share: f64| errors[((errors.len() - 1) as f64 * share) as usize];
    let word = if at(1.0) <= aim { "reached" } else { "missed" };
    let (median, most, worst) = (at(0.5), at(0.99), at(1.0));
    println!("  {name:<48} median {median:.1e}   99 % {most:.1e}   worst {worst:.1e}   aim {aim:.0e}   {word}");
}

/// Whole judgements of the demo scenarios.
pub fn demos() {
    for example in EXAMPLES {
        let study = match scenario::parse(example.text.as_bytes()) {
            Ok(study) => study,
            Err(problems) => {
                println!("  {}: cannot be read: {}", example.file_name, problems[0]);
                continue;
            }
        };
        match study.validate() {
            Ok(valid) => {
                let seconds = median_s(|| _ = black_box(analysis::run(&valid)));
                println!("  {:<40} {} load cases   {:.3} ms", example.file_name, study.cases.len(), 1e3 * seconds);
            }
            Err(problems) => println!("  {}: not judged: {}", example.file_name, problems[0]),
        }
    }
}

fn directions() -> Vec<Vec2> {
    (0..N_FILLS)
        .map(|i| {
            let (sin, cos) = (TAU * 0.618_033_988 * i as f64).sin_cos();
            Vec2::new(cos, sin)
        })
        .collect()
}

/// Largest extent of an outline, m.
fn size(outline: &[Edge]) -> f64 {
    outline.iter().map(|e| (e.start - outline[0].start).norm()).fold(0.0, f64::max)
}

/// Values of a strategy from a fixed seed.
fn draw<S: Strategy>(strategy: S, n: usize) -> Vec<S::Value> {
    let rng = TestRng::deterministic_rng(RngAlgorithm::ChaCha);
    let mut runner = TestRunner::new_with_rng(Config::default(), rng);
    (0..n).map(|_| strategy.new_tree(&mut runner).expect("nothing is filtered").current()).collect()
}
