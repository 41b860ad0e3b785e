//! One record at the start of a block of bytes: where its cells are, and where it ends.

use std::ops::Range;

use super::table::{Cell, LONGEST_CELL, MOST_CELLS, TableFault};

/// Whether the quotes of a record are in order.
#[derive(Debug, PartialEq, Eq)]
pub(super) enum Quotes {
    Sound,
    /// These bytes stand between a closing quote and the end of the cell.
    TextBehind(Range<usize>),
}

/// The extent of a record.
#[derive(Debug, PartialEq, Eq)]
pub(super) struct Scanned {
    /// Bytes with the line end.
    pub length: usize,
    /// Bytes without it.
    pub text_length: usize,
    /// Line ends in it, those in quotes and the last one too.
    pub lines: usize,
    pub quotes: Quotes,
}

#[derive(Debug, PartialEq, Eq)]
pub(super) enum Scan {
    Whole(Scanned),
    /// The record goes on behind the bytes.
    Partial,
}

/// The record at the start of `bytes`, its cells in `cells`; `ended` if nothing comes behind `bytes`.
///
/// # Errors
/// What is wrong, and at which byte, where the record cannot be read to its end.
pub(super) fn scan(
    bytes: &[u8],
    separator: u8,
    ended: bool,
    cells: &mut Vec<Cell>,
) -> Result<Scan, (TableFault, usize)> {
    cells.clear();
    let mut quotes = Quotes::Sound;
    let (mut start, mut lines) = (0, 0);
    loop {
        if cells.len() == MOST_CELLS {
            return Err((TableFault::ManyCells, start));
        }
        let blanks = bytes[start..].iter().take_while(|byte| **byte == b' ').count();
        let (cell, end) = if bytes.get(start + blanks) == Some(&b'"') {
            let inner = start + blanks + 1;
            let Some((cell, line_ends)) = quoted(bytes, inner, ended) else {
                return match (bytes.len() - inner > LONGEST_CELL, ended) {
                    (true, _) => Err((TableFault::LongCell, inner - 1)),
                    (false, true) => Err((TableFault::OpenQuote, inner - 1)),
                    (false, false) => Ok(Scan::Partial),
                };
            };
            lines += line_ends;
            let end = cell_end(bytes, cell.end + 1, separator);
            let behind = bytes[cell.end + 1..end].trim_ascii();
            if !behind.is_empty() && quotes == Quotes::Sound {
                quotes = Quotes::TextBehind(cell.end + 1..end);
            }
            (cell, end)
        } else {
            let end = cell_end(bytes, start + blanks, separator);
            (Cell { start, end, doubled_quotes: false }, end)
        };
        if end - start > LONGEST_CELL {
            return Err((TableFault::LongCell, start));
        }
        cells.push(cell);
        let line_end = match bytes.get(end) {
            Some(&byte) if byte == separator => {
                start = end + 1;
                continue;
            }
            Some(b'\n') => 1,
            Some(_) if bytes.get(end + 1) == Some(&b'\n') => 2,
            Some(_) if end + 1 < bytes.len() || ended => 1,
            None if ended => 0,
            _ => return Ok(Scan::Partial),
        };
        lines += usize::from(line_end > 0);
        return Ok(Scan::Whole(Scanned { length: end + line_end, text_length: end, lines, quotes }));
    }
}

/// Where the separator or line end at or behind `from` is, or the end of `bytes`.
fn cell_end(bytes: &[u8], from: usize, separator: u8) -> usize {
    let ends = |byte: &u8| *byte == separator || *byte == b'\n' || *byte == b'\r';
    bytes[from..].iter().position(ends).map_or(bytes.len(), |length| from + length)
}

/// The quoted cell whose text starts at `start`, and the line ends in it; `None` if no closing quote is sure to be in `bytes`.
fn quoted(bytes: &[u8], start: usize, ended: bool) -> Option<(Cell, usize)> {
    let (mut at, mut doubled_quotes, mut lines) = (start, false, 0);
    loop {
        match (bytes.get(at)?, bytes.get(at + 1)) {
            (b'"', Some(b'"')) => {
                doubled_quotes = true;
                at += 1;
            }
            (b'"', None) if !ended => return None,
            (b'"', _) => return Some((Cell { start, end: at, doubled_quotes }, lines)),
            (b'\n', _) => lines += 1,
            (b'\r', next) if next != Some(&b'\n') => lines += 1,
            _ => {}
        }
        at += 1;
    }
}
