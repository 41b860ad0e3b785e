//! The grammar of a header cell: `quantity [unit] @ condition`.

use super::column::{Catalog, Cells, Column};
use crate::fault::nearest;
use crate::quantity::number::parse;
use crate::quantity::{Mark, Unit, shortened};

/// What a header cell says about the cells below it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Heading {
    /// Place in the columns of the catalog.
    pub column: usize,
    /// Unit of numbers without one; `None` where each must carry its own.
    pub unit: Option<Unit>,
    /// Test condition in base units, the default one too; `None` for columns without conditions.
    pub condition: Option<f64>,
    /// Whether the header writes the condition, which then wins over a plain column at the same one.
    pub explicit: bool,
}

/// Why a header cell means nothing.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum HeadingFault {
    /// The catalog has no such quantity; a header for the nearest one it has.
    Unknown(Option<String>),
    /// The quantity is known, and what stands with it is wrong.
    Bad {
        /// Place of the quantity.
        column: usize,
        found: String,
        expected: String,
        help: Option<String>,
    },
}

/// Quantity, unit and condition of a header as they are written.
struct Written<'t> {
    name: &'t str,
    unit: Option<&'t str>,
    condition: Option<&'t str>,
    /// Text that belongs to none of them.
    stray: bool,
}

/// What the header cell `text` of `catalog` means.
pub(super) fn read(text: &str, catalog: Catalog, mark: Mark) -> Result<Heading, HeadingFault> {
    let written = split(text);
    let place = find(written.name, catalog).ok_or_else(|| HeadingFault::Unknown(suggestion(text, catalog)))?;
    let column = &catalog.columns()[place];
    let bad = |found, expected, help| HeadingFault::Bad { column: place, found, expected, help };
    let example = || format!("a header such as `{}`", column.example());
    if written.stray {
        return Err(bad(format!("the header `{}` has text out of place", cut(text)), example(), None));
    }
    let Cells::Number { dimension, condition, .. } = column.cells else {
        if written.unit.is_some() || written.condition.is_some() {
            let found = format!("the header `{}` has a unit or a condition, and `{}` is text", cut(text), column.name);
            return Err(bad(found, format!("`{}`", column.name), None));
        }
        return Ok(Heading { column: place, unit: None, condition: None, explicit: false });
    };
    let unit = match written.unit {
        None | Some("") if dimension.is_dimensionless() => Some(Unit::base(dimension)),
        None | Some("") => None,
        Some("-" | "1") if dimension.is_dimensionless() => Some(Unit::base(dimension)),
        Some(money) if column.name == "cost" && is_money(money) => Some(Unit::base(dimension)),
        Some(unit) => Some(
            Unit::parse(unit, dimension)
                .map_err(|fault| bad(format!("the header `{}`: {fault}", cut(text)), fault.expected(), fault.help()))?,
        ),
    };
    let given = match (written.condition, condition) {
        (None, None) => None,
        (Some(_), None) => {
            let found = format!("the header `{}` has a condition, and `{}` takes none", cut(text), column.name);
            return Err(bad(found, example(), None));
        }
        (None, Some(condition)) => match condition.default {
            Some(default) => Some(default),
            None => {
                let found = format!("the header `{}` does not say at which condition", cut(text));
                return Err(bad(
                    found,
                    format!("{} behind `@`", condition.words),
                    Some(format!("write `{}`", column.example())),
                ));
            }
        },
        (Some(text_of_it), Some(condition)) => {
            let value = parse(text_of_it, condition.dimension, None, mark)
                .map_err(|fault| bad(format!("the header `{}`: {fault}", cut(text)), fault.expected(), fault.help()))?;
            if !condition.range.holds(value) {
                let found = format!("the header `{}` has a condition that cannot be", cut(text));
                return Err(bad(found, condition.range.words().to_owned(), None));
            }
            Some(value)
        }
    };
    Ok(Heading { column: place, unit, condition: given, explicit: written.condition.is_some() })
}

/// The condition of a header cell as it is written.
pub(super) fn condition_text(text: &str) -> Option<&str> {
    split(text).condition
}

fn split(text: &str) -> Written<'_> {
    let (before, condition) = match text.split_once('@') {
        Some((before, condition)) => (before, Some(condition.trim())),
        None => (text, None),
    };
    match before.split_once('[') {
        Some((name, rest)) => match rest.split_once(']') {
            Some((unit, behind)) => {
                Written { name: name.trim(), unit: Some(unit.trim()), condition, stray: !behind.trim().is_empty() }
            }
            None => Written { name: name.trim(), unit: Some(rest.trim()), condition, stray: true },
        },
        None => Written { name: before.trim(), unit: None, condition, stray: false },
    }
}

/// The place of the column called `name`, its case ignored; blanks and hyphens count as underscores.
fn find(name: &str, catalog: Catalog) -> Option<usize> {
    let folded = |letter: char| if matches!(letter, ' ' | '-') { '_' } else { letter.to_ascii_lowercase() };
    catalog.columns().iter().position(|column| name.chars().map(folded).eq(column.name.chars()))
}

/// A header for the known quantity nearest to the unknown header `text`, with the unit of `text` where it fits.
fn suggestion(text: &str, catalog: Catalog) -> Option<String> {
    let name = text.split(['[', '(', '@', ',']).next().unwrap_or_default();
    let name = nearest(name, catalog.columns().iter().map(|column| column.name))?;
    let column = catalog.columns().iter().find(|column| column.name == name)?;
    Some(with_unit_of(text, column).unwrap_or_else(|| column.example()))
}

fn with_unit_of(text: &str, column: &Column) -> Option<String> {
    let (_, rest) = text.split_once(['[', '('])?;
    let (unit, _) = rest.split_once([']', ')'])?;
    let fits = column.dimension().is_some_and(|dimension| Unit::parse(unit, dimension).is_ok());
    (fits && column.condition().is_none()).then(|| format!("{} [{}]", column.name, unit.trim()))
}

fn is_money(unit: &str) -> bool {
    let code = unit.len() == 3 && unit.bytes().all(|byte| byte.is_ascii_uppercase());
    code || matches!(unit, "$" | "€" | "£" | "¥")
}

fn cut(text: &str) -> String {
    shortened(text, 80)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn heading(text: &str) -> Result<Heading, HeadingFault> {
        read(text, Catalog::Switches, Mark::Point)
    }

    fn at(name: &str, exponent: Option<i32>, condition: Option<f64>) -> Heading {
        let column = Catalog::Switches.place(name);
        let dimension = Catalog::Switches.columns()[column].dimension();
        let unit = exponent.zip(dimension).map(|(exponent, dimension)| Unit { dimension, exponent });
        Heading { column, unit, condition, explicit: false }
    }

    #[test]
    fn quantity_unit_and_condition() {
        let cases = [
            ("part", at("part", None, None)),
            ("on_resistance [mΩ] @ 4.5 V", at("on_resistance", Some(-3), Some(4.5))),
            ("On_Resistance[mohm]@4500 mV", at("on_resistance", Some(-3), Some(4.5))),
            ("gate charge @ 10V", at("gate_charge", None, Some(10.0))),
            ("output_charge [nC]", at("output_charge", Some(-9), Some(12.0))),
            ("hot_resistance_ratio", at("hot_resistance_ratio", Some(0), Some(125.0))),
            ("hot_resistance_ratio [%] @ 100 °C", at("hot_resistance_ratio", Some(-2), Some(100.0))),
            ("cost [EUR]", at("cost", Some(0), None)),
            ("area [cm²]", at("area", Some(2), None)),
        ];
        for (text, expected) in cases {
            let expected = Heading { explicit: text.contains('@'), ..expected };
            assert_eq!(heading(text), Ok(expected), "{text}");
        }
    }

    #[test]
    fn every_example_is_a_header() {
        for catalog in Catalog::ALL {
            for (place, column) in catalog.columns().iter().enumerate() {
                let read = read(&column.example(), catalog, Mark::Point);
                assert!(matches!(read, Ok(Heading { column, .. }) if column == place), "{read:?}");
            }
        }
    }

    #[test]
    fn unknown_headers_get_the_nearest_known_one() {
        let suggested = |text| match heading(text) {
            Err(HeadingFault::Unknown(suggestion)) => suggestion,
            other => panic!("{text}: {other:?}"),
        };
        assert_eq!(suggested("gate_drain_charg (pC)").as_deref(), Some("gate_drain_charge [pC]"));
        assert_eq!(suggested("on_resistence [mΩ]").as_deref(), Some("on_resistance [mΩ] @ 10 V"));
        assert_eq!(suggested("shelf"), None);
    }

    #[test]
    fn wrong_units_and_conditions_are_bad() {
        for text in [
            "on_resistance [nC] @ 10 V",
            "on_resistance [mΩ]",
            "on_resistance [mΩ] @ 10",
            "on_resistance [mΩ] @ 10 A",
            "on_resistance [mΩ] @ -1 V",
            "hot_resistance_ratio @ 25 °C",
            "gate_drain_charge [nC] @ 10 V",
            "on_resistance [mΩ @ 10 V",
            "on_resistance [mΩ] typical @ 10 V",
            "maker [V]",
        ] {
            assert!(matches!(heading(text), Err(HeadingFault::Bad { .. })), "{text}");
        }
    }
}
