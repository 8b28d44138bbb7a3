//! The window. It alone knows egui.

mod view;

pub use view::{Camera, Proposal, Selected, View};
