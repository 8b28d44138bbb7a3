//! Whatever plates come, sound or not: faults, or a judgement.

use std::cell::Cell;

use brimwright::analysis;
use brimwright::geom::{Edge, Point, Vec2};
use brimwright::problem::{Place, Severity};
use brimwright::section::{Opening, OpeningShape};
use brimwright::statics::Bound;
use brimwright::study::{Fill, Study};
use proptest::collection::vec;
use proptest::prelude::*;

use crate::support::plated::plate;
use crate::support::random::{config, share, star};
use crate::support::states::Tank;
use crate::support::{GRAVITY, held, study};

/// A corner of a random plate.
#[derive(Clone, Copy, Debug)]
enum Corner {
    /// Anywhere about the section.
    Anywhere(f64, f64),
    /// Where an edge starts.
    Vertex(usize),
    /// On an edge of the outline or of an obstacle, typed to so many decimals.
    OnWall(usize, f64, u8),
    /// A corner of the plate before.
    OfBefore(usize),
    /// On a segment of the plate before.
    OnBefore(usize, f64),
}

fn corner() -> impl Strategy<Value = Corner> {
    prop_oneof![
        3 => (-0.45..0.45, -0.45..0.45).prop_map(|(s, z)| Corner::Anywhere(s, z)),
        1 => (0..99_usize).prop_map(Corner::Vertex),
        3 => (0..99_usize, 0.0..1.0, 3..16_u8).prop_map(|(i, t, digits)| Corner::OnWall(i, t, digits)),
        1 => (0..9_usize).prop_map(Corner::OfBefore),
        1 => (0..9_usize, 0.0..1.0).prop_map(|(i, t)| Corner::OnBefore(i, t)),
    ]
}

fn opening() -> impl Strategy<Value = ((f64, f64), OpeningShape)> {
    let shape = prop_oneof![
        3 => (0.01..1.0).prop_map(OpeningShape::Share),
        1 => (0..3_u32).prop_map(|n| OpeningShape::Holes { n }),
        1 => Just(OpeningShape::Perforated { diameter_m: 0.05, pitch_m: 0.06, is_staggered: true }),
    ];
    // (from, to) as shares of the plate's length.
    let span = prop_oneof![
        4 => (0.0..0.5, 0.5..1.0),
        1 => Just((0.0, 1.0)),
        1 => (-0.1..1.1, -0.1..1.1),
    ];
    (span, shape)
}

/// Whatever plates come: faults, or results without a NaN in which no liquid is lost.
#[test]
fn any_plates_give_faults_or_a_judgement() {
    let drawn = vec((vec(corner(), 2..4), vec(opening(), 0..2)), 1..5);
    let accel = (-20.0..20.0, -25.0..15.0);
    let (n_sound, n_sections) = (Cell::new(0), Cell::new(0));
    proptest!(config(15, 91), |(sample in star(5..=9, true), drawn in drawn, share in share(), (a_s, a_z) in accel)| {
        let walls = sample.edges();
        let size = sample.outline.iter().map(|e| (e.start - sample.center).norm()).fold(0.0, f64::max);
        let mut section = sample.section(&[0], 1.0);
        let mut before = vec![sample.center, walls[0].start];
        for (corners, openings) in drawn {
            let n = before.len();
            let at = |corner: &Corner| match *corner {
                Corner::Anywhere(s, z) => sample.center + Vec2::new(s, z) * size,
                Corner::Vertex(i) => walls[i % walls.len()].start,
                Corner::OnWall(i, t, digits) => {
                    let unit = size * 10.0_f64.powi(-i32::from(digits));
                    walls[i % walls.len()].point_at(t).map(|x| (x / unit).round() * unit)
                }
                Corner::OfBefore(i) => before[i % n],
                Corner::OnBefore(i, t) => Edge::line(before[i % (n - 1)], before[i % (n - 1) + 1]).point_at(t),
            };
            let points: Vec<Point> = corners.iter().map(at).collect();
            let mut plate = plate(&points);
            let length_m = plate.length_m();
            plate.openings = openings
                .iter()
                .map(|&((from, to), shape)| Opening {
                    name: String::new(),
                    from_m: from * length_m,
                    to_m: to * length_m,
                    shape,
                })
                .collect();
            section.plates.push(plate);
            if points.len() > 1 {
                before = points;
            }
        }
        let mut study = Study { cases: vec![held(a_s, a_z)], ..study(section, Fill::Share(share)) };
        // What is bad is thrown out, until the rest is sound.
        let valid = loop {
            let faults = match study.validate() {
                Ok(valid) => break valid,
                Err(problems) => problems.into_iter().filter(|p| p.severity == Severity::Fault),
            };
            let mut bad = vec![];
            for p in faults {
                prop_assert!(!p.message.is_empty() && !p.hint.is_empty(), "{}", p);
                let Place::Plate { plate_idx, .. } = p.place else { panic!("{p}") };
                bad.push(plate_idx);
            }
            let plates = std::mem::take(&mut study.section.plates).into_iter().enumerate();
            study.section.plates = plates.filter(|(i, _)| !bad.contains(i)).map(|(_, plate)| plate).collect();
        };
        n_sound.set(n_sound.get() + study.section.plates.len());
        let tank = Tank::new(study.section.clone(), share);
        for bound in [Bound::Settled, Bound::Sealed] {
            let Some(state) = tank.state(bound, Vec2::new(-a_s, -GRAVITY - a_z)) else {
                return Err(TestCaseError::fail(format!("lost under the {} bound", bound.word())));
            };
            let settled = state.settled;
            prop_assert!(!format!("{settled:?}").contains("NaN"), "{:?}", settled);
            let off = (settled.volume_m3 + settled.spilled_m3 - tank.liquid_m3()).abs();
            prop_assert!(off <= 1e-10 * tank.capacity_m3(), "{}: off by {off:e} m3", bound.word());
            let off = (settled.cells_m3.iter().sum::<f64>() - settled.volume_m3).abs();
            prop_assert!(off <= 1e-9 * tank.capacity_m3(), "{}: cells off by {off:e} m3", bound.word());
        }
        // A judgement takes long: some of them.
        n_sections.set(n_sections.get() + 1);
        if n_sections.get() % 4 == 0 {
            let words = format!("{:?}", analysis::run(&valid));
            prop_assert!(!words.contains("NaN"), "{}", words);
        }
    });
    assert!(n_sound.get() >= 5, "only {n_sound:?} plates were sound");
}
