//! The settled rise at the mouths, with the walls carried on above the rim: what freeboard must cover.

use std::sync::Arc;

use crate::geom::{Edge, Point, Vec2};
use crate::section::{Cut, Mouth, Region, WidthLaw};

use super::bound::Bound;
use super::pools::{Body, Holder, LONGEST_STEP, Look, Start, Turn, trace};
use super::rim::{Carried, carry_walls_on};
use super::tilted::{Tilted, Vessel};

/// The section with its rims carried on, high enough for every direction up to a slope.
#[derive(Clone, Debug)]
pub struct CarriedOn {
    vessel: Vessel,
    cut: Cut,
    carried: Vec<Carried>,
}

/// The same, ready to be looked at along one direction.
#[derive(Clone, Debug)]
pub struct Rims {
    on: Arc<CarriedOn>,
    up: Vec2,
    brims: Vec<Point>,
    /// For each mouth that is carried on, the face that begins at its brim, and the parameter there.
    beside: Vec<Option<(u32, f64)>>,
}

/// How the liquid comes to where it is judged.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Route {
    /// As one body all the way.
    One,
    /// Over sills: followed along this turn, so far, radians.
    Turned(Turn, f64),
}

impl CarriedOn {
    /// High enough for directions that lean no more than `up`. None where effective gravity does not point toward the
    /// floor: no wall is high enough then.
    pub fn new(region: &Region, bound: Bound, width: &WidthLaw, mouths: &[Mouth], up: Vec2) -> Option<CarriedOn> {
        if up.y <= 0.0 {
            return None;
        }
        let tan = (up.x / up.y).abs();
        // Higher than any liquid of this section can stand against one wall: a wedge of all its area, and more.
        let size = region.diagonal_m();
        let height = 3.0 * size + size * tan + 2.0 * (2.0 * region.area_m2() * tan).sqrt();
        let (faces, carried) = carry_walls_on(region, bound, mouths, height);
        let cut = Cut::new(faces);
        Some(CarriedOn { vessel: Vessel::new(cut.edges().to_vec(), width.clone()), cut, carried })
    }

    /// What holds liquid in it.
    pub fn holder<'a>(&'a self, region: &'a Region, width: &'a WidthLaw, starts: &'a [Start]) -> Holder<'a> {
        Holder::new(region, &self.cut, width, starts)
    }
}

impl Rims {
    /// None where effective gravity does not point toward the floor.
    pub fn new(region: &Region, bound: Bound, width: &WidthLaw, mouths: &[Mouth], up: Vec2) -> Option<Rims> {
        let on = CarriedOn::new(region, bound, width, mouths, up)?;
        Some(Rims::seen(&Arc::new(on), region, mouths, up))
    }

    /// A section whose rims are carried on high enough for `up`, seen along it.
    pub fn seen(on: &Arc<CarriedOn>, region: &Region, mouths: &[Mouth], up: Vec2) -> Rims {
        let brims: Vec<Point> = mouths.iter().map(|m| m.brim(region, up).1).collect();
        let beside = brims
            .iter()
            .zip(&on.carried)
            .map(|(brim, how)| {
                let at_brim = |e: &Edge| (e.start == *brim).then_some(0.0).or((e.end == *brim).then_some(1.0));
                let rising = on.cut.edges().iter().enumerate().rev().filter(|(_, e)| e.chord().x == 0.0);
                let mut found = rising.filter_map(|(i, e)| at_brim(e).map(|t| (i as u32, t)));
                if *how == Carried::On { found.next() } else { None }
            })
            .collect();
        Rims { on: on.clone(), up, brims, beside }
    }

    /// What became of each mouth.
    pub fn carried(&self) -> &[Carried] {
        &self.on.carried
    }

    /// Brim of each mouth, as effective gravity sees it.
    pub fn brims(&self) -> &[Point] {
        &self.brims
    }

    /// The carried-on section seen along the direction.
    pub fn tilted(&self) -> Tilted<'_> {
        self.on.vessel.tilted(self.up)
    }

    /// z of the settled surface above the brim of a mouth, m, in the carried-on section; none where that cannot be
    /// followed. `starts` say what liquid there is.
    pub fn surface_z_m(
        &self,
        tilted: &Tilted,
        region: &Region,
        width: &WidthLaw,
        starts: &[Start],
        route: Route,
        mouth_idx: usize,
    ) -> Option<f64> {
        let level = match route {
            Route::One => tilted.level_for_volume(starts.iter().map(|s| s.volume_m3).sum()),
            Route::Turned(turn, turned_rad) => {
                let holder = self.on.holder(region, width, starts);
                let trace = trace(&holder, turn, None, &[turned_rad], turned_rad, LONGEST_STEP);
                let stop = trace.stops.first()?;
                self.level_of_pool(&holder.look(stop.up), &stop.bodies, mouth_idx)?
            }
        };
        Some(self.z_at_brim(level, mouth_idx))
    }

    /// The same from where the liquid was followed to in the carried-on section: `bodies` seen in `look`.
    pub fn surface_z_m_of(&self, look: &Look, bodies: &[Body], mouth_idx: usize) -> Option<f64> {
        Some(self.z_at_brim(self.level_of_pool(look, bodies, mouth_idx)?, mouth_idx))
    }

    /// Level of the pool under a mouth; where there is none, of the dry bottom.
    fn level_of_pool(&self, look: &Look, bodies: &[Body], mouth_idx: usize) -> Option<f64> {
        let (face_idx, t) = self.beside[mouth_idx]?;
        let low = look.basins.descend_from(face_idx, t)?;
        Some(match look.owners(bodies)[low] {
            Some(i) => look.level_of(&bodies[i]),
            None => look.basins.all()[low].bottom,
        })
    }

    /// z of a level above the brim of a mouth, m.
    fn z_at_brim(&self, level: f64, mouth_idx: usize) -> f64 {
        (level - self.up.x * self.brims[mouth_idx].x) / self.up.y
    }
}
