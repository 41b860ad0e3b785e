//! The load profile: every `[[load]]`.

use toml::Spanned;
use toml::de::{DeTable, DeValue};

use super::reader::{Node, Reader};
use crate::quantity::Positive;
use crate::rail::defaults::{Key, LOAD_CURRENT, LOAD_SHARE, MOST_LISTED, Preset};
use crate::rail::origin::Value;
use crate::rail::typed::Load;

/// The loads, ascending in current, equal currents merged, shares summing to 1.
pub(super) fn loads(reader: &mut Reader<'_>) -> Option<Vec<Load>> {
    let items = reader.find("load").map(|node| (node, node.get_ref().as_array()));
    let Some((node, items)) = items else {
        return full_load(reader);
    };
    let items: Vec<_> = items?.iter().collect();
    if items.is_empty() {
        return full_load(reader);
    }
    if items.len() > MOST_LISTED {
        reader.refuse(node.span(), format!("there are {} loads", items.len()), format!("at most {MOST_LISTED}"));
        return None;
    }
    let tables: Vec<(Node<'_>, &DeTable<'_>)> =
        items.iter().map(|item| Some((*item, item.get_ref().as_table()?))).collect::<Option<_>>()?;
    let shared = tables.iter().any(|(_, table)| table.contains_key(LOAD_SHARE.name()));
    let read: Vec<_> =
        tables.iter().enumerate().map(|(at, (node, table))| load(reader, at + 1, node, table, shared)).collect();
    let loads: Vec<_> = read.into_iter().collect::<Option<_>>()?;
    let normal = normalised(loads);
    if normal.is_none() {
        let found = "the shares are too far apart to be compared".to_owned();
        reader.conflict_at(node.span(), found, "shares of about the same size".to_owned());
    }
    normal
}

/// Full load, all the time.
fn full_load(reader: &mut Reader<'_>) -> Option<Vec<Load>> {
    let current_a = reader.facts.full_load_a?;
    let share = Positive::new(1.0)?;
    reader.default_as(key_of(&LOAD_CURRENT, 1), &LOAD_CURRENT, Value::Number(current_a.get()));
    reader.default_as(key_of(&LOAD_SHARE, 1), &LOAD_SHARE, Value::Number(share.get()));
    Some(vec![Load { current_a, share }])
}

fn load<'t>(
    reader: &mut Reader<'t>,
    number: usize,
    place: &'t Spanned<DeValue<'t>>,
    table: &'t DeTable<'t>,
    shared: bool,
) -> Option<Load> {
    let current_a = match table.get(LOAD_CURRENT.name()) {
        Some(node) => current(reader, number, node),
        None => {
            reader.missing_in(Some(place.span()), LOAD_CURRENT.path, LOAD_CURRENT.meaning);
            None
        }
    };
    let share = match table.get(LOAD_SHARE.name()) {
        Some(node) => reader.value(&LOAD_SHARE, node).and_then(Positive::new).inspect(|share| {
            reader.written_as(key_of(&LOAD_SHARE, number), &LOAD_SHARE, Value::Number(share.get()), node.span().start);
        }),
        None if shared => {
            reader.missing_in(Some(place.span()), LOAD_SHARE.path, LOAD_SHARE.meaning);
            None
        }
        None => {
            let Preset::Number(share) = LOAD_SHARE.preset else { return None };
            reader.default_as(key_of(&LOAD_SHARE, number), &LOAD_SHARE, Value::Number(share));
            Positive::new(share)
        }
    };
    Some(Load { current_a: current_a?, share: share? })
}

fn current<'t>(reader: &mut Reader<'t>, number: usize, node: Node<'t>) -> Option<Positive> {
    let current_a = reader.value(&LOAD_CURRENT, node).and_then(Positive::new)?;
    reader.written_as(key_of(&LOAD_CURRENT, number), &LOAD_CURRENT, Value::Number(current_a.get()), node.span().start);
    Some(current_a)
}

fn key_of(key: &Key, number: usize) -> String {
    format!("{}[{number}].{}", key.section(), key.name())
}

/// Equal currents become one, and the shares sum to 1; `None` where one of them vanishes beside the others.
fn normalised(mut loads: Vec<Load>) -> Option<Vec<Load>> {
    loads.sort_by(|one, other| one.current_a.get().total_cmp(&other.current_a.get()));
    let total: f64 = loads.iter().map(|load| load.share.get()).sum();
    let mut merged: Vec<(Positive, f64)> = Vec::new();
    for load in loads {
        match merged.last_mut() {
            Some((current_a, share)) if *current_a == load.current_a => *share += load.share.get(),
            _ => merged.push((load.current_a, load.share.get())),
        }
    }
    merged
        .into_iter()
        .map(|(current_a, share)| Some(Load { current_a, share: Positive::new(share / total)? }))
        .collect()
}
