//! How the cells of a network come to rest, in time.

use std::ops::ControlFlow;

use nalgebra::DVector;

use crate::num::{Moment, between, bisect, integrate};

use super::fault::FlowError;
use super::motion::Motion;
use super::network::Network;

/// The way of a network from its start to rest.
#[derive(Clone, Debug)]
pub struct Equalisation {
    /// When everything has come to rest, s; none where it never quite does: a cell that runs down to the sill of an opening
    /// with a height drains ever more slowly.
    pub end_s: Option<f64>,
    /// What each cell holds at rest, to about 1e-8 of what moves: an empty one may read as little below zero.
    pub volumes_m3: Vec<f64>,
    /// The level of each cell at rest.
    pub levels_m: Vec<f64>,
    /// What has left for the outside.
    pub drained_m3: f64,
    /// What has changed places: half the sum of all changes, the outside counted as a cell.
    pub moved_m3: f64,
    moments: Vec<Moment>,
}

/// The error of a step that leaves times exact to a millionth.
pub const FINE: f64 = 2e-10;

/// The error of a step that does for an estimate.
pub const COARSE: f64 = 1e-6;

/// Steps that are tried; some hundreds are needed.
const N_MOST: usize = 10_000;

impl Network<'_> {
    /// Lets the liquid flow until it rests. Volume is conserved to rounding. `error_share` is the error allowed a step, as a share
    /// of what moves: with [`FINE`] times are within 1e-6 of closed forms for prismatic cells and round barrels, with
    /// [`COARSE`] within 1e-3, in a fraction of the steps.
    ///
    /// Nothing to flow is no error: all is at rest at once. Errors: [`FlowError::NotEnded`].
    ///
    /// Source: Q = sum of the flows of [`super::orifice`], quasi-steady; integrated by [`integrate`].
    pub fn equalise(&self, error_share: f64) -> Result<Equalisation, FlowError> {
        let motion = Motion::new(self, error_share);
        let mut moments: Vec<Moment> = vec![];
        let mut levels_m = vec![];
        integrate(&motion, motion.start(), &motion.tolerance(), motion.first_dt(), N_MOST, |now| {
            let volumes = |of: &DVector<f64>| of.rows(0, self.cells.len()).into_owned();
            moments.push(Moment { time: now.time, state: volumes(&now.state), rate: volumes(&now.rate) });
            levels_m = motion.levels(&now.state);
            if motion.is_at_rest(&now.state) { ControlFlow::Break(()) } else { ControlFlow::Continue(()) }
        })
        .map_err(|stalled| FlowError::NotEnded { time_s: stalled.time, n_steps: stalled.n_steps })?;
        let mut way = Equalisation {
            end_s: None,
            volumes_m3: moments[moments.len() - 1].state.as_slice().to_vec(),
            levels_m,
            drained_m3: 0.0,
            moved_m3: 0.0,
            moments,
        };
        way.drained_m3 = way.drained(&way.moments[0].state);
        way.moved_m3 = way.left(&way.moments[0].state);
        way.end_s = way.end();
        Ok(way)
    }
}

impl Equalisation {
    /// What each cell holds at a time from the start on; at rest after the last step.
    pub fn volumes_at(&self, time_s: f64) -> Vec<f64> {
        self.state_at(time_s).as_slice().to_vec()
    }

    /// The share of what moves that has moved at a time.
    pub fn share_at(&self, time_s: f64) -> f64 {
        if self.moved_m3 > 0.0 { 1.0 - self.left(&self.state_at(time_s)) / self.moved_m3 } else { 1.0 }
    }

    /// The time, s, from which on at least this share of what moves has moved; shares of one and more: at the last step.
    pub fn time_for_share(&self, share: f64) -> f64 {
        let is_short = |state: &DVector<f64>| self.left(state) > (1.0 - share) * self.moved_m3;
        match self.moments.iter().rposition(|moment| is_short(&moment.state)) {
            Some(i) => match self.moments.get(i + 1) {
                Some(next) => bisect(self.moments[i].time, next.time, 0.0, |t| !is_short(&self.state_at(t))),
                None => self.moments[i].time,
            },
            None => 0.0,
        }
    }

    /// When the flow ends. Near its end what is left goes like a power q of the time that is left (q = 2 between prismatic
    /// cells), so that tau = left / rate is that time over q; two moments give both. Where tau does not shrink there is no end.
    fn end(&self) -> Option<f64> {
        let lefts: Vec<f64> = self.moments.iter().map(|moment| self.left(&moment.state)).collect();
        let Some(late) = lefts.iter().rposition(|left| *left > 1e-5 * self.moved_m3) else {
            return Some(0.0);
        };
        // The rate at the start itself is not known.
        let early = (1..late).rfind(|i| lefts[*i] > 30.0 * lefts[late])?;
        let tau = |i: usize| -lefts[i] / self.left_rate(&self.moments[i]);
        let span = self.moments[late].time - self.moments[early].time;
        let one_over_q = (tau(early) - tau(late)) / span;
        (one_over_q > 0.1).then(|| self.moments[late].time + tau(late) / one_over_q)
    }

    /// What has yet to change places.
    fn left(&self, volumes_m3: &DVector<f64>) -> f64 {
        let changes = volumes_m3.iter().zip(&self.volumes_m3).map(|(now, rest)| (rest - now).abs());
        0.5 * (changes.sum::<f64>() + self.drained(volumes_m3).abs())
    }

    /// What has yet to leave.
    fn drained(&self, volumes_m3: &DVector<f64>) -> f64 {
        volumes_m3.iter().zip(&self.volumes_m3).map(|(now, rest)| now - rest).sum()
    }

    /// The rate of change of what is left.
    fn left_rate(&self, moment: &Moment) -> f64 {
        // Along a line of the rate, over a time so short that nothing settles and so long that rounding does not matter.
        let left = self.left(&moment.state);
        let dt = 1e-4 * left / moment.rate.abs().sum();
        (self.left(&(&moment.state + &moment.rate * dt)) - left) / dt
    }

    fn state_at(&self, time_s: f64) -> DVector<f64> {
        let next = self.moments.partition_point(|moment| moment.time <= time_s);
        let Some(a) = self.moments[..next].last() else { return self.moments[0].state.clone() };
        self.moments.get(next).map_or_else(|| a.state.clone(), |b| between(a, b, time_s))
    }
}
