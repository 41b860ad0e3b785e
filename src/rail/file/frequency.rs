//! `stage.frequency`: one, a list, or a range in equal ratios.

use toml::de::DeValue;

use super::reader::{Node, Reader};
use crate::quantity::Positive;
use crate::rail::defaults::{FREQUENCY_FROM, FREQUENCY_STEPS, FREQUENCY_TO, Key, MOST_LISTED, Preset, STAGE_FREQUENCY};
use crate::rail::origin::Value;

/// Frequencies, Hz, ascending and distinct.
pub(super) fn frequencies_hz(reader: &mut Reader<'_>) -> Option<Vec<Positive>> {
    let list = |all: &[Positive]| Value::Numbers(all.iter().map(|one| one.get()).collect());
    let Some(node) = reader.find(STAGE_FREQUENCY.path) else {
        let Preset::Number(only_hz) = STAGE_FREQUENCY.preset else { return None };
        let only = vec![Positive::new(only_hz)?];
        reader.default(&STAGE_FREQUENCY, list(&only));
        return Some(only);
    };
    let all = match node.get_ref() {
        DeValue::Table(_) => range(reader)?,
        _ => listed(reader, node)?,
    };
    reader.written(&STAGE_FREQUENCY, list(&all), node.span().start);
    Some(all)
}

fn listed<'t>(reader: &mut Reader<'t>, node: Node<'t>) -> Option<Vec<Positive>> {
    let items = reader.items(&STAGE_FREQUENCY, node)?;
    if items.len() > MOST_LISTED {
        let found = format!("`{}` lists {} frequencies", STAGE_FREQUENCY.path, items.len());
        reader.refuse(node.span(), found, format!("at most {MOST_LISTED}"));
        return None;
    }
    let mut all: Vec<Positive> = Vec::new();
    let mut good = true;
    for item in items {
        match reader.value(&STAGE_FREQUENCY, item).and_then(Positive::new) {
            Some(frequency_hz) if all.contains(&frequency_hz) => {
                let found = format!("`{}` lists {} twice", STAGE_FREQUENCY.path, reader.source(item));
                reader.refuse(item.span(), found, "each frequency once");
                good = false;
            }
            Some(frequency_hz) => all.push(frequency_hz),
            None => good = false,
        }
    }
    all.sort_by(|one, other| one.get().total_cmp(&other.get()));
    good.then_some(all)
}

fn range(reader: &mut Reader<'_>) -> Option<Vec<Positive>> {
    let from = end(reader, &FREQUENCY_FROM);
    let to = end(reader, &FREQUENCY_TO);
    let steps = reader.find(FREQUENCY_STEPS.path);
    if steps.is_none() {
        reader.missing(&FREQUENCY_STEPS);
    }
    let steps = steps.and_then(|node| reader.count_at(&FREQUENCY_STEPS, node));
    let (from, to, steps) = (from?, to?, steps?);
    if to < from {
        let bound = reader.said(FREQUENCY_FROM.path);
        let found = format!("the range ends at {}, below its start of {bound}", reader.said(FREQUENCY_TO.path));
        reader.conflict(FREQUENCY_TO.path, found, format!("{bound} or more"), "");
        return None;
    }
    let all = spaced(from, to, steps);
    if all.as_ref().is_none_or(|all| all.windows(2).any(|pair| pair[1] <= pair[0])) {
        let found = format!("the range is too narrow for {steps} different frequencies");
        reader.conflict(FREQUENCY_STEPS.path, found, "fewer steps, or a greater `to`", "");
        return None;
    }
    all
}

fn end(reader: &mut Reader<'_>, key: &Key) -> Option<Positive> {
    let Some(node) = reader.find(key.path) else {
        reader.missing(key);
        return None;
    };
    reader.value(key, node).and_then(Positive::new)
}

/// `steps` frequencies in equal ratios; one step is `from`, the last of several is exactly `to`.
fn spaced(from: Positive, to: Positive, steps: u32) -> Option<Vec<Positive>> {
    let last = steps.saturating_sub(1);
    let ratio = to.get() / from.get();
    (0..steps)
        .map(|step| match step {
            0 => Some(from),
            _ if step == last => Some(to),
            _ => Positive::new(from.get() * ratio.powf(f64::from(step) / f64::from(last))),
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use approx::assert_relative_eq;

    use super::*;

    fn hertz(from: f64, to: f64, steps: u32) -> Vec<f64> {
        let ends = Positive::new(from).zip(Positive::new(to));
        let all = ends.and_then(|(from, to)| spaced(from, to, steps));
        all.into_iter().flatten().map(Positive::get).collect()
    }

    #[test]
    fn both_ends_are_exact_and_the_ratio_is_constant() {
        let all = hertz(200e3, 1e6, 9);
        assert_eq!((all[0], all[8], all.len()), (200e3, 1e6, 9));
        for pair in all.windows(2) {
            assert_relative_eq!(pair[1] / pair[0], 5.0_f64.powf(0.125), max_relative = 1e-14);
        }
    }

    #[test]
    fn one_step_is_the_start() {
        assert_eq!(hertz(200e3, 1e6, 1), [200e3]);
        assert_eq!(hertz(200e3, 1e6, 2), [200e3, 1e6]);
    }
}
