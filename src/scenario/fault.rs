//! What is wrong with a scenario's text, in words for people: the RON reader's errors with place and hint.

use std::str::Utf8Error;

use ron::error::{Error, SpannedError};

use crate::problem::{Place, Problem};

/// A key or word longer than this is not compared and not repeated in full.
const MAX_WORD_CHARS: usize = 60;

/// The place right after `before`.
pub(super) fn position(before: &str) -> Place {
    let line = 1 + before.bytes().filter(|&b| b == b'\n').count();
    let column = 1 + before.chars().rev().take_while(|&c| c != '\n').count();
    Place::Text { line, column }
}

/// The fault of bytes that are not text.
pub(super) fn not_utf8(bytes: &[u8], error: &Utf8Error) -> Problem {
    let good = String::from_utf8_lossy(&bytes[..error.valid_up_to()]);
    Problem::fault(
        position(&good),
        format!("byte {:#04x} is not UTF-8 text", bytes[error.valid_up_to()]),
        "save the file as UTF-8 text; a scenario is plain text",
    )
}

/// The fault that the reader found in `text`.
pub(super) fn describe(text: &str, error: &SpannedError) -> Problem {
    // The reader's span begins at the last thing it took. Errors about a thing taken belong there, errors about
    // a thing that is missing belong to its end.
    let at = match error.code {
        Error::NoSuchStructField { .. }
        | Error::DuplicateStructField { .. }
        | Error::NoSuchEnumVariant { .. }
        | Error::ExpectedDifferentStructName { .. }
        | Error::InvalidValueForType { .. }
        | Error::Message(_) => error.span.start,
        _ => error.span.end,
    };
    let place = Place::Text { line: at.line, column: at.col };
    let (message, hint) =
        if [text, text.trim_end()].map(position).contains(&place) { words(&Error::Eof) } else { words(&error.code) };
    Problem::fault(place, message, hint)
}

fn words(code: &Error) -> (String, String) {
    let fixed = |message: &str, hint: &str| (message.to_owned(), hint.to_owned());
    match code {
        Error::NoSuchStructField { expected, found, .. } => {
            (format!("`{}` is not a key here", short(found)), suggestion(found, expected))
        }
        Error::NoSuchEnumVariant { expected, found, .. } => {
            (format!("`{}` is not one of the choices here", short(found)), suggestion(found, expected))
        }
        Error::MissingStructField { field, .. } => (
            format!("the key `{field}` is missing before here"),
            format!("add `{field}: ...,` within these brackets"),
        ),
        Error::DuplicateStructField { field, .. } => {
            (format!("the key `{field}` stands here a second time"), "keep one of the two".to_owned())
        }
        Error::Message(text) => match text.split_once('\n') {
            Some((message, hint)) => fixed(message, hint),
            None => fixed(text, ""),
        },
        Error::ExpectedFloat | Error::FloatUnderscore | Error::UnderscoreAtBeginning => {
            fixed("a number is needed here", "write it without unit and with a decimal point, such as 1250 or 2.5")
        }
        Error::ExpectedInteger | Error::IntegerOutOfBounds | Error::InvalidIntegerDigit { .. } => {
            fixed("a whole number is needed here", "write digits only")
        }
        Error::ExpectedString => fixed("a text is needed here", "put it between double quotes"),
        Error::ExpectedStringEnd => fixed("a text does not end", "close it with a double quote"),
        Error::InvalidEscape(_) => {
            fixed("a backslash in a text starts no known sign", "write `\\\\` for a backslash")
        }
        Error::ExpectedBoolean => {
            fixed("`true` or `false` is needed here", "write one of the two words, without quotes")
        }
        Error::ExpectedArray => fixed("a list is needed here", "put its items between `[` and `]`"),
        Error::ExpectedArrayEnd => fixed("a list does not end", "close it with `]`"),
        Error::ExpectedStructLike | Error::ExpectedNamedStructLike(_) => {
            fixed("an opening `(` is needed here", "put keys or values between `(` and `)`")
        }
        Error::ExpectedDifferentStructName { found, .. } => {
            (format!("`{}` is not wanted before the bracket", short(found)), "leave the word out".to_owned())
        }
        Error::ExpectedStructLikeEnd | Error::ExpectedOptionEnd => fixed(
            "a closing `)` is needed here",
            "close the bracket; a decimal comma also gives this, write decimals with a point",
        ),
        Error::ExpectedComma => fixed("a comma is missing before here", "put a comma between items"),
        Error::ExpectedMapColon => fixed("a colon is needed here", "write `key: value`"),
        Error::ExpectedIdentifier | Error::SuggestRawIdentifier(_) | Error::InvalidIdentifier(_) => {
            fixed("a key is needed here", "write `key: value`; decimals take a point, not a comma")
        }
        Error::Eof => fixed("the file ends too early", "it may have been cut off; every `(` and `[` must be closed"),
        Error::UnclosedBlockComment => fixed("a comment does not end", "close it with `*/`"),
        Error::TrailingCharacters => {
            fixed("something follows after the end of the scenario", "take it out, or check the brackets before it")
        }
        Error::ExceededRecursionLimit => {
            fixed("brackets lie too deep within brackets", "a scenario needs only a few levels")
        }
        Error::InvalidValueForType { expected, found } => {
            (format!("{expected} is needed here, not {}", short(found)), "check the value".to_owned())
        }
        other => (format!("this could not be read: {other}"), "check the text around this place".to_owned()),
    }
}

/// The nearest of the known words, or all of them.
fn suggestion(found: &str, known: &[&str]) -> String {
    let stem = |word: &str| word.split('_').next().unwrap_or("").to_owned();
    let nearest = known
        .iter()
        .filter(|_| found.chars().count() <= MAX_WORD_CHARS)
        .map(|&word| (stem(word) != stem(found), distance(found, word), word))
        .filter(|&(other_stem, distance, word)| !other_stem || distance <= 1 + word.len() / 4)
        .min();
    match nearest {
        Some((false, _, word)) if word.contains('_') => {
            format!("use `{word}`: the unit is part of the name, so convert the value if need be")
        }
        Some((_, _, word)) => format!("use `{word}`"),
        None => format!("known here: {}", known.join(", ")),
    }
}

/// How many letters must be put in, taken out or changed to turn one word into the other (Levenshtein 1966).
fn distance(a: &str, b: &str) -> usize {
    let b: Vec<char> = b.chars().collect();
    let mut row: Vec<usize> = (0..=b.len()).collect();
    for (i, from) in a.chars().enumerate() {
        let mut diagonal = row[0];
        row[0] = i + 1;
        for (j, to) in b.iter().enumerate() {
            let changed = diagonal + usize::from(from != *to);
            diagonal = row[j + 1];
            row[j + 1] = changed.min(row[j] + 1).min(diagonal + 1);
        }
    }
    row[b.len()]
}

/// A word of the file for repeating in a message.
fn short(word: &str) -> String {
    match word.char_indices().nth(MAX_WORD_CHARS) {
        Some((end, _)) => format!("{}...", &word[..end]),
        None => word.to_owned(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn letters_changed_put_in_and_taken_out_are_counted() {
        // Source: the usual example of the measure, kitten to sitting, from memory.
        for (a, b, want) in
            [("kitten", "sitting", 3), ("", "abc", 3), ("level_m", "level_mm", 1), ("same", "same", 0)]
        {
            assert_eq!(distance(a, b), want, "{a} to {b}");
            assert_eq!(distance(b, a), want, "{b} to {a}");
        }
    }
}
