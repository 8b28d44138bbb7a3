//! Verdicts, worst first, and the checks that do not apply.

use crate::analysis::{Absent, Reach, State, Trust, Verdict};
use crate::units::{Measure, utilisation_text};

use super::super::lines::{left, right, width};
use super::Table;

impl Table<'_> {
    pub(super) fn verdicts(&mut self, verdicts: &[Verdict], absent: &[Absent]) {
        let criterion = verdicts
            .iter()
            .map(|v| width(v.criterion))
            .chain(absent.iter().map(|a| width(a.criterion)))
            .chain([width("criterion")])
            .max()
            .unwrap_or(0);
        self.lines.gap();
        let row = |state: &str, name: &str, used: &str| {
            format!("   {}  {}  {}  ", left(state, 10), left(name, criterion), right(used, 7))
        };
        self.lines.facts(&row("state", "criterion", "used"), ["demand and limit"]);
        for v in verdicts {
            self.lines
                .facts(&row(v.state.word(), v.criterion, &utilisation_text(v.utilisation)), [self.comparison(v)]);
            // A verdict that is not judged has its reason below; how far a method reaches would only confuse.
            let trust = if v.state == State::NotJudged { String::new() } else { trust_words(&v.trust) };
            let bound = v.bound.map_or_else(String::new, |bound| format!("{} bound", bound.word()));
            self.detail([v.place_words.clone(), bound, v.source.entry().short.clone(), trust]);
            let mend: Vec<String> = v.mend.iter().map(|m| m.text(self.units)).collect();
            self.detail(Some(mend.join(" ")));
            self.detail(Some(v.remark.clone()));
            let record = v.unconfirmed_record.and_then(|idx| self.report.study.records.get(idx));
            self.detail(record.map(|r| format!("rests on an unconfirmed record: {}", r.title)));
        }
        for a in absent {
            self.lines.facts(&row("absent", a.criterion, ""), [""]);
            self.detail(Some(format!("{}: {}", a.place_words, a.reason.text(self.units))));
        }
    }

    fn comparison(&self, verdict: &Verdict) -> String {
        let text = |m: Option<Measure>| m.map(|m| m.text(self.units));
        match (text(verdict.demand), text(verdict.limit)) {
            (Some(demand), Some(limit)) => format!("{demand}, {} {limit}", verdict.sense.words()),
            (Some(demand), None) => format!("{demand}, no limit"),
            (None, Some(limit)) => format!("–, {} {limit}", verdict.sense.words()),
            (None, None) => "–".to_owned(),
        }
    }
}

/// How many squares of the trust strip are full, and the names of those that are not.
fn trust_words(trust: &[Trust]) -> String {
    let names = |reach| trust.iter().filter(|t| t.reach == reach).map(|t| t.name).collect::<Vec<_>>();
    let mut words = format!("trust {} of {} inside", names(Reach::Inside).len(), trust.len());
    for (reach, word) in [(Reach::Near, "near"), (Reach::Outside, "outside")] {
        let names = names(reach);
        if !names.is_empty() {
            words += &format!(", {word}: {}", names.join(", "));
        }
    }
    words
}
