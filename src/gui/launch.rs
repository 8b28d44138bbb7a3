//! Starting the window. Whatever the system lacks, the answer is in words: what is missing, which package brings it,
//! and that a file can be judged without a window.

use std::panic::AssertUnwindSafe;
use std::path::{Path, PathBuf};
use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};
use std::sync::mpsc::channel;

use super::files::Dialogs;
use super::layout;
use super::settings::Settings;
use super::window::Window;

/// Opens the window, with the file at `path` if there is one, and returns when it is closed; else says in words why
/// there is no window.
pub fn launch(path: Option<PathBuf>) -> Result<(), String> {
    if cfg!(target_os = "linux") && !has_screen() {
        return Err(no_screen());
    }
    let options = eframe::NativeOptions {
        renderer: eframe::Renderer::Glow,
        viewport: egui::ViewportBuilder::default()
            .with_title("brimwright")
            .with_app_id("brimwright")
            .with_inner_size([1440.0, 900.0])
            .with_min_inner_size(layout::MIN_WINDOW),
        ..Default::default()
    };
    let has_started = Arc::new(AtomicBool::new(false));
    let started = has_started.clone();
    let run = move || {
        let make = move |cc: &eframe::CreationContext| {
            started.store(true, Ordering::Relaxed);
            Ok(Box::new(App::new(cc, path.as_deref())) as Box<dyn eframe::App>)
        };
        eframe::run_native("brimwright", options, Box::new(make))
    };
    match quietly(run) {
        Ok(Ok(())) => Ok(()),
        Ok(Err(error)) => Err(explain(&error.to_string(), is_installed)),
        Err(panic) if has_started.load(Ordering::Relaxed) => Err(format!(
            "The window stopped because of a fault in the program: {}\n  at {}\n{WITHOUT_A_WINDOW}",
            panic.words, panic.place
        )),
        // The libraries below the window panic where a part of the system is not installed.
        Err(panic) => Err(explain(&panic.words, is_installed)),
    }
}

/// The window as eframe drives it.
struct App {
    window: Window,
}

impl App {
    fn new(cc: &eframe::CreationContext, path: Option<&Path>) -> App {
        let settings = cc.storage.and_then(|s| eframe::get_value::<Settings>(s, eframe::APP_KEY)).unwrap_or_default();
        App { window: Window::new(&cc.egui_ctx, path, settings, Dialogs::Desktop) }
    }
}

impl eframe::App for App {
    fn ui(&mut self, ui: &mut egui::Ui, _: &mut eframe::Frame) {
        self.window.ui(ui);
    }

    fn save(&mut self, storage: &mut dyn eframe::Storage) {
        eframe::set_value(storage, eframe::APP_KEY, self.window.settings());
    }

    fn persist_egui_memory(&self) -> bool {
        false
    }
}

const WITHOUT_A_WINDOW: &str = "`brimwright judge FILE` judges a scenario without a window.";

/// A part of a Linux system that the window needs.
#[derive(Debug, PartialEq)]
struct Part {
    /// What it is for, in a word or two.
    words: &'static str,
    /// A file that is there when it is installed.
    file: &'static str,
    /// A word by which an error tells of it.
    sign: &'static str,
    /// The package on Debian and its relatives (tried out on Debian 12).
    debian: &'static str,
    /// The package on Fedora and its relatives (names from memory).
    fedora: &'static str,
}

const PARTS: &[Part] = &[
    part("X11 client", "libX11.so.6", "libX11.so", "libx11-6", "libX11"),
    part("X11 cursors", "libXcursor.so.1", "libXcursor", "libxcursor1", "libXcursor"),
    part("X11 input", "libXi.so.6", "libXi.so", "libxi6", "libXi"),
    part("X11 over XCB", "libX11-xcb.so.1", "libX11-xcb", "libx11-xcb1", "libX11-xcb"),
    part("keyboard", "libxkbcommon-x11.so.0", "libxkbcommon-x11", "libxkbcommon-x11-0", "libxkbcommon-x11"),
    part("EGL", "libEGL.so.1", "lutin", "libegl1", "libglvnd-egl"),
    part("OpenGL driver", "swrast_dri.so", "lutin", "libgl1-mesa-dri", "mesa-dri-drivers"),
];

const fn part(
    words: &'static str,
    file: &'static str,
    sign: &'static str,
    debian: &'static str,
    fedora: &'static str,
) -> Part {
    Part { words, file, sign, debian, fedora }
}

/// What a panic says, and where it was.
#[derive(Debug, PartialEq)]
struct Panic {
    words: String,
    place: String,
}

/// Runs something that may panic; gives what the panic says instead of printing it.
fn quietly<T>(run: impl FnOnce() -> T) -> Result<T, Panic> {
    let (send, panics) = channel();
    let before = std::panic::take_hook();
    std::panic::set_hook(Box::new(move |panic| {
        let words = panic.payload_as_str().unwrap_or("unknown").to_owned();
        let place = panic.location().map(ToString::to_string).unwrap_or_default();
        let _ = send.send(Panic { words, place });
    }));
    let ran = std::panic::catch_unwind(AssertUnwindSafe(run));
    std::panic::set_hook(before);
    ran.map_err(|_| {
        let unknown = || Panic { words: "unknown".to_owned(), place: String::new() };
        panics.try_iter().next().unwrap_or_else(unknown)
    })
}

fn has_screen() -> bool {
    ["DISPLAY", "WAYLAND_DISPLAY", "WAYLAND_SOCKET"]
        .iter()
        .any(|name| std::env::var_os(name).is_some_and(|value| !value.is_empty()))
}

fn no_screen() -> String {
    format!(
        "There is no screen to open a window on: neither DISPLAY nor WAYLAND_DISPLAY is set.\nStart brimwright from a \
         desktop session, or over `ssh -X`.\n{WITHOUT_A_WINDOW}"
    )
}

/// Whether a library or driver is in the loader's list or in one of its usual folders.
fn is_installed(file: &str) -> bool {
    let in_list = std::fs::read("/etc/ld.so.cache")
        .is_ok_and(|list| list.windows(file.len()).any(|window| window == file.as_bytes()));
    let named = std::env::var_os("LD_LIBRARY_PATH").unwrap_or_default();
    let usual = ["/usr/lib", "/usr/lib64", "/lib", "/lib64", "/usr/local/lib"].map(PathBuf::from);
    let folders = std::env::split_paths(&named).chain(usual).flat_map(|folder| {
        let triplet = folder.join(format!("{}-linux-gnu", std::env::consts::ARCH));
        [triplet.join("dri"), folder.join("dri"), triplet, folder]
    });
    in_list || folders.into_iter().any(|folder| folder.join(file).exists())
}

fn explain(error: &str, is_installed: impl Fn(&str) -> bool) -> String {
    // Some messages begin with a place in the source of a library.
    let error =
        error.rsplit_once(".rs:").and_then(|(_, rest)| rest.split_once(": ")).map_or(error, |(_, words)| words);
    let mut lines = vec![format!("The window could not be opened: {error}")];
    if cfg!(target_os = "linux") {
        let mut parts: Vec<&Part> =
            PARTS.iter().filter(|part| error.contains(part.sign) || !is_installed(part.file)).collect();
        if parts.is_empty() {
            parts = PARTS.iter().collect();
            lines.push(format!("Is the screen there that {} names, and may you use it?", screen()));
            lines.push(
                "No part of the system seems to be missing. These packages bring what a window needs:".to_owned(),
            );
        } else {
            lines.push("These parts of the system seem to be missing or broken:".to_owned());
            lines.extend(parts.iter().map(|part| format!("  {} ({})", part.words, part.file)));
        }
        let names = |of: fn(&Part) -> &'static str| parts.iter().map(|p| of(p)).collect::<Vec<_>>().join(" ");
        lines.push(format!("  Debian, Ubuntu: sudo apt-get install {}", names(|p| p.debian)));
        lines.push(format!("  Fedora: sudo dnf install {}", names(|p| p.fedora)));
    }
    lines.push(WITHOUT_A_WINDOW.to_owned());
    lines.join("\n")
}

/// `DISPLAY=:0`, or the variable alone where it is not set.
fn screen() -> String {
    let set = |name: &str| std::env::var(name).ok().filter(|value| !value.is_empty());
    let named = |name: &&str| set(name).map(|value| format!("{name}={value}"));
    ["WAYLAND_DISPLAY", "DISPLAY"].iter().find_map(named).unwrap_or_else(|| "DISPLAY".to_owned())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_panic_below_the_window_becomes_words() {
        let got = quietly(|| -> u8 { panic!("Library {} could not be loaded.", "libxkbcommon-x11.so") });
        let panic = got.unwrap_err();
        assert_eq!(panic.words, "Library libxkbcommon-x11.so could not be loaded.");
        assert!(panic.place.contains("launch.rs"), "{panic:?}");
        assert_eq!(quietly(|| 7), Ok(7));
    }

    #[cfg(target_os = "linux")]
    #[test]
    fn what_is_missing_is_named_with_its_packages() {
        let keyboard =
            ["apt-get install libxkbcommon-x11-0\n", "dnf install libxkbcommon-x11\n", "brimwright judge FILE"];
        for text in [
            explain("no keyboard", |file| file != "libxkbcommon-x11.so.0"),
            explain("Library libxkbcommon-x11.so could not be loaded.", |_| true),
        ] {
            for part in keyboard {
                assert!(text.contains(part), "`{part}` is not in:\n{text}");
            }
        }
        let text = explain("NoGlutinConfigs(..)", |_| true);
        assert!(text.contains("apt-get install libegl1 libgl1-mesa-dri\n"), "{text}");
        let text = explain("os error at /home/someone/lib.rs:12: no connection", |_| true);
        assert!(text.contains("opened: no connection") && !text.contains("someone"), "{text}");
        assert!(no_screen().contains("brimwright judge FILE"));
    }
}
