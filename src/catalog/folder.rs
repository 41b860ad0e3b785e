//! All four catalogs, from a folder or from memory.

use std::fs::{self, File};
use std::io::{self, Read as _};
use std::path::Path;

use super::alias::{ALIAS_FILE, Aliases};
use super::column::Catalog;
use super::raw::{RawRow, RawTable};
use super::reading::{self, FromRow, Outcome};
use super::sheet;
use crate::fault::{Fault, Faults};
use crate::part::Parts;

/// `columns.toml` is not read beyond this, bytes.
const LONGEST_ALIAS_FILE: u64 = 1 << 20;

/// How catalogs are read.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub struct ReadOptions {
    /// Go on without bad rows: their errors become warnings.
    pub skip_bad: bool,
    /// Keep the cells as they are written.
    pub keep_rows: bool,
}

/// The cells of the four catalogs as they are written; empty unless they were asked for.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct RawTables {
    /// Of `switches.csv`.
    pub switches: RawTable,
    /// Of `diodes.csv`.
    pub diodes: RawTable,
    /// Of `inductors.csv`.
    pub inductors: RawTable,
    /// Of `capacitors.csv`.
    pub capacitors: RawTable,
}

impl RawTables {
    /// Those of one catalog.
    pub const fn of(&self, catalog: Catalog) -> &RawTable {
        match catalog {
            Catalog::Switches => &self.switches,
            Catalog::Diodes => &self.diodes,
            Catalog::Inductors => &self.inductors,
            Catalog::Capacitors => &self.capacitors,
        }
    }
}

/// What came of reading the catalogs.
#[derive(Debug, Clone, Default)]
pub struct Read {
    /// The parts of all good rows. With errors among the faults they are not to be ranked.
    pub parts: Parts,
    /// All that is wrong, in all files.
    pub faults: Faults,
    /// Bad rows that were left out: those of a run that skips them.
    pub skipped: usize,
    /// The cells as they are written, if they were asked for, in the order of the parts.
    pub rows: RawTables,
    /// Whether a file is there and the machine could not read it.
    pub machine_failed: bool,
}

/// Reads `switches.csv`, `diodes.csv`, `inductors.csv` and `capacitors.csv` in `folder`, and `columns.toml` if there is one. Where
/// a `.csv` is missing, the sheet of an `.xlsx`, `.xlsb` or `.ods` file of that name is read, or that sheet of `catalogs.xlsx`.
///
/// Without `diodes.csv` there are no diodes, which is a warning; another missing catalog is an error.
pub fn read_folder(folder: &Path, options: ReadOptions) -> Read {
    let mut all = All::new(options);
    if let Err(error) = fs::read_dir(folder) {
        all.read.machine_failed =
            error.kind() != io::ErrorKind::NotFound && error.kind() != io::ErrorKind::NotADirectory;
        let found = format!("the folder of catalogs cannot be read: {error}");
        let fault = Fault::of_file(&folder.display().to_string(), found, "a folder with four catalogs");
        all.read.faults.push(fault.with_help("`wattsieve starter DIR` writes one to begin from"));
        return all.read;
    }
    let alias_path = folder.join(ALIAS_FILE);
    all.aliases(&alias_path.display().to_string(), read_aliases(&alias_path));
    for catalog in Catalog::ALL {
        let path = folder.join(catalog.file_name());
        let file = path.display().to_string();
        match File::open(&path) {
            Ok(source) => all.catalog(catalog, &file, source),
            Err(error) if error.kind() == io::ErrorKind::NotFound => all.sheet_or_missing(folder, catalog, &file),
            Err(error) => all.unreadable(&file, &error),
        }
    }
    all.read
}

/// Reads catalogs that are held in memory: file names, such as `switches.csv`, and their bytes.
pub fn read_texts<'t>(files: impl IntoIterator<Item = (&'t str, &'t [u8])>, options: ReadOptions) -> Read {
    let files: Vec<_> = files.into_iter().collect();
    let find = |name: &str| files.iter().find(|(file, _)| *file == name).map(|(_, bytes)| *bytes);
    let mut all = All::new(options);
    all.aliases(ALIAS_FILE, Ok(find(ALIAS_FILE).unwrap_or_default().to_vec()));
    for catalog in Catalog::ALL {
        match find(catalog.file_name()) {
            Some(bytes) => all.catalog(catalog, catalog.file_name(), bytes),
            None => all.missing(catalog, catalog.file_name()),
        }
    }
    all.read
}

/// Reads one catalog without keeping it: each part goes to `sink` with its line.
pub fn for_each_part<P: FromRow>(file: &str, source: impl io::Read, mut sink: impl FnMut(P, usize)) -> Outcome {
    reading::read(file, source, &Aliases::default(), &mut |part, record| sink(part, record.line))
}

fn read_aliases(path: &Path) -> io::Result<Vec<u8>> {
    let mut bytes = Vec::new();
    match File::open(path) {
        Ok(file) => file.take(LONGEST_ALIAS_FILE + 1).read_to_end(&mut bytes)?,
        Err(error) if error.kind() == io::ErrorKind::NotFound => 0,
        Err(error) => return Err(error),
    };
    Ok(bytes)
}

/// Everything read so far.
struct All {
    options: ReadOptions,
    aliases: Aliases,
    read: Read,
}

impl All {
    fn new(options: ReadOptions) -> Self {
        Self { options, aliases: Aliases::default(), read: Read::default() }
    }

    fn aliases(&mut self, file: &str, bytes: io::Result<Vec<u8>>) {
        let bytes = match bytes {
            Ok(bytes) => bytes,
            Err(error) => return self.unreadable(file, &error),
        };
        if bytes.len() as u64 > LONGEST_ALIAS_FILE {
            self.read.faults.push(Fault::of_file(file, "the file is longer than a mebibyte", "a line for each header"));
            return;
        }
        match std::str::from_utf8(&bytes) {
            Ok(text) => self.aliases = Aliases::read(file, text, &mut self.read.faults),
            Err(error) => {
                let text = String::from_utf8_lossy(&bytes);
                let at = error.valid_up_to();
                let fault = Fault::in_text(file, &text, at..at + 1, "the bytes here are not UTF-8 text", "text");
                self.read.faults.push(fault.with_help("save the file in UTF-8"));
            }
        }
    }

    fn catalog(&mut self, catalog: Catalog, file: &str, source: impl io::Read) {
        match catalog {
            Catalog::Switches => {
                let (parts, rows) = self.parts(file, source);
                (self.read.parts.switches, self.read.rows.switches) = (parts, rows);
            }
            Catalog::Diodes => {
                let (parts, rows) = self.parts(file, source);
                (self.read.parts.diodes, self.read.rows.diodes) = (parts, rows);
            }
            Catalog::Inductors => {
                let (parts, rows) = self.parts(file, source);
                (self.read.parts.inductors, self.read.rows.inductors) = (parts, rows);
            }
            Catalog::Capacitors => {
                let (parts, rows) = self.parts(file, source);
                (self.read.parts.capacitors, self.read.rows.capacitors) = (parts, rows);
            }
        }
    }

    fn parts<P: FromRow>(&mut self, file: &str, source: impl io::Read) -> (Vec<P>, RawTable) {
        let keep = self.options.keep_rows;
        let (mut parts, mut lines, mut rows) = (Vec::new(), Vec::new(), Vec::new());
        let outcome = reading::read(file, source, &self.aliases, &mut |part: P, record| {
            parts.push(part);
            lines.push(record.line);
            if keep {
                rows.push(RawRow::new(record.line, (0..record.cells.len()).map(|place| record.cell(place))));
            }
        });
        let mut doubtful = lines.iter().map(|line| outcome.doubtful_lines.binary_search(line).is_ok());
        parts.retain(|_| !doubtful.next().unwrap_or(false));
        rows.retain(|row| outcome.doubtful_lines.binary_search(&row.line).is_err());
        let bad = outcome.bad_rows + (lines.len() - parts.len());
        self.read.machine_failed |= outcome.machine_failed;
        self.read.faults.append(outcome.file_faults);
        if self.options.skip_bad {
            self.read.skipped += bad;
            self.read.faults.append(outcome.row_faults.as_warnings());
        } else {
            self.read.faults.append(outcome.row_faults);
        }
        (parts, RawTable { headers: if keep { outcome.headers } else { Vec::new() }, rows })
    }

    /// Without a table of text: the sheet of a spreadsheet file.
    fn sheet_or_missing(&mut self, folder: &Path, catalog: Catalog, file: &str) {
        match sheet::find(folder, catalog) {
            None => self.missing(catalog, file),
            Some(Ok(sheet)) => self.catalog(catalog, &sheet.name, sheet.text.as_bytes()),
            Some(Err((file, why))) => {
                let found = format!("the spreadsheet cannot be read: {why}");
                let fault = Fault::of_file(&file, found, "an .xlsx, .xlsb or .ods file");
                self.read.faults.push(fault.with_help("save it anew, or export each sheet as CSV"));
            }
        }
    }

    fn missing(&mut self, catalog: Catalog, file: &str) {
        let fault = Fault::of_file(file, "the file is missing", format!("a catalog of {}", catalog.name()));
        self.read.faults.push(match catalog {
            Catalog::Diodes => fault.with_help("only switches are tried as rectifiers").as_warning(),
            _ => fault.with_help("`wattsieve starter DIR` writes one to begin from"),
        });
    }

    fn unreadable(&mut self, file: &str, error: &io::Error) {
        self.read.machine_failed = true;
        self.read.faults.push(Fault::of_file(file, format!("the file cannot be read: {error}"), "a readable file"));
    }
}
