//! The document while it is read: values by path, faults as they are met, entries as they are understood.

use std::ops::Range;

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use crate::quantity::Positive;
use crate::rail::defaults::Key;
use crate::rail::origin::{Entry, Origin, Value};

/// A value with its place in the text.
pub(super) type Node<'t> = &'t Spanned<DeValue<'t>>;

/// What is wrong at a place of the text, before lines and columns are counted.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Remark {
    /// Bytes of the text; `None` for the file as a whole.
    pub span: Option<Range<usize>>,
    pub found: String,
    pub expected: String,
    pub help: Option<String>,
    pub about: About,
}

/// What kind of remark it is: some are worth nothing where the document itself is broken.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum About {
    /// The text is no TOML.
    Syntax,
    /// A key or value that stands in the text.
    Written,
    /// A key that is missing, or two values that do not go together.
    Whole,
}

/// A document being read.
pub(super) struct Reader<'t> {
    text: &'t str,
    root: &'t DeTable<'t>,
    line_starts: Vec<usize>,
    pub remarks: Vec<Remark>,
    pub entries: Vec<Entry>,
    pub facts: Facts,
}

/// What later sections are compared with; `None` where it could not be read.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct Facts {
    pub least_input_v: Option<Positive>,
    pub output_v: Option<Positive>,
    pub full_load_a: Option<Positive>,
}

impl<'t> Reader<'t> {
    pub(super) fn new(text: &'t str, root: &'t DeTable<'t>) -> Self {
        let line_starts = text.bytes().enumerate().filter(|(_, byte)| *byte == b'\n').map(|(at, _)| at + 1);
        let line_starts = std::iter::once(0).chain(line_starts).collect();
        Self { text, root, line_starts, remarks: Vec::new(), entries: Vec::new(), facts: Facts::default() }
    }

    pub(super) fn root(&self) -> &'t DeTable<'t> {
        self.root
    }

    /// The value at a path, `None` where a key is missing or a section is no table.
    pub(super) fn find(&self, path: &str) -> Option<Node<'t>> {
        let (sections, name) = path.rsplit_once('.').unwrap_or(("", path));
        let mut table = self.root;
        for section in sections.split('.').filter(|section| !section.is_empty()) {
            table = table.get(section)?.get_ref().as_table()?;
        }
        table.get(name)
    }

    /// What stands in the text at a path, without its quotes; empty where the key is missing.
    pub(super) fn said(&self, path: &str) -> &'t str {
        self.find(path).map_or("", |node| self.source(node))
    }

    /// What stands in the text, without quotes.
    pub(super) fn source(&self, node: Node<'t>) -> &'t str {
        self.text.get(node.span()).unwrap_or("").trim_matches(['"', '\''])
    }

    /// The place of a part of a string, the string as a whole where escapes stand in the way.
    pub(super) fn within(&self, node: Node<'t>, part: &Range<usize>) -> Range<usize> {
        let span = node.span();
        let inside = span.start + 1 + part.start..span.start + 1 + part.end;
        let plain = self.text.get(span.start + 1..span.end.saturating_sub(1));
        if node.get_ref().as_str() == plain && !part.is_empty() { inside } else { span }
    }

    /// Line of a place, from 1.
    pub(super) fn line(&self, at: usize) -> usize {
        self.line_starts.partition_point(|start| *start <= at)
    }

    /// Something is wrong with what stands at a place.
    pub(super) fn refuse(&mut self, span: Range<usize>, found: impl Into<String>, expected: impl Into<String>) {
        self.remark(About::Written, Some(span), found.into(), expected.into(), None);
    }

    /// The same, with what to do about it.
    pub(super) fn refuse_with(
        &mut self,
        span: Range<usize>,
        found: impl Into<String>,
        expected: impl Into<String>,
        help: impl Into<String>,
    ) {
        self.remark(About::Written, Some(span), found.into(), expected.into(), Some(help.into()));
    }

    /// Two values do not go together.
    pub(super) fn conflict(&mut self, path: &str, found: impl Into<String>, expected: impl Into<String>, help: &str) {
        let help = (!help.is_empty()).then(|| help.to_owned());
        let span = self.find(path).map(|node| node.span());
        self.remark(About::Whole, span, found.into(), expected.into(), help);
    }

    /// The same, at a place.
    pub(super) fn conflict_at(&mut self, span: Range<usize>, found: String, expected: String) {
        self.remark(About::Whole, Some(span), found, expected, None);
    }

    /// A key must be written and is not: the section is pointed at, or the file where there is no section. A
    /// section that is no table is a fault of its own.
    pub(super) fn missing(&mut self, key: &Key) {
        self.missing_named(key.path, key.meaning);
    }

    /// The same for a path that stands for several keys.
    pub(super) fn missing_named(&mut self, path: &str, meaning: &str) {
        let section = path.rsplit_once('.').and_then(|(section, _)| self.find(section));
        if section.is_none_or(|section| section.get_ref().is_table()) {
            self.missing_in(section.map(|section| section.span()), path, meaning);
        }
    }

    /// The same, in a section at a known place.
    pub(super) fn missing_in(&mut self, span: Option<Range<usize>>, path: &str, meaning: &str) {
        let inline =
            span.as_ref().and_then(|span| self.text.get(span.clone())).is_some_and(|text| text.starts_with('{'));
        let name = path.rsplit_once('.').map_or(path, |(_, name)| name);
        let expected = format!("`{name}`, {meaning}");
        let help = match path.rsplit_once('.') {
            None => format!("write `{path} = …` at the top of the file"),
            Some((_, name)) if inline => format!("write `{name} = …` between these braces"),
            Some(("load", name)) => format!("write `{name} = …` under [[load]]"),
            Some((section, name)) => format!("write `{name} = …` under [{section}]"),
        };
        self.remark(About::Whole, span, format!("`{path}` is missing"), expected, Some(help));
    }

    fn remark(
        &mut self,
        about: About,
        span: Option<Range<usize>>,
        found: String,
        expected: String,
        help: Option<String>,
    ) {
        self.remarks.push(Remark { span, found, expected, help, about });
    }

    /// Notes a value that stands in the text.
    pub(super) fn written(&mut self, key: &Key, value: Value, at: usize) {
        self.written_as(key.path.to_owned(), key, value, at);
    }

    /// The same, under another name than the path of the key.
    pub(super) fn written_as(&mut self, name: String, key: &Key, value: Value, at: usize) {
        let origin = Origin::Written { line: self.line(at) };
        self.entries.push(Entry { key: name, value, unit: key.unit(), dimension: key.dimension(), origin });
    }

    /// Notes a value that the text leaves to its default.
    pub(super) fn default(&mut self, key: &Key, value: Value) {
        self.default_as(key.path.to_owned(), key, value);
    }

    /// The same, under another name than the path of the key.
    pub(super) fn default_as(&mut self, name: String, key: &Key, value: Value) {
        let origin = Origin::Default { reason: key.reason };
        self.entries.push(Entry { key: name, value, unit: key.unit(), dimension: key.dimension(), origin });
    }
}

/// The kind of a value in words.
pub(super) fn kind_of(value: &DeValue<'_>) -> &'static str {
    match value {
        DeValue::String(_) => "a string",
        DeValue::Integer(_) => "a whole number",
        DeValue::Float(_) => "a number",
        DeValue::Boolean(_) => "a boolean",
        DeValue::Datetime(_) => "a date or time",
        DeValue::Array(_) => "a list",
        DeValue::Table(_) => "a table",
    }
}
