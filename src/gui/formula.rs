//! Worked formulas: symbols in italics, lowered subscripts, numbers upright, broken at spaces where too wide.
//!
//! egui has no baseline shift, so runs are laid by hand. Knows no verdict.

use std::sync::Arc;

use egui::{Color32, FontId, Galley, Painter, Pos2, Rect, Vec2, pos2, vec2};

use super::font;

const SIZE: f32 = 13.0;
const SUB_SIZE: f32 = 9.5;
const SUB_DROP: f32 = 3.0;
const LINE: f32 = 19.0;

/// How a piece of a formula is set.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Style {
    /// Symbols: one or two letters.
    Symbol,
    /// Words, numbers and signs.
    Upright,
    /// After an underscore.
    Subscript,
    /// A result, heavier than the rest.
    Result,
}

/// A piece of a formula that is never broken.
#[derive(Clone, Debug, PartialEq)]
pub struct Piece {
    /// Its text, without marks.
    pub text: String,
    /// How it is set.
    pub style: Style,
}

/// Words of a formula: broken only between them.
pub type Word = Vec<Piece>;

/// Reads the plain notation of a worked line: `_x` lowers one letter, `_{ab}` a longer one.
pub fn parse(text: &str) -> Vec<Word> {
    text.split_whitespace().map(parse_word).collect()
}

/// A result with its unit, kept together.
pub fn result(text: &str) -> Word {
    vec![Piece { text: text.to_owned(), style: Style::Result }]
}

/// Draws words within `width` from `at` on; words in `ink`, results in `result`. Gives the space taken.
pub fn formula_ui(painter: &Painter, at: Pos2, width: f32, words: &[Word], ink: Color32, result: Color32) -> Vec2 {
    let space = painter.layout_no_wrap(" ".into(), font::formula(SIZE), ink).size().x + 0.5;
    let (mut x, mut y, mut widest) = (0.0_f32, 0.0_f32, 0.0_f32);
    for word in words {
        let set: Vec<_> = word.iter().map(|piece| (lay(painter, piece, ink, result), piece.style)).collect();
        let word_width: f32 = set.iter().map(|(galley, _)| galley.size().x).sum();
        if x > 0.0 && x + word_width > width {
            (x, y) = (12.0, y + LINE);
        }
        for (galley, style) in set {
            let drop = if style == Style::Subscript { SUB_DROP } else { 0.0 };
            let baseline = y + 14.0 + drop;
            let top = at + vec2(x, baseline - ascent(&galley));
            x += galley.size().x;
            let color = if style == Style::Result { result } else { ink };
            painter.galley(pos2(top.x, painter.round_to_pixel_center(top.y) - 0.5), galley, color);
        }
        widest = widest.max(x);
        x += space;
    }
    vec2(widest, if words.is_empty() { 0.0 } else { y + LINE })
}

/// A symbol with its subscript and a text after it, for a row of fields: `a_s`. Gives its place.
pub fn symbol_ui(painter: &Painter, left_middle: Pos2, text: &str, ink: Color32) -> Rect {
    let at = left_middle - vec2(0.0, 10.0);
    Rect::from_min_size(at, formula_ui(painter, at, f32::INFINITY, &parse(text), ink, ink))
}

fn parse_word(word: &str) -> Word {
    let mut pieces = Word::new();
    let mut rest = word;
    while let Some(c) = rest.chars().next() {
        let taken = if c == '_' && rest.len() > 1 {
            let after = &rest[1..];
            let (inner, used) = match after.strip_prefix('{').and_then(|braced| braced.split_once('}')) {
                Some((inner, _)) => (inner, inner.len() + 2),
                None => {
                    let n = after.chars().next().map_or(0, char::len_utf8);
                    (&after[..n], n)
                }
            };
            pieces.push(Piece { text: inner.to_owned(), style: Style::Subscript });
            1 + used
        } else if c.is_alphabetic() {
            let n = rest.find(|c: char| !c.is_alphabetic()).unwrap_or(rest.len());
            let is_symbol = rest[..n].chars().count() <= 2 && !FUNCTIONS.contains(&&rest[..n]);
            let style = if is_symbol { Style::Symbol } else { Style::Upright };
            pieces.push(Piece { text: rest[..n].to_owned(), style });
            n
        } else {
            let n = rest[c.len_utf8()..].find(|c: char| c == '_' || c.is_alphabetic());
            let n = n.map_or(rest.len(), |n| n + c.len_utf8());
            pieces.push(Piece { text: rest[..n].to_owned(), style: Style::Upright });
            n
        };
        rest = &rest[taken..];
    }
    pieces
}

/// Short words that are not symbols.
const FUNCTIONS: &[&str] = &["at", "of", "in", "kN", "Pa", "kg", "mm", "to", "by", "or"];

fn lay(painter: &Painter, piece: &Piece, ink: Color32, result: Color32) -> Arc<Galley> {
    let (font, color): (FontId, Color32) = match piece.style {
        Style::Symbol => (font::formula_italic(SIZE), ink),
        Style::Upright => (font::formula(SIZE), ink),
        Style::Subscript => (font::formula_italic(SUB_SIZE), ink),
        Style::Result => (font::body_heavy(), result),
    };
    painter.layout_no_wrap(piece.text.clone(), font, color)
}

/// From the galley's top to its baseline.
fn ascent(galley: &Galley) -> f32 {
    galley.rows.first().and_then(|row| row.row.glyphs.first()).map_or(SIZE, |glyph| glyph.pos.y)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn pieces(text: &str) -> Vec<(String, Style)> {
        parse(text).into_iter().flatten().map(|p| (p.text, p.style)).collect()
    }

    #[test]
    fn subscripts_symbols_and_words_are_told_apart() {
        use Style::*;
        let want = [
            ("p", Symbol),
            ("=", Upright),
            ("p", Symbol),
            ("0", Subscript),
            ("+", Upright),
            ("ρ", Symbol),
            ("|", Upright),
            ("G", Symbol),
            ("|(", Upright),
            ("h", Symbol),
            ("pool", Subscript),
            ("−", Upright),
            ("v", Symbol),
            (")", Upright),
            ("allowance", Upright),
        ];
        let got = pieces("p = p_0 + ρ |G|(h_{pool} − v) allowance");
        let got: Vec<(&str, Style)> = got.iter().map(|(t, s)| (t.as_str(), *s)).collect();
        assert_eq!(got, want);
    }

    #[test]
    fn odd_notation_is_shown_and_never_panics() {
        for text in ["_", "a_", "a_{", "a_{b", "__", "_é", "2^{x_1}", ""] {
            let shown: String = pieces(text).into_iter().map(|(t, _)| t).collect();
            assert!(shown.len() <= text.len(), "{text:?} became {shown:?}");
        }
    }
}
