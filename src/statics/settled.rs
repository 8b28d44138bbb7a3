//! The settled state of one load case: one pool, one level, and what it presses on.

use crate::geom::{Point, Vec2};
use crate::problem::Place;
use crate::section::{EdgeKind, Region, Section};

use super::loads::{EdgeLoad, Loads, loads, pressure_at};
use super::tilted::{Chord, Tilted};

/// Pressure at a named point.
#[derive(Clone, Debug, PartialEq)]
pub struct PointPressure {
    /// Its name.
    pub name: String,
    /// Where.
    pub at: Point,
    /// Pa gage; the gas pressure where the point is dry.
    pub gage_pa: f64,
    /// Whether liquid covers it.
    pub wet: bool,
}

/// How the liquid presses on the shut roof.
#[derive(Clone, Debug, PartialEq)]
pub struct RoofContact {
    /// Length of roof that the liquid wets, m.
    pub wetted_length_m: f64,
    /// Highest gage pressure of the liquid on the roof, Pa.
    pub peak_pa: f64,
    /// Where.
    pub at: Point,
    /// The edge of the outline.
    pub edge_idx: usize,
}

/// The settled state of a load case: one pool, one level.
#[derive(Clone, Debug, PartialEq)]
pub struct Settled {
    /// Liquid left in the tank, m3.
    pub volume_m3: f64,
    /// Liquid that left on the way, m3.
    pub spilled_m3: f64,
    /// Count of pools; one here.
    pub n_pools: usize,
    /// Level v = up . x of the surface, m.
    pub level_m: f64,
    /// z of the surface's line at s = 0, m; none where the surface is vertical.
    pub offset_m: Option<f64>,
    /// The surface pieces, from left to right as effective gravity sees them.
    pub surface: Vec<Chord>,
    /// Centroid of the liquid.
    pub centroid: Point,
    /// Highest point of the liquid along the tank's z.
    pub highest_wetted: Point,
    /// Highest gage pressure on any wall, gas included, Pa.
    pub peak_pa: f64,
    /// Where.
    pub peak_at: Point,
    /// The edge or obstacle.
    pub peak_place: Place,
    /// Lowest absolute pressure in the liquid, Pa.
    pub lowest_abs_pa: f64,
    /// Loads on every edge of the outline, then on every edge of the obstacles; gas left out.
    pub edges: Vec<EdgeLoad>,
    /// Load on the side walls that the width law shapes (zero for a constant width), N.
    pub sides_force_n: Vec2,
    /// Moment of that load about the study's moment point, N m.
    pub sides_moment_n_m: f64,
    /// Sum of all loads: liquid mass times effective gravity, N.
    pub total_force_n: Vec2,
    /// Moment of the sum about the study's moment point, N m.
    pub total_moment_n_m: f64,
    /// Pressures at the named points.
    pub points: Vec<PointPressure>,
    /// Contact with the roof, if any.
    pub roof: Option<RoofContact>,
}

/// What [`settle`] needs beside the section.
#[derive(Clone, Copy, Debug)]
pub struct Setting<'a> {
    /// Liquid left in the tank, m3.
    pub volume_m3: f64,
    /// Liquid that left on the way, m3.
    pub spilled_m3: f64,
    /// rho |G|, Pa/m.
    pub weight_pa_per_m: f64,
    /// Gas pressure above the liquid, Pa gage.
    pub gas_pa: f64,
    /// Outside air pressure, Pa absolute.
    pub air_pa: f64,
    /// Point about which moments are taken.
    pub moment_about: Point,
    /// Named points.
    pub points: &'a [(&'a str, Point)],
}

/// The settled state along `tilted`, one pool assumed.
pub fn settle(section: &Section, region: &Region, tilted: &Tilted, setting: &Setting) -> Settled {
    let Setting { volume_m3, weight_pa_per_m: weight, gas_pa, .. } = *setting;
    let up = tilted.up();
    let level_m = tilted.level_for_volume(volume_m3);
    let surface = tilted.chords(level_m);
    let Loads { edges, sides_force_n, sides_moment_n_m, total_force_n, total_moment_n_m, centroid } =
        loads(section, region, tilted, level_m, volume_m3, weight, setting.moment_about);
    let deepest = edges
        .iter()
        .filter_map(|e| e.peak.map(|(pa, at)| (pa, at, e)))
        .filter(|(_, _, e)| e.is_wall)
        .max_by(|a, b| a.0.total_cmp(&b.0));
    let (peak_pa, peak_at, peak_place) = match deepest {
        Some((pa, at, e)) => (pa + gas_pa, at, e.place.clone()),
        None => (gas_pa, region.geometry()[0].start, Place::Whole),
    };
    let points = setting
        .points
        .iter()
        .map(|&(name, at)| {
            let liquid = pressure_at(at, level_m, up, weight);
            PointPressure { name: name.to_owned(), at, gage_pa: gas_pa + liquid.max(0.0), wet: liquid > 0.0 }
        })
        .collect();
    Settled {
        volume_m3,
        spilled_m3: setting.spilled_m3,
        n_pools: tilted.n_pools(level_m),
        level_m,
        offset_m: (up.y != 0.0).then(|| level_m / up.y),
        highest_wetted: highest_wetted(region, up, level_m, &surface),
        surface,
        centroid,
        peak_pa,
        peak_at,
        peak_place,
        // Vented liquid is nowhere below the gas above it.
        lowest_abs_pa: setting.air_pa + gas_pa,
        roof: roof_contact(section, region, up, level_m, weight),
        edges,
        sides_force_n,
        sides_moment_n_m,
        total_force_n,
        total_moment_n_m,
        points,
    }
}

/// Highest liquid along the tank's z: on a wetted wall or at an end of the surface.
fn highest_wetted(region: &Region, up: Vec2, level: f64, surface: &[Chord]) -> Point {
    let walls = region.geometry().iter().flat_map(|e| {
        e.parts_below(up, level).into_iter().map(|(a, b)| {
            let part = e.part(a, b);
            let (_, (_, t)) = part.extent(Vec2::y());
            part.point_at(t)
        })
    });
    let ends = surface.iter().flat_map(|c| [c.left, c.right]);
    walls.chain(ends).max_by(|a, b| a.y.total_cmp(&b.y)).unwrap_or_else(Point::origin)
}

/// A wall counts as roof where its outward normal lies within 45 degrees of the tank's z: cosine.
const ROOF_COSINE: f64 = std::f64::consts::FRAC_1_SQRT_2;

fn roof_contact(section: &Section, region: &Region, up: Vec2, level: f64, weight: f64) -> Option<RoofContact> {
    let mut contact: Option<RoofContact> = None;
    for e in region.edges() {
        if e.obstacle_idx.is_some() || section.outline[e.edge_idx].kind == EdgeKind::Mouth {
            continue;
        }
        for (from, to) in roof_parts(&e.edge) {
            let roof = e.edge.part(from, to);
            for (a, b) in roof.parts_below(up, level) {
                let wet = roof.part(a, b);
                let ((lowest, t), _) = wet.extent(up);
                let peak_pa = weight * (level - lowest);
                let found = contact.get_or_insert(RoofContact {
                    wetted_length_m: 0.0,
                    peak_pa: 0.0,
                    at: wet.point_at(t),
                    edge_idx: e.edge_idx,
                });
                found.wetted_length_m += wet.length();
                if peak_pa > found.peak_pa {
                    *found = RoofContact { peak_pa, at: wet.point_at(t), edge_idx: e.edge_idx, ..*found };
                }
            }
        }
    }
    contact
}

/// Parameter ranges of an edge that face up enough to be roof. The outward normal is the tangent turned right, so
/// its z is minus the tangent's s.
fn roof_parts(e: &crate::geom::Edge) -> Vec<(f64, f64)> {
    if !e.is_arc() {
        return if -e.tangent_at(0.5).x >= ROOF_COSINE { vec![(0.0, 1.0)] } else { Vec::new() };
    }
    // The normal passes 45 degrees where the edge turns round along either diagonal.
    let diagonals = [Vec2::new(ROOF_COSINE, ROOF_COSINE), Vec2::new(-ROOF_COSINE, ROOF_COSINE)];
    let mut stops = vec![0.0, 1.0];
    diagonals.iter().for_each(|&d| stops.extend(e.turning_points(d)));
    stops.sort_unstable_by(f64::total_cmp);
    stops.windows(2).filter(|w| -e.tangent_at(0.5 * (w[0] + w[1])).x >= ROOF_COSINE).map(|w| (w[0], w[1])).collect()
}
