//! Layout rules against values worked out by hand: plane geometry and closed forms of round barrels, own derivations.

use std::f64::consts::PI;

use brimwright::analysis::{Absent, LAYOUT, Results, Sense, State, Verdict};
use brimwright::geom::Point;
use brimwright::plates::gaps;
use brimwright::section::{Opening, OpeningShape, Plate, Section, WidthLaw, check as check_section};
use brimwright::study::{Compartment, Fill, Limit, Record, Study};

use crate::support::plated::plate;
use crate::support::shapes::{polygon, rectangle, section};
use crate::support::{GRAVITY, judge, study};

/// A tank 4 m long, 1 m high and 2 m wide, open at its top (edge 2).
fn tank(plates: Vec<Plate>, fill: Fill) -> Study {
    let mut section = section(&rectangle(4.0, 1.0), &[2], 2.0);
    section.plates = plates;
    study(section, fill)
}

fn upright(s: f64, from: f64, to: f64) -> Plate {
    plate(&[Point::new(s, from), Point::new(s, to)])
}

fn with_opening(mut plate: Plate, from_m: f64, to_m: f64, shape: OpeningShape) -> Plate {
    plate.openings.push(Opening { name: String::new(), from_m, to_m, shape });
    plate
}

/// The study's results under one unconfirmed record.
fn under(mut study: Study, limit: Limit) -> Results {
    study.records.push(Record {
        title: "rule".into(),
        limit,
        clause: String::new(),
        edition: String::new(),
        origin: String::new(),
        confirmed: false,
    });
    judge(&study)
}

/// The only verdict of the layout.
fn verdict(study: Study, limit: Limit) -> Verdict {
    let mut verdicts = under(study, limit).layout.verdicts;
    assert_eq!(verdicts.len(), 1, "{limit:?}: {verdicts:?}");
    verdicts.remove(0)
}

#[track_caller]
fn check(verdict: &Verdict, state: State, demand: f64, limit: f64) {
    let got = (verdict.demand.expect("a demand").si, verdict.limit.expect("a limit").si);
    let near = |got: f64, want: f64| (got - want).abs() <= 1e-11 * want.abs().max(1.0);
    assert!(
        verdict.state == state && near(got.0, demand) && near(got.1, limit),
        "{}: {:?} {got:?}, expected {state:?} ({demand}, {limit}) within 1e-11\n{verdict:#?}",
        verdict.criterion,
        verdict.state
    );
}

/// A round barrel 1.8 m across and 6 m long, seen lengthwise: the section is a rectangle.
fn barrel(plates: Vec<Plate>, fill: Fill) -> Study {
    let mut section: Section =
        section(&polygon(&[(0.0, 0.0), (6.0, 0.0), (6.0, 1.8), (3.4, 1.8), (2.6, 1.8), (0.0, 1.8)]), &[3], 1.0);
    section.width = WidthLaw::RoundBarrel { diameter_m: 1.8, bottom_z_m: 0.0 };
    section.plates = plates;
    study(section, fill)
}

/// Area of a circle's segment of height `h`: r2 acos((r - h)/r) - (r - h) sqrt(2 r h - h2).
fn segment(r: f64, h: f64) -> f64 {
    r * r * ((r - h) / r).acos() - (r - h) * (2.0 * r * h - h * h).sqrt()
}

#[test]
fn cells_of_a_box_and_of_a_barrel_hold_what_closed_forms_say() {
    // Box: plates at 1 and 2.5 reach the rim, so 1 x 1 x 2, 1.5 x 1 x 2, 1.5 x 1 x 2; half full.
    let results = judge(&tank(vec![upright(1.0, 0.0, 1.0), upright(2.5, 0.0, 1.0)], Fill::Share(0.5)));
    let mut held: Vec<(f64, f64, f64)> =
        results.cells.iter().map(|c| (c.inside.x, c.capacity_m3, c.still_m3)).collect();
    held.sort_by(|a, b| a.0.total_cmp(&b.0));
    for ((_, capacity, still), want) in held.iter().zip([2.0, 3.0, 3.0]) {
        assert!((capacity - want).abs() < 1e-12 && (still - want / 2.0).abs() < 1e-12, "{held:?}, expected {want}");
    }
    assert!(results.cells.iter().all(|cell| (cell.still_z_m.unwrap() - 0.5).abs() < 1e-12), "{:?}", results.cells);
    // With a fill of its own a cell stands at its own level, and an empty one at none.
    let mut study = tank(vec![upright(1.0, 0.0, 1.0), upright(2.5, 0.0, 1.0)], Fill::Share(0.0));
    let at = Point::new(0.5, 0.5);
    study.compartments = vec![Compartment { name: "own".into(), at, liquid: None, fill: Fill::Share(0.3) }];
    let own = judge(&study).cells;
    let levels: Vec<Option<f64>> = own.iter().map(|cell| cell.still_z_m).collect();
    assert_eq!(levels.iter().flatten().count(), 1, "{levels:?}");
    assert!((own.iter().find_map(|cell| cell.still_z_m).unwrap() - 0.3).abs() < 1e-12, "{levels:?}");
    // Barrel: pi r2 times lengths 2 and 4, filled to a quarter of the diameter. The plate hangs 0.3 off the bottom.
    let results = judge(&barrel(vec![upright(2.0, 0.3, 1.8)], Fill::Level(0.45)));
    let mut held: Vec<(f64, f64, f64)> =
        results.cells.iter().map(|c| (c.inside.x, c.capacity_m3, c.still_m3)).collect();
    held.sort_by(|a, b| a.0.total_cmp(&b.0));
    for ((_, capacity, still), length) in held.iter().zip([2.0, 4.0]) {
        let want = (PI * 0.81 * length, segment(0.9, 0.45) * length);
        assert!((capacity - want.0).abs() < 1e-11 && (still - want.1).abs() < 1e-11, "{held:?}, expected {want:?}");
    }
}

#[test]
fn the_largest_cell_is_held_against_the_limit_or_its_fill_band() {
    let band = |m3| Limit::CellVolume { m3, empty_to: 0.2, full_from: 0.8 };
    let tank = |share| tank(vec![upright(1.0, 0.0, 1.0)], Fill::Share(share));
    // Cells of 2 and 6 m3.
    let found = verdict(tank(0.5), band(8.0));
    check(&found, State::Holds, 6.0, 8.0);
    assert_eq!((found.utilisation, found.unconfirmed_record), (Some(0.75), Some(0)));
    check(&verdict(tank(0.5), band(4.0)), State::Fails, 6.0, 4.0);
    // The same larger cell, filled by less than a fifth, or by more than four fifths.
    check(&verdict(tank(0.1), band(4.0)), State::Holds, 0.1, 0.2);
    let full = verdict(tank(0.95), band(4.0));
    check(&full, State::Holds, 0.95, 0.8);
    assert_eq!(full.sense, Sense::AtLeast);
    assert!(full.remark.contains("judged by its fill"), "{}", full.remark);
    // At the very edge it still holds, but only just.
    check(&verdict(tank(0.8), band(4.0)), State::Close, 0.8, 0.8);
    check(&verdict(tank(0.79), band(4.0)), State::Fails, 6.0, 4.0);
}

#[test]
fn a_plate_of_three_quarters_of_the_height_covers_three_quarters() {
    let hanging = || vec![upright(1.0, 0.25, 1.0)];
    check(&verdict(tank(hanging(), Fill::Share(0.5)), Limit::PlateCoverage(0.7)), State::Close, 0.75, 0.7);
    check(&verdict(tank(hanging(), Fill::Share(0.5)), Limit::PlateCoverage(0.76)), State::Fails, 0.75, 0.76);
    // Two round holes of 0.2 m side by side leave 2 - 2 pi 0.1^2 of 2 m2.
    let holes = || vec![with_opening(upright(1.0, 0.0, 1.0), 0.4, 0.6, OpeningShape::Holes { n: 2 })];
    let covered = 1.0 - PI * 0.01;
    check(&verdict(tank(holes(), Fill::Share(0.5)), Limit::PlateCoverage(0.5)), State::Holds, covered, 0.5);
    let open = 1.0 - covered;
    check(&verdict(tank(holes(), Fill::Share(0.5)), Limit::OpenShareAtMost(0.5)), State::Holds, open, 0.5);
    check(&verdict(tank(holes(), Fill::Share(0.5)), Limit::OpenShareAtLeast(0.04)), State::Fails, open, 0.04);
}

#[test]
fn a_gap_counts_alike_drawn_as_an_opening_or_left_below_the_plate() {
    let drawn = vec![with_opening(upright(2.0, 0.0, 1.8), 0.0, 0.3, OpeningShape::Share(1.0))];
    let left = vec![upright(2.0, 0.3, 1.8)];
    // Of the circle all but the segment 0.3 high.
    let covered = 1.0 - segment(0.9, 0.3) / (PI * 0.81);
    for plates in [drawn, left] {
        let found = verdict(barrel(plates.clone(), Fill::Share(0.5)), Limit::PlateCoverage(0.95));
        check(&found, State::Fails, covered, 0.95);
        let found = verdict(barrel(plates, Fill::Share(0.5)), Limit::OpenShareAtMost(0.2));
        check(&found, State::Holds, 1.0 - covered, 0.2);
    }
}

#[test]
fn plates_in_one_plane_cover_together_and_a_slanted_one_as_seen_along_s() {
    let two = vec![upright(1.0, 0.0, 0.3), upright(1.0, 0.6, 1.0)];
    check(&verdict(tank(two, Fill::Share(0.5)), Limit::PlateCoverage(0.5)), State::Holds, 0.7, 0.5);
    // From (1, 0) to (1.5, 0.8): 0.8 of the height of 1.
    let slanted = vec![plate(&[Point::new(1.0, 0.0), Point::new(1.5, 0.8)])];
    check(&verdict(tank(slanted, Fill::Share(0.5)), Limit::PlateCoverage(0.5)), State::Holds, 0.8, 0.5);
    // A shelf covers no cross-section.
    let shelf = vec![plate(&[Point::new(0.0, 0.5), Point::new(1.0, 0.5)])];
    let results = under(tank(shelf, Fill::Share(0.5)), Limit::PlateCoverage(0.5));
    assert_eq!(results.layout.verdicts, vec![]);
    assert!(results.layout.absent.iter().any(|a| a.criterion == "Plate coverage" && a.place_words == "plate 1"));
}

#[test]
fn a_gap_goes_to_the_nearest_plate_on_either_side() {
    let section = tank([2.5, 0.5, 3.75, 1.5].map(|s| upright(s, 0.0, 1.0)).to_vec(), Fill::Share(0.5)).section;
    let gaps = gaps(&check_section(&section).expect("a sound section"));
    let lengths: Vec<f64> = gaps.iter().map(|gap| gap.length_m()).collect();
    assert_eq!(lengths, [1.0, 1.25, 0.5, 1.0, 1.25, 0.25, 1.0, 1.0], "left and right of each plate");
}

#[test]
fn the_widest_gap_is_measured_at_the_middle_of_the_plates() {
    // Gaps of 1, 1.5 and 1.5: the wall counts as an end.
    let plates = || vec![upright(1.0, 0.0, 1.0), upright(2.5, 0.0, 0.4)];
    check(&verdict(tank(plates(), Fill::Share(0.5)), Limit::PlateSpacing(1.75)), State::Holds, 1.5, 1.75);
    check(&verdict(tank(plates(), Fill::Share(0.5)), Limit::PlateSpacing(1.4)), State::Fails, 1.5, 1.4);
    // Without a plate the tank itself; a lying one is none.
    check(&verdict(tank(vec![], Fill::Share(0.5)), Limit::PlateSpacing(1.75)), State::Fails, 4.0, 1.75);
    // Slanted, from (1, 0) to (1.4, 0.8): at its middle, z = 0.4, it stands at 1.2. The next one, from (2.2, 0.1) to
    // (2.4, 0.9), stands there at 2.275, and at its own middle, z = 0.5, 2.3 from 1.25; to the right end 1.7.
    let slanted = vec![
        plate(&[Point::new(1.0, 0.0), Point::new(1.4, 0.8)]),
        plate(&[Point::new(2.2, 0.1), Point::new(2.4, 0.9)]),
    ];
    check(&verdict(tank(slanted, Fill::Share(0.5)), Limit::PlateSpacing(2.0)), State::Holds, 1.7, 2.0);
    // Two in one plane are one place: 1.2, not 0, to the right of them and 2.8 to the end beyond.
    let stacked = vec![upright(1.2, 0.0, 0.3), upright(1.2, 0.6, 1.0)];
    check(&verdict(tank(stacked, Fill::Share(0.5)), Limit::PlateSpacing(3.0)), State::Close, 2.8, 3.0);
}

#[test]
fn what_a_sill_traps_does_not_drain() {
    let sump = |s: f64| Some(Point::new(s, 0.01));
    let drain = |plates, sump| verdict(Study { sump, ..tank(plates, Fill::Share(0.5)) }, Limit::DrainPath);
    // A sill 0.3 high at s = 1.5, the sump left of it: 2.5 x 0.3 x 2 m3 stay on its right.
    let sill = || vec![upright(1.5, 0.0, 0.3)];
    let found = drain(sill(), sump(0.2));
    check(&found, State::Fails, 1.0, 0.0);
    assert!((found.working[0].result.si - 1.5).abs() < 1e-12, "{:?}", found.working);
    assert!(found.mend[0].text(Default::default()).contains("plate 1"), "{:?}", found.mend);
    // From the right, 1.5 x 0.3 x 2 on its left.
    let found = drain(sill(), sump(3.0));
    assert!((found.working[0].result.si - 0.9).abs() < 1e-12, "{:?}", found.working);
    // With a limber hole at its foot all of it drains.
    let limber = vec![with_opening(upright(1.5, 0.0, 0.3), 0.0, 0.05, OpeningShape::Holes { n: 2 })];
    check(&drain(limber, sump(0.2)), State::Holds, 0.0, 0.0);
    // Two sills: both cells beyond the sump's keep theirs, 1 x 0.3 x 2 and 1.5 x 0.5 x 2.
    let found = drain(vec![upright(1.5, 0.0, 0.3), upright(2.5, 0.0, 0.5)], sump(0.2));
    check(&found, State::Fails, 2.0, 0.0);
    let volumes: Vec<f64> = found.working.iter().map(|line| line.result.si).collect();
    assert!((volumes[0] - 1.5).abs() < 1e-12 && (volumes[1] - 0.6).abs() < 1e-12, "{volumes:?}, expected 1.5, 0.6");
    // Without a sump the lowest point is one, here the first of two alike: one side stays in either case.
    let found = drain(sill(), None);
    check(&found, State::Fails, 1.0, 0.0);
    assert!(found.remark.contains("no sump"), "{}", found.remark);
}

#[test]
fn a_sump_above_the_lowest_floor_leaves_a_heel() {
    // The floor falls from z = 0.2 at s = 0 to 0 at s = 4. A sump at s = 1 takes down to z = 0.15; below it stays the
    // triangle 3 long and 0.15 high, times 2 m: 0.45 m3.
    let mut section = section(&polygon(&[(0.0, 0.2), (4.0, 0.0), (4.0, 1.0), (0.0, 1.0)]), &[2], 2.0);
    let study =
        |section: Section, s: f64| Study { sump: Some(Point::new(s, 0.3)), ..study(section, Fill::Share(0.5)) };
    let found = verdict(study(section.clone(), 1.0), Limit::DrainPath);
    check(&found, State::Fails, 1.0, 0.0);
    assert!((found.working[0].result.si - 0.45).abs() < 1e-9, "{:?}", found.working);
    // At the low end nothing stays; but behind a plate across the way, with its gap at the top, the triangle of the floor
    // at s = 2 up to the tip at z = 0.5: from z = 0.2 and 0.1 below it, (0.3 + 0.4) / 2 x 2 x 2 m3.
    section.plates = vec![upright(2.0, 0.1, 0.5)];
    let found = verdict(study(section, 4.0 - 1e-9), Limit::DrainPath);
    check(&found, State::Fails, 1.0, 0.0);
    assert!((found.working[0].result.si - 1.4).abs() < 1e-6, "{:?}", found.working);
}

#[test]
fn gas_under_a_full_height_plate_without_a_gap_stays_in() {
    // A mouth in the roof from s = 3 to 4; a plate hangs from the roof at s = 2 down to z = 0.4: 2 x 0.6 x 2 m3 of gas
    // stay left of it.
    let outline = polygon(&[(0.0, 0.0), (4.0, 0.0), (4.0, 1.0), (3.0, 1.0), (0.0, 1.0)]);
    let tank = |plates: Vec<Plate>, mouths: &[usize]| {
        let mut section = section(&outline, mouths, 2.0);
        section.plates = plates;
        study(section, Fill::Share(0.2))
    };
    let hanging = || upright(2.0, 0.4, 1.0);
    let found = verdict(tank(vec![hanging()], &[2]), Limit::VentPath);
    check(&found, State::Fails, 1.0, 0.0);
    assert!((found.working[0].result.si - 2.4).abs() < 1e-12, "{:?}", found.working);
    // With a notch at its top nothing stays.
    let notched = with_opening(hanging(), 0.55, 0.6, OpeningShape::Share(0.1));
    check(&verdict(tank(vec![notched], &[2]), Limit::VentPath), State::Holds, 0.0, 0.0);
    // Full height, with a drain gap only: all 2 x 0.9 x 2 m3 above the gap.
    let full = with_opening(upright(2.0, 0.0, 1.0), 0.0, 0.1, OpeningShape::Share(1.0));
    let found = verdict(tank(vec![full], &[2]), Limit::VentPath);
    assert!((found.working[0].result.si - 3.6).abs() < 1e-12, "{:?}", found.working);
    // A mouth in the side wall, its top 0.3 below the roof (edges: floor, wall, mouth, wall, roof, wall): 4 x 0.3 x 2.
    let low = polygon(&[(0.0, 0.0), (4.0, 0.0), (4.0, 0.5), (4.0, 0.7), (4.0, 1.0), (0.0, 1.0)]);
    let found = verdict(study(section(&low, &[2], 2.0), Fill::Share(0.2)), Limit::VentPath);
    check(&found, State::Fails, 1.0, 0.0);
    assert!((found.working[0].result.si - 2.4).abs() < 1e-12, "{:?}", found.working);
    // Where no mouth is drawn there is nothing to look for.
    let found = verdict(tank(vec![hanging()], &[]), Limit::VentPath);
    assert_eq!(found.state, State::NotJudged, "{found:?}");
}

#[test]
fn a_rated_flow_needs_the_difference_of_levels_that_carries_it() {
    // Drowned: (Q / (C_d A))^2 / 2 g with C_d = 0.6 (Torricelli; standard hydraulics).
    let (flow, limit) = (0.0631, 0.1);
    let difference = |area: f64| (flow / (0.6 * area)).powi(2) / (2.0 * GRAVITY);
    let rated = |study| verdict(study, Limit::RatedFlow { flow_m3_per_s: flow, difference_m: limit });
    let gap = |s| with_opening(upright(s, 0.0, 1.0), 0.0, 0.1, OpeningShape::Share(1.0));
    // A gap 0.1 high and 2 m wide.
    check(&rated(tank(vec![gap(2.0)], Fill::Share(0.5))), State::Holds, difference(0.2), limit);
    // Under a plate that hangs 0.3 off the floor; in a barrel that is a segment of its circle.
    let hanging = || vec![upright(2.0, 0.3, 1.0)];
    check(&rated(tank(hanging(), Fill::Share(0.5))), State::Holds, difference(0.6), limit);
    let found = rated(barrel(vec![upright(2.0, 0.3, 1.8)], Fill::Share(0.5)));
    check(&found, State::Holds, difference(segment(0.9, 0.3)), limit);
    // Two holes of 0.1 m in the second of two plates are the narrower way.
    let holes = with_opening(upright(3.0, 0.0, 1.0), 0.05, 0.15, OpeningShape::Holes { n: 2 });
    let found = rated(tank(vec![gap(2.0), holes], Fill::Share(0.5)));
    let area = 2.0 * PI / 4.0 * 0.01;
    check(&found, State::Fails, difference(area), limit);
    assert_eq!(found.place_words.matches("cell").count(), 2, "{}", found.place_words);
    // It needs area by the root of what it is over: that much more makes it hold exactly.
    let needed = area * (difference(area) / limit).sqrt();
    assert!((difference(needed) - limit).abs() < 1e-12);
    let mend = found.mend[0].text(Default::default());
    assert!(mend.contains(&format!("{:.4} m²", needed - area)), "{mend}, {} m2 more", needed - area);
}

#[test]
fn a_rated_flow_falls_freely_over_what_is_not_drowned() {
    let (flow, limit) = (0.0631, 0.1);
    let rated = |study| verdict(study, Limit::RatedFlow { flow_m3_per_s: flow, difference_m: limit });
    let root_2g = (2.0 * GRAVITY).sqrt();
    // Over a sill 0.2 above the still level, 2 m wide: Q = 2/3 C_d b sqrt(2 g) H^1.5 (rectangular weir; Streeter).
    let head = (flow / (2.0 / 3.0 * 0.6 * 2.0 * root_2g)).powf(2.0 / 3.0);
    let high = with_opening(upright(2.0, 0.0, 1.0), 0.7, 0.9, OpeningShape::Share(1.0));
    check(&rated(tank(vec![high], Fill::Share(0.5))), State::Fails, 0.2 + head, limit);
    // The same past a free end that stands 0.2 above it.
    check(&rated(tank(vec![upright(2.0, 0.0, 0.7)], Fill::Share(0.5))), State::Fails, 0.2 + head, limit);
    // A gap from 0.4 to 0.6, half of it under: what is drowned and what falls freely carry the flow together.
    let half = with_opening(upright(2.0, 0.0, 1.0), 0.4, 0.6, OpeningShape::Share(1.0));
    let found = rated(tank(vec![half], Fill::Share(0.5))).demand.expect("a demand").si;
    let carried = 0.6 * 2.0 * root_2g * (0.1 * found.sqrt() + 2.0 / 3.0 * found.powf(1.5));
    assert!((carried - flow).abs() < 1e-9 * flow, "{found} m carry {carried} m3/s of {flow}");
}

#[test]
fn a_rated_flow_leaves_at_the_sump() {
    // A tight plate amid the tank parts two pairs of bays; the pair on the left has a wide way between its bays, the one on the
    // right a narrow one. Without a sump the flow may leave anywhere.
    let (flow, limit) = (0.02, 1.0);
    let gap = |s: f64, high: f64| with_opening(upright(s, 0.0, 1.0), 0.0, high, OpeningShape::Share(1.0));
    let difference = |area: f64| (flow / (0.6 * area)).powi(2) / (2.0 * GRAVITY);
    for (sump_s, area) in [(Some(0.5), 0.2), (Some(1.5), 0.2), (Some(2.5), 0.04), (None, 0.04)] {
        let mut study = tank(vec![gap(1.0, 0.1), upright(2.0, 0.0, 1.0), gap(3.0, 0.02)], Fill::Share(0.5));
        study.sump = sump_s.map(|s| Point::new(s, 0.1));
        let found = verdict(study, Limit::RatedFlow { flow_m3_per_s: flow, difference_m: limit });
        check(&found, State::Holds, difference(area), limit);
    }
}

#[test]
fn rules_that_nobody_asks_for_are_absent_with_what_is_there() {
    let none = judge(&tank(vec![], Fill::Share(0.5))).layout;
    assert_eq!(none.absent.iter().map(|a| a.criterion).collect::<Vec<_>>(), [LAYOUT]);
    let layout = judge(&tank(vec![upright(1.0, 0.0, 0.3)], Fill::Share(0.5))).layout;
    assert_eq!(layout.verdicts, vec![]);
    let reason = |criterion: &str| {
        let found: Vec<&Absent> = layout.absent.iter().filter(|a| a.criterion == criterion).collect();
        found[0].reason.text(Default::default())
    };
    for (criterion, words) in [
        ("Cell volume", "6.00 m³"),
        ("Plate coverage", "30.0 %"),
        ("Open share", "70.0 %"),
        ("Plate spacing", "3000 mm"),
        ("Drain path", "stays behind"),
        ("Vent path", "every cell gets out"),
    ] {
        let text = reason(criterion).replace('\u{2009}', "");
        assert!(text.contains(words), "{criterion}: `{text}` has no `{words}`");
    }
}
