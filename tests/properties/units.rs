//! A catalog means the same in whatever unit its header is written.

use wattsieve::catalog::{ReadOptions, read_texts};
use wattsieve::demo::CATALOGS;

/// Prefixes and what they stand for as a power of ten.
const PREFIXES: [(&str, i32); 8] =
    [("p", -12), ("n", -9), ("µ", -6), ("μ", -6), ("m", -3), ("", 0), ("k", 3), ("M", 6)];
/// Units that take a prefix, and another spelling of each.
const UNITS: [(&str, &str); 8] =
    [("Ω", "ohm"), ("V", "V"), ("A", "A"), ("W", "W"), ("C", "C"), ("H", "H"), ("F", "F"), ("Hz", "Hz")];

/// The unit in the brackets of a header cell, as power of ten and spelling of its own.
fn unit(header: &str) -> Option<(i32, usize)> {
    let inside = header.split_once('[')?.1.split_once(']')?.0;
    UNITS.iter().enumerate().find_map(|(which, (name, _))| {
        let prefix = inside.strip_suffix(name)?;
        PREFIXES.iter().find(|(text, _)| *text == prefix).map(|(_, power)| (*power, which))
    })
}

/// The catalog with every unit that takes a prefix written with the prefix of this power, and its numbers to match.
fn rewritten(text: &str, power: i32, spelling: usize) -> (String, usize) {
    let prefix = PREFIXES.iter().rev().find(|(_, p)| *p == power).map_or("", |(prefix, _)| *prefix);
    let mut shifts: Option<Vec<i32>> = None;
    let mut changed = 0;
    let mut lines = Vec::new();
    for line in text.lines() {
        if line.starts_with('#') || line.is_empty() {
            continue;
        }
        assert!(!line.contains('"'), "the demo quotes nothing");
        let cells: Vec<&str> = line.split(',').collect();
        let written: Vec<String> = match &shifts {
            None => {
                shifts = Some(cells.iter().map(|cell| unit(cell).map_or(0, |(old, _)| old - power)).collect());
                cells.iter().map(|cell| header(cell, prefix, spelling)).collect()
            }
            Some(shifts) => cells
                .iter()
                .zip(shifts)
                .map(|(cell, shift)| match (*shift, cell.is_empty()) {
                    (0, _) | (_, true) => (*cell).to_owned(),
                    (shift, false) => {
                        changed += 1;
                        format!("{cell}e{shift}")
                    }
                })
                .collect(),
        };
        lines.push(written.join(","));
    }
    (lines.join("\n"), changed)
}

fn header(cell: &str, prefix: &str, spelling: usize) -> String {
    match (unit(cell), cell.split_once('[')) {
        (Some((_, which)), Some((before, rest))) => {
            let after = rest.split_once(']').map_or("", |(_, after)| after);
            let (symbol, word) = UNITS[which];
            format!("{before}[{prefix}{}]{after}", if spelling == 0 { symbol } else { word })
        }
        _ => cell.to_owned(),
    }
}

#[test]
fn any_unit_in_the_header_gives_the_same_bits() {
    let plain = read_texts(CATALOGS.map(|(name, text)| (name, text.as_bytes())), ReadOptions::default());
    assert!(!plain.faults.has_errors());
    // Every double is written so that it reads back to the same bits.
    let expected = format!("{:?}", plain.parts);
    for power in [-9, -6, -3, 0, 3] {
        for spelling in 0..2 {
            let texts: Vec<(&str, String, usize)> = CATALOGS
                .iter()
                .map(|(name, text)| {
                    let (text, changed) = rewritten(text, power, spelling);
                    (*name, text, changed)
                })
                .collect();
            assert!(texts.iter().all(|(_, _, changed)| *changed > 50), "hardly anything is rewritten");
            let read = read_texts(texts.iter().map(|(name, text, _)| (*name, text.as_bytes())), ReadOptions::default());
            assert!(!read.faults.has_errors(), "{}", read.faults.render(false));
            assert_eq!(format!("{:?}", read.parts), expected, "power {power}, spelling {spelling}");
        }
    }
}
