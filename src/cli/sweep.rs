//! `brimwright sweep`: how far a tank can go, as comma-separated values.

use std::path::PathBuf;
use std::process::ExitCode;

use clap::{Args, ValueEnum};

use crate::analysis::{self, Envelope, FillMap, N_ACCELS, N_DIRECTIONS, N_FILLS};
use crate::app::{self, FileError};
use crate::problem::{Place, Problem};
use crate::progress::Progress;
use crate::report::{sweep, table};
use crate::study::ValidStudy;

use super::{complain, print};

#[derive(Debug, Args)]
pub(super) struct SweepArguments {
    /// Scenario file
    #[arg(value_name = "FILE")]
    file: PathBuf,
    /// Sweep this load case only
    #[arg(long, value_name = "NAME")]
    case: Option<String>,
    /// What to sweep
    #[arg(long, value_enum, default_value_t = What::FillMap)]
    what: What,
    /// Write to this file instead of the standard output
    #[arg(short, long, value_name = "OUT.csv")]
    output: Option<PathBuf>,
}

#[derive(Clone, Copy, Debug, ValueEnum)]
enum What {
    /// Fill against the size of a load case's acceleration
    FillMap,
    /// The largest acceleration that holds at this fill, in every direction
    Envelope,
}

/// Sweeps a file and writes what it finds.
pub(super) fn run(arguments: &SweepArguments) -> ExitCode {
    let file = arguments.file.display().to_string();
    let unusable = |problems: &[Problem]| {
        complain(&table::problems(&file, problems));
        ExitCode::from(2)
    };
    let text = match swept(arguments) {
        Ok(text) => text,
        Err(problems) => return unusable(&problems),
    };
    match &arguments.output {
        Some(path) => match app::write_atomic(path, text.as_bytes()) {
            Ok(()) => ExitCode::SUCCESS,
            Err(error) => unusable(&error.into_problems()),
        },
        None => match print(&text) {
            Ok(()) => ExitCode::SUCCESS,
            Err(error) => {
                complain(&format!("The sweep cannot be written: {error}\n"));
                ExitCode::from(2)
            }
        },
    }
}

fn swept(arguments: &SweepArguments) -> Result<String, Vec<Problem>> {
    let study = app::load(&arguments.file).map_err(FileError::into_problems)?.validate()?;
    let cases = &study.study().cases;
    let is_chosen = |i: &usize| arguments.case.as_ref().is_none_or(|name| *name == cases[*i].name);
    let chosen: Vec<usize> = (0..cases.len()).filter(is_chosen).collect();
    if let (Some(name), true) = (&arguments.case, chosen.is_empty()) {
        let names: Vec<&str> = cases.iter().map(|case| case.name.as_str()).collect();
        let hint = format!("Its load cases are: {}", names.join(", "));
        return Err(vec![Problem::fault(Place::Field("load cases"), format!("none is called {name}"), hint)]);
    }
    match arguments.what {
        What::FillMap => fill_maps(&study, &chosen),
        What::Envelope => Ok(envelopes(&study, &chosen)),
    }
}

/// The fill maps of the load cases that have one.
fn fill_maps(study: &ValidStudy, chosen: &[usize]) -> Result<String, Vec<Problem>> {
    let mut maps: Vec<(&str, FillMap)> = Vec::new();
    let mut without = Vec::new();
    for &i in chosen {
        match analysis::fill_map(study, i, N_FILLS, N_ACCELS, &Progress::default(), &|_| {}) {
            Ok(map) => maps.push((&study.study().cases[i].name, map)),
            Err(why) => without.push(Problem::fault(Place::Case(i), why.to_string(), "choose another load case")),
        }
    }
    if maps.is_empty() {
        return Err(without);
    }
    let maps: Vec<(&str, &FillMap)> = maps.iter().map(|(name, map)| (*name, map)).collect();
    Ok(sweep::fill_map_csv(&maps))
}

/// One envelope for each way in which the tank stands at rest in the load cases.
fn envelopes(study: &ValidStudy, chosen: &[usize]) -> String {
    let mut attitudes = Vec::new();
    for &i in chosen {
        let attitude = study.study().cases[i].attitude;
        if !attitudes.contains(&attitude) {
            attitudes.push(attitude);
        }
    }
    let envelopes: Vec<Envelope> = attitudes
        .into_iter()
        .filter_map(|attitude| analysis::envelope(study, attitude, N_DIRECTIONS, &Progress::default(), &|_| {}))
        .collect();
    sweep::envelope_csv(&envelopes.iter().collect::<Vec<_>>())
}
