//! The section `drive`.

use toml::de::DeValue;

use super::nearest::nearest;
use super::reader::Reader;
use super::supply::least_path;
use super::words::quoted;
use crate::quantity::format::exact;
use crate::quantity::{Dimension, Positive};
use crate::rail::defaults::{
    DRIVE_BIAS, DRIVE_DEAD_TIME, DRIVE_MINIMUM_OFF, DRIVE_MINIMUM_ON, DRIVE_PULL_DOWN, DRIVE_PULL_UP, DRIVE_SUPPLY,
    DRIVE_SUPPLY_LIMIT, DRIVE_VOLTAGE, OUTPUT_VOLTAGE, Preset, SUPPLY_WORDS,
};
use crate::rail::origin::Value;
use crate::rail::typed::{Drive, Supply};

pub(super) fn drive(reader: &mut Reader<'_>) -> Option<Drive> {
    let voltage_v = reader.positive(&DRIVE_VOLTAGE);
    let pull_up_ohm = reader.positive(&DRIVE_PULL_UP);
    let pull_down_ohm = reader.positive(&DRIVE_PULL_DOWN);
    let dead_time_s = reader.non_negative(&DRIVE_DEAD_TIME);
    let minimum_on_s = reader.non_negative(&DRIVE_MINIMUM_ON);
    let minimum_off_s = reader.non_negative(&DRIVE_MINIMUM_OFF);
    let bias_a = reader.non_negative(&DRIVE_BIAS);
    let supply = supply(reader);
    let supply_limit_a = reader.optional(&DRIVE_SUPPLY_LIMIT);
    if let (Some(voltage_v), Some(supply)) = (voltage_v, supply) {
        enough(reader, voltage_v, supply);
    }
    Some(Drive {
        voltage_v: voltage_v?,
        pull_up_ohm: pull_up_ohm?,
        pull_down_ohm: pull_down_ohm?,
        dead_time_s: dead_time_s?,
        minimum_on_s: minimum_on_s?,
        minimum_off_s: minimum_off_s?,
        bias_a: bias_a?,
        supply: supply?,
        supply_limit_a: supply_limit_a?,
    })
}

/// A word, or the efficiency of a converter.
fn supply(reader: &mut Reader<'_>) -> Option<Supply> {
    let Some(node) = reader.find(DRIVE_SUPPLY.path) else {
        let Preset::Word(word) = DRIVE_SUPPLY.preset else { return None };
        reader.default(&DRIVE_SUPPLY, Value::Text(word.to_owned()));
        return named(word);
    };
    let at = node.span().start;
    if let DeValue::String(word) = node.get_ref() {
        if let Some(supply) = named(word) {
            reader.written(&DRIVE_SUPPLY, Value::Text(word.clone().into_owned()), at);
            return Some(supply);
        }
        if !word.trim_start().starts_with(|first: char| first.is_ascii_digit() || matches!(first, '.' | '+' | '-')) {
            let found = format!("`{}` does not know \"{word}\"", DRIVE_SUPPLY.path);
            let expected = format!("{}, or an efficiency such as 0.9", quoted(SUPPLY_WORDS));
            match nearest(word, SUPPLY_WORDS.iter().copied()) {
                Some(near) => reader.refuse_with(node.span(), found, expected, format!("did you mean \"{near}\"?")),
                None => reader.refuse(node.span(), found, expected),
            }
            return None;
        }
    }
    let efficiency = reader.value(&DRIVE_SUPPLY, node).and_then(Positive::new)?;
    reader.written(&DRIVE_SUPPLY, Value::Number(efficiency.get()), at);
    Some(Supply::Efficiency(efficiency))
}

fn named(word: &str) -> Option<Supply> {
    match word {
        "input" => Some(Supply::Input),
        "output" => Some(Supply::Output),
        _ => None,
    }
}

/// A linear regulator cannot raise a voltage, and the output is taken as it is.
fn enough(reader: &mut Reader<'_>, voltage_v: Positive, supply: Supply) {
    let (source_v, source, path) = match supply {
        Supply::Input => (reader.facts.least_input_v, "the least input", least_path(reader)),
        Supply::Output => (reader.facts.output_v, "the output", OUTPUT_VOLTAGE.path),
        Supply::Efficiency(_) => return,
    };
    if source_v.is_none_or(|source_v| source_v >= voltage_v) {
        return;
    }
    let said = reader.said(path);
    let drive = match reader.said(DRIVE_VOLTAGE.path) {
        "" => format!("{} (the default)", exact(voltage_v.get(), Dimension::Voltage)),
        written => written.to_owned(),
    };
    let found = format!("the gate supply of {drive} cannot come from {source} of {said}");
    let at = [DRIVE_SUPPLY.path, DRIVE_VOLTAGE.path].into_iter().find(|path| reader.find(path).is_some());
    reader.conflict(
        at.unwrap_or(path),
        found,
        format!("{source} at or above the gate supply"),
        "lower `drive.voltage`, or choose another `drive.supply`: \"input\", \"output\", or an efficiency",
    );
}
