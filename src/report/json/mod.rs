//! The JSON contract: what `judge --json` prints. README.md lists every key; a test holds the two together.
//!
//! Numbers are SI and unrounded, keys carry the unit; a number that is not finite is `null`. Keys keep their
//! order. A change that breaks a reader raises [`SCHEMA`].

mod bearing;
mod case;
mod head;
mod loads;
mod parts;
mod state;
mod verdict;

use serde::Serialize;

use crate::analysis::Chord;
use crate::geom::Point;
use crate::problem::{Place, Problem, Severity};
use crate::sources::Source;

use super::Report;
use case::Case;
use head::Judged;

/// The number of the contract.
pub const SCHEMA: u32 = 1;

/// What became of one file, ready to be written.
#[derive(Clone, Debug, Serialize)]
pub struct Run {
    schema: u32,
    program: &'static str,
    version: &'static str,
    file: String,
    problems: Vec<Fault>,
    #[serde(flatten)]
    judged: Option<Judged>,
    cases: Vec<Case>,
}

impl Run {
    /// A judged file.
    pub fn judged(report: &Report) -> Run {
        Run {
            judged: Some(Judged::new(report)),
            cases: report.cases().map(|(_, input, result)| Case::new(report, input, result)).collect(),
            ..Run::unusable(report.file, &report.results.warnings)
        }
    }

    /// A file that could not be judged, and why.
    pub fn unusable(file: &str, problems: &[Problem]) -> Run {
        Run {
            schema: SCHEMA,
            program: env!("CARGO_PKG_NAME"),
            version: env!("CARGO_PKG_VERSION"),
            file: file.to_owned(),
            problems: problems.iter().map(Fault::new).collect(),
            judged: None,
            cases: vec![],
        }
    }
}

/// The JSON of one run: an object for one file, an array for several.
pub fn text(runs: &[Run]) -> String {
    let text = match runs {
        [run] => serde_json::to_string_pretty(run),
        runs => serde_json::to_string_pretty(runs),
    };
    text.expect("keys are strings and writing to memory cannot fail") + "\n"
}

/// A finite number without a minus zero, or none.
type Num = Option<f64>;

fn num(value: f64) -> Num {
    value.is_finite().then_some(value + 0.0)
}

fn coordinates(point: Option<Point>) -> (Num, Num) {
    (point.and_then(|p| num(p.x)), point.and_then(|p| num(p.y)))
}

#[derive(Clone, Debug, Serialize)]
struct Fault {
    severity: &'static str,
    place: String,
    line: Option<usize>,
    column: Option<usize>,
    message: String,
    hint: String,
}

impl Fault {
    fn new(problem: &Problem) -> Fault {
        let (line, column) = match problem.place {
            Place::Text { line, column } => (Some(line), Some(column)),
            _ => (None, None),
        };
        Fault {
            severity: match problem.severity {
                Severity::Fault => "fault",
                Severity::Warning => "warning",
            },
            place: problem.place.to_string(),
            line,
            column,
            message: problem.message.clone(),
            hint: problem.hint.clone(),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct Piece {
    left_s_m: Num,
    left_z_m: Num,
    right_s_m: Num,
    right_z_m: Num,
}

impl Piece {
    fn new(chord: &Chord) -> Piece {
        let (left_s_m, left_z_m) = coordinates(Some(chord.left));
        let (right_s_m, right_z_m) = coordinates(Some(chord.right));
        Piece { left_s_m, left_z_m, right_s_m, right_z_m }
    }
}

fn source_key(source: Source) -> String {
    format!("{source:?}")
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeSet;

    use serde_json::Value;

    use super::super::fixture;
    use super::*;
    use crate::analysis;

    fn value() -> Value {
        let (study, results) = (fixture::study(), fixture::results());
        let run = Run::judged(&Report::new("tray.ron", &study, &results));
        serde_json::from_str(&text(&[run])).expect("JSON")
    }

    #[test]
    fn readme_lists_every_key_and_no_other() {
        let readme = include_str!("../../../README.md");
        let (_, rest) = readme.split_once("\n## JSON\n").expect("the heading JSON");
        let (section, _) = rest.split_once("\n## ").expect("a heading after it");
        let rows = section.lines().filter(|line| line.starts_with('|'));
        let listed: BTreeSet<&str> = rows.flat_map(|row| row.split('`').skip(1).step_by(2)).collect();
        let mut keys = BTreeSet::from(["null".to_owned()]);
        gather_keys(&value(), &mut keys);
        // A plate that really bears something has a panel.
        let study = fixture::study();
        let results = analysis::run(&study.validate().expect("a good study"));
        let run = Run::judged(&Report::new("tray.ron", &study, &results));
        gather_keys(&serde_json::to_value(run).expect("JSON"), &mut keys);
        let problem = Run::unusable("bad.ron", &[Problem::fault(Place::Whole, "", "")]);
        gather_keys(&serde_json::to_value(problem).expect("JSON"), &mut keys);
        let printed: BTreeSet<&str> = keys.iter().map(String::as_str).collect();
        let (unlisted, unprinted): (Vec<_>, Vec<_>) =
            (printed.difference(&listed).collect(), listed.difference(&printed).collect());
        assert!(
            unlisted.is_empty() && unprinted.is_empty(),
            "not in README: {unlisted:?}, only there: {unprinted:?}"
        );
    }

    fn gather_keys(value: &Value, keys: &mut BTreeSet<String>) {
        match value {
            Value::Object(map) => map.iter().for_each(|(key, value)| {
                keys.insert(key.clone());
                gather_keys(value, keys);
            }),
            Value::Array(list) => list.iter().for_each(|value| gather_keys(value, keys)),
            _ => {}
        }
    }

    #[test]
    fn a_number_that_is_not_finite_is_null() {
        let value = value();
        let verdict = &value["cases"][0]["verdicts"][0];
        assert_eq!(verdict["utilisation"], Value::Null, "infinite utilisation: {verdict:#}");
        assert_eq!(verdict["working"][0]["result"], Value::Null, "NaN in a working line: {verdict:#}");
        assert_eq!(verdict["limit"], 0.0, "a zero limit stays a number: {verdict:#}");
    }

    #[test]
    fn zero_has_no_minus() {
        let (study, results) = (fixture::study(), fixture::results());
        let text = text(&[Run::judged(&Report::new("tray.ron", &study, &results))]);
        assert!(!text.contains("-0.0,") && !text.contains("-0.0\n"), "{text}");
    }

    #[test]
    fn every_state_of_a_case_is_told() {
        let value = value();
        let [held, dropped] = [&value["cases"][0], &value["cases"][1]];
        for state in ["settled", "sealed", "released"] {
            let keys = |value: &Value| value.as_object().map(|map| map.keys().cloned().collect::<Vec<_>>());
            assert_eq!(held[state]["n_pools"], 2, "{state}");
            assert_eq!(keys(&held[state]), keys(&held["settled"]), "{state} has the keys of settled");
        }
        assert_eq!(held["sealed"]["plates"][0]["net_n"], 230.0);
        assert_eq!(held["settled"]["gas_pockets"][0]["cell"], "cell 1");
        assert_eq!(value["layout"]["verdicts"][0]["criterion"], "Plate coverage");
        assert_eq!(value["layout"]["absent"][0]["criterion"], "Vent path");
        assert_eq!(held["pours"][0]["sill"], "sill");
        assert_eq!(held["trapped"][0]["cell"], "cell 2");
        assert_eq!(held["settled"]["spills"][0]["mouth"], "rim");
        assert_eq!(held["verdicts"][2]["bound"], "sealed");
        assert_eq!(held["verdicts"][0]["bound"], Value::Null);
        assert_eq!(held["verdicts"][0]["note"], "lid is planned");
        assert_eq!(held["verdicts"][1]["unconfirmed_record"], "Tray wall");
        assert_eq!(held["absent"][0]["criterion"], "Roof contact");
        assert_eq!(dropped["settled"], Value::Null);
        assert_eq!((&dropped["sealed"], &dropped["released"]), (&Value::Null, &Value::Null));
        let missing = serde_json::json!([
            { "state": "settled", "reason": "free fall: effective gravity is zero" },
            { "state": "sealed", "reason": "free fall with openings shut, too" },
        ]);
        assert_eq!(dropped["missing"], missing);
        assert_eq!(dropped["verdicts"][0]["state"], "not judged");
        assert_eq!(dropped["verdicts"][0]["unit"], Value::Null);
    }

    #[test]
    fn several_files_make_an_array_and_an_unusable_one_keeps_its_place() {
        let problem = Problem::fault(Place::Text { line: 3, column: 7 }, "unknown field", "take it out");
        let (study, results) = (fixture::study(), fixture::results());
        let good = Run::judged(&Report::new("tray.ron", &study, &results));
        let value: Value = serde_json::from_str(&text(&[Run::unusable("bad.ron", &[problem]), good])).expect("JSON");
        let bad = &value[0];
        assert_eq!(bad["file"], "bad.ron");
        assert_eq!(bad["schema"], SCHEMA);
        assert_eq!(bad["cases"], serde_json::json!([]));
        assert_eq!(bad["problems"][0]["line"], 3);
        assert_eq!(bad["problems"][0]["column"], 7);
        assert_eq!(value[1]["title"], "Rinse tray");
    }
}
