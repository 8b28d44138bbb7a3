//! The window, driven by the names that assistive technology reads. No screen, no graphics driver.

mod mends;
mod pictures;
mod tank;
mod verdicts;

use std::path::Path;

use brimwright::app::{Derived, Document, EXAMPLES, load};
use brimwright::gui::commands::TABLE;
use brimwright::gui::{Command, Dialogs, Settings, Window, look};
use brimwright::study::Fill;
use brimwright::units::{Measure, Quantity, UnitSystem};
use egui::accesskit::Role;
use egui::{Event, Key, Modifiers, ViewportCommand, ViewportEvent, ViewportId};
use egui_kittest::Harness;
use egui_kittest::kittest::{NodeT, Queryable};

type Driven = Harness<'static, Option<Window>>;

fn window_of_size(width: f32, height: f32) -> Driven {
    // Work beside the window wakes it at any time: it settles in more steps than usual.
    let builder = Harness::builder().with_size([width, height]).with_max_steps(100);
    let mut harness = builder.with_context_setup(look::install).build_ui_state(
        |ui, window: &mut Option<Window>| {
            let start = || Window::new(ui.ctx(), None, Settings::default(), Dialogs::Own);
            window.get_or_insert_with(start).ui(ui);
        },
        None,
    );
    harness.run();
    harness
}

fn window() -> Driven {
    window_of_size(1280.0, 800.0)
}

fn doc(harness: &Driven) -> &Document {
    harness.state().as_ref().unwrap().document()
}

fn run(harness: &mut Driven, command: Command) {
    let ctx = harness.ctx.clone();
    harness.state_mut().as_mut().unwrap().run(&ctx, command);
    harness.run();
}

/// Clicks a field, replaces its text and presses Enter.
fn type_into(harness: &mut Driven, label: &str, text: &str) {
    harness.get_by_role_and_label(Role::SpinButton, label).click();
    harness.run();
    harness.event(Event::Text(text.into()));
    harness.key_press(Key::Enter);
    harness.run();
}

fn fill(harness: &Driven) -> Fill {
    doc(harness).study().fill
}

#[test]
fn the_first_example_opens_judged_at_every_size() {
    for (width, height) in [(1024.0, 640.0), (1280.0, 800.0), (1440.0, 900.0), (1920.0, 1080.0)] {
        let harness = window_of_size(width, height);
        assert!(matches!(doc(&harness).derived(), Derived::Judged { .. }), "{width} x {height}");
        let n = doc(&harness).study().cases.len();
        assert!(n > 1, "the first example shows a load case");
        harness.get_by_label_contains("Case 1, ");
        let verdicts = harness.get_all_by_label_contains(", case ").count();
        assert!(verdicts > n, "{width} x {height}: {verdicts} verdicts in the tree");
    }
}

#[test]
fn a_typed_fill_is_taken_with_comma_or_point_and_undone() {
    let mut harness = window();
    let before = fill(&harness);
    type_into(&mut harness, "Fill", "71,5");
    assert_eq!(fill(&harness), Fill::Share(0.715));
    type_into(&mut harness, "Fill", "62.5");
    assert_eq!(fill(&harness), Fill::Share(0.625));
    harness.key_press_modifiers(Modifiers::COMMAND, Key::Z);
    harness.run();
    assert_eq!(fill(&harness), Fill::Share(0.715));
    harness.key_press_modifiers(Modifiers::COMMAND, Key::Z);
    harness.run();
    assert_eq!(fill(&harness), before);
    assert!(!doc(&harness).is_unsaved());
    harness.key_press_modifiers(Modifiers::COMMAND | Modifiers::SHIFT, Key::Z);
    harness.run();
    assert_eq!(fill(&harness), Fill::Share(0.715));
}

#[test]
fn typing_another_way_of_filling_makes_it_the_way_that_is_given() {
    let mut harness = window();
    type_into(&mut harness, "Still level, z", "900");
    assert_eq!(fill(&harness), Fill::Level(0.9));
    type_into(&mut harness, "Volume", "5");
    assert_eq!(fill(&harness), Fill::Volume(5.0));
    type_into(&mut harness, "Ullage height", "400");
    assert_eq!(fill(&harness), Fill::Ullage(0.4));
}

#[test]
fn what_is_not_a_finite_number_is_refused_with_a_word() {
    let mut harness = window();
    let before = fill(&harness);
    for (text, word) in [("abc", "not a number"), ("inf", "not finite"), ("1,2,3", "one decimal sign")] {
        type_into(&mut harness, "Fill", text);
        assert_eq!(fill(&harness), before, "{text}");
        harness.get_by_label_contains(word);
        harness.key_press(Key::Escape);
        harness.run();
    }
    assert!(!doc(&harness).is_unsaved());
}

#[test]
fn escape_calls_typing_off() {
    let mut harness = window();
    let before = fill(&harness);
    harness.get_by_role_and_label(Role::SpinButton, "Fill").click();
    harness.run();
    harness.event(Event::Text("12".into()));
    harness.key_press(Key::Escape);
    harness.run();
    assert_eq!(fill(&harness), before);
}

#[test]
fn fields_can_be_reached_and_typed_with_the_keyboard_alone() {
    let mut harness = window();
    harness.get_by_role_and_label(Role::SpinButton, "Density").focus();
    harness.run();
    harness.key_press(Key::Enter);
    harness.run();
    harness.event(Event::Text("700".into()));
    harness.key_press(Key::Enter);
    harness.run();
    assert_eq!(doc(&harness).study().liquid.density_kg_per_m3, 700.0);
    assert!(harness.get_by_role_and_label(Role::SpinButton, "Density").is_focused(), "the field has the focus again");
}

#[test]
fn a_chosen_verdict_opens_its_working_and_its_case() {
    let mut harness = window();
    let last = doc(&harness).study().cases.len();
    let words = format!(", case {last}");
    let spoken = harness.get_all_by_label_contains(&words).next().unwrap().accesskit_node().label().unwrap();
    harness.get_by_label(&spoken).click();
    harness.run();
    let view = harness.state().as_ref().unwrap().view();
    assert_eq!(view.case_idx, last - 1);
    let open = view.open_verdict.expect("the working is open");
    assert_eq!(open.case_idx(), Some(last - 1));
    harness.get_by_label("Note beside the verdict");
}

#[test]
fn an_opened_verdict_stays_open_when_its_place_in_the_list_changes() {
    let mut harness = window();
    let criterion = |harness: &Driven| {
        let open = harness.state().as_ref().unwrap().view().open_verdict?;
        let Derived::Judged { results, .. } = doc(harness).derived() else { return None };
        Some((open.case_idx(), open.find(results)?.criterion))
    };
    let before = criterion(&harness).expect("the worst verdict of the first example fails and is open");
    for share in ["40", "90", "15"] {
        type_into(&mut harness, "Fill", share);
        assert_eq!(criterion(&harness), Some(before), "at {share} %");
    }
}

#[test]
fn switching_units_changes_no_study() {
    let mut harness = window();
    let (study, revision) = (doc(&harness).study().clone(), doc(&harness).revision());
    run(&mut harness, Command::Units(UnitSystem::UsCustomary));
    harness.get_by_role_and_label(Role::SpinButton, "Density").click();
    harness.run();
    // Enter on an unchanged field takes nothing.
    harness.key_press(Key::Enter);
    harness.run();
    run(&mut harness, Command::Units(UnitSystem::Si));
    assert_eq!(*doc(&harness).study(), study);
    assert_eq!(doc(&harness).revision(), revision);
}

#[test]
fn unsaved_changes_are_asked_about_before_they_are_lost() {
    let mut harness = window();
    type_into(&mut harness, "Fill", "33");
    run(&mut harness, Command::New);
    harness.get_by_label("Cancel").click();
    harness.run();
    assert_eq!(fill(&harness), Fill::Share(0.33), "cancelled");

    run(&mut harness, Command::New);
    harness.get_by_label("Discard the changes").click();
    harness.run();
    assert_eq!(doc(&harness).study().title, "Untitled");
    assert!(!doc(&harness).is_unsaved());
}

#[test]
fn closing_the_window_is_held_until_unsaved_changes_are_dealt_with() {
    let mut harness = window();
    let close = |harness: &mut Driven| {
        harness.input_mut().viewports.entry(ViewportId::ROOT).or_default().events.push(ViewportEvent::Close);
        harness.step();
        let commands = harness.output().viewport_output[&ViewportId::ROOT].commands.clone();
        commands.contains(&ViewportCommand::CancelClose)
    };
    assert!(!close(&mut harness), "nothing to lose");
    let mut harness = window();
    type_into(&mut harness, "Fill", "33");
    assert!(close(&mut harness), "held");
    harness.run();
    harness.get_by_label("Discard the changes").click();
    harness.step();
    let commands = &harness.output().viewport_output[&ViewportId::ROOT].commands;
    assert!(commands.contains(&ViewportCommand::Close), "{commands:?}");
}

#[test]
fn a_bad_file_lists_its_problems_and_keeps_the_document() {
    let dir = tempfile::tempdir().unwrap();
    let bad = dir.path().join("bad.ron");
    std::fs::write(&bad, "(\n  version: 1,\n  nonsense: 3,\n)").unwrap();
    let mut harness = window();
    type_into(&mut harness, "Fill", "55");
    for path in [bad.as_path(), Path::new("/nowhere/at all.ron")] {
        harness.state_mut().as_mut().unwrap().open(path);
        harness.run();
        assert_eq!(fill(&harness), Fill::Share(0.55), "{}", path.display());
        assert!(doc(&harness).undo_label().is_some(), "the history is kept");
        harness.get_by_label("Close this list").click();
        harness.run();
        assert!(harness.query_by_label("Close this list").is_none());
    }
    harness.state_mut().as_mut().unwrap().open(&bad);
    harness.run();
    harness.get_by_label_contains("line 3");
}

#[test]
fn a_dropped_file_is_opened() {
    #[derive(Debug)]
    struct Dropped(std::path::PathBuf);
    impl egui::DroppedFile for Dropped {
        fn path(&self) -> &Path {
            &self.0
        }
        fn bytes(&self) -> Result<Vec<u8>, String> {
            std::fs::read(&self.0).map_err(|error| error.to_string())
        }
    }
    let dir = tempfile::tempdir().unwrap();
    let path = dir.path().join("dropped.ron");
    std::fs::write(&path, EXAMPLES[1].text).unwrap();
    let mut harness = window();
    harness.input_mut().dropped_files.push(std::sync::Arc::new(Dropped(path.clone())));
    harness.run();
    assert_eq!(doc(&harness).path.as_deref(), Some(path.as_path()));
    assert_eq!(*doc(&harness).study(), load(&path).unwrap());
}

#[test]
fn an_unconfirmed_record_is_confirmed_from_the_working_of_its_verdict() {
    let mut harness = window();
    let Derived::Judged { results, .. } = doc(&harness).derived() else { panic!() };
    let (case_idx, verdict) = results
        .ranked()
        .into_iter()
        .map(|(c, v)| (c, &results.cases[c].verdicts[v]))
        .find(|(_, verdict)| verdict.unconfirmed_record.is_some())
        .expect("the first example has a verdict on an unconfirmed record");
    let record_idx = verdict.unconfirmed_record.unwrap();
    let start = format!("{}, ", verdict.criterion);
    let end = format!(", case {}", case_idx + 1);
    harness
        .get_all_by_label_contains(&end)
        .find(|node| node.accesskit_node().label().is_some_and(|l| l.starts_with(&start) && l.ends_with(&end)))
        .expect("its row")
        .click();
    harness.run();
    harness.get_by_label("Confirm this record").scroll_to_me();
    harness.run();
    harness.get_by_label("Confirm this record").click();
    harness.run();
    assert!(doc(&harness).study().records[record_idx].confirmed);
}

#[test]
fn keys_belong_to_the_text_that_is_typed() {
    let mut harness = window();
    type_into(&mut harness, "Fill", "60");
    harness.get_by_role_and_label(Role::SpinButton, "Density").click();
    harness.run();
    for (modifiers, key) in
        [(Modifiers::COMMAND, Key::Z), (Modifiers::NONE, Key::PageDown), (Modifiers::COMMAND, Key::Delete)]
    {
        harness.key_press_modifiers(modifiers, key);
        harness.run();
    }
    assert_eq!(fill(&harness), Fill::Share(0.6), "the study is not undone while a text is typed");
    assert_eq!(doc(&harness).undo_label(), Some("Set fill"));
}

#[test]
fn menus_open_and_carry_out_what_they_say() {
    let mut harness = window_of_size(1440.0, 900.0);
    type_into(&mut harness, "Fill", "60");
    harness.get_by_label("Edit").click();
    harness.run();
    harness.get_by_label_contains("Undo set fill").click();
    harness.run();
    assert!(!doc(&harness).is_unsaved());
    harness.get_by_label("Case").click();
    harness.run();
    harness.get_by_label_contains("Duplicate").click();
    harness.run();
    assert_eq!(doc(&harness).undo_label(), Some("Add load case"));
}

#[test]
fn a_study_is_saved_through_the_dialog_and_reads_back_the_same() {
    let dir = tempfile::tempdir().unwrap();
    let mut harness = window();
    type_into(&mut harness, "Fill", "44");
    run(&mut harness, Command::SaveAs);
    let path = dir.path().join("tank");
    harness.get_by_label("File name or path").focus();
    harness.key_press_modifiers(Modifiers::COMMAND, Key::A);
    harness.run();
    harness.event(Event::Text(path.to_string_lossy().into_owned()));
    harness.run();
    harness.key_press(Key::Enter);
    harness.run();
    assert!(!doc(&harness).is_unsaved());
    assert_eq!(load(&path.with_extension("ron")).unwrap(), *doc(&harness).study());
    assert_eq!(harness.state().as_ref().unwrap().settings().recent, [path.with_extension("ron")]);

    type_into(&mut harness, "Fill", "45");
    harness.key_press_modifiers(Modifiers::COMMAND, Key::S);
    harness.run();
    assert_eq!(load(&path.with_extension("ron")).unwrap().fill, Fill::Share(0.45));
}

#[test]
fn a_fault_is_listed_with_the_old_verdicts_beside_it_and_undone_from_the_list() {
    let mut harness = window();
    let before = doc(&harness).study().clone();
    type_into(&mut harness, "Density", "-5");
    let Derived::Faulty { problems, stale } = doc(&harness).derived() else {
        panic!("a density below zero is a fault")
    };
    assert!(stale.is_some());
    let message = problems[0].message.clone();
    harness.get_by_label_contains(&message);
    harness.get_by_label_contains("1 fault");
    assert!(harness.query_all_by_label_contains(", case 1").count() > 0, "the old verdicts stay");
    harness.get_by_label_contains("Undo set liquid").click();
    harness.run();
    assert_eq!(*doc(&harness).study(), before);
    assert!(matches!(doc(&harness).derived(), Derived::Judged { .. }));
}

#[test]
fn cases_are_added_duplicated_moved_and_deleted() {
    let mut harness = window();
    let n = doc(&harness).study().cases.len();
    harness.get_by_label("Add a load case").click();
    harness.run();
    assert_eq!(doc(&harness).study().cases.len(), n + 1);
    assert_eq!(harness.state().as_ref().unwrap().view().case_idx, n, "the new case is chosen");
    run(&mut harness, Command::DuplicateCase);
    let cases = &doc(&harness).study().cases;
    assert_eq!(cases.len(), n + 2);
    let names: std::collections::BTreeSet<&str> = cases.iter().map(|c| c.name.as_str()).collect();
    assert_eq!(names.len(), cases.len(), "no two cases share a name: {names:?}");
    let last = cases[n + 1].name.clone();
    run(&mut harness, Command::MoveCaseLeft);
    assert_eq!(doc(&harness).study().cases[n].name, last);
    for _ in 0..n + 2 {
        run(&mut harness, Command::DeleteCase);
    }
    assert!(doc(&harness).study().cases.is_empty());
    harness.get_by_label("Add a load case above the board");
}

#[test]
fn every_command_runs_on_every_kind_of_document() {
    for start in ["judged", "faulty", "without a case"] {
        let mut harness = window();
        match start {
            "faulty" => type_into(&mut harness, "Density", "-5"),
            "without a case" => {
                for _ in 0..doc(&harness).study().cases.len() {
                    run(&mut harness, Command::DeleteCase);
                }
            }
            _ => {}
        }
        for row in TABLE {
            run(&mut harness, row.command);
            // Out of whatever question it asked.
            harness.key_press(Key::Escape);
            harness.run();
        }
    }
}

#[test]
fn every_example_opens_without_a_fault() {
    let mut harness = window();
    for (i, example) in EXAMPLES.iter().enumerate() {
        run(&mut harness, Command::OpenExample(i));
        assert!(matches!(doc(&harness).derived(), Derived::Judged { .. }), "{}", example.file_name);
        assert!(!doc(&harness).is_unsaved(), "{}", example.file_name);
    }
}

#[test]
fn loads_of_the_chosen_case_are_listed_edge_by_edge() {
    let mut harness = window();
    run(&mut harness, Command::Loads);
    let Derived::Judged { results, .. } = doc(&harness).derived() else { panic!("the first example is sound") };
    // The first example opens on its worst case.
    let (case_idx, _) = results.ranked()[0];
    let settled = results.cases[case_idx].settled.as_ref().expect("it settles");
    let total = Measure::new(Quantity::Force, settled.total_force_n.y).text(UnitSystem::Si);
    let walls: Vec<String> = settled.edges.iter().filter(|e| e.is_wall).map(|e| e.name.clone()).collect();
    assert!(harness.query_all_by_label(&total).next().is_some(), "no {total}");
    harness.get_by_label("all together");
    for wall in walls {
        assert!(harness.query_all_by_label(&wall).next().is_some(), "no row {wall}");
    }
    harness.get_by_label("Close").click();
    harness.run();
    assert!(harness.query_by_label("all together").is_none());
}
