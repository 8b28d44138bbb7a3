//! The rules of the house that a compiler does not hold: arrows between modules, who prints, who knows the
//! screen, how long a file may be, what lies at the top level. DEVELOPERS.md gives the reasons.

use std::collections::BTreeSet;
use std::fs;
use std::path::{Path, PathBuf};

use brimwright::sources;

/// Which modules a module may use, from the bottom up: a row names only modules of rows above it.
/// DEVELOPERS.md shows the same table.
const ARROWS: &[(&str, &[&str])] = &[
    ("units", &[]),
    ("sources", &[]),
    ("problem", &[]),
    ("progress", &[]),
    ("num", &[]),
    ("flow", &["num"]),
    ("geom", &["num"]),
    ("section", &["problem", "num", "geom"]),
    ("liquid", &[]),
    ("material", &[]),
    ("cases", &["geom"]),
    ("statics", &["problem", "num", "geom", "section"]),
    ("plates", &["num", "geom", "section", "material", "statics"]),
    ("study", &["units", "problem", "geom", "section", "liquid", "material", "cases", "statics"]),
    (
        "criteria",
        &[
            "units", "sources", "problem", "progress", "num", "flow", "geom", "section", "material", "cases",
            "statics", "plates", "study",
        ],
    ),
    (
        "analysis",
        &[
            "units", "problem", "progress", "num", "flow", "geom", "section", "cases", "statics", "plates", "study",
            "criteria",
        ],
    ),
    ("scenario", &["units", "problem", "geom", "section", "liquid", "material", "cases", "study"]),
    ("report", &["units", "sources", "problem", "geom", "section", "liquid", "cases", "study", "analysis"]),
    (
        "app",
        &["problem", "progress", "geom", "section", "liquid", "material", "cases", "study", "analysis", "scenario"],
    ),
    (
        "gui",
        &[
            "units", "problem", "progress", "geom", "section", "liquid", "material", "cases", "study", "analysis",
            "scenario", "report", "app",
        ],
    ),
    ("cli", &["units", "problem", "progress", "study", "analysis", "report", "app", "gui"]),
];

/// Lines that a file may have.
const LONGEST_FILE: usize = 450;

#[test]
fn modules_use_only_what_the_table_of_arrows_allows() {
    let mut faults = vec![];
    for (file, text) in rust_files("src") {
        let module = module_of(&file);
        if ["lib", "main"].contains(&module.as_str()) {
            continue;
        }
        let Some((_, allowed)) = ARROWS.iter().find(|(name, _)| *name == module) else {
            faults.push(format!("{}: module {module} is not in the table", file.display()));
            continue;
        };
        for used in used_modules(&text) {
            if used != module && !allowed.contains(&used.as_str()) {
                faults.push(format!("{}: {module} must not use {used}", file.display()));
            }
        }
    }
    assert!(faults.is_empty(), "{}", faults.join("\n"));
}

#[test]
fn the_table_of_arrows_points_downward_and_is_true() {
    let used: BTreeSet<(String, String)> = rust_files("src")
        .iter()
        .flat_map(|(file, text)| used_modules(text).into_iter().map(|used| (module_of(file), used)))
        .collect();
    for (i, (module, allowed)) in ARROWS.iter().enumerate() {
        for name in *allowed {
            assert!(ARROWS[..i].iter().any(|(below, _)| below == name), "{name} is not below {module}");
            let arrow = (module.to_string(), name.to_string());
            assert!(used.contains(&arrow), "{module} does not use {name}: take the arrow out of the table");
        }
    }
}

#[test]
fn developers_md_shows_the_table_of_arrows() {
    let text = read("DEVELOPERS.md");
    for (module, allowed) in ARROWS {
        let uses = if allowed.is_empty() { "nothing".to_owned() } else { allowed.join(", ") };
        let start = format!("| `{module}` | {uses} | ");
        assert!(text.contains(&start), "DEVELOPERS.md has no row that starts with\n{start}");
    }
}

#[test]
fn only_the_window_knows_the_screen_library() {
    for (file, text) in rust_files("src") {
        if module_of(&file) != "gui" {
            for name in ["egui", "eframe", "rfd"] {
                let found = code_lines(&text).find(|line| line.contains(name));
                assert!(found.is_none(), "{}: {}", file.display(), found.unwrap_or_default());
            }
        }
    }
}

#[test]
fn only_the_command_line_prints() {
    for (file, text) in rust_files("src") {
        if module_of(&file) != "cli" {
            for name in ["print!(", "println!(", "dbg!(", "io::stdout", "io::stderr"] {
                let found = code_lines(&text).find(|line| line.contains(name));
                assert!(found.is_none(), "{}: {}", file.display(), found.unwrap_or_default());
            }
        }
    }
}

#[test]
fn files_are_short() {
    for (file, text) in rust_files("src").into_iter().chain(rust_files("tests")) {
        let n = text.lines().count();
        assert!(n <= LONGEST_FILE, "{}: {n} lines, at most {LONGEST_FILE}; split it by nouns", file.display());
    }
}

#[test]
fn the_top_level_holds_what_it_must_and_nothing_else() {
    let must = ["Cargo.toml", "Cargo.lock", "README.md", "DEVELOPERS.md", "src", "assets", "tests", "scenarios"];
    let may = ["LICENSE-MIT", "LICENSE-APACHE", "target"];
    let names: BTreeSet<String> = fs::read_dir(root())
        .expect("the project's folder")
        .map(|entry| entry.expect("an entry").file_name().to_string_lossy().into_owned())
        .collect();
    for name in must {
        assert!(names.contains(name), "{name} is missing");
    }
    for name in names {
        let known = must.contains(&name.as_str()) || may.contains(&name.as_str()) || name.starts_with('.');
        assert!(known, "{name} does not belong at the top level");
    }
}

#[test]
fn every_source_is_in_the_bibliography() {
    let text = read("src/sources.rs");
    let (_, rest) = text.split_once("pub enum Source {").expect("the enum");
    let (body, _) = rest.split_once('}').expect("its end");
    let variants: BTreeSet<&str> = code_lines(body).map(|line| line.trim_end_matches(',')).collect();
    // The keys of the list are variants by type, so this is the other direction.
    let listed: BTreeSet<String> = sources::all().map(|(source, _)| format!("{source:?}")).collect();
    for variant in variants {
        assert!(listed.contains(variant), "assets/sources.ron has no {variant}");
    }
}

fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

fn read(path: &str) -> String {
    fs::read_to_string(root().join(path)).unwrap_or_else(|error| panic!("{path}: {error}"))
}

/// Every Rust file below a folder: path from the project's root, text.
fn rust_files(folder: &str) -> Vec<(PathBuf, String)> {
    let mut folders = vec![root().join(folder)];
    let mut files = vec![];
    while let Some(folder) = folders.pop() {
        for entry in fs::read_dir(&folder).expect("a folder of the project") {
            let path = entry.expect("an entry").path();
            if path.is_dir() {
                folders.push(path);
            } else if path.extension().is_some_and(|ext| ext == "rs") {
                let text = fs::read_to_string(&path).expect("a source file");
                files.push((path.strip_prefix(root()).expect("below the root").to_owned(), text));
            }
        }
    }
    files.sort();
    files
}

/// The top-level module that a file under `src` belongs to.
fn module_of(file: &Path) -> String {
    let first = file.components().nth(1).expect("a path below src").as_os_str().to_string_lossy().into_owned();
    first.trim_end_matches(".rs").to_owned()
}

/// Lines that are not comments, trimmed.
fn code_lines(text: &str) -> impl Iterator<Item = &str> {
    text.lines().map(str::trim).filter(|line| !line.is_empty() && !line.starts_with("//"))
}

/// Every top-level module that the code names by `crate::`.
fn used_modules(text: &str) -> BTreeSet<String> {
    let code: String = code_lines(text).flat_map(|line| [line, "\n"]).collect();
    assert!(!code.contains("crate::{"), "write one `use crate::module` a line");
    code.split("crate::")
        .skip(1)
        .map(|rest| rest.chars().take_while(|c| c.is_alphanumeric() || *c == '_').collect())
        .collect()
}
