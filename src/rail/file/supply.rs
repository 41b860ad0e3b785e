//! The sections `input`, `output` and `ambient`.

use toml::de::DeValue;

use super::reader::Reader;
use crate::quantity::Positive;
use crate::rail::defaults::{
    AMBIENT_TEMPERATURE, INPUT_MAX, INPUT_MIN, INPUT_RIPPLE, INPUT_SURGE, INPUT_TYPICAL, OUTPUT_CURRENT, OUTPUT_PEAK,
    OUTPUT_RIPPLE, OUTPUT_VOLTAGE, STEP_CROSSOVER, STEP_CURRENT, STEP_DEVIATION,
};
use crate::rail::origin::Value;
use crate::rail::typed::{Input, LoadStep, Output};

/// Where the one input voltage or the table of the three stands.
const VOLTAGE: &str = "input.voltage";

pub(super) fn input(reader: &mut Reader<'_>) -> Option<Input> {
    let [minimum_v, typical_v, maximum_v] = voltages(reader);
    reader.facts.least_input_v = minimum_v;
    ascending(reader, INPUT_MIN.path, minimum_v, INPUT_TYPICAL.path, typical_v, "typical input");
    ascending(reader, INPUT_TYPICAL.path, typical_v, INPUT_MAX.path, maximum_v, "greatest input");
    let ripple_v = reader.following(&INPUT_RIPPLE, minimum_v);
    let surge_v = reader.following(&INPUT_SURGE, maximum_v);
    Some(Input {
        minimum_v: minimum_v?,
        typical_v: typical_v?,
        maximum_v: maximum_v?,
        ripple_v: ripple_v?,
        surge_v: surge_v??,
    })
}

/// Least, typical and greatest: from a table, or all the same from one value.
fn voltages(reader: &mut Reader<'_>) -> [Option<Positive>; 3] {
    let keys = [&INPUT_MIN, &INPUT_TYPICAL, &INPUT_MAX];
    let Some(node) = reader.find(VOLTAGE) else {
        reader.missing_named(VOLTAGE, "one voltage, or { min, typical, max }");
        return [None; 3];
    };
    if matches!(node.get_ref(), DeValue::Table(_)) {
        return keys.map(|key| reader.positive(key));
    }
    let value = reader.value_of(VOLTAGE, INPUT_TYPICAL.kind, node).and_then(Positive::new);
    if let Some(value) = value {
        for key in keys {
            reader.written(key, Value::Number(value.get()), node.span().start);
        }
    }
    [value; 3]
}

/// The place of the least input: the table's, or that of the one value.
pub(super) fn least_path(reader: &Reader<'_>) -> &'static str {
    if reader.find(INPUT_MIN.path).is_some() { INPUT_MIN.path } else { VOLTAGE }
}

fn ascending(
    reader: &mut Reader<'_>,
    low_path: &str,
    low: Option<Positive>,
    high_path: &str,
    high: Option<Positive>,
    what: &str,
) {
    if low.zip(high).is_some_and(|(low, high)| high < low) {
        let bound = reader.said(low_path);
        let found = format!("the {what} of {} is below {bound}", reader.said(high_path));
        reader.conflict(high_path, found, format!("{bound} or more"), "the order is min ≤ typical ≤ max");
    }
}

pub(super) fn output(reader: &mut Reader<'_>) -> Option<Output> {
    let voltage_v = reader.positive(&OUTPUT_VOLTAGE);
    reader.facts.output_v = voltage_v;
    if let (Some(voltage_v), Some(least_v)) = (voltage_v, reader.facts.least_input_v)
        && voltage_v >= least_v
    {
        let least = reader.said(least_path(reader));
        let found =
            format!("the output of {} is not below the least input of {least}", reader.said(OUTPUT_VOLTAGE.path));
        reader.conflict(OUTPUT_VOLTAGE.path, found, format!("less than {least}"), "the stage only steps down");
    }
    let current_a = reader.positive(&OUTPUT_CURRENT);
    reader.facts.full_load_a = current_a;
    let peak_a = reader.following(&OUTPUT_PEAK, current_a);
    let ripple_v = reader.following(&OUTPUT_RIPPLE, voltage_v);
    let step = step(reader);
    Some(Output { voltage_v: voltage_v?, current_a: current_a?, peak_a: peak_a??, ripple_v: ripple_v?, step: step? })
}

fn step(reader: &mut Reader<'_>) -> Option<Option<LoadStep>> {
    let written = reader.find(STEP_CURRENT.section()).is_some_and(|node| node.get_ref().is_table());
    if written {
        for key in [&STEP_CURRENT, &STEP_DEVIATION] {
            if reader.find(key.path).is_none() {
                reader.missing(key);
            }
        }
    }
    let current_a = reader.optional(&STEP_CURRENT);
    let deviation_v = reader.optional(&STEP_DEVIATION);
    let crossover_hz = reader.optional(&STEP_CROSSOVER);
    let (current_a, deviation_v, crossover_hz) = (current_a?, deviation_v?, crossover_hz?);
    Some(current_a.zip(deviation_v).map(|(current_a, deviation_v)| LoadStep { current_a, deviation_v, crossover_hz }))
}

pub(super) fn ambient_c(reader: &mut Reader<'_>) -> Option<f64> {
    reader.celsius(&AMBIENT_TEMPERATURE)
}
