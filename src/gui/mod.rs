//! The window. It alone knows egui.

pub mod board;
pub mod font;
pub mod look;
pub mod marks;
mod view;

pub use look::Look;
pub use view::{Camera, Proposal, Selected, View};
