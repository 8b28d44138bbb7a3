//! A load case: what it is, where the liquid settles, how hard it presses.

use crate::analysis::{CaseResult, MouthSpill, Pour, Settled};
use crate::cases::{Attitude, LoadCase};
use crate::geom::Vec2;
use crate::units::{Quantity, number};

use super::{Table, direction_words, plural};

impl Table<'_> {
    pub(super) fn case(&mut self, n: usize, input: &LoadCase, case: &CaseResult) {
        self.lines.gap();
        self.lines.facts(&format!("{n}  "), [&case.name]);
        let onset = input.onset_s.map(|s| format!("builds up in {}", self.measure(Quantity::Time, s)));
        let held = input.duration_s.map(|s| format!("held for {}", self.measure(Quantity::Time, s)));
        let released = input.release.then(|| "then released".to_owned());
        let stands = match input.attitude {
            Attitude::Level => None,
            attitude => Some(format!("stands at {}", self.measure(Quantity::Angle, attitude.angle_rad()))),
        };
        self.fact(
            "accel",
            [
                format!("s {}", self.measure(Quantity::Acceleration, case.accel.x)),
                format!("z {}", self.measure(Quantity::Acceleration, case.accel.y)),
                format!("effective gravity {}", self.measure(Quantity::Acceleration, case.gravity.magnitude)),
            ]
            .into_iter()
            .chain(onset)
            .chain(held)
            .chain(released)
            .chain(stands),
        );
        match &case.settled {
            Ok(settled) => self.settled(case, settled),
            Err(reason) => self.fact("settled", [format!("no settled state: {reason}")]),
        }
        if let (Ok(settled), Some(Ok(sealed))) = (&case.settled, &case.sealed)
            && self.reads_as(sealed, Some(settled))
        {
            self.fact("sealed", ["with openings shut as settled, to the figures shown"]);
        }
        let others = [("sealed", &case.sealed), ("released", &case.released)];
        for (label, state) in others.into_iter().filter(|_| case.settled.is_ok()) {
            if let Some(Err(reason)) = state {
                self.fact(label, [format!("no {label} state: {reason}")]);
            }
        }
        let openings = match &case.transfer {
            Some(Ok(transfer)) => {
                let moved = format!("{} moves in all", self.measure(Quantity::Volume, transfer.moved_m3));
                let left = format!("{} of it leaves", self.measure(Quantity::Volume, transfer.left_m3));
                [Some(transfer.words.clone()), Some(moved).filter(|_| transfer.moved_m3 > 0.0)]
                    .into_iter()
                    .chain([Some(left).filter(|_| transfer.left_m3 > 0.0)])
                    .flatten()
                    .collect()
            }
            Some(Err(reason)) => vec![format!("how long levels take to even out was not worked out: {reason}")],
            None => vec![],
        };
        self.fact("openings", openings);
        self.fact("origin", Some(&input.source).filter(|s| !s.is_empty()));
        self.fact("note", Some(&input.note).filter(|s| !s.is_empty()));
        self.pools(case);
        self.states(case);
        self.plate_loads(case);
        self.verdicts(&case.verdicts, &case.absent);
    }

    fn settled(&mut self, case: &CaseResult, settled: &Settled) {
        let tilt = case.gravity.tilt_rad.map(|rad| format!("tilt {}", self.measure(Quantity::Angle, rad)));
        let slope = case.gravity.slope.map(|slope| format!("slope {}", number(slope, 3)));
        // Of several pools each has its own row.
        let pool = settled.main_pool().filter(|_| settled.pools.len() == 1);
        let offset = pool.and_then(|p| p.offset_m).map(|m| format!("z {} at s = 0", self.level(Quantity::Length, m)));
        self.fact("surface", [tilt, slope, offset].into_iter().flatten().collect::<Vec<_>>());
        self.fact(
            "liquid",
            [
                format!(
                    "{} stays in {}",
                    self.level(Quantity::Volume, settled.volume_m3),
                    plural(settled.pools.len(), "pool")
                ),
                self.spilled(settled),
                format!(
                    "centroid s {}, z {}",
                    self.level(Quantity::Length, settled.centroid.x),
                    self.level(Quantity::Length, settled.centroid.y)
                ),
                format!("reaches z {}", self.level(Quantity::Length, settled.highest_wetted.y)),
            ],
        );
        let pockets = self.pockets(case);
        self.fact("gas", pockets);
        self.fact("poured", case.pours.iter().map(|pour| self.pour(case, pour)).collect::<Vec<_>>());
        if let Some(Ok(_)) = case.released {
            self.fact("trapped", [self.trapped(case)]);
        }
        let roof = settled.roof.as_ref().map(|roof| {
            format!(
                "roof wetted over {}, up to {} gage",
                self.measure(Quantity::Length, roof.wetted_length_m),
                self.measure(Quantity::GagePressure, roof.peak_pa)
            )
        });
        let peak = format!(
            "{} gage at most, on {}",
            self.measure(Quantity::GagePressure, settled.peak_pa),
            self.report.place_words(&settled.peak_place)
        );
        let lowest = format!("{} at least", self.measure(Quantity::AbsolutePressure, settled.lowest_abs_pa));
        self.fact("pressure", [Some(peak), Some(lowest), roof].into_iter().flatten().collect::<Vec<_>>());
        let about = self.report.study.moment_about;
        self.fact(
            "force",
            [
                format!("s {}", self.measure(Quantity::Force, settled.total_force_n.x)),
                format!("z {}", self.measure(Quantity::Force, settled.total_force_n.y)),
                format!(
                    "moment {} about s {}, z {}",
                    self.measure(Quantity::Moment, settled.total_moment_n_m),
                    self.measure(Quantity::Length, about.x),
                    self.measure(Quantity::Length, about.y)
                ),
            ],
        );
        self.fact(
            "points",
            settled
                .points
                .iter()
                .map(|p| {
                    let dry = if p.wet { "" } else { " (dry)" };
                    format!("{} {} gage{dry}", p.name, self.measure(Quantity::GagePressure, p.gage_pa))
                })
                .collect::<Vec<_>>(),
        );
    }

    /// How much left, and by which mouths where there are several.
    fn spilled(&self, settled: &Settled) -> String {
        let all = format!("{} spilled", self.measure(Quantity::Volume, settled.spilled_m3));
        let by = |s: &MouthSpill| format!("by {}", self.report.mouth_name(s.mouth_idx));
        match settled.spills.as_slice() {
            [] => all,
            [_] if self.report.study.section.mouths().len() == 1 => all,
            [only] => format!("{all} {}", by(only)),
            several => {
                let parts: Vec<String> = several
                    .iter()
                    .map(|s| format!("{} {}", self.measure(Quantity::Volume, s.volume_m3), by(s)))
                    .collect();
                format!("{all}: {}", parts.join(", "))
            }
        }
    }

    /// Gas that no mouth opens to air.
    fn pockets(&self, case: &CaseResult) -> Vec<String> {
        let states = self.states_of(case).into_iter();
        states
            .flat_map(|(name, state)| state.gas.iter().map(move |pocket| (name, pocket)))
            .map(|(name, pocket)| {
                let volume = self.measure(Quantity::Volume, pocket.volume_m3);
                format!("{name}: {volume} in {} touches no mouth", self.report.cell_name(pocket.cell_idx))
            })
            .collect()
    }

    /// What went over a sill.
    fn pour(&self, case: &CaseResult, pour: &Pour) -> String {
        // To the right of effective gravity's own up.
        let right = case.gravity.up.map_or(Vec2::x(), |up| Vec2::new(up.y, -up.x));
        format!(
            "{} {} over {} at s {}, z {}",
            self.measure(Quantity::Volume, pour.volume_m3),
            direction_words(if pour.to_right { right } else { -right }),
            self.report.place_words(&pour.wall.place()),
            self.level(Quantity::Length, pour.at.x),
            self.level(Quantity::Length, pour.at.y)
        )
    }

    /// What stays behind sills after the release.
    fn trapped(&self, case: &CaseResult) -> String {
        if case.trapped.is_empty() {
            return "after the release no cell holds more than before".to_owned();
        }
        let more: Vec<String> = case
            .trapped
            .iter()
            .map(|t| {
                format!(
                    "{} more in {}",
                    self.measure(Quantity::Volume, t.volume_m3),
                    self.report.cell_name(t.cell_idx)
                )
            })
            .collect();
        format!("after the release {} than before", more.join(" and "))
    }
}
