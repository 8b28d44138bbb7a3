//! Bad plates, openings and compartments: every fault is named with its place and a way to mend it, and none is fatal.

use std::f64::consts::TAU;

use brimwright::geom::Point;
use brimwright::problem::{Place, Problem, Severity};
use brimwright::section::{Attached, Opening, OpeningShape, Plate, Region, Section, check};
use brimwright::study::{Compartment, Fill, Study};

use crate::support::plated::Plated;
use crate::support::shapes::{circle, obstacle, polygon, rectangle, section};
use crate::support::{held, judge, settled, study, verdict};

type Line<'a> = &'a [(f64, f64)];

/// An open box of 4 m by 2 m, with plates.
fn tank(plates: &[Line]) -> Section {
    let tank = Plated::tank(rectangle(4.0, 2.0)).with_mouth(2);
    plates.iter().fold(tank, |tank, line| tank.with_plate(line)).section()
}

/// The same with a box of 0.5 m by 0.5 m in it, its lower left corner at (1, 0.5).
fn piped(plates: &[Line]) -> Section {
    let corners = [(1.0, 0.5), (1.5, 0.5), (1.5, 1.0), (1.0, 1.0)];
    Section { obstacles: vec![obstacle(&polygon(&corners))], ..tank(plates) }
}

/// The box with one upright plate of 1.5 m, and openings in it.
fn holed(openings: &[(f64, f64, OpeningShape)]) -> Section {
    let mut section = tank(&[&[(2.0, 0.0), (2.0, 1.5)]]);
    let opening = |&(from_m, to_m, shape): &_| Opening { name: String::new(), from_m, to_m, shape };
    section.plates[0].openings = openings.iter().map(opening).collect();
    section
}

fn faults(section: &Section) -> Vec<Problem> {
    let problems = check(section).err().unwrap_or_default();
    for p in &problems {
        assert!(p.severity == Severity::Fault && !p.message.is_empty() && !p.hint.is_empty(), "{p}");
    }
    problems
}

/// That `section` has exactly one fault: of plate `plate_idx`, in these words.
#[track_caller]
fn names(section: &Section, plate_idx: usize, words: &str) {
    let found = faults(section);
    let is_it = |p: &Problem| p.place == whole(plate_idx) && p.message.contains(words);
    assert!(found.len() == 1 && is_it(&found[0]), "expected {words:?} at {}, got {found:?}", whole(plate_idx));
}

/// That the same is said of an opening of the only plate.
#[track_caller]
fn names_opening(section: &Section, opening_idx: usize, words: &str) {
    let place = Place::Plate { plate_idx: 0, opening_idx: Some(opening_idx) };
    let found = faults(section);
    let is_it = |p: &Problem| p.place == place && p.message.contains(words);
    assert!(found.len() == 1 && is_it(&found[0]), "expected {words:?} at {place}, got {found:?}");
}

fn whole(plate_idx: usize) -> Place {
    Place::Plate { plate_idx, opening_idx: None }
}

#[track_caller]
fn sound(section: &Section) -> Region {
    check(section).unwrap_or_else(|faults| panic!("refused: {faults:?}"))
}

#[test]
fn sound_plates_stand_where_they_were_drawn_and_nothing_leaks() {
    use Attached::{Free, Obstacle};
    let wall = |edge_idx| Attached::Outline { edge_idx, is_mouth: false };
    let rim = Attached::Outline { edge_idx: 2, is_mouth: true };
    let on = Attached::Plate;
    let upright: Line = &[(2.0, 0.0), (2.0, 2.0)];
    // Plates, on what the ends of each stand, and into how many parts they cut the tank.
    type Case<'a> = (&'a str, Section, Vec<[Attached; 2]>, usize);
    let cases: Vec<Case> = vec![
        ("standing", tank(&[&[(2.0, 0.0), (2.0, 1.0)]]), vec![[wall(0), Free]], 1),
        ("free", tank(&[&[(2.0, 0.5), (2.0, 1.0)]]), vec![[Free, Free]], 1),
        ("from wall to rim line", tank(&[upright]), vec![[wall(0), rim]], 2),
        ("on a mouth's end, which is a wall's too", tank(&[&[(2.0, 0.0), (4.0, 2.0)]]), vec![[wall(0), wall(1)]], 2),
        ("from corner to corner", tank(&[&[(0.0, 0.0), (4.0, 2.0)]]), vec![[wall(0), wall(1)]], 2),
        ("from a corner", tank(&[&[(0.0, 0.0), (2.0, 1.0)]]), vec![[wall(0), Free]], 1),
        ("bent", tank(&[&[(2.0, 0.0), (2.0, 1.0), (4.0, 1.0)]]), vec![[wall(0), wall(1)]], 2),
        ("lying", tank(&[&[(0.0, 1.0), (4.0, 1.0)]]), vec![[wall(3), wall(1)]], 2),
        ("on a plate", tank(&[upright, &[(2.0, 1.0), (4.0, 1.0)]]), vec![[wall(0), rim], [on(0), wall(1)]], 3),
        (
            "on a plate that comes later",
            tank(&[&[(2.0, 1.0), (4.0, 1.0)], upright]),
            vec![[on(1), wall(1)], [wall(0), rim]],
            3,
        ),
        (
            "on a slanted plate, typed to 0.01 mm",
            tank(&[&[(1.0, 0.0), (2.7, 2.0)], &[(1.566_67, 0.666_67), (0.0, 1.0)]]),
            vec![[wall(0), rim], [on(0), wall(3)]],
            3,
        ),
        (
            "end on end",
            tank(&[&[(2.0, 0.0), (2.0, 1.0)], &[(2.0, 1.0), (4.0, 1.0)]]),
            vec![[wall(0), on(1)], [on(0), wall(1)]],
            2,
        ),
        (
            "two on one foot",
            tank(&[&[(2.0, 0.0), (1.0, 1.0)], &[(2.0, 0.0), (3.0, 1.0)]]),
            vec![[wall(0), Free], [wall(0), Free]],
            1,
        ),
        (
            "three on one end, from walls",
            tank(&[&[(1.0, 0.0), (2.0, 1.0)], &[(3.0, 0.0), (2.0, 1.0)], &[(2.0, 2.0), (2.0, 1.0)]]),
            vec![[wall(0), on(1)], [wall(0), on(0)], [rim, on(0)]],
            3,
        ),
        (
            "on the typed end of a plate that is moved onto a corner",
            piped(&[&[(1.4998, 2.0), (1.4998, 1.0006)], &[(1.4998, 1.0003), (4.0, 1.0)]]),
            vec![[rim, on(1)], [Obstacle(0), wall(1)]],
            2,
        ),
        ("to an obstacle", piped(&[&[(1.25, 0.0), (1.25, 0.5)]]), vec![[wall(0), Obstacle(0)]], 1),
        (
            "below and above an obstacle",
            piped(&[&[(1.25, 0.0), (1.25, 0.5)], &[(1.25, 1.0), (1.25, 2.0)]]),
            vec![[wall(0), Obstacle(0)], [Obstacle(0), rim]],
            2,
        ),
        ("on an obstacle's corner", piped(&[&[(0.0, 0.0), (1.0, 0.5)]]), vec![[wall(0), Obstacle(0)]], 1),
        ("a tenth of a millimetre short", tank(&[&[(2.0, 0.0001), (2.0, 1.9999)]]), vec![[wall(0), rim]], 2),
        ("a tenth of a millimetre too long", tank(&[&[(2.0, -0.0001), (2.0, 2.0001)]]), vec![[wall(0), rim]], 2),
    ];
    for (what, section, ends, n_parts) in cases {
        let region = sound(&section);
        let got: Vec<[Attached; 2]> = region.plates().iter().map(|p| p.ends).collect();
        assert_eq!(got, ends, "{what}: on what the ends stand");
        assert_eq!(region.shut().n_parts(), n_parts, "{what}: parts");
        assert_eq!(region.open().n_parts(), n_parts, "{what}: parts, without an opening");
        judged_without_nan(&study(section, Fill::Share(0.4)));
    }
}

/// Chords of a round tank, from and to any angle, typed to 0.01 mm.
#[test]
fn plates_typed_to_a_hundredth_of_a_millimetre_stand_on_arcs() {
    let typed = |angle: f64| ((1e5 * angle.cos()).round() / 1e5, (1e5 * (1.0 + angle.sin())).round() / 1e5);
    for i in 0..24 {
        let from = 0.13 + TAU * f64::from(i) / 24.0;
        for across in [0.6, 1.7, 2.9] {
            let chord = [typed(from), typed(from + across)];
            let region = sound(&Plated::tank(circle(1.0)).with_plate(&chord).section());
            let is_on_wall = |end: &Attached| matches!(end, Attached::Outline { .. });
            assert!(region.plates()[0].ends.iter().all(is_on_wall), "{chord:?}: {:?}", region.plates()[0].ends);
            assert_eq!(region.shut().n_parts(), 2, "{chord:?}");
        }
    }
}

#[test]
fn many_plates_end_to_end_are_one_wall_in_any_order() {
    // A zigzag of nine plates from floor to rim line, and every other one drawn from above.
    let corner = |i: usize| (2.0 + if i.is_multiple_of(2) { 0.2 } else { -0.2 }, 2.0 * i as f64 / 9.0);
    for step in [1, 2, 4, 5, 7, 8] {
        let mut tank = Plated::tank(rectangle(4.0, 2.0)).with_mouth(2);
        for k in 0..9 {
            let i = k * step % 9;
            let ends = [corner(i), corner(i + 1)];
            tank = tank.with_plate(&if i % 2 == 0 { ends } else { [ends[1], ends[0]] });
        }
        let section = tank.section();
        assert_eq!(sound(&section).shut().n_parts(), 2, "order {step}");
        // From end to end s is 2 on average: each side holds half.
        let case = judge(&study(section, Fill::Share(0.25))).cases.remove(0);
        let held: Vec<f64> = settled(&case).pools.iter().map(|p| p.volume_m3).collect();
        assert!((held.iter().sum::<f64>() - 2.0).abs() < 1e-12 && held.len() == 2, "order {step}: {held:?}");
    }
}

#[test]
fn plates_that_meet_what_they_should_not() {
    let upright: Line = &[(2.0, 0.0), (2.0, 1.5)];
    for (plates, plate_idx, words) in [
        (vec![upright, &[(1.0, 1.0), (3.0, 1.0)]], 1, "crosses plate 1"),
        (vec![upright, &[(1.0, 0.5), (3.0, 0.9)]], 1, "crosses plate 1"),
        (vec![upright, &[(1.0, 1.0), (2.0, 1.0), (3.0, 1.5)]], 1, "crosses plate 1"),
        (vec![upright, &[(2.0, 0.0), (1.0, 1.0), (3.0, 1.0)]], 1, "crosses plate 1"),
        (vec![upright, upright], 1, "lies along plate 1"),
        (vec![upright, &[(2.0, 1.5), (2.0, 0.0)]], 1, "lies along plate 1"),
        (vec![upright, &[(2.0, 0.5), (2.0, 1.0)]], 1, "lies along plate 1"),
        (vec![upright, &[(2.0, 1.0), (2.0, 2.0)]], 1, "lies along plate 1"),
        (vec![upright, &[(2.00005, 0.2), (2.00005, 1.2)]], 1, "lies along plate 1"),
        (vec![&[(1.0, 0.0), (1.0, 2.5)]], 0, "meets edge 3"),
        (vec![&[(1.0, 1.0), (5.0, 1.0)]], 0, "meets edge 2"),
        (vec![&[(1.0, 1.0), (5.0, 1.0), (1.0, 1.5)]], 0, "meets edge 2"),
        (vec![&[(1.0, 1.0), (2.0, 0.0), (3.0, 1.0)]], 0, "meets edge 1"),
        (vec![&[(-1.0, 1.0), (5.0, 1.0)]], 0, "meets edge 2"),
        (vec![&[(5.0, 0.0), (5.0, 1.0)]], 0, "leaves the tank"),
        (vec![&[(4.0, 1.0), (5.0, 1.0)]], 0, "leaves the tank"),
        (vec![&[(1.0, 0.0), (3.0, 0.0)]], 0, "lies along edge 1"),
        (vec![&[(0.0, 0.0), (4.0, 0.0)]], 0, "lies along edge 1"),
        (vec![&[(1.0, 2.0), (3.0, 2.0)]], 0, "lies along edge 3"),
        (vec![&[(4.0, 0.5), (4.0, 1.0), (3.0, 1.0)]], 0, "lies along edge 2"),
        (vec![&[(1.0, 0.0002), (3.0, 0.0003)]], 0, "lies along edge 1"),
        (vec![&[(1.0, 0.5), (3.0, 0.5), (3.0, 1.0), (2.0, 0.2)]], 0, "crosses or touches itself"),
        (vec![&[(1.0, 0.5), (3.0, 0.5), (2.0, 1.0), (1.0, 0.5)]], 0, "crosses or touches itself"),
        (vec![&[(1.0, 0.5), (3.0, 0.5), (2.0, 0.5)]], 0, "crosses or touches itself"),
        (vec![&[(1.0, 0.5), (3.0, 0.5), (3.0, 1.0), (2.0, 0.5)]], 0, "crosses or touches itself"),
        (vec![&[(1.0, 0.5), (1.0, 0.5)]], 0, "has no length"),
        (vec![&[(1.0, 0.5), (2.0, 0.5), (2.0, 0.5), (2.0, 1.0)]], 0, "has no length"),
        (vec![&[(1.0, 0.5)]], 0, "fewer than two corners"),
        (vec![&[]], 0, "fewer than two corners"),
        (vec![&[(1.0, f64::NAN), (2.0, 0.5)]], 0, "not finite"),
        (vec![&[(1.0, 0.5), (f64::INFINITY, 0.5)]], 0, "not finite"),
        (vec![&[(1.0, 0.5), (2.0, f64::NEG_INFINITY), (3.0, 0.5)]], 0, "not finite"),
    ] {
        names(&tank(&plates), plate_idx, words);
    }
    names(&piped(&[&[(0.5, 0.75), (2.0, 0.75)]]), 0, "meets obstacle 1");
    names(&piped(&[&[(1.1, 0.75), (1.4, 0.75)]]), 0, "leaves the tank");
    names(&piped(&[&[(1.0, 0.75), (1.5, 0.75)]]), 0, "leaves the tank");
    names(&piped(&[&[(0.5, 1.0), (2.0, 1.0)]]), 0, "obstacle 1");
    names(&piped(&[&[(1.5, 0.6), (1.5, 0.9)]]), 0, "lies along obstacle 1");
}

#[test]
fn numbers_of_a_plate_that_make_no_sense() {
    type Set = fn(&mut Plate, f64);
    let set: [(&str, Set); 3] = [
        ("thickness", |p, x| p.thickness_m = x),
        ("corrosion", |p, x| p.corrosion_m = x),
        ("stiffeners", |p, x| p.panel.stiffener_spacing_m = Some(x)),
    ];
    for (words, set) in set {
        for x in [f64::NAN, f64::INFINITY, -0.001, 0.0] {
            let mut section = tank(&[&[(2.0, 0.0), (2.0, 1.5)]]);
            set(&mut section.plates[0], x);
            if words == "corrosion" && x == 0.0 {
                sound(&section);
            } else {
                names(&section, 0, words);
            }
        }
    }
}

#[test]
fn openings_that_overlap_run_off_or_are_not_open() {
    let (slot, nan) = (OpeningShape::Share(0.5), f64::NAN);
    for (from_m, to_m) in [(0.5, 0.4), (0.5, 0.5), (nan, 0.5), (0.5, nan), (0.5, f64::INFINITY)] {
        names_opening(&holed(&[(from_m, to_m, slot)]), 0, "goes from");
    }
    for (from_m, to_m) in [(-0.1, 0.4), (1.2, 1.6), (1.6, 1.9), (-0.5, -0.1)] {
        names_opening(&holed(&[(from_m, to_m, slot)]), 0, "runs off the plate");
    }
    names_opening(&holed(&[(0.5, 0.5001, slot)]), 0, "shorter than");
    names_opening(&holed(&[(0.0, 0.0002, slot)]), 0, "shorter than");
    for (other, is_sound) in [((0.5, 0.9), false), ((0.2, 0.4), false), ((0.0, 1.5), false), ((0.6, 0.9), true)] {
        let section = holed(&[(0.3, 0.6, slot), (other.0, other.1, slot)]);
        if is_sound {
            sound(&section);
        } else {
            names_opening(&section, 1, "overlaps opening 1");
        }
    }
    let holes = |n| OpeningShape::Holes { n };
    let field = |diameter_m, pitch_m| {
        [false, true].map(|is_staggered| OpeningShape::Perforated { diameter_m, pitch_m, is_staggered })
    };
    // The plate is 1 m wide and the opening 0.3 m long: three holes fit side by side.
    let mut bad = vec![holes(0), holes(4), holes(u32::MAX)];
    bad.extend([0.0, -0.5, 1.01, nan, f64::INFINITY].map(OpeningShape::Share));
    for (diameter_m, pitch_m) in
        [(0.05, 0.04), (0.05, 0.05), (0.0, 0.1), (-0.05, 0.1), (0.05, -0.1), (0.05, 0.0), (nan, 0.1), (0.05, nan)]
    {
        bad.extend(field(diameter_m, pitch_m));
    }
    for shape in bad {
        names_opening(&holed(&[(0.3, 0.6, shape)]), 0, "");
    }
    for shape in [holes(1), holes(3), OpeningShape::Share(1.0), field(0.05, 0.06)[0], field(0.05, 0.06)[1]] {
        sound(&holed(&[(0.3, 0.6, shape)]));
    }
}

#[test]
fn every_fault_of_every_plate_is_listed_at_once() {
    let mut section = tank(&[&[(1.0, 0.0), (1.0, 1.0)], &[(2.0, 0.0)], &[(3.0, 0.0), (3.0, 1.0)]]);
    section.plates[0].thickness_m = 0.0;
    section.plates[0].corrosion_m = -1.0;
    section.plates[2].openings = holed(&[(0.5, 0.4, OpeningShape::Share(1.0)), (2.0, 3.0, OpeningShape::Share(2.0))])
        .plates[0]
        .openings
        .clone();
    let found: Vec<Place> = faults(&section).into_iter().map(|p| p.place).collect();
    let opening = |opening_idx| Place::Plate { plate_idx: 2, opening_idx: Some(opening_idx) };
    for place in [whole(0), whole(1), opening(0), opening(1)] {
        assert!(found.contains(&place), "expected a fault at {place}, got {found:?}");
    }
    assert_eq!(found.iter().filter(|p| **p == whole(0)).count(), 2, "{found:?}");
    let crossing = tank(&[&[(1.0, 1.0), (1.0, 2.5)], &[(2.0, 0.0), (2.0, 1.5)], &[(1.5, 1.0), (3.0, 1.0)]]);
    let found: Vec<Place> = faults(&crossing).into_iter().map(|p| p.place).collect();
    assert_eq!(found, [whole(0), whole(2)]);
}

/// The box cut in two by an upright plate in its middle, each half with a fill of its own.
fn halved(left: Fill, right: Fill) -> Study {
    let mut study = study(tank(&[&[(2.0, 0.0), (2.0, 2.0)]]), Fill::Share(0.5));
    let own = |s, fill| Compartment { name: String::new(), at: Point::new(s, 1.0), liquid: None, fill };
    study.compartments = vec![own(1.0, left), own(3.0, right)];
    study
}

#[track_caller]
fn refused(study: &Study, place: Place, words: &str) {
    let found: Vec<Problem> = study.validate().err().unwrap_or_default();
    let is_it = |p: &&Problem| p.severity == Severity::Fault && p.place == place && p.message.contains(words);
    assert!(found.iter().any(|p| is_it(&p) && !p.hint.is_empty()), "expected {words:?} at {place}, got {found:?}");
}

#[test]
fn compartments_outside_twice_or_too_full() {
    let half = Fill::Share(0.5);
    judged_without_nan(&halved(half, Fill::Share(0.0)));
    judged_without_nan(&halved(Fill::Share(1.0), Fill::Level(2.0)));
    for fill in [
        Fill::Volume(4.01),
        Fill::Volume(-0.01),
        Fill::Share(1.01),
        Fill::Share(-0.01),
        Fill::Level(2.01),
        Fill::Level(-0.01),
        Fill::Ullage(2.01),
        Fill::Ullage(-0.01),
        Fill::Volume(f64::NAN),
        Fill::Share(f64::INFINITY),
        Fill::Level(f64::NEG_INFINITY),
        Fill::Ullage(f64::NAN),
    ] {
        refused(&halved(half, fill), Place::Compartment(1), "is not between");
        let mut common = halved(half, half);
        (common.compartments, common.fill) = (vec![common.compartments[0].clone()], fill);
        refused(&common, Place::Field("fill"), "is not between");
    }
    for (s, z) in [(5.0, 1.0), (1.0, -0.1), (f64::NAN, 1.0), (1.0, f64::INFINITY)] {
        let mut outside = halved(half, half);
        outside.compartments[1].at = Point::new(s, z);
        refused(&outside, Place::Compartment(1), "outside the tank");
    }
    let mut twice = halved(half, half);
    twice.compartments[1].at = Point::new(0.5, 0.5);
    refused(&twice, Place::Compartment(1), "is the same compartment as 1");
    let mut joined = halved(half, half);
    let drain = Opening { name: String::new(), from_m: 0.0, to_m: 0.1, shape: OpeningShape::Share(0.5) };
    joined.section.plates[0].openings = vec![drain];
    refused(&joined, Place::Compartment(1), "is the same compartment as 1");
    let mut piped = study(piped(&[]), half);
    piped.compartments =
        vec![Compartment { at: Point::new(1.25, 0.75), ..halved(half, half).compartments[0].clone() }];
    refused(&piped, Place::Compartment(0), "outside the tank");
}

#[test]
fn a_mouth_below_the_still_level_is_named_and_lets_out_what_stands_above_it() {
    // A hole in the right wall, from z = 0.4 m to 0.6 m.
    let corners = [(0.0, 0.0), (4.0, 0.0), (4.0, 0.4), (4.0, 0.6), (4.0, 2.0), (0.0, 2.0)];
    let low = |mouth: usize, fill| study(section(&polygon(&corners), &[mouth], 1.0), fill);
    for (mouth, brim_m) in [(2, 0.4), (0, 0.0)] {
        let study = low(mouth, Fill::Level(1.0));
        let results = judge(&study);
        let named: Vec<&Problem> = results.warnings.iter().filter(|p| p.place == Place::Edge(mouth)).collect();
        assert!(matches!(named[..], [p] if p.message.contains("below the still level")), "{:?}", results.warnings);
        let case = &results.cases[0];
        assert!((settled(case).volume_m3 - 4.0 * brim_m).abs() < 1e-12, "{:?}", settled(case).volume_m3);
        assert!(verdict(case, "Contained").is_some());
        judged_without_nan(&study);
    }
    for fill in [Fill::Level(0.4), Fill::Level(0.3), Fill::Share(0.0)] {
        assert_eq!(judge(&low(2, fill)).warnings, [], "{fill:?}");
    }
    // Only the half with the hole has liquid above it.
    for (high, n_named) in [(0.5, 1), (0.1, 0)] {
        let mut study = halved(Fill::Share(0.9), Fill::Share(high));
        study.section.outline = section(&polygon(&corners), &[2], 1.0).outline;
        let n = study.validate().map(|v| v.warnings().iter().filter(|p| p.place == Place::Edge(2)).count());
        assert_eq!(n, Ok(n_named), "right half filled to {high}");
    }
}

#[track_caller]
fn judged_without_nan(study: &Study) {
    let cases = vec![held(-5.0, -2.0)];
    let study = Study { cases, ..study.clone() };
    let results = judge(&study);
    assert!(!format!("{results:?}").contains("NaN"), "a NaN in {results:?}");
}
