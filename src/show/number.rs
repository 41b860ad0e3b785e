//! Numbers as the screens write them.

use crate::quantity::{Dimension, format::engineering};

/// A power in W, milliwatts below one watt.
pub fn watts(value: f64) -> String {
    if value == 0.0 { "0".to_owned() } else { engineering(value, Dimension::Power, 3) }
}

/// A share as percent with two decimals.
pub fn percent(share: f64) -> String {
    format!("{:.2} %", share * 100.0)
}

/// A share as whole signed percent: the distance to a limit.
pub fn margin(share: f64) -> String {
    format!("{:+.1} %", share * 100.0)
}

/// Money, in the user's own unit.
pub fn money(value: Option<f64>) -> String {
    value.map_or_else(|| "?".to_owned(), |value| format!("{value:.2}"))
}

/// Area in mm².
pub fn area(value: Option<f64>) -> String {
    value.map_or_else(|| "?".to_owned(), |value| format!("{value:.1} mm²"))
}

/// A temperature in °C.
pub fn celsius(value: f64) -> String {
    format!("{value:.1} °C")
}

/// A frequency.
pub fn hertz(value: f64) -> String {
    engineering(value, Dimension::Frequency, 4)
}

/// A name of files as words: `high_switch` is the high switch.
pub fn plain(name: &str) -> String {
    name.replace('_', " ")
}

/// A whole number with blanks between groups of three digits.
pub fn grouped(digits: &str) -> String {
    let mut text = String::new();
    for (place, digit) in digits.chars().enumerate() {
        if place > 0 && (digits.len() - place).is_multiple_of(3) {
            text.push(' ');
        }
        text.push(digit);
    }
    text
}

/// A value in an SI unit given by its symbol; a pure number for an empty one.
pub fn in_unit(value: f64, unit: &str) -> String {
    let dimension = match unit {
        "V" => Dimension::Voltage,
        "A" => Dimension::Current,
        "Ω" => Dimension::Resistance,
        "C" => Dimension::Charge,
        "F" => Dimension::Capacitance,
        "H" => Dimension::Inductance,
        "Hz" => Dimension::Frequency,
        "s" => Dimension::Time,
        "W" => Dimension::Power,
        "m" => Dimension::Length,
        "V/K" => Dimension::VoltageSlope,
        "°C" => return celsius(value),
        "mm²" => return format!("{value:.1} mm²"),
        _ => return format!("{:.4}", value).trim_end_matches('0').trim_end_matches('.').to_owned(),
    };
    if value == 0.0 { format!("0 {unit}") } else { engineering(value, dimension, 3) }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_for_people() {
        assert_eq!(grouped("1234567"), "1 234 567");
        assert_eq!(grouped("123"), "123");
        assert_eq!(percent(0.93251), "93.25 %");
        assert_eq!(margin(-0.021), "-2.1 %");
        assert_eq!(money(None), "?");
        assert_eq!(in_unit(0.25, ""), "0.25");
        assert_eq!(in_unit(0.012, "V"), "12.0 mV");
    }
}
