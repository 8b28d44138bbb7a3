//! Benches: how fast and how exact. Prints a table; nothing here passes or fails.
//!
//! `cargo bench` runs all of it, `cargo bench -- kernel` the sections whose name holds the word.

#[cfg(feature = "gui")]
mod frame;
mod kernel;
mod pictures;
mod pools;
#[path = "../it/support/mod.rs"]
#[allow(dead_code)] // The checks use the rest of it.
mod support;
mod timing;

/// Name and body of every section, in the order printed.
const SECTIONS: &[(&str, fn())] = &[
    ("kernel", kernel::run),
    ("precision", kernel::precision),
    ("demos", kernel::demos),
    ("pools", pools::pools),
    ("pictures", pictures::pictures),
    #[cfg(feature = "gui")]
    ("frame", frame::frame),
    #[cfg(feature = "gui")]
    ("plate drag", frame::plate_drag),
];

fn main() {
    let wanted: Vec<String> = std::env::args().skip(1).filter(|arg| !arg.starts_with('-')).collect();
    println!("machine: {}", timing::machine());
    for (name, body) in SECTIONS {
        if wanted.is_empty() || wanted.iter().any(|word| name.contains(word.as_str())) {
            println!("\n{name}");
            body();
        }
    }
}
