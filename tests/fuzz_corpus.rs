//! The entries of the fuzz targets, run over their small committed corpus: what a fuzz run once found stays found.

use std::fs;
use std::path::Path;

#[path = "../fuzz/entries/account.rs"]
mod account;
#[path = "../fuzz/entries/catalog.rs"]
mod catalog;
#[path = "../fuzz/entries/header.rs"]
mod header;
#[path = "../fuzz/entries/number.rs"]
mod number;
#[path = "../fuzz/entries/rail.rs"]
mod rail;

fn replay(target: &str, run: fn(&[u8])) {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("fuzz/seeds").join(target);
    let mut files: Vec<_> =
        fs::read_dir(folder).expect("a corpus").map(|entry| entry.expect("an entry").path()).collect();
    files.sort();
    assert!(files.len() >= 5, "{target}: {} files", files.len());
    for file in files {
        // Names the file should it fail.
        eprintln!("{}", file.display());
        run(&fs::read(&file).expect("a file of the corpus"));
    }
}

#[test]
fn numbers() {
    replay("number", number::run);
}

#[test]
fn headers() {
    replay("header", header::run);
}

#[test]
fn catalogs() {
    replay("catalog", catalog::run);
}

#[test]
fn rails() {
    replay("rail", rail::run);
}

#[test]
fn accounts() {
    replay("account", account::run);
}
