//! Scenario files and runs of the program for the tests of the command line.

use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};

use tempfile::TempDir;

/// An open tray, 2 m long, 1 m high and 0.5 m wide, with water; `cases` is the text of its load cases.
pub fn tray(level_mm: f64, cases: &str) -> String {
    format!(
        r#"(
    version: 1,
    title: "Tray",
    liquid: (name: "water", density_kg_per_m3: 1000),
    fill: level_mm({level_mm}),
    width: constant(width_mm: 500),
    outline: [
        (s_mm: 0, z_mm: 0, name: "floor"),
        (s_mm: 2000, z_mm: 0, name: "right wall"),
        (s_mm: 2000, z_mm: 1000, kind: mouth, name: "rim"),
        (s_mm: 0, z_mm: 1000, name: "left wall"),
    ],
    cases: [{cases}],
)
"#
    )
}

/// A load case with a sideways and an upward acceleration, m/s2.
pub fn case(name: &str, s: f64, z: f64) -> String {
    format!("(name: {name:?}, accel: components_m_per_s2(s: {s}, z: {z})),")
}

/// A folder with files, gone when dropped.
pub struct Folder(TempDir);

impl Folder {
    pub fn new() -> Folder {
        Folder(TempDir::new().expect("a folder for a test"))
    }

    /// Writes a file and says where it is.
    pub fn file(&self, name: &str, text: &str) -> PathBuf {
        let path = self.0.path().join(name);
        fs::write(&path, text).expect("a file for a test");
        path
    }

    pub fn path(&self, name: &str) -> PathBuf {
        self.0.path().join(name)
    }
}

/// The program, to be run from the project's root.
pub fn program() -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_brimwright"));
    command.current_dir(env!("CARGO_MANIFEST_DIR"));
    command
}

/// Runs `brimwright judge`.
pub fn judge<I: IntoIterator<Item = S>, S: AsRef<std::ffi::OsStr>>(arguments: I) -> Output {
    program().arg("judge").args(arguments).output().expect("the program runs")
}

/// The scenarios that come with the program, paths from the project's root.
pub fn shipped_scenarios() -> Vec<PathBuf> {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let mut files: Vec<PathBuf> = fs::read_dir(root.join("scenarios"))
        .expect("the folder scenarios")
        .map(|entry| entry.expect("an entry").path())
        .filter(|path| path.extension().is_some_and(|ext| ext == "ron"))
        .map(|path| path.strip_prefix(root).expect("below the root").to_owned())
        .collect();
    files.sort();
    assert!(!files.is_empty(), "scenarios is empty");
    files
}

pub fn stdout(output: &Output) -> &str {
    std::str::from_utf8(&output.stdout).expect("UTF-8")
}

pub fn stderr(output: &Output) -> &str {
    std::str::from_utf8(&output.stderr).expect("UTF-8")
}
