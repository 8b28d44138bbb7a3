//! The section itself: tints, isobars, surface, walls, mouths, obstacles, and the handles of what is pointed at.
//!
//! Draws what the model says and nothing else; labels and dimensions are in `annotate`.

use egui::{Align2, Color32, Mesh, Painter, Pos2, Shape, Stroke, pos2};

use crate::analysis::Chord;
use crate::geom::{Point, Vec2};
use crate::gui::{Look, Selected, font};
use crate::section::EdgeKind;
use crate::units::{Quantity, number};

use super::lines;
use super::liquid::Tint;
use super::model::{BoardModel, Pool};
use super::scene::Scene;
use super::screen::Screen;
use super::strips::{Strip, bands, chords, extent, sides};
use super::target::{Target, target_of};

/// Widths of the lines of a section.
#[derive(Clone, Copy, Debug)]
pub struct Pens {
    /// Walls.
    pub wall: f32,
    /// Plates.
    pub plate: f32,
    /// The settled surface.
    pub surface: f32,
    /// Isobars; where zero neither they nor ticks at openings.
    pub isobar: f32,
}

/// The board's own pens.
pub const BOARD_PENS: Pens = Pens { wall: 2.5, plate: 2.25, surface: 1.9, isobar: 0.75 };

/// Pens of a small drawing.
pub const CARD_PENS: Pens = Pens { wall: 1.5, plate: 1.25, surface: 1.25, isobar: 0.0 };

/// Liquid: tints, hatch above full scale, isobars.
pub fn paint_liquid(painter: &Painter, screen: &Screen, model: &BoardModel, pens: Pens, look: &Look) {
    let n = model.tints.map_or(1, |t| t.n);
    let mut mesh = Mesh::default();
    for band in model.bands() {
        let color = match band.tint {
            Tint::Step(i) => look.band(i, n),
            Tint::AboveScale => look.band(n - 1, n),
            Tint::NotJudged => look.line2,
        };
        for strip in &band.strips {
            fill(&mut mesh, screen, strip, color);
            // A small drawing may be faded, and then seams show; gaps do not.
            if pens.isobar > 0.0 {
                fill_seams(&mut mesh, screen, strip, color);
            }
        }
    }
    painter.add(mesh);
    for band in model.bands().filter(|b| b.tint == Tint::AboveScale) {
        let stroke = Stroke::new(0.75, look.board.gamma_multiply(0.55));
        band.strips.iter().for_each(|strip| hatch(painter, screen, &strip.polygon(), stroke));
    }
    if pens.isobar > 0.0 {
        let stroke = Stroke::new(pens.isobar, look.ink.gamma_multiply(0.55));
        for [a, b] in model.isobars().flat_map(|i| &i.chords) {
            lines::segment(painter, [screen.screen_from_section(*a), screen.screen_from_section(*b)], stroke);
        }
    }
}

/// The surfaces under the other bound, dash-dotted, then those that are shown, over a halo.
pub fn paint_surface(painter: &Painter, screen: &Screen, model: &BoardModel, pens: Pens, look: &Look) {
    let ends = |piece: &Chord| [piece.left, piece.right].map(|p| screen.screen_from_section(p));
    if pens.isobar > 0.0 {
        for piece in &model.other_surface {
            lines::segment(painter, ends(piece), Stroke::new(3.0, look.board));
            lines::dash_dot(painter, &ends(piece), Stroke::new(1.1, look.ink));
        }
    }
    for width in [(4.0, look.board), (pens.surface, look.ink)] {
        model.surface().for_each(|piece| lines::segment(painter, ends(piece), Stroke::from(width)));
    }
}

/// The line round a pool that is pointed at, and its volume.
pub fn paint_pool(painter: &Painter, scene: &Scene, pool: &Pool, look: &Look) {
    let accent = Stroke::new(1.25, look.accent);
    let surface = pool.surface.iter().map(|piece| [piece.left, piece.right]);
    for side in pool.sides.iter().copied().chain(surface) {
        lines::segment(painter, side.map(|p| scene.at(p)), accent);
    }
    let unit = Quantity::Volume.unit_near(scene.units, pool.volume_m3);
    let words = format!("{} {}", number(unit.from_si(pool.volume_m3), 4), unit.symbol);
    let text = painter.layout_no_wrap(words, font::body_heavy(), look.accent);
    let mut at = scene.at(pool.centroid);
    if scene.model.centroid.is_some_and(|p| (scene.at(p) - at).length() < 24.0) {
        at.y += 24.0;
    }
    let rect = Align2::CENTER_CENTER.anchor_size(at, text.size());
    painter.rect_filled(rect.expand2(egui::vec2(4.0, 1.0)), 0.0, look.board);
    painter.galley(rect.min, text, look.accent);
}

/// Walls, mouths and obstacles.
pub fn paint_walls(painter: &Painter, screen: &Screen, model: &BoardModel, pens: Pens, look: &Look) {
    for points in &model.obstacles {
        paint_obstacle(painter, screen, points, pens, look);
    }
    let wall = Stroke::new(pens.wall, look.ink);
    let walls: Vec<bool> = model.edges.iter().map(|e| e.kind == EdgeKind::Wall).collect();
    let n = walls.len();
    if walls.iter().all(|w| *w) {
        let path: Vec<Pos2> = model.edges.iter().flat_map(|e| screen.line(&e.points[..e.points.len() - 1])).collect();
        if path.len() > 2 {
            painter.add(Shape::closed_line(path, wall));
        }
        return;
    }
    // Runs of walls, each in one piece so that its corners are mitred, with the posts of the mouths at its ends.
    for start in (0..n).filter(|&i| walls[i] && !walls[(i + n - 1) % n]) {
        let mouth_before = screen.line(&model.edges[(start + n - 1) % n].points);
        let mut path = vec![post(&mouth_before, mouth_before.len() - 1, pens)];
        let mut i = start;
        while walls[i] {
            let skip = usize::from(i != start);
            path.extend(model.edges[i].points.iter().skip(skip).map(|&p| screen.screen_from_section(p)));
            i = (i + 1) % n;
        }
        path.push(post(&screen.line(&model.edges[i].points), 0, pens));
        painter.add(Shape::line(path, wall));
    }
    let dots = Stroke::new(1.2, look.ink);
    for edge in model.edges.iter().filter(|e| e.kind == EdgeKind::Mouth) {
        lines::dotted(painter, &screen.line(&edge.points), dots);
    }
}

/// The faint line of the last outline that could be judged.
pub fn paint_last_good(painter: &Painter, screen: &Screen, model: &BoardModel, look: &Look) {
    for points in &model.last_good {
        lines::dashed(painter, &screen.line(points), Stroke::new(1.0, look.ink3), 3.0, 3.0);
    }
}

/// What is chosen, hovered, or where the open verdict governs: a glow beneath the lines.
pub fn paint_glow(
    painter: &Painter,
    scene: &Scene,
    selected: Option<Selected>,
    hovered: Option<Target>,
    look: &Look,
) {
    let screen = &scene.screen;
    let glow = Stroke::new(8.5, look.accent_soft);
    for points in &scene.model.governs.glow {
        painter.add(Shape::line(screen.line(points), glow));
    }
    let under_pointer = hovered.map(|t| (t, Stroke::new(8.5, look.ink.gamma_multiply(0.18))));
    let chosen = selected.map(|s| (target_of(s), glow));
    for (target, stroke) in under_pointer.into_iter().chain(chosen) {
        let path = match target {
            Target::Edge(i) | Target::Middle(i) => scene.model.edges.get(i).map(|e| screen.line(&e.points)),
            Target::Plate(i) | Target::PlatePoint(i, _) => {
                scene.model.plates.get(i).map(|plate| screen.line(&plate.points))
            }
            Target::Opening(i, o) | Target::OpeningEnd(i, o, _) => {
                let openings = scene.model.plates.get(i).map(|plate| &plate.openings);
                openings.and_then(|openings| openings.get(o)).map(|opening| screen.line(&opening.points))
            }
            Target::Obstacle(i) => scene.model.obstacles.get(i).map(|points| {
                let mut path = screen.line(points);
                path.extend(path.first().copied());
                path
            }),
            Target::StillLevel => {
                let y = scene.model.still_z_m.map(|z| scene.at(Point::new(0.0, z)).y);
                let span = scene.bounds().expand(16.0).x_range();
                y.map(|y| vec![pos2(span.min, y), pos2(span.max, y)])
            }
            _ => None,
        };
        if let Some(path) = path.filter(|p| p.len() > 1) {
            painter.add(Shape::line(path, stroke));
        }
    }
}

fn paint_obstacle(painter: &Painter, screen: &Screen, points: &[Point], pens: Pens, look: &Look) {
    let chain: Vec<_> = sides(points).collect();
    if let Some((low, high)) = extent(&chain, Vec2::y()).filter(|(low, high)| low < high) {
        let mut mesh = Mesh::default();
        let strips = bands(&chain, Vec2::y(), &[low, high]).remove(0);
        strips.iter().for_each(|strip| fill(&mut mesh, screen, strip, look.sunk));
        painter.add(mesh);
        hatch(painter, screen, points, Stroke::new(0.75, look.ink2));
    }
    let path = screen.line(points);
    if path.len() > 2 {
        painter.add(Shape::closed_line(path, Stroke::new(pens.wall.min(1.5), look.ink)));
    }
}

/// The end of a mouth's post: a short piece of lip from the mouth's end toward its middle.
fn post(mouth: &[Pos2], end: usize, pens: Pens) -> Pos2 {
    let (at, next) = if end == 0 { (mouth[0], mouth[1]) } else { (mouth[end], mouth[end - 1]) };
    let length = (next - at).length().max(f32::MIN_POSITIVE);
    at + (next - at) * ((2.0 * pens.wall).min(0.25 * length) / length)
}

fn fill(mesh: &mut Mesh, screen: &Screen, strip: &Strip, color: Color32) {
    let rows = strip.left.iter().zip(&strip.right).map(|(l, r)| [*l, *r].map(|p| screen.screen_from_section(p)));
    let rows: Vec<[Pos2; 2]> = rows.collect();
    rows.windows(2).for_each(|pair| quad(mesh, pair[0], pair[1], color));
}

/// Where strips part, the end of one lies within the side of another, and rounding leaves gaps: a pixel over each.
fn fill_seams(mesh: &mut Mesh, screen: &Screen, strip: &Strip, color: Color32) {
    let last = strip.left.len().saturating_sub(1);
    for (left, right) in [0, last].into_iter().filter_map(|i| strip.left.get(i).zip(strip.right.get(i))) {
        let [left, right] = [*left, *right].map(|p| screen.screen_from_section(p));
        let across = (right - left).normalized().rot90() * 0.5;
        quad(mesh, [left - across, right - across], [left + across, right + across], color);
    }
}

fn quad(mesh: &mut Mesh, below: [Pos2; 2], above: [Pos2; 2], color: Color32) {
    let first = mesh.vertices.len() as u32;
    below.into_iter().chain(above).for_each(|p| mesh.colored_vertex(p, color));
    mesh.add_triangle(first, first + 1, first + 2);
    mesh.add_triangle(first + 1, first + 3, first + 2);
}

/// A 45 degree hatch inside a closed chain, a line every 5 points.
fn hatch(painter: &Painter, screen: &Screen, points: &[Point], stroke: Stroke) {
    let across = Vec2::new(-1.0, 1.0) * std::f64::consts::FRAC_1_SQRT_2;
    let step = 5.0 / screen.scale();
    let chain: Vec<_> = sides(points).collect();
    let Some((low, high)) = extent(&chain, across) else { return };
    // Only the lines that cross the drawing area.
    let seen =
        [screen.rect.left_top(), screen.rect.right_top(), screen.rect.left_bottom(), screen.rect.right_bottom()];
    let levels = seen.map(|p| across.dot(&screen.section_from_screen(p).coords));
    let low = levels.iter().copied().fold(f64::INFINITY, f64::min).max(low);
    let high = levels.iter().copied().fold(f64::NEG_INFINITY, f64::max).min(high);
    let (first, last) = ((low / step).ceil() as i64, (high / step).floor() as i64);
    for k in first..=last {
        for [a, b] in chords(&chain, across, k as f64 * step) {
            lines::segment(painter, [screen.screen_from_section(a), screen.screen_from_section(b)], stroke);
        }
    }
}
