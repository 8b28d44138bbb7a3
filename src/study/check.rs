//! Every fault of a study, found at once, with its place.

use crate::cases::Accel;
use crate::geom::{Path, Vec2};
use crate::problem::{Place, Problem, Severity};
use crate::section::{self, Region, Wall};
use crate::statics::{Start, Vessel};

use super::{Fill, Limit, Study, ValidStudy};

impl Study {
    /// The door: a valid study, or every fault and warning, each with its place.
    pub fn validate(&self) -> Result<ValidStudy, Vec<Problem>> {
        let mut problems = Vec::new();
        self.check_numbers(&mut problems);
        self.check_materials(&mut problems);
        self.check_cases(&mut problems);
        let region = match section::check(&self.section) {
            Ok(region) => Some(region),
            Err(faults) => {
                problems.extend(faults);
                None
            }
        };
        let mouths = self.section.mouths();
        let vessel = region.as_ref().map(|r| Vessel::new(r.geometry().to_vec(), self.section.width.clone()));
        let starts = match (&region, &vessel) {
            (Some(region), Some(vessel)) => self.starts(region, vessel, &mut problems),
            _ => Vec::new(),
        };
        if let Some(region) = &region {
            self.check_points(region, &mut problems);
            check_mouths(region, &starts, &mut problems);
            if mouths.is_empty() {
                problems.push(Problem::warning(
                    Place::Field("mouths"),
                    "no edge is a mouth: nothing can spill, and the gas is taken as vented all the same",
                    "mark the rim, hatch or breather as a mouth",
                ));
            }
        }
        let has_fault = problems.iter().any(|p| p.severity == Severity::Fault);
        match (region, vessel) {
            (Some(region), Some(vessel)) if !has_fault => {
                let liquids = self.liquids(&region);
                Ok(ValidStudy { study: self.clone(), region, vessel, mouths, starts, liquids, warnings: problems })
            }
            _ => {
                problems.sort_by_key(|p| p.severity);
                Err(problems)
            }
        }
    }

    fn check_numbers(&self, problems: &mut Vec<Problem>) {
        let mut must = |ok: bool, field: &'static str, message: String, hint: &str| {
            if !ok {
                problems.push(Problem::fault(Place::Field(field), message, hint));
            }
        };
        let above_zero = |x: f64| x.is_finite() && x > 0.0;
        let g = self.gravity_m_per_s2;
        must(above_zero(g), "gravity", format!("{g} m/s2"), "give a gravity above zero; 9.80665 is standard");
        let air = self.air_pressure_abs_pa;
        must(above_zero(air), "air pressure", format!("{air} Pa"), "give an absolute pressure above zero");
        let gas = self.ullage_gage_pa;
        let is_gas = gas.is_finite() && gas > -air;
        must(is_gas, "gas pressure", format!("{gas} Pa gage"), "give a gage pressure above a perfect vacuum");
        let density = self.liquid.density_kg_per_m3;
        must(above_zero(density), "density", format!("{density} kg/m3"), "give a density above zero");
        if let Some(pv) = self.liquid.vapour_pressure_abs_pa {
            let hint = "give an absolute pressure of zero or more, or leave it out";
            must(pv.is_finite() && pv >= 0.0, "vapour pressure", format!("{pv} Pa"), hint);
        }
        if let Some(sigma) = self.liquid.surface_tension_n_per_m {
            let hint = "give a tension above zero, or leave it out";
            must(above_zero(sigma), "surface tension", format!("{sigma} N/m"), hint);
        }
        let c_d = self.discharge_coefficient;
        let is_share = c_d.is_finite() && c_d > 0.0 && c_d <= 1.0;
        must(is_share, "discharge coefficient", format!("{c_d}"), "give a number above 0 and up to 1; 0.6 is usual");
        let is_place = self.sump.is_none_or(|p| p.x.is_finite() && p.y.is_finite());
        must(is_place, "sump", "a coordinate is not finite".to_owned(), "give finite coordinates");
        let about = self.moment_about;
        let is_place = about.x.is_finite() && about.y.is_finite();
        must(is_place, "moment point", format!("s {} m, z {} m", about.x, about.y), "give finite coordinates");
        for (i, record) in self.records.iter().enumerate() {
            let value = record.limit.measure().si;
            let others = match record.limit {
                Limit::CellVolume { empty_to, full_from, .. } => [empty_to, full_from],
                Limit::RatedFlow { flow_m3_per_s, .. } => [flow_m3_per_s, 0.0],
                _ => [0.0; 2],
            };
            if !others.iter().all(|x| x.is_finite() && *x >= 0.0) {
                let message = format!("a number of {:?} is below zero or not finite", record.title);
                problems.push(Problem::fault(Place::Record(i), message, "give numbers of zero or more"));
            }
            if !(value.is_finite() && value >= 0.0) {
                let message = format!("the limit of {:?} is {value}", record.title);
                problems.push(Problem::fault(Place::Record(i), message, "give a limit of zero or more"));
            }
        }
    }

    /// Materials of its own, and those that the plates name.
    fn check_materials(&self, problems: &mut Vec<Problem>) {
        for (i, material) in self.materials.iter().enumerate() {
            let mut must = |ok: bool, message: String, hint: &str| {
                if !ok {
                    problems.push(Problem::fault(Place::Material(i), message, hint));
                }
            };
            let m = material;
            must(!m.name.is_empty(), "has no name".to_owned(), "name it, so that plates can call it");
            let is_new = self.materials[..i].iter().all(|other| other.name != m.name);
            must(is_new, format!("an earlier one is called {:?} too", m.name), "give each material its own name");
            for (what, value, unit) in [
                ("yield stress", m.yield_pa, "Pa"),
                ("modulus", m.modulus_pa, "Pa"),
                ("density", m.density_kg_per_m3, "kg/m3"),
            ] {
                let is_sane = value.is_finite() && value > 0.0;
                must(is_sane, format!("its {what} is {value} {unit}"), "give a value above zero");
            }
            let hint = "give a number from 0 to 0.5; 0.3 is usual for metals";
            must((0.0..=0.5).contains(&m.poisson), format!("its Poisson's ratio is {}", m.poisson), hint);
            let hint = "give yield over allowable stress: 1 or more";
            must(m.factor.is_finite() && m.factor >= 1.0, format!("its factor is {}", m.factor), hint);
        }
        for (plate_idx, plate) in self.section.plates.iter().enumerate() {
            if !plate.material.is_empty() && self.material(&plate.material).is_none() {
                let message =
                    format!("its material {:?} is neither in the scenario nor in the table", plate.material);
                let place = Place::Plate { plate_idx, opening_idx: None };
                problems.push(Problem::warning(place, message, "choose one of the table, or add it"));
            }
        }
    }

    fn check_cases(&self, problems: &mut Vec<Problem>) {
        if self.cases.is_empty() {
            problems.push(Problem::fault(Place::Field("load cases"), "there is no load case", "add one"));
        }
        for (i, case) in self.cases.iter().enumerate() {
            let numbers = match case.accel {
                Accel::Components { a_s, a_z, .. } => [a_s, a_z],
                Accel::Polar { magnitude, direction_deg, .. } => [magnitude, direction_deg],
            };
            let times = [case.onset_s, case.duration_s].map(|t| t.unwrap_or(0.0));
            let phi = case.attitude.angle_rad();
            // Ten thousand times gravity: beyond any tank, and well within what f64 carries.
            let is_sane = numbers.iter().all(|x| x.is_finite() && x.abs() <= 1e5) && phi.is_finite();
            if !(is_sane && times.iter().all(|t| t.is_finite() && *t >= 0.0)) {
                let hint = "give finite numbers, accelerations up to 100 000, times of zero or more";
                problems.push(Problem::fault(Place::Case(i), "a number is not finite or out of range", hint));
            }
            if matches!(case.accel, Accel::Polar { magnitude, .. } if magnitude < 0.0) {
                let hint = "give the size, and turn the direction by 180°";
                problems.push(Problem::fault(Place::Case(i), "the magnitude is below zero", hint));
            }
            if self.cases[..i].iter().any(|other| other.name == case.name) {
                let message = format!("an earlier case is called {:?} too", case.name);
                problems.push(Problem::warning(Place::Case(i), message, "give each case its own name"));
            }
        }
    }

    fn check_points(&self, region: &Region, problems: &mut Vec<Problem>) {
        let outline = Path::new(self.section.edges());
        let slack = 1e-9 * region.diagonal_m();
        if self.sump.is_some_and(|p| region.open().part_at(p).is_none()) {
            let message = "lies outside the tank: drain paths are judged as if there were none";
            problems.push(Problem::warning(Place::Field("sump"), message, "move it inside, or take it out"));
        }
        for (i, point) in self.points.iter().enumerate() {
            let p = point.at;
            if !(p.x.is_finite() && p.y.is_finite()) {
                let hint = "give finite coordinates";
                problems.push(Problem::fault(Place::Point(i), "a coordinate is not finite", hint));
            } else if !outline.contains(p) && outline.edges().iter().all(|e| e.nearest(p).1 > slack) {
                let message = format!("{:?} lies outside the outline", point.name);
                problems.push(Problem::warning(Place::Point(i), message, "move it inside, or delete it"));
            }
        }
    }

    /// What liquid there is: the common fill first, then each compartment's own.
    fn starts(&self, region: &Region, vessel: &Vessel, problems: &mut Vec<Problem>) -> Vec<Start> {
        let open = region.open();
        let mut owner: Vec<Option<usize>> = vec![None; open.n_parts()];
        let mut starts = Vec::new();
        for (i, compartment) in self.compartments.iter().enumerate() {
            let place = Place::Compartment(i);
            let p = compartment.at;
            let part = if p.x.is_finite() && p.y.is_finite() { open.part_at(p) } else { None };
            let Some(part) = part else {
                let message = format!("s {} m, z {} m lies outside the tank", p.x, p.y);
                problems.push(Problem::fault(place, message, "give a point inside the compartment"));
                continue;
            };
            if let Some(earlier) = owner[part] {
                let message = format!("is the same compartment as {}", earlier + 1);
                let hint = "give each tight compartment one fill; openings join cells into one compartment";
                problems.push(Problem::fault(place, message, hint));
                continue;
            }
            owner[part] = Some(i);
            let own = Vessel::new(open.edges_of(part).0, self.section.width.clone());
            let volume_m3 = fill_volume(compartment.fill, &own, place, problems);
            starts.push(Start { compartments: vec![part], volume_m3, vessel: own, is_common: false });
        }
        let common: Vec<usize> = (0..open.n_parts()).filter(|&part| owner[part].is_none()).collect();
        if common.is_empty() {
            problems.push(Problem::warning(
                Place::Field("fill"),
                "every compartment has a fill of its own: the common fill applies to none",
                "take the fill of a compartment out, or leave it so",
            ));
            return starts;
        }
        let vessel = if starts.is_empty() {
            vessel.clone()
        } else {
            let edges = common.iter().flat_map(|&part| open.edges_of(part).0).collect();
            Vessel::new(edges, self.section.width.clone())
        };
        let volume_m3 = fill_volume(self.fill, &vessel, Place::Field("fill"), problems);
        starts.insert(0, Start { compartments: common, volume_m3, vessel, is_common: true });
        starts
    }

    /// For each compartment of the region, the index of its own liquid's entry in the study.
    fn liquids(&self, region: &Region) -> Vec<Option<usize>> {
        let mut liquids = vec![None; region.open().n_parts()];
        for (i, compartment) in self.compartments.iter().enumerate() {
            if let (Some(part), Some(_)) = (region.open().part_at(compartment.at), &compartment.liquid) {
                liquids[part] = Some(i);
            }
        }
        liquids
    }
}

/// Warns of mouths that stand open below the still level of a compartment beside them.
fn check_mouths(region: &Region, starts: &[Start], problems: &mut Vec<Problem>) {
    let open = region.open();
    let mut levels = vec![f64::NEG_INFINITY; open.n_parts()];
    for start in starts.iter().filter(|s| s.volume_m3 > 0.0) {
        let level = start.vessel.tilted(Vec2::y()).level_for_volume(start.volume_m3);
        start.compartments.iter().for_each(|&part| levels[part] = level);
    }
    let slack = 1e-9 * region.diagonal_m();
    for (i, face) in open.faces().iter().enumerate() {
        let Wall::Outline { edge_idx, is_mouth: true } = face.wall else { continue };
        let (lowest, level) = (face.edge.extent(Vec2::y()).0.0, levels[open.part_of(i)]);
        let place = Place::Edge(edge_idx);
        if level > lowest + slack && problems.iter().all(|p| p.place != place) {
            let message =
                format!("is a mouth that reaches down to z {lowest:.4} m, below the still level at z {level:.4} m");
            problems.push(Problem::warning(place, message, "lower the fill, or move the mouth up"));
        }
    }
}

/// A fill as a volume, m3; a fault where it lies outside the vessel.
fn fill_volume(fill: Fill, vessel: &Vessel, place: Place, problems: &mut Vec<Problem>) -> f64 {
    let tilted = vessel.tilted(Vec2::y());
    let capacity = vessel.capacity_m3();
    let (bottom, top) = tilted.span();
    let slack = 1e-9;
    let (value, low, high, unit) = match fill {
        Fill::Volume(v) => (v, 0.0, capacity, "m3"),
        Fill::Share(share) => (share, 0.0, 1.0, "of capacity"),
        Fill::Level(z) => (z, bottom, top, "m"),
        Fill::Ullage(d) => (d, 0.0, top - bottom, "m"),
    };
    let span = high - low;
    if !(value.is_finite() && value >= low - slack * span && value <= high + slack * span) {
        let message = format!("{value} {unit} is not between {low:.6} and {high:.6}");
        problems.push(Problem::fault(place, message, "give a fill between empty and full"));
    }
    let volume = match fill {
        Fill::Volume(v) => v,
        Fill::Share(share) => share * capacity,
        Fill::Level(z) => tilted.volume_below(z),
        Fill::Ullage(d) => tilted.volume_below(top - d),
    };
    if volume.is_finite() { volume.clamp(0.0, capacity) } else { 0.0 }
}
