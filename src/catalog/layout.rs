//! The header row of a catalog: what stands in each of its columns.

use super::alias::Aliases;
use super::column::{Catalog, Cells, Column, Range};
use super::header::{self, Heading, HeadingFault};
use super::marks::Marks;
use super::table::Record;
use crate::fault::{Fault, Faults};
use crate::quantity::{Mark, Unit, shortened};

/// What one column of a file is.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Field {
    /// A known quantity.
    Known(Heading),
    /// Kept and not used; said so once.
    Unknown,
    /// Its header is empty.
    Nameless,
}

/// The columns of one file.
#[derive(Debug)]
pub(super) struct Layout {
    pub catalog: Catalog,
    /// Header texts, as written.
    pub headers: Vec<String>,
    /// What stands below each.
    pub fields: Vec<Field>,
    /// Unit and range of the numbers below each header that has a unit.
    pub plain: Vec<Option<(Unit, Range)>>,
    /// For each column of the catalog the columns of the file that hold it, by ascending condition.
    pub places: Vec<Vec<usize>>,
    /// Columns of the catalog that each part needs.
    pub required: Vec<usize>,
    /// Whether rows can become parts at all.
    pub sound: bool,
}

/// Reads a header row.
pub(super) struct HeaderReader<'a> {
    pub file: &'a str,
    pub catalog: Catalog,
    pub aliases: &'a Aliases,
    pub mark: Mark,
    pub faults: &'a mut Faults,
    pub marks: &'a mut Marks,
}

impl HeaderReader<'_> {
    /// The columns that `record` announces.
    pub(super) fn read(mut self, record: &Record<'_>) -> Layout {
        let columns = self.catalog.columns();
        let before = std::mem::take(self.faults);
        let mut layout = Layout {
            catalog: self.catalog,
            headers: (0..record.cells.len()).map(|place| record.cell(place).into_owned()).collect(),
            fields: Vec::with_capacity(record.cells.len()),
            plain: Vec::new(),
            places: vec![Vec::new(); columns.len()],
            required: (0..columns.len()).filter(|column| columns[*column].required).collect(),
            sound: true,
        };
        let mut broken = vec![false; columns.len()];
        for (place, text) in layout.headers.iter().enumerate() {
            let field = self.field(text, place, record, &mut broken);
            if let Field::Known(heading) = field {
                match twin(&heading, &layout.fields, &layout.places[heading.column]) {
                    None => layout.places[heading.column].push(place),
                    Some(other) => {
                        broken[heading.column] = true;
                        self.twice(record, place, other, &layout.headers);
                    }
                }
            }
            layout.fields.push(field);
        }
        layout.plain = layout.fields.iter().map(|field| plain(field, columns)).collect();
        for places in &mut layout.places {
            let condition = |place: &usize| match layout.fields[*place] {
                Field::Known(heading) => (heading.condition.unwrap_or_default(), !heading.explicit),
                _ => (0.0, true),
            };
            places.sort_by(|one, other| {
                let (one, other) = (condition(one), condition(other));
                one.0.total_cmp(&other.0).then(one.1.cmp(&other.1))
            });
        }
        if layout.places.iter().all(Vec::is_empty) && !broken.contains(&true) {
            *self.faults = before;
            self.no_header(record);
            layout.sound = false;
            return layout;
        }
        for (column, (places, broken)) in columns.iter().zip(layout.places.iter().zip(&broken)) {
            if column.required && places.is_empty() && !broken {
                self.missing(record, column);
                layout.sound = false;
            }
        }
        layout.sound &= !broken.contains(&true);
        self.faults.append(before);
        layout
    }

    fn no_header(&mut self, record: &Record<'_>) {
        let needed = self.catalog.columns().iter().filter(|column| column.required).map(Column::example);
        let needed: Vec<_> = needed.map(|example| format!("`{example}`")).collect();
        let fault = Fault::in_passage(
            self.file,
            record.line,
            &record.text,
            0..record.text.len(),
            format!("the first row has no header of a catalog of {}", self.catalog.name()),
            format!("headers such as {}", needed.join(", ")),
        );
        self.faults.push(fault.with_help("the header row comes first, its cells parted by `,`, `;` or tab"));
    }

    fn field(&mut self, text: &str, place: usize, record: &Record<'_>, broken: &mut [bool]) -> Field {
        if text.is_empty() {
            return Field::Nameless;
        }
        let ours = self.aliases.find(self.catalog, text).unwrap_or(text);
        match header::read(ours, self.catalog, self.mark) {
            Ok(heading) => {
                if let Some(condition) = header::condition_text(ours).filter(|_| self.mark == Mark::PointOrComma) {
                    self.marks.note(condition, record.line, |found| {
                        let found = format!("the header `{}` {found}", shortened(text, 80));
                        Fault::in_passage(
                            self.file,
                            record.line,
                            &record.text,
                            record.span(place),
                            found,
                            "one reading",
                        )
                    });
                }
                Field::Known(heading)
            }
            Err(HeadingFault::Unknown(near)) => {
                let help = match near {
                    Some(near) => format!("did you mean `{near}`?"),
                    None => "it is kept; columns.toml can give it a meaning".to_owned(),
                };
                let found = format!("the column `{}` is not known and not used", shortened(text, 80));
                self.push(record, place, found, "a column of this catalog".to_owned(), Some(help), Fault::as_warning);
                Field::Unknown
            }
            Err(HeadingFault::Bad { column, found, expected, help }) => {
                broken[column] = true;
                self.push(record, place, found, expected, help, |fault| fault);
                Field::Unknown
            }
        }
    }

    fn twice(&mut self, record: &Record<'_>, place: usize, other: usize, headers: &[String]) {
        let (here, there) = (shortened(&headers[place], 80), shortened(&headers[other], 80));
        let found = if here == there {
            format!("the column `{here}` stands twice, as column {} and column {}", other + 1, place + 1)
        } else {
            format!("the columns `{there}` and `{here}` are the same quantity at the same condition")
        };
        let help = "remove one of them, or give them different conditions".to_owned();
        self.push(record, place, found, "each quantity once for each condition".to_owned(), Some(help), |fault| fault);
    }

    fn missing(&mut self, record: &Record<'_>, column: &Column) {
        let found = format!("the column `{}` is missing", column.name);
        let help = match (record.cells.len(), column.name) {
            (1, _) => "part the cells by `,`, `;` or tab".to_owned(),
            _ => format!("add it: {}", column.meaning),
        };
        let expected = format!("a column such as `{}`", column.example());
        self.push(record, record.cells.len(), found, expected, Some(help), |fault| fault);
    }

    fn push(
        &mut self,
        record: &Record<'_>,
        place: usize,
        found: String,
        expected: String,
        help: Option<String>,
        severity: fn(Fault) -> Fault,
    ) {
        let fault = Fault::in_passage(self.file, record.line, &record.text, record.span(place), found, expected);
        self.faults.push(severity(fault.with_help_if(help)));
    }
}

fn plain(field: &Field, columns: &[Column]) -> Option<(Unit, Range)> {
    let Field::Known(heading) = field else { return None };
    match columns[heading.column].cells {
        Cells::Number { range, .. } => heading.unit.map(|unit| (unit, range)),
        _ => None,
    }
}

/// The column among `places` that gives the same quantity at the same condition. A nominal value may stand beside a measured one
/// at no bias, which then wins.
fn twin(heading: &Heading, fields: &[Field], places: &[usize]) -> Option<usize> {
    let nominal = heading.condition == Some(0.0);
    let same = |place: &usize| match fields[*place] {
        Field::Known(other) => other.condition == heading.condition && (other.explicit == heading.explicit || !nominal),
        Field::Unknown | Field::Nameless => false,
    };
    places.iter().copied().find(same)
}
