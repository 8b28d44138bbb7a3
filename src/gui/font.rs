//! The two typefaces, the weights and sizes in use, and text of mixed runs. Figures are tabular in every weight.

use std::collections::BTreeMap;
use std::sync::Arc;

use egui::text::{LayoutJob, TextFormat};
use egui::{Color32, FontData, FontDefinitions, FontFamily, FontId, TextStyle};

/// Program name, sheet heads.
pub fn title() -> FontId {
    FontId::new(15.0, heavy())
}

/// Column heads, verdict and case names.
pub fn heading() -> FontId {
    FontId::new(13.0, heavy())
}

/// Names that stand out less than a heading: 13, regular.
pub fn name() -> FontId {
    FontId::proportional(13.0)
}

/// Rows, fields, menus, buttons.
pub fn body() -> FontId {
    FontId::proportional(12.5)
}

/// Numbers in rows.
pub fn figure() -> FontId {
    FontId::new(12.5, strong())
}

/// Words of body size that carry weight: a plot's title, a dimension.
pub fn body_heavy() -> FontId {
    FontId::new(12.5, heavy())
}

/// Utilisation in a verdict row.
pub fn number() -> FontId {
    FontId::new(14.5, heavy())
}

/// Utilisation on a card.
pub fn card_number() -> FontId {
    FontId::new(13.5, heavy())
}

/// Units, the line of demand and limit, hints, status.
pub fn small() -> FontId {
    FontId::proportional(11.5)
}

/// Numbers among small text.
pub fn small_figure() -> FontId {
    FontId::new(11.5, strong())
}

/// Rulers, axes, labels on a plot; never smaller.
pub fn tick() -> FontId {
    FontId::proportional(10.5)
}

/// Numbers among ticks.
pub fn tick_figure() -> FontId {
    FontId::new(10.5, heavy())
}

/// Worked formulas: upright.
pub fn formula(size: f32) -> FontId {
    FontId::new(size, FontFamily::Name("formula".into()))
}

/// Worked formulas: symbols.
pub fn formula_italic(size: f32) -> FontId {
    FontId::new(size, FontFamily::Name("formula italic".into()))
}

/// One run of a line of text.
pub type Run<'a> = (&'a str, FontId, Color32);

/// A line of runs that differ in weight or colour.
pub fn runs<'a>(runs: impl IntoIterator<Item = Run<'a>>) -> LayoutJob {
    let mut job = LayoutJob::default();
    for (text, font, color) in runs {
        job.append(text, 0.0, TextFormat { font_id: font, color, ..Default::default() });
    }
    job
}

pub(super) fn definitions() -> FontDefinitions {
    let mut fonts = FontDefinitions::empty();
    let mut add = |key: &str, bytes: &'static [u8]| {
        fonts.font_data.insert(key.to_owned(), Arc::new(FontData::from_static(bytes)));
    };
    add("asap 400", include_bytes!("../../assets/fonts/Asap_400Regular.ttf"));
    add("asap 500", include_bytes!("../../assets/fonts/Asap_500Medium.ttf"));
    add("asap 600", include_bytes!("../../assets/fonts/Asap_600SemiBold.ttf"));
    add("stix", include_bytes!("../../assets/fonts/STIXTwoText_400Regular.ttf"));
    add("stix italic", include_bytes!("../../assets/fonts/STIXTwoText_400Regular_Italic.ttf"));
    for (family, first, then) in [
        (FontFamily::Proportional, "asap 400", "stix"),
        (FontFamily::Monospace, "asap 400", "stix"),
        (strong(), "asap 500", "stix"),
        (heavy(), "asap 600", "stix"),
        (formula(0.0).family, "stix", "asap 400"),
        (formula_italic(0.0).family, "stix italic", "stix"),
    ] {
        let mut chain = vec![first.to_owned(), then.to_owned()];
        if then != "asap 400" && first != "asap 400" {
            chain.push("asap 400".to_owned());
        }
        fonts.families.insert(family, chain);
    }
    fonts
}

pub(super) fn text_styles() -> BTreeMap<TextStyle, FontId> {
    [
        (TextStyle::Heading, heading()),
        (TextStyle::Body, body()),
        (TextStyle::Button, body()),
        (TextStyle::Small, small()),
        (TextStyle::Monospace, body()),
        (TextStyle::Name("number".into()), number()),
        (TextStyle::Name("tick".into()), tick()),
        (TextStyle::Name("formula".into()), formula(13.0)),
    ]
    .into()
}

fn strong() -> FontFamily {
    FontFamily::Name("strong".into())
}

fn heavy() -> FontFamily {
    FontFamily::Name("heavy".into())
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The figures of a column line up only when they are equally wide in every weight.
    #[test]
    fn figures_are_tabular_and_do_not_move_with_weight() {
        let ctx = egui::Context::default();
        ctx.set_fonts(definitions());
        ctx.run_ui(Default::default(), |ui| {
            let width = |font: FontId, c: char| ui.fonts_mut(|f| f.glyph_width(&font, c));
            let zero = width(FontId::proportional(20.0), '0');
            for family in [FontFamily::Proportional, strong(), heavy()] {
                for c in '0'..='9' {
                    let got = width(FontId::new(20.0, family.clone()), c);
                    assert!((got - zero).abs() < 0.01, "{c} in {family:?}: {got}, expected {zero}");
                }
            }
        })
        .drop_without_applying_deltas();
    }
}
