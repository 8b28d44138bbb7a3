//! What the user has chosen on the board or in a column.

use crate::app::Edit;
use crate::study::Study;

use super::plating;

/// A thing of the study, or the plumb bob. Indices count from zero.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Selected {
    /// An edge of the outline.
    Edge(usize),
    /// The vertex at which an edge of the outline starts.
    Vertex(usize),
    /// A whole obstacle.
    Obstacle(usize),
    /// One vertex of an obstacle.
    ObstacleVertex(usize, usize),
    /// A whole plate.
    Plate(usize),
    /// One corner or end of a plate.
    PlatePoint(usize, usize),
    /// One opening of a plate.
    Opening(usize, usize),
    /// A compartment with a fill of its own.
    Compartment(usize),
    /// Where the tank is emptied from.
    Sump,
    /// A named point.
    Point(usize),
    /// The plumb bob.
    Bob,
}

impl Selected {
    /// Whether the study still has it.
    pub fn is_in(self, study: &Study) -> bool {
        let section = &study.section;
        match self {
            Selected::Edge(i) | Selected::Vertex(i) => i < section.outline.len(),
            Selected::Obstacle(i) => i < section.obstacles.len(),
            Selected::ObstacleVertex(i, v) => section.obstacles.get(i).is_some_and(|o| v < o.vertices.len()),
            Selected::Plate(i) => i < section.plates.len(),
            Selected::PlatePoint(i, k) => section.plates.get(i).is_some_and(|p| k < p.points.len()),
            Selected::Opening(i, o) => section.plates.get(i).is_some_and(|p| o < p.openings.len()),
            Selected::Compartment(i) => i < study.compartments.len(),
            Selected::Sump => study.sump.is_some(),
            Selected::Point(i) => i < study.points.len(),
            Selected::Bob => true,
        }
    }

    /// The plate that it is, or is a part of.
    pub fn plate(self) -> Option<usize> {
        match self {
            Selected::Plate(i) | Selected::PlatePoint(i, _) | Selected::Opening(i, _) => Some(i),
            _ => None,
        }
    }

    /// The edit that takes it out; none for what cannot be taken out. With a corner of an obstacle the obstacle goes,
    /// and with one of the last two of a plate the plate.
    pub fn removal(self, study: &Study) -> Option<Edit> {
        if !self.is_in(study) {
            return None;
        }
        let plates = &study.section.plates;
        Some(match self {
            Selected::Vertex(i) => Edit::RemoveVertex(i),
            Selected::Obstacle(i) | Selected::ObstacleVertex(i, _) => Edit::RemoveObstacle(i),
            Selected::Plate(i) => Edit::RemovePlate(i),
            Selected::PlatePoint(i, k) => match plating::without_corner(&plates[i], k) {
                Some(plate) => Edit::Plate(i, Box::new(plate)),
                None => Edit::RemovePlate(i),
            },
            Selected::Opening(i, o) => {
                let mut plate = plates[i].clone();
                plate.openings.remove(o);
                Edit::Plate(i, Box::new(plate))
            }
            Selected::Compartment(i) => Edit::Compartments(without(&study.compartments, i)),
            Selected::Sump => Edit::Sump(None),
            Selected::Point(i) => Edit::Points(without(&study.points, i)),
            Selected::Edge(_) | Selected::Bob => return None,
        })
    }
}

fn without<T: Clone>(items: &[T], idx: usize) -> Vec<T> {
    items.iter().enumerate().filter(|(i, _)| *i != idx).map(|(_, item)| item.clone()).collect()
}
