//! What the JSON says of a verdict.

use serde::Serialize;

use crate::analysis::{Absent, Bound, CaseResult, Reach, Verdict};
use crate::study::VerdictNote;
use crate::units::UnitSystem;

use super::super::Report;
use super::{Num, coordinates, num, source_key};

#[derive(Clone, Debug, Serialize)]
pub(super) struct VerdictRow {
    criterion: &'static str,
    state: &'static str,
    demand: Num,
    sense: &'static str,
    limit: Num,
    unit: Option<&'static str>,
    utilisation: Num,
    bound: Option<&'static str>,
    place: String,
    at_s_m: Num,
    at_z_m: Num,
    source: &'static str,
    source_key: String,
    trust: Vec<TrustRow>,
    remark: String,
    working: Vec<Working>,
    mend: Vec<String>,
    unconfirmed_record: Option<String>,
    note: Option<String>,
}

impl VerdictRow {
    /// `case` is the load case that it is of, none for the layout.
    pub(super) fn new(report: &Report, case: Option<&CaseResult>, verdict: &Verdict) -> VerdictRow {
        let study = report.study;
        let (at_s_m, at_z_m) = coordinates(verdict.at);
        let record = verdict.unconfirmed_record.and_then(|idx| study.records.get(idx));
        let is_own =
            |n: &&VerdictNote| case.is_some_and(|case| n.case == case.name) && n.criterion == verdict.criterion;
        let note = study.verdict_notes.iter().find(is_own);
        VerdictRow {
            criterion: verdict.criterion,
            state: verdict.state.word(),
            demand: verdict.demand.and_then(|m| num(m.si)),
            sense: verdict.sense.words(),
            limit: verdict.limit.and_then(|m| num(m.si)),
            unit: verdict.demand.or(verdict.limit).map(|m| m.quantity.si_symbol()),
            utilisation: verdict.utilisation.and_then(num),
            bound: verdict.bound.map(Bound::word),
            place: verdict.place_words.clone(),
            at_s_m,
            at_z_m,
            source: &verdict.source.entry().short,
            source_key: source_key(verdict.source),
            trust: verdict
                .trust
                .iter()
                .map(|t| TrustRow { name: t.name, reach: reach_word(t.reach), words: t.words.clone() })
                .collect(),
            remark: verdict.remark.clone(),
            working: verdict
                .working
                .iter()
                .map(|line| Working {
                    symbols: line.symbols.clone(),
                    numbers: line.numbers.clone(),
                    result: num(line.result.si),
                    unit: line.result.quantity.si_symbol(),
                })
                .collect(),
            mend: verdict.mend.iter().map(|m| m.text(UnitSystem::Si)).collect(),
            unconfirmed_record: record.map(|r| r.title.clone()),
            note: note.map(|n| n.text.clone()),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
pub(super) struct AbsentRow {
    criterion: &'static str,
    place: String,
    reason: String,
}

impl AbsentRow {
    pub(super) fn new(absent: &Absent) -> AbsentRow {
        AbsentRow {
            criterion: absent.criterion,
            place: absent.place_words.clone(),
            reason: absent.reason.text(UnitSystem::Si),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct TrustRow {
    name: &'static str,
    reach: &'static str,
    words: String,
}

#[derive(Clone, Debug, Serialize)]
struct Working {
    symbols: String,
    numbers: String,
    result: Num,
    unit: &'static str,
}

fn reach_word(reach: Reach) -> &'static str {
    match reach {
        Reach::Inside => "inside",
        Reach::Near => "near",
        Reach::Outside => "outside",
    }
}
