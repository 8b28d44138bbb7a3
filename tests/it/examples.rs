//! The built-in demo scenarios: each is sound, and judges as it is meant to.

use std::collections::BTreeMap;
use std::fmt::Write as _;
use std::path::Path;

use brimwright::analysis::{self, CaseResult, Results, Settled, State};
use brimwright::app::{EXAMPLES, Edit, apply};
use brimwright::cases::{Accel, AccelUnit};
use brimwright::geom::{Point, Vec2};
use brimwright::progress::Progress;
use brimwright::scenario;
use brimwright::study::{Fill, Study};
use brimwright::units::UnitSystem;

fn study(text: &str) -> Study {
    scenario::parse(text.as_bytes()).unwrap_or_else(|problems| panic!("{problems:?}"))
}

fn judge(study: &Study) -> Results {
    analysis::run(&study.validate().unwrap_or_else(|problems| panic!("{problems:?}")))
}

#[test]
fn every_scenario_is_built_in() {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios");
    let mut on_disk: Vec<String> =
        folder.read_dir().unwrap().map(|entry| entry.unwrap().file_name().into_string().unwrap()).collect();
    let mut built_in: Vec<&str> = EXAMPLES.iter().map(|e| e.file_name).collect();
    on_disk.sort();
    built_in.sort_unstable();
    assert_eq!(built_in, on_disk);
}

#[test]
fn saving_an_example_unchanged_changes_nothing() {
    for example in EXAMPLES {
        assert_eq!(scenario::write(&study(example.text)), example.text, "{}", example.file_name);
    }
}

#[test]
fn examples_have_no_warnings_and_their_notes_have_a_verdict() {
    for example in EXAMPLES {
        let study = study(example.text);
        let results = judge(&study);
        assert_eq!(results.warnings, [], "{}", example.file_name);
        for note in &study.verdict_notes {
            let case = results.cases.iter().find(|c| c.name == note.case);
            let has_verdict = case.is_some_and(|c| c.verdicts.iter().any(|v| v.criterion == note.criterion));
            assert!(has_verdict, "{}: {note:?}", example.file_name);
        }
    }
}

/// States as intended by whoever invented the scenario; not computed elsewhere. A verdict that is not named holds.
const INTENDED: &str = "\
trailer-water-bowser.ron
  Parked on the crossfall: 5 verdicts
  Roundabout: 5 verdicts
  Bend to the left: 5 verdicts; fails: Freeboard
  Bend to the right: 5 verdicts
  Emergency swerve: 5 verdicts
shuttle-rinse-bath.ron
  Standing: 2 verdicts
  Start: 2 verdicts
  Stop: 2 verdicts
  Emergency stop: 2 verdicts; close: Freeboard
round-barrel-lengthwise.ron
  Standing: 4 verdicts
  Service braking: 4 verdicts
  Hard braking: 4 verdicts; fails: Contained
  Pulling away uphill: 4 verdicts
  Braking downhill: 4 verdicts; fails: Contained
hopper-hydraulic-reservoir.ron
  Level ground: 4 verdicts
  Slope, right side down: 4 verdicts
  Slope, left side down: 4 verdicts
  Turn on the slope: 4 verdicts; close: Freeboard
  Over a kerb: 4 verdicts
ship-header-tank.ron
  Upright: 4 verdicts
  Lasting heel to starboard: 4 verdicts
  Lasting heel to port: 4 verdicts
  Roll to starboard: 4 verdicts; close: Contained
  Roll to port: 4 verdicts
  Heave, downward: 4 verdicts
hoist-dip-vat.ron
  Hanging: 2 verdicts
  Hoist starts up: 2 verdicts
  Hoist stops going up: 2 verdicts
  Travel and lift: 2 verdicts
  Landing: 2 verdicts; close: Pressure
  Slack rope: 2 verdicts; not judged: Contained, Pressure
small-sample-tray.ron
  Standing: 2 verdicts; not judged: Contained, Freeboard
  Arm moves: 2 verdicts; not judged: Contained, Freeboard
  Arm lifts and tilts: 2 verdicts; not judged: Contained, Freeboard
fire-tank-lengthwise.ron
  Standing: 5 verdicts
  Service braking: 5 verdicts
  Emergency braking: 5 verdicts; fails: Contained, Freeboard; not judged: Plate strength, Plate strength
  Pulling away uphill: 5 verdicts
fire-tank-crosswise.ron
  Standing on the crossfall: 4 verdicts
  Roundabout: 4 verdicts
  Bend to the left: 4 verdicts
  Evasive swerve: 4 verdicts; close: Contained, Freeboard
tanker-barrel-surge-plates.ron
  Standing: 4 verdicts
  Service braking: 4 verdicts
  Emergency braking: 4 verdicts; close: Contained, Plate strength, Plate strength
  Pulling away uphill: 4 verdicts
weir-box-release.ron
  Standing: 4 verdicts
  Index move, start: 4 verdicts
  Index move, stop: 4 verdicts
  Emergency stop: 4 verdicts; close: Contained, Freeboard
";

#[test]
fn examples_judge_as_intended() {
    let mut got = String::new();
    for example in EXAMPLES {
        let study = study(example.text);
        writeln!(got, "{}", example.file_name).unwrap();
        for case in judge(&study).cases {
            write!(got, "  {}: {} verdicts", case.name, case.verdicts.len()).unwrap();
            let mut by_state: BTreeMap<State, Vec<&str>> = BTreeMap::new();
            for verdict in case.verdicts.iter().filter(|v| v.state != State::Holds) {
                by_state.entry(verdict.state).or_default().push(verdict.criterion);
            }
            for (state, mut criteria) in by_state {
                criteria.sort_unstable();
                write!(got, "; {}: {}", state.word(), criteria.join(", ")).unwrap();
            }
            writeln!(got).unwrap();
        }
    }
    assert!(got == INTENDED, "expected\n{INTENDED}\ngot\n{got}");
}

fn example(file_name: &str) -> Results {
    let example = EXAMPLES.iter().find(|e| e.file_name == file_name).expect("a demo of that name");
    judge(&study(example.text))
}

fn case<'a>(results: &'a Results, name: &str) -> &'a CaseResult {
    results.cases.iter().find(|c| c.name == name).expect("a case of that name")
}

#[track_caller]
fn check(what: &str, got: f64, want: f64) {
    assert!((got - want).abs() <= 1e-6 * want.abs(), "{what}: got {got}, expected {want} within 1e-6 of it");
}

/// Worked out by hand: both halves are areas under straight lines, 0.5 m wide.
#[test]
fn the_weir_box_keeps_liquid_behind_its_sill() {
    let results = example("weir-box-release.ron");
    // At a slope of 0.3 the left half (1 m) keeps the triangle below the line through the sill's top, 0.15 m2, and
    // the right half (0.6 m) gets the rest of 0.352 m2. Back at rest the right one falls to the sill at 0.3 m.
    let stop = case(&results, "Index move, stop");
    let volumes = |state: &Settled| {
        let mut volumes: Vec<f64> = state.pools.iter().map(|pool| pool.volume_m3).collect();
        volumes.sort_by(f64::total_cmp);
        volumes
    };
    let settled = volumes(stop.settled.as_ref().expect("it settles"));
    assert_eq!(settled.len(), 2, "{settled:?}");
    check("left at the stop", settled[0], 0.5 * 0.15);
    check("right at the stop", settled[1], 0.5 * 0.202);
    let released = volumes(stop.released.as_ref().expect("a release is asked for").as_ref().expect("it settles"));
    assert_eq!(released.len(), 2, "{released:?}");
    check("left after the release", released[0], 0.5 * (0.352 - 0.18));
    check("right after the release", released[1], 0.5 * 0.6 * 0.3);
    // The right half stands at the rim (0.6 m) at the right wall where its mean level and half its slope make 0.6 m:
    // (0.352 - 0.045/x)/0.6 + 0.3 x = 0.6 at slope x, so 0.18 x2 - 0.008 x - 0.045 = 0.
    let slope = (0.008 + (0.008_f64.powi(2) + 4.0 * 0.18 * 0.045).sqrt()) / (2.0 * 0.18);
    let contained = case(&results, "Emergency stop").verdicts.iter().find(|v| v.criterion == "Contained").unwrap();
    check("first spill", contained.limit.expect("it spills some time").si, slope * 9.80665);
}

/// Worked out by hand: straight lines and a round end.
#[test]
fn partitions_and_surge_plates_make_the_cells_they_are_meant_to() {
    let capacities = |results: &Results| {
        let mut capacities: Vec<f64> = results.cells.iter().map(|cell| cell.capacity_m3).collect();
        capacities.sort_by(f64::total_cmp);
        capacities
    };
    let barrel = capacities(&example("tanker-barrel-surge-plates.ron"));
    assert_eq!(barrel.len(), 3, "{barrel:?}");
    barrel.iter().for_each(|&got| check("cell of the barrel", got, std::f64::consts::PI / 4.0 * 1.9 * 1.9 * 2.7));
    let across = capacities(&example("fire-tank-crosswise.ron"));
    assert_eq!(across.len(), 2, "{across:?}");
    check("left cell", across[0], 1.05 * 1.5 * 3.6);
    check("right cell with the tower", across[1], (1.05 * 1.5 + 0.3 * 0.15) * 3.6);

    let results = example("fire-tank-lengthwise.ron");
    let along = capacities(&results);
    assert_eq!(along.len(), 3, "{along:?}");
    check("outer bay", along[0], 1.2 * 1.5 * 2.1);
    check("middle bay with the tower", along[2], (1.2 * 1.5 + 0.3 * 0.15) * 2.1);
    // Open: the surface through the tower's front brim, at a slope of 0.7. Shut: the middle bay keeps below its tower.
    let stop = case(&results, "Emergency braking");
    let (from, to) = (1.65 - 0.7 * 1.95, 1.95 - 0.15 / 0.7);
    let area = 0.5 * (from + 1.5) * to + (3.6 - to) * 1.5 + 0.5 * (1.95 - to) * 0.15;
    let stays = |state: &Settled| state.pools.iter().map(|pool| pool.volume_m3).sum::<f64>();
    check("stays with openings open", stays(stop.settled.as_ref().expect("it settles")), area * 2.1);
    let sealed = stop.sealed.as_ref().expect("its partitions have openings").as_ref().expect("it settles");
    check("stays with openings shut", stays(sealed), results.still.volume_m3);
}

#[test]
fn a_newcomer_mends_the_first_example_by_fill_or_by_the_bob() {
    let first = study(EXAMPLES[0].text);
    let results = judge(&first);
    assert_eq!((results.count(State::Fails), results.count(State::NotJudged)), (1, 0));
    let (case_idx, verdict_idx) = results.ranked()[0];
    let worst = &results.cases[case_idx].verdicts[verdict_idx];
    assert!(worst.utilisation.is_some_and(|u| u > 1.1), "clearly failing, not {:?}", worst.utilisation);

    let percent: f64 = worst.mend[0]
        .text(UnitSystem::Si)
        .strip_prefix("To hold, fill ")
        .and_then(|rest| rest.strip_suffix(" %"))
        .and_then(|number| number.parse().ok())
        .unwrap_or_else(|| panic!("the first way to mend is no fill: {:?}", worst.mend));
    let gentler = Accel::Components { a_s: -0.3, a_z: 0.0, unit: AccelUnit::G };
    for edit in [Edit::Fill(Fill::Share(percent / 100.0)), Edit::CaseAccel(case_idx, gentler)] {
        let mut mended = first.clone();
        apply(&mut mended, &edit);
        assert_eq!(judge(&mended).count(State::Fails), 0, "after {edit:?}");
    }
}

#[test]
fn pressure_anywhere_agrees_with_the_named_points_and_stops_at_obstacles() {
    let mut n_wet = 0;
    for example in EXAMPLES {
        let study = study(example.text).validate().unwrap_or_else(|problems| panic!("{problems:?}"));
        for case in &analysis::run(&study).cases {
            let Ok(settled) = &case.settled else { continue };
            for point in settled.points.iter().filter(|p| p.wet) {
                let got = analysis::gage_pressure_at(&study, case, analysis::Bound::Settled, point.at).map(|m| m.si);
                // A point on the wall itself may go either way.
                if let Some(got) = got {
                    n_wet += 1;
                    let (want, name) = (point.gage_pa, &point.name);
                    assert!((got - want).abs() <= 1e-12 * want, "{name} in {}: {got} Pa, not {want}", case.name);
                }
            }
            for obstacle in &study.study().section.obstacles {
                let n = obstacle.vertices.len() as f64;
                let sum = obstacle.vertices.iter().fold(Vec2::zeros(), |sum, v| sum + v.start.coords);
                let middle = Point::from(sum / n);
                assert_eq!(
                    analysis::gage_pressure_at(&study, case, analysis::Bound::Settled, middle),
                    None,
                    "inside {}",
                    obstacle.name
                );
            }
        }
    }
    assert!(n_wet > 20, "only {n_wet} points are wet");
}

/// Went wrong once: the tray's freeboard was not judged, and its plot said `holds to 100 %`.
#[test]
fn a_freeboard_that_is_not_judged_has_no_curve() {
    for example in EXAMPLES {
        let study = study(example.text).validate().unwrap_or_else(|problems| panic!("{problems:?}"));
        let results = analysis::run(&study);
        for (i, case) in results.cases.iter().enumerate() {
            let states: Vec<State> =
                case.verdicts.iter().filter(|v| v.criterion == "Freeboard").map(|v| v.state).collect();
            let curve = analysis::freeboard_curve(&study, &results.cases[i], &Progress::default()).unwrap();
            let want = states.iter().any(|&s| s != State::NotJudged);
            assert_eq!(!curve.required.is_empty(), want, "{}, {}: {states:?}", example.file_name, case.name);
            assert_eq!(curve.absent.is_none(), want, "{}, {}", example.file_name, case.name);
        }
    }
}
