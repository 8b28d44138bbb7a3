//! The command line from outside: exit codes, what is printed where, and that README.md shows what is printed.

use std::process::Stdio;

use brimwright::analysis;
use brimwright::scenario;

use crate::program::*;

/// One load case for each exit status. A still level of 500 mm and a slope of a / g: 1 m/s2 raises the end wall by
/// 102 mm, which 500 mm of freeboard hold; 8 m/s2 asks for 816 mm. In free fall there is no level.
fn files(folder: &Folder) -> [std::path::PathBuf; 4] {
    [
        folder.file("holds.ron", &tray(500.0, &case("slow", 1.0, 0.0))),
        folder.file("fails.ron", &tray(500.0, &case("hard", 8.0, 0.0))),
        folder.file("unusable.ron", "(version: 1, title: \"Tray\", liquid: 3)"),
        folder.file("falls.ron", &tray(500.0, &case("drop", 0.0, -9.80665))),
    ]
}

#[test]
fn the_exit_status_tells_the_outcome() {
    let folder = Folder::new();
    for (status, file) in files(&folder).iter().enumerate() {
        for json in [false, true] {
            let output = judge(json.then_some("--json".as_ref()).into_iter().chain([file.as_os_str()]));
            assert_eq!(output.status.code(), Some(status as i32), "{}, json {json}: {output:?}", file.display());
        }
    }
}

#[test]
fn of_several_files_the_most_serious_status_counts() {
    let folder = Folder::new();
    let files = files(&folder);
    // From the mildest to the most serious.
    let order = [0, 3, 1, 2];
    for (i, milder) in order.iter().enumerate() {
        for worse in &order[i..] {
            for pair in [[milder, worse], [worse, milder]] {
                let output = judge(pair.map(|&i| &files[i]));
                assert_eq!(output.status.code(), Some(*worse as i32), "{pair:?}: {output:?}");
            }
        }
    }
}

#[test]
fn a_fault_goes_to_stderr_with_file_place_and_hint() {
    let folder = Folder::new();
    let [good, _, bad, _] = files(&folder);
    let output = judge([&bad, &good]);
    let start = format!("{}: fault: line 1, column ", bad.display());
    assert!(stderr(&output).starts_with(&start), "want {start} in {}", stderr(&output));
    assert!(stderr(&output).contains("\n  hint: "), "{}", stderr(&output));
    assert!(!stdout(&output).contains("fault"), "{}", stdout(&output));
    assert!(stdout(&output).contains("slow"), "the good file is judged all the same: {}", stdout(&output));
}

#[test]
fn a_file_that_is_not_there_is_unusable_and_says_so() {
    let folder = Folder::new();
    let missing = folder.path("missing.ron");
    let output = judge([&missing]);
    assert_eq!(output.status.code(), Some(2));
    assert_eq!(stdout(&output), "");
    let start = format!("{}: fault: file: ", missing.display());
    assert!(stderr(&output).starts_with(&start), "{}", stderr(&output));
    assert!(stderr(&output).contains("\n  hint: "), "{}", stderr(&output));
}

#[test]
fn a_scenario_with_a_fault_of_geometry_is_unusable_with_its_place() {
    let folder = Folder::new();
    let bow_tie = tray(500.0, "").replace("(s_mm: 0, z_mm: 0,", "(s_mm: 0, z_mm: 2000,");
    let output = judge([folder.file("bow.ron", &bow_tie)]);
    assert_eq!(output.status.code(), Some(2), "{output:?}");
    assert!(stderr(&output).contains("fault: edge"), "{}", stderr(&output));
}

#[test]
fn one_load_case_can_be_chosen_by_name() {
    let folder = Folder::new();
    let file = folder.file("two.ron", &tray(500.0, &(case("slow", 1.0, 0.0) + &case("hard", 8.0, 0.0))));
    for (name, status) in [("slow", 0), ("hard", 1), ("gone", 2)] {
        let output = judge([file.as_os_str(), "--case".as_ref(), name.as_ref()]);
        assert_eq!(output.status.code(), Some(status), "{name}: {output:?}");
    }
    let output = judge([file.as_os_str(), "--case".as_ref(), "hard".as_ref()]);
    assert!(stdout(&output).contains("\n2  hard\n"), "the case keeps its number: {}", stdout(&output));
    assert!(!stdout(&output).contains("slow"), "{}", stdout(&output));
    let output = judge([file.as_os_str(), "--case".as_ref(), "gone".as_ref()]);
    assert!(stderr(&output).contains("slow, hard"), "the names are told: {}", stderr(&output));
}

#[test]
fn units_change_the_text_and_not_the_json() {
    let folder = Folder::new();
    let [good, ..] = files(&folder);
    // 2 m x 0.5 m x 0.5 m = 0.5 m3 = 132.1 gal of 231 cubic inches.
    for (units, want) in [("si", "0.5000 m³"), ("us", "132.1 gal")] {
        let output = judge([good.as_os_str(), "--units".as_ref(), units.as_ref()]);
        assert!(stdout(&output).contains(want), "want {want} in {}", stdout(&output));
    }
    let json = |units: &str| judge([good.as_os_str(), "--json".as_ref(), "--units".as_ref(), units.as_ref()]).stdout;
    assert_eq!(json("si"), json("us"));
}

#[test]
fn text_keeps_within_80_columns_and_judges_the_shipped_scenarios() {
    for file in shipped_scenarios() {
        let output = judge([&file]);
        assert_ne!(output.status.code(), Some(2), "{}: {}", file.display(), stderr(&output));
        for line in stdout(&output).lines() {
            let n = line.chars().count();
            assert!(n <= 80, "{}: {n} columns: {line}", file.display());
            assert!(!line.ends_with(' ') && !line.contains("NaN"), "{}: {line}", file.display());
        }
    }
}

#[test]
fn the_same_file_gives_the_same_bytes() {
    for file in shipped_scenarios() {
        let run = || judge([file.as_os_str(), "--json".as_ref()]).stdout;
        assert_eq!(run(), run(), "{}", file.display());
    }
}

#[test]
fn a_closed_pipe_is_no_fault() {
    let folder = Folder::new();
    let [good, ..] = files(&folder);
    let (reader, writer) = std::io::pipe().expect("a pipe");
    drop(reader);
    let output = program().arg("judge").arg(&good).stdout(writer).stderr(Stdio::piped()).output().expect("it runs");
    assert_eq!((output.status.code(), stderr(&output)), (Some(0), ""));
}

#[test]
fn a_wrong_command_line_is_unusable_and_help_is_not() {
    for (arguments, status) in [
        (&["judge"][..], 2),
        (&["judge", "--units", "furlong", "x.ron"], 2),
        (&["--help"], 0),
        (&["judge", "--help"], 0),
        (&["--version"], 0),
    ] {
        let output = program().args(arguments).output().expect("it runs");
        assert_eq!(output.status.code(), Some(status), "{arguments:?}: {output:?}");
    }
}

#[cfg(not(feature = "gui"))]
#[test]
fn without_the_window_opening_it_says_so() {
    let output = program().output().expect("it runs");
    assert_eq!(output.status.code(), Some(2));
    assert!(stderr(&output).contains("without its window"), "{}", stderr(&output));
}

#[test]
fn the_samples_in_readme_are_what_is_printed() {
    let command = "$ brimwright judge ";
    let samples = blocks_of_readme("text", command);
    assert_eq!(samples.len(), 2, "{samples:?}");
    for sample in samples {
        let (first, want) = sample.split_once('\n').expect("a command line");
        // Every second part stands between quotation marks.
        let parts = first.trim_start_matches(command).split('"').enumerate();
        let arguments = parts.flat_map(|(i, p)| if i % 2 == 1 { vec![p] } else { p.split_whitespace().collect() });
        let output = judge(arguments);
        assert!(stdout(&output) == want, "README shows\n{want}\nprinted is\n{}", stdout(&output));
    }
}

#[test]
fn the_scenario_in_readme_is_judged() {
    let [text] = blocks_of_readme("ron", "(")[..] else { panic!("one scenario") };
    let study = scenario::parse(text.as_bytes()).unwrap_or_else(|p| panic!("{p:?} in\n{text}"));
    let study = study.validate().unwrap_or_else(|p| panic!("{p:?} in\n{text}"));
    let results = analysis::run(&study);
    assert!(results.cases.iter().all(|case| case.settled.is_ok()), "{results:#?}");
}

/// The blocks of README.md in a language that start with `start`.
fn blocks_of_readme(language: &str, start: &str) -> Vec<&'static str> {
    let readme = include_str!("../../README.md");
    let fence = format!("```{language}\n");
    let blocks = readme.split(&fence).skip(1).map(|rest| rest.split("```").next().expect("its text"));
    blocks.filter(|block| block.starts_with(start)).collect()
}
