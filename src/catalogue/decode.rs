//! Bytes to text: byte-order marks, UTF-16, the size limit.

use crate::problem::Place;

use super::code;
use super::report::{Fix, Report};

const LARGEST_FILE: usize = 50 * 1024 * 1024;

/// The text of a file, or `None` when it cannot be read at all, which is then reported.
pub(super) fn decode(file: &str, bytes: &[u8], report: &mut Report) -> Option<String> {
    let top =
        |excerpt: &str| Place { file: file.to_owned(), line: 1, column: 1, excerpt: excerpt.to_owned() };
    if bytes.len() > LARGEST_FILE {
        let message = format!("{file} has {} bytes, the limit is 50 MiB", bytes.len());
        report.error(
            code::FILE_TOO_LARGE,
            top(""),
            message,
            "split the file or remove what is not a catalogue",
        );
        return None;
    }
    if let [0xFF, 0xFE, rest @ ..] = bytes {
        return utf16(file, rest, u16::from_le_bytes, report);
    }
    if let [0xFE, 0xFF, rest @ ..] = bytes {
        return utf16(file, rest, u16::from_be_bytes, report);
    }
    let body = bytes.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(bytes);
    if body.len() < bytes.len() {
        report.fixes.add(file, Fix::ByteOrderMark);
    }
    match std::str::from_utf8(body) {
        Ok(text) => Some(text.to_owned()),
        Err(error) => {
            not_utf8(file, body, error.valid_up_to(), report);
            None
        }
    }
}

fn utf16(file: &str, bytes: &[u8], unit: fn([u8; 2]) -> u16, report: &mut Report) -> Option<String> {
    let units: Vec<u16> = bytes.chunks_exact(2).map(|pair| unit([pair[0], pair[1]])).collect();
    let place = Place { file: file.to_owned(), line: 1, column: 1, excerpt: String::new() };
    match String::from_utf16(&units) {
        Ok(text) if bytes.len().is_multiple_of(2) => {
            let message = format!("{file} is UTF-16 text, which was decoded");
            report.warning(code::UTF16, place, message, "save as CSV UTF-8");
            Some(text)
        }
        _ => {
            let message = format!("{file} begins like UTF-16 text but cannot be decoded");
            report.error(code::NOT_UTF8, place, message, "save as CSV UTF-8");
            None
        }
    }
}

fn not_utf8(file: &str, bytes: &[u8], bad: usize, report: &mut Report) {
    let line = bytes[..bad].split(|byte| *byte == b'\n').count();
    let start = bytes[..bad].iter().rposition(|byte| *byte == b'\n').map_or(0, |at| at + 1);
    let before = String::from_utf8_lossy(&bytes[start..bad]);
    let column = before.chars().count() + 1;
    let end = bytes[start..].iter().position(|byte| *byte == b'\n').map_or(bytes.len(), |at| start + at);
    let excerpt = String::from_utf8_lossy(&bytes[start..end]).trim().chars().take(100).collect();
    let place = Place { file: file.to_owned(), line, column, excerpt };
    let message = format!("line {line} byte {}: not UTF-8", bad - start + 1);
    report.error(code::NOT_UTF8, place, message, "save as CSV UTF-8");
}
