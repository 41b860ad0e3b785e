//! The main question: which stages are the best?

use serde::Serialize;

use crate::account::{Account, account};
use crate::limit::LimitName;
use crate::part::{Parts, Slot};
use crate::rail::Rail;
use crate::search::{Distinct, Dropped, Found, Progress, Ranked, Request, pruned::pruned, relax::relaxed};
use crate::stage::NamedStage;

/// How a shortlist is asked for.
#[derive(Debug, Clone, Copy)]
pub struct Options<'a> {
    /// How many stages.
    pub top: usize,
    /// Which stages count as different.
    pub distinct: Distinct,
    /// Worker threads; 0 for one a processor.
    pub threads: usize,
    /// Where to tell how far the search is, and to hear that it shall stop.
    pub progress: Option<&'a Progress>,
}

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
    /// Least burden that an untried stage could have, where the search was stopped.
    pub open_bound: Option<f64>,
    /// The stages, best first.
    pub picks: Vec<Pick>,
    /// Parts dropped before crossing, by limit and slot.
    pub dropped: Vec<Dropped>,
    /// When nothing passes: each limit alone.
    pub nothing_passes: Option<Vec<NearestMiss>>,
}

/// The k best stages; when nothing passes, how far each limit alone would have to give.
pub fn shortlist<'a>(rail: &'a Rail, parts: &'a Parts, options: &Options<'a>) -> Shortlist {
    let request =
        Request { distinct: options.distinct, threads: options.threads, ..Request::new(rail, parts, options.top) };
    let Found { ranked, crossed, evaluated, proven, open_bound, dropped } = pruned(&request);
    let picks: Vec<Pick> =
        ranked.iter().enumerate().filter_map(|(place, ranked)| pick(rail, parts, place + 1, ranked)).collect();
    let nothing_passes = (ranked.is_empty() && proven).then(|| nearest_misses(&Request { progress: None, ..request }));
    Shortlist { rail: rail.name.clone(), crossed, evaluated, proven, open_bound, picks, dropped, nothing_passes }
}

/// A line of the shortlist; `None` only for a stage that does not pass.
fn pick(rail: &Rail, parts: &Parts, rank: usize, ranked: &Ranked) -> Option<Pick> {
    let account = account(rail, parts, &ranked.stage);
    let tightest = account
        .limits
        .iter()
        .filter_map(|row| row.margin.map(|margin| Tightest { limit: row.limit, margin }))
        .min_by(|a, b| a.margin.total_cmp(&b.margin));
    let junction = |row: &&crate::account::LimitRow| row.limit == LimitName::Junction;
    Some(Pick {
        rank,
        burden: account.burden?,
        cost: account.cost,
        area_mm2: account.area_mm2,
        weighted_loss_w: account.weighted_loss_w?,
        weighted_efficiency: account.weighted_efficiency?,
        resistance_w: account.resistance_w?,
        charge_w: account.charge_w?,
        hottest_junction_c: account.limits.iter().filter(junction).filter_map(|row| row.value).reduce(f64::max)?,
        tightest,
        assumed: account.assumed.len(),
        core_loss_unknown: core_loss_unknown(&account),
        stage: account.stage,
    })
}

fn core_loss_unknown(account: &Account) -> bool {
    account.assumed.iter().any(|row| row.slot == Slot::Inductor.name() && row.quantity == "core_loss")
}

fn nearest_misses(request: &Request) -> Vec<NearestMiss> {
    LimitName::ALL
        .into_iter()
        .filter(|limit| limit.can_give())
        .filter_map(|limit| {
            let nearest = relaxed(request, limit)?;
            let account = account(request.rail, request.parts, &nearest.stage);
            let broken = account
                .limits
                .into_iter()
                .filter(|row| row.limit == limit && !row.holds)
                .min_by_key(|row| ordered_float::OrderedFloat(row.margin.unwrap_or(f64::NEG_INFINITY)))?;
            Some(NearestMiss { limit, bound: broken.bound?, needed: broken.value?, with: account.stage })
        })
        .collect()
}
