//! The head of a scenario file: its version, read before anything else, so that a newer file is told apart from a
//! faulty one.

use crate::problem::{Place, Problem};

use super::VERSION;
use super::fault::position;

/// The versions that this program reads.
pub(super) enum Version {
    V1,
}

/// The version of a scenario's text, if this program reads it.
pub(super) fn version(text: &str) -> Result<Version, Problem> {
    let no_head = |rest: &str| {
        Problem::fault(
            place(text, rest),
            "this does not begin like a scenario",
            format!("a scenario begins with `(` and `version: {VERSION},`"),
        )
    };
    let mut rest = text;
    for token in ["(", "version", ":"] {
        rest = skip_blank(rest);
        rest = rest.strip_prefix(token).ok_or_else(|| no_head(rest))?;
    }
    rest = skip_blank(rest);
    let n_digits = rest.bytes().take_while(u8::is_ascii_digit).count();
    if n_digits == 0 {
        return Err(Problem::fault(
            place(text, rest),
            "the version is not a whole number",
            format!("this program reads `version: {VERSION}`"),
        ));
    }
    // A number too long for the type is newer all the same.
    match rest[..n_digits].parse().unwrap_or(u64::MAX) {
        1 => Ok(Version::V1),
        0 => Err(Problem::fault(
            place(text, rest),
            "there is no scenario version 0",
            format!("this program reads version {VERSION}"),
        )),
        _ => Err(Problem::fault(
            place(text, rest),
            format!("the file has a newer scenario version; this program reads version {VERSION}"),
            "open it with a newer brimwright",
        )),
    }
}

fn place(text: &str, rest: &str) -> Place {
    position(&text[..text.len() - rest.len()])
}

/// What follows blanks and comments; an unclosed comment swallows the rest.
fn skip_blank(mut rest: &str) -> &str {
    loop {
        rest = rest.trim_start();
        rest = if rest.starts_with("//") {
            rest.find('\n').map_or("", |end| &rest[end..])
        } else if rest.starts_with("/*") {
            after_block_comment(rest)
        } else {
            return rest;
        };
    }
}

/// Block comments nest.
fn after_block_comment(text: &str) -> &str {
    let (mut depth, mut at) = (0_usize, 0);
    let bytes = text.as_bytes();
    while at + 1 < bytes.len() {
        match &bytes[at..at + 2] {
            b"/*" => (depth, at) = (depth + 1, at + 2),
            b"*/" if depth == 1 => return &text[at + 2..],
            b"*/" => (depth, at) = (depth - 1, at + 2),
            _ => at += 1,
        }
    }
    ""
}
