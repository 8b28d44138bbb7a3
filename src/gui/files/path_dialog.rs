//! The window's own file dialog: a list of folders and scenario files, and a path that can be typed.

use std::path::{Path, PathBuf};

use egui::{Key, Ui, vec2};

use super::Purpose;
use crate::gui::{Look, font, modals};

/// What the dialog says at the end of a frame.
pub(super) enum Answer {
    /// Still open.
    None,
    /// Closed without a choice.
    CalledOff,
    /// This file.
    Path(PathBuf),
}

/// An open dialog.
#[derive(Debug)]
pub(super) struct PathDialog {
    purpose: Purpose,
    folder: PathBuf,
    entries: Vec<Entry>,
    trouble: Option<String>,
    text: String,
    asks_to_overwrite: Option<PathBuf>,
}

#[derive(Debug, PartialEq, Eq, PartialOrd, Ord)]
struct Entry {
    is_file: bool,
    name: String,
}

impl PathDialog {
    pub(super) fn new(purpose: Purpose, start: &Path) -> PathDialog {
        let (folder, name) = folder_and_name(start);
        let text = if purpose == Purpose::Open { String::new() } else { name };
        let mut dialog =
            PathDialog { purpose, folder, entries: Vec::new(), trouble: None, text, asks_to_overwrite: None };
        dialog.list();
        dialog
    }

    pub(super) fn purpose(&self) -> Purpose {
        self.purpose
    }

    pub(super) fn ui(&mut self, ctx: &egui::Context, look: &Look) -> Answer {
        let mut answer = Answer::None;
        let modal = modals::modal("path dialog", look).show(ctx, |ui| {
            ui.set_width(520.0);
            answer = self.contents_ui(ui, look);
        });
        if modal.should_close() && matches!(answer, Answer::None) { Answer::CalledOff } else { answer }
    }

    fn contents_ui(&mut self, ui: &mut Ui, look: &Look) -> Answer {
        let (title, verb) = match self.purpose {
            Purpose::Open => ("Open a scenario", "Open"),
            Purpose::Save => ("Save the scenario", "Save"),
            Purpose::Table(_) => ("Export a table", "Export"),
        };
        ui.label(egui::RichText::new(title).font(font::title()).color(look.ink));
        ui.label(egui::RichText::new(self.folder.to_string_lossy()).font(font::small()).color(look.ink2));
        ui.add_space(4.0);
        let mut chosen = None;
        egui::ScrollArea::vertical().max_height(260.0).auto_shrink([false, false]).show(ui, |ui| {
            ui.spacing_mut().item_spacing.y = 0.0;
            if self.folder.parent().is_some() && ui.selectable_label(false, "Folder above").clicked() {
                chosen = self.folder.parent().map(Path::to_owned);
            }
            for entry in &self.entries {
                let words = if entry.is_file { entry.name.clone() } else { format!("{}/", entry.name) };
                if ui.selectable_label(entry.is_file && self.text == entry.name, words).clicked() {
                    chosen = Some(self.folder.join(&entry.name));
                }
            }
        });
        let mut answer = match chosen {
            Some(path) if path.is_dir() => {
                self.enter(path);
                Answer::None
            }
            Some(path) => {
                self.text = path.file_name().unwrap_or_default().to_string_lossy().into_owned();
                if self.purpose == Purpose::Open { Answer::Path(path) } else { Answer::None }
            }
            None => Answer::None,
        };
        ui.add_space(4.0);
        ui.label(egui::RichText::new("File name, or a whole path").font(font::small()).color(look.ink2));
        let field = egui::TextEdit::singleline(&mut self.text).desired_width(f32::INFINITY).min_size(vec2(0.0, 24.0));
        let response = ui.name_inputs("File name or path", |ui| ui.add(field));
        if response.changed() {
            self.asks_to_overwrite = None;
            self.trouble = None;
        }
        let entered = response.lost_focus() && ui.input(|i| i.key_pressed(Key::Enter));
        if let Some(trouble) = &self.trouble {
            let color = look.state(crate::analysis::State::Fails);
            ui.label(egui::RichText::new(trouble).font(font::small()).color(color));
        }
        ui.add_space(8.0);
        ui.with_layout(egui::Layout::right_to_left(egui::Align::Center), |ui| {
            let verb = if self.asks_to_overwrite.is_some() { "Replace the file" } else { verb };
            if ui.button(verb).clicked() || entered {
                answer = self.take_text();
            }
            if ui.button("Cancel").clicked() {
                answer = Answer::CalledOff;
            }
        });
        answer
    }

    /// What the typed text means: a folder to enter, or the file.
    fn take_text(&mut self) -> Answer {
        let text = self.text.trim();
        if text.is_empty() {
            self.trouble = Some("Type a file name, or choose a file above".to_owned());
            return Answer::None;
        }
        let mut path = self.folder.join(text);
        if path.is_dir() {
            self.enter(path);
            self.text.clear();
            return Answer::None;
        }
        if self.purpose == Purpose::Open {
            if path.is_file() {
                return Answer::Path(path);
            }
            self.trouble = Some(format!("There is no file `{}`", path.display()));
            return Answer::None;
        }
        if path.extension().is_none() {
            path.set_extension(self.purpose.extension());
        }
        if !path.parent().is_some_and(Path::is_dir) {
            self.trouble = Some(format!("There is no folder `{}`", path.parent().unwrap_or(&path).display()));
            return Answer::None;
        }
        if path.exists() && self.asks_to_overwrite.as_deref() != Some(&path) {
            self.trouble = Some(format!("`{}` is there already", path.display()));
            self.asks_to_overwrite = Some(path);
            return Answer::None;
        }
        Answer::Path(path)
    }

    fn enter(&mut self, folder: PathBuf) {
        self.folder = folder;
        self.trouble = None;
        self.asks_to_overwrite = None;
        self.list();
    }

    fn list(&mut self) {
        self.entries.clear();
        let entries = match std::fs::read_dir(&self.folder) {
            Ok(entries) => entries,
            Err(error) => {
                self.trouble = Some(format!("{}: {error}", self.folder.display()));
                return;
            }
        };
        for entry in entries.flatten() {
            let path = entry.path();
            let name = entry.file_name().to_string_lossy().into_owned();
            let is_wanted = path.extension().is_some_and(|e| e == self.purpose.extension());
            if !name.starts_with('.') && (path.is_dir() || is_wanted) {
                self.entries.push(Entry { is_file: !path.is_dir(), name });
            }
        }
        self.entries.sort();
    }
}

/// The folder to start in, and the name to propose; the home or present folder where `start` says none.
pub(super) fn folder_and_name(start: &Path) -> (PathBuf, String) {
    let name = start.file_name().unwrap_or_default().to_string_lossy().into_owned();
    let folder = start.parent().filter(|folder| folder.is_dir()).map(Path::to_owned);
    let folder = folder
        .or_else(|| std::env::current_dir().ok())
        .or_else(|| std::env::var_os("HOME").map(PathBuf::from))
        .unwrap_or_else(|| PathBuf::from("/"));
    (folder, name)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn typed_paths_are_folders_to_enter_or_files_to_take() {
        let dir = tempfile::tempdir().unwrap();
        std::fs::create_dir(dir.path().join("old")).unwrap();
        std::fs::write(dir.path().join("a.ron"), "").unwrap();
        std::fs::write(dir.path().join("picture.png"), "").unwrap();
        let mut open = PathDialog::new(Purpose::Open, &dir.path().join("x.ron"));
        let names: Vec<&str> = open.entries.iter().map(|e| e.name.as_str()).collect();
        assert_eq!(names, ["old", "a.ron"], "folders first, scenario files only");

        let mut take = |text: &str| {
            text.clone_into(&mut open.text);
            match open.take_text() {
                Answer::Path(path) => path.file_name().map(|n| n.to_string_lossy().into_owned()),
                _ => None,
            }
        };
        assert_eq!(take("a.ron").as_deref(), Some("a.ron"));
        assert_eq!(take("missing.ron"), None);
        assert_eq!(take(""), None);
        assert_eq!(take("old"), None);
        assert!(open.folder.ends_with("old"), "a folder is entered");
    }

    #[test]
    fn saving_adds_the_ending_and_asks_before_it_replaces() {
        let dir = tempfile::tempdir().unwrap();
        std::fs::write(dir.path().join("a.ron"), "").unwrap();
        let mut save = PathDialog::new(Purpose::Save, &dir.path().join("a"));
        assert!(matches!(save.take_text(), Answer::None), "asks first");
        assert!(matches!(save.take_text(), Answer::Path(path) if path.ends_with("a.ron")));
        save.text = "b".to_owned();
        assert!(matches!(save.take_text(), Answer::Path(path) if path.ends_with("b.ron")));
    }
}
