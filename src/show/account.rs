//! An account for people: every watt by cause at every point.

use std::fmt::Write;

use super::grid::{Grid, Side};
use super::number::{area, celsius, in_unit, margin, money, percent, plain, watts};
use super::shortlist::words;
use crate::account::{Account, LimitRow, Losses, Mode, PointAccount, Reading};
use crate::fault::visible;
use crate::quantity::{Dimension, format::engineering};

/// The word for a mode.
pub const fn mode(mode: Mode) -> &'static str {
    match mode {
        Mode::Continuous => "continuous",
        Mode::Discontinuous => "discontinuous",
        Mode::Dropout => "dropout",
        Mode::Runaway => "runaway",
        Mode::Underdriven => "underdriven",
    }
}

/// Every loss with its slot and cause, in the order of the current's way.
pub fn causes(losses: &Losses) -> [(&'static str, &'static str, f64); 15] {
    let Losses { high_switch, rectifier, inductor, input_bank, output_bank, drive } = losses;
    [
        ("high_switch", "conduction", high_switch.conduction),
        ("high_switch", "overlap", high_switch.overlap),
        ("high_switch", "output_charge", high_switch.output_charge),
        ("high_switch", "recovery", high_switch.recovery),
        ("rectifier", "conduction", rectifier.conduction),
        ("rectifier", "dead_time", rectifier.dead_time),
        ("rectifier", "leakage", rectifier.leakage),
        ("inductor", "winding_dc", inductor.winding_dc),
        ("inductor", "winding_ac", inductor.winding_ac),
        ("inductor", "core", inductor.core),
        ("input_bank", "esr", input_bank.esr),
        ("output_bank", "esr", output_bank.esr),
        ("drive", "high_gate", drive.high_gate),
        ("drive", "rectifier_gate", drive.rectifier_gate),
        ("drive", "bias", drive.bias),
    ]
}

/// Most points beside each other in one table.
const MOST_ABREAST: usize = 5;

/// The whole screen.
pub fn screen(account: &Account) -> String {
    let mut text = format!("{}\n{}\n\n", visible(&account.rail), visible(&words(&account.stage)));
    let broken: Vec<&LimitRow> = account.limits.iter().filter(|row| !row.holds).collect();
    if !broken.is_empty() {
        text.push_str("BROKEN LIMITS\n");
        text.push_str(&limits_table(account, broken.into_iter()));
        text.push('\n');
    }
    text.push_str(&summary(account));
    let tables = account.points.len().div_ceil(MOST_ABREAST).max(1);
    let abreast = account.points.len().div_ceil(tables).max(1);
    for (table, points) in account.points.chunks(abreast).enumerate() {
        text.push('\n');
        text.push_str(&points_table(points, table * abreast));
    }
    text.push_str("\nLIMITS, each at its worst point\n");
    text.push_str(&limits_table(account, account.limits.iter().filter(|row| row.holds)));
    if !account.assumed.is_empty() {
        text.push_str("\nASSUMED, for values the catalogs do not give\n");
        text.push_str(&assumed_table(account));
    }
    text
}

/// The sums; writing to a string cannot fail.
fn summary(account: &Account) -> String {
    let mut text = String::new();
    if let (Some(loss_w), Some(efficiency)) = (account.weighted_loss_w, account.weighted_efficiency) {
        let _ = writeln!(
            text,
            "weighted over the load profile at typical input: loss {}, efficiency {}",
            watts(loss_w),
            percent(efficiency)
        );
    }
    if let (Some(resistance_w), Some(charge_w)) = (account.resistance_w, account.charge_w) {
        let _ = writeln!(
            text,
            "of that by switch resistance {} (falls with a larger die), by switch charge {} (grows with it)",
            watts(resistance_w),
            watts(charge_w)
        );
    }
    let burden = account.burden.map_or_else(|| "unknown".to_owned(), |burden| format!("{burden:.4}"));
    let _ = writeln!(text, "burden {burden}, cost {}, area {}", money(account.cost), area(account.area_mm2));
    text
}

fn points_table(points: &[PointAccount], first: usize) -> String {
    let titles: Vec<String> = (0..points.len()).map(|place| format!("point {}", first + place)).collect();
    let mut columns = vec![("LOSSES AND CURRENTS", Side::Left)];
    columns.extend(titles.iter().map(|title| (title.as_str(), Side::Right)));
    let mut grid = Grid::new(&columns);
    let mut row = |title: &str, cell: &dyn Fn(&PointAccount) -> String| {
        grid.row(std::iter::once(title.to_owned()).chain(points.iter().map(cell)));
    };
    let amps = |value: f64| engineering(value, Dimension::Current, 3);
    let volts = |value: f64| engineering(value, Dimension::Voltage, 3);
    row("input", &|p| volts(p.input_v));
    row("load", &|p| amps(p.load_a));
    row("share of time", &|p| if p.share > 0.0 { percent(p.share) } else { String::new() });
    row("mode", &|p| mode(p.mode).to_owned());
    let reading = |figure: &dyn Fn(&Reading) -> String| {
        let figures: Vec<String> =
            points.iter().map(|p| p.reading.as_ref().map_or_else(|| "—".to_owned(), figure)).collect();
        figures
    };
    let mut figures = |title: &str, figure: &dyn Fn(&Reading) -> String| {
        grid.row(std::iter::once(title.to_owned()).chain(reading(figure)));
    };
    for place in 0..15 {
        let (slot, cause, _) = causes(&Losses::default())[place];
        figures(&format!("{} {}", plain(slot), plain(cause)), &|r| watts(causes(&r.losses_w)[place].2));
    }
    figures("all losses", &|r| watts(r.loss_w));
    figures("efficiency", &|r| percent(r.efficiency));
    figures("duty", &|r| percent(r.duty));
    figures("inductor ripple", &|r| amps(r.ripple_a));
    figures("inductor peak", &|r| amps(r.peak_a));
    figures("inductor valley", &|r| amps(r.valley_a));
    figures("output ripple", &|r| volts(r.output_ripple_v));
    figures("input ripple", &|r| volts(r.input_ripple_v));
    figures("high switch rms", &|r| amps(r.rms_a.high_switch));
    figures("rectifier rms", &|r| amps(r.rms_a.rectifier));
    figures("inductor rms", &|r| amps(r.rms_a.inductor));
    figures("input bank rms", &|r| amps(r.rms_a.input_bank));
    figures("output bank rms", &|r| amps(r.rms_a.output_bank));
    figures("high switch junction", &|r| celsius(r.temperature_c.high_switch));
    figures("rectifier junction", &|r| celsius(r.temperature_c.rectifier));
    figures("inductor winding", &|r| celsius(r.temperature_c.inductor));
    grid.render(0)
}

fn limits_table<'a>(account: &Account, rows: impl Iterator<Item = &'a LimitRow>) -> String {
    let mut grid = Grid::new(&[
        ("limit", Side::Left),
        ("slot", Side::Left),
        ("part", Side::Left),
        ("value", Side::Right),
        ("bound", Side::Right),
        ("margin", Side::Right),
        ("where", Side::Left),
    ]);
    for row in rows {
        let unit = row.limit.unit();
        let number = |value: Option<f64>| value.map_or_else(String::new, |value| in_unit(value, unit));
        let place = row.point.and_then(|point| account.points.get(point)).map_or_else(String::new, |point| {
            format!(
                "{}, {}",
                engineering(point.input_v, Dimension::Voltage, 3),
                engineering(point.load_a, Dimension::Current, 3)
            )
        });
        grid.row([
            row.limit.name().to_owned(),
            plain(row.slot),
            row.part.clone(),
            number(row.value),
            number(row.bound),
            row.margin.map_or_else(|| if row.holds { "holds" } else { "broken" }.to_owned(), margin),
            place,
        ]);
    }
    grid.render(0)
}

fn assumed_table(account: &Account) -> String {
    let mut grid = Grid::new(&[
        ("slot", Side::Left),
        ("part", Side::Left),
        ("quantity", Side::Left),
        ("taken", Side::Right),
        ("because", Side::Left),
    ]);
    for row in &account.assumed {
        grid.row([
            plain(row.slot),
            row.part.clone(),
            row.quantity.to_owned(),
            row.value.map_or_else(|| "nothing".to_owned(), |value| in_unit(value, row.unit)),
            row.why.to_owned(),
        ]);
    }
    grid.render(0)
}
