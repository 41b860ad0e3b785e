use proptest::prelude::{prop_assert_eq, proptest};

use super::*;

type Row = (usize, Vec<String>);

fn rows(bytes: &[u8], separator: u8) -> Result<Vec<Row>, String> {
    let mut records = Records::new(bytes);
    records.separate_by(separator);
    let mut rows = Vec::new();
    while let Some(record) = records.next().map_err(|stopped| format!("{} at line {}", stopped.fault, stopped.line))? {
        rows.push((record.line, (0..record.cells.len()).map(|cell| record.cell(cell).into_owned()).collect()));
    }
    Ok(rows)
}

fn row(line: usize, cells: &[&str]) -> Row {
    (line, cells.iter().map(|cell| (*cell).to_owned()).collect())
}

#[test]
fn line_ends_of_every_kind() {
    for text in ["a,b\nc,d\n", "a,b\r\nc,d", "a,b\rc,d\r", "a,b\nc,d\r\n"] {
        assert_eq!(rows(text.as_bytes(), b','), Ok(vec![row(1, &["a", "b"]), row(2, &["c", "d"])]), "{text:?}");
    }
}

#[test]
fn quotes_hold_separators_line_breaks_and_quotes() {
    let text = "a,\"b,\r\nc\",\"say \"\"x\"\"\"\n# no,\"record\nd, \"e\" ,5\"\n\n";
    let expected = vec![row(1, &["a", "b,\r\nc", "say \"x\""]), row(4, &["d", "e", "5\""]), row(5, &[""])];
    assert_eq!(rows(text.as_bytes(), b','), Ok(expected));
}

#[test]
fn text_behind_a_quote_is_a_flaw() {
    let mut records = Records::new(&b"a,\"4.7\" mOhm,b\nc\n"[..]);
    let record = records.next().expect("readable").expect("a record");
    let Some(Flaw::BehindQuote(span)) = record.flaw.clone() else { panic!("{record:?}") };
    assert_eq!(&record.text[span], " mOhm");
    assert_eq!(record.cells.len(), 3);
    assert_eq!(records.next().expect("readable").expect("a record").line, 2);
}

#[test]
fn what_has_no_end_is_refused() {
    assert_eq!(rows(b"a\n\"b\nc", b','), Err("the quote that opens here is never closed at line 2".to_owned()));
    let long = vec![b'x'; LONGEST_CELL + 10];
    assert_eq!(rows(&long, b','), Err("the cell is longer than a mebibyte at line 1".to_owned()));
    assert_eq!(rows(&vec![b','; MOST_CELLS], b','), Err("the row has more than 4096 cells at line 1".to_owned()));
    let wide = [vec![b'y'; LONGEST_CELL - 1], vec![b',']].concat().repeat(9);
    assert_eq!(rows(&wide, b','), Err("the row is longer than eight mebibytes at line 1".to_owned()));
}

#[test]
fn bytes_that_are_no_text_are_a_flaw_of_their_record() {
    let mut records = Records::new(&b"a,\xe4b\nc\0d\n"[..]);
    let flaw = records.next().expect("readable").expect("a record").flaw.clone();
    assert_eq!(flaw, Some(Flaw::NotText(2..5)));
    let flaw = records.next().expect("readable").expect("a record").flaw.clone();
    assert_eq!(flaw, Some(Flaw::Nul(1..2)));
}

#[test]
fn a_record_can_be_read_again_with_another_separator() {
    let mut records = Records::new(&b"# c\na;b\nd;e\n"[..]);
    assert_eq!(records.next().expect("readable").expect("a record").cells.len(), 1);
    records.again();
    records.separate_by(b';');
    let record = records.next().expect("readable").expect("a record");
    assert_eq!((record.cells.len(), record.line), (2, 2));
    assert_eq!(records.next().expect("readable").expect("a record").line, 3);
}

/// A reader that hands out a few bytes at a time.
struct Trickle<'a>(&'a [u8], usize);

impl Read for Trickle<'_> {
    fn read(&mut self, into: &mut [u8]) -> io::Result<usize> {
        let length = self.1.min(self.0.len()).min(into.len());
        into[..length].copy_from_slice(&self.0[..length]);
        self.0 = &self.0[length..];
        Ok(length)
    }
}

proptest! {
    #[test]
    fn well_formed_tables_read_as_the_csv_crate_reads_them(text in "[ab,\"\r\n]{0,40}") {
        let mut oracle = csv::ReaderBuilder::new().has_headers(false).flexible(true).from_reader(text.as_bytes());
        let expected: Vec<Vec<String>> = oracle
            .records()
            .filter_map(Result::ok)
            .map(|record| record.iter().map(str::to_owned).collect())
            .collect();
        let mut records = Records::new(text.as_bytes());
        let mut found: Vec<Vec<String>> = Vec::new();
        loop {
            match records.next() {
                // What is refused here has no reading to compare.
                Err(_) => return Ok(()),
                Ok(None) => break,
                Ok(Some(record)) if record.flaw.is_some() => return Ok(()),
                Ok(Some(record)) if record.text.is_empty() => {}
                Ok(Some(record)) => {
                    let whole = |cell: &Cell| record.text[cell.start..cell.end].replace("\"\"", "\"");
                    let plain = |cell: &Cell| record.text[cell.start..cell.end].to_owned();
                    found.push(
                        record.cells.iter().map(|cell| if cell.doubled_quotes { whole(cell) } else { plain(cell) }).collect(),
                    );
                }
            }
        }
        prop_assert_eq!(found, expected);
    }

    #[test]
    fn blocks_do_not_show(text in "[ab,#\"\r\n]{0,40}", step in 1..5_usize) {
        let mut trickled = Records::new(Trickle(text.as_bytes(), step));
        let mut rows_trickled = Ok(Vec::new());
        while let Ok(rows) = &mut rows_trickled {
            match trickled.next() {
                Err(stopped) => rows_trickled = Err(format!("{} at line {}", stopped.fault, stopped.line)),
                Ok(None) => break,
                Ok(Some(record)) => {
                    rows.push((record.line, (0..record.cells.len()).map(|cell| record.cell(cell).into_owned()).collect()));
                }
            }
        }
        prop_assert_eq!(rows_trickled, rows(text.as_bytes(), b','));
    }
}
