//! `brimwright judge`: files in, verdicts out, and an exit code that a script can gate on.

use std::path::Path;
use std::process::ExitCode;

use crate::analysis::{self, Results};
use crate::app::{self, FileError};
use crate::problem::{Place, Problem};
use crate::report::{Counts, Report, json, table};
use crate::study::ValidStudy;

use super::{JudgeArguments, complain, print};

/// Judges the files, prints, and says how it went.
pub(super) fn judge(arguments: &JudgeArguments) -> ExitCode {
    let mut outcome = Outcome::Held;
    let mut runs = vec![];
    let mut tables = vec![];
    let mut counts = vec![];
    for path in &arguments.files {
        let file = path.display().to_string();
        match judged(path, arguments.case.as_deref()) {
            Ok(Judged { study, results, case_idxs }) => {
                let has_layout = arguments.case.is_none();
                let report = Report { file: &file, study: study.study(), results: &results, case_idxs, has_layout };
                outcome = outcome.max(Outcome::of(report.counts()));
                counts.push(report.counts());
                if arguments.json {
                    runs.push(json::Run::judged(&report));
                } else {
                    tables.push(table::text(&report, arguments.units.into()));
                }
            }
            Err(problems) => {
                outcome = Outcome::Unusable;
                complain(&table::problems(&file, &problems));
                runs.push(json::Run::unusable(&file, &problems));
            }
        }
    }
    if !arguments.json && !tables.is_empty() {
        tables.push(table::summary(&counts));
    }
    let text = if arguments.json { json::text(&runs) } else { tables.join("\n") };
    match print(&text) {
        Ok(()) => outcome.exit_code(),
        Err(error) => {
            complain(&format!("The verdicts cannot be written: {error}\n"));
            Outcome::Unusable.exit_code()
        }
    }
}

/// How a run went, the most serious last.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Outcome {
    Held,
    NotJudged,
    Failed,
    Unusable,
}

impl Outcome {
    /// Where no verdict was asked for, nothing was judged.
    fn of(counts: Counts) -> Outcome {
        if counts.fails > 0 {
            Outcome::Failed
        } else if counts.not_judged > 0 || counts.close + counts.holds == 0 {
            Outcome::NotJudged
        } else {
            Outcome::Held
        }
    }

    fn exit_code(self) -> ExitCode {
        ExitCode::from(match self {
            Outcome::Held => 0,
            Outcome::Failed => 1,
            Outcome::Unusable => 2,
            Outcome::NotJudged => 3,
        })
    }
}

struct Judged {
    study: ValidStudy,
    results: Results,
    case_idxs: Vec<usize>,
}

/// Reads and judges a file; every load case is judged, `case` only chooses which are shown.
fn judged(path: &Path, case: Option<&str>) -> Result<Judged, Vec<Problem>> {
    let study = app::load(path).map_err(FileError::into_problems)?.validate()?;
    let names: Vec<&str> = study.study().cases.iter().map(|c| c.name.as_str()).collect();
    let case_idxs: Vec<usize> = (0..names.len()).filter(|&i| case.is_none_or(|case| case == names[i])).collect();
    if let Some(case) = case.filter(|_| case_idxs.is_empty()) {
        let hint = format!("Its load cases are: {}", names.join(", "));
        return Err(vec![Problem::fault(Place::Field("load cases"), format!("none is called {case}"), hint)]);
    }
    let results = analysis::run(&study);
    Ok(Judged { study, results, case_idxs })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_most_serious_outcome_counts() {
        let none = Counts { n_cases: 1, fails: 0, not_judged: 0, close: 0, holds: 0 };
        for (counts, want) in [
            (Counts { holds: 3, ..none }, Outcome::Held),
            (Counts { holds: 3, close: 1, ..none }, Outcome::Held),
            (Counts { holds: 3, not_judged: 1, ..none }, Outcome::NotJudged),
            (Counts { fails: 1, not_judged: 1, ..none }, Outcome::Failed),
            (none, Outcome::NotJudged),
        ] {
            assert_eq!(Outcome::of(counts), want, "{counts:?}");
        }
        assert!(Outcome::Unusable > Outcome::Failed && Outcome::Failed > Outcome::NotJudged);
    }
}
