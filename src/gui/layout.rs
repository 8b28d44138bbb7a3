//! Where the regions of the window lie: a pure function of its size and of the dividers that the user moved.
//!
//! Knows no panel. Widths and breaks are those of the look's grid, on a 4 point base.

use egui::{Rect, Vec2, pos2, vec2};
use serde::{Deserialize, Serialize};

/// Smallest window.
pub const MIN_WINDOW: Vec2 = vec2(1024.0, 640.0);

/// Height of the header.
pub const HEADER: f32 = 40.0;

/// Height of the status line.
pub const STATUS: f32 = 24.0;

/// Height of the fields row above the board.
pub const CASE_HEAD: f32 = 31.0;

/// Width of the tank column when only its headings are left.
pub const HEADINGS: f32 = 96.0;

/// From this width the plots stand beside the board.
pub const BESIDE: f32 = 1600.0;

const LEAST_BOARD: Vec2 = vec2(320.0, 200.0);

/// A line between two regions that can be dragged.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Divider {
    /// Right of the tank column.
    Tank,
    /// Left of the verdict column.
    Verdicts,
    /// Above the case strip.
    Strip,
    /// Between board and plots.
    Plots,
}

/// Sizes that the user gave by dragging dividers; none where the size is the window's own.
#[derive(Clone, Copy, Debug, Default, PartialEq, Serialize, Deserialize)]
pub struct Sizes {
    tank: Option<f32>,
    verdicts: Option<f32>,
    strip: Option<f32>,
    plots: Option<f32>,
}

impl Sizes {
    /// The size that a divider sets.
    pub fn of(&mut self, divider: Divider) -> &mut Option<f32> {
        match divider {
            Divider::Tank => &mut self.tank,
            Divider::Verdicts => &mut self.verdicts,
            Divider::Strip => &mut self.strip,
            Divider::Plots => &mut self.plots,
        }
    }
}

/// Where everything lies, and what has collapsed.
#[derive(Clone, Debug, PartialEq)]
pub struct Regions {
    /// Across the top.
    pub header: Rect,
    /// Left column.
    pub tank: Rect,
    /// Only its headings are left; it opens over the board.
    pub tank_is_folded: bool,
    /// Fields of the chosen case.
    pub case_head: Rect,
    /// Drawing area.
    pub board: Rect,
    /// Plots, or the list of problems.
    pub plots: Rect,
    /// The plots stand one above the other beside the board.
    pub plots_are_beside: bool,
    /// How many plots there is room for.
    pub n_plots: usize,
    /// Cards of the load cases.
    pub strip: Rect,
    /// Width of a card.
    pub card_width: f32,
    /// Cards keep their drawing.
    pub cards_have_drawings: bool,
    /// Right column.
    pub verdicts: Rect,
    /// Height of a verdict's row; its third line is left out below 53.
    pub verdict_row: f32,
    /// Across the bottom.
    pub status: Rect,
    /// The menus fold into one.
    pub menus_are_folded: bool,
}

/// Lays the window out.
pub fn regions(window: Rect, mut sizes: Sizes) -> Regions {
    let (w, h) = (window.width(), window.height());
    let is_large = w >= BESIDE;
    let is_medium = w >= 1400.0 && h >= 840.0;
    let pick = |large: f32, medium: f32, small: f32| {
        if is_large && h >= 840.0 {
            large
        } else if is_large || is_medium {
            medium
        } else {
            small
        }
    };
    let tank_is_folded = w < 1120.0;
    let tank_width = match sizes.of(Divider::Tank) {
        _ if tank_is_folded => HEADINGS,
        Some(width) => width.clamp(200.0, 420.0),
        None => pick(288.0, 264.0, 240.0),
    };
    let verdict_width = sizes.of(Divider::Verdicts).map_or(pick(376.0, 340.0, 312.0), |v| v.clamp(260.0, 520.0));
    let strip_height = match sizes.of(Divider::Strip) {
        Some(height) => height.clamp(56.0, 0.4 * h),
        None if h < 700.0 => 72.0,
        None => pick(144.0, 132.0, 112.0),
    };

    let (header, below) = window.split_top_bottom_at_y(window.top() + HEADER);
    let (middle, status) = below.split_top_bottom_at_y(below.bottom() - STATUS);
    let (left, verdicts) = middle.split_left_right_at_x(middle.right() - verdict_width);
    let (upper, strip) = left.split_top_bottom_at_y(left.bottom() - strip_height);
    let (tank, center) = upper.split_left_right_at_x(upper.left() + tank_width);
    let (board_column, plots) = if is_large {
        let width =
            sizes.of(Divider::Plots).unwrap_or(396.0).clamp(240.0, (center.width() - LEAST_BOARD.x).max(240.0));
        center.split_left_right_at_x(center.right() - width)
    } else {
        let most = (center.height() - LEAST_BOARD.y - CASE_HEAD).max(80.0);
        let height = sizes.of(Divider::Plots).unwrap_or(pick(224.0, 224.0, 176.0)).clamp(80.0, most);
        center.split_top_bottom_at_y(center.bottom() - height)
    };
    let (case_head, board) = board_column.split_top_bottom_at_y(board_column.top() + CASE_HEAD);
    let n_plots = if is_large { (plots.height() / 200.0) as usize } else { (plots.width() / 260.0) as usize };
    let card_height = strip.height() - 20.0;
    Regions {
        header,
        tank,
        tank_is_folded,
        case_head,
        board,
        plots,
        plots_are_beside: is_large,
        n_plots: n_plots.clamp(1, 3),
        strip,
        card_width: pick(176.0, 164.0, 152.0),
        cards_have_drawings: card_height >= 80.0,
        verdicts,
        verdict_row: if h < 700.0 { 38.0 } else { pick(56.0, 53.0, 53.0) },
        status,
        menus_are_folded: w < 1360.0,
    }
}

impl Regions {
    /// The dividers: which, the line it lies on, and whether it is upright.
    pub fn dividers(&self) -> Vec<(Divider, Rect, bool)> {
        let upright = |x: f32, r: Rect| Rect::from_min_max(pos2(x, r.top()), pos2(x, r.bottom()));
        let level = |y: f32, r: Rect| Rect::from_min_max(pos2(r.left(), y), pos2(r.right(), y));
        let mut out = vec![
            (Divider::Verdicts, upright(self.verdicts.left(), self.verdicts), true),
            (Divider::Strip, level(self.strip.top(), self.strip), false),
        ];
        if !self.tank_is_folded {
            out.push((Divider::Tank, upright(self.tank.right(), self.tank), true));
        }
        out.push(match self.plots_are_beside {
            true => (Divider::Plots, upright(self.plots.left(), self.plots), true),
            false => (Divider::Plots, level(self.plots.top(), self.plots), false),
        });
        out
    }

    /// The size that a divider would set if it were dragged to `at`.
    pub fn size_at(&self, divider: Divider, at: egui::Pos2) -> f32 {
        match divider {
            Divider::Tank => at.x - self.tank.left(),
            Divider::Verdicts => self.verdicts.right() - at.x,
            Divider::Strip => self.strip.bottom() - at.y,
            Divider::Plots if self.plots_are_beside => self.plots.right() - at.x,
            Divider::Plots => self.plots.bottom() - at.y,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn at(w: f32, h: f32) -> Regions {
        regions(Rect::from_min_size(pos2(0.0, 0.0), vec2(w, h)), Sizes::default())
    }

    /// The table of the look: (tank, verdicts, strip, board column, plots).
    #[test]
    fn the_named_window_sizes_get_their_grid() {
        let r = at(1280.0, 800.0);
        assert_eq!((r.tank.width(), r.verdicts.width(), r.strip.height()), (240.0, 312.0, 112.0));
        assert_eq!(
            (r.board.width(), r.board.height() + CASE_HEAD, r.plots.height(), r.n_plots),
            (728.0, 448.0, 176.0, 2)
        );
        let r = at(1440.0, 900.0);
        assert_eq!((r.tank.width(), r.verdicts.width(), r.strip.height()), (264.0, 340.0, 132.0));
        assert_eq!(
            (r.board.width(), r.board.height() + CASE_HEAD, r.plots.height(), r.n_plots),
            (836.0, 480.0, 224.0, 3)
        );
        let r = at(1920.0, 1080.0);
        assert_eq!((r.tank.width(), r.verdicts.width(), r.strip.height()), (288.0, 376.0, 144.0));
        assert_eq!(
            (r.board.width(), r.board.height() + CASE_HEAD, r.plots.width(), r.n_plots),
            (860.0, 872.0, 396.0, 3)
        );
    }

    #[test]
    fn regions_tile_the_window_at_any_size() {
        for w in (1024..=2600).step_by(97) {
            for h in (640..=1500).step_by(83) {
                let (w, h) = (w as f32, h as f32);
                let r = at(w, h);
                let all = [r.header, r.tank, r.case_head, r.board, r.plots, r.strip, r.verdicts, r.status];
                for (i, a) in all.iter().enumerate() {
                    assert!(a.is_positive(), "{w} x {h}: region {i} is empty: {a}");
                    for b in &all[i + 1..] {
                        assert!(!a.shrink(0.5).intersects(b.shrink(0.5)), "{w} x {h}: {a} and {b} overlap");
                    }
                }
                let area: f32 = all.iter().map(Rect::area).sum();
                assert!((area - w * h).abs() < 1.0, "{w} x {h}: regions cover {area}");
            }
        }
    }

    #[test]
    fn a_dragged_divider_is_met_and_forgotten() {
        let window = Rect::from_min_size(pos2(0.0, 0.0), vec2(1440.0, 900.0));
        let mut sizes = Sizes::default();
        let to = regions(window, sizes).size_at(Divider::Tank, pos2(300.0, 200.0));
        *sizes.of(Divider::Tank) = Some(to);
        assert_eq!(regions(window, sizes).tank.width(), 300.0);
        *sizes.of(Divider::Tank) = None;
        assert_eq!(regions(window, sizes).tank.width(), 264.0);
    }
}
