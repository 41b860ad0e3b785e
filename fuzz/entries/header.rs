//! Any text as the header of a catalog, above one row of numbers.

use wattsieve::catalog::{Catalog, ReadOptions, read_texts};

/// The first byte picks the catalog, the second the separator; the rest is the header.
pub fn run(data: &[u8]) {
    let [pick, separator, header @ ..] = data else { return };
    let catalog = Catalog::ALL[usize::from(*pick) % Catalog::ALL.len()];
    let separator = [b',', b';', b'\t'][usize::from(*separator) % 3];
    let columns = 1 + header.iter().filter(|byte| **byte == separator).count();
    let mut text = header.to_vec();
    for column in 0..columns {
        text.push(if column == 0 { b'\n' } else { separator });
        text.extend_from_slice(if column % 3 == 2 { b"4.7e-3" } else { b"12" });
    }
    let aliases = format!("\"{}\" = \"part\"", String::from_utf8_lossy(header).escape_default());
    let files = [(catalog.file_name(), text.as_slice()), ("columns.toml", aliases.as_bytes())];
    let read = read_texts(files, ReadOptions { skip_bad: true, keep_rows: true });
    let _ = read.faults.render(true);
}
