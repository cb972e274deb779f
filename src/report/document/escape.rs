//! Text made safe for Markdown and for CSS strings; HTML is escaped by the template engine itself.

use std::io::{Result, Write};

use crate::report::running_head::css_string;

use tera::{Kwargs, State};

/// Escapes a value for Markdown: nothing in it starts a table cell, a heading, a list, a link, emphasis or HTML.
pub(super) fn markdown(text: &str, out: &mut dyn Write) -> Result<()> {
    let text = text.trim_start();
    let digits = text.len() - text.trim_start_matches(|c: char| c.is_ascii_digit()).len();
    // A list marker counts only at the start and before a blank: "- ", "+ ", "1. ", "2) ".
    let marker = match text.as_bytes().get(digits) {
        Some(b'-' | b'+') if digits == 0 => followed_by_blank(text, 0),
        Some(b'.' | b')') if digits > 0 => followed_by_blank(text, digits),
        Some(_) | None => None,
    };
    for (at, c) in text.char_indices() {
        match c {
            '\\' | '`' | '*' | '_' | '[' | ']' | '|' | '#' | '~' => write!(out, "\\{c}")?,
            '<' => out.write_all(b"&lt;")?,
            '>' => out.write_all(b"&gt;")?,
            '&' => out.write_all(b"&amp;")?,
            c if Some(at) == marker => write!(out, "\\{c}")?,
            c if c.is_control() => out.write_all(b" ")?,
            c => write!(out, "{c}")?,
        }
    }
    Ok(())
}

fn followed_by_blank(text: &str, at: usize) -> Option<usize> {
    text[at + 1..].chars().next().is_none_or(char::is_whitespace).then_some(at)
}

/// The filter `css`: a value inside a CSS string in double quotes.
pub(super) fn css(text: &str, _: Kwargs, _: &State) -> String {
    css_string(text)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn escaped(text: &str) -> String {
        let mut out = Vec::new();
        markdown(text, &mut out).unwrap();
        String::from_utf8(out).unwrap()
    }

    #[test]
    fn markdown_marks_lose_their_meaning() {
        assert_eq!(escaped("a|b `c` *d* <e>"), "a\\|b \\`c\\` \\*d\\* &lt;e&gt;");
        assert_eq!(escaped("# top\nnext"), "\\# top next");
    }

    #[test]
    fn list_markers_are_escaped_only_where_they_would_be_one() {
        assert_eq!(escaped("- x"), "\\- x");
        assert_eq!(escaped("12. x"), "12\\. x");
        assert_eq!(escaped("-140.00"), "-140.00");
        assert_eq!(escaped("18.3 m"), "18.3 m");
    }
}
