//! How units are spelled: prefix and symbol, to powers of ten.

use super::Dimension;

/// Prefix letters and their powers of ten, the preferred spelling of each power first.
pub(super) const PREFIXES: [(char, i32); 11] = [
    ('f', -15),
    ('p', -12),
    ('n', -9),
    ('µ', -6),
    ('\u{3bc}', -6),
    ('u', -6),
    ('m', -3),
    ('k', 3),
    ('K', 3),
    ('M', 6),
    ('G', 9),
];

/// Symbols that take a prefix; all of them are worth one base unit.
const fn prefixed(dimension: Dimension) -> &'static [&'static str] {
    match dimension {
        Dimension::Voltage => &["V"],
        Dimension::Current => &["A"],
        Dimension::Resistance => &["Ω", "\u{2126}", "ohm", "Ohm", "ohms", "Ohms"],
        Dimension::Charge => &["C"],
        Dimension::Capacitance => &["F"],
        Dimension::Inductance => &["H"],
        Dimension::Frequency => &["Hz"],
        Dimension::Time => &["s"],
        Dimension::Power => &["W"],
        Dimension::TemperatureDifference => &["K"],
        Dimension::ThermalResistance => &["K/W"],
        Dimension::VoltageSlope => &["V/K", "V/°C", "V/\u{ba}C", "V/\u{2103}"],
        Dimension::Length => &["m"],
        Dimension::Temperature | Dimension::Area | Dimension::Ratio | Dimension::Plain => &[],
    }
}

/// Spellings that take no prefix, with their powers of ten.
const fn whole(dimension: Dimension) -> &'static [(&'static str, i32)] {
    match dimension {
        Dimension::Temperature | Dimension::TemperatureDifference => {
            &[("°C", 0), ("\u{ba}C", 0), ("\u{2103}", 0), ("degC", 0), ("C", 0)]
        }
        Dimension::ThermalResistance => &[("°C/W", 0), ("\u{ba}C/W", 0), ("\u{2103}/W", 0), ("degC/W", 0), ("C/W", 0)],
        Dimension::Length => &[("cm", -2)],
        Dimension::Area => &[
            ("mm²", 0),
            ("mm2", 0),
            ("mm^2", 0),
            ("cm²", 2),
            ("cm2", 2),
            ("cm^2", 2),
            ("m²", 6),
            ("m2", 6),
            ("m^2", 6),
            ("µm²", -6),
            ("\u{3bc}m²", -6),
            ("um2", -6),
        ],
        Dimension::Ratio => &[("%", -2)],
        _ => &[],
    }
}

/// Power of ten between `text`, a spelling of a unit of `dimension`, and the base unit.
pub(super) fn exponent(text: &str, dimension: Dimension) -> Option<i32> {
    if let Some(&(_, exponent)) = whole(dimension).iter().find(|(spelling, _)| *spelling == text) {
        return Some(exponent);
    }
    prefixed(dimension).iter().find_map(|symbol| {
        let prefix = text.strip_suffix(symbol)?;
        if prefix.is_empty() {
            return Some(0);
        }
        PREFIXES.iter().find(|(letter, _)| prefix.chars().eq([*letter])).map(|(_, exponent)| *exponent)
    })
}

/// Spellings of units of `dimension` that differ from `text` in upper and lower case only, one for each power of ten.
pub(super) fn near(text: &str, dimension: Dimension) -> Vec<String> {
    let folded = text.to_lowercase();
    let bare = prefixed(dimension).iter().map(|symbol| ((*symbol).to_owned(), 0));
    let with_prefix = prefixed(dimension)
        .iter()
        .flat_map(|symbol| PREFIXES.iter().map(move |(letter, exponent)| (format!("{letter}{symbol}"), *exponent)));
    let fixed = whole(dimension).iter().map(|(spelling, exponent)| ((*spelling).to_owned(), *exponent));
    let mut found: Vec<(String, i32)> = Vec::new();
    for (spelling, exponent) in bare.chain(with_prefix).chain(fixed) {
        if spelling.to_lowercase() == folded && found.iter().all(|(_, known)| *known != exponent) {
            found.push((spelling, exponent));
        }
    }
    found.into_iter().map(|(spelling, _)| spelling).collect()
}
