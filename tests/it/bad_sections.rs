//! Bad sections: every fault is listed at once, each with its place and a way to mend it.

use std::f64::consts::TAU;

use brimwright::geom::{Edge, Vec2};
use brimwright::problem::{Place, Problem, Severity};
use brimwright::section::{Section, WidthLaw, check};
use brimwright::study::Fill;
use proptest::prelude::*;

use crate::support::random::{any as sections, config, star};
use crate::support::shapes::{circle, obstacle, polygon, rectangle, section};
use crate::support::{held, study};

fn faults(section: &Section) -> Vec<Problem> {
    let problems = check(section).err().unwrap_or_default();
    for p in &problems {
        assert!(p.severity == Severity::Fault && !p.message.is_empty() && !p.hint.is_empty(), "{p}");
    }
    problems
}

fn places(section: &Section) -> Vec<Place> {
    faults(section).into_iter().map(|p| p.place).collect()
}

#[track_caller]
fn names(section: &Section, place: Place) {
    let found = places(section);
    assert!(found.contains(&place), "expected a fault at {place}, got {found:?}");
}

fn open_box() -> Section {
    section(&rectangle(4.0, 2.0), &[2], 1.0)
}

fn box_at(s: f64, z: f64, size: f64) -> Vec<Edge> {
    let by = Vec2::new(s, z);
    rectangle(size, size).iter().map(|e| Edge::line(e.start + by, e.end + by)).collect()
}

#[test]
fn a_sound_section_has_no_fault() {
    let mut sound = open_box();
    sound.obstacles = vec![obstacle(&box_at(1.0, 0.5, 0.5)), obstacle(&box_at(2.0, 0.5, 0.5))];
    assert_eq!(places(&sound), vec![]);
    assert_eq!(places(&section(&circle(1.0), &[], 1.0)), vec![]);
}

#[test]
fn an_outline_that_crosses_itself() {
    let bow_tie = section(&polygon(&[(0.0, 0.0), (2.0, 2.0), (2.0, 0.0), (0.0, 2.0)]), &[], 1.0);
    names(&bow_tie, Place::Crossing { edge_idx: 0, other_idx: 2, at_m: [1.0, 1.0] });
}

#[test]
fn an_arc_that_crosses_a_wall() {
    // The floor bulges up, out through both side walls and the roof.
    let mut bulging = open_box();
    bulging.outline[0].sweep_rad = -0.6 * TAU;
    assert!(
        places(&bulging).iter().any(|p| matches!(p, Place::Crossing { edge_idx: 0, .. })),
        "{:?}",
        faults(&bulging)
    );
}

#[test]
fn an_outline_that_touches_itself() {
    // A notch from the roof down to the floor.
    let pinched = polygon(&[(0.0, 0.0), (4.0, 0.0), (4.0, 2.0), (2.5, 2.0), (2.0, 0.0), (1.5, 2.0), (0.0, 2.0)]);
    let found = places(&section(&pinched, &[], 1.0));
    assert!(found.iter().any(|p| matches!(p, Place::Crossing { edge_idx: 0, .. })), "{found:?}");
}

#[test]
fn an_outline_without_area() {
    let flat = section(&polygon(&[(0.0, 0.0), (1.0, 0.0), (2.0, 0.0)]), &[], 1.0);
    assert!(!places(&flat).is_empty());
    let line = section(&polygon(&[(0.0, 0.0), (1.0, 0.0)]), &[], 1.0);
    assert!(!places(&line).is_empty());
    assert!(!places(&section(&[], &[], 1.0)).is_empty());
}

#[test]
fn an_obstacle_outside_or_across_the_outline() {
    for (s, z) in [(5.0, 0.5), (3.8, 0.5), (3.5, 0.5), (-0.25, -0.25)] {
        let mut tank = open_box();
        tank.obstacles = vec![obstacle(&box_at(1.0, 0.5, 0.25)), obstacle(&box_at(s, z, 0.5))];
        names(&tank, Place::Obstacle { obstacle_idx: 1, edge_idx: None });
    }
}

#[test]
fn an_obstacle_round_the_whole_outline() {
    let mut tank = open_box();
    tank.obstacles = vec![obstacle(&box_at(-10.0, -10.0, 50.0))];
    names(&tank, Place::Obstacle { obstacle_idx: 0, edge_idx: None });
}

#[test]
fn obstacles_that_overlap() {
    for (s, size) in [(1.25, 0.5), (1.5, 0.5), (1.1, 0.2), (0.8, 1.0)] {
        let mut tank = open_box();
        tank.obstacles = vec![obstacle(&box_at(1.0, 0.5, 0.5)), obstacle(&box_at(s, 0.6 - size / 4.0, size))];
        names(&tank, Place::Obstacle { obstacle_idx: 1, edge_idx: None });
    }
}

#[test]
fn a_vertex_given_twice() {
    let doubled = polygon(&[(0.0, 0.0), (4.0, 0.0), (4.0, 0.0), (4.0, 2.0), (0.0, 2.0)]);
    names(&section(&doubled, &[], 1.0), Place::Edge(1));
}

#[test]
fn numbers_that_are_not_finite() {
    let mut tank = open_box();
    tank.outline[1].start.x = f64::NAN;
    tank.outline[3].sweep_rad = f64::INFINITY;
    tank.obstacles = vec![obstacle(&box_at(1.0, 0.5, 0.5))];
    tank.obstacles[0].vertices[2].start.y = f64::NEG_INFINITY;
    tank.width = WidthLaw::Constant { width_m: f64::NAN };
    names(&tank, Place::Edge(1));
    names(&tank, Place::Edge(3));
    names(&tank, Place::Obstacle { obstacle_idx: 0, edge_idx: Some(2) });
    names(&tank, Place::Field("width law"));
}

#[test]
fn arcs_of_a_full_turn() {
    for sweep_rad in [TAU, -TAU, 10.0] {
        let mut tank = open_box();
        tank.outline[1].sweep_rad = sweep_rad;
        names(&tank, Place::Edge(1));
    }
}

#[test]
fn nothing_but_mouths() {
    let sieve = section(&rectangle(4.0, 2.0), &[0, 1, 2, 3], 1.0);
    names(&sieve, Place::Field("outline"));
}

#[test]
fn widths_that_hold_nothing_or_do_not_reach() {
    let laws = [
        WidthLaw::Constant { width_m: 0.0 },
        WidthLaw::Constant { width_m: -1.0 },
        WidthLaw::RoundBarrel { diameter_m: 0.0, bottom_z_m: 0.0 },
        WidthLaw::RoundBarrel { diameter_m: 1.0, bottom_z_m: 0.0 },
        WidthLaw::RoundBarrel { diameter_m: 3.0, bottom_z_m: 0.5 },
        WidthLaw::RoundBarrel { diameter_m: 3.0, bottom_z_m: f64::NAN },
        WidthLaw::Oval { width_m: 1.0, height_m: -2.0, bottom_z_m: 0.0 },
        WidthLaw::Table(vec![]),
        WidthLaw::Table(vec![(0.0, 1.0)]),
        WidthLaw::Table(vec![(0.0, 0.0), (2.0, 0.0)]),
        WidthLaw::Table(vec![(0.0, 1.0), (1.0, 1.0)]),
    ];
    for law in laws {
        let tank = Section { width: law.clone(), ..open_box() };
        let found = places(&tank);
        assert!(found.contains(&Place::Field("width law")), "{law:?}: {found:?}");
    }
    let rows = [vec![(0.0, 1.0), (0.0, 2.0), (2.0, 1.0)], vec![(0.0, 1.0), (1.0, -2.0), (2.0, 1.0)]];
    for rows in rows {
        names(&Section { width: WidthLaw::Table(rows), ..open_box() }, Place::WidthRow(1));
    }
}

#[test]
fn every_fault_is_listed_at_once() {
    let mut tank = open_box();
    tank.outline[0].sweep_rad = TAU;
    tank.outline[2].start = tank.outline[3].start;
    tank.obstacles = vec![obstacle(&box_at(1.0, 0.5, 0.5)), obstacle(&polygon(&[(1.0, 1.0), (1.2, 1.0)]))];
    tank.obstacles[0].vertices[3].start.x = f64::NAN;
    tank.width = WidthLaw::Constant { width_m: -1.0 };
    let expected = [
        Place::Edge(0),
        Place::Edge(2),
        Place::Obstacle { obstacle_idx: 0, edge_idx: Some(3) },
        Place::Obstacle { obstacle_idx: 1, edge_idx: None },
        Place::Field("width law"),
    ];
    let found = places(&tank);
    for place in expected {
        assert!(found.contains(&place), "expected a fault at {place}, got {found:?}");
    }
}

#[test]
fn a_study_lists_the_faults_of_its_section_and_its_own() {
    let mut bad = study(open_box(), Fill::Share(0.5));
    bad.section.outline[1].start.x = f64::NAN;
    bad.gravity_m_per_s2 = 0.0;
    bad.liquid.density_kg_per_m3 = f64::NAN;
    bad.cases = vec![held(f64::INFINITY, 0.0)];
    let problems = bad.validate().expect_err("a bad study");
    let found: Vec<&Place> = problems.iter().map(|p| &p.place).collect();
    assert!(found.contains(&&Place::Edge(1)), "{found:?}");
    assert!(found.contains(&&Place::Case(0)), "{found:?}");
    assert!(found.iter().filter(|p| matches!(p, Place::Field(_))).count() >= 2, "gravity and density: {found:?}");
}

#[test]
fn random_sound_sections_are_let_in() {
    proptest!(config(100, 51), |(sample in sections())| {
        let section = sample.section(&[0], 1.0);
        prop_assert!(check(&section).is_ok(), "{:?}", faults(&section));
    });
}

#[test]
fn an_obstacle_pushed_through_a_wall_is_refused() {
    proptest!(config(60, 52), |(sample in star(5..=20, true), which in 0..99_usize)| {
        // A small square round the middle of a wall.
        let edge = sample.outline[which % sample.outline.len()];
        let (middle, reach) = (edge.point_at(0.5), 1e-3 * edge.length());
        let square: Vec<Edge> = rectangle(reach, reach)
            .iter()
            .map(|e| {
                let by = middle.coords - Vec2::new(0.5, 0.5) * reach;
                Edge::line(e.start + by, e.end + by)
            })
            .collect();
        let mut section = sample.section(&[0], 1.0);
        section.obstacles = vec![obstacle(&square)];
        prop_assert!(check(&section).is_err(), "an obstacle across a wall was let in");
    });
}
