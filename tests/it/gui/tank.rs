//! The tank column: plates, openings, compartments, the sump and requirement records, typed by their names.

use brimwright::gui::Selected;
use brimwright::section::{OpeningShape, PanelEdges, Plate};
use brimwright::study::Limit;
use egui_kittest::Node;

use super::*;

/// Large, so that the whole column is shown, with the plain box: 2 m by 1 m or so.
fn plain_box() -> Driven {
    let mut harness = window_of_size(1920.0, 2400.0);
    run(&mut harness, Command::New);
    harness
}

fn press(harness: &mut Driven, label: &str) {
    harness.get_by_label(label).click();
    harness.run();
}

fn choose(harness: &mut Driven, now: &str, then: &str) {
    press(harness, now);
    harness.get_all_by_label(then).last().expect("a choice").click();
    harness.run();
}

/// The text field of this name nearest below `row`.
fn type_text(harness: &mut Driven, row: &str, label: &str, text: &str) {
    let below = harness.get_by_label(row).rect().bottom();
    let distance = |node: &Node| node.rect().top() - below;
    let cells = harness.get_all_by_role_and_label(Role::TextInput, label).filter(|n| distance(n) > -1.0);
    let nearest = cells.min_by(|a, b| distance(a).total_cmp(&distance(b))).expect("a field below the row");
    nearest.click();
    harness.run();
    harness.event(Event::Text(text.into()));
    harness.key_press(Key::Enter);
    harness.run();
}

fn plate(harness: &Driven) -> &Plate {
    &doc(harness).study().section.plates[0]
}

#[test]
fn a_plate_is_added_from_wall_to_wall_and_typed_exactly() {
    let mut harness = plain_box();
    let before = doc(&harness).study().clone();
    press(&mut harness, "Add a plate");
    let ((low, high), points) = (extent(&harness), plate(&harness).points.clone());
    assert_eq!(points.iter().map(|p| p.y).collect::<Vec<_>>(), [low, high], "from floor to rim");
    assert_eq!(harness.state().as_ref().unwrap().view().selected, Some(Selected::Plate(0)));
    type_text(&mut harness, "Plate 1, plate 1", "Name", "Bulkhead");
    for (label, text) in [
        ("Foot, s", "-200"),
        ("Top, s", "-250"),
        ("Top, z", "600"),
        ("Thickness", "8"),
        ("Corrosion", "1"),
        ("Stiffener spacing", "400"),
    ] {
        type_into(&mut harness, label, text);
    }
    type_text(&mut harness, "Plate 1, Bulkhead", "Material", "steel");
    choose(&mut harness, "Edges, simply supported", "clamped");
    choose(&mut harness, "From the table, choose", "structural steel S235");
    let typed = plate(&harness);
    let got: Vec<(f64, f64)> = typed.points.iter().map(|p| (p.x, p.y)).collect();
    assert_eq!(got, [(-0.2, low), (-0.25, 0.6)]);
    assert_eq!((typed.thickness_m, typed.corrosion_m), (0.008, 0.001));
    assert_eq!((typed.name.as_str(), typed.material.as_str()), ("Bulkhead", "structural steel S235"));
    assert_eq!((typed.panel.stiffener_spacing_m, typed.panel.edges), (Some(0.4), PanelEdges::Clamped));
    // One step each: the plate, two texts, six numbers, two choices.
    for _ in 0..11 {
        assert_ne!(*doc(&harness).study(), before);
        run(&mut harness, Command::Undo);
    }
    assert_eq!(*doc(&harness).study(), before);
}

#[test]
fn openings_are_typed_with_the_numbers_of_their_shape() {
    let mut harness = plain_box();
    press(&mut harness, "Add a plate");
    press(&mut harness, "Add an opening");
    assert_eq!(harness.state().as_ref().unwrap().view().selected, Some(Selected::Opening(0, 0)));
    type_into(&mut harness, "From", "100");
    type_into(&mut harness, "To", "300");
    type_into(&mut harness, "Open share", "40");
    let opening = &plate(&harness).openings[0];
    assert_eq!((opening.from_m, opening.to_m, opening.shape), (0.1, 0.3, OpeningShape::Share(0.4)));
    choose(&mut harness, "Open as, share of the width", "round holes");
    type_into(&mut harness, "Number of holes", "3");
    assert_eq!(plate(&harness).openings[0].shape, OpeningShape::Holes { n: 3 });
    choose(&mut harness, "Open as, round holes", "perforated");
    type_into(&mut harness, "Hole diameter", "30");
    type_into(&mut harness, "Hole pitch", "60");
    press(&mut harness, "Rows staggered");
    let want = OpeningShape::Perforated { diameter_m: 0.03, pitch_m: 0.06, is_staggered: true };
    assert_eq!(plate(&harness).openings[0].shape, want);
    press(&mut harness, "Take this opening out");
    assert!(plate(&harness).openings.is_empty());
    press(&mut harness, "Take this plate out");
    assert!(doc(&harness).study().section.plates.is_empty());
}

#[test]
fn the_chosen_plate_is_duplicated_and_deleted_by_command() {
    let mut harness = plain_box();
    press(&mut harness, "Add a plate");
    run(&mut harness, Command::DuplicatePlate);
    let plates = &doc(&harness).study().section.plates;
    assert_eq!(plates.len(), 2);
    assert!(plates[1].points[0].x > plates[0].points[0].x, "beside the first");
    assert_eq!(harness.state().as_ref().unwrap().view().selected, Some(Selected::Plate(1)), "the copy is chosen");
    run(&mut harness, Command::DeleteSelected);
    assert_eq!(doc(&harness).study().section.plates.len(), 1);
    run(&mut harness, Command::DrawPlate);
    assert!(harness.state().as_ref().unwrap().view().pen.is_some());
    harness.get_by_label("Board");
    run(&mut harness, Command::DrawPlate);
    assert!(harness.state().as_ref().unwrap().view().pen.is_none(), "the same command puts the pen away");
}

#[test]
fn a_compartment_has_its_own_fill_and_liquid() {
    let mut harness = plain_box();
    press(&mut harness, "Add a plate");
    press(&mut harness, "Add a compartment");
    type_into(&mut harness, "A point inside, z", "150");
    type_into(&mut harness, "A point inside, s", "300");
    choose(&mut harness, "Filled by, share", "still level");
    type_into(&mut harness, "Own still level, z", "400");
    press(&mut harness, "A liquid of its own");
    type_into(&mut harness, "Its density", "850");
    let compartment = &doc(&harness).study().compartments[0];
    assert_eq!((compartment.at.x, compartment.at.y, compartment.fill), (0.3, 0.15, Fill::Level(0.4)));
    assert_eq!(compartment.liquid.as_ref().map(|l| l.density_kg_per_m3), Some(850.0));
    press(&mut harness, "Take this compartment out");
    assert!(doc(&harness).study().compartments.is_empty());
}

#[test]
fn the_sump_and_the_discharge_coefficient_are_typed() {
    let mut harness = plain_box();
    press(&mut harness, "Put a sump at the lowest point");
    let sump = doc(&harness).study().sump.expect("a sump");
    assert_eq!(sump.y, extent(&harness).0, "on the floor");
    type_into(&mut harness, "Sump, s", "120");
    type_into(&mut harness, "Discharge coefficient", "0.65");
    assert_eq!(doc(&harness).study().sump.map(|p| p.x), Some(0.12));
    assert_eq!(doc(&harness).study().discharge_coefficient, 0.65);
    press(&mut harness, "Take the sump out");
    assert_eq!(doc(&harness).study().sump, None);
}

#[test]
fn every_kind_of_record_shows_its_own_numbers() {
    let mut harness = plain_box();
    press(&mut harness, "Add a record");
    let limit = |harness: &Driven| doc(harness).study().records.last().expect("a record").limit;
    choose(&mut harness, "Limits, wall pressure", "roof pressure");
    assert_eq!(limit(&harness), Limit::RoofPressure(25e3), "a limit of the same quantity keeps its value");
    choose(&mut harness, "Limits, roof pressure", "cell volume");
    type_into(&mut harness, "At most", "7,5");
    type_into(&mut harness, "Or filled up to", "25");
    type_into(&mut harness, "Or filled from", "85");
    assert_eq!(limit(&harness), Limit::CellVolume { m3: 7.5, empty_to: 0.25, full_from: 0.85 });
    choose(&mut harness, "Limits, cell volume", "rated flow");
    type_into(&mut harness, "At a flow of", "30");
    type_into(&mut harness, "At most", "150");
    assert_eq!(limit(&harness), Limit::RatedFlow { flow_m3_per_s: 0.03, difference_m: 0.15 });
    choose(&mut harness, "Limits, rated flow", "drain path");
    assert_eq!(limit(&harness), Limit::DrainPath);
    for label in ["At most", "At least"] {
        assert!(harness.query_by_role_and_label(Role::SpinButton, label).is_none(), "a path has no number");
    }
    choose(&mut harness, "Limits, drain path", "plate coverage");
    type_into(&mut harness, "At least", "75");
    assert_eq!(limit(&harness), Limit::PlateCoverage(0.75));
}

#[test]
fn a_case_may_be_held_and_then_released() {
    let mut harness = plain_box();
    press(&mut harness, "More of this case");
    type_into(&mut harness, "Then held for", "12");
    press(&mut harness, "Then released");
    let case = &doc(&harness).study().cases[0];
    assert_eq!((case.duration_s, case.release), (Some(12.0), true));
}

/// Lowest and highest z of the outline's corners.
fn extent(harness: &Driven) -> (f64, f64) {
    let zs = || doc(harness).study().section.outline.iter().map(|e| e.start.y);
    (zs().fold(f64::INFINITY, f64::min), zs().fold(f64::NEG_INFINITY, f64::max))
}

#[test]
fn plates_are_spaced_equally_from_the_column_and_by_command() {
    for is_by_command in [true, false] {
        let mut harness = plain_box();
        press(&mut harness, "Add a plate");
        type_into(&mut harness, "Foot, s", "300");
        type_into(&mut harness, "Top, s", "300");
        let before = doc(&harness).study().clone();
        match is_by_command {
            true => run(&mut harness, Command::SpacePlates),
            false => press(&mut harness, "Space them equally"),
        }
        let s: Vec<f64> = plate(&harness).points.iter().map(|p| p.x).collect();
        assert_eq!(s, [0.0, 0.0], "in the middle of the box");
        assert!(harness.query_by_label("Space them equally").is_none(), "there is nothing left to space");
        run(&mut harness, Command::Undo);
        assert_eq!(*doc(&harness).study(), before);
    }
}

#[test]
fn the_board_shows_each_state_that_a_case_has() {
    use brimwright::gui::Stage;
    let mut harness = plain_box();
    let stage = |harness: &Driven| {
        let Derived::Judged { results, .. } = doc(harness).derived() else { panic!("the box is sound") };
        let view = harness.state().as_ref().unwrap().view();
        view.stage_of(&results.cases[view.case_idx])
    };
    assert!(harness.query_by_label("State shown, sealed").is_none(), "without plates there is one state");
    press(&mut harness, "Add a plate");
    press(&mut harness, "Add an opening");
    press(&mut harness, "State shown, sealed");
    assert_eq!(stage(&harness), Stage::ALL[1]);
    press(&mut harness, "More of this case");
    press(&mut harness, "Then released");
    harness.key_press(Key::Escape);
    harness.run();
    press(&mut harness, "State shown, released");
    assert_eq!(stage(&harness), Stage::Released);
    run(&mut harness, Command::NextStage);
    assert_eq!(stage(&harness), Stage::ALL[0], "round again");
}

/// A plate in the middle of a box of 2 m by 1 m by 1 m, half full: two cells of 1 m3 that hold half of it.
#[test]
fn cells_are_listed_with_what_they_hold() {
    let mut harness = plain_box();
    press(&mut harness, "Add a plate");
    let words = "still 0.500 m³, capacity 1.00 m³, area 1.00 m²";
    assert_eq!(harness.query_all_by_label_contains(words).count(), 2);
}

/// Own materials are kept in the scenario; plates choose them by name, and follow it.
#[test]
fn own_materials_are_typed_chosen_renamed_and_kept() {
    let mut harness = plain_box();
    let before = doc(&harness).study().clone();
    press(&mut harness, "Add a material");
    for (label, text) in [
        ("Yield stress", "310"),
        ("Young's modulus", "195000"),
        ("Poisson's ratio", "0,29"),
        ("Its density", "7800"),
        ("Factor", "1.6"),
    ] {
        type_into(&mut harness, label, text);
    }
    type_text(&mut harness, "Material 1, material 1", "Name", "mill plate");
    type_text(&mut harness, "Material 1, mill plate", "Source", "mill sheet 7");
    let own = doc(&harness).study().materials[0].clone();
    assert_eq!((own.yield_pa, own.modulus_pa, own.poisson), (310e6, 195e9, 0.29));
    assert_eq!((own.density_kg_per_m3, own.factor, own.source.as_str()), (7800.0, 1.6, "mill sheet 7"));

    press(&mut harness, "Add a plate");
    choose(&mut harness, "From the table, choose", "mill plate");
    assert_eq!(plate(&harness).material, "mill plate");
    harness.get_by_label("Source of the material, mill sheet 7");
    assert!(harness.query_by_label("Take this material out").is_none(), "a plate uses it");
    harness.get_by_label_contains("Stays while it is used by plate 1");
    type_text(&mut harness, "Material 1, mill plate", "Name", "plate of heat 12");
    assert_eq!(plate(&harness).material, "plate of heat 12", "the plate follows the name");
    let study = doc(&harness).study().clone();
    let read = brimwright::scenario::parse(brimwright::scenario::write(&study).as_bytes());
    assert_eq!(read, Ok(study), "kept in the file");

    choose(&mut harness, "From the table, choose", "structural steel S235");
    press(&mut harness, "Take this material out");
    assert!(doc(&harness).study().materials.is_empty());
    // Added, five numbers, two texts, the plate, chosen, renamed, chosen, taken out.
    for _ in 0..13 {
        assert_ne!(*doc(&harness).study(), before);
        run(&mut harness, Command::Undo);
    }
    assert_eq!(*doc(&harness).study(), before);
}
