//! Passages: what lets liquid through between neighbouring cells, openings of plates and the gaps beyond their free ends.

use crate::geom::{Depth, Edge, Point};
use crate::section::{Face, Region, Section, Wall, WidthLaw};

/// A straight open stretch with a cell on either side.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Passage {
    /// The cells on its two sides; one and the same where a plate ends inside it.
    pub cell_idxs: [usize; 2],
    /// The plate that it is an opening of; none for a gap beyond a free end.
    pub plate_idx: Option<usize>,
    /// Its open share.
    pub share: f64,
    /// From end to end.
    pub edge: Edge,
}

impl Passage {
    /// Its open area, m2.
    pub fn area_m2(&self, width: &WidthLaw) -> f64 {
        self.share * across(width, self.edge)
    }

    /// Its middle.
    pub fn middle(&self) -> Point {
        self.edge.point_at(0.5)
    }
}

/// Every passage of the region.
pub fn passages(section: &Section, region: &Region) -> Vec<Passage> {
    let cells = region.cells();
    let faces = cells.faces();
    let open = |face: &Face| match face.wall {
        Wall::Carried => Some((None, 1.0)),
        Wall::Plate { plate_idx, span_m: [from, to], .. } => {
            let middle = 0.5 * (from + to);
            let opening =
                section.plates[plate_idx].openings.iter().find(|o| o.from_m <= middle && middle <= o.to_m)?;
            let length = face.edge.length();
            // Its mean width, so that round holes keep their area.
            Some((Some(plate_idx), opening.open_share(across(&section.width, face.edge) / length)))
        }
        _ => None,
    };
    let mut passages = Vec::new();
    for (i, face) in faces.iter().enumerate() {
        let Some((plate_idx, share)) = open(face) else { continue };
        let other = faces.iter().skip(i + 1).position(|f| f.edge == face.edge.reversed());
        let Some(other) = other.map(|k| i + 1 + k) else { continue };
        let cell_idxs = [cells.part_of(i), cells.part_of(other)];
        passages.push(Passage { cell_idxs, plate_idx, share, edge: face.edge });
    }
    passages
}

/// Area across the tank along an edge, m2.
fn across(width: &WidthLaw, edge: Edge) -> f64 {
    width.across(edge.start, edge.end)
}
