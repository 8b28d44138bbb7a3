//! The basins of a look as vessels of one level each, and where liquid crosses over between them.
//!
//! A basin whose parts hang together below a sill is one vessel. Where two parts that count meet, at a sill, each is a
//! vessel of its own that goes on above it: of what the joined basin holds over the sill each gets a fixed share, so that
//! vessels at one level hold together exactly what the basin does.

use crate::geom::Basins;

/// Parts of less than this share of their whole do not count for themselves.
const LEAST_SHARE: f64 = 1e-3;

/// Heights over which a vessel's table is divided evenly, beside those at which its edges begin and end.
const N_HEIGHTS: usize = 16;

/// A part of the section that has one level.
pub(super) struct Vessel {
    /// The basin below its lowest sill.
    pub basin: usize,
    pub capacity_m3: f64,
    pub bottom_m: f64,
    /// From empty to full.
    layers: Vec<Layer>,
}

/// A stretch of levels in which the volume is a square of the level: exact between straight edges under a constant width.
struct Layer {
    bottom_m: f64,
    top_m: f64,
    /// Below its bottom.
    below_m3: f64,
    volume_m3: f64,
    /// Area of the surface at its bottom, and how it grows.
    area_m2: f64,
    gain_m: f64,
}

/// A sill between two vessels, or a mouth.
pub(super) struct Crossing {
    pub from_idx: usize,
    /// None for the outside.
    pub to_idx: Option<usize>,
    pub low_m: f64,
    pub high_m: f64,
    pub area_m2: f64,
}

/// Vessels and what joins them of its own.
pub(super) struct Vessels {
    pub all: Vec<Vessel>,
    pub crossings: Vec<Crossing>,
    /// For each low point, its vessel.
    of_low: Vec<Option<usize>>,
}

impl Vessels {
    /// `counts` tells which low points matter however small they are: an opening leads there. `mouth_area_m2` is the area of
    /// a marked edge.
    pub fn new(basins: &Basins, counts: &dyn Fn(usize) -> bool, mouth_area_m2: &dyn Fn(u32) -> f64) -> Vessels {
        let all = basins.all();
        let mut bottoms: Vec<usize> = Vec::new();
        let mut split: Vec<usize> = Vec::new();
        let mut open: Vec<usize> = (0..all.len()).filter(|&b| all[b].parent.is_none()).collect();
        while let Some(b) = open.pop() {
            let whole_m3 = all[basins.root(b)].volume_at_top;
            let is_large = |c: &&usize| {
                all[**c].volume_at_top > LEAST_SHARE * whole_m3
                    || (0..=**c).any(|low| basins.is_leaf(low) && counts(low) && basins.is_within(low, **c))
            };
            if all[b].children.iter().filter(is_large).count() > 1 {
                split.push(b);
                open.extend(&all[b].children);
            } else {
                bottoms.push(b);
            }
        }
        bottoms.sort_unstable();
        let vessel_of = |basin: usize| bottoms.iter().position(|&b| basins.is_within(basin, b));
        let of_low = (0..all.len()).map(|b| if basins.is_leaf(b) { vessel_of(b) } else { None }).collect();
        let mut vessels = Vessels { all: Vec::new(), crossings: Vec::new(), of_low };
        vessels.all = bottoms.iter().map(|&b| Vessel::new(basins, b, &bottoms)).collect();
        for b in split {
            vessels.cross_sills(basins, b);
        }
        for (b, basin) in all.iter().enumerate() {
            let Some((low_m, edge_idx)) = basin.mouth else { continue };
            let Some(from_idx) = vessels.largest(basins, b) else { continue };
            let high_m = all[basins.root(b)].top.max(low_m);
            let area_m2 = mouth_area_m2(edge_idx);
            vessels.crossings.push(Crossing { from_idx, to_idx: None, low_m, high_m, area_m2 });
        }
        vessels
    }

    /// The vessel that holds a low point.
    pub fn of_low(&self, low: usize) -> Option<usize> {
        self.of_low[low]
    }

    /// The vessels below a basin, or the one that it is a part of.
    pub fn under(&self, basins: &Basins, basin: usize) -> Vec<usize> {
        let is_under = |v: &Vessel| basins.is_within(v.basin, basin) || basins.is_within(basin, v.basin);
        (0..self.all.len()).filter(|&i| is_under(&self.all[i])).collect()
    }

    fn largest(&self, basins: &Basins, basin: usize) -> Option<usize> {
        let volume = |i: &usize| basins.all()[self.all[*i].basin].volume_at_top;
        self.under(basins, basin).into_iter().max_by(|a, b| volume(a).total_cmp(&volume(b)))
    }

    /// What pours over the sill at which the parts of a basin meet, free up to the highest point above it.
    fn cross_sills(&mut self, basins: &Basins, basin: usize) {
        let all = basins.all();
        let children = &all[basin].children;
        let outlets: Vec<_> = children.iter().filter_map(|&c| Some((c, basins.outlet(c)?))).collect();
        let mut crossed: Vec<[usize; 2]> = Vec::new();
        for (own, outlet) in &outlets {
            let back = outlets.iter().find(|(_, o)| o.neighbour == *own).map(|(_, o)| o.low);
            let from = back.map_or_else(|| self.largest(basins, *own), |low| self.of_low(low));
            let (Some(from), Some(to)) = (from, self.of_low(outlet.low)) else { continue };
            let pair = [from.min(to), from.max(to)];
            if from == to || crossed.contains(&pair) {
                continue;
            }
            crossed.push(pair);
            let (low_m, high_m) = (all[basin].bottom, all[basins.root(basin)].top);
            // As wide as the tank is, on the mean, at the sill's level.
            let surface = basins.surface(basin, low_m + 1e-6 * (high_m - low_m));
            let area_m2: f64 = surface.iter().map(|&(l, r)| basins.depth().across(l, r)).sum();
            let length_m: f64 = surface.iter().map(|(l, r)| (r - l).norm()).sum();
            let area_m2 = if length_m > 0.0 { area_m2 / length_m * (high_m - low_m) } else { 0.0 };
            self.crossings.push(Crossing { from_idx: from, to_idx: Some(to), low_m, high_m, area_m2 });
        }
    }
}

impl Vessel {
    fn new(basins: &Basins, basin: usize, bottoms: &[usize]) -> Vessel {
        let all = basins.all();
        let own = |b: usize| all[b].volume_at_top;
        // What the vessel gets of each basin above its own.
        let mut above: Vec<(usize, f64)> = Vec::new();
        let mut b = basin;
        while let Some(parent) = all[b].parent {
            let beside: f64 = bottoms.iter().filter(|&&o| basins.is_within(o, parent)).map(|&o| own(o)).sum();
            above.push((parent, own(basin) / beside));
            b = parent;
        }
        let volume = |level: f64| {
            let over = |&(b, share): &(usize, f64)| {
                share * (basins.volume_below(b, level.min(all[b].top)) - all[b].volume_at_bottom)
            };
            volume_in(basins, basin, level) + above.iter().map(over).sum::<f64>()
        };
        let (bottom_m, top_m) = (lowest(basins, basin), all[b].top);
        let even = |i: usize| bottom_m + (top_m - bottom_m) * (i as f64 / N_HEIGHTS as f64);
        let mut levels: Vec<f64> = (0..=N_HEIGHTS).map(even).collect();
        // Where the area of the surface may jump.
        levels.extend(basins.strips().map(|strip| strip.bottom));
        levels.retain(|level| (bottom_m..=top_m).contains(level));
        levels.sort_unstable_by(f64::total_cmp);
        levels.dedup();
        let layers: Vec<Layer> = levels.windows(2).map(|w| Layer::new(w[0], w[1], &volume)).collect();
        let capacity_m3 = layers.last().map_or(0.0, |layer| layer.below_m3 + layer.volume_m3);
        Vessel { basin, capacity_m3, bottom_m, layers }
    }

    /// Level for a volume, m; clamped to the vessel.
    pub fn level(&self, volume_m3: f64) -> f64 {
        let next = self.layers.partition_point(|layer| layer.below_m3 < volume_m3);
        let Some(layer) = self.layers.get(next.saturating_sub(1)) else { return self.bottom_m };
        layer.level((volume_m3 - layer.below_m3).clamp(0.0, layer.volume_m3))
    }

    /// Volume below a level, m3; clamped to the vessel.
    pub fn volume_below(&self, level_m: f64) -> f64 {
        let next = self.layers.partition_point(|layer| layer.bottom_m < level_m);
        let Some(layer) = self.layers.get(next.saturating_sub(1)) else { return 0.0 };
        let rise = (level_m - layer.bottom_m).clamp(0.0, layer.top_m - layer.bottom_m);
        layer.below_m3 + (layer.area_m2 + 0.5 * layer.gain_m * rise) * rise
    }
}

impl Layer {
    /// Through the volumes at bottom, middle and top.
    fn new(bottom_m: f64, top_m: f64, volume: &dyn Fn(f64) -> f64) -> Layer {
        let height = top_m - bottom_m;
        let [v0, v1, v2] = [bottom_m, 0.5 * (bottom_m + top_m), top_m].map(volume);
        let mean_m2 = (v2 - v0) / height;
        // A square that would fall at one end is not one.
        let half_gain = (2.0 * (v0 - 2.0 * v1 + v2) / height).clamp(-mean_m2, mean_m2);
        let (area_m2, gain_m) = (mean_m2 - half_gain, 2.0 * half_gain / height);
        Layer { bottom_m, top_m, below_m3: v0, volume_m3: v2 - v0, area_m2, gain_m }
    }

    fn level(&self, volume_m3: f64) -> f64 {
        let root = (self.area_m2 * self.area_m2 + 2.0 * self.gain_m * volume_m3).max(0.0).sqrt();
        let rise = if volume_m3 > 0.0 { 2.0 * volume_m3 / (self.area_m2 + root) } else { 0.0 };
        (self.bottom_m + rise).min(self.top_m)
    }
}

/// Volume of a basin and all its parts below a level.
fn volume_in(basins: &Basins, basin: usize, level: f64) -> f64 {
    let b = &basins.all()[basin];
    if b.children.is_empty() || level > b.bottom {
        return basins.volume_below(basin, level);
    }
    b.children.iter().map(|&c| volume_in(basins, c, level)).sum()
}

/// The lowest point of a basin and all its parts.
fn lowest(basins: &Basins, basin: usize) -> f64 {
    let b = &basins.all()[basin];
    b.children.iter().map(|&c| lowest(basins, c)).fold(b.bottom, f64::min)
}
