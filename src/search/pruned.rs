//! The best stages, without trying them all: whatever is left out is proven worse by a bound.
//!
//! The stages fall into units ([`super::unit`]). Every unit gets a least burden; the units are searched from the least upwards, a
//! batch at a time, and the search ends at the first unit that lies above the last place of the list. Within a unit the candidates
//! of each slot are sorted by the least they add, and combined as long as the sum can still enter. A unit sees the list as it stood
//! before its batch, so that not only the answer but also the work is the same whatever the number of threads.

use rayon::iter::{IntoParallelRefIterator, ParallelIterator};

use super::bound::reach::SHY;
use super::bound::{Price, Rates};
use super::completion::{Offer, Purpose, complete, offers};
use super::field::{AtFrequency, Candidate, Field};
use super::leaders::Leaders;
use super::progress::Progress;
use super::request::{Found, Request};
use super::trial::{CoreTrial, Trio};
use super::unit::{Aim, Caps, Refined, Slot, Unit};
use crate::limit::core::PointSolution;
use crate::part::Choke;
use crate::stage::RectifierKind;

/// Passes over a unit when only its bound is wanted, and when it is searched.
const BOUND_PASSES: usize = 1;
const SEARCH_PASSES: usize = 3;
/// How many candidates of each slot are tried in every unit before the search, to find a first threshold.
const PROBE: usize = 2;
/// Units searched at a time: enough to keep many threads busy, few enough for the threshold to tighten in between.
const BATCH: usize = 16;

/// The same answer as [`super::exhaustive`], bit for bit.
pub fn pruned(request: &Request) -> Found {
    let field = Field::new(request);
    let frequencies: Vec<AtFrequency> =
        request.rail.range.frequencies_hz.iter().map(|f| field.at_frequency(f.get())).collect();
    let search = Search { request, field: &field, caps: Caps::of(&field, request.tolerated) };
    let run = || search.run(&frequencies);
    // Without a pool of its own the work runs on the one every program has: the answer is the same.
    let (harvest, open_bound) = match rayon::ThreadPoolBuilder::new().num_threads(request.threads).build() {
        Ok(pool) => pool.install(run),
        Err(_) => run(),
    };
    Found {
        ranked: harvest.leaders.into_entries(),
        crossed: field.crossed,
        evaluated: harvest.evaluated,
        proven: open_bound.is_none(),
        open_bound,
        dropped: field.dropped.clone(),
    }
}

/// What has been found, and on how many cores the model has run for it.
#[derive(Debug, Clone)]
struct Harvest<'a> {
    leaders: Leaders<'a>,
    evaluated: u64,
}

impl<'a> Harvest<'a> {
    fn merge(self, other: Self) -> Self {
        Self { leaders: self.leaders.merge(other.leaders), evaluated: self.evaluated + other.evaluated }
    }
}

struct Search<'a, 'b> {
    request: &'b Request<'a>,
    field: &'a Field<'a>,
    caps: Caps,
}

impl<'a> Search<'a, '_> {
    fn aim(&self, threshold: f64, passes: usize) -> Aim<'a> {
        Aim { field: self.field, tolerated: self.request.tolerated, caps: self.caps, threshold, passes }
    }

    fn nothing_yet(&self) -> Harvest<'a> {
        let Request { parts, distinct, top, .. } = *self.request;
        Harvest { leaders: Leaders::new(parts, distinct, top), evaluated: 0 }
    }

    /// The list, and the least burden of what is left untried when the search is stopped.
    fn run(&self, frequencies: &[AtFrequency]) -> (Harvest<'a>, Option<f64>) {
        let units: Vec<Unit> = frequencies.iter().flat_map(|at| Unit::all(self.field, at)).collect();
        let probed: Vec<(f64, &Unit, Harvest)> = units
            .par_iter()
            .filter_map(|unit| {
                if self.stopped() {
                    return Some((0.0, unit, self.nothing_yet()));
                }
                let refined = unit.refine(&self.aim(f64::INFINITY, BOUND_PASSES))?;
                Some((refined.bound, unit, self.probe(unit, &refined)))
            })
            .collect();
        let mut bounded = Vec::with_capacity(probed.len());
        let mut harvest = self.nothing_yet();
        for (bound, unit, probe) in probed {
            bounded.push((bound, unit));
            harvest = harvest.merge(probe);
        }
        bounded.sort_by(|a, b| a.0.total_cmp(&b.0));
        let cores = |unit: &Unit| self.cores_per_choke(unit) * unit.chokes.len() as f64;
        let weight = |units: &[(f64, &Unit)]| units.iter().map(|(_, unit)| cores(unit)).sum::<f64>();
        let all: f64 = units.iter().map(cores).sum();
        for (number, batch) in bounded.chunks(BATCH).enumerate() {
            let threshold = harvest.leaders.threshold();
            let left = &bounded[number * BATCH..];
            let open: Vec<&Unit> =
                batch.iter().take_while(|(bound, _)| bound * SHY <= threshold).map(|(_, unit)| *unit).collect();
            if open.is_empty() {
                break;
            }
            if let Some(progress) = self.request.progress {
                let within = left.partition_point(|(bound, _)| bound * SHY <= threshold);
                progress.tell(1.0 - weight(&left[..within]) / all, threshold, left[0].0);
            }
            let searched: Vec<Harvest> = open.par_iter().map(|unit| self.unit(unit, &harvest)).collect();
            harvest = searched.into_iter().fold(harvest, Harvest::merge);
            if self.stopped() {
                return (harvest, Some(left[0].0));
            }
        }
        (harvest, None)
    }

    /// How many pairs of high switch and rectifier a unit has.
    fn cores_per_choke(&self, unit: &Unit) -> f64 {
        let pairs = match unit.kind {
            RectifierKind::Switch => self.field.high_beside_switch.len() * self.field.switch_rectifiers.len(),
            RectifierKind::Diode => self.field.high_beside_diode.len() * self.field.diode_rectifiers.len(),
        };
        pairs as f64
    }

    fn stopped(&self) -> bool {
        self.request.progress.is_some_and(Progress::stopped)
    }

    /// One unit, with the list as it stands.
    fn unit(&self, unit: &Unit, before: &Harvest<'a>) -> Harvest<'a> {
        let mut harvest = Harvest { leaders: before.leaders.clone(), evaluated: 0 };
        if self.stopped() {
            return harvest;
        }
        if let Some(refined) = unit.refine(&self.aim(harvest.leaders.threshold(), SEARCH_PASSES)) {
            self.search(unit, &refined, &mut harvest);
        }
        harvest
    }

    /// The few best of each slot, so that the search starts from a good threshold.
    fn probe(&self, unit: &Unit, refined: &Refined) -> Harvest<'a> {
        let mut few = refined.clone();
        few.highs.truncate(PROBE);
        few.rectifiers.truncate(PROBE);
        few.chokes.truncate(PROBE);
        let mut harvest = self.nothing_yet();
        self.search(unit, &few, &mut harvest);
        harvest
    }

    /// Every combination of what is left of a unit, as long as it can still enter.
    fn search(&self, unit: &Unit, refined: &Refined, harvest: &mut Harvest<'a>) {
        let rates = &refined.rates;
        let (Some(least_high), Some(least_rectifier)) = (refined.highs.first(), refined.rectifiers.first()) else {
            return;
        };
        let (least_high, least_rectifier) = (least_high.price.at(rates), least_rectifier.price.at(rates));
        let aim = self.aim(f64::INFINITY, SEARCH_PASSES);
        let inputs = offers(&refined.inputs(&aim), rates);
        let mut memory = Vec::new();
        for choke in &refined.chokes {
            let choke_figure = choke.price.at(rates) - rates.allowance;
            let least = choke_figure + least_high + least_rectifier;
            if (least + refined.floor.at(rates)) * SHY > harvest.leaders.threshold() || self.stopped() {
                break;
            }
            let outputs = offers(&refined.outputs(&aim, Some(choke)), rates);
            let Some(floor) = Floor::new(refined, &inputs, &outputs, rates) else { continue };
            if (least + floor.figure) * SHY > harvest.leaders.threshold() {
                continue;
            }
            let with = WithChoke { unit, refined, choke, inputs: &inputs, outputs: &outputs, floor };
            memory = self.with_choke(&with, memory, harvest);
        }
    }

    fn with_choke(
        &self,
        with: &WithChoke,
        mut memory: Vec<PointSolution>,
        harvest: &mut Harvest<'a>,
    ) -> Vec<PointSolution> {
        let rates = &with.refined.rates;
        let base_figure = with.choke.price.at(rates) - rates.allowance + with.floor.figure;
        let base = with.choke.price.plus(&with.floor.least);
        let least_rectifier = with.refined.rectifiers[0].price.at(rates);
        for high in &with.refined.highs {
            let high_figure = base_figure + high.price.at(rates);
            if (high_figure + least_rectifier) * SHY > harvest.leaders.threshold() || self.stopped() {
                break;
            }
            let with_high = base.plus(&high.price);
            for rectifier in &with.refined.rectifiers {
                if (high_figure + rectifier.price.at(rates)) * SHY > harvest.leaders.threshold() {
                    break;
                }
                if self.caps.exceeded(&with_high.plus(&rectifier.price)) {
                    continue;
                }
                let trio = Trio { high: high.candidate, rectifier: rectifier.candidate, choke: with.choke.candidate };
                memory = self.try_core(with, trio, memory, harvest);
            }
        }
        memory
    }

    fn try_core(
        &self,
        with: &WithChoke,
        trio: Trio,
        memory: Vec<PointSolution>,
        harvest: &mut Harvest<'a>,
    ) -> Vec<PointSolution> {
        harvest.evaluated += 1;
        let rates = &with.refined.rates;
        let footing = trio.footing();
        let Some(weighted) = trio.weigh(self.field, with.unit.at) else { return memory };
        let own = Price::new(weighted.core_loss_w, &footing);
        if (own.at(rates) - rates.allowance + with.floor.banks_figure) * SHY > harvest.leaders.threshold()
            || self.caps.exceeded(&own.plus(&with.floor.banks))
        {
            return memory;
        }
        match CoreTrial::new(self.field, with.unit.at, trio, self.request.tolerated, memory) {
            Err(memory) => memory,
            Ok(core) => {
                let purpose = Purpose { rates, caps: &self.caps, distinct: self.request.distinct };
                complete(&core, &own, with.inputs, with.outputs, &purpose, &mut harvest.leaders);
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
