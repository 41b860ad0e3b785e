//! The cells of a catalog as they are written, beside the parts that were made of them.

/// One row as it is written.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct RawRow {
    /// Line of its first character, from 1.
    pub line: usize,
    text: String,
    ends: Vec<usize>,
}

/// The rows of one catalog that became parts, in the order of the parts.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct RawTable {
    /// Header texts, as written.
    pub headers: Vec<String>,
    /// One row a part.
    pub rows: Vec<RawRow>,
}

impl RawRow {
    /// A row of `cells` in `line`.
    pub(super) fn new<'c>(line: usize, cells: impl Iterator<Item = std::borrow::Cow<'c, str>>) -> Self {
        let (mut text, mut ends) = (String::new(), Vec::new());
        for cell in cells {
            text.push_str(&cell);
            ends.push(text.len());
        }
        Self { line, text, ends }
    }

    /// The cell below the header at `place`, without blanks around it; empty behind the last one.
    pub fn cell(&self, place: usize) -> &str {
        let start = place.checked_sub(1).map_or(Some(0), |before| self.ends.get(before).copied());
        match (start, self.ends.get(place)) {
            (Some(start), Some(&end)) => &self.text[start..end],
            _ => "",
        }
    }
}

impl RawTable {
    /// The cell of the part at `index` below the header `header`, as written.
    pub fn cell(&self, index: usize, header: &str) -> Option<&str> {
        let place = self.headers.iter().position(|known| known == header)?;
        self.rows.get(index).map(|row| row.cell(place))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn cells_come_back_as_written() {
        let row = RawRow::new(7, ["Q1", "", "4,7 mΩ"].into_iter().map(Into::into));
        assert_eq!([0, 1, 2, 3].map(|place| row.cell(place)), ["Q1", "", "4,7 mΩ", ""]);
        let table = RawTable { headers: vec!["part".into(), "x".into(), "dcr".into()], rows: vec![row] };
        assert_eq!(table.cell(0, "dcr"), Some("4,7 mΩ"));
        assert_eq!((table.cell(1, "dcr"), table.cell(0, "y")), (None, None));
    }
}
