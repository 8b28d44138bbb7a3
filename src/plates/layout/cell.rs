//! The cells of the section: the parts between walls and plates.

use crate::geom::{Basins, Depth, Point, Vec2};
use crate::section::{Region, WidthLaw};

/// A part of the section between walls and plates.
#[derive(Clone, Debug, PartialEq)]
pub struct Cell {
    /// As shown.
    pub name: String,
    /// A point inside it.
    pub inside: Point,
    /// The compartment that it is a part of: cells that openings join.
    pub compartment: usize,
    /// Its area in the section, m2.
    pub area_m2: f64,
    /// Its capacity, m3.
    pub capacity_m3: f64,
    /// What it holds standing level and at rest, m3.
    pub still_m3: f64,
    /// z of its surface then, the highest where it has several, m; none where it is dry.
    pub still_z_m: Option<f64>,
}

impl Cell {
    /// What it holds at rest as a share of its capacity.
    pub fn still_share(&self) -> f64 {
        self.still_m3 / self.capacity_m3
    }
}

/// Every cell of the region, from what each holds standing level and at rest, m3, and how high that stands, m.
pub fn cells(region: &Region, width: &WidthLaw, still_m3: &[f64], still_z_m: &[Option<f64>]) -> Vec<Cell> {
    let cut = region.cells();
    let plain = WidthLaw::Constant { width_m: 1.0 };
    (0..cut.n_parts())
        .map(|part| {
            let (edges, _) = cut.edges_of(part);
            let volume = |depth: &dyn Depth| {
                let basins = Basins::new(&edges, Vec2::y(), depth, &|_| false);
                let roots = basins.all().iter().filter(|b| b.parent.is_none());
                roots.map(|b| b.volume_at_top).sum::<f64>()
            };
            let inside = cut.inside(part);
            Cell {
                name: format!("cell {}", part + 1),
                inside,
                compartment: region.open().part_at(inside).unwrap_or_default(),
                area_m2: volume(&plain),
                capacity_m3: volume(width),
                still_m3: still_m3[part],
                still_z_m: still_z_m[part],
            }
        })
        .collect()
}
