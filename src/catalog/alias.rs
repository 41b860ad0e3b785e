//! `columns.toml`: a user's own header texts and what they mean here.

use std::collections::HashMap;

use toml::de::{DeTable, DeValue};

use super::column::Catalog;
use super::header::{self, HeadingFault};
use crate::fault::{Fault, Faults};
use crate::quantity::{Mark, shortened};

/// The name of the file beside the catalogs.
pub const ALIAS_FILE: &str = "columns.toml";

/// Header texts of a user, each with ours; for all catalogs or for one.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub(super) struct Aliases {
    known: HashMap<(Option<Catalog>, String), String>,
}

impl Aliases {
    /// Reads the text of `columns.toml`: `"their header" = "our_quantity [unit] @ condition"`, for all catalogs or in a table
    /// named after one.
    pub(super) fn read(file: &str, text: &str, faults: &mut Faults) -> Self {
        let mut aliases = Self::default();
        let table = match DeTable::parse(text) {
            Ok(table) => table,
            Err(error) => {
                let span = error.span().unwrap_or(0..0);
                faults.push(Fault::in_text(file, text, span, error.message().to_owned(), "TOML").with_help(
                    "write one line for each header: \"their header\" = \"our_quantity [unit] @ condition\"",
                ));
                return aliases;
            }
        };
        let mut place = Place { file, text, faults };
        for (key, value) in table.get_ref() {
            let catalog = Catalog::ALL.into_iter().find(|catalog| catalog.name() == key.get_ref().as_ref());
            match (value.get_ref(), catalog) {
                (DeValue::Table(own), Some(catalog)) => {
                    for (key, value) in own {
                        aliases.add(Some(catalog), key.get_ref(), value.get_ref(), value.span(), &mut place);
                    }
                }
                (DeValue::Table(_), None) => {
                    let names = Catalog::ALL.map(Catalog::name).join(", ");
                    let found = format!("there is no catalog `{}`", shortened(key.get_ref(), 60));
                    place.refuse(key.span(), found, format!("one of {names}"), None);
                }
                (value_text, _) => aliases.add(None, key.get_ref(), value_text, value.span(), &mut place),
            }
        }
        aliases
    }

    /// Our header for the header `text` of a user.
    pub(super) fn find(&self, catalog: Catalog, text: &str) -> Option<&str> {
        if self.known.is_empty() {
            return None;
        }
        let text = plain(text);
        let own = self.known.get(&(Some(catalog), text.clone()));
        own.or_else(|| self.known.get(&(None, text))).map(String::as_str)
    }

    fn add(
        &mut self,
        catalog: Option<Catalog>,
        theirs: &str,
        ours: &DeValue<'_>,
        span: std::ops::Range<usize>,
        place: &mut Place<'_>,
    ) {
        let Some(ours) = ours.as_str() else {
            let found = format!("the header `{}` is not given a text", shortened(theirs, 60));
            place.refuse(span, found, "a header of ours in quotes".to_owned(), None);
            return;
        };
        match meaning(ours, catalog) {
            Ok(()) => {
                self.known.insert((catalog, plain(theirs)), ours.to_owned());
            }
            Err(HeadingFault::Unknown(near)) => {
                let help = near.map(|near| format!("did you mean `{near}`?"));
                place.refuse(
                    span,
                    format!("`{}` is no column", shortened(ours, 60)),
                    format!("a column of {}", catalog.map_or("a catalog", Catalog::name)),
                    help,
                );
            }
            Err(HeadingFault::Bad { found, expected, help, .. }) => place.refuse(span, found, expected, help),
        }
    }
}

/// Where faults of the file go.
struct Place<'a> {
    file: &'a str,
    text: &'a str,
    faults: &'a mut Faults,
}

impl Place<'_> {
    fn refuse(&mut self, span: std::ops::Range<usize>, found: String, expected: String, help: Option<String>) {
        self.faults.push(Fault::in_text(self.file, self.text, span, found, expected).with_help_if(help));
    }
}

/// Whether `ours` is a header of `catalog`, or of any catalog.
fn meaning(ours: &str, catalog: Option<Catalog>) -> Result<(), HeadingFault> {
    let mut first = None;
    for candidate in Catalog::ALL.into_iter().filter(|candidate| catalog.is_none_or(|only| only == *candidate)) {
        match header::read(ours, candidate, Mark::Point) {
            Ok(_) => return Ok(()),
            Err(bad @ HeadingFault::Bad { .. }) => first = Some(bad),
            Err(unknown @ HeadingFault::Unknown(Some(_))) if first.is_none() => first = Some(unknown),
            Err(_) => {}
        }
    }
    Err(first.unwrap_or(HeadingFault::Unknown(None)))
}

/// The text with single blanks.
fn plain(text: &str) -> String {
    text.split_whitespace().collect::<Vec<_>>().join(" ")
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read(text: &str) -> (Aliases, String) {
        let mut faults = Faults::new();
        let aliases = Aliases::read("columns.toml", text, &mut faults);
        (aliases, faults.render(false))
    }

    #[test]
    fn headers_are_found_for_all_catalogs_or_one() {
        let (aliases, faults) = read(
            "\"RDS(on) max 10V\" = \"on_resistance_max [mΩ] @ 10 V\"\nVr = \"voltage_rating [V]\"\n[diodes]\nVr = \"voltage_rating [mV]\"\n",
        );
        assert_eq!(faults, "");
        assert_eq!(aliases.find(Catalog::Switches, " RDS(on)  max 10V "), Some("on_resistance_max [mΩ] @ 10 V"));
        assert_eq!(aliases.find(Catalog::Switches, "Vr"), Some("voltage_rating [V]"));
        assert_eq!(aliases.find(Catalog::Diodes, "Vr"), Some("voltage_rating [mV]"));
        assert_eq!(aliases.find(Catalog::Diodes, "vr"), None);
    }

    #[test]
    fn wrong_entries_are_shown() {
        let (_, faults) = read("a = \"gate_chrge [nC] @ 5 V\"\nb = 5\nc = \"dcr [nC]\"\n");
        for part in [
            "columns.toml:1:5: error: `gate_chrge [nC] @ 5 V` is no column",
            "did you mean `gate_charge [nC] @ 10 V`?",
            "columns.toml:2:5: error: the header `b` is not given a text",
            "columns.toml:3:5: error: the header `dcr [nC]`: `nC` is a unit of charge, not of resistance",
        ] {
            assert!(faults.contains(part), "{part}\n{faults}");
        }
        assert!(read("a = \n").1.starts_with("columns.toml:1:"));
    }
}
