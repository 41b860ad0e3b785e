//! Catalogs kept in a spreadsheet file read like those kept as text.

use std::path::Path;

use wattsieve::catalog::{ReadOptions, read_folder, read_texts};
use wattsieve::demo;

/// `sheets/catalogs.xlsx` holds the demo's catalogs as they were when it was made by a spreadsheet library, a sheet each.
#[test]
fn a_workbook_reads_like_the_texts_it_was_made_from() {
    let sheets = read_folder(&Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/sheets"), ReadOptions::default());
    let texts = demo::CATALOGS.iter().map(|(name, text)| (*name, text.as_bytes()));
    let texts = read_texts(texts, ReadOptions::default());
    assert!(sheets.faults.is_empty(), "{}", sheets.faults.render(false));
    assert_eq!(sheets.parts.switches, texts.parts.switches);
    assert_eq!(sheets.parts.diodes, texts.parts.diodes);
    assert_eq!(sheets.parts.inductors, texts.parts.inductors);
    assert_eq!(sheets.parts.capacitors, texts.parts.capacitors);
}

#[test]
fn a_file_that_is_no_workbook_is_an_error_with_its_name() {
    let folder = tempfile::tempdir().expect("a folder");
    std::fs::write(folder.path().join("switches.xlsx"), b"not a workbook").expect("a file");
    let read = read_folder(folder.path(), ReadOptions::default());
    let told = read.faults.render(false);
    assert!(told.contains("switches.xlsx: error: the spreadsheet cannot be read"), "{told}");
}
