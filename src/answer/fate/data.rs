//! What became of each part.

use serde::Serialize;

use crate::limit::LimitName;
use crate::part::Slot;
use crate::stage::NamedStage;

/// What became of every part of the catalogs.
#[derive(Debug, Clone, PartialEq)]
pub struct Fates {
    /// Name of the rail.
    pub rail: String,
    /// The best stage of all and its burden; `None` when nothing passes.
    pub best: Option<Best>,
    /// Places up to this are given as ranks.
    pub ranked_to: usize,
    /// Every part in every slot that it could stand in, catalog by catalog.
    pub fates: Vec<Fate>,
}

/// The best stage of all.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Best {
    /// The figure that is minimised.
    pub burden: f64,
    /// The stage.
    pub stage: NamedStage,
}

/// What became of a part in a slot.
#[derive(Debug, Clone, PartialEq)]
pub struct Fate {
    /// Name of its catalog: switches, diodes, inductors or capacitors.
    pub catalog: &'static str,
    /// Part name.
    pub part: String,
    /// Slot.
    pub slot: Slot,
    /// What became of it.
    pub outcome: Outcome,
}

/// What became of a part.
#[derive(Debug, Clone, PartialEq)]
pub enum Outcome {
    /// A stage with it passes.
    Passes(Place),
    /// No stage with it passes.
    Stopped(Stop),
    /// The rail pins other parts to its slot.
    PinnedOut,
    /// The rail bans it.
    Banned,
}

/// The best stage with a part, and how much worse than the best of all it is.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Place {
    /// Place of its high switch, rectifier and inductor in the shortlist; `None` beyond [`Fates::ranked_to`].
    pub rank: Option<usize>,
    /// The figure that is minimised.
    pub burden: f64,
    /// Burden over that of the best.
    pub penalty: f64,
    /// Weighted loss over that of the best, W.
    pub loss_penalty_w: f64,
    /// Cost over that of the best; `None` where one of both is unknown.
    pub cost_penalty: Option<f64>,
    /// Area over that of the best, mm²; `None` where one of both is unknown.
    pub area_penalty_mm2: Option<f64>,
    /// The stage.
    pub stage: NamedStage,
}

/// Why no stage with a part passes.
#[derive(Debug, Clone, PartialEq)]
pub struct Stop {
    /// The limit that would have to give least, or that the part breaks by itself; `None` where several would have to give.
    pub limit: Option<LimitName>,
    /// What the nearest stage, or the part alone, has; `None` without numbers.
    pub value: Option<f64>,
    /// What it must keep to; `None` without numbers.
    pub bound: Option<f64>,
    /// The best of the stages that pass when the limit gives by just so much.
    pub nearest: Option<NamedStage>,
    /// Whether no stage with the part needs less; otherwise the nearest is the best of all that need the limit to give.
    pub is_least: bool,
    /// The nearest frequency beyond the rail's range at which it passes.
    pub elsewhere: Option<Elsewhere>,
}

/// Where a part would pass.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Elsewhere {
    /// The frequency, Hz.
    pub frequency_hz: f64,
    /// The best stage with it there.
    pub stage: NamedStage,
}
