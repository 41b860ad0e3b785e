//! A reference table by column name.

use std::collections::BTreeMap;

/// One row.
pub struct Row(BTreeMap<String, String>);

impl Row {
    pub fn text(&self, column: &str) -> &str {
        self.0.get(column).unwrap_or_else(|| panic!("no column {column}"))
    }

    pub fn number(&self, column: &str) -> f64 {
        self.text(column).parse().unwrap_or_else(|_| panic!("no number in {column}: `{}`", self.text(column)))
    }
}

/// All rows of a table.
pub fn rows(text: &str) -> Vec<Row> {
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let headers = reader.headers().expect("headers").clone();
    reader
        .records()
        .map(|record| {
            let record = record.expect("a record");
            Row(headers.iter().zip(&record).map(|(header, cell)| (header.to_owned(), cell.to_owned())).collect())
        })
        .collect()
}

/// Fails with the figures unless `found` is within `share` of `expected`.
#[track_caller]
pub fn within(what: &str, found: f64, expected: f64, share: f64) {
    let off = (found - expected).abs() / expected.abs();
    assert!(off <= share, "{what}: {found} instead of {expected}, off by {:.3} %", off * 100.0);
}
