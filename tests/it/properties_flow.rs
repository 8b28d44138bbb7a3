//! Properties of flow through openings, on random networks of cells, and what is refused.

use brimwright::flow::{Cell, FINE, FlowError, Network, Opening, Passage, orifice, steady_levels};
use proptest::collection::vec;
use proptest::prelude::*;

use crate::support::random::config;

const G: f64 = 9.80665;

/// A cell: bottom, height, capacity, what it holds of it, and how its level rises with what it holds.
#[derive(Clone, Debug)]
struct Shape {
    bottom_m: f64,
    height_m: f64,
    capacity_m3: f64,
    share: f64,
    kind: Kind,
}

#[derive(Clone, Copy, Debug)]
enum Kind {
    Prism,
    /// A sharp bottom.
    Wedge,
    /// Round at the bottom and at the top.
    Barrel,
}

impl Shape {
    fn level(&self, volume_m3: f64) -> f64 {
        let x = volume_m3 / self.capacity_m3;
        let round = |x: f64| 0.5 * (2.0 * x).powf(2.0 / 3.0);
        let rise = match self.kind {
            Kind::Prism => x,
            Kind::Wedge => x.sqrt(),
            Kind::Barrel if x < 0.5 => round(x),
            Kind::Barrel => 1.0 - round(1.0 - x),
        };
        self.bottom_m + self.height_m * rise
    }
}

fn shape() -> impl Strategy<Value = Shape> {
    let kind = prop_oneof![Just(Kind::Prism), Just(Kind::Wedge), Just(Kind::Barrel)];
    // Empty and full, too, and capacities of two decades.
    let share = prop_oneof![Just(0.0), Just(1.0), 0.0..1.0];
    (0.0..0.5, 0.3..2.0, -1.0..1.0, share, kind).prop_map(|(bottom_m, height_m, decade, share, kind)| Shape {
        bottom_m,
        height_m,
        capacity_m3: 10.0_f64.powf(decade),
        share,
        kind,
    })
}

/// From a cell, to a cell or, beyond the last one, the outside; how far above their bottoms, of which height and area.
type Drawn = (usize, usize, f64, f64, f64);

fn drawn() -> impl Strategy<Value = Drawn> {
    let sill = prop_oneof![Just(0.0), 0.0..0.3];
    let height = prop_oneof![Just(0.0), Just(0.05), 0.0..0.5];
    (0..4_usize, 0..5_usize, sill, height, (-3.0..-1.0).prop_map(|decade| 10.0_f64.powf(decade)))
}

fn passages(shapes: &[Shape], drawn: &[Drawn]) -> Vec<Passage> {
    let in_row = (1..shapes.len()).map(|i| (i - 1, i, 0.02 * i as f64, 0.0, 0.01));
    let ends = |&(from, to, sill, height, area): &Drawn| {
        let (from_idx, to_idx) = (from % shapes.len(), (to < shapes.len()).then_some(to));
        let bottom = |i: usize| shapes[i].bottom_m;
        let low_m = sill + to_idx.map_or(bottom(from_idx), |to| bottom(to).max(bottom(from_idx)));
        let opening = Opening { low_m, high_m: low_m + height, area_m2: area, c_d: 0.6 };
        (to_idx != Some(from_idx)).then_some(Passage { from_idx, to_idx, opening })
    };
    in_row.chain(drawn.iter().copied()).filter_map(|passage| ends(&passage)).collect()
}

#[test]
fn networks_conserve_volume_and_come_to_rest() {
    proptest!(config(24, 31), |(shapes in vec(shape(), 1..=4), drawn in vec(drawn(), 0..=2))| {
        let levels: Vec<_> = shapes.iter().map(|shape| move |volume: f64| shape.level(volume)).collect();
        let cells: Vec<Cell> = shapes
            .iter()
            .zip(&levels)
            .map(|(shape, level)| Cell {
                capacity_m3: shape.capacity_m3,
                volume_m3: shape.share * shape.capacity_m3,
                level_for_volume: level,
            })
            .collect();
        let passages = passages(&shapes, &drawn);
        let total: f64 = cells.iter().map(|cell| cell.volume_m3).sum();
        let way = Network::new(cells.clone(), passages.clone(), G).unwrap().equalise(FINE);
        let way = way.map_err(|error| TestCaseError::fail(error.to_string()))?;

        let rest: f64 = way.volumes_m3.iter().sum();
        prop_assert!((rest + way.drained_m3 - total).abs() <= 1e-13 * total, "{rest} and {} of {total}", way.drained_m3);
        let leaves = passages.iter().any(|passage| passage.to_idx.is_none());
        prop_assert!(leaves || way.drained_m3.abs() <= 1e-12 * total, "{} m3 are lost", way.drained_m3);

        // A cell is never more than full nor less than empty, to the error of a step.
        let allowed = 1e-7 * (way.moved_m3 + 1e-4 * cells.iter().map(|cell| cell.capacity_m3).fold(0.0, f64::max));
        let mut left = f64::INFINITY;
        let until_s = way.end_s.unwrap_or_else(|| way.time_for_share(0.999));
        for time in (0..50).map(|i| until_s * f64::from(i) / 49.0) {
            let volumes = way.volumes_at(time);
            for (cell, volume) in cells.iter().zip(&volumes) {
                let range = -allowed..=cell.capacity_m3 + allowed;
                prop_assert!(range.contains(volume), "{volume} m3 of {} at {time} s", cell.capacity_m3);
            }
            let inside: f64 = volumes.iter().sum();
            prop_assert!(inside <= total * (1.0 + 1e-12) && inside >= rest - allowed, "{inside} of {total} at {time} s");
            prop_assert!(inside <= left + allowed, "more than before: {inside} after {left} at {time} s");
            left = inside;
        }
        prop_assert!(way.time_for_share(0.5) <= way.time_for_share(0.95));
        prop_assert!(way.end_s.is_none_or(|end_s| way.time_for_share(0.99) <= end_s * (1.0 + 1e-9)), "{:?}", way.end_s);

        // At rest, levels on both sides of every opening are equal, or below its sill.
        for Passage { from_idx, to_idx, opening } in &passages {
            let sides = [way.levels_m[*from_idx], to_idx.map_or(opening.low_m, |to| way.levels_m[to])];
            let over = |level: f64| level.max(opening.low_m);
            let head = (over(sides[0]) - over(sides[1])).abs();
            prop_assert!(head <= 2e-4, "{sides:?} at the opening {opening:?}");
        }
    });
}

#[test]
fn steady_levels_carry_the_flow() {
    let opening = (0.0..1.0, prop_oneof![Just(0.0), 0.0..1.0], 0.01..1.0)
        .prop_map(|(low_m, height, area_m2)| Opening { low_m, high_m: low_m + height, area_m2, c_d: 0.6 });
    proptest!(config(200, 32), |(openings in vec(opening, 1..=3), to in -1.0..3.0, flow in 0.0..3.0)| {
        let carried = |from: f64| openings.iter().map(|opening| orifice(opening, from, to, G)).sum::<f64>();
        let passages: Vec<Passage> =
            openings.iter().map(|&opening| Passage { from_idx: 0, to_idx: Some(1), opening }).collect();
        let level = steady_levels(2, &passages, (0, flow), (1, to), G).unwrap()[0].unwrap();
        prop_assert!((carried(level) - flow).abs() < 1e-6, "{flow}: {} at {level}", carried(level));
    });
}

#[test]
fn what_has_no_meaning_is_named() {
    let level = |volume: f64| 1.0 + volume;
    let cell = Cell { capacity_m3: 2.0, volume_m3: 1.0, level_for_volume: &level };
    let opening = Opening { low_m: 1.2, high_m: 1.4, area_m2: 0.1, c_d: 0.6 };
    let passage = Passage { from_idx: 0, to_idx: Some(1), opening };
    let error =
        |cells: &[Cell], passage: Passage, g: f64| Network::new(cells.to_vec(), vec![passage], g).unwrap_err();
    let two = [cell, cell];

    for g in [0.0, -9.81, f64::NAN, f64::INFINITY] {
        assert!(matches!(error(&two, passage, g), FlowError::Gravity { .. }), "{g}");
    }
    for capacity_m3 in [0.0, -1.0, f64::NAN, f64::INFINITY] {
        let found = error(&[cell, Cell { capacity_m3, ..cell }], passage, G);
        assert!(matches!(found, FlowError::Capacity { cell_idx: 1, .. }), "{found}");
    }
    for volume_m3 in [-0.1, 2.1, f64::NAN] {
        let found = error(&[Cell { volume_m3, ..cell }, cell], passage, G);
        assert!(matches!(found, FlowError::Volume { cell_idx: 0, .. }), "{found}");
    }
    for level in [|_: f64| 1.0, |volume: f64| -volume, |_: f64| f64::NAN] {
        let found = error(&[cell, Cell { level_for_volume: &level, ..cell }], passage, G);
        assert!(matches!(found, FlowError::Levels { cell_idx: 1, .. }), "{found}");
    }
    for (from_idx, to_idx) in [(0, Some(0)), (2, None), (0, Some(2))] {
        let found = error(&two, Passage { from_idx, to_idx, opening }, G);
        assert!(matches!(found, FlowError::Ends { passage_idx: 0, n_cells: 2 }), "{found}");
    }
    let turned = Opening { low_m: 1.5, ..opening };
    let [negative, unknown] = [-1.0, f64::NAN].map(|area_m2| Opening { area_m2, ..opening });
    for opening in [turned, negative, unknown, Opening { high_m: f64::INFINITY, ..opening }] {
        let found = error(&two, Passage { opening, ..passage }, G);
        assert!(matches!(found, FlowError::Opening { passage_idx: 0, .. }), "{found}");
    }
    let found = error(&two, Passage { opening: Opening { low_m: 0.9, ..opening }, ..passage }, G);
    assert!(
        matches!(found, FlowError::Below { cell_idx: 0, .. }) && found.to_string().contains("passage 1"),
        "{found}"
    );
}

#[test]
fn nothing_to_flow_is_at_rest_at_once() {
    let level = |volume: f64| volume;
    let cell = |volume_m3| Cell { capacity_m3: 2.0, volume_m3, level_for_volume: &level };
    let opening = Opening { low_m: 0.5, high_m: 0.5, area_m2: 0.1, c_d: 0.6 };
    let passage = Passage { from_idx: 0, to_idx: Some(1), opening };
    let shut = Passage { opening: Opening { area_m2: 0.0, ..opening }, ..passage };
    for (cells, passages) in [
        (vec![cell(1.0), cell(1.0)], vec![passage]),
        (vec![cell(0.4), cell(0.1)], vec![passage]),
        (vec![cell(1.5), cell(0.1)], vec![shut]),
        (vec![cell(1.5)], vec![]),
        (vec![], vec![]),
    ] {
        let volumes: Vec<f64> = cells.iter().map(|cell| cell.volume_m3).collect();
        let way = Network::new(cells, passages, G).unwrap().equalise(FINE).unwrap();
        assert_eq!((way.end_s, way.moved_m3, &way.volumes_m3), (Some(0.0), 0.0, &volumes));
        assert_eq!((way.time_for_share(0.95), way.share_at(3.0)), (0.0, 1.0));
        assert!([0.0, 1.0].iter().all(|time| way.volumes_at(*time) == volumes));
    }
}

#[test]
fn a_rated_flow_without_a_way_or_a_meaning_is_refused() {
    let opening = Opening { low_m: 0.5, high_m: 0.7, area_m2: 0.1, c_d: 0.6 };
    let passages = [Passage { from_idx: 0, to_idx: Some(1), opening }];
    let levels = |inlet, outlet, g| steady_levels(3, &passages, inlet, outlet, g);
    assert_eq!(levels((0, 0.1), (2, 1.0), G), Err(FlowError::NoWay { from_idx: 0, to_idx: 2 }));
    assert_eq!(levels((7, 0.1), (1, 1.0), G), Err(FlowError::NoWay { from_idx: 7, to_idx: 1 }));
    assert_eq!(levels((0, 0.1), (7, 1.0), G), Err(FlowError::NoWay { from_idx: 0, to_idx: 7 }));
    for (flow, level) in [(-0.1, 1.0), (f64::NAN, 1.0), (0.1, f64::INFINITY)] {
        assert!(matches!(levels((0, flow), (1, level), G), Err(FlowError::Rated { .. })), "{flow} {level}");
    }
    assert!(matches!(levels((0, 0.1), (1, 1.0), 0.0), Err(FlowError::Gravity { .. })));
    assert_eq!(levels((0, 0.0), (1, 1.0), G), Ok(vec![Some(1.0), Some(1.0), None]));
}
