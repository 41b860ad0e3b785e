//! The documents by their keys: whoever reads them may rely on these, in this order.

use serde_json::Value;

use super::ground::{Said, demo, edit, first_stage, run, run_with, spoil};

fn document(said: &Said) -> Value {
    serde_json::from_str(&said.out).unwrap_or_else(|error| panic!("{error}: {} {}", said.out, said.err))
}

fn keys(value: &Value) -> Vec<&str> {
    value.as_object().expect("an object").keys().map(String::as_str).collect()
}

fn rows(value: &Value) -> &[Value] {
    value.as_array().expect("a list")
}

/// Whether every number of a document is finite; JSON has no other, so a broken one would be null.
fn numbers(value: &Value, found: &mut Vec<f64>) {
    match value {
        Value::Number(number) => found.push(number.as_f64().expect("a double")),
        Value::Array(rows) => rows.iter().for_each(|row| numbers(row, found)),
        Value::Object(map) => map.values().for_each(|one| numbers(one, found)),
        _ => {}
    }
}

fn is_a_stage(stage: &Value) {
    assert_eq!(keys(stage), ["frequency_hz", "high_switch", "rectifier", "inductor", "input_bank", "output_bank"]);
    for slot in ["high_switch", "inductor", "input_bank", "output_bank"] {
        assert_eq!(keys(&stage[slot]), ["part", "count"]);
    }
    assert_eq!(keys(&stage["rectifier"]), ["kind", "part", "count"]);
    assert!(["switch", "diode"].contains(&stage["rectifier"]["kind"].as_str().expect("a word")));
    assert!(stage["frequency_hz"].is_f64() && stage["high_switch"]["count"].is_u64());
}

#[test]
fn shortlist() {
    let list = document(&run(demo().path(), ["shortlist", "rail.toml", "--format", "json"]));
    assert_eq!(
        keys(&list),
        ["schema", "rail", "crossed", "evaluated", "proven", "open_bound", "stages", "nothing_passes", "dropped"]
    );
    assert_eq!((&list["schema"], &list["rail"]), (&"shortlist/1".into(), &"mast camera 5 V".into()));
    assert_eq!((&list["proven"], &list["open_bound"]), (&true.into(), &Value::Null));
    assert_eq!(list["nothing_passes"], Value::Null);
    assert!(list["crossed"].as_str().expect("a string").parse::<u128>().expect("a whole number") > 1_000_000_000);
    assert!(list["evaluated"].as_u64().expect("a count") >= 10);
    assert_eq!(rows(&list["stages"]).len(), 10);
    let mut before = 0.0;
    for (place, pick) in rows(&list["stages"]).iter().enumerate() {
        assert_eq!(
            keys(pick),
            [
                "rank",
                "stage",
                "burden",
                "cost",
                "area_mm2",
                "weighted_loss_w",
                "weighted_efficiency",
                "resistance_w",
                "charge_w",
                "tightest",
                "assumed",
                "hottest_junction_c",
                "core_loss_unknown"
            ]
        );
        assert_eq!(pick["rank"], place + 1);
        assert_eq!(keys(&pick["tightest"]), ["limit", "margin"]);
        is_a_stage(&pick["stage"]);
        let burden = pick["burden"].as_f64().expect("a number");
        assert!(burden >= before, "{burden} after {before}");
        before = burden;
    }
    for row in rows(&list["dropped"]) {
        assert_eq!(keys(row), ["limit", "slot", "parts"]);
    }
}

#[test]
fn shortlist_where_nothing_passes_says_how_far_each_limit_must_give() {
    let folder = demo();
    edit(folder.path(), "rail.toml", "cost = 4.00", "cost = 0.20");
    let said = run(folder.path(), ["shortlist", "rail.toml", "--format", "json"]);
    assert_eq!(said.status, 1);
    let list = document(&said);
    assert_eq!((rows(&list["stages"]).len(), &list["proven"]), (0, &true.into()));
    let relaxed = rows(&list["nothing_passes"]);
    assert_eq!(relaxed.len(), 1, "only the cost stands in the way: {relaxed:?}");
    assert_eq!(keys(&relaxed[0]), ["limit", "bound", "needed", "with"]);
    assert_eq!((&relaxed[0]["limit"], &relaxed[0]["bound"]), (&"cost".into(), &0.2.into()));
    assert!(relaxed[0]["needed"].as_f64().expect("a number") > 0.2);
    is_a_stage(&relaxed[0]["with"]);

    let needed = relaxed[0]["needed"].to_string();
    edit(folder.path(), "rail.toml", "cost = 0.20", &format!("cost = {needed}"));
    let given = document(&run(folder.path(), ["shortlist", "rail.toml", "--format", "json"]));
    assert_eq!(given["stages"][0]["stage"], relaxed[0]["with"], "the stage that the relaxed limit lets pass");
}

const LOSSES: [(&str, &[&str]); 6] = [
    ("high_switch", &["conduction", "overlap", "output_charge", "recovery"]),
    ("rectifier", &["conduction", "dead_time", "leakage"]),
    ("inductor", &["winding_dc", "winding_ac", "core"]),
    ("input_bank", &["esr"]),
    ("output_bank", &["esr"]),
    ("drive", &["high_gate", "rectifier_gate", "bias"]),
];
const FIGURES: [&str; 8] =
    ["duty", "ripple_a", "peak_a", "valley_a", "output_ripple_v", "input_ripple_v", "loss_w", "efficiency"];

fn is_a_point(point: &Value) {
    let mut all = vec!["input_v", "load_a", "ambient_c", "share", "mode"];
    all.extend(FIGURES);
    all.extend(["losses_w", "rms_a", "temperature_c"]);
    assert_eq!(keys(point), all);
    assert_eq!(keys(&point["losses_w"]), LOSSES.map(|(slot, _)| slot));
    for (slot, causes) in LOSSES {
        assert_eq!(keys(&point["losses_w"][slot]), causes);
    }
    assert_eq!(keys(&point["rms_a"]), ["high_switch", "rectifier", "inductor", "input_bank", "output_bank"]);
    assert_eq!(keys(&point["temperature_c"]), ["high_switch", "rectifier", "inductor"]);
}

fn is_an_account(account: &Value) {
    assert_eq!(
        keys(account),
        [
            "schema",
            "rail",
            "stage",
            "burden",
            "cost",
            "area_mm2",
            "weighted_loss_w",
            "weighted_efficiency",
            "resistance_w",
            "charge_w",
            "points",
            "limits",
            "assumed"
        ]
    );
    assert_eq!(account["schema"], "account/1");
    is_a_stage(&account["stage"]);
    rows(&account["points"]).iter().for_each(is_a_point);
    for limit in rows(&account["limits"]) {
        assert_eq!(keys(limit), ["limit", "slot", "part", "value", "bound", "margin", "point", "holds"]);
        assert!(limit["holds"].is_boolean());
    }
    for row in rows(&account["assumed"]) {
        assert_eq!(keys(row), ["slot", "part", "quantity", "value", "unit", "why"]);
    }
}

#[test]
fn account() {
    let account = document(&run(demo().path(), ["account", "rail.toml", "--format", "json"]));
    is_an_account(&account);
    let points = rows(&account["points"]);
    let corners: Vec<_> = points.iter().map(|p| (p["input_v"].as_f64(), p["load_a"].as_f64())).collect();
    let expected =
        [(18.0, 0.6), (18.0, 6.0), (24.0, 0.6), (24.0, 6.0), (30.0, 0.6), (30.0, 6.0)].map(|(v, i)| (Some(v), Some(i)));
    assert_eq!(corners, expected, "inputs ascending, then loads");
    let shares: Vec<_> = points.iter().map(|point| point["share"].as_f64().expect("a share")).collect();
    assert_eq!(shares, [0.0, 0.0, 0.9, 0.1, 0.0, 0.0]);
    for point in points {
        let mut losses = Vec::new();
        numbers(&point["losses_w"], &mut losses);
        let sum: f64 = losses.iter().sum();
        let loss = point["loss_w"].as_f64().expect("a loss");
        assert!(losses.len() == 15 && (sum - loss).abs() <= 1e-12 * loss, "{sum} {loss}");
        let out = 5.0 * point["load_a"].as_f64().expect("a load");
        let efficiency = point["efficiency"].as_f64().expect("an efficiency");
        assert!((efficiency - out / (out + loss)).abs() < 1e-12);
    }
}

#[test]
fn account_of_a_point_without_an_operating_state_has_null_for_every_number() {
    let folder = demo();
    edit(folder.path(), "rail.toml", "voltage = \"5 V\"\ncurrent", "voltage = \"17.9 V\"\ncurrent");
    let arguments = ["account", "rail.toml", "--stage", "-", "--format", "json"];
    let said = run_with(folder.path(), arguments, &first_stage());
    assert_eq!(said.status, 1, "{}", said.err);
    let account = document(&said);
    is_an_account(&account);
    let point = &account["points"][1];
    assert_eq!((&point["input_v"], &point["mode"]), (&18.0.into(), &"dropout".into()));
    for key in FIGURES {
        assert_eq!(point[key], Value::Null, "{key}");
    }
    let mut left = Vec::new();
    for key in ["losses_w", "rms_a", "temperature_c"] {
        numbers(&point[key], &mut left);
    }
    assert_eq!(left, [0.0; 0]);
    let dropout = rows(&account["limits"]).iter().find(|row| row["limit"] == "dropout").expect("a row");
    assert_eq!(dropout["holds"], false);
}

#[test]
fn account_without_a_weighted_point_has_no_burden() {
    let folder = demo();
    edit(folder.path(), "rail.toml", "temperature = \"55 °C\"", "temperature = \"495 °C\"");
    let arguments = ["account", "rail.toml", "--stage", "-", "--format", "json"];
    let account = document(&run_with(folder.path(), arguments, &first_stage()));
    assert_eq!(account["points"][3]["mode"], "runaway");
    for key in ["burden", "weighted_loss_w", "weighted_efficiency"] {
        assert_eq!(account[key], Value::Null, "{key}");
    }
    assert!(account["cost"].is_f64() && account["area_mm2"].is_f64());
}

#[test]
fn rail() {
    let rail = document(&run(demo().path(), ["rail", "rail.toml", "--format", "json"]));
    assert_eq!(rail["schema"], "rail/1");
    let keys_of_rows: Vec<_> = rows(&rail["keys"]).iter().map(keys).collect();
    assert!(keys_of_rows.iter().all(|row| *row == ["key", "value", "unit", "from"]));
    let of = |key: &str| rows(&rail["keys"]).iter().find(|row| row["key"] == key).expect("the key").clone();
    assert_eq!(of("input.surge")["value"], 34.0);
    assert_eq!(of("input.surge")["unit"], "V");
    assert_eq!(of("input.surge")["from"], "rail.toml:7");
    assert_eq!(of("limits.ringing")["value"], 1.2);
    assert!(
        of("limits.ringing")["from"].as_str().is_some_and(|from| from.contains("default")),
        "{}",
        of("limits.ringing")
    );
}

#[test]
fn audit() {
    let folder = demo();
    spoil(folder.path(), "diodes.csv", 3, "area [mm²]", "-26");
    let audit = document(&run(folder.path(), ["audit", "--catalogs", ".", "--format", "json"]));
    assert_eq!((keys(&audit)[0], &audit["schema"]), ("schema", &"audit/1".into()));
    let findings = rows(&audit["findings"]);
    assert!(!findings.is_empty());
    for finding in findings {
        assert_eq!(keys(finding), ["code", "catalog", "part", "column", "line", "value", "detail"]);
    }
}
