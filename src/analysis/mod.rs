//! The one facade: a valid study in, results out. Pure: no files, no clock, no screen.

mod results;

use crate::study::ValidStudy;

pub use results::*;

/// Judges every load case.
pub fn run(study: &ValidStudy) -> Results {
    let _ = study;
    todo!()
}

/// The curves of one load case, for the plots.
pub fn curves(study: &ValidStudy, results: &Results, case_idx: usize) -> Curves {
    let _ = (study, results, case_idx);
    todo!()
}
