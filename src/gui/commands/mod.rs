//! The one table of commands: text, shortcut, tooltip, when each can be used. Menus and keys read it; the window
//! carries it out.

mod when;

use egui::{Key, KeyboardShortcut, Modifiers, ThemePreference};

use crate::app::Document;
use crate::units::UnitSystem;

use super::View;
use super::pictures::Table;

use when::{
    always, can_delete, can_redo, can_save, can_undo, has_acceleration, has_case, has_case_after, has_case_before,
    has_cases, has_plate, has_spaced_plates, has_stages, is_judged,
};

/// Something that the user can ask for from a menu or with a key.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Command {
    /// A plain box to start from.
    New,
    /// Choose a scenario file and open it.
    Open,
    /// Open an example by its place in the list.
    OpenExample(usize),
    /// Open a recent file by its place in the list.
    OpenRecent(usize),
    /// Write to the file it came from.
    Save,
    /// Choose a file and write to it.
    SaveAs,
    /// Choose a file and write a table to it.
    Export(Table),
    /// Leave.
    Quit,
    /// Take the last step back.
    Undo,
    /// Bring the last undone step back.
    Redo,
    /// Take up the pen that draws a plate, or put it away.
    DrawPlate,
    /// A copy of the chosen plate beside it.
    DuplicatePlate,
    /// All plates at equal distances.
    SpacePlates,
    /// Delete what is chosen on the board.
    DeleteSelected,
    /// Show the whole section.
    FitBoard,
    /// The board shows the next state of the case: under the other bound, or released.
    NextStage,
    /// Units shown.
    Units(UnitSystem),
    /// Light, dark, or as the system says.
    Theme(ThemePreference),
    /// Columns and plots back to their first sizes.
    ResetSizes,
    /// A case at rest at the end of the strip.
    AddCase,
    /// A copy of the chosen case.
    DuplicateCase,
    /// Delete the chosen case.
    DeleteCase,
    /// Choose the next case.
    NextCase,
    /// Choose the case before.
    PreviousCase,
    /// Move the chosen case one place to the left.
    MoveCaseLeft,
    /// Move the chosen case one place to the right.
    MoveCaseRight,
    /// The settled state of the chosen case in numbers.
    Loads,
    /// What the program is, and what it does not do.
    About,
}

/// A menu of the header.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Menu {
    /// Files.
    File,
    /// The study.
    Edit,
    /// What is shown.
    View,
    /// Load cases.
    Case,
    /// About.
    Help,
}

impl Menu {
    /// In the order shown.
    pub const ALL: [Menu; 5] = [Menu::File, Menu::Edit, Menu::View, Menu::Case, Menu::Help];

    /// The word in the header.
    pub fn word(self) -> &'static str {
        match self {
            Menu::File => "File",
            Menu::Edit => "Edit",
            Menu::View => "View",
            Menu::Case => "Case",
            Menu::Help => "Help",
        }
    }
}

/// One row of the table.
pub struct Row {
    /// What it does.
    pub command: Command,
    /// Where it stands.
    pub menu: Menu,
    /// Its words.
    pub text: &'static str,
    /// Its key.
    pub shortcut: Option<KeyboardShortcut>,
    /// What it does, in a sentence.
    pub tooltip: &'static str,
    /// When it can be used.
    pub is_enabled: fn(&Document, &View) -> bool,
    /// A rule stands above it.
    pub starts_group: bool,
}

const NO: Option<KeyboardShortcut> = None;
const CTRL: Modifiers = Modifiers::COMMAND;
const CTRL_SHIFT: Modifiers = Modifiers { shift: true, ..Modifiers::COMMAND };

/// All commands with a fixed text, in the order of the menus.
pub const TABLE: &[Row] = &[
    row(Command::New, Menu::File, "New", on(CTRL, Key::N), "Start from a plain box of water", always),
    row(Command::Open, Menu::File, "Open…", on(CTRL, Key::O), "Open a scenario file", always),
    group(Command::Save, Menu::File, "Save", on(CTRL, Key::S), "Write the scenario to its file", can_save),
    row(
        Command::SaveAs,
        Menu::File,
        "Save as…",
        on(CTRL_SHIFT, Key::S),
        "Write the scenario to another file",
        always,
    ),
    group(
        Command::Export(Table::FillMap),
        Menu::File,
        "Export the fill map…",
        NO,
        "Write fill against acceleration of the chosen case as comma-separated values",
        has_acceleration,
    ),
    row(
        Command::Export(Table::Envelope),
        Menu::File,
        "Export the hold envelope…",
        NO,
        "Write the largest acceleration that holds in every direction as comma-separated values",
        is_judged,
    ),
    group(Command::Quit, Menu::File, "Quit", on(CTRL, Key::Q), "Close the window", always),
    row(Command::Undo, Menu::Edit, "Undo", on(CTRL, Key::Z), "Take the last step back", can_undo),
    row(Command::Redo, Menu::Edit, "Redo", on(CTRL_SHIFT, Key::Z), "Bring the last undone step back", can_redo),
    group(
        Command::DrawPlate,
        Menu::Edit,
        "Draw a plate",
        on(Modifiers::NONE, Key::P),
        "Drag from wall to wall on the board; an end may stay free",
        always,
    ),
    row(
        Command::DuplicatePlate,
        Menu::Edit,
        "Duplicate the plate",
        on(CTRL_SHIFT, Key::D),
        "A copy of the chosen plate beside it, from wall to wall like the first",
        has_plate,
    ),
    row(
        Command::SpacePlates,
        Menu::Edit,
        "Space the plates equally",
        NO,
        "Move the plates to equal distances; ends on walls stay on them",
        has_spaced_plates,
    ),
    group(
        Command::DeleteSelected,
        Menu::Edit,
        "Delete what is chosen",
        on(Modifiers::NONE, Key::Delete),
        "Take out the vertex, plate, opening, obstacle or point that is chosen on the board",
        can_delete,
    ),
    row(
        Command::FitBoard,
        Menu::View,
        "Fit the section",
        on(Modifiers::NONE, Key::Home),
        "Show the whole section on the board",
        always,
    ),
    row(
        Command::NextStage,
        Menu::View,
        "Show the next state",
        on(Modifiers::NONE, Key::B),
        "Settled: levels have evened out through the openings. Sealed: nothing passes them. Released: back at rest",
        has_stages,
    ),
    row(
        Command::ResetSizes,
        Menu::View,
        "Reset the columns",
        NO,
        "Columns and plots back to their first sizes",
        always,
    ),
    group(
        Command::Units(UnitSystem::Si),
        Menu::View,
        "SI units",
        NO,
        "Show millimetres and kilopascals; the study stays as it is",
        always,
    ),
    row(
        Command::Units(UnitSystem::UsCustomary),
        Menu::View,
        "US customary units",
        NO,
        "Show inches and pounds; the study stays as it is",
        always,
    ),
    group(Command::Theme(ThemePreference::Light), Menu::View, "Light", NO, "Pale paper", always),
    row(Command::Theme(ThemePreference::Dark), Menu::View, "Dark", NO, "The same by night", always),
    row(
        Command::Theme(ThemePreference::System),
        Menu::View,
        "As the system",
        NO,
        "Light or dark as the system says",
        always,
    ),
    row(
        Command::AddCase,
        Menu::Case,
        "Add a load case",
        on(CTRL_SHIFT, Key::N),
        "A case at rest, at the end",
        always,
    ),
    row(Command::DuplicateCase, Menu::Case, "Duplicate", on(CTRL, Key::D), "Copy the chosen case", has_case),
    row(
        Command::DeleteCase,
        Menu::Case,
        "Delete the case",
        on(CTRL, Key::Delete),
        "Take the chosen case out",
        has_case,
    ),
    group(
        Command::NextCase,
        Menu::Case,
        "Next case",
        on(Modifiers::NONE, Key::PageDown),
        "Choose the next case",
        has_cases,
    ),
    row(
        Command::PreviousCase,
        Menu::Case,
        "Previous case",
        on(Modifiers::NONE, Key::PageUp),
        "Choose the case before",
        has_cases,
    ),
    row(
        Command::MoveCaseLeft,
        Menu::Case,
        "Move left",
        on(CTRL, Key::PageUp),
        "Move the chosen case one place to the left",
        has_case_before,
    ),
    row(
        Command::MoveCaseRight,
        Menu::Case,
        "Move right",
        on(CTRL, Key::PageDown),
        "Move the chosen case one place to the right",
        has_case_after,
    ),
    group(
        Command::Loads,
        Menu::Case,
        "Settled state and loads",
        on(CTRL, Key::L),
        "Volumes, centroid, pressure, and the load on every edge",
        has_case,
    ),
    row(
        Command::About,
        Menu::Help,
        "About and cautions",
        on(Modifiers::NONE, Key::F1),
        "What it is, and what it does not do",
        always,
    ),
];

impl Row {
    /// The words shown now: undo says what it would take back.
    pub fn words(&self, doc: &Document) -> String {
        let label = match self.command {
            Command::Undo => doc.undo_label(),
            Command::Redo => doc.redo_label(),
            _ => None,
        };
        match label {
            Some(label) => format!("{} {}", self.text, lower_first(label)),
            None => self.text.to_owned(),
        }
    }
}

/// The commands whose keys were pressed. While a text is typed, keys are its own save those of files and help.
pub fn pressed(ctx: &egui::Context, doc: &Document, view: &View) -> Vec<Command> {
    let is_typing = ctx.text_edit_focused();
    let mut rows: Vec<&Row> = TABLE.iter().filter(|row| row.shortcut.is_some()).collect();
    // The fullest set of modifiers first: egui takes Ctrl+Shift+Z for Ctrl+Z too.
    rows.sort_by_key(|row| row.shortcut.map_or(0, |s| u8::from(!s.modifiers.shift)));
    let mut out = Vec::new();
    for row in rows {
        let Some(shortcut) = row.shortcut else { continue };
        if is_typing && !matches!(row.menu, Menu::File | Menu::Help) {
            continue;
        }
        if (row.is_enabled)(doc, view) && ctx.input_mut(|i| i.consume_shortcut(&shortcut)) {
            out.push(row.command);
        }
    }
    out
}

const fn row(
    command: Command,
    menu: Menu,
    text: &'static str,
    shortcut: Option<KeyboardShortcut>,
    tooltip: &'static str,
    is_enabled: fn(&Document, &View) -> bool,
) -> Row {
    Row { command, menu, text, shortcut, tooltip, is_enabled, starts_group: false }
}

const fn group(
    command: Command,
    menu: Menu,
    text: &'static str,
    shortcut: Option<KeyboardShortcut>,
    tooltip: &'static str,
    is_enabled: fn(&Document, &View) -> bool,
) -> Row {
    Row { starts_group: true, ..row(command, menu, text, shortcut, tooltip, is_enabled) }
}

const fn on(modifiers: Modifiers, key: Key) -> Option<KeyboardShortcut> {
    Some(KeyboardShortcut::new(modifiers, key))
}

pub(super) fn lower_first(text: &str) -> String {
    let mut chars = text.chars();
    chars.next().map(|c| c.to_lowercase().chain(chars).collect()).unwrap_or_default()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn no_two_commands_share_a_key() {
        for (i, a) in TABLE.iter().enumerate() {
            for b in &TABLE[i + 1..] {
                assert!(
                    a.shortcut.is_none() || a.shortcut != b.shortcut,
                    "`{}` and `{}` share {:?}",
                    a.text,
                    b.text,
                    a.shortcut
                );
                assert_ne!(a.command, b.command, "`{}` stands twice", a.text);
                assert!(a.menu != b.menu || a.text != b.text, "two rows read `{}`", a.text);
            }
        }
    }

    #[test]
    fn every_menu_has_a_row_and_every_row_words() {
        for menu in Menu::ALL {
            assert!(TABLE.iter().any(|row| row.menu == menu), "{menu:?} is empty");
        }
        for row in TABLE {
            assert!(!row.text.is_empty() && row.tooltip.len() > 5, "{:?}", row.command);
        }
    }
}
