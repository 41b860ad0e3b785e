//! Rows of cells under headers, written as CSV.

/// Cells under their headers; every row of a sheet has the same headers in the same order.
#[derive(Default)]
pub struct Row {
    cells: Vec<(&'static str, String)>,
}

impl Row {
    /// Adds a text cell.
    pub fn text(&mut self, header: &'static str, cell: impl Into<String>) {
        self.cells.push((header, cell.into()));
    }

    /// Adds a number of three significant digits.
    pub fn number(&mut self, header: &'static str, value: f64) {
        self.text(header, three_digits(value));
    }

    /// Adds the number if there is one, else an empty cell.
    pub fn known(&mut self, header: &'static str, value: Option<f64>) {
        self.text(header, value.map(three_digits).unwrap_or_default());
    }

    /// Adds the number if it is known, else an empty cell.
    pub fn maybe(&mut self, known: bool, header: &'static str, value: f64) {
        self.known(header, known.then_some(value));
    }

    /// Adds several numbers that are known or unknown together; single ones may be missing even then.
    pub fn maybe_all(&mut self, known: bool, cells: &[(&'static str, Option<f64>)]) {
        for &(header, value) in cells {
            self.known(header, value.filter(|_| known));
        }
    }
}

/// The value at three significant digits, without trailing zeros.
pub fn three_digits(value: f64) -> String {
    format!("{value:.2e}").parse::<f64>().unwrap_or(value).to_string()
}

/// Header and rows as comma-separated text with line feeds.
pub fn text(rows: impl Iterator<Item = Row>) -> String {
    let mut writer = csv::Writer::from_writer(Vec::new());
    let mut write = |record: Vec<&str>| writer.write_record(record).expect("every row has the same headers");
    for (index, row) in rows.enumerate() {
        if index == 0 {
            write(row.cells.iter().map(|(header, _)| *header).collect());
        }
        write(row.cells.iter().map(|(_, cell)| cell.as_str()).collect());
    }
    String::from_utf8(writer.into_inner().expect("memory takes every byte")).expect("cells are UTF-8")
}
