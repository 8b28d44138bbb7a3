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
        }
        for judged in cases.iter().chain([&run["layout"]]) {
            for verdict in judged["verdicts"].as_array().expect("a list of verdicts") {
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
        for judged in run["cases"].as_array().expect("cases").iter().chain([&run["layout"]]) {
            let mut last = 0;
            for verdict in judged["verdicts"].as_array().expect("verdicts") {
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
            .chain([&run["layout"]])
            .flat_map(|judged| judged["verdicts"].as_array().expect("verdicts"))
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
    let case = &run["cases"][0];
    let slope = -2.0 / (9.80665 + 1.0);
    for (pointer, want) in [
        ("/effective_gravity/slope", slope),
        ("/settled/pools/0/offset_m", 0.5 - slope),
        ("/settled/volume_m3", 0.5),
        ("/settled/spilled_m3", 0.0),
        ("/settled/peak_gage_pa", 1000.0 * (9.80665 + 1.0) * (0.5 - slope)),
    ] {
        let got = case.pointer(pointer).and_then(Value::as_f64).unwrap_or_else(|| panic!("{pointer} of {case:#}"));
        assert!((got - want).abs() <= 1e-12 * want.abs().max(1.0), "{pointer}: want {want}, got {got}");
    }
    assert_eq!(run["still"]["level_z_m"].as_f64(), Some(0.5));
}

#[test]
fn loads_and_volumes_add_up_in_the_shipped_scenarios() {
    for file in shipped_scenarios() {
        let (run, _) = json_of(&file);
        adds_up(&run);
    }
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

/// What must add up in the JSON of one file: the loads of edges, plates and side walls to the load on the tank; the
/// volumes of pools, of cells, and what spilled by each mouth, to the liquid that there was.
pub fn adds_up(run: &Value) {
    let list = |value: &Value| value.as_array().unwrap_or_else(|| panic!("no list: {value:#}")).clone();
    let number = |value: &Value| value.as_f64().unwrap_or_else(|| panic!("no number: {value:#}"));
    let sum = |rows: &Value, key: &str| list(rows).iter().map(|row| number(&row[key])).sum::<f64>();
    let near = |what: &str, got: f64, want: f64, size: f64| {
        let allowed = 1e-9 * size;
        assert!((got - want).abs() <= allowed, "{}, {what}: {got}, want {want} +- {allowed}", run["title"]);
    };
    let capacity = number(&run["capacity_m3"]);
    near("capacity of the cells", sum(&run["cells"], "capacity_m3"), capacity, capacity);
    near("still in the cells", sum(&run["cells"], "still_m3"), number(&run["still"]["volume_m3"]), capacity);
    for case in list(&run["cases"]) {
        for state in ["settled", "sealed", "released"].map(|name| &case[name]).into_iter().filter(|s| !s.is_null()) {
            let (volume, spilled) = (number(&state["volume_m3"]), number(&state["spilled_m3"]));
            near("liquid", volume + spilled, number(&run["still"]["volume_m3"]), capacity);
            near("pools", sum(&state["pools"], "volume_m3"), volume, capacity);
            near("spills", sum(&state["spills"], "volume_m3"), spilled, capacity);
            near("cells", list(&state["cells_m3"]).iter().map(number).sum(), volume, capacity);
            for key in ["force_s_n", "force_z_n", "moment_n_m"] {
                let parts = ["edges", "plates"].map(|rows| sum(&state[rows], key));
                let want = number(&state["total"][key]);
                let size = list(&state["edges"]).iter().map(|row| number(&row[key]).abs()).fold(want.abs(), f64::max);
                near(key, parts[0] + parts[1] + number(&state["sides"][key]), want, size);
            }
        }
    }
}
