//! Any bytes as one of the four catalogs: parts that are valid, or faults that can be shown.

use wattsieve::catalog::{Catalog, ReadOptions, read_texts};
use wattsieve::demo;

/// The first byte picks the catalog and the options; the rest is the file, beside the demo's other catalogs.
pub fn run(data: &[u8]) {
    let [pick, bytes @ ..] = data else { return };
    let catalog = Catalog::ALL[usize::from(*pick) % Catalog::ALL.len()];
    let options = ReadOptions { skip_bad: pick & 64 == 64, keep_rows: pick & 128 == 128 };
    let mut files = vec![(catalog.file_name(), bytes)];
    files.extend(
        demo::CATALOGS.iter().filter(|(name, _)| *name != catalog.file_name()).map(|(name, _)| (*name, &b"part\n"[..])),
    );
    let read = read_texts(files, options);
    let shown = read.faults.render(false);
    assert!(shown.chars().all(|letter| letter == '\n' || !letter.is_control()), "{shown:?}");
    let parts = format!("{:?}", read.parts);
    assert!(!parts.contains(": NaN") && !parts.contains("(NaN") && !parts.contains("inf)"), "{parts}");
}
