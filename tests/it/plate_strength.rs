//! Plate strength and weld loads of plates in a tank. Loads are worked out by hand (own derivations, hydrostatics and
//! standard beam formulas); the bending of panels has its own checks against published values, and is taken from there.

use brimwright::analysis::{self, Bound, CaseResult, PanelStrength, PlateResult, SolvedPanels, State, Verdict, Weld};
use brimwright::geom::Point;
use brimwright::material::named;
use brimwright::plates::{PanelGeometry, Profile, SolvedPanel, Strength, Support, strength};
use brimwright::section::{Opening, OpeningShape, Panel, PanelEdges, Plate};
use brimwright::study::{Compartment, Fill, Study};

use crate::support::plated::plate;
use crate::support::shapes::{rectangle, section};
use crate::support::{GRAVITY, WATER, held, judge, judge_case, study};

const STEEL: &str = "structural steel S235";

/// Weight of a cubic metre of the liquid, N.
const WEIGHT: f64 = WATER * GRAVITY;

fn upright(s: f64, from: f64, to: f64) -> Plate {
    let bare = plate(&[Point::new(s, from), Point::new(s, to)]);
    Plate { material: STEEL.into(), thickness_m: 0.012, corrosion_m: 0.001, ..bare }
}

fn with_opening(mut plate: Plate, from_m: f64, to_m: f64, shape: OpeningShape) -> Plate {
    plate.openings.push(Opening { name: String::new(), from_m, to_m, shape });
    plate
}

/// A shut tank, 1 m wide.
fn tank(length: f64, height: f64, plate: Plate, fill: Fill) -> Study {
    let mut section = section(&rectangle(length, height), &[], 1.0);
    section.plates = vec![plate];
    study(section, fill)
}

/// A tank 2 by 1 with a tight plate in its middle, its left half full, the right one empty: at rest the plate bears
/// WEIGHT (1 - z) toward the right, its own right-hand normal.
fn one_sided(plate: Plate) -> CaseResult {
    judge(&one_sided_study(plate)).cases.remove(0)
}

fn one_sided_study(plate: Plate) -> Study {
    let mut study = tank(2.0, 1.0, plate, Fill::Share(0.0));
    let at = Point::new(0.5, 0.5);
    study.compartments = vec![Compartment { name: "full".into(), at, liquid: None, fill: Fill::Share(1.0) }];
    study
}

/// A tank 4 by 1 with a plate in its middle, half full, under a slope of 0.2: with its openings shut each half turns about
/// its own middle, so that 0.3 stand on the left of the plate and 0.7 on its right.
fn two_sided(plate: Plate) -> CaseResult {
    judge_case(&tank(4.0, 1.0, plate, Fill::Share(0.5)), held(0.2 * GRAVITY, 0.0))
}

fn under(case: &CaseResult, bound: Bound) -> &PlateResult {
    case.plates.iter().find(|p| p.bound == bound).unwrap_or_else(|| panic!("nothing {}", bound.word()))
}

fn panel(result: &PlateResult) -> &PanelStrength {
    result.panel.as_ref().expect("a material").as_ref().unwrap_or_else(|reason| panic!("{reason}"))
}

/// What the plates module gives for a panel of the plate under a pressure from its bottom up.
fn bent(width_m: f64, height_m: f64, support: Support, points: &[(f64, f64)]) -> Strength {
    let steel = named(STEEL).expect("a row");
    let geometry = PanelGeometry { width_m, height_m, support, poisson: steel.poisson };
    let pressure = Profile::new(points.to_vec()).expect("a profile");
    strength(&SolvedPanel::new(geometry).expect("a panel"), &pressure, steel, 0.012, 0.001).expect("a strength")
}

fn verdict(case: &CaseResult) -> &Verdict {
    case.verdicts.iter().find(|v| v.criterion == "Plate strength").expect("a verdict")
}

#[track_caller]
fn near(what: &str, got: f64, want: f64) {
    let allowed = 1e-9 * want.abs().max(1e-3);
    assert!((got - want).abs() <= allowed, "{what}: {got}, expected {want} within {allowed:e}");
}

#[track_caller]
fn check_weld(weld: &Weld, end: usize, force: f64, moment: f64) {
    assert_eq!(weld.end, end, "{weld:?}");
    near("force a metre", weld.force_n_per_m(), force);
    near("moment a metre", weld.moment_n(), moment);
}

#[test]
fn a_tight_plate_hands_the_head_to_its_welds() {
    // Under a triangle of q = WEIGHT x 1 m over 1 m, largest at the foot: hinged q / 3 and q / 6; clamped 7 q / 20 and
    // 3 q / 20, with q / 20 and q / 30 of moment (standard beam formulas).
    let case = one_sided(upright(1.0, 0.0, 1.0));
    let welds = &under(&case, Bound::Settled).welds;
    assert_eq!(welds.len(), 2, "{welds:?}");
    for (weld, hinged, clamped, moment) in
        [(&welds[0], 1.0 / 3.0, 0.35, -1.0 / 20.0), (&welds[1], 1.0 / 6.0, 0.15, -1.0 / 30.0)]
    {
        near("hinged", weld.hinged.unwrap().force_n_per_m, hinged * WEIGHT);
        near("clamped", weld.clamped.unwrap().force_n_per_m, clamped * WEIGHT);
        check_weld(weld, weld.end, hinged.max(clamped) * WEIGHT, moment * WEIGHT);
    }
    assert_eq!((welds[0].at, welds[1].at), (Point::new(1.0, 0.0), Point::new(1.0, 1.0)));
    // Drawn from the roof down the same load presses the other way, and the ends change places.
    let case = one_sided(upright(1.0, 1.0, 0.0));
    check_weld(&under(&case, Bound::Settled).welds[1], 1, -0.35 * WEIGHT, WEIGHT / 20.0);
}

#[test]
fn a_sill_is_a_cantilever() {
    // Two by two, a sill 0.5 high in the middle, 0.8 m2 of liquid, slope 1: 0.175 deep on its left, up to its tip on its
    // right (worked out among the hand cases of pools). Along the plate pressures grow by WEIGHT a metre down.
    let case = judge_case(&tank(2.0, 2.0, upright(1.0, 0.0, 0.5), Fill::Volume(0.8)), held(GRAVITY, 0.0));
    let welds = &under(&case, Bound::Settled).welds;
    assert_eq!(welds.len(), 1, "{welds:?}");
    let force = (0.175_f64.powi(2) - 0.5_f64.powi(2)) / 2.0;
    let moment = (0.5_f64.powi(3) - 0.175_f64.powi(3)) / 6.0;
    check_weld(&welds[0], 0, force * WEIGHT, moment * WEIGHT);
    let points = [(0.0, -0.325 * WEIGHT), (0.175, -0.325 * WEIGHT), (0.5, 0.0)];
    let want = bent(1.0, 0.5, Support::SimpleFreeTop, &points);
    let found = panel(under(&case, Bound::Settled));
    assert_eq!(found.support, Support::SimpleFreeTop);
    near("stress", found.strength.stress_pa, want.stress_pa);
    near("deflection", found.strength.deflection_m, want.deflection_m);
}

#[test]
fn a_panel_is_bent_by_the_net_pressure_along_it() {
    let want = bent(1.0, 1.0, Support::Simple, &[(0.0, WEIGHT), (1.0, 0.0)]);
    for plate in [upright(1.0, 0.0, 1.0), upright(1.0, 1.0, 0.0)] {
        let case = one_sided(plate);
        let found = panel(under(&case, Bound::Settled));
        near("stress", found.strength.stress_pa, want.stress_pa);
        near("required thickness", found.strength.required_thickness_m, want.required_thickness_m);
        assert!(found.at.y < 0.5, "the largest stress is in the lower half: {}", found.at);
        let verdict = verdict(&case);
        assert_eq!(verdict.state, State::Holds, "{verdict:?}");
        near("demand", verdict.demand.unwrap().si, want.stress_pa);
        near("limit", verdict.limit.unwrap().si, 235e6 / 1.5);
    }
    // Between stiffeners 0.4 m apart, clamped.
    let edges = PanelEdges::Clamped;
    let stiffened = Plate { panel: Panel { stiffener_spacing_m: Some(0.4), edges }, ..upright(1.0, 0.0, 1.0) };
    let want = bent(0.4, 1.0, Support::Clamped, &[(0.0, WEIGHT), (1.0, 0.0)]);
    near("stress", panel(under(&one_sided(stiffened), Bound::Settled)).strength.stress_pa, want.stress_pa);
}

#[test]
fn a_gap_right_across_makes_a_free_edge() {
    // A drain gap 0.1 high: the plate hangs from the roof, and from z = 0.1 to 0.3 bears 0.4 WEIGHT toward the left, from
    // there to 0.7 less and less. Force 0.08 + 0.08; moment about the roof 0.08 x 0.8 + 0.08 x (0.3 + 0.8 / 3).
    let case = two_sided(with_opening(upright(2.0, 0.0, 1.0), 0.0, 0.1, OpeningShape::Share(1.0)));
    let sealed = under(&case, Bound::Sealed);
    assert_eq!(sealed.welds.len(), 1, "{:?}", sealed.welds);
    let moment = 0.08 * 0.8 + 0.08 * (0.3 + 0.8 / 3.0);
    check_weld(&sealed.welds[0], 1, -0.16 * WEIGHT, moment * WEIGHT);
    // From the roof down.
    let points = [(0.3, 0.0), (0.7, -0.4 * WEIGHT), (0.9, -0.4 * WEIGHT)];
    let want = bent(1.0, 0.9, Support::SimpleFreeTop, &points);
    near("stress", panel(sealed).strength.stress_pa, want.stress_pa);
    // Settled, one pool stands on both sides: nothing presses.
    near("settled stress", panel(under(&case, Bound::Settled)).strength.stress_pa, 0.0);
    // With a gap at the top too only its sides hold it.
    let gap = |plate, from, to| with_opening(plate, from, to, OpeningShape::Share(1.0));
    let case = two_sided(gap(gap(upright(2.0, 0.0, 1.0), 0.0, 0.1), 0.9, 1.0));
    let sealed = under(&case, Bound::Sealed);
    assert_eq!((panel(sealed).support, sealed.welds.len()), (Support::SimpleSides, 0));
    assert_eq!(verdict(&case).bound, Some(Bound::Sealed));
}

#[test]
fn a_hole_weakens_and_a_wide_one_cuts() {
    let stress = |plate| panel(under(&two_sided(plate), Bound::Sealed)).strength.stress_pa;
    let whole = panel(under(&two_sided(upright(2.0, 0.0, 1.0)), Bound::Settled)).strength.clone();
    // A hole of 0.2 m in a panel 1 m wide leaves 0.8 of it.
    let hole = OpeningShape::Holes { n: 1 };
    near("weakened", stress(with_opening(upright(2.0, 0.0, 1.0), 0.4, 0.6, hole)), whole.stress_pa / 0.8);
    // A slot of 0.6 of the width cuts: panels below and above it with free edges, or none of it where there is none.
    let cut = [
        bent(1.0, 0.4, Support::SimpleFreeTop, &[(0.0, -0.4 * WEIGHT), (0.3, -0.4 * WEIGHT), (0.4, -0.3 * WEIGHT)]),
        bent(1.0, 0.4, Support::SimpleFreeTop, &[(0.3, 0.0), (0.4, -0.1 * WEIGHT)]),
    ];
    let want = cut.iter().map(|s| s.stress_pa).fold(whole.stress_pa, f64::max);
    near("cut", stress(with_opening(upright(2.0, 0.0, 1.0), 0.4, 0.6, OpeningShape::Share(0.6))), want);
    // A slot at an end leaves a part of the weld, which bears all of the load.
    let welds = |plate| under(&two_sided(plate), Bound::Sealed).welds.clone();
    let tight = under(&two_sided(upright(2.0, 0.0, 1.0)), Bound::Settled).welds.clone();
    let notched = welds(with_opening(upright(2.0, 0.0, 1.0), 0.95, 1.0, OpeningShape::Share(0.25)));
    near("weld", notched[1].force_n_per_m(), tight[1].force_n_per_m() / 0.75);
    near("other weld", notched[0].force_n_per_m(), tight[0].force_n_per_m());
}

#[test]
fn corrosion_is_never_counted_and_the_mended_plate_holds() {
    let thin = Plate { thickness_m: 0.007, corrosion_m: 0.002, ..upright(1.0, 0.0, 1.0) };
    let case = one_sided(Plate { panel: Panel { stiffener_spacing_m: Some(0.5), ..Panel::default() }, ..thin });
    let found = &panel(under(&case, Bound::Settled)).strength;
    near("net thickness", found.net_thickness_m, 0.005);
    near("required", found.required_thickness_m, 0.002 + 0.005 * found.utilisation.sqrt());
    // Sixteen times the weight, so that the stress gives out before the deflection does.
    let heavy = |thickness_m: f64| {
        let panel = Panel { stiffener_spacing_m: Some(0.25), ..Panel::default() };
        let mut study = one_sided_study(Plate { thickness_m, panel, ..upright(1.0, 0.0, 1.0) });
        study.cases = vec![held(0.0, 15.0 * GRAVITY)];
        judge(&study).cases.remove(0)
    };
    let case = heavy(0.006);
    assert_eq!(verdict(&case).state, State::Fails, "{:?}", verdict(&case));
    let mend = verdict(&case).mend[0].text(Default::default());
    let mm: f64 = mend.split_whitespace().find_map(|w| w.parse().ok()).expect("a thickness");
    let mended = heavy(mm / 1e3);
    assert!(matches!(verdict(&mended).state, State::Holds | State::Close), "{mend}: {:?}", verdict(&mended));
    assert_eq!(verdict(&heavy(mm / 1e3 - 0.001)).state, State::Fails, "{mend}, and a millimetre less holds as well");
}

#[test]
fn what_the_method_does_not_reach_is_not_judged_and_no_material_is_absent() {
    let thin = one_sided(Plate { thickness_m: 0.003, ..upright(1.0, 0.0, 1.0) });
    let found = verdict(&thin);
    assert_eq!(found.state, State::NotJudged, "{found:?}");
    assert!(found.remark.contains("deflects"), "{}", found.remark);
    assert!(found.mend[0].text(Default::default()).starts_with("To be judged, plate"), "{:?}", found.mend);
    let eaten = one_sided(Plate { corrosion_m: 0.012, ..upright(1.0, 0.0, 1.0) });
    assert!(verdict(&eaten).remark.contains("nothing is left"), "{}", verdict(&eaten).remark);
    let bare = one_sided(Plate { material: String::new(), ..upright(1.0, 0.0, 1.0) });
    assert!(bare.absent.iter().any(|a| a.criterion == "Plate strength"), "{:?}", bare.absent);
    assert_eq!(under(&bare, Bound::Settled).panel, None);
    assert_eq!(under(&bare, Bound::Settled).welds.len(), 2, "welds need no material");
    // A name that nobody knows is told of the input; the scenario's own material counts before the table's.
    let mut study =
        tank(2.0, 1.0, Plate { material: "unobtainium".into(), ..upright(1.0, 0.0, 1.0) }, Fill::Share(0.5));
    let warned = judge(&study).warnings.iter().any(|w| w.message.contains("unobtainium"));
    assert!(warned, "no warning");
    let mut own = named(STEEL).expect("a row").clone();
    (own.name, own.yield_pa) = ("unobtainium".into(), 99e6);
    study.materials = vec![own];
    near("own limit", verdict(&judge(&study).cases[0]).limit.unwrap().si, 66e6);
    study.materials[0].factor = 0.5;
    assert!(study.validate().is_err(), "a factor below one is a fault");
}

#[test]
fn kept_panels_change_no_result() {
    let mut panels = SolvedPanels::default();
    // Moved, made taller, and put back.
    for plate in [upright(1.0, 0.0, 1.0), upright(1.2, 0.0, 1.0), upright(1.2, 0.2, 1.0), upright(1.0, 0.0, 1.0)] {
        let study = tank(2.0, 1.0, plate, Fill::Share(0.6));
        let valid = study.validate().expect("a sound study");
        assert_eq!(analysis::run_again(&valid, &mut panels), analysis::run(&valid));
    }
}

#[test]
fn the_worst_load_case_of_a_plate_is_named_toward_either_side() {
    // As in two_sided, without openings: slope t stands 0.5 - t on the left and 0.5 + t on the right, so that the plate bears
    // WEIGHT / 2 ((0.5 - t)^2 - (0.5 + t)^2) = -t WEIGHT a metre, and -2 t WEIGHT at its foot (hydrostatics).
    let slopes = [0.1, 0.2, -0.15, 0.0];
    let mut study = tank(4.0, 1.0, upright(2.0, 0.0, 1.0), Fill::Share(0.5));
    study.cases = slopes.iter().map(|t| held(t * GRAVITY, 0.0)).collect();
    let results = judge(&study);
    let peaks = |name: &str| -> Vec<(f64, usize)> {
        let own = results.plate_peaks.iter().filter(|peak| peak.name == name);
        own.map(|peak| (peak.load.si, peak.case_idx)).collect()
    };
    for (name, to_right, to_left) in
        [("net load", 0.15 * WEIGHT, -0.2 * WEIGHT), ("net pressure", 0.3 * WEIGHT, -0.4 * WEIGHT)]
    {
        let found = peaks(name);
        assert_eq!(found.iter().map(|p| p.1).collect::<Vec<_>>(), [2, 1], "{name}: {found:?}");
        near(name, found[0].0, to_right);
        near(name, found[1].0, to_left);
    }
    // Every slope loads a weld by the shape of the same pressures: the steepest the most.
    let steepest = &results.cases[1].plates[0].welds;
    let (forces, moments) = (peaks("weld force"), peaks("weld moment"));
    assert_eq!((forces.len(), moments.len()), (2, 2), "a weld at floor and roof");
    for (end, weld) in steepest.iter().enumerate() {
        assert_eq!((forces[end].1, moments[end].1), (1, 1), "{forces:?} {moments:?}");
        near("weld force", forces[end].0, weld.force_n_per_m());
        near("weld moment", moments[end].0, weld.moment_n());
    }
    // At rest alone it bears nothing, and nothing is listed.
    study.cases = vec![held(0.0, 0.0)];
    assert_eq!(judge(&study).plate_peaks, vec![]);
}
