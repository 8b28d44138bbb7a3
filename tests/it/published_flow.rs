//! Published flow through openings between cells: the law of an orifice, equalising, draining, rated flow.

use brimwright::flow::{
    Cell, DEFAULT_DISCHARGE_COEFFICIENT, Equalisation, FINE, Network, Opening, Passage, orifice, steady_levels,
};
use brimwright::geom::{Sublevel, Vec2};
use brimwright::num::{bisect, tanh_sinh};

use crate::support::shapes::{circle, polygon};
use crate::support::table::{Findings, Row, table};

/// Gravity of the tables.
const G: f64 = 9.81;

/// Plan areas and first levels of prisms.
type Prisms = &'static [(f64, f64)];

type Level<'a> = &'a (dyn Fn(f64) -> f64 + Sync);

/// An opening of a row.
fn opening(row: &Row) -> Opening {
    let [low_m, high_m, area_m2, c_d] = ["low_m", "high_m", "area_m2", "c_d"].map(|column| row.number(column));
    Opening { low_m, high_m, area_m2, c_d }
}

fn hole(level_m: f64, area_m2: f64, c_d: f64) -> Opening {
    Opening { low_m: level_m, high_m: level_m, area_m2, c_d }
}

fn between(from_idx: usize, to_idx: usize, opening: Opening) -> Passage {
    Passage { from_idx, to_idx: Some(to_idx), opening }
}

fn outside(from_idx: usize, opening: Opening) -> Passage {
    Passage { from_idx, to_idx: None, opening }
}

fn network<'a>(cells: &[Cell<'a>], passages: &[Passage], g: f64) -> Network<'a> {
    Network::new(cells.to_vec(), passages.to_vec(), g).unwrap_or_else(|error| panic!("{error}: {passages:?}"))
}

fn rest(cells: &[Cell], passages: &[Passage], g: f64) -> Equalisation {
    let network = network(cells, passages, g);
    network.equalise(FINE).unwrap_or_else(|error| panic!("{error}: {network:?}"))
}

/// A prism with its floor at zero and room for 10 m.
fn prism(plan_m2: f64, level_m: f64, level_for_volume: Level) -> Cell {
    Cell { capacity_m3: 10.0 * plan_m2, volume_m3: plan_m2 * level_m, level_for_volume }
}

#[test]
fn one_opening_agrees_with_quadrature() {
    let mut findings = Findings::default();
    for row in &table("orifice_flow.csv").rows {
        let [from, to, g] = ["level_from_m", "level_to_m", "g_m_per_s2"].map(|column| row.number(column));
        row.compare(&mut findings, "flow_m3_per_s", orifice(&opening(row), from, to, g));
    }
    findings.report(12);
}

#[test]
fn the_discharge_coefficient_is_that_of_holes_in_thin_plates() {
    let rows = table("orifice_coefficients.csv").rows;
    let of_use: Vec<&Row> = rows.iter().filter(|row| row.text("use") == "yes").collect();
    assert_eq!(of_use.len(), 2);
    for row in of_use {
        let range = row.number("lowest")..=row.number("highest");
        assert!(range.contains(&DEFAULT_DISCHARGE_COEFFICIENT), "{}: {range:?}", row.id());
    }
}

#[test]
fn two_prisms_equalise_as_the_closed_form_says() {
    let mut findings = Findings::default();
    for row in &table("orifice_equalise.csv").rows {
        let [plan_a, plan_b, head] = ["plan_a_m2", "plan_b_m2", "head_m"].map(|column| row.number(column));
        let (level_a, level_b) = (|v: f64| v / plan_a, |v: f64| v / plan_b);
        let cells = [prism(plan_a, 1.0 + head, &level_a), prism(plan_b, 1.0, &level_b)];
        let passages = [between(0, 1, hole(0.2, row.number("area_m2"), row.number("c_d")))];
        let network = network(&cells, &passages, G);
        let way = network.equalise(FINE).unwrap();
        let end_s = way.end_s.expect("the flow ends");
        row.compare(&mut findings, "end_s", end_s);
        row.compare(&mut findings, "quarter_s", way.time_for_share(0.75));
        row.compare(&mut findings, "moved_m3", way.moved_m3);
        row.compare(&mut findings, "first_flow_m3_per_s", network.flows_at_start()[0]);
        // The head is the square of what is left of the time.
        let end_s = row.number("end_s");
        row.compare_within(&mut findings, "end_s", way.time_for_share(0.95) / (1.0 - 0.05_f64.sqrt()), 1e-6 * end_s);
        for time in (0..=20).map(|i| end_s * f64::from(i) / 20.0) {
            let volumes = way.volumes_at(time);
            let left = 1.0 - time / end_s;
            let (want, got) = (head * left * left, level_a(volumes[0]) - level_b(volumes[1]));
            assert!((want - got).abs() < 1e-6 * head, "{}: head at {time} s {got}, expected {want}", row.id());
        }
    }
    findings.report(15);
}

#[test]
fn prisms_and_round_barrels_drain_as_the_closed_form_says() {
    let mut findings = Findings::default();
    for row in &table("orifice_drain.csv").rows {
        let (depth, size) = (row.number("depth_m"), row.given("plan_m2"));
        let disc = Sublevel::new(&circle(row.given("radius_m").unwrap_or(1.0)), Vec2::new(0.0, 1.0));
        let level = |v: f64| match size {
            Some(plan) => v / plan,
            None => disc.level_for_area(v / row.number("length_m")),
        };
        let (volume_m3, capacity_m3) = match size {
            Some(plan) => (plan * depth, plan * depth),
            None => {
                let length = row.number("length_m");
                (disc.area_below(depth) * length, disc.total_area() * length)
            }
        };
        let cell = Cell { capacity_m3, volume_m3, level_for_volume: &level };
        let way = rest(&[cell], &[outside(0, hole(0.0, row.number("area_m2"), row.number("c_d")))], G);
        let end_s = way.end_s.expect("the tank is empty in the end");
        row.compare(&mut findings, "end_s", end_s);
        let quarter_s = bisect(0.0, end_s, 0.0, |t| level(way.volumes_at(t)[0]) < 0.25 * depth);
        row.compare(&mut findings, "quarter_s", quarter_s);
        let drained = way.drained_m3;
        assert!((drained - volume_m3).abs() < 1e-8 * volume_m3, "{}: {drained} of {volume_m3} m3", row.id());
    }
    findings.report(6);
}

#[test]
fn a_baffled_tank_comes_to_one_straight_surface() {
    let (width, front_m, rear_m) = (2.0, 3.0, 2.0);
    let mut findings = Findings::default();
    for row in &table("orifice_baffled.csv").rows {
        let vertical = row.number("gravity_m_per_s2") + row.number("accel_z_m_per_s2");
        let slope = row.number("slope");
        // The tank accelerates to the right, so that the liquid climbs to the left, the rear.
        let g = Vec2::new(-slope * vertical, -vertical);
        let up = -g.normalize();
        let box_between = |s0: f64, s1: f64| polygon(&[(s0, 0.0), (s1, 0.0), (s1, 5.0), (s0, 5.0)]);
        let (rear, front) = (box_between(0.0, rear_m), box_between(rear_m, rear_m + front_m));
        let [rear, front, whole] = [rear, front, box_between(0.0, rear_m + front_m)].map(|o| Sublevel::new(&o, up));
        let level_rear = |v: f64| rear.level_for_area(v / width);
        let level_front = |v: f64| front.level_for_area(v / width);
        let depth = 2.0;
        let cell = |sublevel: &Sublevel, length: f64, level_for_volume| Cell {
            capacity_m3: sublevel.total_area() * width,
            volume_m3: depth * length * width,
            level_for_volume,
        };
        let cells = [cell(&rear, rear_m, &level_rear as Level), cell(&front, front_m, &level_front as Level)];
        let foot = up.dot(&Vec2::new(rear_m, 0.0));
        let way = rest(&cells, &[between(1, 0, hole(foot, row.number("area_m2"), row.number("c_d")))], g.norm());
        // Surfaces at the plate, seen along z: a level is cos(tilt) of a height.
        let head_m = (level_front(cells[1].volume_m3) - level_rear(cells[0].volume_m3)) / up.y;
        row.compare(&mut findings, "head_m", head_m);
        row.compare(&mut findings, "end_s", way.end_s.expect("the flow ends"));
        row.compare(&mut findings, "moved_m3", way.moved_m3);
        row.compare(&mut findings, "rear_rise_m", (way.volumes_m3[0] - cells[0].volume_m3) / (rear_m * width));
        row.compare(&mut findings, "front_fall_m", (cells[1].volume_m3 - way.volumes_m3[1]) / (front_m * width));
        let settled = whole.level_for_area(depth * (rear_m + front_m));
        for level in way.levels_m {
            assert!((level - settled).abs() < 1e-8, "{}: level {level}, settled {settled}", row.id());
        }
    }
    findings.report(10);
}

#[test]
fn rows_of_cells_agree_with_a_general_purpose_solver() {
    // Plan areas and first levels, passages: as the table's head describes them.
    let slot = |low_m, high_m, area_m2, c_d| Opening { low_m, high_m, area_m2, c_d };
    let networks: [(&str, Prisms, Vec<Passage>); 4] = [
        (
            "row",
            &[(2.0, 2.0), (1.0, 1.0), (3.0, 1.0)],
            vec![between(0, 1, hole(0.2, 0.01, 0.6)), between(1, 2, slot(0.0, 0.5, 0.02, 0.65))],
        ),
        ("slot", &[(2.0, 2.2), (4.0, 0.1)], vec![between(0, 1, slot(0.5, 2.5, 0.05, 0.6))]),
        (
            "drain",
            &[(3.0, 2.0), (2.0, 0.5)],
            vec![between(0, 1, slot(0.0, 0.3, 0.01, 0.6)), outside(1, hole(0.0, 0.005, 0.61))],
        ),
        (
            "unlike",
            &[(2.0, 2.0), (2.0, 1.0), (2.0, 0.5)],
            vec![between(0, 1, hole(0.1, 0.2, 0.6)), between(1, 2, hole(0.1, 0.002, 0.6))],
        ),
    ];
    let rows = table("orifice_network.csv").rows;
    let mut findings = Findings::default();
    for (id, cells, passages) in networks {
        let levels: Vec<_> = cells.iter().map(|(plan, _)| move |v: f64| v / plan).collect();
        let cells: Vec<Cell> =
            cells.iter().zip(&levels).map(|((plan, level), of_volume)| prism(*plan, *level, of_volume)).collect();
        let way = rest(&cells, &passages, G);
        for row in rows.iter().filter(|row| row.text("network") == id) {
            let volumes = way.volumes_at(row.number("time_s"));
            for ((column, volume), level) in ["level_a_m", "level_b_m", "level_c_m"].iter().zip(volumes).zip(&levels)
            {
                row.compare(&mut findings, column, level(volume));
            }
        }
    }
    findings.report(40);
}

#[test]
fn round_cells_equalise_in_the_time_of_a_quadrature() {
    // t = integral of dV / Q over what moves; Q goes like the root of what is left, which tanh-sinh stands.
    let [small, large] = [0.8, 1.1].map(|radius| Sublevel::new(&circle(radius), Vec2::new(0.0, 1.0)));
    let (level_a, level_b) = (|v: f64| small.level_for_area(v / 2.0), |v: f64| large.level_for_area(v / 1.5));
    let cells = [
        Cell { capacity_m3: 2.0 * small.total_area(), volume_m3: 3.5, level_for_volume: &level_a as Level },
        Cell { capacity_m3: 1.5 * large.total_area(), volume_m3: 0.4, level_for_volume: &level_b },
    ];
    for opening in [hole(0.0, 0.004, 0.6), Opening { low_m: 0.1, high_m: 0.7, area_m2: 0.01, c_d: 0.62 }] {
        let way = rest(&cells, &[between(0, 1, opening)], G);
        let levels = |moved: f64| (level_a(3.5 - moved), level_b(0.4 + moved));
        let moves = bisect(0.0, 3.5, 0.0, |moved| levels(moved).0 < levels(moved).1);
        // In parts, between the kinks where a level passes the sill or the top of the opening.
        let mut kinks = vec![0.0, moves];
        for edge in [opening.low_m, opening.high_m] {
            kinks.push(bisect(0.0, moves, 0.0, |moved| levels(moved).0 < edge));
            kinks.push(bisect(0.0, moves, 0.0, |moved| levels(moved).1 > edge));
        }
        kinks.sort_by(f64::total_cmp);
        let part = |ends: &[f64]| {
            let [spent] = tanh_sinh(|x| {
                let (a, b) = levels(ends[1] - (ends[1] - ends[0]) * x);
                [(ends[1] - ends[0]) / orifice(&opening, a, b, G)]
            });
            if ends[1] > ends[0] { spent } else { 0.0 }
        };
        let want: f64 = kinks.windows(2).map(part).sum();
        let got = way.end_s.expect("the flow ends");
        assert!((got - want).abs() < 1e-6 * want, "{opening:?}: {got} s, by quadrature {want} s");
        assert!((way.moved_m3 - moves).abs() < 1e-8, "{opening:?}: {} m3, expected {moves} m3", way.moved_m3);
    }
}

#[test]
fn a_cell_that_runs_down_to_a_sill_never_quite_rests() {
    // Over a weir of width b: h^-0.5 = h0^-0.5 + t C_d b sqrt(2g) / 3A, from Q = 2/3 C_d b sqrt(2g) h^1.5 (Streeter; from memory).
    let (plan, height, width, c_d) = (3.0, 0.8, 0.4, 0.6);
    let level = |v: f64| v / plan;
    let weir = Opening { low_m: 1.0, high_m: 2.0, area_m2: width, c_d };
    for passage in [outside(0, weir), between(0, 1, weir)] {
        let low = |v: f64| v / 100.0;
        let way = rest(&[prism(plan, 1.0 + height, &level), prism(100.0, 0.1, &low)], &[passage], G);
        assert_eq!(way.end_s, None);
        assert!((way.levels_m[0] - 1.0).abs() < 1e-8, "trapped at {} m", way.levels_m[0]);
        for share in [0.5, 0.95, 0.999] {
            let slowing = c_d * width * (2.0 * G).sqrt() / (3.0 * plan);
            let want = ((height * (1.0 - share)).powf(-0.5) - height.powf(-0.5)) / slowing;
            let got = way.time_for_share(share);
            assert!((got - want).abs() < 1e-6 * want, "share {share}: {got} s, expected {want} s");
        }
    }
}

#[test]
fn a_full_cell_carries_pressure() {
    // Two drowned holes in a row, the cell between them full, are one: 1/a^2 = 1/a1^2 + 1/a2^2.
    let (plan, a1, a2, c_d) = (4.0, 0.01, 0.02, 0.6);
    let (level, low) = (|v: f64| v / plan, |v: f64| v / 0.5);
    let middle = Cell { capacity_m3: 0.5, volume_m3: 0.4, level_for_volume: &low as Level };
    let cells = [prism(plan, 3.0, &level), middle, prism(plan, 2.0, &level)];
    let way = rest(&cells, &[between(0, 1, hole(0.1, a1, c_d)), between(1, 2, hole(0.1, a2, c_d))], G);
    let area = (a1.powi(-2) + a2.powi(-2)).powf(-0.5);
    // The 0.1 m3 that fill the middle come first, in some 4 s: after them the heads are those of the closed form.
    let filled_s = bisect(0.0, 100.0, 0.0, |t| way.volumes_at(t)[1] >= 0.5);
    let volumes = way.volumes_at(filled_s);
    let head = level(volumes[0]) - level(volumes[2]);
    let want = plan * head.sqrt() / (c_d * area * (2.0 * G).sqrt());
    let got = way.end_s.expect("the flow ends") - filled_s;
    assert!((got - want).abs() < 1e-5 * want, "{got} s, expected {want} s");
    assert!((way.volumes_m3[1] - 0.5).abs() < 1e-9, "the middle holds {}", way.volumes_m3[1]);
}

#[test]
fn rated_flows_need_the_levels_of_the_inverse_law() {
    let mut findings = Findings::default();
    for row in &table("orifice_steady.csv").rows {
        let (opening, flow, to_m) = (opening(row), row.number("flow_m3_per_s"), row.number("level_down_m"));
        // Two halves side by side carry what the whole does.
        let half = Opening { area_m2: 0.5 * opening.area_m2, ..opening };
        for openings in [vec![opening], vec![half, half]] {
            let passages: Vec<Passage> = openings.into_iter().map(|opening| between(0, 1, opening)).collect();
            let levels = steady_levels(2, &passages, (0, flow), (1, to_m), G).unwrap();
            row.compare(&mut findings, "level_up_m", levels[0].expect("a way leads there"));
        }
        if row.id() == "drowned" {
            let speed = flow / (opening.c_d * opening.area_m2);
            row.compare(&mut findings, "level_up_m", to_m + speed * speed / (2.0 * G));
        }
    }
    findings.report(11);
}

#[test]
fn rated_flows_through_rows_and_rings_of_cells() {
    let (a_b, b_c) = (Opening { low_m: 0.1, high_m: 0.4, area_m2: 0.09, c_d: 0.6 }, hole(0.2, 0.06, 0.6));
    let past_b = Opening { low_m: 0.9, high_m: 1.4, area_m2: 0.05, c_d: 0.6 };
    let mut findings = Findings::default();
    for row in &table("orifice_steady_network.csv").rows {
        let mut passages = vec![between(0, 1, a_b), between(2, 1, b_c)];
        match row.id() {
            "row" => {}
            "ring" => passages.push(between(0, 2, past_b)),
            "blind" => passages.push(between(1, 3, hole(0.2, 0.01, 0.6))),
            other => panic!("no such network: {other}"),
        }
        let inlet = (0, row.number("flow_m3_per_s"));
        let levels = steady_levels(4, &passages, inlet, (2, row.number("level_c_m")), G).unwrap();
        for (column, level) in ["level_a_m", "level_b_m", "level_c_m", "level_d_m"].iter().zip(levels) {
            row.compare(&mut findings, column, level.unwrap_or(f64::NAN));
        }
    }
    findings.report(10);
}
