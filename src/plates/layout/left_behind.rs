//! What stays behind in a tank that stands level: liquid that no way leads to the sump, gas that none leads to a mouth.
//!
//! Gas rising is liquid falling, upside down: one rule does both. Openings are open, the tank is filled or emptied
//! slowly. Knows no load case and no limit.

use crate::geom::{Basins, Point, Vec2};
use crate::section::{Cut, Region, Wall, WidthLaw};
use crate::statics::{Body, Look, cell_volumes};

/// A body that stays behind.
#[derive(Clone, Debug, PartialEq)]
pub struct Remnant {
    /// Volume, m3.
    pub volume_m3: f64,
    /// The edge over which it would have to go, and what it is a part of; none where nothing leads out at all.
    pub sill: Option<(Point, Wall)>,
    /// Volume of it in each cell of the region, m3.
    pub cells_m3: Vec<f64>,
}

/// Volumes below this share of the region's are rounding.
const LEAST_SHARE: f64 = 1e-9;

/// The liquid that stays in the full tank when it is emptied at the sump, or, in compartments without one, at their
/// lowest points. The sump takes liquid in from the floor below its place.
pub fn undrained(region: &Region, width: &WidthLaw, sump: Option<Point>) -> Vec<Remnant> {
    let cut = region.open();
    let look = Look::new(cut, width, Vec2::y());
    let basins = &look.basins;
    let mut exits: Vec<Option<f64>> = vec![None; basins.all().len()];
    let mut has_exit = vec![false; basins.all().len()];
    if let Some(sump) = sump
        && let Some(floor) = floor_below(cut, sump)
        && let Some(basin) = basins.basin_at(floor + Vec2::y() * (1e-7 * region.diagonal_m()))
    {
        exits[basin] = Some(floor.y);
        has_exit[basins.root(basin)] = true;
    }
    for root in roots(basins) {
        if has_exit[root] {
            continue;
        }
        let lows = look.lows_of(root).into_iter();
        let lowest = lows.min_by(|&a, &b| basins.all()[a].bottom.total_cmp(&basins.all()[b].bottom));
        if let Some(low) = lowest {
            exits[low] = Some(basins.all()[low].bottom);
        }
    }
    remnants(region, width, &look, &exits)
}

/// The gas that stays in the empty tank when it is filled from below and vented at its mouths; none of it leaves a
/// compartment without a mouth.
pub fn unvented(region: &Region, width: &WidthLaw) -> Vec<Remnant> {
    let look = Look::new(region.open(), width, -Vec2::y());
    let exits: Vec<Option<f64>> = look.basins.all().iter().map(|b| b.mouth.map(|m| m.0)).collect();
    remnants(region, width, &look, &exits)
}

/// `exits` are the levels along the look down to which basins empty by themselves.
fn remnants(region: &Region, width: &WidthLaw, look: &Look, exits: &[Option<f64>]) -> Vec<Remnant> {
    let basins = &look.basins;
    let mut leads_out: Vec<bool> = exits.iter().map(Option::is_some).collect();
    // Children come before their parents.
    for (i, b) in basins.all().iter().enumerate() {
        leads_out[i] |= b.children.iter().any(|&c| leads_out[c]);
    }
    let mut left: Vec<(usize, f64)> = Vec::new();
    let mut open: Vec<usize> = roots(basins).collect();
    while let Some(basin) = open.pop() {
        let b = &basins.all()[basin];
        if b.children.iter().any(|&c| leads_out[c]) {
            // It empties down to the sill at which its parts met; from there each is by itself.
            open.extend(&b.children);
        } else {
            left.push((basin, exits[basin].map_or(b.volume_at_top, |level| basins.volume_below(basin, level))));
        }
    }
    left.sort_unstable_by_key(|l| l.0);
    let capacity: f64 = roots(basins).map(|root| basins.all()[root].volume_at_top).sum();
    left.retain(|&(_, volume_m3)| volume_m3 > LEAST_SHARE * capacity);
    left.into_iter()
        .map(|(basin, volume_m3)| {
            let body = Body { volume_m3, compartment: 0, basin, lows: look.lows_of(basin) };
            let outlet = basins.outlet(basin).filter(|_| exits[basin].is_none());
            Remnant {
                volume_m3,
                sill: outlet.map(|o| (o.at, look.cut.faces()[o.edge_idx as usize].wall)),
                cells_m3: cell_volumes(region, width, look, &[body]),
            }
        })
        .collect()
}

fn roots<'b>(basins: &'b Basins) -> impl Iterator<Item = usize> + 'b {
    (0..basins.all().len()).filter(|&b| basins.all()[b].parent.is_none())
}

/// The place straight below a point where the region ends.
fn floor_below(cut: &Cut, p: Point) -> Option<Point> {
    cut.part_at(p)?;
    let below = |edge: &crate::geom::Edge| {
        let crossings = edge.crossings(Vec2::x(), p.x).into_iter().map(|t| edge.point_at(t));
        let ends = [edge.start, edge.end].into_iter().filter(|q| q.x == p.x);
        crossings.chain(ends).map(|q| q.y).filter(|&z| z <= p.y).fold(f64::NEG_INFINITY, f64::max)
    };
    let z = cut.edges().iter().map(below).fold(f64::NEG_INFINITY, f64::max);
    z.is_finite().then(|| Point::new(p.x, z))
}
