//! Results for programs: SI units in the key names, every document with its schema.

use serde::Serialize;
use serde_json::{Map, Value, json};

use crate::account::{Account, PointAccount};
use crate::answer::rail::Understood;
use crate::answer::shortlist::{Pick, Shortlist};
use crate::fault::{Fault, Faults, Severity};

/// A document as text with a line feed at its end.
pub fn text(document: &Value) -> String {
    format!("{document:#}\n")
}

/// `account/1`.
pub fn account(account: &Account) -> Value {
    json!({
        "schema": "account/1",
        "rail": account.rail,
        "stage": account.stage,
        "burden": account.burden,
        "cost": account.cost,
        "area_mm2": account.area_mm2,
        "weighted_loss_w": account.weighted_loss_w,
        "weighted_efficiency": account.weighted_efficiency,
        "resistance_w": account.resistance_w,
        "charge_w": account.charge_w,
        "points": account.points.iter().map(point).collect::<Vec<_>>(),
        "limits": account.limits,
        "assumed": account.assumed,
    })
}

fn point(point: &PointAccount) -> Value {
    let reading = point.reading.unwrap_or_default();
    let known = point.reading.is_some();
    let mut document = json!({
        "input_v": point.input_v,
        "load_a": point.load_a,
        "ambient_c": point.ambient_c,
        "share": point.share,
        "mode": point.mode,
    });
    let numbers = json!({
        "duty": reading.duty,
        "ripple_a": reading.ripple_a,
        "peak_a": reading.peak_a,
        "valley_a": reading.valley_a,
        "output_ripple_v": reading.output_ripple_v,
        "input_ripple_v": reading.input_ripple_v,
        "loss_w": reading.loss_w,
        "efficiency": reading.efficiency,
        "losses_w": reading.losses_w,
        "rms_a": reading.rms_a,
        "temperature_c": reading.temperature_c,
    });
    let numbers = if known { numbers } else { without_numbers(numbers) };
    if let (Some(document), Value::Object(numbers)) = (document.as_object_mut(), numbers) {
        document.extend(numbers);
    }
    document
}

/// The same document with null for every number.
fn without_numbers(value: Value) -> Value {
    match value {
        Value::Object(map) => {
            Value::Object(map.into_iter().map(|(key, value)| (key, without_numbers(value))).collect::<Map<_, _>>())
        }
        _ => Value::Null,
    }
}

#[derive(Serialize)]
struct DroppedRow {
    limit: &'static str,
    slot: &'static str,
    parts: usize,
}

/// `shortlist/1`.
pub fn shortlist(list: &Shortlist) -> Value {
    let dropped: Vec<DroppedRow> = list
        .dropped
        .iter()
        .map(|row| DroppedRow { limit: row.limit.name(), slot: row.slot.name(), parts: row.parts })
        .collect();
    json!({
        "schema": "shortlist/1",
        "rail": list.rail,
        "crossed": list.crossed.to_string(),
        "evaluated": list.evaluated,
        "proven": list.proven,
        "open_bound": list.open_bound,
        "stages": list.picks.iter().map(pick).collect::<Vec<_>>(),
        "nothing_passes": list.nothing_passes,
        "dropped": dropped,
    })
}

fn pick(pick: &Pick) -> Value {
    json!({
        "rank": pick.rank,
        "stage": pick.stage,
        "burden": pick.burden,
        "cost": pick.cost,
        "area_mm2": pick.area_mm2,
        "weighted_loss_w": pick.weighted_loss_w,
        "weighted_efficiency": pick.weighted_efficiency,
        "resistance_w": pick.resistance_w,
        "charge_w": pick.charge_w,
        "tightest": pick.tightest,
        "assumed": pick.assumed,
        "hottest_junction_c": pick.hottest_junction_c,
        "core_loss_unknown": pick.core_loss_unknown,
    })
}

/// `rail/1`.
pub fn rail(understood: &Understood) -> Value {
    json!({ "schema": "rail/1", "rail": understood.rail, "keys": understood.keys })
}

/// `audit/1`.
pub fn audit(faults: &Faults) -> Value {
    let findings: Vec<Value> = faults.errors().chain(faults.warnings()).map(finding).collect();
    json!({ "schema": "audit/1", "findings": findings })
}

fn finding(fault: &Fault) -> Value {
    let code = match fault.severity {
        Severity::Error => "bad_cell",
        Severity::Warning => "doubtful_cell",
    };
    json!({
        "code": code,
        "catalog": fault.file,
        "part": Value::Null,
        "column": fault.column,
        "line": fault.line,
        "value": fault.excerpt.get(fault.mark.clone()).unwrap_or_default(),
        "detail": fault.found,
    })
}
