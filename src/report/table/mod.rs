//! The judgement as text for a terminal: at most 80 columns, no colour, worst verdict first.

mod case;
mod head;
mod plates;
mod states;
mod verdicts;

use crate::geom::Vec2;
use crate::problem::Problem;
use crate::units::{Measure, Quantity, UnitSystem};

use super::lines::{Lines, left, printable};
use super::{CAUTION, Counts, Report};

/// Everything that was judged of one file.
pub fn text(report: &Report, units: UnitSystem) -> String {
    let mut table = Table { report, units, lines: Lines::default() };
    table.head();
    table.layout();
    for (n, input, case) in report.cases() {
        table.case(n, input, case);
    }
    table.plate_peaks();
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

/// The words for a direction on the section: the axis that it lies nearest to.
fn direction_words(d: Vec2) -> &'static str {
    match (d.x.abs() >= d.y.abs(), d.x > 0.0, d.y > 0.0) {
        (true, true, _) => "to the right",
        (true, false, _) => "to the left",
        (false, _, true) => "upward",
        (false, _, false) => "downward",
    }
}

fn plural(n: usize, noun: &str) -> String {
    if n == 1 { format!("{n} {noun}") } else { format!("{n} {noun}s") }
}

#[cfg(test)]
mod tests {
    use super::super::fixture;
    use super::super::lines::{WIDTH, width};
    use super::*;
    use crate::analysis::MouthSpill;
    use crate::section::EdgeKind;

    fn shown(units: UnitSystem) -> String {
        let (study, results) = (fixture::study(), fixture::results());
        text(&Report::new("scenarios/tray.ron", &study, &results), units)
    }

    #[test]
    fn a_verdict_reads_state_criterion_used_demand_and_limit() {
        let want = "   fails       Wall pressure     1.03  9.30 kPa, at most 9.00 kPa
               rim, right end · own derivation, pour-over
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
    fn several_pools_states_and_plates_have_tables() {
        let text = shown(UnitSystem::Si);
        for want in [
            "
   cell     capacity       area      still   up to z
   cell 1  0.2500 m³  0.5000 m²  0.2000 m³  800.0 mm
   cell 2  0.7400 m³   1.480 m²  0.5900 m³  800.0 mm

   plate  thickness   solid  as drawn
   sill     3.00 mm  97.1 %  s 500.0 mm, z 0.000 mm to 700.0 mm
",
            "
   pools        volume     level  surface                 stands in
   settled   0.6200 m³  790.0 mm  s 500.0 mm to 2\u{2009}000 mm  cell 2
             0.1600 m³  670.0 mm  s 0.000 mm to 500.0 mm  cell 1
   sealed    0.5900 m³  790.0 mm  s 500.0 mm to 2\u{2009}000 mm  cell 2
",
            "
   state             still      settled       sealed     released
   cell 1        0.2000 m³    0.1600 m³    0.1900 m³    0.1700 m³
   cell 2        0.5900 m³    0.6200 m³    0.5900 m³    0.6100 m³
   spilled                    0.0100 m³    0.0100 m³    0.0100 m³
",
            "
   plate  state      net load  acts at     greatest net pressure
   sill   settled   −0.410 kN  z 293.0 mm  −1.19 kPa at z 50.00 mm
          sealed    +0.230 kN  z 293.0 mm  −1.19 kPa at z 50.00 mm
",
            "
   Plate layout, the tank standing level and at rest

   state       criterion          used  demand and limit
   holds       Plate coverage     0.90  70.0 %, at most 63.0 %
",
            "   gas       settled: 0.0120 m³ in cell 1 touches no mouth
             sealed: 0.0120 m³ in cell 1 touches no mouth
",
            "   poured    0.0300 m³ to the right over sill at s 500.0 mm, z 700.0 mm\n",
            "   trapped   after the release 0.0200 m³ more in cell 2 than before\n",
            "               rim, right end · sealed bound · own derivation, pour-over\n",
        ] {
            assert!(text.contains(want), "want\n{want}in\n{text}");
        }
    }

    #[test]
    fn a_report_of_one_load_case_leaves_the_layout_out() {
        let (study, results) = (fixture::study(), fixture::results());
        let report = Report { case_idxs: vec![0], has_layout: false, ..Report::new("tray.ron", &study, &results) };
        let text = text(&report, UnitSystem::Si);
        assert!(!text.contains("Plate layout") && !text.contains("Plate coverage"), "{text}");
        assert_eq!(report.counts().holds, 1, "Freeboard alone");
    }

    #[test]
    fn a_sealed_state_that_reads_as_the_settled_one_is_not_shown_twice() {
        let (study, mut results) = (fixture::study(), fixture::results());
        results.cases[0].sealed = Some(results.cases[0].settled.clone());
        let text = text(&Report::new("tray.ron", &study, &results), UnitSystem::Si);
        assert!(text.contains("   sealed    with openings shut as settled, to the figures shown\n"), "{text}");
        assert!(!text.contains("          sealed  "), "{text}");
    }

    #[test]
    fn of_several_mouths_each_is_told_what_it_spilled() {
        let (mut study, mut results) = (fixture::study(), fixture::results());
        study.section.outline[0].kind = EdgeKind::Mouth;
        study.section.outline[0].name = "drain".into();
        let settled = results.cases[0].settled.as_mut().expect("a settled state");
        let spills = [(1, 0.007), (0, 0.003)];
        settled.spills = spills.map(|(mouth_idx, volume_m3)| MouthSpill { mouth_idx, volume_m3 }).into();
        let text = text(&Report::new("tray.ron", &study, &results), UnitSystem::Si);
        let want = "0.0100 m³ spilled: 7.00 L by rim, 3.00 L by drain";
        assert!(text.contains(want), "want {want} in\n{text}");
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
            "   settled   no settled state: free fall: effective gravity is zero\n\n",
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
        study.section.plates[0].name = long.clone();
        study.section.outline[2].name = long.clone();
        results.cells[1].name = long.clone();
        results.cases[0].name = long.clone();
        results.cases[0].verdicts[0].place_words = long;
        results.cases[0].settled.as_mut().expect("a settled state").total_moment_n_m = -7.8e9;
        for units in [UnitSystem::Si, UnitSystem::UsCustomary] {
            let text = text(&Report::new("tray.ron", &study, &results), units);
            for line in text.lines() {
                assert!(width(line) <= WIDTH, "{} columns: {line}", width(line));
            }
        }
    }

    #[test]
    fn the_summary_counts_over_files_and_is_two_lines() {
        let (study, results) = (fixture::study(), fixture::results());
        let counts = Report::new("tray.ron", &study, &results).counts();
        let want = format!("4 fail · 2 not judged · 0 close · 4 hold · 4 load cases · 2 files\n{CAUTION}\n");
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
