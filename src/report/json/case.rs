//! What the JSON says of a load case.

use serde::Serialize;

use crate::analysis::{CaseResult, Pour, Settled, Transfer};
use crate::cases::LoadCase;

use super::super::Report;
use super::bearing::StrengthRow;
use super::state::State;
use super::verdict::{AbsentRow, VerdictRow};
use super::{Num, num};

#[derive(Clone, Debug, Serialize)]
pub(super) struct Case {
    name: String,
    note: String,
    origin: String,
    accel_s_m_per_s2: Num,
    accel_z_m_per_s2: Num,
    attitude_rad: Num,
    onset_s: Num,
    duration_s: Num,
    release: bool,
    effective_gravity: Gravity,
    settled: Option<State>,
    sealed: Option<State>,
    released: Option<State>,
    transfer: Option<TransferRow>,
    plate_strength: Vec<StrengthRow>,
    missing: Vec<Missing>,
    pours: Vec<PourRow>,
    trapped: Vec<TrappedRow>,
    verdicts: Vec<VerdictRow>,
    absent: Vec<AbsentRow>,
}

impl Case {
    pub(super) fn new(report: &Report, input: &LoadCase, result: &CaseResult) -> Case {
        let gravity = &result.gravity;
        let mut missing = vec![];
        let mut state = |name, found: Option<&Result<Settled, String>>| match found? {
            Ok(settled) => Some(State::new(report, settled)),
            Err(reason) => {
                missing.push(Missing { state: name, reason: reason.clone() });
                None
            }
        };
        let settled = state("settled", Some(&result.settled));
        let sealed = state("sealed", result.sealed.as_ref());
        let released = state("released", result.released.as_ref());
        if let Some(Err(reason)) = &result.transfer {
            missing.push(Missing { state: "transfer", reason: reason.clone() });
        }
        let transfer = result.transfer.as_ref().and_then(|found| Some(TransferRow::new(found.as_ref().ok()?)));
        Case {
            name: result.name.clone(),
            note: input.note.clone(),
            origin: input.source.clone(),
            accel_s_m_per_s2: num(result.accel.x),
            accel_z_m_per_s2: num(result.accel.y),
            attitude_rad: num(input.attitude.angle_rad()),
            onset_s: input.onset_s.and_then(num),
            duration_s: input.duration_s.and_then(num),
            release: input.release,
            effective_gravity: Gravity {
                s_m_per_s2: num(gravity.vec.x),
                z_m_per_s2: num(gravity.vec.y),
                magnitude_m_per_s2: num(gravity.magnitude),
                slope: gravity.slope.and_then(num),
                tilt_rad: gravity.tilt_rad.and_then(num),
            },
            settled,
            sealed,
            released,
            transfer,
            plate_strength: result.plates.iter().map(|plate| StrengthRow::new(report, plate)).collect(),
            missing,
            pours: result.pours.iter().map(|pour| PourRow::new(report, pour)).collect(),
            trapped: result
                .trapped
                .iter()
                .map(|t| TrappedRow { cell: report.cell_name(t.cell_idx), volume_m3: num(t.volume_m3) })
                .collect(),
            verdicts: result.verdicts.iter().map(|v| VerdictRow::new(report, Some(result), v)).collect(),
            absent: result.absent.iter().map(AbsentRow::new).collect(),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct Gravity {
    s_m_per_s2: Num,
    z_m_per_s2: Num,
    magnitude_m_per_s2: Num,
    slope: Num,
    tilt_rad: Num,
}

#[derive(Clone, Debug, Serialize)]
struct Missing {
    state: &'static str,
    reason: String,
}

#[derive(Clone, Debug, Serialize)]
struct PourRow {
    sill: String,
    s_m: Num,
    z_m: Num,
    to_right: bool,
    volume_m3: Num,
}

impl PourRow {
    fn new(report: &Report, pour: &Pour) -> PourRow {
        PourRow {
            sill: report.place_words(&pour.wall.place()),
            s_m: num(pour.at.x),
            z_m: num(pour.at.y),
            to_right: pour.to_right,
            volume_m3: num(pour.volume_m3),
        }
    }
}

#[derive(Clone, Debug, Serialize)]
struct TrappedRow {
    cell: String,
    volume_m3: Num,
}

#[derive(Clone, Debug, Serialize)]
struct TransferRow {
    near: Option<&'static str>,
    words: String,
    moved_m3: Num,
    left_m3: Num,
    half_s: Num,
    nearly_all_s: Num,
    end_s: Num,
    lasts_s: Num,
    moved_share: Num,
}

impl TransferRow {
    fn new(transfer: &Transfer) -> TransferRow {
        TransferRow {
            near: transfer.near.map(|bound| bound.word()),
            words: transfer.words.clone(),
            moved_m3: num(transfer.moved_m3),
            left_m3: num(transfer.left_m3),
            half_s: num(transfer.half_s),
            nearly_all_s: num(transfer.nearly_all_s),
            end_s: transfer.end_s.and_then(num),
            lasts_s: transfer.lasts_s.and_then(num),
            moved_share: num(transfer.moved_share),
        }
    }
}
