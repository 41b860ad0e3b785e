use proptest::prelude::{any, prop_assert_eq, prop_assume, proptest};

use super::*;
use crate::quantity::format::{engineering, exact};
use Dimension::{
    Area, Capacitance, Charge, Current, Frequency, Inductance, Length, Plain, Ratio, Resistance, Temperature,
};
use Dimension::{TemperatureDifference, ThermalResistance, Voltage, VoltageSlope};

fn read(text: &str, dimension: Dimension) -> Result<f64, NumberFault> {
    parse(text, dimension, Some(Unit::base(dimension)), Mark::Point)
}

fn in_milli(text: &str) -> Result<f64, NumberFault> {
    parse(text, Resistance, Some(Unit { dimension: Resistance, exponent: -3 }), Mark::Point)
}

#[test]
fn numbers_are_the_nearest_double() {
    let cases = [
        ("4.7 mΩ", Resistance, 0.0047),
        ("4.7m\u{2126}", Resistance, 0.0047),
        ("4.7 mohm", Resistance, 0.0047),
        ("0.0047", Resistance, 0.0047),
        ("+4.7e-3", Resistance, 0.0047),
        ("  12\u{a0}nC ", Charge, 12e-9),
        ("12.5 mm²", Area, 12.5),
        ("1.2e-5 m2", Area, 12.0),
        ("12m2", Area, 12e6),
        ("20 %", Ratio, 0.2),
        ("0.9", Ratio, 0.9),
        ("15 K", TemperatureDifference, 15.0),
        ("15 °C", TemperatureDifference, 15.0),
        ("\u{2212}40 °C", Temperature, -40.0),
        ("55", Temperature, 55.0),
        ("5 mm", Length, 0.005),
        ("0.5 cm", Length, 0.005),
        ("1\u{202f}500 kHz", Frequency, 1.5e6),
        ("12 500", Frequency, 12_500.0),
        ("40 °C/W", ThermalResistance, 40.0),
        ("-1.8 mV/K", VoltageSlope, -0.0018),
        (".5 A", Current, 0.5),
        ("5. A", Current, 5.0),
        ("22\u{b5}F", Capacitance, 22e-6),
        ("22\u{3bc}F", Capacitance, 22e-6),
        ("22 uF", Capacitance, 22e-6),
        ("-0", Plain, 0.0),
        ("123456789012345678901234567890", Plain, 123_456_789_012_345_678_901_234_567_890.0),
        ("9007199254740993", Plain, 9_007_199_254_740_992.0),
        ("0e999999999999999999999", Plain, 0.0),
        ("2.2250738585072011e-308", Plain, 2.225_073_858_507_201e-308),
    ];
    for (text, dimension, value) in cases {
        let got = read(text, dimension).map(f64::to_bits);
        assert_eq!(got, Ok(f64::to_bits(value)), "{text}");
    }
}

#[test]
fn letter_codes_have_one_meaning_or_none() {
    let cases = [
        ("4R7", Resistance, 4.7),
        ("R047", Resistance, 0.047),
        ("4m7", Resistance, 0.0047),
        ("47k", Resistance, 47e3),
        ("4K7", Resistance, 4.7e3),
        ("4.7k", Resistance, 4.7e3),
        ("2M2", Resistance, 2.2e6),
        ("10R", Resistance, 10.0),
        ("4R7", Inductance, 4.7e-6),
        ("R47", Inductance, 0.47e-6),
        ("4µ7", Inductance, 4.7e-6),
        ("4n7", Capacitance, 4.7e-9),
        ("2u2", Capacitance, 2.2e-6),
    ];
    for (text, dimension, value) in cases {
        assert_eq!(read(text, dimension), Ok(value), "{text}");
    }
    for (text, dimension) in
        [("4R7", Capacitance), ("4R7", Voltage), ("4k7", Frequency), ("R5", Plain), ("2M2", Current)]
    {
        let fault = read(text, dimension).expect_err(text);
        assert!(matches!(fault.cause, Cause::Code(..)), "{text}: {fault}");
    }
    assert_eq!(in_milli("4R7"), Ok(4.7), "a code carries its own unit, whatever the header says");
}

#[test]
fn what_is_not_a_number_is_refused_for_its_reason() {
    let cases = [
        ("", "there is no number"),
        ("abc", "`abc` is not a number"),
        ("4.7.1", "`4.7.1` is not a number"),
        ("1.234.567", "`1.234.567` has separators between its digits"),
        ("4 7", "`4 7` is not a number"),
        ("--4", "`--4` is not a number"),
        ("4.7 mΩ mΩ", "`mΩ mΩ` is more than one unit"),
        ("4.7 V", "`V` is a unit of voltage, not of resistance"),
        ("4.7 mΩ 5", "`4.7 mΩ 5` is not a number"),
        ("4,7", "`4,7` can be read as 4.7 or as 47"),
        ("1.234,5", "`1.234,5` can be read as 1234.5 or as 1.2345"),
        ("1,234,567", "`1,234,567` has separators between its digits"),
        ("1'000", "`1'000` has separators between its digits"),
        ("NaN", "`NaN` is not a finite number"),
        ("-inf", "`-inf` is not a finite number"),
        ("1e400", "`1e400` is too great to be represented"),
        ("1e-400", "`1e-400` is too small to be told from zero"),
        ("10 m", "`m` is a prefix without a unit"),
        ("10m", "`m` is a prefix without a unit"),
        ("4.7 mR", "`mR` is not a unit of resistance"),
        ("~4.7", "`~4.7` is not a number"),
        ("4.7*", "`4.7*` is not a number"),
        ("0x10", "`0x10` is not a number"),
        ("1e", "`e` is not a unit of resistance"),
        ("#N/A", "`#N/A` is not a number"),
        ("٤", "`٤` is not a number"),
    ];
    for (text, sentence) in cases {
        assert_eq!(read(text, Resistance).expect_err(text).to_string(), sentence);
    }
}

#[test]
fn the_span_is_what_is_wrong() {
    let fault = read("  4.7 nC ", Resistance).expect_err("a charge");
    assert_eq!(fault.span, 6..8);
    assert_eq!(fault.expected(), "a unit of resistance: Ω, mΩ or kΩ");
    let fault = read(" 4,7", Resistance).expect_err("a comma");
    assert_eq!((fault.span.clone(), fault.help().as_deref()), (1..4, Some("write `4.7` or `47`")));
}

#[test]
fn a_unit_may_be_required() {
    let fault = parse("47", Resistance, None, Mark::Point).expect_err("no unit");
    assert_eq!(fault.help().as_deref(), Some("write it with its unit, such as `47 Ω`"));
    assert_eq!(parse("4.7 mΩ", Resistance, None, Mark::Point), Ok(0.0047));
    assert_eq!(parse("0.5", Ratio, None, Mark::Point), Ok(0.5));
}

#[test]
fn decimal_commas_where_they_are_allowed() {
    let read = |text| parse(text, Resistance, Some(Unit::base(Resistance)), Mark::PointOrComma);
    assert_eq!(read("4,7 mΩ"), Ok(0.0047));
    assert_eq!(read("4.7 mΩ"), Ok(0.0047));
    assert_eq!(read("1.234,5"), Ok(1234.5));
    assert_eq!(read("1 234,5"), Ok(1234.5));
    for text in ["1,234.5", "1,2,3", "12.34,5", "1.2345,6"] {
        assert!(read(text).is_err(), "{text}");
    }
}

proptest! {
    #[test]
    fn exact_texts_read_back_to_the_same_bits(bits in any::<u64>(), which in 0..Dimension::ALL.len()) {
        let (value, dimension) = (f64::from_bits(bits), Dimension::ALL[which]);
        prop_assume!(value.is_finite());
        let value = value + 0.0;
        let text = exact(value, dimension);
        prop_assert_eq!(parse(&text, dimension, None, Mark::Point).map(f64::to_bits), Ok((value + 0.0).to_bits()), "{}", text);
    }

    #[test]
    fn engineering_texts_read_back_within_their_digits(mantissa in 1.0..10.0_f64, power in -14..9, which in 0..17_usize) {
        let (value, dimension) = (mantissa * 10_f64.powi(power), Dimension::ALL[which]);
        let text = engineering(value, dimension, 6);
        let back = parse(&text, dimension, None, Mark::Point).map_err(|fault| format!("{text}: {fault}"));
        let back = back.unwrap_or(f64::NAN);
        assert!(((back - value) / value).abs() <= 5.1e-6, "{text}");
    }

    #[test]
    fn the_unit_may_stand_in_the_header_or_the_cell(digits in 1..99_999_999_u32, places in 0..8_usize) {
        let number = format!("{:.*}", places, f64::from(digits) / 10_f64.powi(i32::try_from(places).unwrap_or(0)));
        let cells = [format!("{number} mΩ"), format!("{number}e-3 Ω"), format!("{number}\u{a0}mohm"), format!("{number}e-3")];
        let in_header = in_milli(&number).map(f64::to_bits);
        for cell in cells {
            prop_assert_eq!(read(&cell, Resistance).map(f64::to_bits), in_header.clone(), "{}", cell);
        }
    }

    #[test]
    fn the_quick_reading_equals_the_careful_one(mantissa in any::<u64>(), point in 0..20_usize, shift in -12..12_i32) {
        let mut text = mantissa.to_string();
        if point < text.len() {
            text.insert(point, '.');
        }
        let unit = Unit { dimension: Plain, exponent: shift };
        let careful: f64 = format!("{text}e{shift}").parse().unwrap_or(f64::NAN);
        prop_assert_eq!(parse(&text, Plain, Some(unit), Mark::Point).map(f64::to_bits), Ok(careful.to_bits()));
    }

    #[test]
    fn no_text_makes_it_panic(text in ".{0,12}", which in 0..17_usize) {
        for mark in [Mark::Point, Mark::PointOrComma] {
            if let Err(fault) = parse(&text, Dimension::ALL[which], None, mark) {
                assert!(text.get(fault.span.clone()).is_some(), "{:?} of {:?}", fault.span, text);
                assert!(!fault.expected().is_empty());
            }
        }
    }
}
