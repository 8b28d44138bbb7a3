//! Hold envelope, fill map and their export, worked out beside the window.

use std::sync::Arc;
use std::time::Duration;

use brimwright::analysis::{self, N_DIRECTIONS};
use brimwright::gui::Table;
use brimwright::progress::Progress;

use super::*;

/// Steps the window until `is_there`; gives up after a minute.
fn wait_for(harness: &mut Driven, what: &str, is_there: impl Fn(&Driven) -> bool) {
    for _ in 0..3000 {
        if is_there(harness) {
            return;
        }
        std::thread::sleep(Duration::from_millis(20));
        harness.step();
    }
    panic!("{what} did not come");
}

/// The envelope that is drawn, once it is whole and of the present study.
fn envelope(harness: &mut Driven) -> Arc<analysis::Envelope> {
    let present = |harness: &Driven| {
        let holds = harness.state().as_ref().unwrap().holds()?;
        (!holds.is_old && holds.envelope.limits.len() >= N_DIRECTIONS).then_some(holds.envelope)
    };
    wait_for(harness, "the hold envelope", |harness| present(harness).is_some());
    present(harness).unwrap()
}

#[test]
fn the_envelope_follows_the_study_and_stays_while_a_case_moves() {
    let mut harness = window();
    let first = envelope(&mut harness);
    type_into(&mut harness, "Fill", "50");
    let holds = harness.state().as_ref().unwrap().holds();
    assert!(
        holds.is_none_or(|holds| holds.is_old || !Arc::ptr_eq(&holds.envelope, &first)),
        "an old curve passes for new"
    );
    let second = envelope(&mut harness);
    assert_ne!(first, second);
    let study = doc(&harness).study().validate().unwrap();
    let attitude = second.attitude;
    let want = analysis::envelope(&study, attitude, N_DIRECTIONS, &Progress::default(), &|_| {}).unwrap();
    assert!(*second == want, "what is drawn is not what the library gives");
    // Cases move inside the curve and do not change it.
    run(&mut harness, Command::DuplicateCase);
    let third = envelope(&mut harness);
    assert!(Arc::ptr_eq(&second, &third), "the envelope was worked out again for nothing");
}

#[test]
fn the_fill_map_comes_when_it_is_chosen() {
    let mut harness = window();
    harness.get_by_label_contains("Plot, ").click();
    harness.run();
    harness.get_by_label("Fill map").click();
    harness.run();
    let whole = |harness: &Driven| harness.query_by_label("Fill map, 10100 of 10100 points").is_some();
    wait_for(&mut harness, "the fill map", whole);
}

#[test]
fn an_envelope_is_exported_as_the_command_line_writes_it() {
    let dir = tempfile::tempdir().unwrap();
    let mut harness = window();
    run(&mut harness, Command::Export(Table::Envelope));
    let path = dir.path().join("holds");
    harness.get_by_label("File name or path").focus();
    harness.key_press_modifiers(Modifiers::COMMAND, Key::A);
    harness.run();
    harness.event(Event::Text(path.to_string_lossy().into_owned()));
    harness.run();
    harness.key_press(Key::Enter);
    harness.run();
    let path = path.with_extension("csv");
    wait_for(&mut harness, "the file", |_| path.exists());
    let text = std::fs::read_to_string(&path).unwrap();
    assert!(text.starts_with("attitude_rad,direction_rad,accel_m_per_s2,"), "{text}");
    assert!(text.lines().count() > N_DIRECTIONS, "{} lines", text.lines().count());
    assert!(!doc(&harness).is_unsaved(), "an export is no save");
}
