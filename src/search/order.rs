//! Which of two stages comes first: the same answer whatever found them.

use std::cmp::Ordering;

use super::request::Distinct;
use crate::part::Parts;
use crate::stage::{RectifierKind, Stage};

/// A stage and what it is ranked by.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Ranked {
    /// The stage.
    pub stage: Stage,
    /// By how much the tolerated limit is broken, relative to its bound; 0 where none is tolerated.
    pub excess: f64,
    /// The figure that is minimised.
    pub burden: f64,
    /// Σ share·loss, W.
    pub weighted_loss_w: f64,
}

/// What makes two stages the same entry of a list.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Identity {
    /// High switch, rectifier, inductor.
    Triple(usize, RectifierKind, usize, usize),
    /// High switch, rectifier.
    Switches(usize, RectifierKind, usize),
    /// All of it.
    Stage(Stage),
}

impl Ranked {
    /// The entry that this stage competes for.
    pub fn identity(&self, distinct: Distinct) -> Identity {
        let stage = &self.stage;
        let (high, kind, rectifier) = (stage.high_switch.index, stage.rectifier_kind, stage.rectifier.index);
        match distinct {
            Distinct::Triple => Identity::Triple(high, kind, rectifier, stage.inductor),
            Distinct::Switches => Identity::Switches(high, kind, rectifier),
            Distinct::Stage => Identity::Stage(*stage),
        }
    }
}

/// Burden, then weighted loss, then part names as bytes (high switch, rectifier, inductor, input bank, output bank), the
/// rectifier's kind where two catalogs share a name, counts in the same order, frequency.
pub fn compare(parts: &Parts, a: &Ranked, b: &Ranked) -> Ordering {
    a.burden
        .total_cmp(&b.burden)
        .then_with(|| a.weighted_loss_w.total_cmp(&b.weighted_loss_w))
        .then_with(|| compare_stages(parts, &a.stage, &b.stage))
}

/// The order of stages that are equally good.
pub fn compare_stages(parts: &Parts, a: &Stage, b: &Stage) -> Ordering {
    names(parts, a)
        .cmp(&names(parts, b))
        .then_with(|| a.rectifier_kind.cmp(&b.rectifier_kind))
        .then_with(|| counts(a).cmp(&counts(b)))
        .then_with(|| a.frequency_hz.total_cmp(&b.frequency_hz))
}

fn names<'a>(parts: &'a Parts, stage: &Stage) -> [&'a str; 5] {
    let rectifier = match stage.rectifier_kind {
        RectifierKind::Switch => &parts.switches[stage.rectifier.index].identity.part,
        RectifierKind::Diode => &parts.diodes[stage.rectifier.index].identity.part,
    };
    [
        &parts.switches[stage.high_switch.index].identity.part,
        rectifier,
        &parts.inductors[stage.inductor].identity.part,
        &parts.capacitors[stage.input_bank.index].identity.part,
        &parts.capacitors[stage.output_bank.index].identity.part,
    ]
}

fn counts(stage: &Stage) -> [u32; 4] {
    [stage.high_switch.count, stage.rectifier.count, stage.input_bank.count, stage.output_bank.count]
}
