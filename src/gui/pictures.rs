//! What is worked out beside the window: the hold envelope, the fill map, freeboard over sills, and tables to export.
//!
//! Starts, calls off and shows the state of the work. Knows no screen place; computes nothing itself.

use std::path::{Path, PathBuf};
use std::sync::Arc;
use std::time::Duration;

use crate::analysis::{
    self, CaseResult, Envelope, FillMap, FreeboardCurve, N_ACCELS, N_DIRECTIONS, N_FILLS, NoFillMap, Route,
};
use crate::app::{self, Background, Derived, Document, FileError, Job, Workers};
use crate::cases::{Accel, Attitude, LoadCase};
use crate::progress::Progress;
use crate::report::sweep;
use crate::study::{Fill, Study, ValidStudy};

use super::desk::Judged;

/// Work that ends sooner is not worth a bar, s.
const SHORT_S: f64 = 0.4;

/// How often the bar is drawn anew, s.
const BAR_EVERY_S: f64 = 0.3;

/// A result, and whether it belongs to other inputs than those shown.
#[derive(Clone, Copy, Debug)]
pub struct Shown<'a, T> {
    /// The result.
    pub result: &'a T,
    /// The inputs have changed since.
    pub is_old: bool,
}

/// All work beside the window.
#[derive(Debug, Default)]
pub struct Pictures {
    workers: Workers,
    envelope: Background<EnvelopeInputs, Arc<Envelope>>,
    fill_map: Background<MapInputs, Arc<Result<FillMap, NoFillMap>>>,
    freeboard: Background<(u64, usize), FreeboardCurve>,
    quick_freeboard: Option<((u64, usize), FreeboardCurve)>,
    export: Option<Export>,
    /// Inputs of this revision and case, so that they are put together once.
    inputs: Option<Inputs>,
    /// Since when something has been under way, s.
    busy_since_s: Option<f64>,
}

/// A table to write.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Table {
    /// The hold envelope of the chosen case's attitude.
    Envelope,
    /// The fill map of the chosen case.
    FillMap,
}

impl Table {
    /// The word for it in a file name.
    pub fn file_word(self) -> &'static str {
        match self {
            Table::Envelope => "envelope",
            Table::FillMap => "fill-map",
        }
    }
}

#[derive(Debug)]
struct Export {
    path: PathBuf,
    job: Job<Result<(), Failed>>,
}

#[derive(Debug)]
enum Failed {
    NoMap(NoFillMap),
    File(FileError),
}

/// What the status line says of work under way.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Work {
    /// What it is.
    pub name: &'static str,
    /// Share that is done, 0 to 1.
    pub share: f64,
}

/// What the envelope depends on. The study without what does not change it.
#[derive(Clone, Debug, PartialEq)]
struct EnvelopeInputs {
    study: Arc<Study>,
    attitude: Attitude,
    /// Largest acceleration of its cases decides how far is looked.
    most_m_per_s2: f64,
}

/// What the fill map depends on.
#[derive(Clone, Debug, PartialEq)]
struct MapInputs {
    study: Arc<Study>,
    case: Option<(Accel, Attitude)>,
}

#[derive(Clone, Debug)]
struct Inputs {
    revision: u64,
    case_idx: usize,
    envelope: EnvelopeInputs,
    fill_map: MapInputs,
}

impl Inputs {
    fn new(revision: u64, case_idx: usize, study: &ValidStudy) -> Inputs {
        let inputs = study.study();
        let bare = Arc::new(Study {
            title: String::new(),
            author: String::new(),
            revision: String::new(),
            notes: String::new(),
            cases: Vec::new(),
            verdict_notes: Vec::new(),
            ..inputs.clone()
        });
        let case = inputs.cases.get(case_idx);
        let attitude = case.map_or(Attitude::Level, |case| case.attitude);
        let filled = Arc::new(Study { fill: Fill::Share(0.0), ..(*bare).clone() });
        Inputs {
            revision,
            case_idx,
            envelope: EnvelopeInputs {
                study: bare,
                attitude,
                most_m_per_s2: analysis::largest_looked_at(study, attitude),
            },
            fill_map: MapInputs { study: filled, case: case.map(|case| (case.accel, case.attitude)) },
        }
    }
}

impl Pictures {
    /// Brings everything in step with a document and its chosen case. What is not shown is not worked out.
    pub fn keep_up(&mut self, ctx: &egui::Context, doc: &Document, case_idx: usize, shows_map: bool) {
        let now_s = ctx.input(|i| i.time);
        let judged = match doc.derived() {
            Derived::Judged { study, results } if case_idx < results.cases.len() => Some((study, results)),
            _ => None,
        };
        let at = (doc.revision(), case_idx);
        self.inputs = match (self.inputs.take(), judged) {
            (_, None) => None,
            (Some(inputs), Some(_)) if (inputs.revision, inputs.case_idx) == at => Some(inputs),
            (_, Some((study, _))) => Some(Inputs::new(at.0, at.1, study)),
        };
        let (inputs, workers) = (self.inputs.as_ref(), &self.workers);
        let wake = || {
            let ctx = ctx.clone();
            move || ctx.request_repaint()
        };
        let study = judged.map(|(study, _)| study);
        let slow = judged.filter(|(_, results)| !is_quick(&results.cases[case_idx]));
        let soon = [
            self.envelope.want(inputs.map(|i| i.envelope.clone()), now_s, |of| {
                let (study, attitude) = (study.cloned(), of.attitude);
                workers.start(wake(), move |progress, send| {
                    let Some(study) = study else { return };
                    let partial = |envelope: &Envelope| send(Arc::new(envelope.clone()));
                    analysis::envelope(&study, attitude, N_DIRECTIONS, progress, &partial)
                        .into_iter()
                        .for_each(|found| send(Arc::new(found)));
                })
            }),
            self.fill_map.want(inputs.filter(|_| shows_map).map(|i| i.fill_map.clone()), now_s, |_| {
                let study = study.cloned();
                workers.start(wake(), move |progress, send| {
                    let Some(study) = study else { return };
                    let partial = |map: &FillMap| send(Arc::new(Ok(map.clone())));
                    let whole = analysis::fill_map(&study, case_idx, N_FILLS, N_ACCELS, progress, &partial);
                    // What was called off stays as it came.
                    if whole != Err(NoFillMap::Stopped) {
                        send(Arc::new(whole));
                    }
                })
            }),
            self.freeboard.want(slow.map(|_| at), now_s, |_| {
                let judged = slow.map(|(study, results)| (study.clone(), results.clone()));
                workers.start(wake(), move |progress, send| {
                    let Some((study, results)) = judged else { return };
                    let curve = analysis::freeboard_curve(&study, &results.cases[case_idx], progress);
                    curve.into_iter().for_each(send);
                })
            }),
        ];
        if let Some(soon) = soon.into_iter().flatten().reduce(f64::min) {
            ctx.request_repaint_after(Duration::from_secs_f64(soon));
        }
        self.busy_since_s = self.running().map(|_| self.busy_since_s.unwrap_or(now_s));
        if let Some(since_s) = self.busy_since_s {
            // Results wake the window by themselves: this is for the bar alone.
            let to_bar_s = since_s + SHORT_S - now_s;
            ctx.request_repaint_after(Duration::from_secs_f64(if to_bar_s > 0.0 { to_bar_s } else { BAR_EVERY_S }));
        }
    }

    /// The hold envelope of the chosen case's attitude.
    pub fn envelope(&self) -> Option<Shown<'_, Arc<Envelope>>> {
        let (of, result) = self.envelope.found()?;
        let is_asked = self.inputs.as_ref().is_some_and(|inputs| inputs.envelope.attitude == of.attitude);
        is_asked.then_some(Shown { result, is_old: self.envelope.is_old() })
    }

    /// The fill map of the chosen case, whole or in part, or why there is none.
    pub fn fill_map(&self) -> Option<Shown<'_, Arc<Result<FillMap, NoFillMap>>>> {
        let (of, result) = self.fill_map.found()?;
        let is_asked = self.inputs.as_ref().is_some_and(|inputs| inputs.fill_map.case == of.case);
        is_asked.then_some(Shown { result, is_old: self.fill_map.is_old() })
    }

    /// The freeboard curve of a case: at once where that is quick.
    pub fn freeboard(&mut self, judged: Judged, revision: u64, case_idx: usize) -> Option<Shown<'_, FreeboardCurve>> {
        let case = &judged.results.cases[case_idx];
        if !is_quick(case) {
            let (_, result) = self.freeboard.found().filter(|(of, _)| of.1 == case_idx)?;
            return Some(Shown { result, is_old: self.freeboard.is_old() });
        }
        let at = (revision, case_idx);
        if self.quick_freeboard.as_ref().is_none_or(|(of, _)| *of != at) {
            let curve = analysis::freeboard_curve(judged.study, case, &Progress::default());
            self.quick_freeboard = curve.map(|curve| (at, curve));
        }
        self.quick_freeboard.as_ref().map(|(_, result)| Shown { result, is_old: false })
    }

    /// What takes long enough to be shown.
    pub fn work(&self, ctx: &egui::Context) -> Option<Work> {
        let since_s = self.busy_since_s?;
        self.running().filter(|_| ctx.input(|i| i.time) - since_s > SHORT_S)
    }

    /// What the user called off.
    pub fn stopped(&self) -> Option<Work> {
        let all = [
            (FILL_MAP, self.fill_map.stopped_at()),
            (ENVELOPE, self.envelope.stopped_at()),
            (FREEBOARD, self.freeboard.stopped_at()),
        ];
        all.into_iter().find_map(|(name, share)| share.map(|share| Work { name, share }))
    }

    /// Calls off what is under way; what is there stays.
    pub fn stop(&mut self) {
        self.export = None;
        self.envelope.stop();
        self.fill_map.stop();
        self.freeboard.stop();
    }

    /// Takes up again what was called off.
    pub fn start_again(&mut self) {
        self.envelope.start_again();
        self.fill_map.start_again();
        self.freeboard.start_again();
    }

    /// Writes a table of a study to a file, in the background.
    pub fn export(
        &mut self,
        ctx: &egui::Context,
        study: &Arc<ValidStudy>,
        case_idx: usize,
        table: Table,
        path: &Path,
    ) {
        let (ctx, study, to) = (ctx.clone(), study.clone(), path.to_owned());
        let job = self.workers.start(
            move || ctx.request_repaint(),
            move |progress, send| {
                let Some(text) = text_of(&study, case_idx, table, progress) else { return };
                let write = |text: String| app::write_atomic(&to, text.as_bytes()).map_err(Failed::File);
                send(text.map_err(Failed::NoMap).and_then(write));
            },
        );
        self.export = Some(Export { path: path.to_owned(), job });
    }

    /// How an export ended, once: in words for the status line, or why nothing was written.
    pub fn exported(&mut self) -> Option<Result<String, String>> {
        let export = self.export.as_mut()?;
        let path = export.path.display().to_string();
        let result = export.job.latest();
        if export.job.is_running() {
            return None;
        }
        self.export = None;
        Some(match result {
            Some(Ok(())) => Ok(format!("exported to {path}")),
            Some(Err(Failed::NoMap(why))) => Err(format!("{path} was not written: {why}")),
            Some(Err(Failed::File(error))) => Err(error.to_string()),
            None => Err(format!("{path} was not written")),
        })
    }

    fn running(&self) -> Option<Work> {
        let all = [
            (EXPORT, self.export.as_ref().map(|export| export.job.share())),
            (FILL_MAP, self.fill_map.share()),
            (ENVELOPE, self.envelope.share()),
            (FREEBOARD, self.freeboard.share()),
        ];
        all.into_iter().find_map(|(name, share)| share.map(|share| Work { name, share }))
    }
}

const EXPORT: &str = "Export";
const FILL_MAP: &str = "Fill map";
const ENVELOPE: &str = "Hold envelope";
const FREEBOARD: &str = "Freeboard";

/// Whether freeboard against fill takes no longer than a frame: no fill has to be followed over sills.
fn is_quick(case: &CaseResult) -> bool {
    case.routes.iter().all(|(_, route)| *route == Route::One)
}

/// The text of a table; none where it was called off.
fn text_of(
    study: &ValidStudy,
    case_idx: usize,
    table: Table,
    progress: &Progress,
) -> Option<Result<String, NoFillMap>> {
    let case: &LoadCase = study.study().cases.get(case_idx)?;
    match table {
        Table::Envelope => {
            let envelope = analysis::envelope(study, case.attitude, N_DIRECTIONS, progress, &|_| {})?;
            Some(Ok(sweep::envelope_csv(&[&envelope])))
        }
        Table::FillMap => match analysis::fill_map(study, case_idx, N_FILLS, N_ACCELS, progress, &|_| {}) {
            Ok(map) => Some(Ok(sweep::fill_map_csv(&[(&case.name, &map)]))),
            Err(NoFillMap::Stopped) => None,
            Err(why) => Some(Err(why)),
        },
    }
}
