//! The best banks for a core.

use super::bound::reach::SHY;
use super::bound::{Price, Rates};
use super::field::Candidate;
use super::leaders::Leaders;
use super::request::Distinct;
use super::trial::{BankTrial, CoreTrial, Place};
use super::unit::Caps;
use crate::part::Bank;
use crate::stage::Choice;

/// A bank that may pass, with the least that it adds.
#[derive(Debug, Clone, Copy)]
pub struct Offer<'a> {
    candidate: &'a Candidate<Bank>,
    price: Price,
    /// The price at the unit's rates.
    figure: f64,
}

impl Offer<'_> {
    /// Part and count.
    pub const fn choice(&self) -> Choice {
        self.candidate.choice
    }

    /// The least it adds, at the unit's rates.
    pub const fn figure(&self) -> f64 {
        self.figure
    }

    /// The least that any of the offers adds to each sum by itself.
    pub fn least(offers: &[Self]) -> Price {
        let of = |sum: fn(&Price) -> f64| offers.iter().map(|offer| sum(&offer.price)).fold(f64::INFINITY, f64::min);
        Price { loss_w: of(|p| p.loss_w), area_mm2: of(|p| p.area_mm2), cost: of(|p| p.cost) }
    }
}

/// The offers of a list, the least first.
pub fn offers<'a>(list: &[(&'a Candidate<Bank>, Price)], rates: &Rates) -> Vec<Offer<'a>> {
    let mut offers: Vec<Offer> =
        list.iter().map(|&(candidate, price)| Offer { candidate, price, figure: price.at(rates) }).collect();
    offers.sort_by(|a, b| a.figure.total_cmp(&b.figure));
    offers
}

/// What a core is completed for.
#[derive(Debug, Clone, Copy)]
pub struct Purpose<'b> {
    /// Exchange rates of the offers.
    pub rates: &'b Rates,
    /// Caps on the sums.
    pub caps: &'b Caps,
    /// Whether one stage of a core is enough.
    pub distinct: Distinct,
}

/// Offers the stages of a core: with every pair of banks that can still enter the list, or, where stages of one core compete
/// for one place, with every pair that can still be the best of the core. `own` is what the core adds, exactly.
///
/// Pairs are tried in ascending order of what the input bank adds at least, and for each in that of the output bank, so both
/// loops end at the first bank that cannot do.
pub fn complete(
    core: &CoreTrial,
    own: &Price,
    inputs: &[Offer],
    outputs: &[Offer],
    purpose: &Purpose,
    leaders: &mut Leaders,
) {
    let Some(least_output) = outputs.first().map(|offer| offer.figure) else { return };
    let mut best = f64::INFINITY;
    let mut judged_outputs: Vec<Option<BankTrial>> = Vec::new();
    let allowance = purpose.rates.allowance;
    let own_figure = own.at(purpose.rates) - allowance;
    for input in inputs {
        if (own_figure + input.figure + least_output) * SHY > leaders.threshold().min(best) {
            break;
        }
        let with_input = own.plus(&input.price);
        let Some(input_trial) = core.bank(input.candidate, Place::Input) else { continue };
        for (index, output) in outputs.iter().enumerate() {
            if (own_figure + input.figure + output.figure) * SHY > leaders.threshold().min(best) {
                break;
            }
            if index == judged_outputs.len() {
                judged_outputs.push(core.bank(output.candidate, Place::Output));
            }
            let Some(output_trial) = &judged_outputs[index] else { continue };
            if purpose.caps.exceeded(&with_input.plus(&output.price)) {
                continue;
            }
            if let Some(ranked) = core.stage(&input_trial, output_trial) {
                if purpose.distinct != Distinct::Stage {
                    best = best.min(ranked.burden);
                }
                leaders.offer(ranked);
            }
        }
    }
}

/// The least excess over the tolerated limit that any pair of banks gives a core; `None` when no pair passes.
pub fn least_excess(core: &CoreTrial, inputs: &[&Candidate<Bank>], outputs: &[&Candidate<Bank>]) -> Option<f64> {
    let (inputs, outputs) = (least_first(core, inputs, Place::Input), least_first(core, outputs, Place::Output));
    let mut best: Option<f64> = None;
    for input in &inputs {
        for output in &outputs {
            if best.is_some_and(|best| input.excess().max(output.excess()) >= best) {
                break;
            }
            if let Some(ranked) = core.stage(input, output) {
                best = Some(best.map_or(ranked.excess, |best| best.min(ranked.excess)));
            }
        }
    }
    best
}

fn least_first<'a>(core: &CoreTrial, banks: &[&'a Candidate<Bank>], place: Place) -> Vec<BankTrial<'a>> {
    let mut trials: Vec<BankTrial> = banks.iter().filter_map(|bank| core.bank(bank, place)).collect();
    trials.sort_by(|a, b| a.excess().total_cmp(&b.excess()));
    trials
}
