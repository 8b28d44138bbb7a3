//! The two bounds between which liquid passes through openings.

use crate::section::{Cut, Region};

/// How far openings let liquid through while a load case lasts.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Bound {
    /// Levels have fully evened out: openings are gaps.
    Settled,
    /// Nothing passes: openings are shut.
    Sealed,
}

impl Bound {
    /// The word shown for it.
    pub fn word(self) -> &'static str {
        match self {
            Bound::Settled => "settled",
            Bound::Sealed => "sealed",
        }
    }

    /// The section as it holds liquid under this bound.
    pub fn cut(self, region: &Region) -> &Cut {
        match self {
            Bound::Settled => region.open(),
            Bound::Sealed => region.shut(),
        }
    }
}
