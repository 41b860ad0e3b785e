//! Text to a TOML document, with every fault of its grammar.

use std::ops::Range;

use toml::Spanned;
use toml::de::{DeTable, DeValue, Error};

use super::broken::Broken;
use super::reader::{About, Remark};

/// The most bytes a rail file may have.
const MOST_BYTES: usize = 256 * 1024;

/// The one remark on a text that is longer than any rail file.
pub(super) fn too_long(text: &str) -> Option<Remark> {
    let found = format!("the file has {} bytes", text.len());
    let expected = format!("a rail file of at most {MOST_BYTES} bytes");
    (text.len() > MOST_BYTES).then(|| syntax(None, found, expected, None))
}

/// The document as far as it can be understood, and what is wrong with it, at most one remark a line.
pub(super) fn parse(text: &str) -> (DeTable<'_>, Broken<'_>) {
    let (document, errors) = DeTable::parse_recoverable(text);
    let document = document.into_inner();
    let unclosed =
        |error: &Error| matches!(error.message().split(',').next(), Some("unclosed array" | "unclosed inline table"));
    let open = if errors.iter().any(unclosed) { never_closed(&document, text) } else { None };
    let mut broken = Broken::new(text);
    let mut errors: Vec<&Error> = errors.iter().collect();
    errors.sort_by_key(|error| error.span().map(|span| span.start));
    let end = open.as_ref().map_or(text.len() + 1, |span| span.start);
    for error in errors.into_iter().filter(|error| error.span().is_none_or(|span| span.start < end)) {
        broken.line(explained(error, text));
    }
    if let Some(span) = open {
        let found = "this list or table is never closed".to_owned();
        let help = "everything below is taken for its content".to_owned();
        let expected = "`]` or `}` before the next key".to_owned();
        broken.rest(syntax(Some(span.start..span.start + 1), found, expected, Some(help)));
    }
    (document, broken)
}

fn explained(error: &Error, text: &str) -> Remark {
    let span = error.span();
    let there = span.clone().and_then(|span| text.get(span)).unwrap_or("");
    let (found, expected) = error.message().split_once(", expected ").unwrap_or((error.message(), ""));
    match found {
        "string values must be quoted" | "invalid literal string" if there.trim().is_empty() => {
            syntax(span, "there is no value".to_owned(), "a value after `=`".to_owned(), None)
        }
        "string values must be quoted" => {
            let help = format!("write \"{}\"", there.trim_matches(|edge: char| " \"'“”„‘’«»".contains(edge)));
            let found = "text and numbers with a unit stand in quotes".to_owned();
            syntax(span, found, "a quoted value".to_owned(), Some(help))
        }
        "duplicate key" => {
            let help = "keep one of the two; all keys of a section stand under one header".to_owned();
            syntax(span, format!("`{there}` is written twice"), "each key and section once".to_owned(), Some(help))
        }
        _ if found.contains("recurs") => {
            let found = "lists, tables or keys are nested too deeply".to_owned();
            syntax(span, found, "no more than three levels".to_owned(), None)
        }
        "unexpected key or value" => {
            let after = span.as_ref().and_then(|span| text.get(span.start..)).unwrap_or("");
            let help = after.starts_with(',').then(|| "the decimal sign is a point".to_owned());
            syntax(span, "the line goes on behind its value".to_owned(), "the end of the line".to_owned(), help)
        }
        "invalid basic string" if expected == "`\"`" => {
            syntax(span, "the string is never closed".to_owned(), "a closing `\"`".to_owned(), None)
        }
        _ => {
            let expected = if expected.is_empty() { "valid TOML" } else { expected };
            syntax(span, found.to_owned(), expected.to_owned(), None)
        }
    }
}

fn syntax(span: Option<Range<usize>>, found: String, expected: String, help: Option<String>) -> Remark {
    Remark { span, found, expected, help, about: About::Syntax }
}

/// The list or inline table that runs over several lines to the end of the text.
fn never_closed(table: &DeTable<'_>, text: &str) -> Option<Range<usize>> {
    let end = text.trim_end().len();
    table.iter().map(|(_, node)| node).find_map(|node| {
        if runs_out(node, text, end) {
            return Some(node.span());
        }
        match node.get_ref() {
            DeValue::Table(inner) => never_closed(inner, text),
            DeValue::Array(list) => list.iter().last()?.get_ref().as_table().and_then(|last| never_closed(last, text)),
            _ => None,
        }
    })
}

fn runs_out(node: &Spanned<DeValue<'_>>, text: &str, end: usize) -> bool {
    let span = node.span();
    let Some(within) = text.get(span.clone()) else { return false };
    within.starts_with(['[', '{']) && span.end >= end && within.contains('\n')
}
