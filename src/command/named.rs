//! A stage given by hand, to the parts it names.

use super::failure::Failure;
use crate::part::{Identity, Parts};
use crate::quantity::number::{self, Mark};
use crate::quantity::{Dimension, Unit};
use crate::rail::defaults::MOST_PARALLEL;
use crate::stage::{Choice, NamedChoice, NamedRectifier, NamedStage, RectifierKind, Stage};

const SLOTS: [&str; 5] = ["high", "rectifier", "inductor", "input", "output"];

/// The stage that `--parts` and `--frequency` describe.
pub(super) fn from_words(words: &str, frequency: &str, parts: &Parts) -> Result<NamedStage, Failure> {
    let mut found: [Option<(String, u32)>; 5] = Default::default();
    for piece in pieces(words) {
        let Some((slot, part)) = piece.split_once('=') else {
            return Err(Failure::Usage(format!("--parts: `{piece}` is not `slot=part`")));
        };
        let Some(place) = SLOTS.iter().position(|known| *known == slot.trim()) else {
            let known = SLOTS.join(", ");
            return Err(Failure::Usage(format!("--parts: `{}` is no slot; the slots are {known}", slot.trim())));
        };
        if found[place].replace(counted(part.trim())?).is_some() {
            return Err(Failure::Usage(format!("--parts: `{}` stands twice", slot.trim())));
        }
    }
    if let Some(place) = found.iter().position(Option::is_none) {
        return Err(Failure::Usage(format!("--parts: `{}=` is missing", SLOTS[place])));
    }
    let [high, rectifier, inductor, input, output] = found.map(Option::unwrap_or_default);
    let (kind, part) = rectifier_kind(&rectifier.0, parts)?;
    let choice = |(part, count): (String, u32)| NamedChoice { part, count };
    Ok(NamedStage {
        frequency_hz: frequency_hz(frequency)?,
        high_switch: choice(high),
        rectifier: NamedRectifier { kind, part, count: rectifier.1 },
        inductor: choice(inductor),
        input_bank: choice(input),
        output_bank: choice(output),
    })
}

/// Cuts at the commas that a slot follows: part names may hold commas themselves.
fn pieces(words: &str) -> Vec<&str> {
    let starts_slot = |rest: &str| {
        SLOTS
            .iter()
            .any(|slot| rest.trim_start().strip_prefix(slot).is_some_and(|rest| rest.trim_start().starts_with('=')))
    };
    let mut pieces = Vec::new();
    let mut start = 0;
    for (at, _) in words.match_indices(',') {
        if starts_slot(&words[at + 1..]) {
            pieces.push(&words[start..at]);
            start = at + 1;
        }
    }
    pieces.push(&words[start..]);
    pieces
}

/// A part name and its count: a `*` and digits at the end.
fn counted(part: &str) -> Result<(String, u32), Failure> {
    if let Some((name, digits)) = part.rsplit_once('*')
        && !digits.trim().is_empty()
        && digits.trim().bytes().all(|byte| byte.is_ascii_digit())
    {
        let count = digits.trim().parse().unwrap_or(0);
        return match count {
            1..=MOST_PARALLEL => Ok((name.trim().to_owned(), count)),
            _ => Err(Failure::Usage(format!("--parts: a count is from 1 to {MOST_PARALLEL}, not {}", digits.trim()))),
        };
    }
    Ok((part.to_owned(), 1))
}

fn rectifier_kind(name: &str, parts: &Parts) -> Result<(RectifierKind, String), Failure> {
    for (prefix, kind) in [("switch:", RectifierKind::Switch), ("diode:", RectifierKind::Diode)] {
        if let Some(rest) = name.strip_prefix(prefix) {
            return Ok((kind, rest.trim().to_owned()));
        }
    }
    let switch = parts.switches.iter().any(|part| part.identity.part == name);
    let diode = parts.diodes.iter().any(|part| part.identity.part == name);
    match (switch, diode) {
        (true, true) => Err(Failure::Usage(format!(
            "--parts: `{name}` is a switch and a diode; write `rectifier=switch:{name}` or `rectifier=diode:{name}`"
        ))),
        (false, true) => Ok((RectifierKind::Diode, name.to_owned())),
        _ => Ok((RectifierKind::Switch, name.to_owned())),
    }
}

fn frequency_hz(text: &str) -> Result<f64, Failure> {
    let hertz = Unit { dimension: Dimension::Frequency, exponent: 0 };
    number::parse(text, Dimension::Frequency, Some(hertz), Mark::Point)
        .map_err(|fault| Failure::Usage(format!("--frequency: {fault}")))
}

/// The parts of a named stage.
pub(super) fn find(named: &NamedStage, parts: &Parts) -> Result<Stage, Failure> {
    if !(named.frequency_hz.is_finite() && named.frequency_hz > 0.0) {
        return Err(Failure::Usage(format!("the frequency is {} Hz; it must be above zero", named.frequency_hz)));
    }
    let (switches, capacitors) = ("switches", "capacitors");
    let rectifier = match named.rectifier.kind {
        RectifierKind::Switch => index(&named.rectifier.part, parts.switches.iter().map(|p| &p.identity), switches)?,
        RectifierKind::Diode => index(&named.rectifier.part, parts.diodes.iter().map(|p| &p.identity), "diodes")?,
    };
    let switch_ids = || parts.switches.iter().map(|part| &part.identity);
    let capacitor_ids = || parts.capacitors.iter().map(|part| &part.identity);
    if named.inductor.count != 1 {
        return Err(Failure::Usage("a stage has one inductor; its count must be 1".to_owned()));
    }
    Ok(Stage {
        frequency_hz: named.frequency_hz,
        high_switch: Choice {
            index: index(&named.high_switch.part, switch_ids(), switches)?,
            count: count(named.high_switch.count)?,
        },
        rectifier_kind: named.rectifier.kind,
        rectifier: Choice { index: rectifier, count: count(named.rectifier.count)? },
        inductor: index(&named.inductor.part, parts.inductors.iter().map(|part| &part.identity), "inductors")?,
        input_bank: Choice {
            index: index(&named.input_bank.part, capacitor_ids(), capacitors)?,
            count: count(named.input_bank.count)?,
        },
        output_bank: Choice {
            index: index(&named.output_bank.part, capacitor_ids(), capacitors)?,
            count: count(named.output_bank.count)?,
        },
    })
}

fn count(count: u32) -> Result<u32, Failure> {
    match count {
        1..=MOST_PARALLEL => Ok(count),
        _ => Err(Failure::Usage(format!("a count is from 1 to {MOST_PARALLEL}, not {count}"))),
    }
}

fn index<'a>(name: &str, identities: impl Iterator<Item = &'a Identity>, catalog: &str) -> Result<usize, Failure> {
    let names: Vec<&str> = identities.map(|identity| identity.part.as_str()).collect();
    names.iter().position(|known| *known == name).ok_or_else(|| {
        let hint = crate::fault::nearest(name, names.iter().copied())
            .map_or_else(String::new, |near| format!("; the nearest name there is `{near}`"));
        Failure::Usage(format!("no part `{name}` in {catalog}{hint}"))
    })
}
