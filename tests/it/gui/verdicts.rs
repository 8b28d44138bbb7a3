//! Verdicts on the layout of plates: opened for their working, and pointed to on the board.

use brimwright::gui::VerdictAt;

use super::*;

fn open_example(file_name: &str) -> Driven {
    let mut harness = window_of_size(1280.0, 1400.0);
    let i = EXAMPLES.iter().position(|e| e.file_name == file_name).expect("an example");
    run(&mut harness, Command::OpenExample(i));
    harness
}

fn row(harness: &Driven, start: &str) -> String {
    let labels = harness.get_all_by_label_contains(start).filter_map(|n| n.accesskit_node().label());
    let mut rows = labels.filter(|label| label.starts_with(start) && !label.contains(", case "));
    rows.next().unwrap_or_else(|| panic!("a row of {start} that is of no case"))
}

#[test]
fn a_layout_verdict_opens_its_working_with_the_record_behind_its_limit() {
    let mut harness = open_example("tanker-barrel-surge-plates.ron");
    let case_idx = harness.state().as_ref().unwrap().view().case_idx;
    let words = row(&harness, "Cell volume, fails");
    harness.get_by_label(&words).click();
    harness.run();
    let view = harness.state().as_ref().unwrap().view();
    assert_eq!(view.open_verdict, Some(VerdictAt::Layout(0)), "the worst of the layout");
    assert_eq!(view.case_idx, case_idx, "it is of no case: the board keeps its own");
    let record = doc(&harness).study().records.iter().find(|r| r.limit.is_of_layout()).expect("a record").clone();
    for part in [&record.title, &record.clause, &record.edition, "unconfirmed"] {
        let told = harness.query_all_by_label_contains(part).chain(harness.query_all_by_value(part));
        assert!(told.count() > 0, "{part} is told");
    }
    harness.get_by_label_contains("To hold, ");
    harness.get_by_label("Confirm this record").click();
    harness.run();
    assert!(doc(&harness).study().records.iter().any(|r| r.limit.is_of_layout() && r.confirmed));
    assert!(harness.query_by_label("Note beside the verdict").is_none(), "notes belong to load cases");
    harness.get_by_label(&row(&harness, "Cell volume, fails")).click();
    harness.run();
    assert_eq!(harness.state().as_ref().unwrap().view().open_verdict, None, "and shuts it again");
}

#[test]
fn an_opened_layout_verdict_stays_open_when_its_place_in_the_list_changes() {
    let mut harness = open_example("tanker-barrel-surge-plates.ron");
    harness.get_by_label(&row(&harness, "Plate coverage")).click();
    harness.run();
    let criterion = |harness: &Driven| {
        let Derived::Judged { results, .. } = doc(harness).derived() else { return None };
        Some(harness.state().as_ref().unwrap().view().open_verdict?.find(results)?.criterion)
    };
    assert_eq!(criterion(&harness), Some("Plate coverage"));
    // So full that the cells may be as large as they are.
    type_into(&mut harness, "Fill", "15");
    assert_eq!(criterion(&harness), Some("Plate coverage"));
}

#[test]
fn the_bound_that_is_near_stands_beside_the_bounds() {
    let harness = open_example("tanker-barrel-surge-plates.ron");
    let case = harness.state().as_ref().unwrap().view().case_idx;
    let Derived::Judged { results, .. } = doc(&harness).derived() else { panic!("it is judged") };
    let transfer = results.cases[case].transfer.as_ref().expect("two bounds").as_ref().unwrap();
    assert!(transfer.moved_m3 > 0.0, "the case shown first moves liquid through the openings");
    assert_eq!(transfer.near, None, "{}", transfer.words);
    harness.get_by_label(&format!("neither bound is near: {}", transfer.words));
}
