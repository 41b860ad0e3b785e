//! Why a text is not the number that was wanted, in whole sentences.

use std::ops::Range;

use crate::quantity::dimension::UnitFault;
use crate::quantity::{Dimension, shortened};

/// Why a text is not the number that was wanted, and which bytes of it are to blame.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
#[error("{cause}")]
pub struct NumberFault {
    /// What is wrong.
    pub cause: Cause,
    /// Bytes of the text to underline; empty only where the text is.
    pub span: Range<usize>,
    /// What was wanted.
    pub dimension: Dimension,
}

/// What is wrong with a number.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum Cause {
    /// Nothing is written.
    #[error("there is no number")]
    Empty,
    /// It does not start like a number, or goes on unlike one.
    #[error("`{0}` is not a number")]
    NotANumber(String),
    /// NaN, infinity.
    #[error("`{0}` is not a finite number")]
    NotFinite(String),
    /// Beyond the greatest `f64`.
    #[error("`{0}` is too great to be represented")]
    TooGreat(String),
    /// Not zero, but nearer to zero than the least `f64`.
    #[error("`{0}` is too small to be told from zero")]
    TooSmall(String),
    /// A comma that may be a decimal mark or a thousands separator.
    #[error("`{text}` can be read as {} or as {}", .readings[0], .readings[1])]
    Ambiguous {
        /// What is written.
        text: String,
        /// Both readings, with a decimal point.
        readings: [String; 2],
    },
    /// Marks between digits that only can be thousands separators.
    #[error("`{text}` has separators between its digits")]
    Grouped {
        /// What is written.
        text: String,
        /// The same without them.
        plain: String,
    },
    /// The unit is wrong.
    #[error("{0}")]
    Unit(UnitFault),
    /// A prefix without a unit.
    #[error("`{0}` is a prefix without a unit")]
    PrefixAlone(String),
    /// A unit after the unit.
    #[error("`{0}` is more than one unit")]
    TwoUnits(String),
    /// The number needs a unit and has none.
    #[error("`{0}` has no unit")]
    UnitMissing(String),
    /// A letter code of IEC 60062 for another dimension.
    #[error("`{0}` is a letter code, which has no meaning here")]
    Code(String),
}

impl NumberFault {
    /// What was expected instead.
    pub fn expected(&self) -> String {
        let dimension = self.dimension;
        match &self.cause {
            Cause::Unit(fault) => fault.expected(),
            Cause::PrefixAlone(_) | Cause::TwoUnits(_) => format!("one unit: {}", dimension.usual_units()),
            Cause::UnitMissing(_) => format!("a unit of {}: {}", dimension.name(), dimension.usual_units()),
            Cause::Ambiguous { .. } | Cause::Grouped { .. } => "one decimal point, no other mark".to_owned(),
            Cause::TooGreat(_) | Cause::TooSmall(_) => "a number between 1e-300 and 1e300 in size".to_owned(),
            _ if dimension.is_dimensionless() => "a number".to_owned(),
            _ => format!("a number, such as {}", example(dimension)),
        }
    }

    /// What to do about it.
    pub fn help(&self) -> Option<String> {
        match &self.cause {
            Cause::Unit(fault) => fault.help(),
            Cause::Ambiguous { readings: [one, other], .. } => Some(format!("write `{one}` or `{other}`")),
            Cause::Grouped { plain, .. } => Some(format!("write `{plain}`")),
            Cause::PrefixAlone(prefix) => match self.dimension {
                dimension if dimension.is_dimensionless() => None,
                Dimension::Area | Dimension::Temperature => None,
                dimension => Some(format!("write `{prefix}{}`", dimension.base_unit())),
            },
            Cause::UnitMissing(text) => {
                Some(format!("write it with its unit, such as {}", with_unit(text, self.dimension)))
            }
            Cause::Code(..) if !self.dimension.is_dimensionless() => {
                Some(format!("write number and unit, such as {}", example(self.dimension)))
            }
            _ => None,
        }
    }
}

/// The part of a user's text that a message repeats.
pub(super) fn quoted(text: &str) -> String {
    shortened(text, 60)
}

fn with_unit(text: &str, dimension: Dimension) -> String {
    let unit = dimension.usual_units().split([',', ' ']).next().unwrap_or_default();
    format!("`{text} {unit}`")
}

/// A number with unit as it might stand in a file.
fn example(dimension: Dimension) -> &'static str {
    match dimension {
        Dimension::Voltage => "`24 V`",
        Dimension::Current => "`6 A`",
        Dimension::Resistance => "`4.7 mΩ`",
        Dimension::Charge => "`12 nC`",
        Dimension::Capacitance => "`22 µF`",
        Dimension::Inductance => "`4.7 µH`",
        Dimension::Frequency => "`400 kHz`",
        Dimension::Time => "`20 ns`",
        Dimension::Power => "`150 mW`",
        Dimension::Temperature => "`55 °C`",
        Dimension::TemperatureDifference => "`15 K`",
        Dimension::ThermalResistance => "`40 K/W`",
        Dimension::VoltageSlope => "`-1 mV/K`",
        Dimension::Length => "`5 mm`",
        Dimension::Area => "`12.5 mm²`",
        Dimension::Ratio => "`20 %`",
        Dimension::Plain => "`1.4`",
    }
}
