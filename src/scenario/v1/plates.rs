//! Plates and their openings in a version 1 file.

use serde::Deserialize;

use crate::geom::Point;
use crate::section;

use super::super::limits::{MAX_OPENINGS, MAX_PLATE_POINTS};
use super::super::list::List;
use super::super::number::{Count, Num};
use super::At;

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Plate {
    #[serde(default)]
    name: String,
    points: List<At, MAX_PLATE_POINTS>,
    thickness_mm: Num,
    #[serde(default)]
    corrosion_mm: Num,
    #[serde(default)]
    material: String,
    #[serde(default)]
    panel: Panel,
    #[serde(default)]
    openings: List<Opening, MAX_OPENINGS>,
}

#[derive(Default, Deserialize)]
#[serde(deny_unknown_fields)]
struct Panel {
    stiffener_spacing_mm: Option<Num>,
    #[serde(default)]
    edges: PanelEdges,
}

#[derive(Default, Deserialize)]
#[serde(rename_all = "snake_case")]
enum PanelEdges {
    #[default]
    SimplySupported,
    Clamped,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct Opening {
    #[serde(default)]
    name: String,
    from_mm: Num,
    to_mm: Num,
    shape: Shape,
}

#[derive(Deserialize)]
#[serde(rename_all = "snake_case", deny_unknown_fields)]
enum Shape {
    SharePercent(Num),
    Holes {
        n: Count,
    },
    Perforated {
        hole_diameter_mm: Num,
        pitch_mm: Num,
        #[serde(default)]
        staggered: bool,
    },
}

impl From<Plate> for section::Plate {
    fn from(plate: Plate) -> section::Plate {
        section::Plate {
            name: plate.name,
            points: plate.points.map(Point::from),
            thickness_m: plate.thickness_mm.mm(),
            corrosion_m: plate.corrosion_mm.mm(),
            material: plate.material,
            panel: section::Panel {
                stiffener_spacing_m: plate.panel.stiffener_spacing_mm.map(Num::mm),
                edges: match plate.panel.edges {
                    PanelEdges::SimplySupported => section::PanelEdges::SimplySupported,
                    PanelEdges::Clamped => section::PanelEdges::Clamped,
                },
            },
            openings: plate.openings.map(section::Opening::from),
        }
    }
}

impl From<Opening> for section::Opening {
    fn from(opening: Opening) -> section::Opening {
        section::Opening {
            name: opening.name,
            from_m: opening.from_mm.mm(),
            to_m: opening.to_mm.mm(),
            shape: match opening.shape {
                Shape::SharePercent(v) => section::OpeningShape::Share(v.percent()),
                Shape::Holes { n: Count(n) } => section::OpeningShape::Holes { n },
                Shape::Perforated { hole_diameter_mm, pitch_mm, staggered } => section::OpeningShape::Perforated {
                    diameter_m: hole_diameter_mm.mm(),
                    pitch_m: pitch_mm.mm(),
                    is_staggered: staggered,
                },
            },
        }
    }
}
