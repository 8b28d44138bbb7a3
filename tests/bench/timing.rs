//! Medians of repeated rounds, and what they were measured on.

use std::time::{Duration, Instant};

/// Processor, cores and build, as the table's head shows them.
pub fn machine() -> String {
    let info = std::fs::read_to_string("/proc/cpuinfo").unwrap_or_default();
    let model =
        info.lines().find_map(|line| line.strip_prefix("model name")).map(|rest| rest.trim_matches([' ', '\t', ':']));
    let n_cores = std::thread::available_parallelism().map_or(1, |n| n.get());
    let build = if cfg!(debug_assertions) { "debug build: the figures mean nothing" } else { "release build" };
    format!("{}, {n_cores} cores, {build}", model.unwrap_or("unknown processor"))
}

/// Median seconds of one round of `work`, over at least 15 rounds and half a second.
pub fn median_s(mut work: impl FnMut()) -> f64 {
    work();
    let begin = Instant::now();
    let mut rounds: Vec<Duration> = Vec::new();
    while rounds.len() < 15 || begin.elapsed() < Duration::from_millis(500) {
        let start = Instant::now();
        work();
        rounds.push(start.elapsed());
    }
    rounds.sort_unstable();
    rounds[rounds.len() / 2].as_secs_f64()
}

/// One line of the table: a rate against what is aimed at.
pub fn print_rate(name: &str, per_s: f64, aim_per_s: f64) {
    let word = if per_s >= aim_per_s { "reached" } else { "missed" };
    println!("  {name:<58} {per_s:>12.0} /s   aim {aim_per_s:>9.0} /s   {word}");
}
