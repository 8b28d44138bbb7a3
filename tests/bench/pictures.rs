//! The hold envelope and the fill map: whole pictures, on all cores.

use std::hint::black_box;

use brimwright::analysis::{self, N_ACCELS, N_DIRECTIONS, N_FILLS};
use brimwright::app::EXAMPLES;
use brimwright::progress::Progress;
use brimwright::scenario;
use brimwright::study::{Fill, Limit, Study, ValidStudy};

use crate::pools::{Floor, tank};
use crate::support::limited::record;
use crate::support::{held, study};
use crate::timing::median_s;

/// Pictures of the examples, and of a section of 60 edges with 8 plates.
pub fn pictures() {
    println!(
        "  an envelope of {N_DIRECTIONS} directions, a fill map of {N_FILLS} by {N_ACCELS} points; aims 0.5 s and 1 s"
    );
    for example in EXAMPLES {
        match scenario::parse(example.text.as_bytes()).and_then(|study| study.validate()) {
            Ok(valid) => print_pictures(example.file_name, &valid),
            Err(problems) => println!("  {}: not judged: {}", example.file_name, problems[0]),
        }
    }
    for (floor, name) in [(Floor::Hollow, "hollow floor"), (Floor::Wavy, "wavy floor")] {
        let mut large = Study { cases: vec![held(3.0, 0.0)], ..study(tank(floor, 60, 8), Fill::Share(0.45)) };
        large.records = vec![record(Limit::WallPressure(40e3)), record(Limit::RoofPressure(10e3))];
        match large.validate() {
            Ok(valid) => print_pictures(&format!("60 edges, 8 plates, {name}"), &valid),
            Err(problems) => println!("  {name}: not judged: {}", problems[0]),
        }
    }
}

fn print_pictures(name: &str, study: &ValidStudy) {
    let progress = Progress::default();
    let cases = &study.study().cases;
    let attitude = cases[0].attitude;
    let envelope = median_s(|| {
        black_box(analysis::envelope(study, attitude, N_DIRECTIONS, &progress, &|_| {}));
    });
    let moves = (0..cases.len()).find(|&i| cases[i].accel.to_m_per_s2(1.0).norm() > 0.0);
    let word = |seconds: f64, aim: f64| if seconds <= aim { "reached" } else { "missed" };
    print!("  {name:<36} envelope {:>8.1} ms   {}", 1e3 * envelope, word(envelope, 0.5));
    match moves {
        Some(case_idx) => {
            let map = median_s(|| {
                _ = black_box(analysis::fill_map(study, case_idx, N_FILLS, N_ACCELS, &progress, &|_| {}));
            });
            println!("   fill map {:>8.1} ms   {}", 1e3 * map, word(map, 1.0));
        }
        None => println!(),
    }
}
