//! The section `parts`: pins and bans.

use super::reader::Reader;
use super::words::Placed;
use crate::part::Slot;
use crate::rail::defaults::{Key, PARTS_BAN, PIN_HIGH_SWITCH, PIN_INDUCTOR, PIN_INPUT, PIN_OUTPUT, PIN_RECTIFIER};
use crate::rail::origin::Value;
use crate::rail::typed::{Ban, Pin};

/// The pins, in the order of the slots; the second path is the slot's name on screens.
const SLOTS: [(&Key, &str, Slot); 5] = [
    (&PIN_HIGH_SWITCH, "parts.pin.high_switch", Slot::HighSwitch),
    (&PIN_RECTIFIER, "parts.pin.rectifier", Slot::Rectifier),
    (&PIN_INDUCTOR, "parts.pin.inductor", Slot::Inductor),
    (&PIN_INPUT, "parts.pin.input_bank", Slot::InputBank),
    (&PIN_OUTPUT, "parts.pin.output_bank", Slot::OutputBank),
];

/// Pins and bans.
pub(super) fn parts(reader: &mut Reader<'_>) -> Option<(Vec<Pin>, Vec<Ban>)> {
    let pinned: Vec<_> = SLOTS.iter().map(|(key, also, slot)| pin(reader, key, also, *slot)).collect();
    let banned = bans(reader);
    let pinned: Vec<_> = pinned.into_iter().collect::<Option<_>>()?;
    let banned = banned?;
    for (name, span) in pinned.iter().flatten().flat_map(|(_, names)| names) {
        if banned.iter().any(|ban| *ban == Ban::Part((*name).to_owned())) {
            let found = format!("\"{name}\" is pinned and banned");
            reader.conflict_at(span.clone(), found, "a part that is not in `parts.ban`".to_owned());
        }
    }
    let pins = pinned.into_iter().flatten().map(|(slot, names)| Pin { slot, parts: owned(&names) }).collect();
    Some((pins, banned))
}

type Pinned<'t> = (Slot, Vec<Placed<'t>>);

fn pin<'t>(reader: &mut Reader<'t>, key: &Key, also: &str, slot: Slot) -> Option<Option<Pinned<'t>>> {
    let node = match (reader.find(key.path), reader.find(also)) {
        (Some(_), Some(second)) if key.path != also => {
            let found = format!("`{also}` and `{}` are the same slot", key.path);
            reader.refuse(second.span(), found, "one of the two");
            return None;
        }
        (Some(node), _) | (None, Some(node)) => node,
        (None, None) => {
            reader.default(key, Value::Nothing);
            return Some(None);
        }
    };
    let names = reader.names(key, node)?;
    reader.written(key, Value::Texts(owned(&names)), node.span().start);
    Some(Some((slot, names)))
}

fn bans(reader: &mut Reader<'_>) -> Option<Vec<Ban>> {
    let Some(node) = reader.find(PARTS_BAN.path) else {
        reader.default(&PARTS_BAN, Value::Nothing);
        return Some(Vec::new());
    };
    if node.get_ref().as_array().is_some_and(|list| list.is_empty()) {
        reader.written(&PARTS_BAN, Value::Texts(Vec::new()), node.span().start);
        return Some(Vec::new());
    }
    let names = reader.names(&PARTS_BAN, node)?;
    let bans = names.iter().map(|(name, span)| match name.strip_prefix("maker:").map(str::trim) {
        Some("") => {
            let found = format!("`{}` has no maker's name after \"maker:\"", PARTS_BAN.path);
            reader.refuse(span.clone(), found, "a name, as in \"maker:NAME\"");
            None
        }
        Some(maker) => Some(Ban::Maker(maker.to_owned())),
        None => Some(Ban::Part((*name).to_owned())),
    });
    let bans: Vec<_> = bans.collect();
    reader.written(&PARTS_BAN, Value::Texts(owned(&names)), node.span().start);
    bans.into_iter().collect()
}

fn owned(names: &[Placed<'_>]) -> Vec<String> {
    names.iter().map(|(name, _)| (*name).to_owned()).collect()
}
