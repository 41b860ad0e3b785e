//! A document with broken lines: what of it can still be trusted.

use std::ops::Range;

use super::reader::{About, Remark};

/// The faults of a document's grammar, and the parts of its text that nothing else can be said about.
pub(super) struct Broken<'t> {
    text: &'t str,
    remarks: Vec<Remark>,
    /// Ascending; each starts behind the start of the one before.
    lost: Vec<Range<usize>>,
}

impl<'t> Broken<'t> {
    pub(super) fn new(text: &'t str) -> Self {
        Self { text, remarks: Vec::new(), lost: Vec::new() }
    }

    pub(super) fn is_empty(&self) -> bool {
        self.remarks.is_empty()
    }

    /// A fault of one line, reported once a line; places must ascend.
    ///
    /// Behind a section header that cannot be read, the keys belong to no known section.
    pub(super) fn line(&mut self, remark: Remark) {
        let Some(span) = &remark.span else {
            self.remarks.push(remark);
            return;
        };
        let line = self.line_at(span.start);
        if self.lost.last().is_some_and(|lost| lost.start == line.start) {
            return;
        }
        let header = self.text.get(line.clone()).is_some_and(|line| line.trim_start().starts_with('['));
        let repeated = remark.found.ends_with("is written twice");
        let end = if header && !repeated { self.next_header(line.end) } else { line.end };
        self.lost.push(line.start..end);
        self.remarks.push(remark);
    }

    /// A fault that leaves the rest of the text unread.
    pub(super) fn rest(&mut self, remark: Remark) {
        if let Some(span) = &remark.span {
            self.lost.push(span.start..self.text.len());
        }
        self.remarks.push(remark);
    }

    /// The faults of the grammar, and of `remarks` those that broken text cannot explain: what is missing or contradicts
    /// itself may stand on a broken line.
    pub(super) fn with(self, remarks: Vec<Remark>) -> Vec<Remark> {
        if self.remarks.is_empty() {
            return remarks;
        }
        let mut lost: Vec<Range<usize>> = Vec::new();
        for range in self.lost {
            match lost.last_mut() {
                Some(last) if range.start < last.end => last.end = last.end.max(range.end),
                _ => lost.push(range),
            }
        }
        let is_lost = |at: usize| {
            let before = lost.partition_point(|range| range.start <= at);
            before.checked_sub(1).and_then(|index| lost.get(index)).is_some_and(|range| at < range.end)
        };
        let stands = |remark: &Remark| {
            let place = remark.span.as_ref().filter(|span| !span.is_empty());
            remark.about == About::Written && place.is_some_and(|span| !is_lost(span.start))
        };
        self.remarks.into_iter().chain(remarks.into_iter().filter(stands)).collect()
    }

    fn line_at(&self, at: usize) -> Range<usize> {
        let start = self.text.get(..at).and_then(|before| before.rfind('\n')).map_or(0, |newline| newline + 1);
        let rest = self.text.get(start..).unwrap_or("");
        start..start + rest.find('\n').map_or(rest.len(), |newline| newline + 1)
    }

    /// Where the next section header starts.
    fn next_header(&self, from: usize) -> usize {
        let mut start = from;
        for line in self.text.get(from..).unwrap_or("").split_inclusive('\n') {
            if line.trim_start().starts_with('[') {
                return start;
            }
            start += line.len();
        }
        start
    }
}
