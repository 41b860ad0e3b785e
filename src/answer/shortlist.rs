//! The main question: which stages are the best?

use serde::Serialize;

use crate::limit::LimitName;
use crate::stage::NamedStage;

/// The limit that a stage comes nearest to.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Tightest {
    /// Which limit.
    pub limit: LimitName,
    /// Distance to its bound relative to it.
    pub margin: f64,
}

/// One line of the shortlist.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Pick {
    /// Place, from 1.
    pub rank: usize,
    /// The stage.
    pub stage: NamedStage,
    /// The figure that is minimised.
    pub burden: f64,
    /// Sum of part costs; `None` where one is unknown and none is needed.
    pub cost: Option<f64>,
    /// Sum of part areas, mm²; `None` where one is unknown and none is needed.
    pub area_mm2: Option<f64>,
    /// Σ share·loss, W.
    pub weighted_loss_w: f64,
    /// Σ share·Pout / Σ share·Pin.
    pub weighted_efficiency: f64,
    /// Weighted loss that falls as on-resistance falls, W.
    pub resistance_w: f64,
    /// Weighted loss that grows with charge, W.
    pub charge_w: f64,
    /// Hottest junction at any corner, °C.
    pub hottest_junction_c: f64,
    /// The limit with the least margin; `None` where no limit applies.
    pub tightest: Option<Tightest>,
    /// How many figures rest on a default.
    pub assumed: usize,
    /// Whether the core loss is unknown and counted as none.
    pub core_loss_unknown: bool,
}

/// How far one limit would have to give for anything to pass.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct NearestMiss {
    /// Which limit.
    pub limit: LimitName,
    /// What it is now.
    pub bound: f64,
    /// What it would have to be.
    pub needed: f64,
    /// The stage that would then pass.
    pub with: NamedStage,
}

/// Parts of one slot dropped before crossing because they break a limit of their own.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Dropped {
    /// Which limit.
    pub limit: LimitName,
    /// [`Slot`](crate::part::Slot) name.
    pub slot: &'static str,
    /// How many parts.
    pub parts: usize,
}

/// The k best stages, proven.
#[derive(Debug, Clone, PartialEq)]
pub struct Shortlist {
    /// Name of the rail.
    pub rail: String,
    /// Stages of the catalogs after pins and bans, before any limit.
    pub crossed: u128,
    /// Full model evaluations made.
    pub evaluated: u64,
    /// Whether the list is proven to be the true one.
    pub proven: bool,
    /// The stages, best first.
    pub picks: Vec<Pick>,
    /// Parts dropped before crossing, by limit and slot.
    pub dropped: Vec<Dropped>,
    /// When nothing passes: each limit alone.
    pub nothing_passes: Option<Vec<NearestMiss>>,
}
