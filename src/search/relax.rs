//! How far one limit would have to give for anything to pass.

use std::sync::atomic::{AtomicU64, Ordering};

use rayon::iter::{IntoParallelRefIterator, ParallelIterator};

use super::completion;
use super::field::{AtFrequency, Candidate, Field};
use super::order::Ranked;
use super::progress::Progress;
use super::pruned::pruned;
use super::request::{Request, Tolerance};
use super::trial::{CoreTrial, Rectifier, Trio};
use super::unit::{Aim, Caps, Refined, Unit};
use crate::limit::LimitName;
use crate::limit::core::PointSolution;
use crate::part::Choke;
use crate::quantity::NonNegative;
use crate::rail::Worth;

/// Excesses nearer to each other than this are the same: limits hold within 1e-9.
const SAME: f64 = 1e-9;
/// Boxes of at most so many cores are tried core by core.
const FEW: usize = 64;

/// The best stage among those that break `limit` by the least that anything must, all other limits kept, and by how much;
/// `None` when no stage passes however far the limit gives.
pub fn relaxed(request: &Request, limit: LimitName) -> Option<Ranked> {
    let any = Request { tolerated: Some(Tolerance::any(limit)), top: 1, ..*request };
    let first = *pruned(&any).ranked.first()?;
    let excess = match sum_alone(limit) {
        _ if first.excess == 0.0 => 0.0,
        Some(worth) => pruned(&Request { worth, ..any }).ranked.first()?.excess,
        None => least_excess(&any, limit, first.excess),
    };
    let within = Tolerance { limit, excess: excess * (1.0 + SAME) + SAME };
    pruned(&Request { tolerated: Some(within), ..any }).ranked.first().copied()
}

/// A limit on one of the sums that a burden is made of, as the worth that makes that sum alone least: the least sum is the least
/// excess.
pub fn sum_alone(limit: LimitName) -> Option<Worth> {
    let one = NonNegative::new(1.0)?;
    let none = Worth { loss: NonNegative::ZERO, area: NonNegative::ZERO, cost: NonNegative::ZERO };
    match limit {
        LimitName::Efficiency => Some(Worth { loss: one, ..none }),
        LimitName::Area => Some(Worth { area: one, ..none }),
        LimitName::Cost => Some(Worth { cost: one, ..none }),
        _ => None,
    }
}

/// Branch and bound over boxes of candidates: a box in which some slot has no candidate within the best excess so far is done
/// with; a small one is tried; any other is halved along its longest list, in the order of resistance or inductance, so that the
/// spans of duty and ripple narrow. `first` is the excess of any stage.
pub fn least_excess(request: &Request, limit: LimitName, first: f64) -> f64 {
    let field = Field::new(request);
    let frequencies: Vec<AtFrequency> =
        request.rail.range.frequencies_hz.iter().map(|f| field.at_frequency(f.get())).collect();
    let units: Vec<Unit> = frequencies.iter().flat_map(|at| Unit::all(&field, at)).collect();
    let hunt =
        Hunt { field: &field, limit, progress: request.progress, best_bits: AtomicU64::new(first.max(0.0).to_bits()) };
    let run = || units.par_iter().for_each(|unit| hunt.explore(unit.whole(hunt.field)));
    // Without a pool of its own the work runs on the one every program has: the answer is the same.
    match rayon::ThreadPoolBuilder::new().num_threads(request.threads).build() {
        Ok(pool) => pool.install(run),
        Err(_) => run(),
    }
    hunt.best()
}

struct Hunt<'a> {
    field: &'a Field<'a>,
    limit: LimitName,
    progress: Option<&'a Progress>,
    best_bits: AtomicU64,
}

impl<'a> Hunt<'a> {
    fn best(&self) -> f64 {
        f64::from_bits(self.best_bits.load(Ordering::Relaxed))
    }

    /// Excesses are not negative, so their bits are in their order.
    fn improve(&self, excess: f64) {
        self.best_bits.fetch_min(excess.max(0.0).to_bits(), Ordering::Relaxed);
    }

    /// Leave to break the limit by less than anything found so far.
    fn tolerance(&self) -> Tolerance {
        Tolerance { limit: self.limit, excess: self.best() * (1.0 - SAME) - SAME }
    }

    fn explore(&self, mut space: Refined<'a>) {
        let tolerance = self.tolerance();
        if tolerance.excess < 0.0 || self.progress.is_some_and(Progress::stopped) {
            return;
        }
        let tolerated = Some(tolerance);
        let caps = Caps::of(self.field, tolerated);
        let aim = Aim { field: self.field, tolerated, caps, threshold: f64::INFINITY, passes: 2 };
        if space.tighten(&aim).is_none() {
            return;
        }
        let cores = space.highs.len() * space.rectifiers.len() * space.chokes.len();
        if cores <= FEW || count_within(&space, &caps) <= FEW {
            self.try_all(&space, &aim);
        } else {
            let (low, high) = halves(space);
            self.explore(low);
            self.explore(high);
        }
    }

    fn try_all(&self, space: &Refined<'a>, aim: &Aim<'a>) {
        let mut memory: Vec<PointSolution> = Vec::new();
        let inputs: Vec<_> = space.inputs(aim).into_iter().map(|(candidate, _)| candidate).collect();
        for choke in &space.chokes {
            let outputs: Vec<_> = space.outputs(aim, Some(choke)).into_iter().map(|(candidate, _)| candidate).collect();
            for high in &space.highs {
                for rectifier in &space.rectifiers {
                    let sum = space.least_floor.plus(&choke.price).plus(&high.price).plus(&rectifier.price);
                    if aim.caps.exceeded(&sum) {
                        continue;
                    }
                    let trio = Trio { high: high.candidate, rectifier: rectifier.candidate, choke: choke.candidate };
                    let tolerance = self.tolerance();
                    memory = match CoreTrial::new(self.field, space.at, trio, Some(tolerance), memory) {
                        Err(memory) => memory,
                        Ok(core) => {
                            if let Some(excess) = completion::least_excess(&core, &inputs, &outputs) {
                                self.improve(excess);
                            }
                            core.into_solutions()
                        }
                    };
                }
            }
        }
    }
}

/// How many cores of a box are within the caps, counted to a little over [`FEW`].
fn count_within(space: &Refined, caps: &Caps) -> usize {
    let mut count = 0;
    for choke in &space.chokes {
        let with_choke = space.least_floor.plus(&choke.price);
        for high in &space.highs {
            let with_high = with_choke.plus(&high.price);
            count += space
                .rectifiers
                .iter()
                .filter(|rectifier| !caps.exceeded(&with_high.plus(&rectifier.price)))
                .take(FEW + 1)
                .count();
            if count > FEW {
                return count;
            }
        }
    }
    count
}

/// Two boxes that make up one: its longest list cut in the middle.
pub(super) fn halves(mut space: Refined) -> (Refined, Refined) {
    let longest = space.highs.len().max(space.rectifiers.len()).max(space.chokes.len());
    let mut other = space.clone();
    if space.rectifiers.len() == longest {
        space.rectifiers.sort_by(|a, b| drop_figure(&a.candidate).total_cmp(&drop_figure(&b.candidate)));
        other.rectifiers = space.rectifiers.split_off(longest / 2);
    } else if space.highs.len() == longest {
        space.highs.sort_by(|a, b| a.candidate.bank.r25_ohm.total_cmp(&b.candidate.bank.r25_ohm));
        other.highs = space.highs.split_off(longest / 2);
    } else {
        let inductance_h = |candidate: &Candidate<Choke>| candidate.bank.inductance_h.last().copied().unwrap_or(0.0);
        space.chokes.sort_by(|a, b| inductance_h(a.candidate).total_cmp(&inductance_h(b.candidate)));
        other.chokes = space.chokes.split_off(longest / 2);
    }
    (space, other)
}

/// What rectifiers are lined up by: resistance, or the first drop of a diode.
fn drop_figure(rectifier: &Rectifier) -> f64 {
    match rectifier {
        Rectifier::Switch(candidate) => candidate.bank.r25_ohm,
        Rectifier::Diode(candidate) => candidate.bank.forward.first().map_or(0.0, |span| span.threshold_v),
    }
}
