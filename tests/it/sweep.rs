//! `brimwright sweep` from outside: exit codes, and tables that agree with the library.

use std::fs;
use std::process::Output;

use brimwright::analysis::{self, N_ACCELS, N_DIRECTIONS, N_FILLS};
use brimwright::app::load;
use brimwright::progress::Progress;

use crate::program::*;

fn sweep(arguments: &[&str]) -> Output {
    program().arg("sweep").args(arguments).output().expect("the program runs")
}

/// Header and fields of a table without quotes.
fn table(text: &str) -> (Vec<&str>, Vec<Vec<&str>>) {
    let mut lines = text.lines().map(|line| line.split(',').collect::<Vec<&str>>());
    (lines.next().expect("a header"), lines.collect())
}

/// A tray half full: a / g = 1/2 brings the surface to its rim.
fn half_full(folder: &Folder) -> String {
    let cases = [case("slow", 1.0, 0.0), case("lift", 0.0, 2.0), case("rest", 0.0, 0.0)].concat();
    folder.file("tray.ron", &tray(500.0, &cases)).display().to_string()
}

#[test]
fn a_fill_map_has_a_line_for_every_fill_and_acceleration_of_every_case_that_moves() {
    let folder = Folder::new();
    let output = sweep(&[&half_full(&folder)]);
    assert_eq!(output.status.code(), Some(0), "{}", stderr(&output));
    let (header, lines) = table(stdout(&output));
    assert_eq!(lines.len(), 2 * N_FILLS * N_ACCELS, "two cases of three have an acceleration");
    let column =
        |name: &str| header.iter().position(|h| *h == name).unwrap_or_else(|| panic!("no {name}: {header:?}"));
    let (share, accel, used) = (column("fill_share"), column("accel_m_per_s2"), column("utilisation"));
    // Half full and far from the limits of anything else, what is used is a / (g / 2).
    let at = |line: &&Vec<&str>| line[column("case")] == "slow" && line[share] == "0.5";
    for line in lines.iter().filter(at) {
        let [a, used] = [accel, used].map(|c| line[c].parse::<f64>().unwrap_or_else(|e| panic!("{e}: {line:?}")));
        let want = a / (0.5 * 9.80665);
        assert!((used - want).abs() < 1e-9, "at {a} m/s2: got {used}, expected {want}");
        assert_eq!(line[column("state")], "holds", "{line:?}");
    }
}

#[test]
fn an_envelope_is_what_the_library_gives() {
    let folder = Folder::new();
    let file = half_full(&folder);
    let to = folder.path("envelope.csv").display().to_string();
    let output = sweep(&[&file, "--what", "envelope", "--output", &to]);
    assert_eq!(output.status.code(), Some(0), "{}", stderr(&output));
    assert!(stdout(&output).is_empty(), "the table goes to the file");
    let text = fs::read_to_string(&to).unwrap();
    let (header, lines) = table(&text);
    let study = load(file.as_ref()).unwrap().validate().unwrap();
    let attitude = study.study().cases[0].attitude;
    let want = analysis::envelope(&study, attitude, N_DIRECTIONS, &Progress::default(), &|_| {}).unwrap();
    assert_eq!(lines.len(), want.limits.len(), "all cases stand alike: one envelope");
    let accel = header.iter().position(|h| *h == "accel_m_per_s2").unwrap();
    for (line, limit) in lines.iter().zip(&want.limits) {
        assert_eq!(line[accel], limit.accel_m_per_s2.to_string(), "{line:?}");
    }
}

#[test]
fn what_cannot_be_swept_is_said_with_status_2() {
    let folder = Folder::new();
    let file = half_full(&folder);
    let bad = folder.file("bad.ron", "(version: 1, nonsense: 2)").display().to_string();
    let nowhere = folder.path("no folder").join("out.csv").display().to_string();
    for (arguments, word) in [
        (vec![file.as_str(), "--case", "rest"], "no acceleration to make larger"),
        (vec![file.as_str(), "--case", "fast"], "Its load cases are: slow, lift, rest"),
        (vec![bad.as_str()], "nonsense"),
        (vec!["nothing.ron"], "no such file"),
        (vec![file.as_str(), "--what", "envelope", "-o", nowhere.as_str()], "no such folder"),
        (vec![file.as_str(), "--what", "margins"], "invalid value"),
    ] {
        let output = sweep(&arguments);
        assert_eq!(output.status.code(), Some(2), "{arguments:?}: {output:?}");
        assert!(stdout(&output).is_empty(), "{arguments:?}");
        assert!(stderr(&output).contains(word), "{arguments:?}: no `{word}` in\n{}", stderr(&output));
    }
}

#[test]
fn readme_names_every_column() {
    let readme = include_str!("../../README.md");
    let folder = Folder::new();
    let file = half_full(&folder);
    for what in ["fill-map", "envelope"] {
        let output = sweep(&[&file, "--case", "slow", "--what", what]);
        let (header, _) = table(stdout(&output));
        for column in header {
            assert!(readme.contains(&format!("`{column}`")), "README.md does not say what {column} of {what} is");
        }
    }
}
