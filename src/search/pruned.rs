//! The best stages, without trying them all: whatever is left out is proven worse by a bound.
//!
//! The stages fall into units ([`super::unit`]). Every unit gets a least burden; the units are searched from the least upwards, by
//! all workers, and the search ends at the first unit that lies above the last place of the list. Within a unit the candidates
//! of each slot are sorted by the least they add, and combined as long as the sum can still enter.

use std::sync::atomic::{AtomicU64, AtomicUsize, Ordering};

use rayon::iter::{IntoParallelRefIterator, ParallelIterator};

use super::board::Board;
use super::bound::reach::SHY;
use super::bound::{Price, Rates};
use super::completion::{Offer, Purpose, complete, offers};
use super::field::{AtFrequency, Candidate, Field};
use super::leaders::Leaders;
use super::request::{Found, Request};
use super::trial::{CoreTrial, Trio};
use super::unit::{Aim, Caps, Refined, Slot, Unit};
use crate::limit::core::PointSolution;
use crate::part::Choke;

/// Passes over a unit when only its bound is wanted, and when it is searched.
const BOUND_PASSES: usize = 1;
const SEARCH_PASSES: usize = 3;
/// How many candidates of each slot are tried in every unit before the search, to find a first threshold.
const PROBE: usize = 2;

/// The same answer as [`super::exhaustive`], bit for bit.
pub fn pruned(request: &Request) -> Found {
    let field = Field::new(request);
    let frequencies: Vec<AtFrequency> =
        request.rail.range.frequencies_hz.iter().map(|f| field.at_frequency(f.get())).collect();
    let board = Board::new(Leaders::new(request.parts, request.distinct, request.top));
    let caps = Caps::of(&field, request.tolerated);
    let search = Search { request, field: &field, board: &board, caps, evaluated: AtomicU64::new(0) };
    let run = || search.run(&frequencies);
    // Without a pool of its own the work runs on the one every program has: the answer is the same.
    match rayon::ThreadPoolBuilder::new().num_threads(request.threads).build() {
        Ok(pool) => pool.install(run),
        Err(_) => run(),
    }
    let evaluated = search.evaluated.into_inner();
    Found {
        ranked: board.into_entries(),
        crossed: field.crossed,
        evaluated,
        proven: true,
        dropped: field.dropped.clone(),
    }
}

struct Search<'a, 'b> {
    request: &'b Request<'a>,
    field: &'a Field<'a>,
    board: &'b Board<'a>,
    caps: Caps,
    evaluated: AtomicU64,
}

impl<'a> Search<'a, '_> {
    fn aim(&self, passes: usize) -> Aim<'a> {
        Aim {
            field: self.field,
            tolerated: self.request.tolerated,
            caps: self.caps,
            threshold: self.board.threshold(),
            passes,
        }
    }

    fn run(&self, frequencies: &[AtFrequency]) {
        let units: Vec<Unit> = frequencies.iter().flat_map(|at| Unit::all(self.field, at)).collect();
        let mut bounded: Vec<(f64, &Unit)> = units
            .par_iter()
            .filter_map(|unit| {
                let refined = unit.refine(&self.aim(BOUND_PASSES))?;
                self.probe(unit, &refined);
                Some((refined.bound, unit))
            })
            .collect();
        bounded.sort_by(|a, b| a.0.total_cmp(&b.0));
        let next = AtomicUsize::new(0);
        rayon::broadcast(|_| {
            while let Some((bound, unit)) = bounded.get(next.fetch_add(1, Ordering::Relaxed)) {
                if bound * SHY > self.board.threshold() {
                    break;
                }
                if let Some(refined) = unit.refine(&self.aim(SEARCH_PASSES)) {
                    self.search(unit, &refined);
                }
            }
        });
    }

    /// The few best of each slot, so that the search starts from a good threshold.
    fn probe(&self, unit: &Unit, refined: &Refined) {
        let mut few = refined.clone();
        few.highs.truncate(PROBE);
        few.rectifiers.truncate(PROBE);
        few.chokes.truncate(PROBE);
        self.search(unit, &few);
    }

    /// Every combination of what is left of a unit, as long as it can still enter.
    fn search(&self, unit: &Unit, refined: &Refined) {
        let rates = &refined.rates;
        let (Some(least_high), Some(least_rectifier)) = (refined.highs.first(), refined.rectifiers.first()) else {
            return;
        };
        let (least_high, least_rectifier) = (least_high.price.at(rates), least_rectifier.price.at(rates));
        let aim = self.aim(SEARCH_PASSES);
        let inputs = refined.inputs(&aim);
        let inputs = offers(&inputs, rates);
        let mut memory = Vec::new();
        for choke in &refined.chokes {
            let choke_figure = choke.price.at(rates) - rates.allowance;
            let least = choke_figure + least_high + least_rectifier;
            if (least + refined.floor.at(rates)) * SHY > self.board.threshold() {
                break;
            }
            let outputs = refined.outputs(&aim, Some(choke));
            let outputs = offers(&outputs, rates);
            let Some(floor) = Floor::new(refined, &inputs, &outputs, rates) else { continue };
            if (least + floor.figure) * SHY > self.board.threshold() {
                continue;
            }
            let with = WithChoke { unit, refined, choke, inputs: &inputs, outputs: &outputs, floor };
            memory = self.with_choke(&with, memory);
        }
    }

    fn with_choke(&self, with: &WithChoke, mut memory: Vec<PointSolution>) -> Vec<PointSolution> {
        let rates = &with.refined.rates;
        let base_figure = with.choke.price.at(rates) - rates.allowance + with.floor.figure;
        let base = with.choke.price.plus(&with.floor.least);
        let least_rectifier = with.refined.rectifiers[0].price.at(rates);
        for high in &with.refined.highs {
            let high_figure = base_figure + high.price.at(rates);
            if (high_figure + least_rectifier) * SHY > self.board.threshold() {
                break;
            }
            let with_high = base.plus(&high.price);
            for rectifier in &with.refined.rectifiers {
                if (high_figure + rectifier.price.at(rates)) * SHY > self.board.threshold() {
                    break;
                }
                if self.caps.exceeded(&with_high.plus(&rectifier.price)) {
                    continue;
                }
                let trio = Trio { high: high.candidate, rectifier: rectifier.candidate, choke: with.choke.candidate };
                memory = self.try_core(with, trio, memory);
            }
        }
        memory
    }

    fn try_core(&self, with: &WithChoke, trio: Trio, memory: Vec<PointSolution>) -> Vec<PointSolution> {
        self.evaluated.fetch_add(1, Ordering::Relaxed);
        let rates = &with.refined.rates;
        let footing = trio.footing();
        let Some(weighted) = trio.weigh(self.field, with.unit.at) else { return memory };
        let own = Price::new(weighted.core_loss_w, &footing);
        if (own.at(rates) - rates.allowance + with.floor.banks_figure) * SHY > self.board.threshold()
            || self.caps.exceeded(&own.plus(&with.floor.banks))
        {
            return memory;
        }
        match CoreTrial::new(self.field, with.unit.at, trio, self.request.tolerated, memory) {
            Err(memory) => memory,
            Ok(core) => {
                let purpose = Purpose { board: self.board, rates, caps: &self.caps, distinct: self.request.distinct };
                complete(&core, &own, with.inputs, with.outputs, &purpose);
                core.into_solutions()
            }
        }
    }
}

/// One inductor of a unit, with the banks that may pass with it.
struct WithChoke<'a, 'b> {
    unit: &'b Unit<'a>,
    refined: &'b Refined<'a>,
    choke: &'b Slot<&'a Candidate<Choke>>,
    inputs: &'b [Offer<'a>],
    outputs: &'b [Offer<'a>],
    floor: Floor,
}

/// The least that bias and banks add.
struct Floor {
    /// Bias and banks, each sum by itself.
    least: Price,
    /// Bias and banks at the rates.
    figure: f64,
    /// Banks alone, each sum by itself.
    banks: Price,
    /// Banks alone at the rates.
    banks_figure: f64,
}

impl Floor {
    fn new(refined: &Refined, inputs: &[Offer], outputs: &[Offer], rates: &Rates) -> Option<Self> {
        let banks_figure = inputs.first()?.figure() + outputs.first()?.figure();
        let banks = Offer::least(inputs).plus(&Offer::least(outputs));
        Some(Self {
            least: refined.bias.plus(&banks),
            figure: refined.bias.at(rates) + banks_figure,
            banks,
            banks_figure,
        })
    }
}
