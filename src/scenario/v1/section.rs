//! Outline, obstacles and width law in a version 1 file.

use serde::Deserialize;

use crate::section::{self, OutlineEdge, WidthLaw};

use super::super::limits::{MAX_OBSTACLE_EDGES, MAX_WIDTH_ROWS};
use super::super::list::List;
use super::super::number::Num;
use super::point;

#[derive(Deserialize)]
#[serde(rename_all = "snake_case", deny_unknown_fields)]
pub(super) enum Width {
    Constant { width_mm: Num },
    RoundBarrel { diameter_mm: Num, bottom_z_mm: Num },
    Oval { width_mm: Num, height_mm: Num, bottom_z_mm: Num },
    Table(List<WidthRow, MAX_WIDTH_ROWS>),
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct WidthRow {
    z_mm: Num,
    width_mm: Num,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Edge {
    s_mm: Num,
    z_mm: Num,
    #[serde(default)]
    sweep_deg: Num,
    #[serde(default)]
    kind: EdgeKind,
    #[serde(default)]
    name: String,
}

#[derive(Default, Deserialize)]
#[serde(rename_all = "snake_case")]
enum EdgeKind {
    #[default]
    Wall,
    Mouth,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
pub(super) struct Obstacle {
    name: String,
    edges: List<ObstacleEdge, MAX_OBSTACLE_EDGES>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct ObstacleEdge {
    s_mm: Num,
    z_mm: Num,
    #[serde(default)]
    sweep_deg: Num,
}

impl From<Width> for WidthLaw {
    fn from(width: Width) -> WidthLaw {
        match width {
            Width::Constant { width_mm } => WidthLaw::Constant { width_m: width_mm.mm() },
            Width::RoundBarrel { diameter_mm, bottom_z_mm } => {
                WidthLaw::RoundBarrel { diameter_m: diameter_mm.mm(), bottom_z_m: bottom_z_mm.mm() }
            }
            Width::Oval { width_mm, height_mm, bottom_z_mm } => {
                WidthLaw::Oval { width_m: width_mm.mm(), height_m: height_mm.mm(), bottom_z_m: bottom_z_mm.mm() }
            }
            Width::Table(rows) => WidthLaw::Table(rows.map(|row| (row.z_mm.mm(), row.width_mm.mm()))),
        }
    }
}

impl From<Edge> for OutlineEdge {
    fn from(edge: Edge) -> OutlineEdge {
        OutlineEdge {
            name: edge.name,
            kind: match edge.kind {
                EdgeKind::Wall => section::EdgeKind::Wall,
                EdgeKind::Mouth => section::EdgeKind::Mouth,
            },
            start: point(edge.s_mm, edge.z_mm),
            sweep_rad: edge.sweep_deg.deg(),
        }
    }
}

impl From<Obstacle> for section::Obstacle {
    fn from(obstacle: Obstacle) -> section::Obstacle {
        let vertex = |e: ObstacleEdge| section::Vertex { start: point(e.s_mm, e.z_mm), sweep_rad: e.sweep_deg.deg() };
        section::Obstacle { name: obstacle.name, vertices: obstacle.edges.map(vertex) }
    }
}
