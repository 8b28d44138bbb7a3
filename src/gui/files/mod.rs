//! Choosing a file: the desktop's own dialog on a thread, or a dialog in the window where the desktop has none.
//!
//! Knows no document. It gives a path; reading and writing are the document's.

mod path_dialog;

use std::path::{Path, PathBuf};
use std::sync::mpsc::{Receiver, channel};
use std::time::{Duration, Instant};

use super::Look;
use super::pictures::Table;
use path_dialog::{Answer, PathDialog};

/// What a file is chosen for.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Purpose {
    /// To read it.
    Open,
    /// To write it.
    Save,
    /// To write a table.
    Table(Table),
}

impl Purpose {
    /// Ending of the files that it is about.
    fn extension(self) -> &'static str {
        match self {
            Purpose::Open | Purpose::Save => EXTENSION,
            Purpose::Table(_) => "csv",
        }
    }

    /// What a dialog calls them.
    fn kind(self) -> &'static str {
        match self {
            Purpose::Open | Purpose::Save => "brimwright scenario",
            Purpose::Table(_) => "table",
        }
    }
}

/// Where file dialogs come from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Dialogs {
    /// The desktop's, where it answers.
    Desktop,
    /// Always the window's own.
    Own,
}

/// Ending of a scenario file.
pub const EXTENSION: &str = "ron";

/// Nobody calls a dialog off within this time: the desktop had none to show.
const NO_DIALOG: Duration = Duration::from_millis(250);

/// The chooser: idle, or waiting for one of the two dialogs.
#[derive(Debug)]
pub struct FileChooser {
    dialogs: Dialogs,
    state: State,
}

#[derive(Debug)]
enum State {
    Idle,
    Desktop { answer: Receiver<Option<PathBuf>>, asked: Instant, purpose: Purpose, start: PathBuf },
    Own(PathDialog),
}

/// What was chosen.
pub type Chosen = (Purpose, Option<PathBuf>);

impl FileChooser {
    /// An idle chooser.
    pub fn new(dialogs: Dialogs) -> FileChooser {
        FileChooser { dialogs, state: State::Idle }
    }

    /// Asks for a file; `start` is the file or folder to start from.
    pub fn ask(&mut self, ctx: &egui::Context, purpose: Purpose, start: PathBuf) {
        self.state = match self.dialogs {
            Dialogs::Desktop if desktop_may_answer() => {
                State::Desktop { answer: ask_desktop(ctx, purpose, &start), asked: Instant::now(), purpose, start }
            }
            _ => State::Own(PathDialog::new(purpose, &start)),
        };
    }

    /// Whether a dialog is open.
    pub fn is_open(&self) -> bool {
        !matches!(self.state, State::Idle)
    }

    /// Shows the window's own dialog if it is the one in use, and gives the answer once there is one.
    pub fn ui(&mut self, ctx: &egui::Context, look: &Look) -> Option<Chosen> {
        match &mut self.state {
            State::Idle => None,
            State::Desktop { answer, asked, purpose, start } => {
                let purpose = *purpose;
                let path = match answer.try_recv() {
                    Err(std::sync::mpsc::TryRecvError::Empty) => {
                        ctx.request_repaint_after(Duration::from_millis(100));
                        return None;
                    }
                    Ok(None) if asked.elapsed() < NO_DIALOG => {
                        self.state = State::Own(PathDialog::new(purpose, start));
                        return None;
                    }
                    Ok(path) => path,
                    Err(std::sync::mpsc::TryRecvError::Disconnected) => None,
                };
                self.state = State::Idle;
                Some((purpose, path))
            }
            State::Own(dialog) => {
                let purpose = dialog.purpose();
                let path = match dialog.ui(ctx, look) {
                    Answer::None => return None,
                    Answer::CalledOff => None,
                    Answer::Path(path) => Some(path),
                };
                self.state = State::Idle;
                Some((purpose, path))
            }
        }
    }
}

fn ask_desktop(ctx: &egui::Context, purpose: Purpose, start: &Path) -> Receiver<Option<PathBuf>> {
    let (send, answer) = channel();
    let (ctx, start) = (ctx.clone(), start.to_owned());
    let spawned = std::thread::Builder::new().name("file dialog".to_owned()).spawn(move || {
        let (folder, name) = path_dialog::folder_and_name(&start);
        let mut dialog =
            rfd::FileDialog::new().add_filter(purpose.kind(), &[purpose.extension()]).set_directory(folder);
        if purpose != Purpose::Open {
            dialog = dialog.set_file_name(name);
        }
        let path = match purpose {
            Purpose::Open => dialog.pick_file(),
            Purpose::Save | Purpose::Table(_) => dialog.save_file(),
        };
        // The window may be gone by now; then nobody waits for the answer.
        let _ = send.send(path);
        ctx.request_repaint();
    });
    // Without a thread the channel is closed, which reads as a dialog called off.
    drop(spawned);
    answer
}

/// On Linux the desktop's dialog needs a session bus; without one it answers `nothing chosen` without a word.
fn desktop_may_answer() -> bool {
    if !cfg!(target_os = "linux") {
        return true;
    }
    let bus_of_runtime_dir = std::env::var_os("XDG_RUNTIME_DIR").map(|dir| Path::new(&dir).join("bus"));
    std::env::var_os("DBUS_SESSION_BUS_ADDRESS").is_some_and(|address| !address.is_empty())
        || bus_of_runtime_dir.is_some_and(|bus| bus.exists())
}
