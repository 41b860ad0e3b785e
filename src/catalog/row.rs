//! One row of a catalog: its cells as numbers, words and texts, and what is wrong with them.

use super::column::{Cells, Column, Range};
use super::header::Heading;
use super::layout::{Field, Layout};
use super::marks::Marks;
use super::table::{Flaw, Record};
use crate::fault::{Fault, Faults};
use crate::part::Curve;
use crate::quantity::number::{Cause, parse, parse_plain};
use crate::quantity::{Mark, NonNegative, Positive, Share, shortened};

/// One row while it becomes a part.
pub struct Row<'a> {
    pub(super) file: &'a str,
    pub(super) layout: &'a Layout,
    pub(super) record: &'a Record<'a>,
    pub(super) mark: Mark,
    pub(super) marks: &'a mut Marks,
    pub(super) faults: &'a mut Faults,
    /// Numbers in base units, by column of the file; NaN where there is none.
    pub(super) values: &'a mut Vec<f64>,
    /// Whether anything is wrong so far.
    pub(super) bad: bool,
}

impl Row<'_> {
    /// Reads every cell and reports all that is wrong with them one by one.
    pub(super) fn read_cells(&mut self) {
        self.values.clear();
        self.values.resize(self.layout.fields.len(), f64::NAN);
        if let Some(flaw) = &self.record.flaw {
            self.refuse_flaw(flaw);
            return;
        }
        for place in 0..self.layout.fields.len().min(self.record.cells.len()) {
            if self.read_plain(place) {
                continue;
            }
            match self.layout.fields[place] {
                Field::Known(heading) => self.read_cell(place, heading),
                Field::Unknown => {}
                Field::Nameless => {
                    if self.layout.sound && !self.record.cell(place).is_empty() {
                        let found = format!("the cell `{}` has no header", cut(&self.record.cell(place)));
                        self.refuse(place, found, "an empty cell, or a header above it", None);
                    }
                }
            }
        }
        for place in self.layout.fields.len()..self.record.cells.len() {
            if self.layout.sound && !self.record.cell(place).is_empty() {
                let (cells, headers) = (self.record.cells.len(), self.layout.fields.len());
                let found = format!("the row has {cells} cells, and the header has {headers}");
                let help = "is there a separator in a cell? Put quotes around it; write decimal points in numbers";
                self.refuse(place, found, "the end of the row", Some(help.to_owned()));
                break;
            }
        }
        for &column in &self.layout.required {
            let places = &self.layout.places[column];
            if places.iter().all(|place| self.values[*place].is_nan() && self.record.cell(*place).is_empty()) {
                self.refuse_missing(&self.layout.catalog.columns()[column], places);
            }
        }
    }

    /// Reads a cell that is empty, or plain digits in the unit of its header; `false` for any other.
    fn read_plain(&mut self, place: usize) -> bool {
        let cell = self.record.cells[place];
        if cell.start == cell.end {
            return true;
        }
        let Some(Some((unit, range))) = self.layout.plain.get(place) else { return false };
        let bytes = &self.record.text.as_bytes()[cell.start..cell.end];
        match parse_plain(bytes, *unit) {
            Some(value) if range.holds(value) => self.values[place] = value,
            _ => return false,
        }
        if self.mark == Mark::PointOrComma {
            self.note_mark(place);
        }
        true
    }

    fn read_cell(&mut self, place: usize, heading: Heading) {
        let column = &self.layout.catalog.columns()[heading.column];
        let Cells::Number { dimension, range, .. } = column.cells else { return };
        let text = self.record.cell(place);
        if text.is_empty() {
            return;
        }
        let if_unknown = || (!column.required).then(|| "leave the cell empty where the value is unknown".to_owned());
        match parse(&text, dimension, heading.unit, self.mark) {
            Ok(value) if range.holds(value) => {
                self.values[place] = value;
                if self.mark == Mark::PointOrComma {
                    self.note_mark(place);
                }
            }
            Ok(value) => {
                let found = format!("{}: out of range", self.name(place));
                self.refuse(place, found, range.words(), per_cent(range, value, &text).or_else(if_unknown));
            }
            Err(fault) => {
                let may_stand_for_unknown = matches!(fault.cause, Cause::NotANumber(_) | Cause::NotFinite(_));
                let help = fault.help().or_else(|| if_unknown().filter(|_| may_stand_for_unknown));
                self.refuse(place, format!("{}: {fault}", self.name(place)), fault.expected(), help);
            }
        }
    }

    fn note_mark(&mut self, place: usize) {
        let (record, file) = (self.record, self.file);
        let header = &self.layout.headers[place];
        self.marks.note(&record.cell(place), record.line, |found| {
            let found = format!("column `{}`, cell `{}`: {found}", cut(header), cut(&record.cell(place)));
            let help =
                "the file uses both marks; write the number without a thousands separator, with more or fewer decimals";
            Fault::in_passage(file, record.line, &record.text, record.span(place), found, "a number with one reading")
                .with_help(help)
        });
    }

    /// The text of a column, if there is any.
    pub(super) fn text(&self, column: usize) -> Option<String> {
        let text = self.record.cell(self.place(column)?);
        (!text.is_empty()).then(|| text.into_owned())
    }

    /// Which of the words of a column its cell is, its case ignored; `None` for an empty cell, or a bad one.
    pub(super) fn word(&mut self, column: usize) -> Option<usize> {
        let Cells::Word(words) = self.layout.catalog.columns()[column].cells else { return None };
        let place = self.place(column)?;
        let text = self.record.cell(place);
        if text.is_empty() {
            return None;
        }
        let found = words.iter().position(|word| word.eq_ignore_ascii_case(&text));
        if found.is_none() {
            let expected = format!("one of {}", words.join(", "));
            let help =
                crate::fault::nearest(&text, words.iter().copied()).map(|near| format!("did you mean `{near}`?"));
            self.refuse(place, format!("{}: not a known word", self.name(place)), expected, help);
        }
        found
    }

    /// The number of a column that stands once in a file.
    pub(super) fn number(&self, column: usize) -> Option<f64> {
        self.place(column).map(|place| self.values[place]).filter(|value| !value.is_nan())
    }

    /// The same, above zero.
    pub(super) fn positive(&self, column: usize) -> Option<Positive> {
        self.number(column).and_then(Positive::new)
    }

    /// The same, zero or above.
    pub(super) fn non_negative(&self, column: usize) -> Option<NonNegative> {
        self.number(column).and_then(NonNegative::new)
    }

    /// The same, from 0 to below 1.
    pub(super) fn share(&self, column: usize) -> Option<Share> {
        self.number(column).and_then(Share::new)
    }

    /// Condition, value and place of every filled column of a quantity, by ascending condition, each condition once: a column that
    /// writes it wins over a plain one.
    pub(super) fn points(&self, column: usize) -> impl Iterator<Item = (f64, f64, usize)> {
        let mut last = None;
        self.layout.places[column]
            .iter()
            .filter_map(|&place| match self.layout.fields[place] {
                Field::Known(heading) if !self.values[place].is_nan() => {
                    Some((heading.condition.unwrap_or_default(), self.values[place], place))
                }
                _ => None,
            })
            .filter(move |point| last.replace(point.0) != Some(point.0))
    }

    /// The curve through the points of a quantity.
    pub(super) fn curve(&self, column: usize) -> Option<Curve> {
        Curve::new(self.points(column).map(|(condition, value, _)| (condition, value)).collect()).ok()
    }

    /// The column of the file that holds a quantity, the first of several.
    pub(super) fn place(&self, column: usize) -> Option<usize> {
        self.layout.places[column].first().copied()
    }

    /// Reports an error at a column of the file.
    pub(super) fn refuse(&mut self, place: usize, found: String, expected: impl Into<String>, help: Option<String>) {
        let fault = self.fault(place, found, expected).with_help_if(help);
        self.faults.push(fault);
        self.bad = true;
    }

    /// A fault at a column of the file.
    pub(super) fn fault(&self, place: usize, found: String, expected: impl Into<String>) -> Fault {
        let record = self.record;
        Fault::in_passage(self.file, record.line, &record.text, record.span(place), found, expected)
    }

    /// Header and cell of a column of the file, in words.
    pub(super) fn name(&self, place: usize) -> String {
        let header = self.layout.headers.get(place).map_or("", String::as_str);
        format!("column `{}`, cell `{}`", cut(header), cut(&self.record.cell(place)))
    }

    fn refuse_missing(&mut self, column: &Column, places: &[usize]) {
        let Some(&first) = places.first() else { return };
        let found = match places {
            [_] => format!("column `{}`: the cell is empty", cut(&self.layout.headers[first])),
            _ => format!("all {} columns `{}` are empty", places.len(), column.name),
        };
        let expected = match column.cells {
            Cells::Text => column.meaning.to_owned(),
            Cells::Word(words) => format!("one of {}", words.join(", ")),
            Cells::Number { dimension, .. } => format!("a number in {}", dimension.usual_units()),
        };
        let help = "a part cannot be judged without it; take the row out, or begin it with `#`";
        self.refuse(first, found, expected, Some(help.to_owned()));
    }

    fn refuse_flaw(&mut self, flaw: &Flaw) {
        let (span, found, expected, help) = match flaw {
            Flaw::BehindQuote(span) => (
                span,
                "there is text behind a closing quote",
                "a separator or the end of the row",
                "a quote within quotes is written twice: \"\"",
            ),
            Flaw::NotText(span) => {
                (span, "the bytes here are neither UTF-8 nor UTF-16 text", "text", "save the file as CSV in UTF-8")
            }
            Flaw::Nul(span) => (span, "there is a NUL character", "text", "save the file as CSV in UTF-8"),
        };
        let record = self.record;
        self.faults.push(
            Fault::in_passage(self.file, record.line, &record.text, span.clone(), found, expected).with_help(help),
        );
        self.bad = true;
    }
}

/// What to write for a share that may be meant in per cent.
fn per_cent(range: Range, value: f64, text: &str) -> Option<String> {
    let meant = range == Range::Share && (2.0..100.0).contains(&value) && !text.contains('%');
    meant.then(|| format!("write `{} %` for per cent", cut(text)))
}

fn cut(text: &str) -> String {
    shortened(text, 60)
}
