//! The board: placeholder until the drawing area lands.

use crate::analysis::Results;
use crate::app::Document;
use crate::study::ValidStudy;

use super::{Look, Proposal, View};

/// The drawing area.
pub fn board_ui(ui: &mut egui::Ui, _: &Document, _: &mut View, look: &Look, _: &mut Vec<Proposal>) {
    ui.painter().rect_filled(ui.max_rect(), 0.0, look.board);
}

/// A small drawing of the section under one case.
pub fn thumbnail_ui(painter: &egui::Painter, rect: egui::Rect, _: &ValidStudy, _: &Results, _: usize, look: &Look) {
    painter.rect_filled(rect, 0.0, look.pressure_at(0.3));
}
