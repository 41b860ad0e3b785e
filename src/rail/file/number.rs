//! Numbers with units, from strings and bare numbers, within the bounds of their key.

use toml::de::DeValue;

use super::reader::{Node, Reader, kind_of};
use crate::quantity::number::parse;
use crate::quantity::{Dimension, Mark, NonNegative, Positive, Unit};
use crate::rail::defaults::{Bounds, Key, Kind, Preset};
use crate::rail::origin::Value;

/// Every answer is `None` once a fault is reported for its key; a second `None` is a value that does not exist.
impl<'t> Reader<'t> {
    /// A number above zero that always has a value.
    pub(super) fn positive(&mut self, key: &Key) -> Option<Positive> {
        self.number(key, None).flatten().and_then(Positive::new)
    }

    /// A number at or above zero that always has a value.
    pub(super) fn non_negative(&mut self, key: &Key) -> Option<NonNegative> {
        self.number(key, None).flatten().and_then(NonNegative::new)
    }

    /// A temperature, °C.
    pub(super) fn celsius(&mut self, key: &Key) -> Option<f64> {
        self.number(key, None).flatten()
    }

    /// A number above zero that may be absent.
    pub(super) fn optional(&mut self, key: &Key) -> Option<Option<Positive>> {
        Some(self.number(key, None)?.and_then(Positive::new))
    }

    /// A number above zero that follows from `base` where it is not written, and may be `"none"`.
    pub(super) fn following(&mut self, key: &Key, base: Option<Positive>) -> Option<Option<Positive>> {
        Some(self.number(key, base)?.and_then(Positive::new))
    }

    fn number(&mut self, key: &Key, base: Option<Positive>) -> Option<Option<f64>> {
        let Some(node) = self.find(key.path) else {
            return self.unwritten(key, base);
        };
        if matches!(key.kind, Kind::NumberOrNone(..)) && node.get_ref().as_str() == Some("none") {
            self.written(key, Value::Nothing, node.span().start);
            return Some(None);
        }
        let value = self.value(key, node)?;
        self.written(key, Value::Number(value), node.span().start);
        Some(Some(value))
    }

    fn unwritten(&mut self, key: &Key, base: Option<Positive>) -> Option<Option<f64>> {
        let value = match key.preset {
            Preset::Number(value) => Some(value),
            Preset::Times(times) => Some(base?.get() * times),
            Preset::Required => {
                self.missing(key);
                return None;
            }
            _ => None,
        };
        self.default(key, value.map_or(Value::Nothing, Value::Number));
        Some(value)
    }

    /// A number of the dimension of `key`, in the unit that the rail keeps it in, within the bounds of `key`.
    pub(super) fn value(&mut self, key: &Key, node: Node<'t>) -> Option<f64> {
        self.value_of(key.path, key.kind, node)
    }

    /// The same for a path that stands for several keys.
    pub(super) fn value_of(&mut self, path: &str, kind: Kind, node: Node<'t>) -> Option<f64> {
        let (dimension, bounds) = match kind {
            Kind::Number(dimension, bounds) | Kind::NumberOrNone(dimension, bounds) => (dimension, bounds),
            Kind::Rate(_) => (Dimension::Plain, Bounds::ZeroOrMore),
            Kind::Supply => (Dimension::Ratio, Bounds::UpToOne),
            _ => (Dimension::Frequency, Bounds::AboveZero),
        };
        let value = self.quantity(path, dimension, node)?;
        if bounds.hold(value) {
            return Some(value);
        }
        let found = format!("`{path}` is {}", self.source(node));
        let expected = format!("a number {}", bounds.words());
        let below_one = matches!(bounds, Bounds::UpToOne | Bounds::BelowOne);
        if below_one && (2.0..=100.0).contains(&value) && !self.source(node).contains('%') {
            let help = format!("write \"{} %\" for per cent", self.source(node));
            self.refuse_with(node.span(), found, expected, help);
        } else {
            self.refuse(node.span(), found, expected);
        }
        None
    }

    /// A number of a dimension; bare numbers are in base units, but a length or an area must carry its unit.
    fn quantity(&mut self, path: &str, dimension: Dimension, node: Node<'t>) -> Option<f64> {
        let base = Some(Unit::base(dimension)).filter(|_| !matches!(dimension, Dimension::Length | Dimension::Area));
        let read = match node.get_ref() {
            DeValue::String(text) => parse(text, dimension, None, Mark::Point),
            DeValue::Integer(number) => parse(&decimal(number.as_str(), number.radix()), dimension, base, Mark::Point),
            DeValue::Float(number) => parse(number.as_str(), dimension, base, Mark::Point),
            other => {
                self.refuse(node.span(), format!("`{path}` is {}", kind_of(other)), words(dimension));
                return None;
            }
        };
        let fault = match read {
            Ok(value) => return Some(value),
            Err(fault) => fault,
        };
        let span = self.within(node, &fault.span);
        let found = format!("`{path}`: {fault}");
        match fault.help() {
            Some(help) => self.refuse_with(span, found, fault.expected(), help),
            None => self.refuse(span, found, fault.expected()),
        }
        None
    }
}

/// A whole number in decimal digits, whatever its radix; digits beyond 128 bits stay as they are.
fn decimal(digits: &str, radix: u32) -> String {
    match i128::from_str_radix(digits, radix) {
        Ok(number) if radix != 10 => number.to_string(),
        _ => digits.to_owned(),
    }
}

/// A number of a dimension in words.
fn words(dimension: Dimension) -> String {
    match dimension {
        Dimension::Plain => "a number".to_owned(),
        Dimension::Ratio => "a number, or a string such as \"20 %\"".to_owned(),
        _ => format!("{} in {}", article(dimension), dimension.usual_units()),
    }
}

fn article(dimension: Dimension) -> String {
    let name = dimension.name();
    let vowel = name.starts_with(['a', 'e', 'i', 'o', 'u']);
    format!("{} {name}", if vowel { "an" } else { "a" })
}
