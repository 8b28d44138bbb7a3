//! What the text says of a file as a whole: the study, its liquid, its cells and plates.

use crate::section::Plate;
use crate::units::Quantity;

use super::super::grid::{Grid, Side};
use super::super::lines::{WIDTH, left, width};
use super::super::value_of;
use super::{Report, Table, plural};

impl Table<'_> {
    pub(super) fn head(&mut self) {
        let Report { study, results, .. } = self.report;
        let still = &results.still;
        let revision = if study.revision.is_empty() { String::new() } else { format!("issue {}", study.revision) };
        let spaces = WIDTH.saturating_sub(width(&study.title) + width(&revision));
        if revision.is_empty() || spaces < 2 {
            self.lines.facts("", [&study.title, &revision].into_iter().filter(|s| !s.is_empty()));
        } else {
            self.lines.facts(&left(&study.title, width(&study.title) + spaces), [revision]);
        }
        self.lines.facts("", [self.report.file]);
        self.lines.facts("", ["─".repeat(WIDTH)]);
        self.fact(
            "liquid",
            [
                study.liquid.name.clone(),
                self.measure(Quantity::Density, study.liquid.density_kg_per_m3),
                self.measure(Quantity::Mass, still.mass_kg),
                format!("gas at {} gage", self.measure(Quantity::GagePressure, study.ullage_gage_pa)),
            ],
        );
        self.fact(
            "fill",
            [
                self.level(Quantity::Volume, still.volume_m3),
                format!(
                    "{} of {}",
                    self.measure(Quantity::Share, still.share),
                    self.level(Quantity::Volume, results.capacity_m3)
                ),
                format!("still level z {}", self.level(Quantity::Length, still.level_z_m)),
                format!("ullage {}", self.level(Quantity::Length, still.ullage_m)),
            ],
        );
        let own = results.compartments.iter().filter(|c| c.own_idx.is_some());
        self.fact(
            "filled",
            own.map(|c| {
                let liquid = self.report.liquid_of(c);
                let density = self.measure(Quantity::Density, liquid.density_kg_per_m3);
                format!("{} by itself: {}, {density}", c.name, liquid.name)
            })
            .collect::<Vec<_>>(),
        );
        // Rounded down: the fill shown must hold.
        let highest = still.highest_share.map(|share| (share * 1000.0).floor() / 1000.0);
        let highest = highest.map(|share| self.measure(Quantity::Share, share));
        let highest = highest.map(|share| format!("{share} of capacity spills in no load case"));
        self.fact("highest", highest);
        self.fact(
            "records",
            study
                .records
                .iter()
                .map(|record| {
                    let mark = if record.confirmed { "" } else { " (unconfirmed)" };
                    let value = value_of(record).map(|(sense, limit)| format!(" {sense} {}", limit.text(self.units)));
                    format!("{}{}{mark}", record.title, value.unwrap_or_default())
                })
                .collect::<Vec<_>>(),
        );
        for warning in &results.warnings {
            self.fact("warning", [format!("{}: {}", warning.place, warning.message), warning.hint.clone()]);
        }
        self.cells();
        self.plates();
    }

    /// The cells, where there is more than one.
    fn cells(&mut self) {
        let results = self.report.results;
        if results.cells.len() < 2 {
            return;
        }
        let has_several = results.compartments.len() > 1;
        let mut grid = Grid::new(&[
            ("cell", Side::Left),
            ("capacity", Side::Right),
            ("area", Side::Right),
            ("still", Side::Right),
            ("up to z", Side::Right),
            (if has_several { "compartment" } else { "" }, Side::Left),
        ]);
        for cell in &results.cells {
            grid.row([
                cell.name.clone(),
                self.level(Quantity::Volume, cell.capacity_m3),
                self.level(Quantity::Area, cell.area_m2),
                self.level(Quantity::Volume, cell.still_m3),
                cell.still_z_m.map_or_else(|| "–".to_owned(), |m| self.level(Quantity::Length, m)),
                if has_several { self.report.compartment_name(cell.compartment) } else { String::new() },
            ]);
        }
        grid.write(&mut self.lines);
    }

    fn plates(&mut self) {
        let mut grid = Grid::new(&[
            ("plate", Side::Left),
            ("thickness", Side::Right),
            ("solid", Side::Right),
            ("as drawn", Side::Left),
        ]);
        let section = &self.report.study.section;
        for (idx, plate) in section.plates.iter().enumerate() {
            grid.row([
                plate.label(idx),
                self.measure(Quantity::Length, plate.thickness_m),
                self.measure(Quantity::Share, plate.solid_share(&section.width)),
                self.drawn(plate),
            ]);
        }
        grid.write(&mut self.lines);
    }

    /// The verdicts on the layout of plates, where there are any plates or rules.
    pub(super) fn layout(&mut self) {
        let Some(layout) = self.report.layout() else { return };
        if layout.verdicts.is_empty() && self.report.study.section.plates.is_empty() {
            return;
        }
        self.lines.gap();
        self.lines.facts("   ", ["Plate layout, the tank standing level and at rest"]);
        self.verdicts(&layout.verdicts, &layout.absent);
    }

    /// From which point to which one a plate is drawn.
    fn drawn(&self, plate: &Plate) -> String {
        let (Some(&from), Some(&to)) = (plate.points.first(), plate.points.last()) else { return "–".to_owned() };
        let length = |m| self.level(Quantity::Length, m);
        let (s, z) = (length(from.x), length(from.y));
        match (plate.points.len(), from.x == to.x, from.y == to.y) {
            (2, true, _) => format!("s {s}, z {z} to {}", length(to.y)),
            (2, _, true) => format!("z {z}, s {s} to {}", length(to.x)),
            (n, ..) => {
                let bends = if n > 2 { format!(", {}", plural(n - 2, "bend")) } else { String::new() };
                format!("s {s}, z {z} to s {}, z {}{bends}", length(to.x), length(to.y))
            }
        }
    }
}
