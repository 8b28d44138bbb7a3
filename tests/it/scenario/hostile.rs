//! Text that comes from anywhere: bounded, and never a panic.

use brimwright::problem::Place;
use brimwright::scenario::{self, parse};
use proptest::prelude::*;

use super::{GOOD, good, listed};
use crate::arbitrary;

#[test]
fn sizes_are_bounded() {
    let spaces = vec![b' '; scenario::MAX_FILE_BYTES + 1];
    assert!(parse(&spaces).unwrap_err()[0].message.contains("larger than 4 MiB"));

    let edges = |n: usize| GOOD.replacen("outline: [", &format!("outline: [{}", "(s_mm: 0, z_mm: 0),".repeat(n)), 1);
    let n_before = good().section.outline.len();
    assert!(parse(edges(scenario::MAX_OUTLINE_EDGES - n_before).as_bytes()).is_ok());
    let problems = parse(edges(scenario::MAX_OUTLINE_EDGES).as_bytes()).unwrap_err();
    assert!(problems[0].message.contains("more than 2000 items"), "{}", listed(&problems));

    for (list, item, limit, n_before) in [
        ("plates: [", "(points: [], thickness_mm: 1),", scenario::MAX_PLATES, 2),
        ("points: [(s_mm: 400", "(s_mm: 0, z_mm: 0),", scenario::MAX_PLATE_POINTS, 3),
        ("openings: [", "(from_mm: 0, to_mm: 1, shape: holes(n: 1)),", scenario::MAX_OPENINGS, 4),
        ("compartments: [", "(name: \"c\", s_mm: 0, z_mm: 0, fill: level_mm(0)),", scenario::MAX_COMPARTMENTS, 2),
        (
            "materials: [",
            "(name: \"m\", yield_mpa: 1, modulus_gpa: 1, poisson: 0, density_kg_per_m3: 1, factor: 1),",
            scenario::MAX_MATERIALS,
            1,
        ),
    ] {
        let (at, _) = GOOD.match_indices(list).next().expect("the list is in the good text");
        let at = at + list.find('[').expect("a list") + 1;
        let with = |n: usize| format!("{}{}{}", &GOOD[..at], item.repeat(n), &GOOD[at..]);
        assert!(parse(with(limit - n_before).as_bytes()).is_ok(), "{limit} items of {list}");
        let problems = parse(with(limit - n_before + 1).as_bytes()).expect_err(list);
        assert!(problems[0].message.contains(&format!("more than {limit} items")), "{}", listed(&problems));
    }

    let cases = "(name: \"c\", accel: components_g(s: 0, z: 0)),".repeat(scenario::MAX_CASES);
    let problems = parse(GOOD.replacen("cases: [", &format!("cases: [{cases}"), 1).as_bytes()).unwrap_err();
    assert!(problems[0].hint.contains("the limit here is 200"), "{}", listed(&problems));
}

#[test]
fn deep_nesting_ends_in_a_fault() {
    for (open, close) in [("(", ")"), ("[", "]"), ("Some(", ")"), ("/*", "*/"), ("table([", "])"), ("{", "}")] {
        for n in [20, 200, 50_000] {
            for key in ["title: ", "vapour_pressure_abs_kpa: ", "outline: ", "width: ", ""] {
                let nested = format!("{key}{}{}", open.repeat(n), close.repeat(n));
                for text in
                    [format!("(version: 1, {nested}"), GOOD.replacen("author: ", &format!("{nested}author: "), 1)]
                {
                    let is_comment = open == "/*";
                    assert!(parse(text.as_bytes()).is_err() || is_comment, "{open} {n} after {key:?}");
                }
            }
        }
    }
}

#[test]
fn the_readers_switches_stay_off() {
    for head in ["#![enable(unwrap_newtypes)]", "#![enable(implicit_some)]", "#![type = \"x\"]"] {
        let problems = parse(format!("{head}{GOOD}").as_bytes()).expect_err(head);
        assert!(problems[0].message.contains("begin like a scenario"), "{}", listed(&problems));
    }
}

/// Bytes thrown at the reader must give a study or faults with places, and never a panic.
fn survives(bytes: &[u8]) {
    if let Err(problems) = parse(bytes) {
        assert!(!problems.is_empty());
        for problem in &problems {
            assert!(matches!(problem.place, Place::Text { .. }) && !problem.message.is_empty(), "{problem}");
        }
    }
}

#[test]
fn every_byte_changed_or_taken_out_is_survived() {
    let good = GOOD.as_bytes();
    for at in 0..good.len() {
        let mut without = good.to_vec();
        without.remove(at);
        survives(&without);
        // Two of the six at each place, in turn: all six would take most of the suite's time.
        for i in [at, at + 3] {
            let mut changed = good.to_vec();
            changed[at] = [0, b'(', b'"', b'9', b'\\', 0xff][i % 6];
            survives(&changed);
        }
    }
}

proptest! {
    #![proptest_config(arbitrary::config())]

    #[test]
    fn any_bytes_are_survived(bytes in proptest::collection::vec(any::<u8>(), 0..200)) {
        survives(&bytes);
        let mut after_head = b"(version: 1,".to_vec();
        after_head.extend(bytes);
        survives(&after_head);
    }

    #[test]
    fn any_mutation_is_survived(
        changes in proptest::collection::vec((any::<prop::sample::Index>(), any::<prop::sample::Index>(), 0..60_usize), 1..6),
    ) {
        // Pieces of the text are copied over other pieces: brackets and keys in the wrong places.
        let mut bytes = GOOD.as_bytes().to_vec();
        for (from, to, n) in changes {
            let (from, to) = (from.index(bytes.len()), to.index(bytes.len()));
            let piece = bytes[from..(from + n).min(bytes.len())].to_vec();
            bytes.splice(to..(to + n / 2).min(bytes.len()), piece);
        }
        survives(&bytes);
    }
}
