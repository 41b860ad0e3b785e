//! Decimal text, prefix and unit to the nearest `f64`.
//!
//! A number is a sign, digits with one decimal mark, an exponent and a unit with its prefix:
//! `4.7`, `-1e-3`, `4.7 mΩ`, `400kHz`, `20 %`. Blanks, the no-break ones too, may stand around it, before the unit, and
//! between groups of three digits. Letter codes of IEC 60062 (`4R7`, `R047`, `4n7`) are read where their letter has one meaning.
//! The value is the double nearest to the decimal number in base units: `4.7 mΩ` and `0.0047 Ω` are the same bits.

mod code;
mod decimal;
mod fault;
mod scan;

use fault::quoted;
pub use fault::{Cause, NumberFault};

use decimal::{Decimal, exact_scale, plain};
use scan::scan;

use std::ops::Range;

use super::dimension::UnitFault;
use super::spelling::PREFIXES;
use super::{Dimension, Unit};

/// Which decimal marks a text may use.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Mark {
    /// The point only; a comma is refused as ambiguous.
    Point,
    /// The point, or the comma; before a comma, points may group thousands.
    PointOrComma,
}

/// The number that `text` writes, in base units of `dimension`.
///
/// `bare` is the unit of a number written without one; without it such a number is refused, unless the dimension has no unit.
///
/// # Errors
/// When `text` is not one finite number with a unit of `dimension`, or is ambiguous.
pub fn parse(text: &str, dimension: Dimension, bare: Option<Unit>, mark: Mark) -> Result<f64, NumberFault> {
    let bare = bare.or_else(|| dimension.is_dimensionless().then_some(Unit::base(dimension)));
    if let Some(value) = bare.and_then(|unit| parse_plain(text.as_bytes(), unit)) {
        return Ok(value);
    }
    let fault = |cause, span| NumberFault { cause, span, dimension };
    let start = text.len() - text.trim_start().len();
    let written = text.trim();
    if written.is_empty() {
        return Err(fault(Cause::Empty, 0..text.len()));
    }
    let whole = start..start + written.len();
    if let Some(decimal) = code::read(written, dimension) {
        return finite(&decimal, written, dimension, whole);
    }
    let foreign_code = || fault(Cause::Code(quoted(written)), whole.clone());
    let (mut decimal, length) = scan(written, mark).map_err(|(cause, span)| match code::looks_like_one(written) {
        true => foreign_code(),
        false => fault(cause, start + span.start..start + span.end),
    })?;
    let rest = &written[length..];
    let unit_text = rest.trim_start();
    let unit_at = whole.end - unit_text.len();
    let unit = if unit_text.is_empty() {
        bare.ok_or_else(|| fault(Cause::UnitMissing(quoted(written)), whole.clone()))?
    } else {
        Unit::parse(unit_text, dimension).map_err(|refused| match code::looks_like_one(written) {
            true => foreign_code(),
            false => fault(unit_cause(written, unit_text, refused), unit_at..whole.end),
        })?
    };
    decimal.exponent += i64::from(unit.exponent);
    finite(&decimal, written, dimension, whole)
}

/// The number in `unit` that `text` writes, in base units, if it is digits with a point or without and easy to convert exactly:
/// the quick way for most cells of a table. `None` says nothing about `text`.
pub(crate) fn parse_plain(text: &[u8], unit: Unit) -> Option<f64> {
    let (negative, mantissa, exponent) = plain(text)?;
    let size = exact_scale(mantissa, exponent + i64::from(unit.exponent))?;
    Some(if negative { 0.0 - size } else { size })
}

/// The value of `decimal` if a double can tell it from zero and infinity.
fn finite(decimal: &Decimal, written: &str, dimension: Dimension, span: Range<usize>) -> Result<f64, NumberFault> {
    let value = decimal.value();
    let cause = if !value.is_finite() {
        Cause::TooGreat(quoted(written))
    } else if value == 0.0 && !decimal.is_zero() {
        Cause::TooSmall(quoted(written))
    } else {
        return Ok(value + 0.0);
    };
    Err(NumberFault { cause, span, dimension })
}

/// What is wrong with the text after the digits.
fn unit_cause(written: &str, unit: &str, refused: UnitFault) -> Cause {
    let mut letters = unit.chars();
    let kelvin = matches!(refused, UnitFault::WrongDimension { wanted: Dimension::Temperature, .. });
    if let (false, Some(letter), None) = (kelvin, letters.next(), letters.next())
        && PREFIXES.iter().any(|(prefix, _)| *prefix == letter)
    {
        return Cause::PrefixAlone(quoted(unit));
    }
    let is_unit = |word: &str| Dimension::ALL.into_iter().any(|other| Unit::parse(word, other).is_ok());
    if unit.split_whitespace().count() > 1 && unit.split_whitespace().all(is_unit) {
        return Cause::TwoUnits(quoted(unit));
    }
    let begins_like_a_unit =
        unit.starts_with(|first: char| first.is_alphabetic() || "°%\u{ba}\u{2103}".contains(first));
    if begins_like_a_unit && !unit.contains(|inside: char| inside.is_ascii_digit() && inside != '2') {
        return Cause::Unit(refused);
    }
    Cause::NotANumber(quoted(written))
}

#[cfg(test)]
mod tests;
