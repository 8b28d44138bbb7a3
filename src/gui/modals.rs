//! Questions and texts that stand before the window: unsaved changes, about and cautions.

use egui::{Align, Button, Frame, Id, Key, Layout, Modal, RichText};

use super::{Look, font};

/// Answer to the question what becomes of unsaved changes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Unsaved {
    /// Write them first.
    Save,
    /// Let them go.
    Discard,
    /// Stay.
    Cancel,
}

/// Asks what becomes of the unsaved changes of `title`.
pub fn unsaved_ui(ctx: &egui::Context, look: &Look, title: &str) -> Option<Unsaved> {
    let mut answer = None;
    let modal = modal("unsaved changes", look).show(ctx, |ui| {
        ui.set_width(380.0);
        ui.label(RichText::new("Unsaved changes").font(font::title()).color(look.ink));
        ui.label(RichText::new(format!("{title} has changes that are not in a file yet.")).color(look.ink2));
        ui.add_space(10.0);
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            let save = RichText::new("Save").color(look.on_accent);
            let save = ui.add(Button::new(save).fill(look.accent));
            if ui.memory(|m| m.focused().is_none()) {
                save.request_focus();
            }
            if save.clicked() {
                answer = Some(Unsaved::Save);
            }
            if ui.button("Discard the changes").clicked() {
                answer = Some(Unsaved::Discard);
            }
            if ui.button("Cancel").clicked() {
                answer = Some(Unsaved::Cancel);
            }
        });
    });
    answer.or(modal.should_close().then_some(Unsaved::Cancel))
}

/// What the program is, and the cautions. Gives whether it was closed.
pub fn about_ui(ctx: &egui::Context, look: &Look) -> bool {
    let mut is_closed = false;
    let modal = modal("about", look).show(ctx, |ui| {
        ui.set_width(520.0);
        ui.label(
            RichText::new(format!("brimwright {}", env!("CARGO_PKG_VERSION"))).font(font::title()).color(look.ink),
        );
        for paragraph in ABOUT {
            ui.label(RichText::new(*paragraph).color(look.ink2));
            ui.add_space(3.0);
        }
        ui.label(RichText::new("Cautions").font(font::heading()).color(look.ink));
        egui::ScrollArea::vertical().max_height(280.0).show(ui, |ui| {
            for paragraph in CAUTIONS {
                ui.label(RichText::new(*paragraph).color(look.ink));
                ui.add_space(3.0);
            }
        });
        ui.add_space(8.0);
        ui.with_layout(Layout::right_to_left(Align::Center), |ui| {
            is_closed = ui.button("Close").clicked() || ui.input(|i| i.key_pressed(Key::Enter));
        });
    });
    is_closed || modal.should_close()
}

/// A box before everything else; the rest of the window waits.
pub fn modal(id: &str, look: &Look) -> Modal {
    let frame = Frame::new().fill(look.raised).stroke((1.0, look.line)).corner_radius(4).inner_margin(18);
    Modal::new(Id::unique(id)).frame(frame)
}

/// What the program is.
pub const ABOUT: &[&str] = &[
    "Sizing baffles and freeboard in accelerating tanks. Free software under MIT or Apache-2.0.",
    "Fonts: Asap and STIX Two Text, under the SIL Open Font License 1.1.",
];

/// What it does not do.
pub const CAUTIONS: &[&str] = &[
    "This is a design aid. Spilled cargo, overpressure and roll-over can injure and kill: results are to be checked by \
     a licensed engineer, under the code that applies where the tank is built and used.",
    "A regulation is screened, never certified. Requirement records are numbers that somebody typed; confirm each \
     against the text and edition that applies.",
    "Judged here: the liquid settled under a steady acceleration, exactly, in a cross-section with a width law. Not \
     modelled: waves and their overshoot when an acceleration starts or stops, flow through openings, motion out of \
     the plane of the section, elastic walls, gas that is compressed in a shut space, boiling, and earthquakes.",
    "A steady verdict that holds does not show that a sudden start or stop holds: the first wave can rise to about \
     twice the settled tilt. Leave an allowance for it.",
    "Where a method is outside its range the verdict reads `not judged`. It has then neither held nor failed.",
];
