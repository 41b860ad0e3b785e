//! One unit, searched for every wish that it may still serve.

use std::collections::{BTreeSet, HashMap};

use super::harvest::{Harvest, Wish};
use super::seat::Seat;
use super::space::{narrow, narrowed, offers_for, sort};
use crate::part::{Choke, Slot as Place, SwitchBank};
use crate::search::bound::Price;
use crate::search::bound::reach::SHY;
use crate::search::completion::{Offer, Purpose, complete, offers};
use crate::search::field::Candidate;
use crate::search::leaders::Leaders;
use crate::search::order::Ranked;
use crate::search::relax::halves;
use crate::search::request::{Distinct, Request, Tolerance};
use crate::search::trial::{CoreTrial, Rectifier, Trio};
use crate::search::unit::{Aim, Refined, Slot, Unit};
use crate::stage::{Choice, RectifierKind};

/// Passes over a unit before it is searched.
const PASSES: usize = 2;
/// Cores tried for a wish before the unit is narrowed to it and halved; more than a box that is not halved can have.
const PATIENCE: usize = 64;
/// Cores of a unit that are remembered for other wishes.
const REMEMBERED: usize = 4096;

/// A core is known by its parts, counts and what it may break.
type Key = (Choice, Choice, usize, u64);

/// The search of one unit.
pub(super) struct Visit<'a, 'b> {
    request: &'b Request<'a>,
    aim: Aim<'a>,
    unit: &'b Unit<'a>,
    harvest: Harvest<'b>,
    better: BTreeSet<usize>,
    cores: HashMap<Key, Option<CoreTrial<'a>>>,
    outputs: HashMap<usize, Vec<Offer<'a>>>,
}

/// Lists of a unit, each ascending in what it adds, with the banks to complete a core.
struct Lists<'s, 'a> {
    space: &'s Refined<'a>,
    highs: Vec<Slot<&'a Candidate<SwitchBank>>>,
    rectifiers: Vec<Slot<Rectifier<'a>>>,
    chokes: Vec<Slot<&'a Candidate<Choke>>>,
    inputs: Vec<Offer<'a>>,
}

impl<'a, 'b> Visit<'a, 'b> {
    pub fn new(request: &'b Request<'a>, aim: Aim<'a>, unit: &'b Unit<'a>, harvest: Harvest<'b>) -> Self {
        let (better, cores, outputs) = (BTreeSet::new(), HashMap::new(), HashMap::new());
        Self { request, aim: Aim { passes: PASSES, ..aim }, unit, harvest, better, cores, outputs }
    }

    /// Searches the unit for the open wishes; what is better than before.
    pub fn search(mut self, open: &[usize]) -> Vec<(usize, Ranked)> {
        let greatest = open.iter().map(|&wish| self.harvest.threshold(wish)).fold(f64::NEG_INFINITY, f64::max);
        let Some(refined) = self.unit.refine(&Aim { threshold: greatest, ..self.aim }) else { return Vec::new() };
        let inputs = offers(&refined.inputs(&self.aim), &refined.rates);
        for &wish in open {
            if self.request.progress.is_some_and(|progress| progress.stopped()) {
                break;
            }
            let seat = self.harvest.wishes[wish].seat;
            if let Some(lists) = self.lists(&refined, &inputs, wish)
                && !self.combine(wish, &lists, Some(PATIENCE))
            {
                let mut space = refined.clone();
                narrow(&mut space, seat);
                self.explore(wish, space);
            }
        }
        let Self { better, harvest, .. } = self;
        better.into_iter().filter_map(|wish| Some((wish, harvest.best(wish)?))).collect()
    }

    /// The lists narrowed to a wish, without what cannot beat its threshold; `None` when one of them is empty.
    fn lists<'s>(&self, space: &'s Refined<'a>, inputs: &[Offer<'a>], wish: usize) -> Option<Lists<'s, 'a>> {
        let Wish { seat, .. } = self.harvest.wishes[wish];
        let lists = Lists {
            space,
            highs: narrowed(&space.highs, seat, Place::HighSwitch, |slot| slot.candidate.choice.index),
            rectifiers: narrowed(&space.rectifiers, seat, Place::Rectifier, |slot| slot.candidate.choice().index),
            chokes: narrowed(&space.chokes, seat, Place::Inductor, |slot| slot.candidate.choice.index),
            inputs: offers_for(inputs, seat, Place::InputBank),
        };
        let kind = match seat {
            Seat::SwitchRectifier(_) => Some(RectifierKind::Switch),
            Seat::DiodeRectifier(_) => Some(RectifierKind::Diode),
            _ => None,
        };
        let whole = kind.is_none_or(|kind| kind == space.kind)
            && !lists.highs.is_empty()
            && !lists.rectifiers.is_empty()
            && !lists.chokes.is_empty()
            && !lists.inputs.is_empty();
        whole.then_some(lists)
    }

    /// A box that took too long: what of it can still pass with this part, in smaller boxes.
    fn explore(&mut self, wish: usize, mut space: Refined<'a>) {
        let tolerated = self.tolerance(wish);
        let aim = Aim { threshold: self.harvest.threshold(wish), tolerated, ..self.aim };
        if space.tighten(&aim).is_none() {
            return;
        }
        sort(&mut space);
        self.outputs.clear();
        let inputs = offers(&space.inputs(&aim), &space.rates);
        let cores = space.highs.len() * space.rectifiers.len() * space.chokes.len();
        let patience = (cores > PATIENCE).then_some(PATIENCE);
        let Some(lists) = self.lists(&space, &inputs, wish) else { return };
        if !self.combine(wish, &lists, patience) {
            let (low, high) = halves(space);
            self.explore(wish, low);
            self.explore(wish, high);
        }
        self.outputs.clear();
    }

    fn tolerance(&self, wish: usize) -> Option<Tolerance> {
        self.harvest.wishes[wish].tolerance(self.request.tolerated)
    }

    /// Every combination that can still beat the wish's threshold; `false` when it gave up after so many cores in a row that
    /// were no better.
    fn combine(&mut self, wish: usize, lists: &Lists<'_, 'a>, patience: Option<usize>) -> bool {
        let rates = lists.space.rates;
        let seat = self.harvest.wishes[wish].seat;
        let least_high = lists.highs[0].price.at(&rates);
        let least_rectifier = lists.rectifiers[0].price.at(&rates);
        let mut fruitless = 0;
        for choke in &lists.chokes {
            let choke_figure = choke.price.at(&rates) - rates.allowance;
            let least = choke_figure + least_high + least_rectifier;
            if (least + lists.space.floor.at(&rates)) * SHY > self.harvest.threshold(wish) {
                break;
            }
            let outputs = self.outputs_with(lists.space, choke, seat);
            let (Some(input), Some(output)) = (lists.inputs.first(), outputs.first()) else { continue };
            let banks = Banks {
                least: Offer::least(&lists.inputs).plus(&Offer::least(&outputs)),
                figure: input.figure() + output.figure(),
            };
            let base_figure = choke_figure + lists.space.bias.at(&rates) + banks.figure;
            let base = choke.price.plus(&lists.space.bias).plus(&banks.least);
            for high in &lists.highs {
                let high_figure = base_figure + high.price.at(&rates);
                if (high_figure + least_rectifier) * SHY > self.harvest.threshold(wish) {
                    break;
                }
                let with_high = base.plus(&high.price);
                for rectifier in &lists.rectifiers {
                    if (high_figure + rectifier.price.at(&rates)) * SHY > self.harvest.threshold(wish) {
                        break;
                    }
                    if self.aim.caps.exceeded(&with_high.plus(&rectifier.price)) {
                        continue;
                    }
                    if patience.is_some_and(|patience| fruitless >= patience) {
                        return false;
                    }
                    let trio = Trio { high: high.candidate, rectifier: rectifier.candidate, choke: choke.candidate };
                    fruitless = if self.try_core(wish, trio, lists, &outputs, &banks) { 0 } else { fruitless + 1 };
                }
            }
        }
        true
    }

    /// The output banks that may pass with an inductor, narrowed to a seat.
    fn outputs_with(&mut self, space: &Refined<'a>, choke: &Slot<&'a Candidate<Choke>>, seat: Seat) -> Vec<Offer<'a>> {
        let aim = &self.aim;
        let all = self
            .outputs
            .entry(choke.candidate.choice.index)
            .or_insert_with(|| offers(&space.outputs(aim, Some(choke)), &space.rates));
        offers_for(all, seat, Place::OutputBank)
    }

    /// One core with all banks; whether the wish is better off for it.
    fn try_core(
        &mut self,
        wish: usize,
        trio: Trio<'a>,
        lists: &Lists<'_, 'a>,
        outputs: &[Offer<'a>],
        banks: &Banks,
    ) -> bool {
        let tolerance = self.tolerance(wish);
        let excess_bits = tolerance.map_or(0, |tolerance| tolerance.excess.to_bits());
        let key = (trio.high.choice, trio.rectifier.choice(), trio.choke.choice.index, excess_bits);
        let core = match self.cores.remove(&key) {
            Some(known) => known,
            None => {
                let rates = &lists.space.rates;
                let Some(weighted) = trio.weigh(self.aim.field, self.unit.at) else { return false };
                let own = Price::new(weighted.core_loss_w, &trio.footing());
                if (own.at(rates) - rates.allowance + banks.figure) * SHY > self.harvest.threshold(wish)
                    || self.aim.caps.exceeded(&own.plus(&banks.least))
                {
                    return false;
                }
                CoreTrial::new(self.aim.field, self.unit.at, trio, tolerance, Vec::new()).ok()
            }
        };
        let better = core.as_ref().is_some_and(|core| self.with_banks(wish, &trio, core, lists, outputs));
        if self.cores.len() < REMEMBERED {
            self.cores.insert(key, core);
        }
        better
    }

    fn with_banks(
        &mut self,
        wish: usize,
        trio: &Trio<'a>,
        core: &CoreTrial<'a>,
        lists: &Lists<'_, 'a>,
        outputs: &[Offer<'a>],
    ) -> bool {
        let own = Price::new(core.weighted().core_loss_w, &trio.footing());
        let mut leader = Leaders::new(self.request.parts, Distinct::Triple, 1);
        if let Some(best) = self.harvest.best(wish) {
            leader.offer(best);
        }
        let purpose = Purpose { rates: &lists.space.rates, caps: &self.aim.caps, distinct: Distinct::Triple };
        complete(core, &own, &lists.inputs, outputs, &purpose, &mut leader);
        let mut better = false;
        for ranked in leader.into_entries() {
            for improved in self.harvest.credit(ranked) {
                better |= improved == wish;
                self.better.insert(improved);
            }
        }
        better
    }
}

/// The least that banks add: each sum by itself, and at the rates.
struct Banks {
    least: Price,
    figure: f64,
}
