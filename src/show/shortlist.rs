//! The shortlist for people.

use std::collections::BTreeMap;
use std::fmt::Write;

use super::grid::{Grid, Side};
use super::number::{area, celsius, grouped, hertz, in_unit, margin, money, percent, plain, watts};
use crate::answer::shortlist::{Pick, Shortlist};
use crate::fault::visible;
use crate::stage::NamedStage;

fn times(part: &str, count: u32) -> String {
    if count == 1 { part.to_owned() } else { format!("{count}× {part}") }
}

/// The whole screen.
pub fn screen(list: &Shortlist) -> String {
    let mut text = format!("{}\n\n", visible(&list.rail));
    if list.picks.is_empty() && list.proven {
        text.push_str(&nothing_passes(list));
    } else if !list.picks.is_empty() {
        for table in [stages_table, figures_table, banks_table] {
            text.push_str(&table(&list.picks));
            text.push('\n');
        }
        text.push_str(&notes(list));
    }
    text.push_str(&foundation(list));
    text
}

/// What each stage is, and how good.
fn stages_table(picks: &[Pick]) -> String {
    let mut grid = Grid::new(&[
        ("rank", Side::Right),
        ("high switch", Side::Left),
        ("rectifier", Side::Left),
        ("inductor", Side::Left),
        ("burden", Side::Right),
        ("efficiency", Side::Right),
        ("loss", Side::Right),
        ("", Side::Left),
    ]);
    for pick in picks {
        let stage = &pick.stage;
        grid.row([
            pick.rank.to_string(),
            times(&stage.high_switch.part, stage.high_switch.count),
            format!("{} ({})", times(&stage.rectifier.part, stage.rectifier.count), stage.rectifier.kind.name()),
            stage.inductor.part.clone(),
            format!("{:.4}", pick.burden),
            percent(pick.weighted_efficiency),
            watts(pick.weighted_loss_w),
            if pick.core_loss_unknown { "†".to_owned() } else { String::new() },
        ]);
    }
    grid.render_blocks()
}

/// What the loss is made of, what limits the stage, and what it costs.
fn figures_table(picks: &[Pick]) -> String {
    let mut grid = Grid::new(&[
        ("rank", Side::Right),
        ("by resistance", Side::Right),
        ("by charge", Side::Right),
        ("hottest", Side::Right),
        ("tightest limit", Side::Left),
        ("cost", Side::Right),
        ("area", Side::Right),
    ]);
    for pick in picks {
        let tightest = pick.tightest.map_or_else(
            || "none".to_owned(),
            |tightest| format!("{} {}", tightest.limit.name(), margin(tightest.margin)),
        );
        grid.row([
            pick.rank.to_string(),
            watts(pick.resistance_w),
            watts(pick.charge_w),
            celsius(pick.hottest_junction_c),
            tightest,
            money(pick.cost),
            area(pick.area_mm2),
        ]);
    }
    grid.render_blocks()
}

fn banks_table(picks: &[Pick]) -> String {
    let mut grid = Grid::new(&[
        ("rank", Side::Right),
        ("input bank", Side::Left),
        ("output bank", Side::Left),
        ("frequency", Side::Right),
    ]);
    for pick in picks {
        let NamedStage { input_bank, output_bank, frequency_hz, .. } = &pick.stage;
        grid.row([
            pick.rank.to_string(),
            times(&input_bank.part, input_bank.count),
            times(&output_bank.part, output_bank.count),
            hertz(*frequency_hz),
        ]);
    }
    grid.render_blocks()
}

/// What stands under the tables; writing to a string cannot fail.
fn notes(list: &Shortlist) -> String {
    let mut text =
        String::from("by resistance: what of the loss falls with a larger switch; by charge: what grows with it\n");
    if list.picks.iter().any(|pick| pick.core_loss_unknown) {
        text.push_str("† core loss unknown and counted as none: the true loss is higher\n");
    }
    let (least, most) = list
        .picks
        .iter()
        .fold((usize::MAX, 0), |(least, most), pick| (least.min(pick.assumed), most.max(pick.assumed)));
    if most > 0 {
        let figures = if least == most { most.to_string() } else { format!("{least} to {most}") };
        let _ = writeln!(
            text,
            "{figures} figures of each stage rest on a default; `wattsieve account RAIL --rank N` names them"
        );
    }
    let mut tightest: BTreeMap<&str, usize> = BTreeMap::new();
    for pick in &list.picks {
        if let Some(limit) = pick.tightest {
            *tightest.entry(limit.limit.name()).or_default() += 1;
        }
    }
    if let Some((limit, count)) = tightest.iter().max_by_key(|(_, count)| **count) {
        let _ = writeln!(text, "tightest over the list: {limit}, in {count} of {} stages", list.picks.len());
    }
    text
}

fn foundation(list: &Shortlist) -> String {
    let proof = match (list.open_bound, list.picks.last()) {
        (None, None) => "proven: every one of them breaks a limit".to_owned(),
        (None, Some(_)) => "proven: every other stage is worse or breaks a limit".to_owned(),
        (Some(open), Some(last)) => format!(
            "NOT PROVEN: stopped; an untried stage could have a burden of {open:.4}, {:.2} % below the last place",
            (last.burden - open) / last.burden * 100.0
        ),
        (Some(_), None) => "NOT PROVEN: stopped before any stage was found".to_owned(),
    };
    let mut text = format!(
        "crossed {} stages; the full model ran on {} of them\n{}\n",
        grouped(&list.crossed.to_string()),
        grouped(&list.evaluated.to_string()),
        proof
    );
    for row in &list.dropped {
        let plural = if row.parts == 1 { "part" } else { "parts" };
        let _ =
            writeln!(text, "  {} {plural} left out as {} by {}", row.parts, plain(row.slot.name()), row.limit.name());
    }
    text
}

fn nothing_passes(list: &Shortlist) -> String {
    let mut text = String::from("nothing meets all limits\n\n");
    match list.nothing_passes.as_deref() {
        None => text.push_str("stopped before it was known how far each limit would have to give\n\n"),
        Some([]) => text.push_str("no limit alone, however far it gives, lets anything pass\n\n"),
        Some(misses) => {
            text.push_str("the least that one limit alone would have to give:\n");
            let mut grid = Grid::new(&[
                ("limit", Side::Left),
                ("now", Side::Right),
                ("needed", Side::Right),
                ("with", Side::Left),
            ]);
            for miss in misses {
                let unit = miss.limit.unit();
                grid.row([
                    miss.limit.name().to_owned(),
                    in_unit(miss.bound, unit),
                    in_unit(miss.needed, unit),
                    words(&miss.with),
                ]);
            }
            text.push_str(&grid.render(2));
            text.push('\n');
        }
    }
    text
}

/// A stage in one line.
pub fn words(stage: &NamedStage) -> String {
    format!(
        "{}, {} ({}), {}, {}, {} at {}",
        times(&stage.high_switch.part, stage.high_switch.count),
        times(&stage.rectifier.part, stage.rectifier.count),
        stage.rectifier.kind.name(),
        stage.inductor.part,
        times(&stage.input_bank.part, stage.input_bank.count),
        times(&stage.output_bank.part, stage.output_bank.count),
        hertz(stage.frequency_hz)
    )
}
