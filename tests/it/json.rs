//! The JSON contract on the scenarios that come with the program.

use serde_json::Value;

use crate::program::*;

fn json_of(file: &std::path::Path) -> (Value, i32) {
    let output = judge([file.as_os_str(), "--json".as_ref()]);
    let value = serde_json::from_slice(&output.stdout).unwrap_or_else(|e| panic!("{}: {e}", file.display()));
    (value, output.status.code().expect("an exit status"))
}

#[test]
fn every_case_and_verdict_has_what_the_contract_says() {
    for file in shipped_scenarios() {
        let (run, _) = json_of(&file);
        assert_eq!(run["schema"], 1, "{}", file.display());
        let cases = run["cases"].as_array().expect("a list of cases");
        assert!(!cases.is_empty(), "{}", file.display());
        for case in cases {
            assert!(case["name"].is_string() && case.get("settled").is_some(), "{case:#}");
            for verdict in case["verdicts"].as_array().expect("a list of verdicts") {
                for key in ["criterion", "state", "place", "source"] {
                    assert!(verdict[key].as_str().is_some_and(|s| !s.is_empty()), "{key}: {verdict:#}");
                }
                for key in ["demand", "limit", "utilisation"] {
                    assert!(verdict.get(key).is_some_and(|v| v.is_number() || v.is_null()), "{key}: {verdict:#}");
                }
                assert!(verdict.get("unit").is_some(), "{verdict:#}");
                assert_eq!(verdict["trust"].as_array().map(Vec::len), Some(5), "{verdict:#}");
            }
        }
    }
}

#[test]
fn states_follow_utilisation_and_come_worst_first() {
    for file in shipped_scenarios() {
        let (run, _) = json_of(&file);
        for case in run["cases"].as_array().expect("cases") {
            let mut last = 0;
            for verdict in case["verdicts"].as_array().expect("verdicts") {
                let state = verdict["state"].as_str().expect("a state");
                let rank = ["fails", "not judged", "close", "holds"].iter().position(|s| *s == state);
                let rank = rank.unwrap_or_else(|| panic!("{state} is no state"));
                assert!(rank >= last, "{}: {verdict:#} comes after a milder one", file.display());
                last = rank;
                if let Some(used) = verdict["utilisation"].as_f64() {
                    let want = if used > 1.0 {
                        "fails"
                    } else if used > 0.9 {
                        "close"
                    } else {
                        "holds"
                    };
                    assert!(state == want || state == "not judged", "{used}: {verdict:#}");
                }
            }
        }
    }
}

#[test]
fn counts_and_exit_status_agree_with_the_verdicts() {
    for file in shipped_scenarios() {
        let (run, status) = json_of(&file);
        let states: Vec<&str> = run["cases"]
            .as_array()
            .expect("cases")
            .iter()
            .flat_map(|case| case["verdicts"].as_array().expect("verdicts"))
            .map(|verdict| verdict["state"].as_str().expect("a state"))
            .collect();
        for (key, word) in [("fails", "fails"), ("not_judged", "not judged"), ("close", "close"), ("holds", "holds")]
        {
            let n = states.iter().filter(|s| **s == word).count();
            assert_eq!(run["counts"][key], n, "{}: {key}", file.display());
        }
        let want = if states.contains(&"fails") {
            1
        } else if states.contains(&"not judged") {
            3
        } else {
            0
        };
        assert_eq!(status, want, "{}", file.display());
    }
}

#[test]
fn a_textbook_tilt_comes_out_in_the_documented_keys() {
    // Source: rigid-body acceleration in any fluid mechanics text: slope = -a_s / (g + a_z), about the middle of a
    // box that neither spills nor runs dry; pressure at the low end rho (g + a_z) depth.
    let folder = Folder::new();
    let (run, status) = json_of(&folder.file("tray.ron", &tray(500.0, &case("slow", 2.0, 1.0))));
    assert_eq!(status, 0, "{run:#}");
    let settled = &run["cases"][0]["settled"];
    let slope = -2.0 / (9.80665 + 1.0);
    for (key, want) in [
        ("slope", slope),
        ("offset_m", 0.5 - slope),
        ("volume_m3", 0.5),
        ("spilled_m3", 0.0),
        ("peak_gage_pa", 1000.0 * (9.80665 + 1.0) * (0.5 - slope)),
    ] {
        let got = settled[key].as_f64().unwrap_or_else(|| panic!("{key} of {settled:#}"));
        assert!((got - want).abs() <= 1e-12 * want.abs().max(1.0), "{key}: want {want}, got {got}");
    }
    assert_eq!(run["still"]["level_z_m"].as_f64(), Some(0.5));
}

#[test]
fn several_files_make_an_array_in_the_order_given() {
    let folder = Folder::new();
    let good = folder.file("good.ron", &tray(500.0, &case("slow", 1.0, 0.0)));
    let bad = folder.file("bad.ron", "(version: 1,\n  nonsense: 3)");
    let output = judge([bad.as_os_str(), good.as_os_str(), "--json".as_ref()]);
    let runs: Value = serde_json::from_slice(&output.stdout).expect("JSON");
    assert_eq!(runs.as_array().map(Vec::len), Some(2), "{runs:#}");
    assert_eq!(runs[0]["file"], bad.display().to_string());
    assert_eq!(runs[0]["cases"], serde_json::json!([]));
    assert_eq!(runs[0]["problems"][0]["severity"], "fault");
    assert_eq!(runs[0]["problems"][0]["line"], 2, "{runs:#}");
    assert!(runs[0]["problems"][0]["hint"].is_string());
    assert_eq!(runs[1]["cases"][0]["name"], "slow");
}
