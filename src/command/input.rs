//! What a command reads: the rail and the catalogs, from files or the built-in demo.

use std::io::Read;
use std::path::{Path, PathBuf};

use super::args::Common;
use super::failure::Failure;
use crate::catalog::{self, ReadOptions};
use crate::demo;
use crate::fault::{Faults, Severity};
use crate::rail::{self, Rail, Reading};

/// What a command is about: the text of a rail, and where the catalogs are.
#[derive(Debug)]
pub(super) struct Source {
    /// The rail's file as the user named it.
    pub name: String,
    /// Its text.
    pub text: String,
    /// The folder of the catalogs; `None` for the demo's.
    pub catalogs: Option<PathBuf>,
}

impl Source {
    /// The rail file and the catalogs of `--catalogs`, else those beside the rail file; without a rail file the demo's.
    pub(super) fn given(rail: Option<&Path>, common: &Common) -> Result<Self, Failure> {
        let (name, text) = match rail {
            Some(path) => (path.display().to_string(), text_of(path)?),
            None => (demo::RAIL_NAME.to_owned(), demo::RAIL_TEXT.to_owned()),
        };
        Ok(Self { name, text, catalogs: folder(rail, common) })
    }

    /// The typed rail.
    pub(super) fn rail(&self) -> Result<Reading, Faults> {
        rail::read(&self.name, &self.text)
    }
}

/// A file of this name is standard input or output.
pub(super) fn is_stream(path: &Path) -> bool {
    path.as_os_str() == "-"
}

/// Longest rail, stage or saved shortlist that is read, bytes: an endless stream is refused before it takes all memory.
const LONGEST_TEXT: u64 = 256 << 20;

/// The text of a file, or of standard input.
pub(super) fn text_of(path: &Path) -> Result<String, Failure> {
    let name = path.display().to_string();
    let mut bytes = Vec::new();
    let read = if is_stream(path) {
        std::io::stdin().take(LONGEST_TEXT + 1).read_to_end(&mut bytes)
    } else {
        std::fs::File::open(path).and_then(|file| file.take(LONGEST_TEXT + 1).read_to_end(&mut bytes))
    };
    read.map_err(|error| Failure::file("cannot read", &name, &error))?;
    if bytes.len() as u64 > LONGEST_TEXT {
        return Err(Failure::Usage(format!("{name} is longer than {} MiB", LONGEST_TEXT >> 20)));
    }
    String::from_utf8(bytes).map_err(|_| Failure::Usage(format!("{name} is not UTF-8 text: save it as UTF-8")))
}

/// The rail and the catalogs, all their faults told together.
pub(super) fn rail_and_catalogs(
    source: &Source,
    common: &Common,
    keep_rows: bool,
) -> Result<(Rail, catalog::Read), Failure> {
    let mut read = catalogs(source.catalogs.as_deref(), common, keep_rows);
    match source.rail().map(|reading| reading.rail) {
        Ok(rail) if !read.faults.has_errors() => {
            warn(&read, common);
            Ok((rail, read))
        }
        Ok(_) => Err(bad(read)),
        Err(mut faults) => {
            faults.append(std::mem::take(&mut read.faults));
            Err(Failure::Input(faults))
        }
    }
}

fn bad(read: catalog::Read) -> Failure {
    if read.machine_failed { Failure::MachineFaults(read.faults) } else { Failure::Input(read.faults) }
}

/// The catalogs in a folder, or the demo's.
pub(super) fn catalogs(folder: Option<&Path>, common: &Common, keep_rows: bool) -> catalog::Read {
    let options = ReadOptions { skip_bad: common.skip_bad, keep_rows };
    match folder {
        Some(folder) => catalog::read_folder(folder, options),
        None => {
            let files = demo::CATALOGS.iter().map(|(name, text)| (*name, text.as_bytes()));
            catalog::read_texts(files, options)
        }
    }
}

fn folder(rail: Option<&Path>, common: &Common) -> Option<PathBuf> {
    common.catalogs.clone().or_else(|| {
        let rail = rail?;
        match rail.parent() {
            Some(parent) if !is_stream(rail) && !parent.as_os_str().is_empty() => Some(parent.to_path_buf()),
            _ => Some(PathBuf::from(".")),
        }
    })
}

/// Tells what is doubtful but does not stop the run.
fn warn(read: &catalog::Read, common: &Common) {
    if common.quiet {
        return;
    }
    if read.faults.count(Severity::Warning) > 0 {
        anstream::eprint!("{}", read.faults.render(true));
    }
    if read.skipped > 0 {
        let rows = if read.skipped == 1 { "row" } else { "rows" };
        anstream::eprintln!("{} bad {rows} left out", read.skipped);
    }
}
