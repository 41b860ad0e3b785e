//! Engineering notation for people, and the shortest text that reads back to the same bits.

use super::Dimension;
use super::spelling::PREFIXES;

/// `value`, in base units of `dimension`, with `digits` significant digits and a prefix that leaves one to three digits
/// before the point: `4.70 mΩ`, `400 kHz`, `12.5 mm²`, `97.0 °C`.
///
/// Dimensions whose units take no prefix keep all digits before the point. A value that is not finite is a dash.
pub fn engineering(value: f64, dimension: Dimension, digits: usize) -> String {
    if !value.is_finite() {
        return "—".to_owned();
    }
    if value == 0.0 {
        return join("0", None, dimension.base_unit());
    }
    let rounded = scientific(value, digits);
    let (_, power) = split(&rounded);
    let (shift, rounded) = match takes_prefix(dimension) {
        true => (prefix_power(power), rounded),
        false => (0, scientific(value, digits.max(usize::try_from(power + 1).unwrap_or(0)))),
    };
    join(&fixed(&rounded, shift), prefix(shift), dimension.base_unit())
}

/// `value`, in base units of `dimension`, in as many digits as it takes to read back to the same bits.
pub fn exact(value: f64, dimension: Dimension) -> String {
    if !value.is_finite() {
        return "—".to_owned();
    }
    let scientific = format!("{value:e}");
    let (mantissa, power) = split(&scientific);
    let shift = if value == 0.0 || !takes_prefix(dimension) { 0 } else { prefix_power(power) };
    let number = match power - shift {
        -6..=15 => fixed(&scientific, shift),
        beyond => format!("{mantissa}e{beyond}"),
    };
    join(&number, prefix(shift), dimension.base_unit())
}

/// `value` with `digits` significant digits, at least one, in `e` notation.
fn scientific(value: f64, digits: usize) -> String {
    format!("{value:.*e}", digits.max(1) - 1)
}

fn takes_prefix(dimension: Dimension) -> bool {
    !matches!(
        dimension,
        Dimension::Temperature
            | Dimension::TemperatureDifference
            | Dimension::ThermalResistance
            | Dimension::Area
            | Dimension::Ratio
            | Dimension::Plain
    )
}

/// Mantissa and power of ten of a number in `e` notation.
fn split(scientific: &str) -> (&str, i32) {
    let (mantissa, power) = scientific.split_once('e').unwrap_or((scientific, "0"));
    (mantissa, power.parse().unwrap_or(0))
}

/// The power of a prefix, a multiple of three, nearest below `power`.
fn prefix_power(power: i32) -> i32 {
    (power.div_euclid(3) * 3).clamp(-15, 9)
}

fn prefix(power: i32) -> Option<char> {
    PREFIXES.iter().find(|(_, known)| *known == power).map(|(letter, _)| *letter)
}

/// A number in `e` notation, written without exponent after division by 10^`shift`. Digits are moved, not computed: the
/// decimal number stays the same.
fn fixed(scientific: &str, shift: i32) -> String {
    let (mantissa, power) = split(scientific);
    let sign = if mantissa.starts_with('-') { "-" } else { "" };
    let mut digits: String = mantissa.chars().filter(char::is_ascii_digit).collect();
    let before = power - shift + 1;
    if let Ok(missing) = usize::try_from(1 - before) {
        digits.insert_str(0, &"0".repeat(missing));
    }
    let before = usize::try_from(before.max(1)).unwrap_or(1);
    while digits.len() < before {
        digits.push('0');
    }
    match digits.split_at(before) {
        (whole, "") => format!("{sign}{whole}"),
        (whole, part) => format!("{sign}{whole}.{part}"),
    }
}

fn join(number: &str, prefix: Option<char>, unit: &str) -> String {
    match (prefix, unit) {
        (None, "") => number.to_owned(),
        (None, unit) => format!("{number} {unit}"),
        (Some(prefix), unit) => format!("{number} {prefix}{unit}"),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn engineering_notation() {
        let cases = [
            (0.0047, Dimension::Resistance, 3, "4.70 mΩ"),
            (4e5, Dimension::Frequency, 3, "400 kHz"),
            (12.5, Dimension::Area, 3, "12.5 mm²"),
            (1234.4, Dimension::Area, 3, "1234 mm²"),
            (97.0, Dimension::Temperature, 3, "97.0 °C"),
            (-40.0, Dimension::Temperature, 3, "-40.0 °C"),
            (999.96, Dimension::Current, 4, "1.000 kA"),
            (0.99996, Dimension::Current, 4, "1.000 A"),
            (22e-6, Dimension::Capacitance, 2, "22 µF"),
            (-1e-3, Dimension::VoltageSlope, 2, "-1.0 mV/K"),
            (0.0, Dimension::Charge, 3, "0 C"),
            (0.2, Dimension::Ratio, 2, "0.20"),
            (0.00123, Dimension::Plain, 2, "0.0012"),
            (1e-20, Dimension::Charge, 1, "0.00001 fC"),
            (5e12, Dimension::Frequency, 2, "5000 GHz"),
            (f64::NAN, Dimension::Power, 3, "—"),
        ];
        for (value, dimension, digits, text) in cases {
            assert_eq!(engineering(value, dimension, digits), text);
        }
    }

    #[test]
    fn exact_texts_are_short() {
        assert_eq!(exact(0.0047, Dimension::Resistance), "4.7 mΩ");
        assert_eq!(exact(4e5, Dimension::Frequency), "400 kHz");
        assert_eq!(exact(0.005, Dimension::Length), "5 mm");
        assert_eq!(exact(1.0 / 3.0, Dimension::Ratio), "0.3333333333333333");
        assert_eq!(exact(1e-30, Dimension::Charge), "1e-15 fC");
        assert_eq!(exact(-0.125, Dimension::Plain), "-0.125");
    }
}
