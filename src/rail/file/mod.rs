//! The rail file: TOML text to a [`Rail`], with every fault of the text in one go.

mod broken;
mod drive;
mod frequency;
mod limits;
mod load;
mod nearest;
mod number;
mod parts;
mod reader;
mod stage;
mod supply;
mod syntax;
mod unknown;
mod words;

use self::reader::{Reader, Remark};
use super::defaults::NAME;
use super::origin::Entry;
use super::typed::Rail;
use crate::fault::{FAULTS_SHOWN, Fault, Faults};

/// A rail file as understood.
#[derive(Debug, Clone, PartialEq)]
pub struct Reading {
    /// The rail.
    pub rail: Rail,
    /// Every key in the order of the file format, its value and where it comes from.
    pub entries: Vec<Entry>,
}

/// Reads a rail file; `name` is what the user called it, `-` for standard input.
///
/// # Errors
/// Every fault of the text, each at its line and column: grammar, unknown keys, wrong types and units, values out of
/// range, keys that are missing and values that do not go together. Where the grammar is broken, keys and relations
/// that the broken lines may explain are left for the next run.
pub fn read(name: &str, text: &str) -> Result<Reading, Faults> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    if let Some(remark) = syntax::too_long(text) {
        return Err(faults(name, text, vec![remark]));
    }
    let (document, broken) = syntax::parse(text);
    let mut reader = Reader::new(text, &document);
    unknown::refuse_unknown(&mut reader);
    let rail = rail(&mut reader);
    let Reader { remarks, entries, .. } = reader;
    match rail {
        Some(rail) if remarks.is_empty() && broken.is_empty() => Ok(Reading { rail, entries }),
        _ => Err(faults(name, text, broken.with(remarks))),
    }
}

/// The sections in the order of the file format; each reads all of itself before it gives up.
fn rail(reader: &mut Reader<'_>) -> Option<Rail> {
    let name = reader.text(&NAME);
    let input = supply::input(reader);
    let output = supply::output(reader);
    let ambient_c = supply::ambient_c(reader);
    let drive = drive::drive(reader);
    let range = stage::range(reader);
    let loads = load::loads(reader);
    let limits = limits::limits(reader);
    let worth = limits::worth(reader);
    let parts = parts::parts(reader);
    let (pins, bans) = parts?;
    Some(Rail {
        name: name?,
        input: input?,
        output: output?,
        ambient_c: ambient_c?,
        drive: drive?,
        range: range?,
        loads: loads?,
        limits: limits?,
        worth: worth?,
        pins,
        bans,
    })
}

/// Remarks with lines and columns, in the order of the text; those beyond what is shown of a file are only counted.
fn faults(name: &str, text: &str, mut remarks: Vec<Remark>) -> Faults {
    remarks.sort_by_key(|remark| remark.span.as_ref().map(|span| (span.start, span.end)));
    let beyond = remarks.len().saturating_sub(FAULTS_SHOWN);
    let mut faults = Faults::new();
    for remark in remarks.into_iter().take(FAULTS_SHOWN) {
        let fault = match remark.span {
            Some(span) => Fault::in_text(name, text, span, remark.found, remark.expected),
            None => Fault::of_file(name, remark.found, remark.expected),
        };
        faults.push(fault.with_help_if(remark.help));
    }
    let last = faults.errors().last().cloned();
    for fault in last.into_iter().cycle().take(beyond) {
        faults.push(fault);
    }
    faults
}

#[cfg(test)]
mod chance;
#[cfg(test)]
mod tests;
