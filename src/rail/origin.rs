//! What the reader understood: every key, its value and where it comes from.

use serde::Serialize;

use crate::quantity::Dimension;

/// Where a value comes from.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Origin {
    /// Written in the file.
    Written {
        /// Line, from 1.
        line: usize,
    },
    /// Not written: the default holds.
    Default {
        /// Why this is the default.
        reason: &'static str,
    },
}

/// A value in the unit of its key.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(untagged)]
pub enum Value {
    /// No value: the limit or check does not exist.
    Nothing,
    /// A number.
    Number(f64),
    /// Several numbers.
    Numbers(Vec<f64>),
    /// A count.
    Count(u32),
    /// A word or a name.
    Text(String),
    /// Several words or names.
    Texts(Vec<String>),
}

/// One key as understood.
#[derive(Debug, Clone, PartialEq)]
pub struct Entry {
    /// Sections and name, joined by points; loads are numbered from 1: `load[1].current`.
    pub key: String,
    /// Its value.
    pub value: Value,
    /// Unit of the value; `None` for words, counts, ratios and money.
    pub unit: Option<&'static str>,
    /// What it measures; `None` for words and counts, and for what is worth so much a unit.
    pub dimension: Option<Dimension>,
    /// Where it comes from.
    pub origin: Origin,
}
