//! The model against volumes of the kernel and against hydrostatics by hand.

use super::*;
use crate::analysis;
use crate::app::EXAMPLES;
use crate::cases::{Accel, AccelUnit};
use crate::geom::Sublevel;
use crate::gui::board::strips::Strip;
use crate::gui::{plating, starter};
use crate::problem::Severity;
use crate::section::{Opening, OpeningShape, WidthLaw};
use crate::study::Fill;

fn detail(study: &ValidStudy) -> Detail {
    let (low, high) = study.region().bounds();
    Detail { sagitta_m: 1e-5 * (high - low).norm(), units: UnitSystem::Si }
}

fn area<'a>(bands: impl IntoIterator<Item = &'a Band>) -> f64 {
    bands.into_iter().flat_map(|b| &b.strips).map(Strip::area).sum()
}

/// The plain box with an upright plate in its middle, in which a manhole is open, half full, under `a_s` m/s2.
fn divided_box(a_s: f64) -> Study {
    let mut study = starter::study();
    let mut plate = plating::new_plate(&study.section).expect("a plate across the box");
    let shape = OpeningShape::Share(1.0);
    plate.openings.push(Opening { name: String::new(), from_m: 0.1, to_m: 0.2, shape });
    study.section.plates.push(plate);
    study.section.width = WidthLaw::Constant { width_m: 1.5 };
    study.fill = Fill::Share(0.5);
    study.cases[0].accel = Accel::Components { a_s, a_z: 0.0, unit: AccelUnit::MPerS2 };
    study
}

/// The bands of each pool add up to its volume over the width, under both bounds; where the width is not constant, to
/// the exact area below the settled level.
#[test]
fn bands_add_up_to_the_liquid_of_every_demo() {
    let divided = divided_box(2.0).validate().expect("the box is sound");
    let parsed = |text: &str| crate::scenario::parse(text.as_bytes()).expect("a demo").validate().expect("a demo");
    let demos = EXAMPLES.iter().map(|example| (example.file_name, parsed(example.text)));
    let mut n_pools = 0;
    for (name, study) in demos.chain([("divided box", divided)]) {
        let results = analysis::run(&study);
        // A flattened arc of sagitta f lies about 2/3 f from the true one, all round.
        let perimeter: f64 = study.region().geometry().iter().map(|e| e.length()).sum();
        let tolerance = detail(&study).sagitta_m * perimeter;
        for (case_idx, case) in results.cases.iter().enumerate() {
            for (bound, state) in case.states() {
                let shown = Shown { case_idx, stage: Stage::Under(bound), ..Default::default() };
                let model = BoardModel::judged(&study, &results, shown, detail(&study));
                assert_eq!(model.pools.len(), state.pools.len());
                for (drawn, pool) in model.pools.iter().zip(&state.pools) {
                    let up = case.gravity.up.expect("it settles");
                    let want = match study.study().section.width.constant() {
                        Some(width_m) => pool.volume_m3 / width_m,
                        None if study.study().section.plates.is_empty() && state.pools.len() == 1 => {
                            Sublevel::new(study.region().geometry(), up).area_below(pool.level_m)
                        }
                        None => continue,
                    };
                    let got = area(&drawn.tinted.bands);
                    let place = (name, &case.name, bound);
                    assert!(
                        (got - want).abs() <= tolerance,
                        "{place:?}: got {got} m2, expected {want} +- {tolerance}"
                    );
                    n_pools += 1;
                }
            }
        }
    }
    assert!(n_pools > 10, "only {n_pools} pools were compared");
}

#[test]
fn each_pool_is_drawn_in_its_own_cell_and_the_other_bound_as_lines() {
    let study = divided_box(2.0).validate().expect("the box is sound");
    let results = analysis::run(&study);
    let shown = |bound| Shown { stage: Stage::Under(bound), ..Default::default() };
    let sealed = BoardModel::judged(&study, &results, shown(Bound::Sealed), detail(&study));
    assert_eq!((sealed.pools.len(), sealed.other_surface.len()), (2, 2), "one surface, cut by the plate");
    let s = study.study().section.plates[0].points[0].x;
    for (pool, other) in [(0, 1), (1, 0)] {
        let middle = sealed.pools[pool].centroid;
        assert!(sealed.pools[pool].contains(middle) && !sealed.pools[other].contains(middle), "at {middle}");
        let is_left = middle.x < s;
        let strips = sealed.pools[pool].tinted.bands.iter().flat_map(|b| &b.strips);
        let mut points = strips.flat_map(|strip| strip.left.iter().chain(&strip.right));
        assert!(points.all(|p| if is_left { p.x <= s + 1e-9 } else { p.x >= s - 1e-9 }), "beyond the plate");
    }
    let settled = BoardModel::judged(&study, &results, shown(Bound::Settled), detail(&study));
    assert_eq!((settled.pools.len(), settled.other_surface.len()), (1, 2));
}

/// Two equal cells of length L under a: the levels at the plate differ by a L / g, so the net pressure at its foot is
/// rho a L (hydrostatics, worked by hand). One pool on both sides presses with nothing.
#[test]
fn the_prism_of_a_plate_is_as_high_as_the_levels_differ() {
    let a = 2.0;
    let study = divided_box(a).validate().expect("the box is sound");
    let results = analysis::run(&study);
    let shown = |bound, plate_idx| Shown { stage: Stage::Under(bound), plate_idx, ..Default::default() };
    let model = |bound, plate_idx| BoardModel::judged(&study, &results, shown(bound, plate_idx), detail(&study));
    assert!(model(Bound::Sealed, None).prisms.is_empty(), "no plate is chosen");
    let settled = model(Bound::Settled, Some(0)).prisms;
    assert!(settled.is_empty(), "nothing presses: {settled:?}");
    let prisms = model(Bound::Sealed, Some(0)).prisms;
    let (low, high) = study.region().bounds();
    let want = study.study().liquid.density_kg_per_m3 * a * 0.5 * (high.x - low.x);
    let (peak_pa, _) = prisms[0].peak.expect("a peak");
    assert!((peak_pa.abs() - want).abs() < 1e-9 * want, "got {peak_pa} Pa, expected {want} Pa");
    // The tank accelerates to the right: the right cell stands higher at the plate and pushes to the left.
    let load = prisms[0].load.expect("a resultant");
    assert!(load.force_n.x < 0.0 && (load.on_edge.x - study.study().section.plates[0].points[0].x).abs() < 1e-9);
    for part in &prisms[0].parts {
        assert!(part.toward.x * part.pa[0] <= 0.0 && part.toward.x * part.pa[1] <= 0.0, "{part:?}");
    }
}

#[test]
fn faults_of_plates_have_their_numbers_at_the_plate_and_the_opening() {
    let study = divided_box(0.0);
    let plate = &study.section.plates[0];
    let problem = |place| Problem::fault(place, "is wrong", "mend it");
    let problems = [
        problem(Place::Plate { plate_idx: 0, opening_idx: None }),
        problem(Place::Plate { plate_idx: 0, opening_idx: Some(0) }),
        problem(Place::Plate { plate_idx: 7, opening_idx: None }),
    ];
    let detail = Detail { sagitta_m: 1e-3, units: UnitSystem::Si };
    let marks = BoardModel::faulty(&study, &problems, None, detail).faults;
    let got: Vec<(usize, Severity, Point)> = marks.iter().map(|m| (m.number, m.severity, m.at)).collect();
    let at = |along_m| plate.point_at(along_m);
    let want = [(1, Severity::Fault, at(0.5 * plate.length_m())), (2, Severity::Fault, at(0.5 * (0.1 + 0.2)))];
    assert_eq!(got, want);
}

#[test]
fn the_brim_that_governs_is_the_dimensions_own() {
    for example in EXAMPLES {
        let study = crate::scenario::parse(example.text.as_bytes()).expect(example.file_name);
        let study = study.validate().expect(example.file_name);
        let results = analysis::run(&study);
        for case_idx in 0..results.cases.len() {
            let detail = Detail { sagitta_m: 1e-3, units: UnitSystem::Si };
            let model = BoardModel::judged(&study, &results, Shown { case_idx, ..Default::default() }, detail);
            assert_eq!(model.brims.len(), study.mouths().len());
            let governing: Vec<Point> = model.brims.iter().filter(|b| b.governs).map(|b| b.at).collect();
            assert_eq!(governing.len(), usize::from(!model.brims.is_empty()), "{}", example.file_name);
            if let Some(freeboard) = model.freeboard {
                let off = (governing[0] - freeboard.brim).norm();
                assert!(off < 1e-9, "{} case {case_idx}: {off} m apart", example.file_name);
            }
        }
    }
}
