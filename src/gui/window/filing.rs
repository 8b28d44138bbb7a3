//! Opening, saving and leaving: nothing unsaved is lost unasked, and a file that cannot be read changes nothing.

use std::path::{Path, PathBuf};

use egui::{Ui, ViewportCommand};

use crate::app::{self, Derived, EXAMPLES, FileError};
use crate::gui::files::{EXTENSION, Purpose};
use crate::gui::pictures::Table;
use crate::gui::problems::FileTrouble;
use crate::gui::starter;
use crate::study::Study;

use super::{Window, title_or};

/// Something that would leave the open document behind.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Intent {
    New,
    Choose,
    Open(PathBuf),
    Example(usize),
    Close,
}

impl Window {
    /// Opens a file; where it cannot be read its problems are listed and the open document is kept.
    pub fn open(&mut self, path: &Path) {
        match app::load(path) {
            Ok(study) => {
                self.replace(study, Some(path.to_owned()));
                self.settings.remember(path);
                self.event = format!("opened {}", path.display());
            }
            Err(error) => self.trouble = Some(trouble(error, "opened")),
        }
    }

    pub(super) fn intend(&mut self, ctx: &egui::Context, intent: Intent) {
        self.intent = Some(intent);
        if self.doc.is_unsaved() {
            self.asks_unsaved = true;
        } else {
            self.carry_out(ctx);
        }
    }

    pub(super) fn carry_out(&mut self, ctx: &egui::Context) {
        match self.intent.take() {
            None => {}
            Some(Intent::New) => self.replace(starter::study(), None),
            Some(Intent::Choose) => self.chooser.ask(ctx, Purpose::Open, self.proposed_path()),
            Some(Intent::Open(path)) => self.open(&path),
            Some(Intent::Example(i)) => {
                if let Some(study) = example(i) {
                    self.replace(study, None);
                }
            }
            Some(Intent::Close) => {
                self.may_close = true;
                ctx.send_viewport_cmd(ViewportCommand::Close);
            }
        }
    }

    pub(super) fn save(&mut self, ctx: &egui::Context) {
        match self.doc.path.clone() {
            Some(path) => self.save_to(ctx, &path),
            None => self.chooser.ask(ctx, Purpose::Save, self.proposed_path()),
        }
    }

    pub(super) fn save_to(&mut self, ctx: &egui::Context, path: &Path) {
        match app::save_atomic(path, self.doc.study()) {
            Ok(()) => {
                self.doc.mark_saved(path.to_owned());
                self.settings.remember(path);
                self.event = format!("saved to {}", path.display());
                self.carry_out(ctx);
            }
            Err(error) => {
                self.intent = None;
                self.trouble = Some(trouble(error, "saved"));
            }
        }
    }

    /// Asks where a table shall go.
    pub(super) fn export(&mut self, ctx: &egui::Context, table: Table) {
        let path = self.proposed_path();
        let stem = path.file_stem().map_or_else(String::new, |stem| stem.to_string_lossy().into_owned());
        let path = path.with_file_name(format!("{stem}-{}.csv", table.file_word()));
        self.chooser.ask(ctx, Purpose::Table(table), path);
    }

    pub(super) fn export_to(&mut self, ctx: &egui::Context, table: Table, path: &Path) {
        match self.doc.derived() {
            Derived::Judged { study, .. } => self.pictures.export(ctx, study, self.view.case_idx, table, path),
            Derived::Faulty { .. } => self.event = "nothing was exported: the scenario has faults".to_owned(),
        }
    }

    pub(super) fn proposed_path(&self) -> PathBuf {
        if let Some(path) = &self.doc.path {
            return path.clone();
        }
        let title = title_or(self.doc.study(), "tank").to_lowercase();
        let name: String = title.chars().map(|c| if c.is_alphanumeric() { c } else { '-' }).collect();
        let folder = self.settings.recent.first().and_then(|path| path.parent()).unwrap_or(Path::new(""));
        folder.join(format!("{}.{EXTENSION}", name.trim_matches('-')))
    }

    pub(super) fn guard_close(&mut self, ctx: &egui::Context) {
        if ctx.input(|i| i.viewport().close_requested()) && !self.may_close {
            if self.doc.is_unsaved() {
                ctx.send_viewport_cmd(ViewportCommand::CancelClose);
                self.intend(ctx, Intent::Close);
            } else {
                self.may_close = true;
            }
        }
    }

    /// A file let go over the window is opened.
    pub(super) fn dropped_files(&mut self, ui: &Ui) {
        let path = ui.input(|i| {
            i.raw.dropped_files.iter().map(|file| file.path().to_owned()).find(|path| !path.as_os_str().is_empty())
        });
        if let Some(path) = path {
            self.intend(ui.ctx(), Intent::Open(path));
        }
    }
}

/// The study of an example of the program.
pub(super) fn example(i: usize) -> Option<Study> {
    EXAMPLES.get(i).and_then(|example| crate::scenario::parse(example.text.as_bytes()).ok())
}

fn trouble(error: FileError, verb: &str) -> FileTrouble {
    let title = format!("`{}` could not be {verb}", file_name(error.path()));
    FileTrouble { title, problems: error.into_problems() }
}

fn file_name(path: &Path) -> String {
    path.file_name().unwrap_or_default().to_string_lossy().into_owned()
}
