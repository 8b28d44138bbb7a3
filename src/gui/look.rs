//! The look: every colour, the pressure map, and what egui is told of both themes. Nobody else writes a colour.
//!
//! Knows no study. The fonts and text styles are in `super::font`.

use std::sync::Arc;

use egui::{Color32, CornerRadius, Margin, Shadow, Stroke, Theme, Vec2, Visuals};

use crate::analysis::State;

use super::font;

/// All colour tokens of one theme.
#[derive(Debug, PartialEq)]
pub struct Look {
    /// Which theme this is.
    pub theme: Theme,
    /// Drawing ground, plots.
    pub board: Color32,
    /// Header, columns, status line.
    pub panel: Color32,
    /// Case strip, surroundings of tracks.
    pub sunk: Color32,
    /// Opened verdict, chosen card, fields, popups.
    pub raised: Color32,
    /// Hovered row.
    pub hover: Color32,
    /// Selected list row.
    pub sel: Color32,
    /// Values.
    pub ink: Color32,
    /// Labels.
    pub ink2: Color32,
    /// Units and ticks.
    pub ink3: Color32,
    /// Heading rule, outline of things that can be lifted.
    pub line: Color32,
    /// Row rule, empty track.
    pub line2: Color32,
    /// Grid, 0.1 m.
    pub grid: Color32,
    /// Grid, 0.5 m.
    pub grid2: Color32,
    /// The user's hand: what is held, chosen, or can be pressed now.
    pub accent: Color32,
    /// Its glow under a line.
    pub accent_soft: Color32,
    /// Text on it.
    pub on_accent: Color32,
    /// Hatch over the failing part of a plot.
    pub veil: Color32,
    holds: [Color32; 2],
    close: [Color32; 2],
    fails: [Color32; 2],
    not_judged: [Color32; 2],
    pressure: [Color32; 11],
}

/// Pale paper, fine ink.
pub const LIGHT: Look = Look {
    theme: Theme::Light,
    board: rgb(0xFCFBF7),
    panel: rgb(0xF3F2EC),
    sunk: rgb(0xE9E8E0),
    raised: rgb(0xFFFFFF),
    hover: rgb(0xE4E3DA),
    sel: rgb(0xF1E3EE),
    ink: rgb(0x1C2430),
    ink2: rgb(0x4B5462),
    ink3: rgb(0x565F6C),
    line: rgb(0xC9C8BE),
    line2: rgb(0xDEDDD4),
    grid: rgb(0xEDECE5),
    grid2: rgb(0xE0DFD6),
    accent: rgb(0x8A2B78),
    accent_soft: rgb(0xE9CFE2),
    on_accent: rgb(0xFFFFFF),
    veil: rgb(0xEDBFAC),
    holds: [rgb(0x2C6B4A), rgb(0x9FC3AE)],
    close: [rgb(0x8A5A00), rgb(0xE3B55E)],
    fails: [rgb(0x8F1B0C), rgb(0xDE6239)],
    not_judged: [rgb(0x565C66), rgb(0x565C66)],
    pressure: [
        rgb(0xD4F4F4),
        rgb(0xB4E2E8),
        rgb(0x95D0DD),
        rgb(0x7ABCD3),
        rgb(0x65A7C8),
        rgb(0x5692BA),
        rgb(0x4D7CAA),
        rgb(0x476796),
        rgb(0x41537F),
        rgb(0x3A4167),
        rgb(0x31304D),
    ],
};

/// The same table by night.
pub const DARK: Look = Look {
    theme: Theme::Dark,
    board: rgb(0x11151B),
    panel: rgb(0x181D24),
    sunk: rgb(0x0C0F14),
    raised: rgb(0x222831),
    hover: rgb(0x2A313B),
    sel: rgb(0x3A2438),
    ink: rgb(0xECEAE2),
    ink2: rgb(0xB7BBC2),
    ink3: rgb(0x9CA2AC),
    line: rgb(0x3A424D),
    line2: rgb(0x2B323B),
    grid: rgb(0x181D24),
    grid2: rgb(0x222932),
    accent: rgb(0xE79BD3),
    accent_soft: rgb(0x57304F),
    on_accent: rgb(0x1A0F18),
    veil: rgb(0x5C2E22),
    holds: [rgb(0x86CBA3), rgb(0x3F7A5B)],
    close: [rgb(0xE9BC62), rgb(0xA97A22)],
    fails: [rgb(0xFF9470), rgb(0xD9552B)],
    not_judged: [rgb(0xA6ACB6), rgb(0xA6ACB6)],
    pressure: [
        rgb(0xAFCFCE),
        rgb(0x92C0C5),
        rgb(0x77B1BE),
        rgb(0x5FA0B7),
        rgb(0x4D8FAF),
        rgb(0x417CA4),
        rgb(0x3C6A97),
        rgb(0x395886),
        rgb(0x364773),
        rgb(0x32385D),
        rgb(0x2B2A47),
    ],
};

impl Look {
    /// The look of a theme.
    pub fn of(theme: Theme) -> &'static Look {
        match theme {
            Theme::Light => &LIGHT,
            Theme::Dark => &DARK,
        }
    }

    /// Tint of pressure band `i` of `n`: the map at (i + 0.5) / n; the last one for anything above full scale.
    pub fn band(&self, i: usize, n: usize) -> Color32 {
        self.pressure_at((i as f32 + 0.5) / n.max(1) as f32)
    }

    /// The pressure map at `share` of full scale, 0 to 1.
    pub fn pressure_at(&self, share: f32) -> Color32 {
        let last = self.pressure.len() - 1;
        let at = share.clamp(0.0, 1.0) * last as f32;
        let below = (at as usize).min(last - 1);
        self.pressure[below].lerp_to_gamma(self.pressure[below + 1], at - below as f32)
    }

    /// Mark and word of a state.
    pub fn state(&self, state: State) -> Color32 {
        self.state_pair(state)[0]
    }

    /// Bar of a state; the hatch of what is not judged.
    pub fn state_fill(&self, state: State) -> Color32 {
        self.state_pair(state)[1]
    }

    /// Colour of a number of that state: what holds is quiet.
    pub fn state_number(&self, state: State) -> Color32 {
        if state == State::Holds { self.ink } else { self.state(state) }
    }

    fn state_pair(&self, state: State) -> [Color32; 2] {
        match state {
            State::Fails => self.fails,
            State::NotJudged => self.not_judged,
            State::Close => self.close,
            State::Holds => self.holds,
        }
    }

    fn visuals(&self) -> Visuals {
        let mut v = match self.theme {
            Theme::Light => Visuals::light(),
            Theme::Dark => Visuals::dark(),
        };
        v.panel_fill = self.panel;
        v.window_fill = self.raised;
        v.text_edit_bg_color = Some(self.raised);
        v.extreme_bg_color = self.board;
        v.faint_bg_color = self.hover;
        v.code_bg_color = self.sunk;
        v.override_text_color = None;
        v.weak_text_color = Some(self.ink3);
        v.hyperlink_color = self.accent;
        v.warn_fg_color = self.close[0];
        v.error_fg_color = self.fails[0];
        v.selection.bg_fill = self.sel;
        v.selection.stroke = Stroke::new(1.0, self.accent);
        v.text_cursor.stroke = Stroke::new(1.5, self.accent);
        v.window_shadow = Shadow::NONE;
        v.popup_shadow = Shadow::NONE;
        v.window_corner_radius = CornerRadius::same(4);
        v.menu_corner_radius = CornerRadius::same(4);
        v.window_stroke = Stroke::new(1.0, self.line);
        v.window_highlight_topmost = false;
        v.button_frame = true;
        v.striped = false;
        v.indent_has_left_vline = false;
        v.slider_trailing_fill = true;
        v.disabled_alpha = STALE_OPACITY;
        let states = &mut v.widgets;
        for (widget, ground, stroke, ink) in [
            (&mut states.noninteractive, self.panel, Stroke::new(1.0, self.line2), self.ink2),
            (&mut states.inactive, self.raised, Stroke::new(1.0, self.line), self.ink),
            (&mut states.hovered, self.hover, Stroke::new(1.0, self.line), self.ink),
            (&mut states.active, self.hover, Stroke::new(1.5, self.accent), self.ink),
            (&mut states.open, self.hover, Stroke::new(1.0, self.line), self.ink),
        ] {
            widget.bg_fill = ground;
            widget.weak_bg_fill = ground;
            widget.bg_stroke = stroke;
            widget.fg_stroke = Stroke::new(1.0, ink);
            widget.corner_radius = CornerRadius::same(3);
            widget.expansion = 0.0;
        }
        v
    }
}

/// Opacity of disabled and stale things; the reason stands beside them in full ink.
pub const STALE_OPACITY: f32 = 0.55;

/// Width of a state's focus ring, and its distance from what has the focus, points.
pub const FOCUS_RING: f32 = 2.0;

/// Tells egui the fonts, text styles, spacing and colours. Once, before the first frame.
pub fn install(ctx: &egui::Context) {
    ctx.set_fonts(font::definitions());
    for look in [&LIGHT, &DARK] {
        let mut style =
            egui::Style { visuals: look.visuals(), text_styles: font::text_styles(), ..Default::default() };
        style.drag_value_text_style = egui::TextStyle::Body;
        let s = &mut style.spacing;
        s.item_spacing = Vec2::new(8.0, 4.0);
        s.button_padding = Vec2::new(12.0, 5.0);
        s.interact_size.y = 22.0;
        s.indent = 18.0;
        s.window_margin = Margin::same(12);
        s.menu_margin = Margin::same(6);
        s.tooltip_width = 340.0;
        s.scroll = egui::style::ScrollStyle::floating();
        s.scroll.bar_width = 6.0;
        s.scroll.floating_allocated_width = 0.0;
        s.icon_width = 14.0;
        ctx.set_style_of(look.theme, Arc::new(style));
    }
}

const fn rgb(hex: u32) -> Color32 {
    Color32::from_rgb((hex >> 16) as u8, (hex >> 8) as u8, hex as u8)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_map_is_met_at_its_stops_and_ends() {
        for look in [&LIGHT, &DARK] {
            assert_eq!(look.pressure_at(0.0), look.pressure[0]);
            assert_eq!(look.pressure_at(0.5), look.pressure[5]);
            assert_eq!(look.pressure_at(7.0), look.pressure[10], "above full scale");
            assert_eq!(look.band(0, 1), look.pressure[5]);
        }
    }

    /// WCAG 2.2, relative luminance and contrast ratio (formula from memory); 4.5 is its level AA for text.
    #[test]
    fn every_ink_reads_on_every_ground() {
        for look in [&LIGHT, &DARK] {
            let inks = [look.ink, look.ink2, look.ink3, look.accent];
            let states = State::ALL.map(|s| look.state(s));
            for ink in inks.into_iter().chain(states) {
                for ground in [look.board, look.panel, look.sunk, look.raised, look.hover, look.sel] {
                    let ratio = contrast(ink, ground);
                    assert!(
                        ratio >= 4.5,
                        "{:?}: {ink:?} on {ground:?}: {ratio:.2}, expected at least 4.5",
                        look.theme
                    );
                }
            }
            assert!(contrast(look.on_accent, look.accent) >= 4.5);
        }
    }

    fn contrast(a: Color32, b: Color32) -> f32 {
        let luminance = |c: Color32| {
            let [r, g, b, _] = egui::Rgba::from(c).to_array();
            0.2126 * r + 0.7152 * g + 0.0722 * b
        };
        let (a, b) = (luminance(a), luminance(b));
        (a.max(b) + 0.05) / (a.min(b) + 0.05)
    }
}
