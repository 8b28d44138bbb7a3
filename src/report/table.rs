//! The judgement as text for a terminal: at most 80 columns, no colour, worst verdict first.

use crate::analysis::{CaseResult, Reach, Settled, State, Trust, Verdict};
use crate::cases::{Attitude, LoadCase};
use crate::problem::Problem;
use crate::units::{Measure, Quantity, UnitSystem, number, utilisation_text};

use super::lines::{Lines, WIDTH, left, printable, right, width};
use super::{CAUTION, Counts, Report};

/// Everything that was judged of one file.
pub fn text(report: &Report, units: UnitSystem) -> String {
    let mut table = Table { report, units, lines: Lines::default() };
    table.head();
    for (n, input, case) in report.cases() {
        table.case(n, input, case);
    }
    table.lines.into_text()
}

/// Counts over all files, and the caution.
pub fn summary(files: &[Counts]) -> String {
    let sum = |count: fn(&Counts) -> usize| files.iter().map(count).sum::<usize>();
    let state = |n: usize, one: &str, many: &str| format!("{n} {}", if n == 1 { one } else { many });
    let mut lines = Lines::default();
    lines.facts(
        "",
        [
            state(sum(|c| c.fails), "fails", "fail"),
            format!("{} not judged", sum(|c| c.not_judged)),
            format!("{} close", sum(|c| c.close)),
            state(sum(|c| c.holds), "holds", "hold"),
            plural(sum(|c| c.n_cases), "load case"),
            plural(files.len(), "file"),
        ],
    );
    lines.facts("", [CAUTION]);
    lines.into_text()
}

/// What is wrong with a file, one block a problem; lines are as long as they are, for tools that read them.
pub fn problems(file: &str, problems: &[Problem]) -> String {
    let blocks = problems.iter().map(|problem| format!("{file}: {problem}"));
    blocks.flat_map(|block| block.lines().map(|line| printable(line) + "\n").collect::<Vec<_>>()).collect()
}

struct Table<'a> {
    report: &'a Report<'a>,
    units: UnitSystem,
    lines: Lines,
}

impl Table<'_> {
    fn head(&mut self) {
        let Report { study, results, .. } = self.report;
        let still = &results.still;
        let revision = if study.revision.is_empty() { String::new() } else { format!("issue {}", study.revision) };
        let spaces = WIDTH.saturating_sub(width(&study.title) + width(&revision));
        if revision.is_empty() || spaces < 2 {
            self.lines.facts("", [&study.title, &revision].into_iter().filter(|s| !s.is_empty()));
        } else {
            self.lines.facts(&left(&study.title, width(&study.title) + spaces), [revision]);
        }
        self.lines.facts("", [self.report.file]);
        self.lines.facts("", ["─".repeat(WIDTH)]);
        self.fact(
            "liquid",
            [
                study.liquid.name.clone(),
                self.measure(Quantity::Density, study.liquid.density_kg_per_m3),
                self.measure(Quantity::Mass, still.mass_kg),
                format!("gas at {} gage", self.measure(Quantity::GagePressure, study.ullage_gage_pa)),
            ],
        );
        self.fact(
            "fill",
            [
                self.level(Quantity::Volume, still.volume_m3),
                format!(
                    "{} of {}",
                    self.measure(Quantity::Share, still.share),
                    self.level(Quantity::Volume, results.capacity_m3)
                ),
                format!("still level z {}", self.level(Quantity::Length, still.level_z_m)),
                format!("ullage {}", self.level(Quantity::Length, still.ullage_m)),
            ],
        );
        // Rounded down: the fill shown must hold.
        let highest = still.highest_share.map(|share| (share * 1000.0).floor() / 1000.0);
        let highest = highest.map(|share| self.measure(Quantity::Share, share));
        let highest = highest.map(|share| format!("{share} of capacity spills in no load case"));
        self.fact("highest", highest);
        self.fact(
            "records",
            study
                .records
                .iter()
                .map(|record| {
                    let bound = if record.limit.is_ceiling() { "at most" } else { "at least" };
                    let mark = if record.confirmed { "" } else { " (unconfirmed)" };
                    format!("{} {bound} {}{mark}", record.title, record.limit.measure().text(self.units))
                })
                .collect::<Vec<_>>(),
        );
        for warning in &results.warnings {
            self.fact("warning", [format!("{}: {}", warning.place, warning.message), warning.hint.clone()]);
        }
    }

    fn case(&mut self, n: usize, input: &LoadCase, case: &CaseResult) {
        self.lines.gap();
        self.lines.facts(&format!("{n}  "), [&case.name]);
        let onset = input.onset_s.map(|s| format!("builds up in {}", self.measure(Quantity::Time, s)));
        let stands = match input.attitude {
            Attitude::Level => None,
            attitude => Some(format!("stands at {}", self.measure(Quantity::Angle, attitude.angle_rad()))),
        };
        self.fact(
            "accel",
            [
                format!("s {}", self.measure(Quantity::Acceleration, case.accel.x)),
                format!("z {}", self.measure(Quantity::Acceleration, case.accel.y)),
                format!("effective gravity {}", self.measure(Quantity::Acceleration, case.gravity.magnitude)),
            ]
            .into_iter()
            .chain(onset)
            .chain(stands),
        );
        match &case.settled {
            Ok(settled) => self.settled(case, settled),
            Err(reason) => self.fact("settled", [format!("no settled state: {reason}")]),
        }
        self.fact("origin", Some(&input.source).filter(|s| !s.is_empty()));
        self.fact("note", Some(&input.note).filter(|s| !s.is_empty()));
        self.verdicts(case);
    }

    fn settled(&mut self, case: &CaseResult, settled: &Settled) {
        let tilt = case.gravity.tilt_rad.map(|rad| format!("tilt {}", self.measure(Quantity::Angle, rad)));
        let slope = case.gravity.slope.map(|slope| format!("slope {}", number(slope, 3)));
        let offset = settled
            .main_pool()
            .and_then(|p| p.offset_m)
            .map(|m| format!("z {} at s = 0", self.level(Quantity::Length, m)));
        self.fact("surface", [tilt, slope, offset].into_iter().flatten().collect::<Vec<_>>());
        self.fact(
            "liquid",
            [
                format!(
                    "{} stays in {}",
                    self.level(Quantity::Volume, settled.volume_m3),
                    plural(settled.pools.len(), "pool")
                ),
                format!("{} spilled", self.measure(Quantity::Volume, settled.spilled_m3)),
                format!(
                    "centroid s {}, z {}",
                    self.level(Quantity::Length, settled.centroid.x),
                    self.level(Quantity::Length, settled.centroid.y)
                ),
                format!("reaches z {}", self.level(Quantity::Length, settled.highest_wetted.y)),
            ],
        );
        let roof = settled.roof.as_ref().map(|roof| {
            format!(
                "roof wetted over {}, up to {} gage",
                self.measure(Quantity::Length, roof.wetted_length_m),
                self.measure(Quantity::GagePressure, roof.peak_pa)
            )
        });
        let peak = format!(
            "{} gage at most, on {}",
            self.measure(Quantity::GagePressure, settled.peak_pa),
            self.report.place_words(&settled.peak_place)
        );
        let lowest = format!("{} at least", self.measure(Quantity::AbsolutePressure, settled.lowest_abs_pa));
        self.fact("pressure", [Some(peak), Some(lowest), roof].into_iter().flatten().collect::<Vec<_>>());
        let about = self.report.study.moment_about;
        self.fact(
            "force",
            [
                format!("s {}", self.measure(Quantity::Force, settled.total_force_n.x)),
                format!("z {}", self.measure(Quantity::Force, settled.total_force_n.y)),
                format!(
                    "moment {} about s {}, z {}",
                    self.measure(Quantity::Moment, settled.total_moment_n_m),
                    self.measure(Quantity::Length, about.x),
                    self.measure(Quantity::Length, about.y)
                ),
            ],
        );
        self.fact(
            "points",
            settled
                .points
                .iter()
                .map(|p| {
                    let dry = if p.wet { "" } else { " (dry)" };
                    format!("{} {} gage{dry}", p.name, self.measure(Quantity::GagePressure, p.gage_pa))
                })
                .collect::<Vec<_>>(),
        );
    }

    fn verdicts(&mut self, case: &CaseResult) {
        let criterion = case
            .verdicts
            .iter()
            .map(|v| width(v.criterion))
            .chain(case.absent.iter().map(|a| width(a.criterion)))
            .chain([width("criterion")])
            .max()
            .unwrap_or(0);
        self.lines.gap();
        let row = |state: &str, name: &str, used: &str| {
            format!("   {}  {}  {}  ", left(state, 10), left(name, criterion), right(used, 7))
        };
        self.lines.facts(&row("state", "criterion", "used"), ["demand and limit"]);
        for v in &case.verdicts {
            self.lines
                .facts(&row(v.state.word(), v.criterion, &utilisation_text(v.utilisation)), [self.comparison(v)]);
            // A verdict that is not judged has its reason below; how far a method reaches would only confuse.
            let trust = if v.state == State::NotJudged { String::new() } else { trust_words(&v.trust) };
            self.detail([v.place_words.clone(), v.source.entry().short.clone(), trust]);
            let mend: Vec<String> = v.mend.iter().map(|m| m.text(self.units)).collect();
            self.detail(Some(mend.join(" ")));
            self.detail(Some(v.remark.clone()));
            let record = v.unconfirmed_record.and_then(|idx| self.report.study.records.get(idx));
            self.detail(record.map(|r| format!("rests on an unconfirmed record: {}", r.title)));
        }
        for a in &case.absent {
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

    fn fact<S: AsRef<str>>(&mut self, label: &str, facts: impl IntoIterator<Item = S>) {
        self.lines.facts(&format!("   {}  ", left(label, 8)), facts);
    }

    fn detail(&mut self, facts: impl IntoIterator<Item = String>) {
        self.lines.facts(&" ".repeat(15), facts.into_iter().filter(|f| !f.is_empty()));
    }

    fn measure(&self, quantity: Quantity, si: f64) -> String {
        Measure::new(quantity, si).text(self.units)
    }

    fn level(&self, quantity: Quantity, si: f64) -> String {
        Measure::new(quantity, si).text_to(self.units, 4)
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

fn plural(n: usize, noun: &str) -> String {
    if n == 1 { format!("{n} {noun}") } else { format!("{n} {noun}s") }
}

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::*;

    fn shown(units: UnitSystem) -> String {
        let (study, results) = (fixture::study(), fixture::results());
        text(&Report::new("scenarios/tray.ron", &study, &results), units)
    }

    #[test]
    fn a_verdict_reads_state_criterion_used_demand_and_limit() {
        let want = "   fails       Wall pressure     1.03  9.30 kPa, at most 9.00 kPa
               rim, right end · own derivation, brim path
               trust 4 of 5 inside, near: depth to length
               To hold, fill 78.6 %
               rests on an unconfirmed record: Tray wall
";
        let text = shown(UnitSystem::Si);
        assert!(text.contains(want), "want\n{want}in\n{text}");
    }

    #[test]
    fn the_fill_is_told_in_four_ways_in_both_unit_systems() {
        // 0.79 m3 and 0.8 m in US gallons and inches by their definitions: 231 cubic inches, 25.4 mm.
        for (units, facts) in [
            (UnitSystem::Si, ["0.7900 m³", "79.8 % of 0.9900 m³", "still level z 800.0 mm", "ullage 200.0 mm"]),
            (
                UnitSystem::UsCustomary,
                ["208.7 gal", "79.8 % of 261.5 gal", "still level z 31.50 in", "ullage 7.874 in"],
            ),
        ] {
            let text = shown(units);
            for fact in facts {
                assert!(text.contains(fact), "want {fact} in\n{text}");
            }
        }
    }

    #[test]
    fn the_highest_fill_is_rounded_down_so_that_it_holds() {
        let (study, mut results) = (fixture::study(), fixture::results());
        results.still.highest_share = Some(0.545_94);
        let text = text(&Report::new("tray.ron", &study, &results), UnitSystem::Si);
        assert!(text.contains("   highest   54.5 % of capacity spills in no load case\n"), "{text}");
    }

    #[test]
    fn what_is_not_judged_or_absent_says_why() {
        let text = shown(UnitSystem::Si);
        for want in [
            "   settled   no settled state: free fall: effective gravity is zero\n",
            "   not judged  Contained        –  –\n",
            "               capillarity rules the surface\n",
            "   absent      Roof contact\n               tank: no edge of the outline is a shut roof\n",
        ] {
            assert!(text.contains(want), "want\n{want}in\n{text}");
        }
    }

    #[test]
    fn no_line_is_wider_than_the_page_whatever_the_names() {
        let (mut study, mut results) = (fixture::study(), fixture::results());
        let long = "a name that somebody made much longer than it had to be ".repeat(3);
        study.title = long.clone();
        study.liquid.name = long.clone();
        study.records[0].title = long.clone();
        results.cases[0].name = long.clone();
        results.cases[0].verdicts[0].place_words = long;
        let text = text(&Report::new("tray.ron", &study, &results), UnitSystem::Si);
        for line in text.lines() {
            assert!(width(line) <= WIDTH, "{} columns: {line}", width(line));
        }
    }

    #[test]
    fn the_summary_counts_over_files_and_is_two_lines() {
        let (study, results) = (fixture::study(), fixture::results());
        let counts = Report::new("tray.ron", &study, &results).counts();
        let want = format!("4 fail · 2 not judged · 0 close · 2 hold · 4 load cases · 2 files\n{CAUTION}\n");
        assert_eq!(summary(&[counts, counts]), want);
    }

    #[test]
    fn a_problem_says_file_place_message_and_hint() {
        let problem =
            Problem::fault(crate::problem::Place::Text { line: 3, column: 7 }, "unknown field", "take it out");
        assert_eq!(
            problems("tray.ron", &[problem]),
            "tray.ron: fault: line 3, column 7: unknown field\n  hint: take it out\n"
        );
    }
}
