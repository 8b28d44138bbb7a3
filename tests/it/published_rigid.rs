//! Published worked examples: liquid in tanks that are held at a constant acceleration.

use brimwright::analysis::{CaseResult, Results};
use brimwright::cases::Attitude;
use brimwright::geom::Vec2;
use brimwright::section::EdgeKind;
use brimwright::study::{Fill, Study};

use crate::support::shapes::{circle, rectangle, section};
use crate::support::table::{Findings, Row, table};
use crate::support::*;

const FLOOR: usize = 0;
const FRONT: usize = 1;
const TOP: usize = 2;
const REAR: usize = 3;

/// The open tank of a row of rigid_open.csv, its load case in place.
fn open_tank(row: &Row) -> Study {
    let (length, height) = (row.number("length_m"), row.number("height_m"));
    let tank = section(&rectangle(length, height), &[TOP], row.number("width_m"));
    let mut study = study(tank, Fill::Level(row.number("depth_m")));
    study.liquid.density_kg_per_m3 = row.number("density_kg_per_m3");
    study.points = vec![named("rear floor", 0.0, 0.0), named("front floor", length, 0.0)];
    study.cases = vec![held(row.number("accel_s_m_per_s2"), row.number("accel_z_m_per_s2"))];
    study
}

/// What a column of rigid_open.csv stands for.
fn measured(results: &Results, column: &str) -> f64 {
    let case = &results.cases[0];
    let settled = settled(case);
    match column {
        "slope" => -case.gravity.slope.unwrap(),
        "tilt_deg" => -case.gravity.tilt_rad.unwrap().to_degrees(),
        "rear_height_m" => chord(settled).left.y,
        "front_height_m" => chord(settled).right.y,
        "rear_floor_pa" => pressure_at(settled, "rear floor"),
        "front_floor_pa" => pressure_at(settled, "front floor"),
        "rear_force_n" => -edge_load(settled, REAR).force_n.x,
        "front_force_n" => edge_load(settled, FRONT).force_n.x,
        "left_m3" => settled.volume_m3,
        "spilled_m3" => settled.spilled_m3,
        "wet_floor_m" => edge_load(settled, FLOOR).wetted_length_m,
        "first_spill_m_per_s2" => verdict(case, "Contained").unwrap().limit.unwrap().si,
        "rise_m" => settled.highest_wetted.y - results.still.level_z_m,
        other => panic!("no such column: {other}"),
    }
}

#[test]
fn open_tanks_agree_with_worked_examples() {
    let table = table("rigid_open.csv");
    let first = table.columns.iter().position(|c| c == "slope").unwrap();
    let last = table.columns.iter().position(|c| c == "tolerance").unwrap();
    let mut findings = Findings::default();
    for row in &table.rows {
        let results = judge(&open_tank(row));
        for column in table.columns[first..last].iter().filter(|c| row.given(c).is_some()) {
            row.compare(&mut findings, column, measured(&results, column));
        }
    }
    findings.report(60);
}

#[test]
fn open_tanks_agree_with_the_roundings_in_print() {
    let tanks = table("rigid_open.csv").rows;
    let mut findings = Findings::default();
    for row in &table("rigid_open_as_printed.csv").rows {
        let tank = tanks.iter().find(|tank| tank.id() == row.id()).unwrap();
        row.compare(&mut findings, "value", measured(&judge(&open_tank(tank)), row.text("column")));
    }
    findings.report(16);
}

#[test]
fn freeboard_asks_for_the_published_rise() {
    let mut findings = Findings::default();
    for row in table("rigid_open.csv").rows.iter().filter(|row| row.given("rise_m").is_some()) {
        let tank = open_tank(row);
        // The same tank elsewhere, thrown the other way: its right wall is the rear one.
        let mut other = tank.clone();
        other.section.outline.iter_mut().for_each(|edge| edge.start += Vec2::new(7.0, 3.0));
        other.fill = Fill::Volume(judge(&tank).still.volume_m3);
        other.cases = vec![held(-row.number("accel_s_m_per_s2"), row.number("accel_z_m_per_s2"))];
        for study in [tank, other] {
            let results = judge(&study);
            let freeboard = verdict(&results.cases[0], "Freeboard").expect("freeboard is judged under a flat rim");
            row.compare(&mut findings, "rise_m", freeboard.demand.unwrap().si);
        }
    }
    findings.report(16);
}

#[test]
fn rear_and_front_forces_differ_by_mass_times_acceleration() {
    // Row 1.1: 36868.00 - 868.005 = 36000.000 N = 15 m3 x 1000 kg/m3 x 2.4 m/s2.
    let row = &table("rigid_open.csv").rows[0];
    let results = judge(&open_tank(row));
    let got = measured(&results, "rear_force_n") - measured(&results, "front_force_n");
    assert!((got - 36_000.0).abs() < 1e-7, "expected 36000 N, got {got}");
}

#[test]
fn closed_tanks_agree_with_area_conservation() {
    let (length, height) = (5.0, 3.0);
    let mut findings = Findings::default();
    for row in &table("rigid_closed.csv").rows {
        let mut study = study(section(&rectangle(length, height), &[], 1.0), Fill::Level(2.0));
        study.points = vec![named("rear floor", 0.0, 0.0), named("rear roof", 0.0, height)];
        let case = judge_case(&study, held(row.number("accel_s_m_per_s2"), 0.0));
        let settled = settled(&case);
        let surface = chord(settled);
        row.compare(&mut findings, "rear_height_m", surface.left.y);
        row.compare(&mut findings, "front_height_m", surface.right.y);
        row.compare(&mut findings, "roof_contact_m", length - surface.left.x);
        row.compare(&mut findings, "floor_contact_m", length - surface.right.x);
        row.compare(&mut findings, "rear_floor_pa", pressure_at(settled, "rear floor"));
        row.compare(&mut findings, "rear_roof_pa", pressure_at(settled, "rear roof"));
        row.compare(&mut findings, "centroid_from_front_m", length - settled.centroid.x);
        row.compare(&mut findings, "centroid_z_m", settled.centroid.y);
        match (row.given("roof_contact_m"), &settled.roof) {
            (None, roof) => assert!(roof.is_none(), "{}: the surface stays below the roof: {roof:?}", row.id()),
            (Some(from_front), roof) => {
                let roof = roof.as_ref().expect("the liquid reaches the roof");
                row.compare(&mut findings, "rear_roof_pa", roof.peak_pa);
                row.compare(&mut findings, "roof_contact_m", length - roof.wetted_length_m);
                assert!(roof.edge_idx == TOP, "{}: {from_front}, edge {}", row.id(), roof.edge_idx);
            }
        }
    }
    findings.report(38);
}

#[test]
fn tanks_on_an_incline_agree_with_the_textbook_formula() {
    let mut findings = Findings::default();
    for row in &table("rigid_incline.csv").rows {
        let incline_deg = row.number("incline_deg");
        let tank = section(&rectangle(4.0, 8.0), &[], 1.0);
        let mut load_case = held(row.number("accel_up_slope_m_per_s2"), 0.0);
        load_case.attitude = Attitude::HeelDeg(incline_deg);
        let case = judge_case(&study(tank, Fill::Level(3.0)), load_case);
        // Seen in the tank, which stands turned by the incline, the liquid climbs to the left: a negative tilt.
        let to_floor_deg = -case.gravity.tilt_rad.unwrap().to_degrees();
        row.compare(&mut findings, "angle_to_floor_deg", to_floor_deg);
        row.compare(&mut findings, "angle_to_horizontal_deg", to_floor_deg - incline_deg);
        row.compare(&mut findings, "slope_to_horizontal", (to_floor_deg - incline_deg).to_radians().tan());
        row.compare(&mut findings, "effective_gravity_m_per_s2", case.gravity.magnitude);
        let surface = chord(settled(&case));
        let drop = (surface.left.y - surface.right.y) / (surface.right.x - surface.left.x);
        row.compare(&mut findings, "angle_to_floor_deg", drop.atan().to_degrees());
    }
    findings.report(19);
}

#[test]
fn liquid_in_a_circle_only_turns() {
    let mut findings = Findings::default();
    for row in &table("rigid_round.csv").rows {
        let tank = section(&circle(1.0), &[], 1.0);
        let fill = Fill::Level(2.0 * row.number("depth_share"));
        let case = judge_case(&study(tank, fill), held(row.number("accel_s_m_per_s2"), 0.0));
        let settled = settled(&case);
        let (up, center) = (case.gravity.up.unwrap(), Vec2::new(0.0, 1.0));
        let offset = settled.centroid.coords - center;
        let tilt_rad = row.number("tilt_deg").to_radians();
        row.compare(&mut findings, "tilt_deg", -case.gravity.tilt_rad.unwrap().to_degrees());
        row.compare(&mut findings, "centroid_offset_m", -offset.dot(&up));
        row.compare(&mut findings, "surface_below_centre_m", up.dot(&center) - settled.pools[0].level_m);
        let toward_rear = row.number("centroid_offset_m") * tilt_rad.sin();
        assert!((-offset.x - toward_rear).abs() < 1e-7, "expected {toward_rear} toward the rear, got {}", -offset.x);
    }
    findings.report(3);
}

#[test]
fn free_fall_is_not_judged() {
    // Row 1.12, a_z = -9.81: p = density (g + a) depth = 0 at every depth. There is no settled surface.
    let tank = section(&rectangle(3.0, 4.0), &[TOP], 1.0);
    assert_eq!(tank.outline[TOP].kind, EdgeKind::Mouth);
    let case: CaseResult = judge_case(&study(tank, Fill::Level(2.0)), held(0.0, -GRAVITY));
    assert_eq!(case.gravity.magnitude, 0.0);
    assert!(case.gravity.up.is_none() && case.gravity.tilt_rad.is_none() && case.gravity.slope.is_none());
    assert!(case.settled.is_err(), "a settled state in free fall: {:?}", case.settled);
    assert!(case.verdicts.iter().all(|v| v.state == brimwright::analysis::State::NotJudged));
    assert!(!case.verdicts.is_empty(), "the criteria are listed, not dropped");
}
