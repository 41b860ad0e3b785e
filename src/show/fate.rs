//! What became of each part, for people, spreadsheets and programs.

use std::fmt::Write;

use serde_json::{Value, json};

use super::grid::{Grid, Side};
use super::number::{hertz, in_unit, plain};
use super::shortlist::words;
use crate::answer::fate::{Fate, Fates, Outcome, Place, Stop};
use crate::fault::visible;

/// The whole screen: parts that pass, the cheapest to use first, then the others with what stops them.
pub fn screen(fates: &Fates) -> String {
    let mut text = format!("{}\n\n", visible(&fates.rail));
    match &fates.best {
        Some(best) => {
            let _ = writeln!(text, "best of all: burden {:.4} with {}\n", best.burden, visible(&words(&best.stage)));
        }
        None => text.push_str("nothing meets all limits\n\n"),
    }
    let mut passing: Vec<(&Fate, &Place)> = fates
        .fates
        .iter()
        .filter_map(|fate| match &fate.outcome {
            Outcome::Passes(place) => Some((fate, place)),
            _ => None,
        })
        .collect();
    passing.sort_by(|a, b| a.1.penalty.total_cmp(&b.1.penalty));
    if !passing.is_empty() {
        text.push_str(&passing_table(&passing));
        let _ = writeln!(
            text,
            "penalty: by how much the best stage with the part is worse than the best of all; rank: its place in the \
             shortlist,\n- beyond {}\n",
            fates.ranked_to
        );
    }
    text.push_str(&stopped(fates));
    text
}

fn passing_table(passing: &[(&Fate, &Place)]) -> String {
    let mut grid = Grid::new(&[
        ("part", Side::Left),
        ("as", Side::Left),
        ("rank", Side::Right),
        ("burden", Side::Right),
        ("penalty", Side::Right),
        ("loss", Side::Right),
        ("cost", Side::Right),
        ("area", Side::Right),
    ]);
    for (fate, place) in passing {
        let signed = |value: Option<f64>, unit: &str, digits: usize| {
            value.map_or_else(|| "?".to_owned(), |value| format!("{value:+.digits$}{unit}"))
        };
        grid.row([
            fate.part.clone(),
            plain(fate.slot.name()),
            place.rank.map_or_else(|| "-".to_owned(), |rank| rank.to_string()),
            format!("{:.4}", place.burden),
            format!("{:+.4}", place.penalty),
            format!("{:+.1} mW", place.loss_penalty_w * 1e3),
            signed(place.cost_penalty, "", 2),
            signed(place.area_penalty_mm2, " mm²", 1),
        ]);
    }
    grid.render_blocks()
}

fn stopped(fates: &Fates) -> String {
    let mut grid = Grid::new(&[("part", Side::Left), ("as", Side::Left), ("why not", Side::Left)]);
    let mut any = false;
    for fate in &fates.fates {
        let why = match &fate.outcome {
            Outcome::Passes(_) => continue,
            Outcome::Stopped(stop) => sentence(stop),
            Outcome::PinnedOut => "the rail pins other parts here".to_owned(),
            Outcome::Banned => "banned by the rail".to_owned(),
        };
        any = true;
        grid.row([fate.part.clone(), plain(fate.slot.name()), why]);
    }
    if any { format!("no stage with these passes:\n{}", grid.render(2)) } else { String::new() }
}

/// What stops a part, in one sentence.
pub fn sentence(stop: &Stop) -> String {
    let mut text = match (stop.limit, stop.value, stop.bound) {
        (None, ..) => "no single limit that gives lets it in".to_owned(),
        (Some(limit), Some(value), Some(bound)) => {
            let unit = limit.unit();
            let name = plain(limit.name());
            let way = match (&stop.nearest, stop.is_least) {
                (None, _) => ", and not that alone",
                (Some(_), true) => "",
                (Some(_), false) => ", in the best stage with it",
            };
            format!("{name}: {} where {} is the bound{way}", in_unit(value, unit), in_unit(bound, unit))
        }
        (Some(limit), ..) => plain(limit.name()),
    };
    if let Some(elsewhere) = &stop.elsewhere {
        let _ = write!(text, "; passes at {}", hertz(elsewhere.frequency_hz));
    }
    text
}

/// `fate/1`.
pub fn json(fates: &Fates) -> Value {
    json!({
        "schema": "fate/1",
        "rail": fates.rail,
        "best": fates.best,
        "ranked_to": fates.ranked_to,
        "parts": fates.fates.iter().map(part).collect::<Vec<_>>(),
    })
}

fn part(fate: &Fate) -> Value {
    let mut document = json!({ "catalog": fate.catalog, "part": fate.part, "slot": fate.slot.name() });
    let more = match &fate.outcome {
        Outcome::Passes(place) => json!(place),
        Outcome::Stopped(stop) => json!({
            "limit": stop.limit,
            "value": stop.value,
            "bound": stop.bound,
            "nearest": stop.nearest,
            "least": stop.is_least,
            "elsewhere": stop.elsewhere,
            "why": sentence(stop),
        }),
        Outcome::PinnedOut => kept_out("pinned_out"),
        Outcome::Banned => kept_out("banned"),
    };
    if let (Some(document), Value::Object(more)) = (document.as_object_mut(), more) {
        document.extend(more);
    }
    document
}

fn kept_out(why: &str) -> Value {
    json!({ "limit": why, "value": null, "bound": null, "nearest": null })
}

/// One row a part and slot.
pub fn csv(fates: &Fates) -> String {
    let header = [
        "catalog",
        "part",
        "slot",
        "rank",
        "burden",
        "penalty",
        "loss_penalty [W]",
        "cost_penalty",
        "area_penalty [mm²]",
        "limit",
        "value",
        "bound",
        "stage",
    ];
    let number = |value: Option<f64>| value.map_or_else(String::new, |value| value.to_string());
    let rows = fates.fates.iter().map(|fate| {
        let mut row = vec![fate.catalog.to_owned(), super::csv::harmless(&fate.part), fate.slot.name().to_owned()];
        row.extend(match &fate.outcome {
            Outcome::Passes(place) => [
                place.rank.map_or_else(String::new, |rank| rank.to_string()),
                place.burden.to_string(),
                place.penalty.to_string(),
                place.loss_penalty_w.to_string(),
                number(place.cost_penalty),
                number(place.area_penalty_mm2),
                String::new(),
                String::new(),
                String::new(),
                super::csv::harmless(&words(&place.stage)),
            ],
            Outcome::Stopped(stop) => without_place(
                stop.limit.map_or("", |limit| limit.name()),
                number(stop.value),
                number(stop.bound),
                stop.nearest.as_ref().map_or_else(String::new, |stage| super::csv::harmless(&words(stage))),
            ),
            Outcome::PinnedOut => without_place("pinned_out", String::new(), String::new(), String::new()),
            Outcome::Banned => without_place("banned", String::new(), String::new(), String::new()),
        });
        row
    });
    super::csv::document(&header, rows)
}

fn without_place(limit: &str, value: String, bound: String, stage: String) -> [String; 10] {
    let [a, b, c, d, e, f] = [const { String::new() }; 6];
    [a, b, c, d, e, f, limit.to_owned(), value, bound, stage]
}
