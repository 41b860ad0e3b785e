//! What a key of the rail file is.

use crate::quantity::Dimension;

/// Which numbers a key takes.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Bounds {
    /// Above zero.
    AboveZero,
    /// Zero or above.
    ZeroOrMore,
    /// Above zero, at most one.
    UpToOne,
    /// Above zero, below one.
    BelowOne,
    /// One or above.
    OneOrMore,
    /// Above absolute zero, at most the 500 °C up to which temperatures are solved.
    Celsius,
}

impl Bounds {
    /// Whether a finite number is within.
    pub fn hold(self, value: f64) -> bool {
        match self {
            Self::AboveZero => value > 0.0,
            Self::ZeroOrMore => value >= 0.0,
            Self::UpToOne => value > 0.0 && value <= 1.0,
            Self::BelowOne => value > 0.0 && value < 1.0,
            Self::OneOrMore => value >= 1.0,
            Self::Celsius => value > -273.15 && value <= 500.0,
        }
    }

    /// The bounds in words.
    pub const fn words(self) -> &'static str {
        match self {
            Self::AboveZero => "above zero",
            Self::ZeroOrMore => "of zero or above",
            Self::UpToOne => "above 0 and at most 1 (100 %)",
            Self::BelowOne => "above 0 and below 1 (100 %)",
            Self::OneOrMore => "of 1 or above",
            Self::Celsius => "above −273.15 °C and at most 500 °C",
        }
    }
}

/// What may be written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Kind {
    /// A number of a dimension, within bounds.
    Number(Dimension, Bounds),
    /// The same, or `"none"`.
    NumberOrNone(Dimension, Bounds),
    /// A whole number from 1 to the greatest.
    Count(u32),
    /// One of these words.
    Word(&'static [&'static str]),
    /// One or several of these words, in a list or alone.
    Words(&'static [&'static str]),
    /// The user's own words.
    Text,
    /// One or several part names, in a list or alone.
    Names,
    /// A plain number at or above zero for one unit of something, in this unit.
    Rate(Option<&'static str>),
    /// Where the gate supply comes from: a word or an efficiency.
    Supply,
    /// One frequency, a list of them, or `{ from, to, steps }`.
    Frequencies,
}

/// What holds when a key is not written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Preset {
    /// Nothing: the key must be written.
    Required,
    /// A number in the unit of the key.
    Number(f64),
    /// A count.
    Count(u32),
    /// A word.
    Word(&'static str),
    /// Several words.
    Words(&'static [&'static str]),
    /// So many times another value of the rail.
    Times(f64),
    /// No value: the limit or check does not exist.
    Nothing,
}

/// One key of the rail file.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Key {
    /// Sections and name, joined by points.
    pub path: &'static str,
    /// What may be written.
    pub kind: Kind,
    /// What holds without it.
    pub preset: Preset,
    /// Why that holds; empty for a key that must be written.
    pub reason: &'static str,
    /// What it means.
    pub meaning: &'static str,
}

impl Key {
    /// A key that must be written.
    pub(super) const fn required(path: &'static str, kind: Kind, meaning: &'static str) -> Self {
        Self { path, kind, preset: Preset::Required, reason: "", meaning }
    }

    /// A key without which `preset` holds, for `reason`.
    pub(super) const fn or(
        path: &'static str,
        kind: Kind,
        preset: Preset,
        reason: &'static str,
        meaning: &'static str,
    ) -> Self {
        Self { path, kind, preset, reason, meaning }
    }

    /// The key without its sections.
    pub fn name(&self) -> &'static str {
        self.path.rsplit_once('.').map_or(self.path, |(_, name)| name)
    }

    /// The sections without the key; empty at the top.
    pub fn section(&self) -> &'static str {
        self.path.rsplit_once('.').map_or("", |(section, _)| section)
    }

    /// What it measures; `None` for words and counts, and for what is worth so much a unit.
    pub const fn dimension(&self) -> Option<Dimension> {
        match self.kind {
            Kind::Number(dimension, _) | Kind::NumberOrNone(dimension, _) => Some(dimension),
            Kind::Frequencies => Some(Dimension::Frequency),
            _ => None,
        }
    }

    /// The unit of the value that the rail holds; `None` for words, counts, ratios and money.
    pub fn unit(&self) -> Option<&'static str> {
        match self.kind {
            Kind::Rate(unit) => unit,
            _ => self.dimension().filter(|dimension| !dimension.is_dimensionless()).map(Dimension::base_unit),
        }
    }
}
