//! Bytes to records and cells, each cell with the exact bytes it came from.
//!
//! The reader streams: it holds one record and a block of the file. It is stricter than most: text behind a closing quote is a
//! flaw of the record, because whatever it was meant to be, it cannot be known.

use std::borrow::Cow;
use std::io::{self, Read};
use std::ops::Range;

use super::scan::{Quotes, Scan, scan};

/// Cells longer than this are refused, bytes.
pub const LONGEST_CELL: usize = 1 << 20;
/// Records longer than this are refused, bytes.
pub const LONGEST_RECORD: usize = 8 << 20;
/// Records of more cells than this are refused.
pub const MOST_CELLS: usize = 4096;

const BLOCK: usize = 256 * 1024;

/// Where a cell stands in its record: what is between the quotes, if it is quoted.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Cell {
    pub start: usize,
    pub end: usize,
    /// Whether a quote is written twice in it.
    pub doubled_quotes: bool,
}

/// Something wrong with one record; the ones after it can still be read.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) enum Flaw {
    /// Text stands behind a closing quote.
    BehindQuote(Range<usize>),
    /// The bytes are not text.
    NotText(Range<usize>),
    /// A NUL character: the file is binary or in an encoding without a mark.
    Nul(Range<usize>),
}

/// Why reading cannot go on.
#[derive(Debug, thiserror::Error)]
pub(super) enum TableFault {
    #[error("the cell is longer than a mebibyte")]
    LongCell,
    #[error("the row is longer than eight mebibytes")]
    LongRecord,
    #[error("the row has more than {MOST_CELLS} cells")]
    ManyCells,
    #[error("the quote that opens here is never closed")]
    OpenQuote,
    #[error("{0}")]
    Unreadable(#[from] io::Error),
}

/// A [`TableFault`] and the start of the record it is in.
#[derive(Debug)]
pub(super) struct Stopped {
    pub fault: TableFault,
    /// Line of the record.
    pub line: usize,
    /// The start of the record, as far as it can be shown.
    pub excerpt: String,
    /// Bytes of the excerpt that are to blame.
    pub span: Range<usize>,
}

/// One record.
#[derive(Debug)]
pub(super) struct Record<'a> {
    /// All of it but the line end. Where it is not valid text, with replacement characters, and cells do not fit.
    pub text: Cow<'a, str>,
    /// Line of its first character, from 1.
    pub line: usize,
    /// Its cells, at least one.
    pub cells: &'a [Cell],
    /// What is wrong with it.
    pub flaw: Option<Flaw>,
}

/// `text` without blanks around it; nearly every cell has none.
fn trimmed(text: &str) -> &str {
    match text.as_bytes() {
        [] => text,
        [first, .., last] | [first @ last] if first.is_ascii_graphic() && last.is_ascii_graphic() => text,
        _ => text.trim(),
    }
}

impl Record<'_> {
    /// The text of a cell without blanks around it, quotes undone; empty behind the last cell.
    pub(super) fn cell(&self, place: usize) -> Cow<'_, str> {
        let Some(cell) = self.cells.get(place) else { return Cow::Borrowed("") };
        let text = trimmed(self.text.get(cell.start..cell.end).unwrap_or_default());
        if cell.doubled_quotes { Cow::Owned(text.replace("\"\"", "\"")) } else { Cow::Borrowed(text) }
    }

    /// Bytes of the record where a cell stands without blanks around it; its end behind the last cell.
    pub(super) fn span(&self, place: usize) -> Range<usize> {
        let Some(cell) = self.cells.get(place) else { return self.text.len()..self.text.len() };
        let text = self.text.get(cell.start..cell.end).unwrap_or_default();
        let start = cell.start + (text.len() - text.trim_start().len());
        start..start.max(cell.start + text.trim_end().len())
    }

    /// Whether there is nothing but blanks in it.
    pub(super) fn is_blank(&self) -> bool {
        self.flaw.is_none() && (0..self.cells.len()).all(|place| self.cell(place).is_empty())
    }
}

/// Reads records one after the other.
#[derive(Debug)]
pub(super) struct Records<R> {
    source: R,
    separator: u8,
    buffer: Vec<u8>,
    at: usize,
    filled: usize,
    ended: bool,
    line: usize,
    cells: Vec<Cell>,
    before: (usize, usize),
}

impl<R: Read> Records<R> {
    pub(super) fn new(source: R) -> Self {
        Self {
            source,
            separator: b',',
            buffer: vec![0; BLOCK],
            at: 0,
            filled: 0,
            ended: false,
            line: 1,
            cells: Vec::new(),
            before: (0, 1),
        }
    }

    /// What parts the cells of the records to come.
    pub(super) const fn separate_by(&mut self, separator: u8) {
        self.separator = separator;
    }

    /// Cells of the record that was read last, up to the place where reading stopped.
    pub(super) const fn cells_so_far(&self) -> usize {
        self.cells.len()
    }

    /// Goes back to before the record that was read last.
    pub(super) const fn again(&mut self) {
        (self.at, self.line) = self.before;
    }

    /// The next record that is no comment; `None` at the end.
    pub(super) fn next(&mut self) -> Result<Option<Record<'_>>, Stopped> {
        self.skip_comments()?;
        self.before = (self.at, self.line);
        if self.at == self.filled {
            return Ok(None);
        }
        let scanned = loop {
            match scan(&self.buffer[self.at..self.filled], self.separator, self.ended, &mut self.cells) {
                Ok(Scan::Whole(scanned)) => break scanned,
                Ok(Scan::Partial) if self.filled - self.at > LONGEST_RECORD => {
                    return Err(self.stopped(TableFault::LongRecord, 0));
                }
                Ok(Scan::Partial) => self.fill()?,
                Err((fault, offset)) => return Err(self.stopped(fault, offset)),
            }
        };
        let (start, line) = self.before;
        self.at = start + scanned.length;
        self.line = line + scanned.lines;
        let bytes = &self.buffer[start..start + scanned.text_length];
        let mut flaw = match scanned.quotes {
            Quotes::Sound => None,
            Quotes::TextBehind(span) => Some(Flaw::BehindQuote(span)),
        };
        let text = match std::str::from_utf8(bytes) {
            Ok(text) => Cow::Borrowed(text),
            Err(error) => {
                let valid = error.valid_up_to();
                flaw = Some(Flaw::NotText(valid..valid + char::REPLACEMENT_CHARACTER.len_utf8()));
                String::from_utf8_lossy(bytes)
            }
        };
        if flaw.is_none() && bytes.contains(&0) {
            let nul = text.find('\0').unwrap_or_default();
            flaw = Some(Flaw::Nul(nul..nul + 1));
        }
        Ok(Some(Record { text, line, cells: &self.cells, flaw }))
    }

    fn skip_comments(&mut self) -> Result<(), Stopped> {
        loop {
            if self.at == self.filled && !self.ended {
                self.fill()?;
                continue;
            }
            if self.buffer[self.at..self.filled].first() != Some(&b'#') {
                return Ok(());
            }
            self.skip_line()?;
        }
    }

    /// Goes behind the next line end.
    fn skip_line(&mut self) -> Result<(), Stopped> {
        loop {
            let rest = &self.buffer[self.at..self.filled];
            match rest.iter().position(|byte| matches!(byte, b'\n' | b'\r')) {
                Some(end) if rest[end] == b'\r' && end + 1 == rest.len() && !self.ended => self.at += end,
                Some(end) => {
                    self.at += end + 1 + usize::from(rest[end..].starts_with(b"\r\n"));
                    self.line += 1;
                    return Ok(());
                }
                None => self.at = self.filled,
            }
            if self.ended {
                return Ok(());
            }
            self.fill()?;
        }
    }

    /// Reads more behind what is not yet used.
    fn fill(&mut self) -> Result<(), Stopped> {
        self.buffer.copy_within(self.at..self.filled, 0);
        self.filled -= self.at;
        self.at = 0;
        self.before.0 = 0;
        if self.filled + BLOCK > self.buffer.len() {
            self.buffer.resize(self.filled + BLOCK.max(self.filled), 0);
        }
        match self.source.read(&mut self.buffer[self.filled..]) {
            Ok(0) => self.ended = true,
            Ok(read) => self.filled += read,
            Err(error) => return Err(self.stopped(TableFault::Unreadable(error), 0)),
        }
        Ok(())
    }

    fn stopped(&self, fault: TableFault, offset: usize) -> Stopped {
        let bytes = &self.buffer[self.at..self.filled];
        let before = String::from_utf8_lossy(&bytes[..offset.min(bytes.len())]);
        let shown = String::from_utf8_lossy(&bytes[offset.min(bytes.len())..(offset + 200).min(bytes.len())]);
        Stopped { fault, line: self.line, span: before.len()..before.len() + 1, excerpt: format!("{before}{shown}") }
    }
}

#[cfg(test)]
mod tests;
