use proptest::prelude::{Strategy, any, prop, prop_assert, prop_assert_eq, proptest};

use super::read;
use super::tests::{LEAST, good, with};
use crate::demo;
use crate::fault::{FAULTS_SHOWN, Severity};
use crate::rail::defaults::KEYS;

#[test]
fn endless_nesting_is_refused_with_a_message() {
    let deep = [
        "[".repeat(100_000),
        format!("a = {}", "[".repeat(100_000)),
        format!("a = {}", "{a=".repeat(60_000)),
        format!("{}b = 1", "a.".repeat(100_000)),
        format!("[{}b]\n", "a.".repeat(100_000)),
        format!("[input]\nvoltage = {}1{}\n", "[".repeat(70), "]".repeat(70)),
    ];
    for text in deep {
        let faults = read("deep.toml", &text).expect_err("nonsense");
        assert!(faults.errors().count() >= 1);
    }
}

#[test]
fn a_huge_file_is_refused_without_being_read() {
    let faults = read("huge.toml", &"# nothing\n".repeat(100_000)).expect_err("too long");
    let all: Vec<_> = faults.errors().collect();
    assert_eq!((all.len(), all[0].line), (1, 0));
    assert!(all[0].found.contains("1000000 bytes"), "{}", all[0].found);
}

#[test]
fn a_flood_of_faults_is_counted() {
    let flood: String = (0..20_000).map(|number| format!("k{number}=1\n")).collect();
    let faults = read("flood.toml", &flood).expect_err("unknown keys");
    assert_eq!((faults.errors().count(), faults.count(Severity::Error)), (FAULTS_SHOWN, 20_004));
    let lines: Vec<_> = faults.errors().map(|fault| fault.line).collect();
    assert_eq!((lines[0], lines[4], lines[FAULTS_SHOWN - 1]), (0, 1, FAULTS_SHOWN - 4));
}

/// Text made of the pieces that rail files are made of, so that chance reaches deep.
fn pieces() -> impl Strategy<Value = String> {
    let piece = prop::sample::select(vec![
        "name",
        "[input]",
        "[output]",
        "[[load]]",
        "[drive]",
        "[parts.pin]",
        "voltage",
        "current",
        "share",
        "supply",
        "frequency",
        "stage.",
        "=",
        " = ",
        "{",
        "}",
        "[",
        "]",
        ",",
        "\n",
        "\n",
        "\"",
        "'",
        "\"12 V\"",
        "\"3 A\"",
        "0.5",
        "-1",
        "1e999",
        "inf",
        "true",
        "steps",
        "from",
        "to",
        "\"none\"",
        "µΩ",
        "\u{feff}",
        "\\u0000",
        "#",
        "2024-01-01",
        "ban",
        "\r\n",
        "\"\"\"",
    ]);
    prop::collection::vec(piece, 0..60).prop_map(|pieces| pieces.concat())
}

/// Keys of the rail file with values that may or may not suit them, as dotted keys.
fn assignments() -> impl Strategy<Value = String> {
    let path = prop::sample::select(KEYS.iter().map(|key| key.path).collect::<Vec<_>>());
    let value = prop::sample::select(vec![
        "\"12 V\"",
        "\"3 A\"",
        "\"5 V\"",
        "0",
        "1",
        "0.5",
        "-1",
        "1e-320",
        "1e300",
        "5e-324",
        "\"20 %\"",
        "\"none\"",
        "\"input\"",
        "\"output\"",
        "\"switch\"",
        "\"forced\"",
        "[]",
        "[1, 2]",
        "[\"a\", \"b\"]",
        "{}",
        "{ min = 1 }",
        "true",
        "\"400 kHz\"",
        "\"20 ns\"",
        "\"5 mm²\"",
        "\"x\"",
    ]);
    let line = (path, value).prop_map(|(path, value)| format!("{path} = {value}\n"));
    prop::collection::vec(line, 0..12).prop_map(|lines| lines.concat())
}

proptest! {
    #[test]
    fn any_assignment_is_understood_or_refused(text in assignments()) {
        match read("any.toml", &text) {
            Ok(reading) => prop_assert!((reading.rail.loads.iter().map(|load| load.share.get()).sum::<f64>() - 1.0).abs() < 1e-9),
            Err(faults) => prop_assert!(faults.has_errors()),
        }
        match read("any.toml", &format!("name = 'n'\ninput.voltage = 12\noutput.voltage = 5\noutput.current = 3\n{text}")) {
            Ok(reading) => prop_assert!(!reading.rail.range.frequencies_hz.is_empty()),
            Err(faults) => prop_assert!(faults.has_errors()),
        }
    }

    #[test]
    fn any_text_is_read_or_refused(text in any::<String>()) {
        if let Err(faults) = read("any.toml", &text) {
            prop_assert!(faults.errors().count() > 0);
        }
    }

    #[test]
    fn any_pieces_are_read_or_refused(text in pieces()) {
        let lines = text.lines().count() + 1;
        if let Err(faults) = read("any.toml", &text) {
            prop_assert!(faults.errors().count() > 0);
            prop_assert!(faults.errors().all(|fault| fault.line <= lines));
        }
    }

    #[test]
    fn a_good_rail_survives_one_wrong_letter_without_a_panic(at in 0..demo::RAIL_TEXT.len(), letter in any::<char>()) {
        let mut text = demo::RAIL_TEXT.to_owned();
        if text.is_char_boundary(at) {
            text.insert(at, letter);
        }
        if let Err(faults) = read("any.toml", &text) {
            prop_assert!(faults.errors().count() > 0);
        }
    }

    #[test]
    fn a_voltage_is_the_same_in_every_unit(millivolts in 6_000_u32..1_000_000) {
        let volts = f64::from(millivolts) / 1e3;
        let said = |text: String| good(&LEAST.replace("\"12 V\"", &text)).rail;
        let bare = said(format!("{}.{:03}", millivolts / 1000, millivolts % 1000));
        prop_assert_eq!(bare.input.minimum_v.get(), volts);
        prop_assert_eq!(&said(format!("\"{millivolts} mV\"")), &bare);
        prop_assert_eq!(&said(format!("\"{}.{:03} V\"", millivolts / 1000, millivolts % 1000)), &bare);
        prop_assert_eq!(&said(format!("\"{millivolts}e-3V\"")), &bare);
    }

    #[test]
    fn shares_always_sum_to_one(shares in prop::collection::vec(1e-6_f64..1e6, 1..20)) {
        let loads: String = shares.iter().enumerate()
            .map(|(at, share)| format!("[[load]]\ncurrent = {}\nshare = {share:?}\n", 0.1 + at as f64 / 10.0))
            .collect();
        let sum: f64 = with(&loads).rail.loads.iter().map(|load| load.share.get()).sum();
        prop_assert!((sum - 1.0).abs() < 1e-12, "{}", sum);
    }
}
