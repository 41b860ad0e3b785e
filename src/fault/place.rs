//! From a span of bytes to a line, a column, and an excerpt with a mark.

use std::ops::Range;

use super::visible::visible_char;

/// Lines up to this many characters are shown whole.
const WHOLE_LINE: usize = 120;
/// Characters shown of a longer line.
const WINDOW: usize = 100;
/// Characters shown before the mark in a window.
const LEAD: usize = 30;

/// Where a span lies.
#[derive(Debug, PartialEq, Eq)]
pub(super) struct Place {
    /// Lines before the one that the span starts on.
    pub lines_before: usize,
    /// Column in characters, from 1.
    pub column: usize,
    /// The line or a window of it.
    pub excerpt: String,
    /// Bytes of the excerpt to underline.
    pub mark: Range<usize>,
}

/// Where the bytes `span` of `text` lie; a span beyond the text is moved to its end.
pub(super) fn locate(text: &str, span: Range<usize>) -> Place {
    let start = boundary(text, span.start);
    let end = boundary(text, span.end).max(start);
    let (lines_before, line_start) = line_of(text, start);
    let line = text[line_start..].split(['\n', '\r']).next().unwrap_or_default();
    let line_without_order_mark = if line_start == 0 { line.strip_prefix('\u{feff}').unwrap_or(line) } else { line };
    let line_start = line_start + (line.len() - line_without_order_mark.len());
    let line = line_without_order_mark;
    let from = start.saturating_sub(line_start).min(line.len());
    let to = end.saturating_sub(line_start).min(line.len()).max(from);
    let column = line[..from].chars().count() + 1;
    let (excerpt, mark) = window(line, from..to, column - 1);
    Place { lines_before, column, excerpt, mark }
}

/// The nearest start of a character at or before `at`.
fn boundary(text: &str, at: usize) -> usize {
    (0..=at.min(text.len())).rev().find(|&place| text.is_char_boundary(place)).unwrap_or(0)
}

/// How many lines end before `at`, and where its own starts. Lines end with LF, CR or both.
fn line_of(text: &str, at: usize) -> (usize, usize) {
    let bytes = text.as_bytes();
    let ends_line = |place: usize| match bytes[place] {
        b'\n' => true,
        b'\r' => bytes.get(place + 1) != Some(&b'\n'),
        _ => false,
    };
    (0..at).filter(|&place| ends_line(place)).fold((0, 0), |(lines, _), place| (lines + 1, place + 1))
}

/// The part of `line` that is shown, and the mark in it; `before` is how many characters stand before the mark.
fn window(line: &str, mark: Range<usize>, before: usize) -> (String, Range<usize>) {
    let length = line.chars().count();
    let skipped = if length <= WHOLE_LINE { 0 } else { before.saturating_sub(LEAD).min(length - WINDOW) };
    let taken = if length <= WHOLE_LINE { length } else { WINDOW };
    let mut excerpt = String::with_capacity(line.len().min(4 * WINDOW) + 6);
    if skipped > 0 {
        excerpt.push('…');
    }
    let (mut from, mut to) = (None, None);
    for (at, letter) in line.char_indices().skip(skipped).take(taken) {
        if at >= mark.start {
            from.get_or_insert(excerpt.len());
        }
        if at >= mark.end {
            to.get_or_insert(excerpt.len());
        }
        excerpt.push(if letter == '\t' { ' ' } else { visible_char(letter) });
    }
    let from = from.unwrap_or(excerpt.len());
    let to = to.unwrap_or(excerpt.len()).max(from);
    if skipped + taken < length {
        excerpt.push('…');
    }
    (excerpt, from..to)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_and_columns_count_characters() {
        let text = "\u{feff}part;dcr\r\nΩ1;4,x\rQ;\n7";
        let at = |needle: &str| {
            let start = text.find(needle).expect("in the text");
            let place = locate(text, start..start + needle.len());
            (place.lines_before + 1, place.column, place.excerpt[place.mark].to_owned())
        };
        assert_eq!(at("part"), (1, 1, "part".to_owned()));
        assert_eq!(at("4,x"), (2, 4, "4,x".to_owned()));
        assert_eq!(at("Q"), (3, 1, "Q".to_owned()));
        assert_eq!(at("7"), (4, 1, "7".to_owned()));
    }

    #[test]
    fn a_span_outside_marks_the_end() {
        assert_eq!(locate("ab", 9..12), Place { lines_before: 0, column: 3, excerpt: "ab".to_owned(), mark: 2..2 });
        assert_eq!(locate("", 0..0), Place { lines_before: 0, column: 1, excerpt: String::new(), mark: 0..0 });
    }

    #[test]
    fn a_span_over_two_lines_is_marked_on_its_first() {
        let place = locate("a \"b\nc\" d", 2..7);
        assert_eq!((place.excerpt.as_str(), place.mark), ("a \"b", 2..4));
    }

    #[test]
    fn long_lines_are_windows_around_the_mark() {
        let line = format!("{}BAD{}", "x".repeat(500), "y".repeat(500));
        let place = locate(&line, 500..503);
        assert_eq!(&place.excerpt[place.mark.clone()], "BAD");
        assert_eq!(place.excerpt.chars().count(), WINDOW + 2);
        assert_eq!(place.column, 501);
        let all = locate(&line, 0..line.len());
        assert_eq!(all.mark, 0..WINDOW);
    }
}
