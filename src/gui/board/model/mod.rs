//! What is to be drawn of a study and its results, in metres: walls, tints, isobars, surfaces, marks.
//!
//! Pure, and free of any screen: the board lays it out in points, a drawing on paper may lay it out in
//! millimetres. It computes no physics; every number comes from [`Results`].

mod load;
mod marks;
mod plate;
mod pool;

use crate::analysis::{Bound, CaseResult, Chord, Results, Settled, Verdict};
use crate::geom::{Edge, Point, Vec2};
use crate::gui::{Stage, VerdictAt};
use crate::problem::{Place, Problem};
use crate::section::EdgeKind;
use crate::study::{Study, ValidStudy};
use crate::units::{Quantity, UnitSystem};

use super::liquid::{Band, Body, Isobar, TintScale};
use super::strips::{Side, sides};

use load::edge_loads;
use marks::{brims, freeboard, place_of};

pub use load::{Load, Prism, PrismPart};
pub use marks::{Brim, FaultMark, Freeboard, Governs, PointMark, Sill};
pub use plate::PlateLine;
pub use pool::Pool;

/// What of a judged study is shown.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Shown {
    /// The load case.
    pub case_idx: usize,
    /// The verdict whose working is open, of that case or of the layout.
    pub open_verdict: Option<VerdictAt>,
    /// The state of it.
    pub stage: Stage,
    /// The plate that is chosen.
    pub plate_idx: Option<usize>,
}

/// How fine, and which numbers.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Detail {
    /// Largest distance of a flattened arc from the true one, m.
    pub sagitta_m: f64,
    /// Units in which the pressure steps are round.
    pub units: UnitSystem,
}

/// One edge of the outline.
#[derive(Clone, Debug, PartialEq)]
pub struct EdgeLine {
    /// From its start to its end.
    pub points: Vec<Point>,
    /// Wall or mouth.
    pub kind: EdgeKind,
}

/// Everything that the board shows of one load case.
#[derive(Clone, Debug, PartialEq)]
pub struct BoardModel {
    /// The outline, edge by edge.
    pub edges: Vec<EdgeLine>,
    /// Obstacles, closed.
    pub obstacles: Vec<Vec<Point>>,
    /// Plates, in the study's order.
    pub plates: Vec<PlateLine>,
    /// Edges of the last good outline that the faulty one lacks.
    pub last_good: Vec<Vec<Point>>,
    /// Steps of the tints.
    pub tints: Option<TintScale>,
    /// The liquid, one pool after the other.
    pub pools: Vec<Pool>,
    /// Liquid whose pressure is not known.
    pub not_judged_liquid: Vec<Band>,
    /// Surfaces under the other bound; after a release, those before it.
    pub other_surface: Vec<Chord>,
    /// Sills that liquid went over on the way.
    pub sills: Vec<Sill>,
    /// z of the still surface, m.
    pub still_z_m: Option<f64>,
    /// Why the case is not judged.
    pub not_judged: Option<String>,
    /// One a mouth.
    pub brims: Vec<Brim>,
    /// The dimension at the governing mouth.
    pub freeboard: Option<Freeboard>,
    /// Loads, for a pressure verdict that is open.
    pub loads: Vec<Load>,
    /// Net pressures across plates, for the same verdict or the plate that is chosen.
    pub prisms: Vec<Prism>,
    /// Where the open verdict governs.
    pub governs: Governs,
    /// Named points.
    pub points: Vec<PointMark>,
    /// Compartments with a fill of their own.
    pub compartments: Vec<PointMark>,
    /// Where the tank is emptied from.
    pub sump: Option<Point>,
    /// Point about which moments are taken.
    pub moment_about: Point,
    /// Centroid of the liquid.
    pub centroid: Option<Point>,
    /// Faults and warnings at their places.
    pub faults: Vec<FaultMark>,
}

impl BoardModel {
    /// A judged study under one load case.
    pub fn judged(study: &ValidStudy, results: &Results, shown: Shown, detail: Detail) -> BoardModel {
        let inputs = study.study();
        let mut model = BoardModel::bare(inputs, &results.warnings, detail);
        model.tints = TintScale::new(results.pressure_scale_pa, inputs.ullage_gage_pa, detail.units);
        model.still_z_m = Some(results.still.level_z_m);
        let Some(case) = results.cases.get(shown.case_idx) else { return model };
        let of_case = |at: &VerdictAt| at.case_idx() == Some(shown.case_idx);
        let open = shown.open_verdict.filter(|at| of_case(at) || at.case_idx().is_none());
        let up = shown.stage.up(case).unwrap_or(Vec2::y());
        match shown.stage.state(case) {
            Some(Ok(state)) => model.show_state(inputs, case, shown.stage, state, detail),
            Some(Err(reason)) => {
                model.not_judged = Some(reason.clone());
                model.not_judged_liquid = model.still_liquid(results.still.level_z_m);
            }
            None => {}
        }
        if shown.stage != Stage::Released {
            model.freeboard = freeboard(case, results.still.level_z_m);
        }
        if let Some(verdict) = open.and_then(|at| at.find(results)) {
            model.governs = model.governing(verdict);
            if model.governs.glow.is_empty() && !open.as_ref().is_some_and(of_case) {
                model.governs.glow = cell_outline(study, verdict, detail);
            }
        }
        if let Some(Ok(state)) = shown.stage.state(case) {
            // A verdict on the layout is of the tank at rest: loads of the case are not its own.
            let verdict = open.filter(of_case).and_then(|at| at.find(results));
            model.show_loads(inputs, verdict, shown.plate_idx, state);
        }
        model.brims = brims(study, up, model.freeboard.map(|f| f.brim));
        model
    }

    /// A study with faults: its lines, and where the faults are.
    pub fn faulty(study: &Study, problems: &[Problem], last_good: Option<&Study>, detail: Detail) -> BoardModel {
        let mut model = BoardModel::bare(study, problems, detail);
        if let Some(good) = last_good {
            let now = study.section.edges();
            model.last_good = (good.section.edges().iter())
                .filter(|edge| !now.contains(edge))
                .map(|edge| flatten(edge, detail.sagitta_m))
                .collect();
        }
        model
    }

    /// All tinted bands.
    pub fn bands(&self) -> impl Iterator<Item = &Band> {
        self.pools.iter().flat_map(|pool| &pool.tinted.bands).chain(&self.not_judged_liquid)
    }

    /// All isobars, those of one pool after the other, the deepest of each first.
    pub fn isobars(&self) -> impl Iterator<Item = &Isobar> {
        self.pools.iter().flat_map(|pool| pool.tinted.isobars.iter().rev())
    }

    /// All pieces of the surface.
    pub fn surface(&self) -> impl Iterator<Item = &Chord> {
        self.pools.iter().flat_map(|pool| &pool.surface)
    }

    /// Smallest and largest (s, z) of all lines; none without lines.
    pub fn bounds(&self) -> Option<(Point, Point)> {
        let points = self.edges.iter().flat_map(|e| &e.points).chain(self.obstacles.iter().flatten());
        points.fold(None, |found, p| match found {
            None => Some((*p, *p)),
            Some((low, high)) => Some((low.inf(p), high.sup(p))),
        })
    }

    fn bare(study: &Study, problems: &[Problem], detail: Detail) -> BoardModel {
        let section = &study.section;
        let edges = (section.edges().iter().zip(&section.outline))
            .filter(|(edge, _)| is_finite(edge))
            .map(|(edge, drawn)| EdgeLine { points: flatten(edge, detail.sagitta_m), kind: drawn.kind })
            .collect();
        let obstacles = section.obstacles.iter().map(|o| flatten_loop(&o.edges(), detail.sagitta_m)).collect();
        let mark = |at: Point, name: &str| PointMark { at, name: name.to_owned(), gage_pa: None };
        let points = study.points.iter().map(|p| mark(p.at, &p.name)).filter(is_placed).collect();
        let compartments = study.compartments.iter().map(|c| mark(c.at, &c.name)).filter(is_placed).collect();
        let faults = (problems.iter().enumerate())
            .filter_map(|(i, p)| {
                let at = place_of(study, &p.place)?;
                Some(FaultMark { number: i + 1, severity: p.severity, at })
            })
            .collect();
        BoardModel {
            edges,
            obstacles,
            plates: section.plates.iter().map(PlateLine::new).collect(),
            last_good: Vec::new(),
            tints: None,
            pools: Vec::new(),
            not_judged_liquid: Vec::new(),
            other_surface: Vec::new(),
            sills: Vec::new(),
            still_z_m: None,
            not_judged: None,
            brims: Vec::new(),
            freeboard: None,
            loads: Vec::new(),
            prisms: Vec::new(),
            governs: Governs::default(),
            points,
            compartments,
            sump: study.sump.filter(|p| p.coords.iter().all(|c| c.is_finite())),
            moment_about: study.moment_about,
            centroid: None,
            faults,
        }
    }

    /// The line of a plate, or of one of its openings.
    fn plate_line(&self, plate_idx: usize, opening_idx: Option<usize>) -> Vec<Vec<Point>> {
        let plate = self.plates.get(plate_idx);
        let line = plate.and_then(|plate| match opening_idx {
            Some(i) => plate.openings.get(i).map(|opening| &opening.points),
            None => Some(&plate.points),
        });
        line.filter(|points| points.len() > 1).cloned().into_iter().collect()
    }

    fn show_state(&mut self, study: &Study, case: &CaseResult, stage: Stage, state: &Settled, detail: Detail) {
        let up = stage.up(case).unwrap_or(Vec2::y());
        let pool = |pool| Pool::new(pool, up, study.ullage_gage_pa, self.tints, detail.sagitta_m);
        self.pools = state.pools.iter().map(pool).collect();
        let other = match stage {
            Stage::Under(Bound::Settled) => case.state(Bound::Sealed),
            Stage::Under(Bound::Sealed) | Stage::Released => case.state(Bound::Settled),
        };
        if let Some(Ok(other)) = other {
            self.other_surface = other.pools.iter().flat_map(|pool| pool.surface.clone()).collect();
        }
        if stage == Stage::Under(Bound::Settled) {
            self.sills = case.pours.iter().map(Sill::new).collect();
        }
        self.centroid = Some(state.centroid);
        for (mark, result) in self.points.iter_mut().zip(&state.points) {
            mark.gage_pa = Some(result.gage_pa);
        }
    }

    /// The still liquid, where nothing better is known.
    fn still_liquid(&self, level_z_m: f64) -> Vec<Band> {
        let outline: Vec<Point> = self.edges.iter().flat_map(|e| &e.points[..e.points.len() - 1]).copied().collect();
        let region = sides(&outline).chain(self.obstacles.iter().flat_map(|points| sides(points))).collect();
        let body = Body { sides: region, up: Vec2::y(), level_m: level_z_m, gas_pa: 0.0, weight_pa_per_m: 0.0 };
        body.tinted(None).bands
    }

    fn governing(&self, verdict: &Verdict) -> Governs {
        let glow = match &verdict.place {
            Place::Edge(i) => self.edges.get(*i).map(|e| e.points.clone()).into_iter().collect(),
            Place::Obstacle { obstacle_idx, .. } => match self.obstacles.get(*obstacle_idx) {
                Some(points) => vec![points.iter().chain(points.first()).copied().collect()],
                None => Vec::new(),
            },
            Place::Plate { plate_idx, opening_idx } => self.plate_line(*plate_idx, *opening_idx),
            _ => Vec::new(),
        };
        Governs { glow, at: verdict.at.map(|at| (at, verdict.demand)) }
    }

    /// Loads on walls and plates for a pressure verdict; on a plate alone for a verdict on it, or because it is chosen.
    fn show_loads(&mut self, study: &Study, verdict: Option<&Verdict>, plate_idx: Option<usize>, state: &Settled) {
        let demand = verdict.and_then(|v| v.demand);
        let is_pressure = demand.is_some_and(|d| d.quantity == Quantity::GagePressure);
        if let Some(verdict) = verdict.filter(|_| is_pressure) {
            self.loads = edge_loads(&study.section, &verdict.place, state);
        }
        let judged =
            verdict.and_then(|v| if let Place::Plate { plate_idx, .. } = v.place { Some(plate_idx) } else { None });
        let is_shown = |i: usize| is_pressure || judged == Some(i) || plate_idx == Some(i);
        let plates = study.section.plates.iter().zip(&state.plates).enumerate();
        self.prisms = plates
            .filter(|(i, _)| is_shown(*i))
            .filter_map(|(_, (plate, load))| Prism::new(plate, load, state.peak_pa))
            .collect();
    }
}

/// Round the cell that a verdict points into.
fn cell_outline(study: &ValidStudy, verdict: &Verdict, detail: Detail) -> Vec<Vec<Point>> {
    let cells = study.region().cells();
    let Some(part) = verdict.at.and_then(|at| cells.part_at(at)) else { return Vec::new() };
    cells.edges_of(part).0.iter().map(|edge| flatten(edge, detail.sagitta_m)).collect()
}

/// Edges as straight sides for drawing.
fn sides_of<'a>(edges: impl Iterator<Item = &'a Edge>, sagitta_m: f64) -> Vec<Side> {
    let sides = |edge| flatten(edge, sagitta_m).windows(2).map(|pair| [pair[0], pair[1]]).collect::<Vec<_>>();
    edges.flat_map(sides).collect()
}

fn is_placed(mark: &PointMark) -> bool {
    mark.at.coords.iter().all(|c| c.is_finite())
}

fn is_finite(edge: &Edge) -> bool {
    [edge.start.x, edge.start.y, edge.end.x, edge.end.y, edge.sweep].iter().all(|c| c.is_finite())
}

fn flatten(edge: &Edge, sagitta_m: f64) -> Vec<Point> {
    let mut points = Vec::new();
    edge.flatten_into(sagitta_m, &mut points);
    points.push(edge.end);
    points
}

fn flatten_loop(edges: &[Edge], sagitta_m: f64) -> Vec<Point> {
    let mut points = Vec::new();
    for edge in edges.iter().filter(|e| is_finite(e)) {
        edge.flatten_into(sagitta_m, &mut points);
    }
    points
}

#[cfg(test)]
mod tests;
