//! Edits: the only way in which a study changes. Each has a label for undo.

use crate::cases::{Accel, Attitude, LoadCase};
use crate::geom::{Point, Vec2};
use crate::liquid::Liquid;
use crate::material::Material;
use crate::section::{EdgeKind, Obstacle, OutlineEdge, Plate, Section, WidthLaw};
use crate::study::{Compartment, Fill, NamedPoint, Record, Study, VerdictNote};

/// One change of a study. Indices that are out of range change nothing.
#[derive(Clone, Debug, PartialEq)]
pub enum Edit {
    /// Replace the whole study (a pasted or rebuilt one).
    Replace(Box<Study>),
    /// Title.
    Title(String),
    /// Author.
    Author(String),
    /// Revision mark.
    Revision(String),
    /// Notes of the scenario.
    Notes(String),
    /// Liquid.
    Liquid(Liquid),
    /// Fill.
    Fill(Fill),
    /// Gas pressure above the liquid, Pa gage.
    UllageGage(f64),
    /// Outside air pressure, Pa absolute.
    AirPressure(f64),
    /// Gravity, m/s2.
    Gravity(f64),
    /// Width law.
    Width(WidthLaw),
    /// Move the start of an edge of the outline.
    MoveVertex(usize, Point),
    /// Bend an edge of the outline: sweep, radians.
    BendEdge(usize, f64),
    /// Wall or mouth.
    EdgeKind(usize, EdgeKind),
    /// Name of an edge.
    EdgeName(usize, String),
    /// Split an edge of the outline at its point nearest to this one; both halves stay on the edge, and the new
    /// vertex starts the edge after it. Nothing happens at the edge's ends.
    SplitEdge(usize, Point),
    /// Take the start of an edge out: the edge before it runs on to the end of this one and turns through both
    /// sweeps. The longer of the two gives kind and name. Three edges stay, or two where one is an arc.
    RemoveVertex(usize),
    /// Replace the whole outline.
    Outline(Vec<OutlineEdge>),
    /// Move a vertex of an obstacle.
    MoveObstacleVertex(usize, usize, Point),
    /// Move a whole obstacle by (s, z) metres.
    ShiftObstacle(usize, f64, f64),
    /// Add an obstacle.
    AddObstacle(Obstacle),
    /// Take an obstacle out.
    RemoveObstacle(usize),
    /// Add a plate at the end.
    AddPlate(Box<Plate>),
    /// Replace a plate: its corners, openings, thickness, material, panel, name.
    Plate(usize, Box<Plate>),
    /// Move a whole plate by (s, z) metres.
    ShiftPlate(usize, f64, f64),
    /// Move a corner of a plate.
    MovePlatePoint(usize, usize, Point),
    /// Take a plate out.
    RemovePlate(usize),
    /// Replace all plates at once: equal spacing, a pasted layout.
    Plates(Vec<Plate>),
    /// Replace the compartments with a fill of their own.
    Compartments(Vec<Compartment>),
    /// Replace the materials of the scenario's own.
    Materials(Vec<Material>),
    /// Change one of them. Plates that call it follow its name.
    Material(usize, Box<Material>),
    /// Where the tank is emptied from.
    Sump(Option<Point>),
    /// Discharge coefficient of openings.
    DischargeCoefficient(f64),
    /// Acceleration of a case.
    CaseAccel(usize, Accel),
    /// Grade or heel of a case.
    CaseAttitude(usize, Attitude),
    /// Name, note, source, onset: the whole case. Notes beside its verdicts follow its name.
    Case(usize, Box<LoadCase>),
    /// Add a case at the end.
    AddCase(Box<LoadCase>),
    /// Take a case out, and the notes beside its verdicts.
    RemoveCase(usize),
    /// Move a case from one place to another.
    ReorderCase(usize, usize),
    /// Replace the requirement records.
    Records(Vec<Record>),
    /// Replace the named points.
    Points(Vec<NamedPoint>),
    /// Point about which moments are taken.
    MomentAbout(Point),
    /// Note beside a verdict: case name, criterion, text; an empty text removes it.
    VerdictNote(String, String, String),
}

impl Edit {
    /// The words that undo shows.
    pub fn label(&self) -> String {
        let words = match self {
            Edit::Replace(_) => "Replace the scenario",
            Edit::Title(_) => "Set title",
            Edit::Author(_) => "Set author",
            Edit::Revision(_) => "Set revision",
            Edit::Notes(_) => "Set notes",
            Edit::Liquid(_) => "Set liquid",
            Edit::Fill(_) => "Set fill",
            Edit::UllageGage(_) => "Set ullage pressure",
            Edit::AirPressure(_) => "Set air pressure",
            Edit::Gravity(_) => "Set gravity",
            Edit::Width(_) => "Set width law",
            Edit::Outline(_) => "Set outline",
            Edit::AddObstacle(_) => "Add obstacle",
            Edit::AddPlate(_) => "Add plate",
            Edit::Plates(_) => "Set plates",
            Edit::Compartments(_) => "Set compartments",
            Edit::Materials(_) => "Set materials",
            Edit::Sump(_) => "Set sump",
            Edit::DischargeCoefficient(_) => "Set discharge coefficient",
            Edit::AddCase(_) => "Add load case",
            Edit::Records(_) => "Set requirement records",
            Edit::Points(_) => "Set points",
            Edit::MomentAbout(_) => "Set moment point",
            Edit::VerdictNote(_, _, text) if text.trim().is_empty() => "Remove note",
            Edit::VerdictNote(..) => "Set note",
            Edit::MoveVertex(i, _) => return format!("Move vertex {}", i + 1),
            Edit::RemoveVertex(i) => return format!("Remove vertex {}", i + 1),
            Edit::BendEdge(i, _) => return format!("Bend edge {}", i + 1),
            Edit::EdgeKind(i, EdgeKind::Wall) => return format!("Make edge {} a wall", i + 1),
            Edit::EdgeKind(i, EdgeKind::Mouth) => return format!("Make edge {} a mouth", i + 1),
            Edit::EdgeName(i, _) => return format!("Name edge {}", i + 1),
            Edit::SplitEdge(i, _) => return format!("Split edge {}", i + 1),
            Edit::MoveObstacleVertex(i, v, _) => return format!("Move vertex {} of obstacle {}", v + 1, i + 1),
            Edit::ShiftObstacle(i, ..) => return format!("Move obstacle {}", i + 1),
            Edit::RemoveObstacle(i) => return format!("Remove obstacle {}", i + 1),
            Edit::Plate(i, _) => return format!("Change plate {}", i + 1),
            Edit::ShiftPlate(i, ..) => return format!("Move plate {}", i + 1),
            Edit::MovePlatePoint(i, p, _) => return format!("Move corner {} of plate {}", p + 1, i + 1),
            Edit::RemovePlate(i) => return format!("Remove plate {}", i + 1),
            Edit::Material(i, _) => return format!("Change material {}", i + 1),
            Edit::CaseAccel(i, _) => return format!("Set acceleration of load case {}", i + 1),
            Edit::CaseAttitude(i, _) => return format!("Set attitude of load case {}", i + 1),
            Edit::Case(i, _) => return format!("Change load case {}", i + 1),
            Edit::RemoveCase(i) => return format!("Remove load case {}", i + 1),
            Edit::ReorderCase(i, _) => return format!("Move load case {}", i + 1),
        };
        words.to_owned()
    }
}

/// Applies an edit to a study. An edit that has no place to apply to changes nothing.
pub fn apply(study: &mut Study, edit: &Edit) {
    let section = &mut study.section;
    match edit {
        Edit::Replace(other) => study.clone_from(other),
        Edit::Title(text) => study.title.clone_from(text),
        Edit::Author(text) => study.author.clone_from(text),
        Edit::Revision(text) => study.revision.clone_from(text),
        Edit::Notes(text) => study.notes.clone_from(text),
        Edit::Liquid(liquid) => study.liquid.clone_from(liquid),
        Edit::Fill(fill) => study.fill = *fill,
        Edit::UllageGage(pa) => study.ullage_gage_pa = *pa,
        Edit::AirPressure(pa) => study.air_pressure_abs_pa = *pa,
        Edit::Gravity(m_per_s2) => study.gravity_m_per_s2 = *m_per_s2,
        Edit::Width(width) => section.width.clone_from(width),
        Edit::MoveVertex(i, to) => set(section.outline.get_mut(*i), |edge| edge.start = *to),
        Edit::BendEdge(i, sweep_rad) => set(section.outline.get_mut(*i), |edge| edge.sweep_rad = *sweep_rad),
        Edit::EdgeKind(i, kind) => set(section.outline.get_mut(*i), |edge| edge.kind = *kind),
        Edit::EdgeName(i, name) => set(section.outline.get_mut(*i), |edge| edge.name.clone_from(name)),
        Edit::SplitEdge(i, at) => split_edge(section, *i, *at),
        Edit::RemoveVertex(i) => remove_vertex(section, *i),
        Edit::Outline(outline) => section.outline.clone_from(outline),
        Edit::MoveObstacleVertex(i, v, to) => {
            set(section.obstacles.get_mut(*i).and_then(|o| o.vertices.get_mut(*v)), |vertex| vertex.start = *to);
        }
        Edit::ShiftObstacle(i, s_m, z_m) => set(section.obstacles.get_mut(*i), |obstacle| {
            obstacle.vertices.iter_mut().for_each(|vertex| vertex.start += Vec2::new(*s_m, *z_m));
        }),
        Edit::AddObstacle(obstacle) => section.obstacles.push(obstacle.clone()),
        Edit::RemoveObstacle(i) => remove(&mut section.obstacles, *i),
        Edit::AddPlate(plate) => section.plates.push((**plate).clone()),
        Edit::Plate(i, plate) => set(section.plates.get_mut(*i), |old| old.clone_from(plate)),
        Edit::ShiftPlate(i, s_m, z_m) => set(section.plates.get_mut(*i), |plate| {
            plate.points.iter_mut().for_each(|point| *point += Vec2::new(*s_m, *z_m));
        }),
        Edit::MovePlatePoint(i, p, to) => {
            set(section.plates.get_mut(*i).and_then(|plate| plate.points.get_mut(*p)), |point| *point = *to);
        }
        Edit::RemovePlate(i) => remove(&mut section.plates, *i),
        Edit::Plates(plates) => section.plates.clone_from(plates),
        Edit::Compartments(compartments) => study.compartments.clone_from(compartments),
        Edit::Materials(materials) => study.materials.clone_from(materials),
        Edit::Material(i, material) => change_material(study, *i, material),
        Edit::Sump(sump) => study.sump = *sump,
        Edit::DischargeCoefficient(c_d) => study.discharge_coefficient = *c_d,
        Edit::CaseAccel(i, accel) => set(study.cases.get_mut(*i), |case| case.accel = *accel),
        Edit::CaseAttitude(i, attitude) => set(study.cases.get_mut(*i), |case| case.attitude = *attitude),
        Edit::Case(i, case) => change_case(study, *i, case),
        Edit::AddCase(case) => study.cases.push((**case).clone()),
        Edit::RemoveCase(i) => remove_case(study, *i),
        Edit::ReorderCase(from, to) => {
            if *from < study.cases.len() && *to < study.cases.len() {
                let case = study.cases.remove(*from);
                study.cases.insert(*to, case);
            }
        }
        Edit::Records(records) => study.records.clone_from(records),
        Edit::Points(points) => study.points.clone_from(points),
        Edit::MomentAbout(point) => study.moment_about = *point,
        Edit::VerdictNote(case, criterion, text) => set_note(&mut study.verdict_notes, case, criterion, text),
    }
}

fn set<T>(item: Option<&mut T>, change: impl FnOnce(&mut T)) {
    if let Some(item) = item {
        change(item);
    }
}

fn remove<T>(items: &mut Vec<T>, idx: usize) {
    if idx < items.len() {
        items.remove(idx);
    }
}

fn split_edge(section: &mut Section, idx: usize, at: Point) {
    if idx >= section.outline.len() {
        return;
    }
    let edge = section.edge(idx);
    let (t, _) = edge.nearest(at);
    let (first, second) = (edge.part(0.0, t), edge.part(t, 1.0));
    if t <= 0.0 || t >= 1.0 || first.end == edge.start || second.start == edge.end {
        return;
    }
    let half =
        OutlineEdge { name: String::new(), start: second.start, sweep_rad: second.sweep, ..section.outline[idx] };
    section.outline[idx].sweep_rad = first.sweep;
    section.outline.insert(idx + 1, half);
}

fn remove_vertex(section: &mut Section, idx: usize) {
    let n = section.outline.len();
    if idx >= n || n < 3 {
        return;
    }
    let before = (idx + n - 1) % n;
    let is_longer = section.edge(idx).length() > section.edge(before).length();
    let [this, that] = [idx, before].map(|i| section.outline[i].clone());
    let (longer, shorter) = if is_longer { (&this, &that) } else { (&that, &this) };
    let joined = OutlineEdge {
        // Halves of a split edge: only one has the name.
        name: if longer.name.is_empty() && longer.kind == shorter.kind { &shorter.name } else { &longer.name }
            .clone(),
        kind: longer.kind,
        start: that.start,
        sweep_rad: that.sweep_rad + this.sweep_rad,
    };
    let mut outline = section.outline.clone();
    outline[before] = joined;
    outline.remove(idx);
    if outline.len() >= 3 || outline.iter().any(|edge| edge.sweep_rad != 0.0) {
        section.outline = outline;
    }
}

fn change_material(study: &mut Study, idx: usize, material: &Material) {
    let Some(own) = study.materials.get_mut(idx) else { return };
    let old = std::mem::replace(own, material.clone());
    if study.materials.iter().all(|m| m.name != old.name) {
        let plates = study.section.plates.iter_mut().filter(|plate| plate.material == old.name);
        plates.for_each(|plate| plate.material.clone_from(&material.name));
    }
}

fn change_case(study: &mut Study, idx: usize, case: &LoadCase) {
    let Some(old) = study.cases.get_mut(idx) else { return };
    let old = std::mem::replace(old, case.clone());
    if study.cases.iter().all(|c| c.name != old.name) {
        study.verdict_notes.iter_mut().filter(|note| note.case == old.name).for_each(|note| {
            note.case.clone_from(&case.name);
        });
    }
}

fn remove_case(study: &mut Study, idx: usize) {
    if idx < study.cases.len() {
        let removed = study.cases.remove(idx);
        if study.cases.iter().all(|c| c.name != removed.name) {
            study.verdict_notes.retain(|note| note.case != removed.name);
        }
    }
}

fn set_note(notes: &mut Vec<VerdictNote>, case: &str, criterion: &str, text: &str) {
    let is_meant = |note: &VerdictNote| note.case == case && note.criterion == criterion;
    if text.trim().is_empty() {
        notes.retain(|note| !is_meant(note));
    } else if let Some(note) = notes.iter_mut().find(|note| is_meant(note)) {
        note.text = text.to_owned();
    } else {
        notes.push(VerdictNote { case: case.to_owned(), criterion: criterion.to_owned(), text: text.to_owned() });
    }
}
