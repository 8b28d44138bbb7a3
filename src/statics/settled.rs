//! The settled state of one load case under one bound: its pools, and what they press on.

use crate::geom::{Edge, Point, Vec2, cross};
use crate::problem::Place;
use crate::section::{Face, Region, Section, Wall};

use super::cells::{cell_volumes_by_body, sums};
use super::gas::{GasPocket, gas_pockets};
use super::loads::{EdgeLoad, PlateLoad, Press, centroid, edge_loads, plate_loads, pressure_at};
use super::pools::{Body, Look};
use super::pour_over::MouthSpill;
use super::tilted::Chord;
use super::wetted::{WetPart, wetted};

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

/// A pool: a connected body of liquid with one level.
#[derive(Clone, Debug, PartialEq)]
pub struct Pool {
    /// Volume, m3.
    pub volume_m3: f64,
    /// Level v = up . x of its surface, m.
    pub level_m: f64,
    /// z of the surface's line at s = 0, m; none where the surface is vertical.
    pub offset_m: Option<f64>,
    /// Its surface, in pieces from left to right as effective gravity sees them.
    pub surface: Vec<Chord>,
    /// Its deepest point.
    pub deepest: Point,
    /// Its centroid.
    pub centroid: Point,
    /// The compartment that it lies in.
    pub compartment: usize,
    /// The cells that it stands in; empty where they were not asked for.
    pub cell_idxs: Vec<usize>,
    /// rho |G| of its liquid, Pa/m.
    pub weight_pa_per_m: f64,
    /// The parts of walls and plates that it wets, the liquid on the left of each.
    pub wetted: Vec<Face>,
}

/// The settled state of a load case under one bound.
#[derive(Clone, Debug, PartialEq)]
pub struct Settled {
    /// Liquid left in the tank, m3.
    pub volume_m3: f64,
    /// Liquid that left on the way, m3.
    pub spilled_m3: f64,
    /// The same by mouths, in the order in which they first spilled.
    pub spills: Vec<MouthSpill>,
    /// Mass of the liquid left, kg.
    pub mass_kg: f64,
    /// The pools, the largest first.
    pub pools: Vec<Pool>,
    /// Centroid of the liquid.
    pub centroid: Point,
    /// Highest point of the liquid along the tank's z.
    pub highest_wetted: Point,
    /// Highest gage pressure on any wall or plate, gas included, Pa.
    pub peak_pa: f64,
    /// Where.
    pub peak_at: Point,
    /// The edge, obstacle or plate.
    pub peak_place: Place,
    /// Lowest absolute pressure in the liquid, Pa.
    pub lowest_abs_pa: f64,
    /// Loads on every edge of the outline, then on every edge of the obstacles; gas left out.
    pub edges: Vec<EdgeLoad>,
    /// Net loads across every plate.
    pub plates: Vec<PlateLoad>,
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
    /// Volume of liquid in each cell of the region, m3; empty where it was not asked for.
    pub cells_m3: Vec<f64>,
    /// Gas that touches no mouth, the largest pocket first.
    pub gas: Vec<GasPocket>,
}

impl Settled {
    /// The largest pool; none in an empty tank.
    pub fn main_pool(&self) -> Option<&Pool> {
        self.pools.first()
    }
}

/// What [`settle`] needs beside the section.
#[derive(Clone, Copy)]
pub struct Setting<'a> {
    /// Liquid that left on the way, by mouths.
    pub spills: &'a [MouthSpill],
    /// |G|, m/s2.
    pub gravity_m_per_s2: f64,
    /// Density of the liquid of each compartment, kg/m3.
    pub density_kg_per_m3: &'a dyn Fn(usize) -> f64,
    /// Gas pressure above the liquid, Pa gage.
    pub gas_pa: f64,
    /// Outside air pressure, Pa absolute.
    pub air_pa: f64,
    /// Point about which moments are taken.
    pub moment_about: Point,
    /// Named points.
    pub points: &'a [(&'a str, Point)],
    /// Whether cells and centroids are asked for, and moments with them; without, centroids are deepest points.
    pub in_full: bool,
}

/// Bodies below this share of the largest one are drops that rounding leaves: they press nowhere to speak of, and are no
/// pools.
const LEAST_POOL: f64 = 1e-9;

/// The settled state of `bodies` along `look`.
///
/// The load on side walls that a width law shapes is what the divergence theorem leaves to them: total less edges.
pub fn settle(section: &Section, region: &Region, look: &Look, bodies: &[Body], setting: &Setting) -> Settled {
    let (up, width) = (look.up, &section.width);
    let about = setting.moment_about;
    let levels: Vec<f64> = bodies.iter().map(|b| look.level_of(b)).collect();
    let press: Vec<Press> = bodies
        .iter()
        .zip(&levels)
        .map(|(b, &level_m)| Press {
            level_m,
            weight_pa_per_m: (setting.density_kg_per_m3)(b.compartment) * setting.gravity_m_per_s2,
        })
        .collect();
    let wet = wetted(look, bodies, &levels);
    let edges = edge_loads(section, region, &wet, &press, up, about);
    let plates = plate_loads(section, region, &wet, &press, up, about);
    let most = bodies.iter().map(|b| b.volume_m3).fold(0.0, f64::max);
    let in_cells = if setting.in_full {
        cell_volumes_by_body(region, width, look, bodies)
    } else {
        vec![Vec::new(); bodies.len()]
    };
    let mut pools = Vec::new();
    let (mut total, mut total_moment, mut mass) = (Vec2::zeros(), 0.0, 0.0);
    let mut moments = Vec2::zeros();
    for (i, body) in bodies.iter().enumerate().filter(|(_, b)| b.volume_m3 > LEAST_POOL * most) {
        let Press { level_m, weight_pa_per_m } = press[i];
        let surface: Vec<Chord> =
            look.basins.surface(body.basin, level_m).into_iter().map(|(left, right)| Chord { left, right }).collect();
        let wetted: Vec<Edge> = wet.iter().filter(|w| w.body_idx == i).map(|w| w.edge).collect();
        let lowest = wetted.iter().map(|e| (e.extent(up).0, e)).min_by(|a, b| a.0.0.total_cmp(&b.0.0));
        let deepest = lowest.map_or_else(Point::origin, |((_, t), e)| e.point_at(t));
        let centroid = setting.in_full.then(|| centroid(&wetted, &surface, width, up, level_m, body.volume_m3));
        let centroid = centroid.flatten().unwrap_or(deepest);
        let force = up * (-weight_pa_per_m * body.volume_m3);
        let density = (setting.density_kg_per_m3)(body.compartment);
        total += force;
        total_moment += cross(centroid - about, force);
        mass += density * body.volume_m3;
        moments += centroid.coords * (density * body.volume_m3);
        pools.push(Pool {
            volume_m3: body.volume_m3,
            level_m,
            offset_m: (up.y != 0.0).then(|| level_m / up.y),
            surface,
            deepest,
            centroid,
            compartment: body.compartment,
            cell_idxs: (0..in_cells[i].len()).filter(|&c| in_cells[i][c] > LEAST_POOL * body.volume_m3).collect(),
            weight_pa_per_m,
            wetted: wet.iter().filter(|w| w.body_idx == i).map(|w| Face { edge: w.edge, wall: w.wall }).collect(),
        });
    }
    pools.sort_by(|a, b| b.volume_m3.total_cmp(&a.volume_m3));
    let (mut force, mut moment) = (Vec2::zeros(), 0.0);
    for (f, m) in
        edges.iter().map(|e| (e.force_n, e.moment_n_m)).chain(plates.iter().map(|p| (p.force_n, p.moment_n_m)))
    {
        force += f;
        moment += m;
    }
    let is_constant = width.constant().is_some();
    let (peak_pa, peak_at, peak_place) = peak(region, &edges, &plates);
    let lowest = || {
        let floor = region.geometry().iter().map(|e| (e.extent(up).0, e)).min_by(|a, b| a.0.0.total_cmp(&b.0.0));
        floor.map_or_else(Point::origin, |((_, t), e)| e.point_at(t))
    };
    Settled {
        volume_m3: bodies.iter().map(|b| b.volume_m3).sum(),
        spilled_m3: setting.spills.iter().map(|s| s.volume_m3).fold(0.0, |a, b| a + b),
        spills: setting.spills.to_vec(),
        mass_kg: mass,
        // Nothing: the lowest point, to which the centroid tends.
        centroid: if mass > 0.0 { Point::from(moments / mass) } else { lowest() },
        highest_wetted: highest_wetted(&pools).unwrap_or_else(lowest),
        peak_pa: peak_pa + setting.gas_pa,
        peak_at,
        peak_place,
        // Vented liquid is nowhere below the gas above it.
        lowest_abs_pa: setting.air_pa + setting.gas_pa,
        roof: roof_contact(&wet, &press, up),
        points: points(look, bodies, &press, setting),
        edges,
        plates,
        // The side walls' normals have no s component.
        sides_force_n: if is_constant { Vec2::zeros() } else { Vec2::new(0.0, total.y - force.y) },
        sides_moment_n_m: if is_constant { 0.0 } else { total_moment - moment },
        total_force_n: total,
        total_moment_n_m: total_moment,
        pools,
        cells_m3: if setting.in_full { sums(region, &in_cells) } else { Vec::new() },
        gas: gas_pockets(section, region, look, bodies),
    }
}

/// The deepest place on any wall or plate.
fn peak(region: &Region, edges: &[EdgeLoad], plates: &[PlateLoad]) -> (f64, Point, Place) {
    let on_edges =
        edges.iter().filter(|e| e.is_wall).filter_map(|e| e.peak.map(|(pa, at)| (pa, at, e.place.clone())));
    let on_plates = plates.iter().enumerate().filter_map(|(plate_idx, p)| {
        p.highest.map(|(pa, at)| (pa, at, Place::Plate { plate_idx, opening_idx: None }))
    });
    let all = on_edges.chain(on_plates);
    // The first of equals: a wall rather than the plate that stands on it.
    let highest = all.reduce(|a, b| if b.0 > a.0 { b } else { a });
    highest.unwrap_or((0.0, region.geometry()[0].start, Place::Whole))
}

fn points(look: &Look, bodies: &[Body], press: &[Press], setting: &Setting) -> Vec<PointPressure> {
    let owners = look.owners(bodies);
    setting
        .points
        .iter()
        .map(|&(name, at)| {
            let body = look.basins.basin_at(at).and_then(|basin| owners[basin]);
            let liquid = body.map_or(0.0, |i| pressure_at(at, press[i].level_m, look.up, press[i].weight_pa_per_m));
            PointPressure { name: name.to_owned(), at, gage_pa: setting.gas_pa + liquid.max(0.0), wet: liquid > 0.0 }
        })
        .collect()
}

/// Highest liquid along the tank's z: on a wetted wall or at an end of a surface.
fn highest_wetted(pools: &[Pool]) -> Option<Point> {
    let walls = pools.iter().flat_map(|p| &p.wetted).map(|face| {
        let (_, (_, t)) = face.edge.extent(Vec2::y());
        face.edge.point_at(t)
    });
    let ends = pools.iter().flat_map(|p| &p.surface).flat_map(|c| [c.left, c.right]);
    walls.chain(ends).max_by(|a, b| a.y.total_cmp(&b.y))
}

/// A wall counts as roof where its outward normal lies within 45 degrees of the tank's z: cosine.
const ROOF_COSINE: f64 = std::f64::consts::FRAC_1_SQRT_2;

fn roof_contact(wet: &[WetPart], press: &[Press], up: Vec2) -> Option<RoofContact> {
    let mut contact: Option<RoofContact> = None;
    for part in wet {
        let Wall::Outline { edge_idx, is_mouth: false } = part.wall else { continue };
        for (from, to) in roof_parts(&part.edge) {
            let roof = part.edge.part(from, to);
            let ((lowest, t), _) = roof.extent(up);
            let Press { level_m, weight_pa_per_m } = press[part.body_idx];
            let (peak_pa, at) = (weight_pa_per_m * (level_m - lowest), roof.point_at(t));
            let found = contact.get_or_insert(RoofContact { wetted_length_m: 0.0, peak_pa: 0.0, at, edge_idx });
            found.wetted_length_m += roof.length();
            if peak_pa > found.peak_pa {
                *found = RoofContact { peak_pa, at, edge_idx, ..*found };
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
