//! What mends a problem in one step, where there is one obvious way: offered beside the problem, never done unasked.
//!
//! A mend is offered only where the problem is gone after it. Knows no screen.

use crate::material;
use crate::problem::{Place, Problem, Severity};
use crate::section::{Opening, Plate};
use crate::study::Study;

use super::edit::{Edit, apply};
use super::plates::ended_on_walls;

/// One step that takes a problem away.
#[derive(Clone, Debug, PartialEq)]
pub struct Mend {
    /// What it does: `Remove plate 2`.
    pub words: String,
    /// The step.
    pub edit: Edit,
}

/// The mend of a problem of this study; none where it takes thought.
pub fn mend(study: &Study, problem: &Problem) -> Option<Mend> {
    WAYS.iter().filter_map(|way| way(study, &problem.place)).find(|mend| is_gone_after(study, problem, mend))
}

/// Ways to mend, by what is wrong at a place; the first that helps is offered.
const WAYS: &[fn(&Study, &Place) -> Option<Mend>] =
    &[plate_through_a_wall, plate_of_no_use, opening_off_its_plate, material_that_is_not];

fn plate_through_a_wall(study: &Study, place: &Place) -> Option<Mend> {
    let (i, plate) = plate_at(study, place)?;
    let ended = ended_on_walls(&study.section, plate)?;
    Some(Mend { words: format!("End {} on the wall", plate.label(i)), edit: Edit::Plate(i, Box::new(ended)) })
}

/// Without length, or nowhere inside the tank.
fn plate_of_no_use(study: &Study, place: &Place) -> Option<Mend> {
    let (i, plate) = plate_at(study, place)?;
    let middles = plate.segments().map(|e| e.point_at(0.5));
    let is_inside = plate.points.iter().copied().chain(middles).any(|p| study.section.contains(p));
    (!is_inside || plate.points.len() < 2 || plate.length_m() == 0.0)
        .then(|| Mend { words: format!("Remove {}", plate.label(i)), edit: Edit::RemovePlate(i) })
}

fn opening_off_its_plate(study: &Study, place: &Place) -> Option<Mend> {
    let &Place::Plate { plate_idx, opening_idx: Some(o) } = place else { return None };
    let mut plate = study.section.plates.get(plate_idx)?.clone();
    let length_m = plate.length_m();
    let opening = plate.openings.get(o)?.clone();
    let name = if opening.name.is_empty() { format!("opening {}", o + 1) } else { opening.name.clone() };
    let (from_m, to_m) = (opening.from_m.min(opening.to_m).max(0.0), opening.from_m.max(opening.to_m).min(length_m));
    let words = if from_m < to_m {
        plate.openings[o] = Opening { from_m, to_m, ..opening };
        format!("Cut {name} to the plate")
    } else {
        plate.openings.remove(o);
        format!("Remove {name}")
    };
    Some(Mend { words, edit: Edit::Plate(plate_idx, Box::new(plate)) })
}

/// Takes that of another plate, else the first of the table.
fn material_that_is_not(study: &Study, place: &Place) -> Option<Mend> {
    let (i, plate) = plate_at(study, place)?;
    if study.material(&plate.material).is_some() {
        return None;
    }
    let others = study.section.plates.iter().filter_map(|other| study.material(&other.material));
    let material = others.chain(material::table()).next()?.name.clone();
    let words = format!("Make {} of {material}", plate.label(i));
    Some(Mend { words, edit: Edit::Plate(i, Box::new(Plate { material, ..plate.clone() })) })
}

fn plate_at<'a>(study: &'a Study, place: &Place) -> Option<(usize, &'a Plate)> {
    let &Place::Plate { plate_idx, opening_idx: None } = place else { return None };
    Some((plate_idx, study.section.plates.get(plate_idx)?))
}

/// Whether nothing as bad is left at the place.
fn is_gone_after(study: &Study, problem: &Problem, mend: &Mend) -> bool {
    let mut mended = study.clone();
    apply(&mut mended, &mend.edit);
    let left = match mended.validate() {
        Ok(valid) => valid.warnings().to_vec(),
        Err(problems) => problems,
    };
    let is_as_bad = |p: &Problem| p.severity == Severity::Fault || p.severity == problem.severity;
    left.iter().all(|p| p.place != problem.place || !is_as_bad(p))
}
