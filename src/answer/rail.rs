//! How was the rail understood, and where does each value come from?

use serde::Serialize;

use crate::quantity::Dimension;
use crate::rail::{Origin, Reading, Value};

/// One key of the rail.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct KeyValue {
    /// Sections and name, joined by points; loads are numbered from 1: `load[1].current`.
    pub key: String,
    /// Its value in `unit`; null where a limit or check does not exist.
    pub value: Value,
    /// Unit of the value; null for words, counts, ratios and money.
    pub unit: Option<&'static str>,
    /// `FILE:LINE` for what is written, `default: REASON` for what is not.
    pub from: String,
    /// What it measures, for people's notation.
    #[serde(skip)]
    pub dimension: Option<Dimension>,
}

/// The rail as understood.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Understood {
    /// Name of the rail.
    pub rail: String,
    /// Every key in the order of the file format.
    pub keys: Vec<KeyValue>,
}

/// Every key of a rail read from `file`, with its value and where that comes from.
pub fn understood(file: &str, reading: &Reading) -> Understood {
    let keys = reading.entries.iter().map(|entry| KeyValue {
        key: entry.key.clone(),
        value: entry.value.clone(),
        unit: entry.unit,
        from: match entry.origin {
            Origin::Written { line } => format!("{file}:{line}"),
            Origin::Default { reason } => format!("default: {reason}"),
        },
        dimension: entry.dimension,
    });
    Understood { rail: reading.rail.name.clone(), keys: keys.collect() }
}

#[cfg(test)]
mod tests {
    use serde_json::{Value as Json, json, to_value};

    use super::*;
    use crate::rail::read;

    const MAST: &str = r#"name = "mast"
input.voltage = "24 V"
output = { voltage = "5 V", current = "6 A" }
drive.pull_up = "1.5 Ω"
stage.frequency = { from = "250 kHz", to = "700 kHz", steps = 4 }
stage.parallel.rectifier = 2
load = [{ current = "1 A", share = 0.8 }, { current = "6 A", share = 0.2 }]
"#;

    fn keys() -> Vec<Json> {
        let reading = read("mast.toml", MAST).expect("a good rail");
        let told = to_value(understood("mast.toml", &reading)).expect("JSON");
        assert_eq!(told["rail"], "mast");
        told["keys"].as_array().cloned().unwrap_or_default()
    }

    fn key(name: &str) -> Json {
        keys().into_iter().find(|key| key["key"] == name).unwrap_or_default()
    }

    #[test]
    fn what_is_written_names_its_line() {
        let wanted = json!({"key": "drive.pull_up", "value": 1.5, "unit": "Ω", "from": "mast.toml:4"});
        assert_eq!(key("drive.pull_up"), wanted);
    }

    #[test]
    fn what_is_not_written_names_its_reason() {
        let ringing = key("limits.ringing");
        assert_eq!((&ringing["value"], &ringing["unit"]), (&json!(1.2), &Json::Null));
        assert!(ringing["from"].as_str().is_some_and(|from| from.starts_with("default: ")), "{ringing}");
        assert_eq!(key("limits.efficiency")["value"], Json::Null);
    }

    #[test]
    fn every_key_has_value_unit_and_from() {
        let keys = keys();
        assert!(keys.len() > 50, "{}", keys.len());
        for key in keys {
            let fields: Vec<_> = key.as_object().into_iter().flatten().map(|(name, _)| name.as_str()).collect();
            assert_eq!(fields, ["key", "value", "unit", "from"]);
        }
    }

    #[test]
    fn lists_and_counts_are_what_they_are() {
        assert_eq!(key("stage.rectifier")["value"], json!(["switch", "diode"]));
        assert_eq!(key("stage.parallel.rectifier")["value"], json!(2));
        assert_eq!(key("stage.frequency")["value"].as_array().map(Vec::len), Some(4));
        assert_eq!(key("load[2].current")["value"], json!(6.0));
        assert_eq!(key("worth.area")["unit"], json!("1/mm²"));
    }
}
