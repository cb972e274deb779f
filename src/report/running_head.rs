//! What the page margins of every printed sheet repeat.

/// A longer title would run into the page number beside it.
const LONGEST: usize = 60;

/// A title short enough for the running head.
pub(super) fn running_head(title: &str) -> String {
    if title.chars().count() <= LONGEST {
        title.to_owned()
    } else {
        title.chars().take(LONGEST - 1).chain(['…']).collect()
    }
}

/// Text made safe inside a CSS string in double quotes.
pub(super) fn css_string(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '\\' => out.push_str("\\5c "),
            '"' => out.push_str("\\22 "),
            '<' => out.push_str("\\3c "),
            c if c.is_control() => out.push(' '),
            c => out.push(c),
        }
    }
    out
}
