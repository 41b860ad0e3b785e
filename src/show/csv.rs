//! Results for spreadsheets: headers in the grammar of the catalogs, `quantity [unit]`.

use crate::account::Account;
use crate::answer::rail::Understood;
use crate::answer::shortlist::Shortlist;
use crate::fault::Faults;
use crate::rail::Value;

/// A text cell that a spreadsheet would take for a formula is written with an apostrophe before it. Our own reader takes the
/// apostrophe off again, so that an exported name reads back equal.
pub fn harmless(cell: &str) -> String {
    match cell.chars().next() {
        Some('=' | '+' | '-' | '@' | '\t' | '\r' | '\'') => format!("'{cell}"),
        _ => cell.to_owned(),
    }
}

pub(super) fn document(header: &[&str], rows: impl IntoIterator<Item = Vec<String>>) -> String {
    let mut writer = csv::Writer::from_writer(Vec::new());
    // Writing to memory cannot fail, and all rows are of one length.
    let _ = writer.write_record(header);
    for row in rows {
        let _ = writer.write_record(row);
    }
    let bytes = writer.into_inner().unwrap_or_default();
    String::from_utf8(bytes).unwrap_or_default()
}

fn number(value: Option<f64>) -> String {
    value.map_or_else(String::new, |value| value.to_string())
}

/// One row a stage.
pub fn shortlist(list: &Shortlist) -> String {
    let header = [
        "rank",
        "high_switch",
        "high_switch_count",
        "rectifier_kind",
        "rectifier",
        "rectifier_count",
        "inductor",
        "input",
        "input_count",
        "output",
        "output_count",
        "frequency [Hz]",
        "burden",
        "weighted_efficiency",
        "weighted_loss [W]",
        "resistance_loss [W]",
        "charge_loss [W]",
        "hottest_junction [°C]",
        "tightest_limit",
        "tightest_margin",
        "cost",
        "area [mm²]",
        "assumed",
    ];
    let rows = list.picks.iter().map(|pick| {
        let stage = &pick.stage;
        vec![
            pick.rank.to_string(),
            harmless(&stage.high_switch.part),
            stage.high_switch.count.to_string(),
            stage.rectifier.kind.name().to_owned(),
            harmless(&stage.rectifier.part),
            stage.rectifier.count.to_string(),
            harmless(&stage.inductor.part),
            harmless(&stage.input_bank.part),
            stage.input_bank.count.to_string(),
            harmless(&stage.output_bank.part),
            stage.output_bank.count.to_string(),
            stage.frequency_hz.to_string(),
            pick.burden.to_string(),
            pick.weighted_efficiency.to_string(),
            pick.weighted_loss_w.to_string(),
            pick.resistance_w.to_string(),
            pick.charge_w.to_string(),
            pick.hottest_junction_c.to_string(),
            pick.tightest.map_or_else(String::new, |tightest| tightest.limit.name().to_owned()),
            number(pick.tightest.map(|tightest| tightest.margin)),
            number(pick.cost),
            number(pick.area_mm2),
            pick.assumed.to_string(),
        ]
    });
    document(&header, rows)
}

/// One row a point and loss.
pub fn account(account: &Account) -> String {
    let header = ["input [V]", "load [A]", "share", "mode", "slot", "cause", "loss [W]"];
    let rows = account.points.iter().flat_map(|point| {
        super::account::causes(&point.reading.map(|reading| reading.losses_w).unwrap_or_default())
            .into_iter()
            .map(|(slot, cause, loss_w)| {
                vec![
                    point.input_v.to_string(),
                    point.load_a.to_string(),
                    point.share.to_string(),
                    super::account::mode(point.mode).to_owned(),
                    slot.to_owned(),
                    cause.to_owned(),
                    number(point.reading.map(|_| loss_w)),
                ]
            })
            .collect::<Vec<_>>()
    });
    document(&header, rows)
}

/// One row a finding.
pub fn audit(faults: &Faults) -> String {
    let rows = faults.errors().chain(faults.warnings()).map(|fault| {
        let value = fault.excerpt.get(fault.mark.clone()).unwrap_or_default();
        vec![
            fault.severity.name().to_owned(),
            harmless(&fault.file),
            fault.line.to_string(),
            fault.column.to_string(),
            harmless(value),
            harmless(&fault.found),
        ]
    });
    document(&["severity", "catalog", "line", "column", "value", "detail"], rows)
}

/// One row a key.
pub fn rail(understood: &Understood) -> String {
    let rows = understood.keys.iter().map(|key| {
        let value = match &key.value {
            Value::Nothing => String::new(),
            Value::Number(number) => number.to_string(),
            Value::Numbers(numbers) => numbers.iter().map(f64::to_string).collect::<Vec<_>>().join(" "),
            Value::Count(count) => count.to_string(),
            Value::Text(text) => harmless(text),
            Value::Texts(texts) => harmless(&texts.join(" ")),
        };
        vec![key.key.clone(), value, key.unit.unwrap_or("").to_owned(), harmless(&key.from)]
    });
    document(&["key", "value", "unit", "from"], rows)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn formulas_are_neutralised() {
        for cell in ["=1+1", "+1", "-1", "@x", "\t=1", "\r=1"] {
            assert_eq!(harmless(cell), format!("'{cell}"));
        }
        assert_eq!(harmless("Q1-2"), "Q1-2");
    }
}
