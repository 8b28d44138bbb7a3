//! The fill map: fill against acceleration, tinted by the worst utilisation.

use std::sync::Arc;

use egui::{Align2, Color32, ColorImage, Pos2, Rect, Stroke, TextureHandle, TextureOptions, Ui, pos2, vec2};

use crate::analysis::{FillMap, MapPoint, NoFillMap, State};
use crate::gui::pictures::Shown;
use crate::gui::{Desk, Look, font, marks};
use crate::units::{Measure, Quantity, utilisation_text};

use super::chart::{self, Chart};
use super::map_field::{Field, Kind};

/// Tints from nothing to the limit.
const N_TINTS: usize = 10;

/// A fill map, or why there is none.
pub type Found = Arc<Result<FillMap, NoFillMap>>;

/// The drawing of a map, kept until the map, its size or the theme change.
pub(super) struct Drawn {
    of: Found,
    size: [usize; 2],
    theme: egui::Theme,
    tints: TextureHandle,
    /// Of utilisation 0.9 and 1, in the unit square.
    contours: [Vec<[[f64; 2]; 2]>; 2],
    /// Hatches over what fails and over what is not judged, in points from the upper left corner.
    hatches: [Vec<[Pos2; 2]>; 2],
}

impl std::fmt::Debug for Drawn {
    fn fmt(&self, f: &mut std::fmt::Formatter) -> std::fmt::Result {
        f.debug_struct("Drawn").field("size", &self.size).finish_non_exhaustive()
    }
}

/// The plot in `rect`; the present fill is the common one as a share of the common capacity.
pub(super) fn fill_map_ui(
    ui: &mut Ui,
    rect: Rect,
    found: Option<Shown<'_, Found>>,
    common_share: Option<f64>,
    desk: &Desk,
    drawn: &mut Option<Drawn>,
) {
    let look = desk.look;
    let Some(Shown { result, is_old }) = found else {
        return chart::empty_ui(ui, rect, "Works out the coarse map", look);
    };
    let map = match &**result {
        Ok(map) => map,
        Err(NoFillMap::AtRest) => {
            return chart::empty_ui(ui, rect, "Waits for a case with an acceleration", look);
        }
        Err(why) => return chart::empty_ui(ui, rect, &why.to_string(), look),
    };
    let (accel, fill) = (desk.unit(Quantity::Acceleration), desk.unit(Quantity::Share));
    let ends = [map.accels_m_per_s2.first(), map.accels_m_per_s2.last()];
    let chart = Chart {
        id: "fill map",
        x_words: "along the case".to_owned(),
        x_unit: accel.symbol,
        y_unit: "fill %",
        x: ends.map(|end| accel.from_si(*end.unwrap_or(&0.0))),
        y: [0.0, fill.from_si(1.0)],
        curves: Vec::new(),
        veiled: Vec::new(),
    };
    // The chart paints nothing over its ground: the tints lie under its axes.
    let ground = ui.painter().add(egui::Shape::Noop);
    let t = chart::chart_ui(ui, rect, chart, look);
    let frame = *t.frame();
    let Some(drawn) = Drawn::kept(ui, drawn, result, map, frame, look) else {
        return chart::empty_ui(ui, rect, "Works out the coarse map", look);
    };
    let fade = if is_old { crate::gui::look::STALE_OPACITY } else { 1.0 };
    drawn.paint(ui, ground, frame, fade, look);
    let painter = ui.painter().with_clip_rect(frame.expand(8.0));
    let place = |size: f64, share: f64| chart::place(&t, [accel.from_si(size), fill.from_si(share)]);
    if let Some(share) = common_share {
        let at = place(map.case_m_per_s2, share);
        chart::dot(&painter, at, look);
        let number = (desk.view.case_idx + 1).to_string();
        chart::label(&painter, &frame, at + vec2(8.0, -9.0), Align2::LEFT_CENTER, &number, look.accent, look);
    }
    legend_ui(ui, rect, map, look);
    hover_ui(ui, rect, frame, map, desk);
}

/// What tints and hatches stand for, above the map at the right, as far as there is room.
fn legend_ui(ui: &Ui, rect: Rect, map: &FillMap, look: &Look) {
    let painter = ui.painter();
    let y = rect.top() + 5.0;
    let mut right = rect.right();
    let word = |right: &mut f32, word: &str, gap: f32| {
        let text = painter.text(pos2(*right, y), Align2::RIGHT_CENTER, word, font::tick(), look.ink2);
        *right = text.left() - gap;
    };
    let swatch = |right: &mut f32, width: f32| {
        let place = Rect::from_min_max(pos2(*right - width, y - 4.0), pos2(*right, y + 4.0));
        *right = place.left() - 4.0;
        place
    };
    let is_there = |state: State| map.points.iter().flatten().any(|point| point.state == state);
    for (state, color, spacing) in
        [(State::NotJudged, look.state_fill(State::NotJudged), 4.0), (State::Fails, look.veil, 7.0)]
    {
        if is_there(state) && right > rect.left() + 200.0 {
            word(&mut right, state.word(), 4.0);
            let place = swatch(&mut right, 14.0);
            painter.add(marks::hatch(place, spacing, Stroke::new(1.0, color)));
            painter.rect_stroke(place, 0.0, (1.0, look.line), egui::StrokeKind::Inside);
            right -= 8.0;
        }
    }
    if right > rect.left() + 140.0 {
        word(&mut right, "1", 4.0);
        let place = swatch(&mut right, 60.0);
        for i in 0..N_TINTS {
            let x = |i: usize| place.left() + place.width() * i as f32 / N_TINTS as f32;
            painter.rect_filled(place.with_min_x(x(i)).with_max_x(x(i + 1)), 0.0, look.band(i, N_TINTS));
        }
        word(&mut right, "used 0", 0.0);
    }
}

/// What is under the pointer, in words.
fn hover_ui(ui: &Ui, rect: Rect, frame: Rect, map: &FillMap, desk: &Desk) {
    let response = ui.interact(rect, egui::Id::unique("fill map point"), egui::Sense::hover());
    let n_known = map.points.iter().flatten().count();
    let words = format!("Fill map, {n_known} of {} points", map.points.len());
    response.widget_info(|| egui::WidgetInfo::labeled(egui::Role::Image, true, &words));
    let Some(pos) = response.hover_pos().filter(|pos| frame.contains(*pos)) else { return };
    let nearest = |share: f32, n: usize| (share * (n - 1) as f32).round().clamp(0.0, (n - 1) as f32) as usize;
    let j = nearest((pos.x - frame.left()) / frame.width(), map.accels_m_per_s2.len());
    let i = nearest((frame.bottom() - pos.y) / frame.height(), map.shares.len());
    let Some(point) = map.point(i, j) else { return };
    let words = [
        desk.text(Measure::new(Quantity::Share, map.shares[i])),
        desk.text(Measure::new(Quantity::Acceleration, map.accels_m_per_s2[j])),
    ];
    response.on_hover_text(format!("{}\n{}", words.join(", "), point_words(point)));
}

fn point_words(point: &MapPoint) -> String {
    let bound = point.bound.map_or_else(String::new, |bound| format!(", {}", bound.word()));
    match point.state {
        State::NotJudged => format!("{} not judged{bound}", point.criterion).trim().to_owned(),
        state => format!("{} {}, {}{bound}", point.criterion, state.word(), utilisation_text(point.utilisation)),
    }
}

impl Drawn {
    /// The drawing of a map in a frame; none where not even its coarsest grid is there.
    fn kept<'d>(
        ui: &Ui,
        drawn: &'d mut Option<Drawn>,
        of: &Found,
        map: &FillMap,
        frame: Rect,
        look: &Look,
    ) -> Option<&'d Drawn> {
        let pixels = frame.size() * ui.pixels_per_point();
        let size = [pixels.x, pixels.y].map(|side| (side.round() as usize).clamp(2, 2048));
        let is_kept =
            drawn.as_ref().is_some_and(|d| Arc::ptr_eq(&d.of, of) && d.size == size && d.theme == look.theme);
        if !is_kept {
            let field = Field::new(map)?;
            let tints = ui.load_texture("fill map", tinted(&field, size, look), TextureOptions::LINEAR);
            let hatch = |kind, spacing| hatched(&field, frame.size(), kind, spacing);
            *drawn = Some(Drawn {
                of: of.clone(),
                size,
                theme: look.theme,
                tints,
                contours: [field.contour(0.9), field.contour(1.0)],
                hatches: [hatch(Kind::Fails, 7.0), hatch(Kind::NotJudged, 4.0)],
            });
        }
        drawn.as_ref()
    }

    fn paint(&self, ui: &Ui, ground: egui::layers::ShapeIdx, frame: Rect, fade: f32, look: &Look) {
        let whole = Rect::from_min_max(pos2(0.0, 0.0), pos2(1.0, 1.0));
        let tints = egui::Shape::image(self.tints.id(), frame, whole, Color32::WHITE.gamma_multiply(fade));
        ui.painter().set(ground, tints);
        let painter = ui.painter().with_clip_rect(frame.intersect(ui.clip_rect()));
        let colors = [look.veil, look.state_fill(State::NotJudged)];
        for (lines, color) in self.hatches.iter().zip(colors) {
            let stroke = Stroke::new(1.0, color.gamma_multiply(fade));
            for [a, b] in lines {
                painter.line_segment([frame.min + a.to_vec2(), frame.min + b.to_vec2()], stroke);
            }
        }
        let at = |[x, y]: [f64; 2]| {
            pos2(frame.left() + x as f32 * frame.width(), frame.bottom() - y as f32 * frame.height())
        };
        for (pieces, width) in self.contours.iter().zip([0.75, 1.75]) {
            let stroke = Stroke::new(width, look.ink.gamma_multiply(fade));
            pieces.iter().for_each(|[a, b]| _ = painter.line_segment([at(*a), at(*b)], stroke));
        }
        for (pieces, (word, share)) in self.contours.iter().zip([("0.9", 0.35), ("1", 0.65)]) {
            // From its upper left end to its lower right one: apart from each other where the contours lie close.
            let mut along: Vec<[f64; 2]> = pieces.iter().map(|piece| piece[0]).collect();
            along.sort_by(|a, b| (a[0] - a[1]).total_cmp(&(b[0] - b[1])));
            if let Some(place) = along.get((share * along.len() as f64) as usize) {
                chart::label(&painter, &frame, at(*place), Align2::CENTER_CENTER, word, look.ink, look);
            }
        }
    }
}

/// The tints, a colour a pixel.
fn tinted(field: &Field, [w, h]: [usize; 2], look: &Look) -> ColorImage {
    let color = |k: usize| {
        let (x, y) = (((k % w) as f64 + 0.5) / w as f64, 1.0 - ((k / w) as f64 + 0.5) / h as f64);
        match field.at(x, y) {
            Kind::Used(used) => look.band(((used * N_TINTS as f64) as usize).min(N_TINTS - 1), N_TINTS),
            Kind::Fails | Kind::NotJudged => look.board,
        }
    };
    ColorImage::new([w, h], (0..w * h).map(color).collect())
}

/// Lines at 45 degrees over what is of a kind, in points from the upper left corner.
fn hatched(field: &Field, size: egui::Vec2, kind: Kind, spacing: f32) -> Vec<[Pos2; 2]> {
    let mut lines = Vec::new();
    for i in 1..=((size.x + size.y) / spacing) as i32 {
        // The line x + y = reach, from its upper end down.
        let reach = i as f32 * spacing;
        let on = |y: f32| pos2(reach - y, y);
        let (from, to) = ((reach - size.x).max(0.0), reach.min(size.y));
        let mut start: Option<f32> = None;
        let mut y = from;
        while y <= to + 1.0 {
            let p = on(y.min(to));
            let is_of_kind = y <= to && field.at(f64::from(p.x / size.x), f64::from(1.0 - p.y / size.y)) == kind;
            match (is_of_kind, start) {
                (true, None) => start = Some(y),
                (false, Some(from)) => {
                    lines.push([on(from), on((y - 1.0).max(from))]);
                    start = None;
                }
                _ => {}
            }
            y += 1.0;
        }
    }
    lines
}
