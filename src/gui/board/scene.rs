//! What the board shows in this frame: the model, laid out on the screen, and the plumb bob beside it.

use std::sync::Arc;

use egui::{Id, Pos2, Rect, Ui};

use crate::analysis::{CaseResult, Results};
use crate::app::{Derived, Document};
use crate::geom::{Edge, Point, Vec2};
use crate::gui::{Camera, Selected, View};
use crate::section::EdgeKind;
use crate::study::{Study, ValidStudy};
use crate::units::UnitSystem;

use super::bob::{Dial, Hanging};
use super::model::{BoardModel, Detail, Shown};
use super::screen::Screen;

/// Largest distance of a drawn arc from the true one, points: a quarter still shows its corners.
const SAGITTA: f64 = 0.1;

/// One frame of the board.
pub struct Scene<'a> {
    /// The study as it stands.
    pub study: &'a Study,
    /// This very study, judged; none while it has faults.
    pub judged: Option<(&'a ValidStudy, &'a Results)>,
    /// The case shown.
    pub case_idx: usize,
    /// In metres.
    pub model: Arc<BoardModel>,
    /// The outline's edges, exact.
    pub edges: Vec<Edge>,
    /// Where the section lies.
    pub screen: Screen,
    /// Where the bob hangs.
    pub dial: Dial,
    /// What hangs there.
    pub hanging: Hanging,
    /// Units shown.
    pub units: UnitSystem,
}

impl<'a> Scene<'a> {
    /// Lays a document out in `area`. `held_dial` keeps the bob's scale while it is dragged.
    pub fn new(ui: &Ui, id: Id, doc: &'a Document, view: &View, area: Rect, held_dial: Option<Dial>) -> Scene<'a> {
        let study = doc.study();
        let judged = match doc.derived() {
            Derived::Judged { study, results } => Some((&**study, &**results)),
            Derived::Faulty { .. } => None,
        };
        let results = judged.map(|(_, results)| results);
        let case = results.and_then(|r| r.cases.get(view.case_idx));
        let level = Vec2::new(0.0, -study.gravity_m_per_s2);
        let rest = case.map_or(level, |c| c.gravity.vec + c.accel);
        let now = case.map_or(rest, |c| c.gravity.vec);
        let others = results.map(|r| other_cases(r, view.case_idx)).unwrap_or_default();
        let dial = held_dial.unwrap_or_else(|| {
            let others: Vec<Vec2> = others.iter().map(|(_, g)| *g).collect();
            Dial::new(area, &[rest, now], &others, view.units)
        });
        let edges = if study.section.outline.is_empty() { Vec::new() } else { study.section.edges() };
        let screen = match view.camera {
            Some(camera) => Screen::new(area, camera),
            None => fitted(study, &edges, area, &dial),
        };
        let model = cached_model(ui, id, doc, view, &screen);
        let hanging = Hanging {
            now: results.map(|_| now),
            rest,
            tilt_rad: case.map_or(Some(0.0), |c| c.gravity.tilt_rad),
            others,
            holds: None,
            is_pointed_at: false,
        };
        Scene { study, judged, case_idx: view.case_idx, model, edges, screen, dial, hanging, units: view.units }
    }

    /// The case shown, judged.
    pub fn case(&self) -> Option<&'a CaseResult> {
        self.judged.and_then(|(_, results)| results.cases.get(self.case_idx))
    }

    /// Whether the bob can be dragged: there is a case, and a section to judge.
    pub fn has_bob(&self) -> bool {
        self.case().is_some()
    }

    /// A section point on the screen.
    pub fn at(&self, p: Point) -> Pos2 {
        self.screen.screen_from_section(p)
    }

    /// The box round all lines, on the screen.
    pub fn bounds(&self) -> Rect {
        match self.model.bounds() {
            Some((low, high)) => Rect::from_two_pos(self.at(low), self.at(high)),
            None => Rect::from_center_size(self.screen.rect.center(), egui::Vec2::ZERO),
        }
    }
}

/// The camera that shows the whole section beside the bob, with room for labels and dimensions.
fn fitted(study: &Study, edges: &[Edge], area: Rect, dial: &Dial) -> Screen {
    let finite = |p: &Point| p.coords.iter().all(|c| c.is_finite());
    let axes = [Vec2::new(1.0, 0.0), Vec2::new(0.0, 1.0)];
    let obstacles = study.section.obstacles.iter().flat_map(|o| o.edges());
    let mut bounds: Option<(Point, Point)> = None;
    for edge in edges.iter().copied().chain(obstacles) {
        if !(finite(&edge.start) && finite(&edge.end) && edge.sweep.is_finite()) {
            continue;
        }
        let [(s_low, s_high), (z_low, z_high)] = axes.map(|a| edge.extent(a)).map(|(l, h)| (l.0, h.0));
        let (low, high) = (Point::new(s_low, z_low), Point::new(s_high, z_high));
        bounds = Some(bounds.map_or((low, high), |(l, h)| (l.inf(&low), h.sup(&high))));
    }
    let (low, high) = bounds.unwrap_or((Point::new(0.0, 0.0), Point::new(2.0, 1.0)));
    // Dimensions stand beside a mouth: room for them where a mouth lies near a side.
    let mouths = || {
        let kinds = study.section.outline.iter().map(|e| e.kind);
        edges.iter().zip(kinds).filter(|(_, kind)| *kind == EdgeKind::Mouth).flat_map(|(e, _)| [e.start.x, e.end.x])
    };
    let near = 0.12 * (high.x - low.x);
    let mut left: f32 = if mouths().any(|s| s < low.x + near) { 112.0 } else { 92.0 };
    let mut right: f32 = if mouths().any(|s| s > high.x - near) { 118.0 } else { 40.0 };
    let spare = area.width() - dial.rect.width() - left - right;
    if spare < 160.0 {
        (left, right) = (46.0, 30.0);
    }
    let (top, bottom) = if area.height() < 320.0 { (30.0, 24.0) } else { (52.0, 34.0) };
    let free = Rect::from_min_max(
        area.min + egui::vec2(left, top),
        egui::pos2(dial.rect.left() - right, area.bottom() - bottom),
    );
    Screen::fitted(area, free, low, high)
}

fn other_cases(results: &Results, case_idx: usize) -> Vec<(usize, Vec2)> {
    let numbered = results.cases.iter().enumerate();
    numbered.filter(|(i, _)| *i != case_idx).map(|(i, c)| (i + 1, c.gravity.vec)).collect()
}

/// The model of a judged study, kept until study, scale or what is shown change. The results are kept with it, so
/// that their address stays theirs.
#[derive(Clone)]
struct Cached {
    study: Arc<ValidStudy>,
    results: Arc<Results>,
    shown: Shown,
    detail: Detail,
    model: Arc<BoardModel>,
}

fn cached_model(ui: &Ui, id: Id, doc: &Document, view: &View, screen: &Screen) -> Arc<BoardModel> {
    let detail = Detail { sagitta_m: SAGITTA / screen.scale(), units: view.units };
    let case = match doc.derived() {
        Derived::Judged { results, .. } => results.cases.get(view.case_idx),
        Derived::Faulty { .. } => None,
    };
    let shown = Shown {
        case_idx: view.case_idx,
        open_verdict: view.open_verdict,
        stage: case.map(|case| view.stage_of(case)).unwrap_or_default(),
        plate_idx: view.selected.and_then(Selected::plate),
    };
    let (study, results) = match doc.derived() {
        Derived::Judged { study, results } => (study, results),
        Derived::Faulty { problems, stale } => {
            let last_good = stale.as_ref().map(|(study, _)| study.study());
            return Arc::new(BoardModel::faulty(doc.study(), problems, last_good, detail));
        }
    };
    if let Some(cached) = ui.data(|d| d.get_temp::<Cached>(id))
        && Arc::ptr_eq(&cached.results, results)
        && Arc::ptr_eq(&cached.study, study)
        && (cached.shown, cached.detail) == (shown, detail)
    {
        return cached.model;
    }
    let model = Arc::new(BoardModel::judged(study, results, shown, detail));
    let cached = Cached { study: study.clone(), results: results.clone(), shown, detail, model: model.clone() };
    ui.data_mut(|d| d.insert_temp(id, cached));
    model
}

/// A camera that looks at a point without changing the scale.
pub fn looking_at(screen: &Screen, p: Point) -> Camera {
    Camera { center_m: [p.x, p.y], ..screen.camera }
}
