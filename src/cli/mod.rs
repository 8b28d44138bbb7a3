//! The command line. It alone prints; it judges nothing itself.

mod judge;
mod sweep;

use std::io::{self, Write};
use std::path::PathBuf;
use std::process::ExitCode;

use clap::{Args, ColorChoice, Parser, Subcommand, ValueEnum};

use crate::units::UnitSystem;

/// Sizing baffles and freeboard in accelerating tanks.
#[derive(Debug, Parser)]
#[command(version, color = ColorChoice::Never, args_conflicts_with_subcommands = true)]
#[command(after_help = "Without a command the window opens. A design aid: it certifies nothing.")]
struct Arguments {
    #[command(subcommand)]
    command: Option<Command>,
    /// Scenario to open in the window
    file: Option<PathBuf>,
}

#[derive(Debug, Subcommand)]
enum Command {
    /// Judge every load case of scenarios and print the verdicts
    ///
    /// Exit status: 0 all verdicts hold (or are close), 1 a verdict fails, 2 an input is unusable, 3 nothing
    /// fails but a verdict is not judged. Of several files the most serious counts: 2, then 1, then 3, then 0.
    Judge(JudgeArguments),
    /// Write how far a tank can go as comma-separated values, in SI units
    ///
    /// Exit status: 0 written, 2 an input is unusable.
    Sweep(sweep::SweepArguments),
}

#[derive(Debug, Args)]
struct JudgeArguments {
    /// Scenario files
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    /// Print JSON in SI units instead of a table
    #[arg(long)]
    json: bool,
    /// Units of the table
    #[arg(long, value_enum, default_value_t = Units::Si)]
    units: Units,
    /// Show and count this load case only, without the layout of plates
    #[arg(long, value_name = "NAME")]
    case: Option<String>,
}

#[derive(Clone, Copy, Debug, ValueEnum)]
enum Units {
    /// International System
    Si,
    /// US customary
    Us,
}

impl From<Units> for UnitSystem {
    fn from(units: Units) -> UnitSystem {
        match units {
            Units::Si => UnitSystem::Si,
            Units::Us => UnitSystem::UsCustomary,
        }
    }
}

/// Runs the program on the arguments of the process.
pub fn run() -> ExitCode {
    let arguments = Arguments::parse();
    match arguments.command {
        Some(Command::Judge(arguments)) => judge::judge(&arguments),
        Some(Command::Sweep(arguments)) => sweep::run(&arguments),
        None => open_window(arguments.file),
    }
}

#[cfg(feature = "gui")]
fn open_window(file: Option<PathBuf>) -> ExitCode {
    match crate::gui::launch(file) {
        Ok(()) => ExitCode::SUCCESS,
        Err(words) => {
            complain(&format!("{words}\n"));
            ExitCode::from(2)
        }
    }
}

#[cfg(not(feature = "gui"))]
fn open_window(_file: Option<PathBuf>) -> ExitCode {
    complain("This brimwright was built without its window.\n  hint: brimwright judge FILE works without one.\n");
    ExitCode::from(2)
}

/// Prints; a reader that closed the pipe has seen enough and is no fault.
fn print(text: &str) -> io::Result<()> {
    let mut out = io::stdout().lock();
    match out.write_all(text.as_bytes()).and_then(|()| out.flush()) {
        Err(error) if error.kind() == io::ErrorKind::BrokenPipe => Ok(()),
        done => done,
    }
}

/// Prints to the error stream; when that is closed there is nobody left to tell.
fn complain(text: &str) {
    let _ = io::stderr().lock().write_all(text.as_bytes());
}
