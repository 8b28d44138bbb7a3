//! What can be wrong with a network of cells, and how to mend it.

use super::opening::Opening;

/// Why a flow cannot be found.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum FlowError {
    /// Effective gravity is missing or not finite.
    #[error("effective gravity is {g_m_per_s2} m/s2: without it nothing flows by its level")]
    Gravity {
        /// Its size.
        g_m_per_s2: f64,
    },
    /// A cell holds nothing.
    #[error("cell {}: its capacity is {capacity_m3} m3; it must be finite and above zero", .cell_idx + 1)]
    Capacity {
        /// Which cell.
        cell_idx: usize,
        /// Its capacity.
        capacity_m3: f64,
    },
    /// A cell starts with more than it holds, or less than nothing.
    #[error("cell {}: it starts with {volume_m3} m3 of {capacity_m3} m3; give it what it can hold", .cell_idx + 1)]
    Volume {
        /// Which cell.
        cell_idx: usize,
        /// What it starts with.
        volume_m3: f64,
        /// What it can hold.
        capacity_m3: f64,
    },
    /// A cell's level does not rise with its volume.
    #[error(
        "cell {}: its level is {empty_m} m empty, {now_m} m at the start and {full_m} m full; it must rise",
        .cell_idx + 1
    )]
    Levels {
        /// Which cell.
        cell_idx: usize,
        /// Level when empty.
        empty_m: f64,
        /// Level at the start.
        now_m: f64,
        /// Level when full.
        full_m: f64,
    },
    /// A passage joins what is not there.
    #[error("passage {}: it must join two different ones of the {n_cells} cells, or one and the outside", .passage_idx + 1)]
    Ends {
        /// Which passage.
        passage_idx: usize,
        /// How many cells there are.
        n_cells: usize,
    },
    /// An opening has no meaning.
    #[error(
        "passage {}: an opening from {} m to {} m of {} m2 with C_d {} has no meaning; all must be finite, its top not below \
         its sill, area and C_d not below zero",
        .passage_idx + 1, .opening.low_m, .opening.high_m, .opening.area_m2, .opening.c_d
    )]
    Opening {
        /// Which passage.
        passage_idx: usize,
        /// The opening.
        opening: Opening,
    },
    /// An opening lies lower than a cell that it opens.
    #[error(
        "passage {}: its sill at {low_m} m is below the bottom of cell {} at {bottom_m} m; an opening lies in the wall of its cell",
        .passage_idx + 1, .cell_idx + 1
    )]
    Below {
        /// Which passage.
        passage_idx: usize,
        /// Which cell.
        cell_idx: usize,
        /// Level of the sill.
        low_m: f64,
        /// Level of the cell when it is empty.
        bottom_m: f64,
    },
    /// A rated flow is not one, or the level at its outlet is not finite.
    #[error(
        "a rated flow of {flow_m3_per_s} m3/s to a level of {level_m} m: both must be finite, the flow not below zero"
    )]
    Rated {
        /// The flow.
        flow_m3_per_s: f64,
        /// The level at the outlet.
        level_m: f64,
    },
    /// No way leads from the inlet to the outlet.
    #[error("no open way leads from cell {} to cell {}: give the plates between them openings", .from_idx + 1, .to_idx + 1)]
    NoWay {
        /// The cell of the inlet.
        from_idx: usize,
        /// The cell of the outlet.
        to_idx: usize,
    },
    /// The steps ran out.
    #[error(
        "no rest was found: after {n_steps} steps the flow stood at {time_s} s; check that the levels of the cells rise \
         without a jump"
    )]
    NotEnded {
        /// How far it came.
        time_s: f64,
        /// Steps tried.
        n_steps: usize,
    },
}
