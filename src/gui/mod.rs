//! The window. It alone knows egui.
//!
//! Panels read the document and propose; [`Window`] applies what they proposed at the end of the frame. Nobody but
//! [`look`] writes a colour, nobody but [`commands`] a shortcut.

pub mod board;
mod case_head;
mod cell;
pub mod commands;
mod desk;
mod field;
mod files;
mod font;
mod formula;
mod header;
mod launch;
mod layout;
mod loads;
pub mod look;
mod marks;
mod modals;
mod number;
mod pictures;
mod plating;
mod plots;
mod problems;
mod selected;
mod settings;
mod stage;
mod starter;
mod status;
mod strip;
mod tank;
mod verdicts;
mod view;
mod window;
mod working;

pub use commands::Command;
pub use desk::Desk;
pub use files::Dialogs;
pub use launch::launch;
pub use look::Look;
pub use pictures::Table;
pub use selected::Selected;
pub use settings::Settings;
pub use stage::Stage;
pub use view::{Camera, Pen, Proposal, VerdictAt, View};
pub use window::Window;
