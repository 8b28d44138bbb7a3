//! The law of one opening: what flows through it between two levels.

/// Discharge coefficient where none is given: a square-edged hole in a thin plate.
///
/// Source: handbooks (Brater & King; Lewitt; Miller) give 0.60 to 0.62 for a sharp-edged round hole and 0.60 to 0.65 for
/// a limber hole in a thin plate; from memory. A plate that is thicker than the hole is wide goes toward 0.8.
pub const DEFAULT_DISCHARGE_COEFFICIENT: f64 = 0.6;

/// An opening in a wall between two bodies of liquid. Its open width is the same over its whole span of levels.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Opening {
    /// Its lowest level, its sill, measured along effective gravity like every level here.
    pub low_m: f64,
    /// Its highest level; the same as the lowest for a hole that lies level, as in a floor.
    pub high_m: f64,
    /// Open area, in its own plane.
    pub area_m2: f64,
    /// Discharge coefficient, C_d.
    pub c_d: f64,
}

/// Flow through an opening, m3/s, positive from the first level to the second:
///
/// Q = C_d times the integral over the opening of sqrt(2 g head) dA.
///
/// Below the lower level the head is the difference of the levels (Q = C_d A sqrt(2 |dp| / rho)); between the levels,
/// where the jet falls free, the height of the higher level above the place. `g_m_per_s2` is the size of effective
/// gravity; the gas on both sides is at one pressure.
///
/// Continuous in both levels, and turned about it changes its sign. Nothing where the levels are equal, or both at or
/// below the sill. With an outside that stands nowhere near, its level is that of the sill.
///
/// Source: Streeter; Daugherty; Lewitt: orifices, drowned orifices and rectangular weirs (from memory; tested against
/// quadrature).
pub fn orifice(opening: &Opening, from_m: f64, to_m: f64, g_m_per_s2: f64) -> f64 {
    opening.flow(from_m, to_m, g_m_per_s2, 0.0)
}

impl Opening {
    /// [`orifice`] with roots that are straight for heads below `soft_m`, so that rounded levels make no large flows.
    pub(super) fn flow(&self, from_m: f64, to_m: f64, g_m_per_s2: f64, soft_m: f64) -> f64 {
        if from_m < to_m {
            return -self.flow(to_m, from_m, g_m_per_s2, soft_m);
        }
        self.conductance(g_m_per_s2) * self.parts(from_m, to_m, soft_m).mean_root(soft_m)
    }

    /// The derivatives of the softened flow by the two levels.
    pub(super) fn slopes(&self, from_m: f64, to_m: f64, g_m_per_s2: f64, soft_m: f64) -> [f64; 2] {
        if from_m < to_m {
            let [higher, lower] = self.slopes(to_m, from_m, g_m_per_s2, soft_m);
            return [-lower, -higher];
        }
        self.parts(from_m, to_m, soft_m).slopes(soft_m).map(|slope| self.conductance(g_m_per_s2) * slope)
    }

    /// The height that drives liquid through it: of the higher level over the lower, or over the sill.
    pub(super) fn head(&self, from_m: f64, to_m: f64) -> f64 {
        (from_m.max(to_m) - from_m.min(to_m).max(self.low_m)).max(0.0)
    }

    pub(super) fn is_open(&self) -> bool {
        self.area_m2 * self.c_d > 0.0
    }

    fn conductance(&self, g_m_per_s2: f64) -> f64 {
        self.c_d * self.area_m2 * (2.0 * g_m_per_s2).sqrt()
    }

    fn parts(&self, higher: f64, lower: f64, soft: f64) -> Parts {
        let (low, high) = (self.low_m, self.high_m);
        let share = |from: f64, to: f64| if high > low { ((to - from) / (high - low)).max(0.0) } else { 1.0 };
        let is_drowned = lower > low;
        let (free_low, free_high) = (low.max(lower), high.min(higher));
        // Within rounding of its sill it is about to flow.
        let is_free = higher > low - 1e-5 * soft && (lower < high || !is_drowned);
        Parts {
            drowned_share: if is_drowned { share(low, lower.min(high)) } else { 0.0 },
            drowned_head: higher - lower,
            free_share: if is_free { share(free_low, free_high) } else { 0.0 },
            deepest_head: (higher - free_low).max(0.0),
            shallowest_head: (higher - free_high).max(0.0),
        }
    }
}

/// The two parts of an opening between two levels: shares of its area, and their heads.
struct Parts {
    drowned_share: f64,
    drowned_head: f64,
    free_share: f64,
    deepest_head: f64,
    shallowest_head: f64,
}

impl Parts {
    /// The mean of the root of the head over the opening.
    fn mean_root(&self, soft: f64) -> f64 {
        let free = if self.deepest_head == self.shallowest_head {
            root(self.deepest_head, soft)
        } else {
            // 2/3 (x^3 - y^3) / (x^2 - y^2), without the difference of two near numbers.
            let (x, y) = (self.deepest_head.sqrt(), self.shallowest_head.sqrt());
            2.0 / 3.0 * (x * x + x * y + y * y) / (x + y)
        };
        self.drowned_share * root(self.drowned_head, soft) + self.free_share * free
    }

    /// The derivatives of the mean by the higher and by the lower level.
    fn slopes(&self, soft: f64) -> [f64; 2] {
        let free = if self.deepest_head == self.shallowest_head {
            root_slope(self.deepest_head, soft)
        } else {
            1.0 / (self.deepest_head.sqrt() + self.shallowest_head.sqrt())
        };
        let drowned = self.drowned_share * root_slope(self.drowned_head, soft);
        [drowned + self.free_share * free, -drowned]
    }
}

/// The root of a head; straight well below `soft`.
fn root(head: f64, soft: f64) -> f64 {
    if head > 0.0 { head / head.hypot(soft).sqrt() } else { 0.0 }
}

/// Its derivative.
fn root_slope(head: f64, soft: f64) -> f64 {
    let size = head.hypot(soft);
    (1.0 - 0.5 * (head / size).powi(2)) / size.sqrt()
}

#[cfg(test)]
mod tests {
    use super::*;

    const SLOT: Opening = Opening { low_m: 0.5, high_m: 0.9, area_m2: 0.3, c_d: 0.61 };
    const HOLE: Opening = Opening { low_m: 0.5, high_m: 0.5, ..SLOT };

    /// Pairs of levels on a grid that meets the sill and the top.
    fn levels() -> impl Iterator<Item = (f64, f64)> {
        (0..=15).flat_map(|i| (0..=15).map(move |j| (0.1 * f64::from(i), 0.1 * f64::from(j))))
    }

    #[test]
    fn flow_changes_its_sign_with_its_direction_and_grows_with_the_level() {
        for opening in [SLOT, HOLE] {
            for (from, to) in levels() {
                let flow = orifice(&opening, from, to, 9.81);
                assert_eq!(flow, -orifice(&opening, to, from, 9.81), "{opening:?} {from} {to}");
                assert!(orifice(&opening, from + 0.05, to, 9.81) >= flow, "{opening:?} {from} {to}");
            }
        }
    }

    #[test]
    fn flow_does_not_jump() {
        for opening in [SLOT, HOLE] {
            for (from, to) in levels() {
                let at = |d: f64, e: f64| orifice(&opening, from + d, to + e, 9.81);
                for (d, e) in [(1e-12, 0.0), (-1e-12, 0.0), (0.0, 1e-12), (0.0, -1e-12)] {
                    let jump = (at(d, e) - at(0.0, 0.0)).abs();
                    // The root of a head of 1e-12 m.
                    assert!(jump <= 0.3 * 0.61 * 4.43 * 2e-6, "{opening:?}, {from} to {to}: {jump:e}");
                }
            }
        }
    }

    #[test]
    fn slopes_are_the_derivatives_of_the_flow() {
        for opening in [SLOT, HOLE] {
            // Off the grid's kinks.
            for (from, to) in levels().map(|(from, to)| (from + 0.043, to + 0.017)) {
                let d = 1e-6;
                let by_from =
                    (orifice(&opening, from + d, to, 9.81) - orifice(&opening, from - d, to, 9.81)) / (2.0 * d);
                let by_to =
                    (orifice(&opening, from, to + d, 9.81) - orifice(&opening, from, to - d, 9.81)) / (2.0 * d);
                for (want, got) in [by_from, by_to].into_iter().zip(opening.slopes(from, to, 9.81, 1e-12)) {
                    assert!((want - got).abs() < 1e-7, "{opening:?}, {from} to {to}: {got} against {want}");
                }
            }
        }
    }
}
