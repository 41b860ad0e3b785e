//! One catalog from its first byte to its last: header, rows, and what only the whole file can tell.

use std::io::Read;

use super::alias::Aliases;
use super::column::Catalog;
use super::encoding::{Decoded, EncodingFault};
use super::header::{self, HeadingFault};
use super::identity::{EQUIVALENT_TO, PART};
use super::layout::{HeaderReader, Layout};
use super::marks::Marks;
use super::names::Names;
use super::row::Row;
use super::table::{Flaw, Record, Records, Stopped, TableFault};
use crate::fault::{Fault, Faults};
use crate::quantity::{Mark, shortened};

pub(super) mod sealed {
    /// Only the parts of the four catalogs are made from rows.
    pub trait Sealed {}
}

/// A part that is made from a row of its catalog.
pub trait FromRow: sealed::Sealed + Sized {
    /// The catalog.
    const CATALOG: Catalog;

    /// The part in `row`, or `None` with what is wrong reported to the row.
    fn from_row(row: &mut Row<'_>) -> Option<Self>;
}

/// What came of reading one catalog.
#[derive(Debug, Default)]
pub struct Outcome {
    /// What is wrong with the file as a whole, its header too.
    pub file_faults: Faults,
    /// What is wrong with single rows.
    pub row_faults: Faults,
    /// How many rows are bad.
    pub bad_rows: usize,
    /// Lines of rows that became parts before the end of the file showed that a number of theirs has two readings.
    pub doubtful_lines: Vec<usize>,
    /// Header texts.
    pub headers: Vec<String>,
    /// Whether the machine failed, not the user.
    pub machine_failed: bool,
}

/// Reads one catalog, row after row, and hands each part to `sink` with its record.
pub(super) struct Reader<'a, R> {
    pub file: &'a str,
    pub aliases: &'a Aliases,
    records: Records<R>,
    outcome: Outcome,
}

/// Rows with fewer cells than the header.
#[derive(Default)]
struct Short {
    first: Option<Fault>,
    count: usize,
}

/// Parts that name an equivalent which no row before them is.
type Equivalents = Vec<(String, Fault)>;

pub(super) fn read<P: FromRow>(
    file: &str,
    source: impl Read,
    aliases: &Aliases,
    sink: &mut dyn FnMut(P, &Record<'_>),
) -> Outcome {
    let source = match Decoded::new(source) {
        Ok(source) => source,
        Err(fault) => {
            let mut outcome =
                Outcome { machine_failed: matches!(fault, EncodingFault::Unreadable(_)), ..Outcome::default() };
            outcome.file_faults.push(
                Fault::of_file(file, fault.to_string(), "a table of text").with_help("save the sheet as CSV in UTF-8"),
            );
            return outcome;
        }
    };
    let mut reader = Reader { file, aliases, records: Records::new(source), outcome: Outcome::default() };
    if let Err(stopped) = reader.read_all(sink) {
        reader.stop(&stopped);
    }
    reader.outcome
}

impl<R: Read> Reader<'_, R> {
    fn read_all<P: FromRow>(&mut self, sink: &mut dyn FnMut(P, &Record<'_>)) -> Result<(), Stopped> {
        let mut marks = Marks::default();
        let Some((layout, mark)) = self.read_header(P::CATALOG, &mut marks)? else { return Ok(()) };
        self.outcome.headers.clone_from(&layout.headers);
        let mut names = Names::default();
        let (mut values, mut short, mut equivalents) = (Vec::new(), Short::default(), Equivalents::new());
        while let Some(record) = self.records.next()? {
            if record.is_blank() {
                continue;
            }
            let faults = &mut self.outcome.row_faults;
            let mut row = Row {
                file: self.file,
                layout: &layout,
                record: &record,
                mark,
                marks: &mut marks,
                faults,
                values: &mut values,
                bad: false,
            };
            row.read_cells();
            short.note(&row);
            check_name(&mut row, &mut names);
            note_equivalent(&mut row, &names, &mut equivalents);
            let part = if row.bad || !layout.sound { None } else { P::from_row(&mut row) };
            if let (None, false, true) = (&part, row.bad, layout.sound) {
                row.refuse(0, "the row makes no part".to_owned(), "a part", None);
            }
            match part {
                Some(part) if !row.bad => sink(part, &record),
                _ => self.outcome.bad_rows += usize::from(row.bad),
            }
        }
        self.finish(marks, short, equivalents, &names);
        Ok(())
    }

    /// Finds the separator and reads the header row; `None` if the file has none.
    fn read_header(&mut self, catalog: Catalog, marks: &mut Marks) -> Result<Option<(Layout, Mark)>, Stopped> {
        let mut announced = None;
        loop {
            let separator = announced.unwrap_or_else(|| self.likely_separator(catalog));
            self.records.separate_by(separator);
            let Some(record) = self.records.next()? else {
                let expected = "a header row and a row for each part";
                self.outcome.file_faults.push(Fault::of_file(self.file, "the file is empty", expected));
                return Ok(None);
            };
            if record.is_blank() {
                continue;
            }
            if let Some(separator) = announced_separator(&record.text) {
                announced = Some(separator);
                continue;
            }
            let mark = mark_beside(separator);
            let faults = &mut self.outcome.file_faults;
            if record.flaw.is_some() {
                faults.push(flawed_header(self.file, &record));
                return Ok(None);
            }
            let reader = HeaderReader { file: self.file, catalog, aliases: self.aliases, mark, faults, marks };
            return Ok(Some((reader.read(&record), mark)));
        }
    }

    /// The separator that makes the most known headers of the next record, else the most cells.
    fn likely_separator(&mut self, catalog: Catalog) -> u8 {
        let mut best = ((0, 0), b',');
        for separator in [b',', b';', b'\t'] {
            self.records.separate_by(separator);
            let next = self.records.next();
            if let Ok(Some(record)) = &next {
                let known = |place: &usize| {
                    let text = record.cell(*place);
                    let ours = self.aliases.find(catalog, &text).unwrap_or(&text);
                    !matches!(header::read(ours, catalog, mark_beside(separator)), Err(HeadingFault::Unknown(_)))
                };
                let score = ((0..record.cells.len()).filter(known).count(), record.cells.len());
                if score > best.0 {
                    best = (score, separator);
                }
            } else if next.is_err() {
                let score = (0, self.records.cells_so_far());
                if score > best.0 {
                    best = (score, separator);
                }
            }
            self.records.again();
        }
        best.1
    }

    /// Reports what only the end of the file shows.
    fn finish(&mut self, marks: Marks, short: Short, equivalents: Equivalents, names: &Names) {
        let (ambiguous, lines) = marks.ambiguous();
        self.outcome.row_faults.append(ambiguous);
        self.outcome.doubtful_lines = lines;
        if let Some(fault) = short.first {
            let others = if short.count > 1 { format!(" (so in {} rows)", short.count) } else { String::new() };
            let found = format!("{}{others}", fault.found);
            self.outcome.row_faults.push(Fault { found, ..fault }.as_warning());
        }
        for (name, fault) in equivalents {
            if !names.contains(&name) {
                self.outcome.row_faults.push(fault.as_warning());
            }
        }
    }

    fn stop(&mut self, stopped: &Stopped) {
        let help = match stopped.fault {
            TableFault::Unreadable(_) => {
                self.outcome.machine_failed = true;
                let fault = Fault::of_file(self.file, stopped.fault.to_string(), "a readable file");
                self.outcome.file_faults.push(fault);
                return;
            }
            TableFault::LongCell | TableFault::LongRecord => "is a quote left open?",
            TableFault::ManyCells => "the wrong separator, or a table turned on its side?",
            TableFault::OpenQuote => "close it, or take it out; a quote within quotes is written twice: \"\"",
        };
        let (line, span) = (stopped.line, stopped.span.clone());
        let found = format!("{}; nothing behind it is read", stopped.fault);
        let fault = Fault::in_passage(self.file, line, &stopped.excerpt, span, found, "a row of a catalog");
        self.outcome.file_faults.push(fault.with_help(help));
    }
}

impl Short {
    fn note(&mut self, row: &Row<'_>) {
        let (cells, headers) = (row.record.cells.len(), row.layout.fields.len());
        if cells >= headers || row.record.flaw.is_some() {
            return;
        }
        self.count += 1;
        if self.first.is_none() {
            let found =
                format!("the row has {cells} cells and the header {headers}; the missing ones are taken as empty");
            self.first = Some(row.fault(cells, found, "a cell for each header"));
        }
    }
}

/// Refuses a part name that stands in an earlier row, or cannot be written on one line.
fn check_name(row: &mut Row<'_>, names: &mut Names) {
    let Some(place) = row.place(PART) else { return };
    let record = row.record;
    let name = record.cell(place);
    if name.is_empty() {
        return;
    }
    if name.chars().any(char::is_control) {
        let found = format!("{}: there is a line break or another control character in a part name", row.name(place));
        row.refuse(place, found, "a name on one line", None);
    }
    let line = record.line;
    if let Some(earlier) = names.meet(&name, line) {
        let found = format!("part `{}` stands in line {earlier} and again in line {line}", shortened(&name, 60));
        let help = "take one of them out, or give it a name of its own".to_owned();
        row.refuse(place, found, "a name that no other row has", Some(help));
    }
}

fn note_equivalent(row: &mut Row<'_>, names: &Names, equivalents: &mut Equivalents) {
    let (Some(name), Some(place)) = (row.text(EQUIVALENT_TO), row.place(EQUIVALENT_TO)) else { return };
    if row.text(PART).as_ref() == Some(&name) {
        let found = format!("{}: the part is its own equivalent", row.name(place));
        row.refuse(place, found, "another part of the same catalog", None);
    } else if !names.contains(&name) {
        let found = format!("{}: no part of this catalog is called so", row.name(place));
        equivalents.push((name, row.fault(place, found, "a part of the same catalog")));
    }
}

/// The decimal marks that cannot be mistaken for `separator`.
const fn mark_beside(separator: u8) -> Mark {
    if separator == b',' { Mark::Point } else { Mark::PointOrComma }
}

/// The separator that a line such as `sep=;` in front of the header tells spreadsheets to use.
fn announced_separator(text: &str) -> Option<u8> {
    let (key, separator) = text.split_at_checked(4)?;
    match separator.as_bytes() {
        [separator @ (b',' | b';' | b'\t')] if key.eq_ignore_ascii_case("sep=") => Some(*separator),
        _ => None,
    }
}

fn flawed_header(file: &str, record: &Record<'_>) -> Fault {
    let (span, found) = match &record.flaw {
        Some(Flaw::BehindQuote(span)) => (span.clone(), "there is text behind a closing quote in the header"),
        Some(Flaw::NotText(span)) => (span.clone(), "the bytes here are neither UTF-8 nor UTF-16 text"),
        Some(Flaw::Nul(span)) => (span.clone(), "there is a NUL character"),
        None => (0..0, "the header cannot be read"),
    };
    Fault::in_passage(file, record.line, &record.text, span, found, "a header row")
        .with_help("save the sheet as CSV in UTF-8")
}
