//! The plots of the chosen load case: freeboard against fill, pressure along the wall, tilt against acceleration, the
//! fill map.
//!
//! Curves and maps come from [`crate::analysis`]; nothing is worked out here but units.

mod chart;
mod fill_map;
mod freeboard;
mod map_field;
mod tilt;
mod wall;

use std::sync::Arc;

use egui::{Rect, Ui, pos2, vec2};

use crate::analysis::{self, Curves};

use super::desk::Judged;
use super::pictures::{Pictures, Shown};
use super::{Desk, field, font};

/// The plots that there are.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
enum Kind {
    #[default]
    Freeboard,
    Wall,
    Tilt,
    FillMap,
}

const ALL: [Kind; 4] = [Kind::Freeboard, Kind::Wall, Kind::Tilt, Kind::FillMap];

impl Kind {
    fn title(self) -> &'static str {
        match self {
            Kind::Freeboard => "Required freeboard against fill",
            Kind::Wall => "Pressure along the wall",
            Kind::Tilt => "Tilt against acceleration",
            Kind::FillMap => "Fill map",
        }
    }
}

/// The plot area: which plots are shown where there is no room for all, and the curves of the last revision.
#[derive(Debug, Default)]
pub struct PlotArea {
    in_last_place: Option<Kind>,
    curves: Option<Cached>,
    map: Option<fill_map::Drawn>,
}

#[derive(Debug)]
struct Cached {
    revision: u64,
    case_idx: usize,
    curves: Arc<Curves>,
}

impl PlotArea {
    fn curves(&mut self, revision: u64, case_idx: usize, judged: Judged) -> Arc<Curves> {
        match &self.curves {
            Some(c) if (c.revision, c.case_idx) == (revision, case_idx) => c.curves.clone(),
            _ => {
                let curves = Arc::new(analysis::curves(judged.study, judged.results, case_idx));
                self.curves = Some(Cached { revision, case_idx, curves: curves.clone() });
                curves
            }
        }
    }

    /// Whether the fill map is among the plots in `n` places.
    pub fn shows_map(&self, n: usize) -> bool {
        self.shown(n).contains(&Kind::FillMap)
    }

    /// The kinds shown in `n` places: the last place is the user's choice.
    fn shown(&self, n: usize) -> Vec<Kind> {
        let mut shown = ALL[..n.min(ALL.len())].to_vec();
        if let (Some(kind), Some(last)) = (self.in_last_place, shown.last().copied())
            && n < ALL.len()
            && (kind == last || !shown.contains(&kind))
            && let Some(place) = shown.last_mut()
        {
            *place = kind;
        }
        shown
    }
}

/// The plots in `rect`, side by side or one above the other.
pub fn plots_ui(
    ui: &mut Ui,
    rect: Rect,
    n: usize,
    is_column: bool,
    desk: &mut Desk,
    area: &mut PlotArea,
    pictures: &mut Pictures,
) {
    let look = desk.look;
    ui.painter().rect_filled(rect, 0.0, look.board);
    let case_idx = desk.view.case_idx;
    let judged = desk.judged().filter(|j| case_idx < j.results.cases.len());
    let curves = judged.map(|judged| area.curves(desk.doc.revision(), case_idx, judged));
    let shown = area.shown(n);
    for (i, kind) in shown.iter().copied().enumerate() {
        let (from, to) = (i as f32 / shown.len() as f32, (i + 1) as f32 / shown.len() as f32);
        let place = if is_column {
            rect.with_min_y(rect.top() + from * rect.height()).with_max_y(rect.top() + to * rect.height())
        } else {
            rect.with_min_x(rect.left() + from * rect.width()).with_max_x(rect.left() + to * rect.width())
        };
        if i > 0 && !is_column {
            let x = ui.painter().round_to_pixel_center(place.left());
            ui.painter().vline(x, place.shrink2(vec2(0.0, 14.0)).y_range(), (1.0, look.line2));
        }
        let inner = place.shrink2(vec2(16.0, 8.0));
        let title = inner.with_max_y(inner.top() + 18.0);
        let is_choice = i + 1 == shown.len() && n < ALL.len();
        if is_choice {
            choice_ui(ui, title, &shown, kind, desk, area);
        } else {
            field::paint_fitting(ui, title, egui::Align::Min, kind.title(), font::body_heavy(), look.ink);
        }
        let body = inner.with_min_y(title.bottom());
        let (Some(curves), Some(judged)) = (&curves, judged) else {
            chart::empty_ui(ui, body, "Waits for a load case of a study without faults", look);
            continue;
        };
        match kind {
            Kind::Freeboard => match pictures.freeboard(judged, desk.doc.revision(), case_idx) {
                Some(Shown { result, is_old }) => {
                    ui.scope(|ui| {
                        ui.set_opacity(if is_old { super::look::STALE_OPACITY } else { 1.0 });
                        freeboard::freeboard_ui(ui, body, result, desk);
                    });
                }
                None => chart::empty_ui(ui, body, "Follows the liquid over sills, fill by fill", look),
            },
            Kind::Wall => wall::wall_ui(ui, body, &curves.wall, desk),
            Kind::Tilt => tilt::tilt_ui(ui, body, &curves.tilt, desk),
            Kind::FillMap => {
                let share = analysis::common_share(judged.study);
                fill_map::fill_map_ui(ui, body, pictures.fill_map(), share, desk, &mut area.map);
            }
        }
    }
}

fn choice_ui(ui: &mut Ui, title: Rect, shown: &[Kind], now: Kind, desk: &Desk, area: &mut PlotArea) {
    let others: Vec<(Kind, &str)> = ALL
        .into_iter()
        .filter(|kind| *kind == now || !shown.contains(kind))
        .map(|kind| (kind, kind.title()))
        .collect();
    let text =
        field::paint_job(ui, title, egui::Align::Min, font::runs([(now.title(), font::body_heavy(), desk.look.ink)]));
    let response = ui.interact(text, egui::Id::unique("plot choice"), egui::Sense::click());
    let words = format!("Plot, {}", now.title());
    response.widget_info(|| egui::WidgetInfo::labeled(egui::Role::Button, true, &words));
    let tip = pos2(text.right() + 9.0, text.center().y + 2.5);
    let triangle = vec![tip, tip + vec2(-4.0, -5.0), tip + vec2(4.0, -5.0)];
    ui.painter().add(egui::Shape::convex_polygon(triangle, desk.look.accent, egui::Stroke::NONE));
    super::marks::paint_focus(ui.painter(), text, &response, desk.look);
    egui::Popup::menu(&response).accessible_name("Plot").show(|ui| {
        for (kind, words) in others {
            if ui.selectable_label(kind == now, words).clicked() {
                area.in_last_place = Some(kind);
            }
        }
    });
    response.on_hover_text("Choose another plot");
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_plot_can_be_reached_however_few_there_is_room_for() {
        for n in 1..=3 {
            for kind in ALL {
                let area = PlotArea { in_last_place: Some(kind), ..Default::default() };
                let shown = area.shown(n);
                assert_eq!(shown.len(), n);
                assert!(shown.contains(&kind), "{kind:?} in {n} places: {shown:?}");
            }
        }
    }
}
