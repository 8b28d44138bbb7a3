//! The window: lays the regions out, lets every panel read and propose, and applies what was proposed in one place at
//! the end of the frame.

mod filing;
mod opened;

use std::path::{Path, PathBuf};
use std::time::Instant;

use egui::{CursorIcon, Sense, Ui, UiBuilder, ViewportCommand};

use crate::analysis::State;
use crate::app::{Derived, Document, Edit};
use crate::cases::{Accel, Attitude, LoadCase};
use crate::study::Study;

use super::board::Holds;
use super::files::{Dialogs, FileChooser, Purpose};
use super::layout::{self, Regions};
use super::modals::{self, Unsaved};
use super::pictures::Pictures;
use super::plots::PlotArea;
use super::problems::{self, FileTrouble};
use super::settings::Settings;
use super::status::Asked;
use super::tank::TankColumn;
use super::verdicts::VerdictColumn;
use super::{Command, Desk, Look, Pen, Proposal, Selected, Stage, VerdictAt, View};
use super::{
    board, case_head, commands, header, loads, look, plating, plots, starter, status, strip, tank, verdicts,
};

use filing::{Intent, example};
use opened::OpenVerdict;

/// The window's whole state. It runs on a bare [`egui::Context`].
pub struct Window {
    doc: Document,
    view: View,
    settings: Settings,
    tank: TankColumn,
    verdicts: VerdictColumn,
    plots: PlotArea,
    pictures: Pictures,
    chooser: FileChooser,
    trouble: Option<FileTrouble>,
    /// What waits for the question about unsaved changes, or for the file to be written first.
    intent: Option<Intent>,
    asks_unsaved: bool,
    shows_about: bool,
    shows_loads: bool,
    may_close: bool,
    event: String,
    judged_ms: Option<f64>,
    open_verdict: Option<OpenVerdict>,
    window_title: String,
}

impl Window {
    /// A window with the file at `path` open, else with the first example.
    pub fn new(ctx: &egui::Context, path: Option<&Path>, settings: Settings, dialogs: Dialogs) -> Window {
        look::install(ctx);
        ctx.set_theme(settings.theme);
        ctx.options_mut(|o| o.quit_shortcuts.clear());
        let mut window = Window {
            doc: Document::new(example(0).unwrap_or_else(starter::study), None),
            view: View { units: settings.units, ..View::default() },
            settings,
            tank: TankColumn::default(),
            verdicts: VerdictColumn::default(),
            plots: PlotArea::default(),
            pictures: Pictures::default(),
            chooser: FileChooser::new(dialogs),
            trouble: None,
            intent: None,
            asks_unsaved: false,
            shows_about: false,
            shows_loads: false,
            may_close: false,
            event: String::new(),
            judged_ms: None,
            open_verdict: None,
            window_title: String::new(),
        };
        window.choose_worst();
        if let Some(path) = path {
            window.open(path);
        }
        window
    }

    /// The open document.
    pub fn document(&self) -> &Document {
        &self.doc
    }

    /// What is chosen and how it is shown.
    pub fn view(&self) -> &View {
        &self.view
    }

    /// The hold envelope round the bob, and whether it belongs to an older state of the study.
    pub fn holds(&self) -> Option<Holds> {
        self.pictures.envelope().map(|e| Holds { envelope: e.result.clone(), is_old: e.is_old })
    }

    /// What is remembered from one start to the next.
    pub fn settings(&self) -> &Settings {
        &self.settings
    }

    /// One frame.
    pub fn ui(&mut self, ui: &mut Ui) {
        let look = Look::of(ui.ctx().theme());
        let mut out: Vec<Proposal> = Vec::new();
        let is_asking = self.asks_unsaved || self.shows_about || self.shows_loads || self.chooser.is_open();
        if !is_asking {
            out.extend(commands::pressed(ui.ctx(), &self.doc, &self.view).into_iter().map(Proposal::Run));
        }
        let regions = layout::regions(ui.max_rect(), self.settings.sizes);
        self.keep_pictures(ui.ctx(), regions.n_plots);
        self.regions_ui(ui, &regions, look, &mut out);
        self.dividers_ui(ui, &regions, look);
        self.modals_ui(ui.ctx(), look);
        self.dropped_files(ui);
        for proposal in out {
            self.apply(ui.ctx(), proposal);
        }
        self.keep_view_valid();
        self.guard_close(ui.ctx());
        self.title(ui.ctx());
    }

    /// Carries a command out.
    pub fn run(&mut self, ctx: &egui::Context, command: Command) {
        let case_idx = self.view.case_idx;
        match command {
            Command::New => self.intend(ctx, Intent::New),
            Command::Open => self.intend(ctx, Intent::Choose),
            Command::OpenExample(i) => self.intend(ctx, Intent::Example(i)),
            Command::OpenRecent(i) => {
                if let Some(path) = self.settings.recent.get(i).cloned() {
                    self.intend(ctx, Intent::Open(path));
                }
            }
            Command::Save => self.save(ctx),
            Command::SaveAs => self.chooser.ask(ctx, Purpose::Save, self.proposed_path()),
            Command::Export(table) => self.export(ctx, table),
            Command::Quit => self.intend(ctx, Intent::Close),
            Command::Undo => self.doc.undo(),
            Command::Redo => self.doc.redo(),
            Command::DrawPlate => self.view.pen = if self.view.pen.is_some() { None } else { Some(Pen::default()) },
            Command::DuplicatePlate => self.duplicate_plate(),
            Command::SpacePlates => {
                if let Some(plates) = plating::equally_spaced(&self.doc.study().section) {
                    self.doc.edit(&Edit::Plates(plates));
                }
            }
            Command::DeleteSelected => self.delete_selected(),
            Command::FitBoard => self.view.camera = None,
            Command::NextStage => self.show_next_stage(),
            Command::ResetSizes => self.settings.sizes = Default::default(),
            Command::Units(units) => {
                self.view.units = units;
                self.settings.units = units;
            }
            Command::Theme(theme) => {
                self.settings.theme = theme;
                ctx.set_theme(theme);
            }
            Command::AddCase => self.add_case(rest_case(self.doc.study())),
            Command::DuplicateCase => {
                if let Some(case) = self.doc.study().cases.get(case_idx) {
                    self.add_case(LoadCase { name: copy_name(self.doc.study(), &case.name), ..case.clone() });
                }
            }
            Command::DeleteCase => self.doc.edit(&Edit::RemoveCase(case_idx)),
            Command::NextCase => self.view.case_idx = (case_idx + 1) % self.doc.study().cases.len().max(1),
            Command::PreviousCase => {
                let n = self.doc.study().cases.len().max(1);
                self.view.case_idx = (case_idx + n - 1) % n;
            }
            Command::MoveCaseLeft => self.move_case(case_idx, case_idx.saturating_sub(1)),
            Command::MoveCaseRight => self.move_case(case_idx, case_idx + 1),
            Command::Loads => self.shows_loads = true,
            Command::About => self.shows_about = true,
        }
    }

    fn regions_ui(&mut self, ui: &mut Ui, regions: &Regions, look: &'static Look, out: &mut Vec<Proposal>) {
        ui.painter().rect_filled(ui.max_rect(), 0.0, look.panel);
        let holds = self.holds();
        let mut desk = Desk { doc: &self.doc, view: &mut self.view, look, out };
        header::header_ui(ui, regions.header, regions.menus_are_folded, &mut desk, &self.settings.recent);
        tank::tank_ui(ui, regions.tank, regions.tank_is_folded, &mut desk, &mut self.tank);
        case_head::case_head_ui(ui, regions.case_head, &mut desk);
        let mut board = ui.new_child(UiBuilder::new().max_rect(regions.board).id_salt("board"));
        board.set_clip_rect(regions.board.intersect(ui.clip_rect()));
        board::board_ui(&mut board, desk.doc, desk.view, holds, look, desk.out);
        if let Some(trouble) = &self.trouble {
            if problems::file_trouble_ui(ui, regions.plots, &mut desk, trouble) {
                self.trouble = None;
            }
        } else if matches!(desk.doc.derived(), Derived::Faulty { .. }) {
            problems::problems_ui(ui, regions.plots, &mut desk);
        } else {
            let (plots, pictures) = (&mut self.plots, &mut self.pictures);
            plots::plots_ui(ui, regions.plots, regions.n_plots, regions.plots_are_beside, &mut desk, plots, pictures);
        }
        strip::strip_ui(ui, regions.strip, regions.card_width, regions.cards_have_drawings, &mut desk);
        verdicts::verdicts_ui(ui, regions.verdicts, regions.verdict_row, &mut desk, &mut self.verdicts);
        let is_dropping = ui.input(|i| !i.raw.hovered_files.is_empty());
        let event = if is_dropping { "Let go to open the scenario" } else { &self.event };
        match status::status_ui(ui, regions.status, &desk, event, self.judged_ms, &self.pictures) {
            Some(Asked::Stop) => self.pictures.stop(),
            Some(Asked::StartAgain) => self.pictures.start_again(),
            None => {}
        }
    }

    /// Brings what is worked out in the background in step with the document.
    fn keep_pictures(&mut self, ctx: &egui::Context, n_plots: usize) {
        let shows_map = self.plots.shows_map(n_plots);
        self.pictures.keep_up(ctx, &self.doc, self.view.case_idx, shows_map);
        if let Some(Ok(words) | Err(words)) = self.pictures.exported() {
            self.event = words;
        }
    }

    fn dividers_ui(&mut self, ui: &Ui, regions: &Regions, look: &Look) {
        for (divider, line, is_upright) in regions.dividers() {
            let grip = line.expand2(if is_upright { egui::vec2(3.0, 0.0) } else { egui::vec2(0.0, 3.0) });
            let response = ui.interact(grip, egui::Id::unique(divider), Sense::click_and_drag());
            let is_held = response.hovered() || response.dragged();
            if is_held {
                ui.ctx().set_cursor_icon(if is_upright { CursorIcon::ResizeColumn } else { CursorIcon::ResizeRow });
            }
            let stroke = if response.dragged() { (2.0, look.accent) } else { (1.0, look.line) };
            let snap = |x: f32| ui.painter().round_to_pixel_center(x);
            match is_upright {
                true => ui.painter().vline(snap(line.left()), line.y_range(), stroke),
                false => ui.painter().hline(line.x_range(), snap(line.top()), stroke),
            };
            if response.double_clicked() {
                *self.settings.sizes.of(divider) = None;
            } else if let Some(at) = response.interact_pointer_pos()
                && response.dragged()
            {
                let size = (0.25 * regions.size_at(divider, at)).round() * 4.0;
                *self.settings.sizes.of(divider) = Some(size);
            }
        }
    }

    fn modals_ui(&mut self, ctx: &egui::Context, look: &Look) {
        if self.asks_unsaved {
            match modals::unsaved_ui(ctx, look, &title_or(self.doc.study(), "This scenario")) {
                None => {}
                Some(Unsaved::Cancel) => (self.asks_unsaved, self.intent) = (false, None),
                Some(Unsaved::Discard) => {
                    self.asks_unsaved = false;
                    self.carry_out(ctx);
                }
                Some(Unsaved::Save) => {
                    self.asks_unsaved = false;
                    self.save(ctx);
                }
            }
        }
        if self.shows_about && modals::about_ui(ctx, look) {
            self.shows_about = false;
        }
        if self.shows_loads {
            let case = match self.doc.derived() {
                Derived::Judged { results, .. } => results.cases.get(self.view.case_idx),
                Derived::Faulty { .. } => None,
            };
            self.shows_loads = case.is_some_and(|case| !loads::loads_ui(ctx, look, case, self.view.units));
        }
        match self.chooser.ui(ctx, look) {
            Some((Purpose::Open, Some(path))) => self.open(&path),
            Some((Purpose::Save, Some(path))) => self.save_to(ctx, &path),
            Some((Purpose::Save, None)) => self.intent = None,
            Some((Purpose::Table(table), Some(path))) => self.export_to(ctx, table, &path),
            Some((Purpose::Open | Purpose::Table(_), None)) | None => {}
        }
    }

    fn apply(&mut self, ctx: &egui::Context, proposal: Proposal) {
        let (revision, start) = (self.doc.revision(), Instant::now());
        match proposal {
            Proposal::Edit(edit) => self.doc.edit(&edit),
            Proposal::Run(command) => self.run(ctx, command),
            Proposal::BeginGesture(label) => self.doc.begin_gesture(label),
            Proposal::EndGesture => self.doc.end_gesture(),
            Proposal::CancelGesture => self.doc.cancel_gesture(),
        }
        if self.doc.revision() != revision {
            self.judged_ms = Some(start.elapsed().as_secs_f64() * 1e3);
            self.event.clear();
            ctx.request_repaint();
        }
    }

    /// Nothing chosen may outlive what it points to.
    fn keep_view_valid(&mut self) {
        let study = self.doc.study();
        self.view.selected = self.view.selected.filter(|selected| selected.is_in(study));
        self.view.case_idx = self.view.case_idx.min(study.cases.len().saturating_sub(1));
        self.keep_verdict_open();
    }

    /// A new judgement may move the opened verdict in its list; a click names another one.
    fn keep_verdict_open(&mut self) {
        let Derived::Judged { results, .. } = self.doc.derived() else { return };
        let revision = self.doc.revision();
        if let Some(open) = self.open_verdict.take_if(|open| open.revision != revision) {
            self.view.open_verdict = open.find(results);
        }
        self.open_verdict = self.view.open_verdict.and_then(|at| OpenVerdict::of(results, at, revision));
    }

    fn title(&mut self, ctx: &egui::Context) {
        let mark = if self.doc.is_unsaved() { "*" } else { "" };
        let title = format!("{mark}{} - brimwright", title_or(self.doc.study(), "Untitled"));
        if title != self.window_title {
            ctx.send_viewport_cmd(ViewportCommand::Title(title.clone()));
            self.window_title = title;
        }
    }

    fn replace(&mut self, study: Study, path: Option<PathBuf>) {
        self.doc = Document::new(study, path);
        self.view = View { units: self.view.units, ..View::default() };
        self.plots = PlotArea::default();
        self.trouble = None;
        self.open_verdict = None;
        self.judged_ms = None;
        self.event.clear();
        self.choose_worst();
    }

    /// What a reviewer asks first: the worst case, and its working where it fails.
    fn choose_worst(&mut self) {
        let Derived::Judged { results, .. } = self.doc.derived() else { return };
        let Some(&(case_idx, verdict_idx)) = results.ranked().first() else { return };
        self.view.case_idx = case_idx;
        if results.cases[case_idx].verdicts[verdict_idx].state == State::Fails {
            self.view.open_verdict = Some(VerdictAt::Case(case_idx, verdict_idx));
        }
    }

    fn delete_selected(&mut self) {
        if let Some(edit) = self.view.selected.and_then(|selected| selected.removal(self.doc.study())) {
            self.doc.edit(&edit);
            self.view.selected = None;
        }
    }

    fn show_next_stage(&mut self) {
        let Derived::Judged { results, .. } = self.doc.derived() else { return };
        let Some(case) = results.cases.get(self.view.case_idx) else { return };
        let shown = self.view.stage_of(case);
        let following = Stage::of(case).skip_while(|stage| *stage != shown).nth(1);
        self.view.stage = following.or_else(|| Stage::of(case).next());
    }

    fn duplicate_plate(&mut self) {
        let section = &self.doc.study().section;
        let copy = self.view.selected.and_then(Selected::plate).and_then(|i| plating::copied(section, i));
        if let Some(copy) = copy {
            self.view.selected = Some(Selected::Plate(section.plates.len()));
            self.doc.edit(&Edit::AddPlate(Box::new(copy)));
        }
    }

    fn add_case(&mut self, case: LoadCase) {
        self.doc.edit(&Edit::AddCase(Box::new(case)));
        self.view.case_idx = self.doc.study().cases.len().saturating_sub(1);
    }

    fn move_case(&mut self, from: usize, to: usize) {
        if to < self.doc.study().cases.len() && from != to {
            self.doc.edit(&Edit::ReorderCase(from, to));
            self.view.case_idx = to;
        }
    }
}

fn rest_case(study: &Study) -> LoadCase {
    LoadCase {
        name: copy_name(study, "Rest"),
        accel: Accel::REST,
        attitude: Attitude::Level,
        onset_s: None,
        duration_s: None,
        release: false,
        source: String::new(),
        note: String::new(),
    }
}

/// `name` with a number, so that no two cases share it.
fn copy_name(study: &Study, name: &str) -> String {
    let is_taken = |name: &str| study.cases.iter().any(|case| case.name == name);
    if !is_taken(name) {
        return name.to_owned();
    }
    (2..).map(|i| format!("{name} {i}")).find(|name| !is_taken(name)).unwrap_or_default()
}

fn title_or(study: &Study, other: &str) -> String {
    if study.title.is_empty() { other.to_owned() } else { study.title.clone() }
}
