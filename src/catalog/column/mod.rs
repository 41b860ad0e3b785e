//! The one list of columns of each catalog: the reader, the help and the checks all follow it.

mod capacitors;
mod diodes;
mod identity;
mod inductors;
mod switches;

use crate::quantity::Dimension;

/// One of the four catalogs.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Catalog {
    /// Transistors.
    Switches,
    /// Diodes.
    Diodes,
    /// Inductors.
    Inductors,
    /// Capacitors.
    Capacitors,
}

impl Catalog {
    /// Every catalog.
    pub const ALL: [Self; 4] = [Self::Switches, Self::Diodes, Self::Inductors, Self::Capacitors];

    /// The name in words.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Switches => "switches",
            Self::Diodes => "diodes",
            Self::Inductors => "inductors",
            Self::Capacitors => "capacitors",
        }
    }

    /// The name of its file.
    pub const fn file_name(self) -> &'static str {
        match self {
            Self::Switches => "switches.csv",
            Self::Diodes => "diodes.csv",
            Self::Inductors => "inductors.csv",
            Self::Capacitors => "capacitors.csv",
        }
    }

    /// Its columns: what every catalog has, then what is its own.
    pub const fn columns(self) -> &'static [Column] {
        match self {
            Self::Switches => &switches::ALL,
            Self::Diodes => &diodes::ALL,
            Self::Inductors => &inductors::ALL,
            Self::Capacitors => &capacitors::ALL,
        }
    }

    /// The place of the column `name` in [`Catalog::columns`].
    ///
    /// # Panics
    /// When there is no such column. Readers call it in constants only, where a wrong name does not compile.
    pub(crate) const fn place(self, name: &str) -> usize {
        let columns = self.columns();
        let mut place = 0;
        while place < columns.len() {
            if same(columns[place].name.as_bytes(), name.as_bytes()) {
                return place;
            }
            place += 1;
        }
        panic!("no such column")
    }
}

const fn same(one: &[u8], other: &[u8]) -> bool {
    let mut at = 0;
    while at < one.len() && at < other.len() && one[at] == other[at] {
        at += 1;
    }
    at == one.len() && at == other.len()
}

/// Which numbers a column takes.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Range {
    /// Above zero.
    Positive,
    /// Zero or above.
    NonNegative,
    /// From 0 to below 1.
    Share,
    /// Above absolute zero, °C.
    Temperature,
    /// Above 25 °C, at which the cold values hold.
    AboveRoom,
    /// Any finite number.
    Any,
}

impl Range {
    /// Whether `value` is in it.
    pub fn holds(self, value: f64) -> bool {
        match self {
            Self::Positive => value > 0.0,
            Self::NonNegative => value >= 0.0,
            Self::Share => (0.0..1.0).contains(&value),
            Self::Temperature => value > -273.15,
            Self::AboveRoom => value > 25.0,
            Self::Any => true,
        }
    }

    /// The range in words, to stand after "expected".
    pub const fn words(self) -> &'static str {
        match self {
            Self::Positive => "a number above zero",
            Self::NonNegative => "zero or a number above it",
            Self::Share => "a share from 0 to below 1, or 0 % to below 100 %",
            Self::Temperature => "a temperature above absolute zero",
            Self::AboveRoom => "a temperature above 25 °C",
            Self::Any => "a finite number",
        }
    }
}

/// The test condition that a column's header may give behind `@`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Condition {
    /// What is given.
    pub dimension: Dimension,
    /// Which values make sense.
    pub range: Range,
    /// The condition of a column without one, in base units; `None` where one must be given.
    pub default: Option<f64>,
    /// The condition in words: `gate voltage`.
    pub words: &'static str,
}

/// What the cells of a column are.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Cells {
    /// Any text.
    Text,
    /// One of these words.
    Word(&'static [&'static str]),
    /// Numbers.
    Number {
        /// What they measure.
        dimension: Dimension,
        /// Which of them make sense.
        range: Range,
        /// The test condition, for columns that may stand once for each.
        condition: Option<Condition>,
    },
}

/// One column of a catalog.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Column {
    /// The quantity in a header.
    pub name: &'static str,
    /// What its cells are.
    pub cells: Cells,
    /// Whether each part needs a value.
    pub required: bool,
    /// What it means.
    pub meaning: &'static str,
    /// What is taken where it is missing; empty for a required column.
    pub default: &'static str,
}

impl Column {
    /// Its condition, if it has one.
    pub const fn condition(&self) -> Option<Condition> {
        match self.cells {
            Cells::Number { condition, .. } => condition,
            _ => None,
        }
    }

    /// What its numbers measure; `None` for texts and words.
    pub const fn dimension(&self) -> Option<Dimension> {
        match self.cells {
            Cells::Number { dimension, .. } => Some(dimension),
            _ => None,
        }
    }

    /// A header for it as one may write it: `on_resistance [mΩ] @ 4.5 V`.
    pub fn example(&self) -> String {
        let unit = match self.dimension() {
            None | Some(Dimension::Ratio | Dimension::Plain) => String::new(),
            Some(dimension) => format!(" [{}]", usual_unit(self.name, dimension)),
        };
        let condition = match self.condition().filter(|condition| condition.default.is_none()) {
            Some(Condition { dimension: Dimension::Voltage, .. }) => " @ 10 V",
            Some(Condition { dimension: Dimension::Current, .. }) => " @ 1 A",
            Some(Condition { dimension: Dimension::Frequency, .. }) => " @ 100 kHz",
            Some(_) => " @ 125 °C",
            None => "",
        };
        format!("{}{unit}{condition}", self.name)
    }
}

fn usual_unit(name: &str, dimension: Dimension) -> &'static str {
    match dimension {
        Dimension::Resistance if name == "gate_resistance" => "Ω",
        Dimension::Resistance => "mΩ",
        Dimension::Charge => "nC",
        Dimension::Inductance if name == "esl" => "nH",
        Dimension::Inductance => "µH",
        Dimension::Capacitance => "µF",
        Dimension::Frequency => "kHz",
        Dimension::Power => "mW",
        Dimension::VoltageSlope => "mV/K",
        Dimension::Length => "mm",
        Dimension::Current if name == "leakage" => "µA",
        other => other.base_unit(),
    }
}

/// A required column of numbers.
const fn needed(name: &'static str, dimension: Dimension, meaning: &'static str) -> Column {
    let cells = Cells::Number { dimension, range: Range::Positive, condition: None };
    Column { name, cells, required: true, meaning, default: "" }
}

/// An optional column of numbers.
const fn optional(
    name: &'static str,
    dimension: Dimension,
    range: Range,
    meaning: &'static str,
    default: &'static str,
) -> Column {
    Column { name, cells: Cells::Number { dimension, range, condition: None }, required: false, meaning, default }
}

/// The same column once for each test condition.
const fn at(column: Column, condition: Condition) -> Column {
    let cells = match column.cells {
        Cells::Number { dimension, range, .. } => Cells::Number { dimension, range, condition: Some(condition) },
        other => other,
    };
    Column { cells, ..column }
}

/// The columns of every catalog, then `own`.
const fn with_identity<const OWN: usize, const ALL: usize>(own: [Column; OWN]) -> [Column; ALL] {
    let mut all = [identity::COLUMNS[0]; ALL];
    let mut place = 0;
    while place < ALL {
        all[place] = if place < identity::COLUMNS.len() {
            identity::COLUMNS[place]
        } else {
            own[place - identity::COLUMNS.len()]
        };
        place += 1;
    }
    all
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_are_distinct_and_places_are_theirs() {
        for catalog in Catalog::ALL {
            for (place, column) in catalog.columns().iter().enumerate() {
                assert_eq!(catalog.place(column.name), place, "{} of {}", column.name, catalog.name());
            }
        }
    }

    #[test]
    fn every_column_says_what_it_means_and_what_is_taken_without_it() {
        for column in Catalog::ALL.into_iter().flat_map(Catalog::columns) {
            assert!(!column.meaning.is_empty(), "{}", column.name);
            assert_eq!(column.default.is_empty(), column.required, "{}", column.name);
        }
    }

    #[test]
    fn default_conditions_are_in_their_range() {
        for column in Catalog::ALL.into_iter().flat_map(Catalog::columns) {
            if let Some(Condition { range, default: Some(value), .. }) = column.condition() {
                assert!(range.holds(value), "{}", column.name);
            }
        }
    }
}
