//! What became of each part: the best stage with it and what that costs, or the limit that stops it.

mod data;
mod own;
mod stop;

use std::collections::HashMap;

pub use data::{Best, Elsewhere, Fate, Fates, Outcome, Place, Stop};

use crate::account::{Account, account};
use crate::part::Parts;
use crate::quantity::Positive;
use crate::rail::{Ban, Rail};
use crate::search::forced::{Seat, Wish, forced};
use crate::search::order::Identity;
use crate::search::{Distinct, Progress, Ranked, Request, pruned::pruned};
use stop::stops;

/// How fates are asked for.
#[derive(Debug, Clone, Copy)]
pub struct Options<'a> {
    /// Down to which place of the shortlist ranks are given.
    pub ranked_to: usize,
    /// Whether to find by how much a limit must give at least for each part that does not pass, however long that takes.
    pub least: bool,
    /// Worker threads; 0 for one a processor.
    pub threads: usize,
    /// Where to hear that the search shall stop.
    pub progress: Option<&'a Progress>,
}

/// The fate of every part in every slot; `None` when it was stopped before all was known.
pub fn fates<'a>(rail: &'a Rail, parts: &'a Parts, options: &Options<'a>) -> Option<Fates> {
    let request = Request {
        threads: options.threads,
        progress: options.progress,
        ..Request::new(rail, parts, options.ranked_to)
    };
    let list = pruned(&request).ranked;
    let seats = Seat::all(rail, parts);
    let wishes: Vec<Wish> = seats.iter().filter(|seat| seat.is_allowed(rail, parts)).copied().map(Wish::new).collect();
    let found = forced(&request, &wishes);
    let stopped: Vec<Seat> =
        wishes.iter().zip(&found).filter(|(_, found)| found.is_none()).map(|(wish, _)| wish.seat).collect();
    let mut stops: HashMap<Seat, Stop> =
        stopped.iter().copied().zip(stops(&request, &stopped, options.least)).collect();
    for (seat, elsewhere) in beyond(&request, &stopped) {
        if let Some(stop) = stops.get_mut(&seat) {
            stop.elsewhere = Some(elsewhere);
        }
    }
    if options.progress.is_some_and(Progress::stopped) {
        return None;
    }
    let found: HashMap<Seat, Ranked> =
        wishes.iter().zip(found).filter_map(|(wish, found)| Some((wish.seat, found?))).collect();
    let judge = Judge { rail, parts, list: &list, best: list.first().map(|best| account(rail, parts, &best.stage)) };
    let fates = seats
        .iter()
        .filter_map(|&seat| {
            let outcome = match (found.get(&seat), stops.remove(&seat)) {
                (Some(ranked), _) => Outcome::Passes(judge.place(ranked)?),
                (None, Some(stop)) => Outcome::Stopped(stop),
                (None, None) => kept_out(seat, rail, parts),
            };
            let part = seat.identity(parts).part.clone();
            Some(Fate { catalog: catalog(seat), part, slot: seat.slot(), outcome })
        })
        .collect();
    let best = judge.best.as_ref().and_then(|best| Some(Best { burden: best.burden?, stage: best.stage.clone() }));
    Some(Fates { rail: rail.name.clone(), best, ranked_to: options.ranked_to, fates })
}

/// The best stages by which others are measured.
struct Judge<'a> {
    rail: &'a Rail,
    parts: &'a Parts,
    list: &'a [Ranked],
    best: Option<Account>,
}

impl Judge<'_> {
    fn place(&self, ranked: &Ranked) -> Option<Place> {
        let best = self.best.as_ref()?;
        let with = account(self.rail, self.parts, &ranked.stage);
        let over = |a: Option<f64>, b: Option<f64>| Some(a? - b?);
        let triple: Identity = ranked.identity(Distinct::Triple);
        Some(Place {
            rank: self.list.iter().position(|entry| entry.identity(Distinct::Triple) == triple).map(|at| at + 1),
            burden: with.burden?,
            penalty: over(with.burden, best.burden)?,
            loss_penalty_w: over(with.weighted_loss_w, best.weighted_loss_w)?,
            cost_penalty: over(with.cost, best.cost),
            area_penalty_mm2: over(with.area_mm2, best.area_mm2),
            stage: with.stage,
        })
    }
}

/// Parts that pass at a frequency beyond the rail's range, the nearest one: half octaves, to a quarter of the least and four
/// times the greatest.
fn beyond(request: &Request, seats: &[Seat]) -> Vec<(Seat, Elsewhere)> {
    let frequencies = &request.rail.range.frequencies_hz;
    let ends = frequencies
        .iter()
        .map(|hz| hz.get())
        .fold((f64::INFINITY, 0.0_f64), |(low, high), hz| (low.min(hz), high.max(hz)));
    let mut left: Vec<Seat> = seats.to_vec();
    let mut found = Vec::new();
    for half_octaves in 1..=4 {
        let factor = 2f64.powf(f64::from(half_octaves) / 2.0);
        let mut rail = request.rail.clone();
        rail.range.frequencies_hz = [ends.0 / factor, ends.1 * factor].into_iter().filter_map(Positive::new).collect();
        let wishes: Vec<Wish> = left.iter().copied().map(Wish::new).collect();
        for (seat, ranked) in left.clone().into_iter().zip(forced(&Request { rail: &rail, ..*request }, &wishes)) {
            if let Some(ranked) = ranked {
                left.retain(|other| *other != seat);
                let stage = ranked.stage.named(request.parts);
                found.push((seat, Elsewhere { frequency_hz: ranked.stage.frequency_hz, stage }));
            }
        }
    }
    found
}

fn kept_out(seat: Seat, rail: &Rail, parts: &Parts) -> Outcome {
    let identity = seat.identity(parts);
    let banned = rail.bans.iter().any(|ban| match ban {
        Ban::Part(part) => *part == identity.part,
        Ban::Maker(maker) => identity.maker.as_ref() == Some(maker),
    });
    if banned { Outcome::Banned } else { Outcome::PinnedOut }
}

const fn catalog(seat: Seat) -> &'static str {
    match seat {
        Seat::HighSwitch(_) | Seat::SwitchRectifier(_) => "switches",
        Seat::DiodeRectifier(_) => "diodes",
        Seat::Inductor(_) => "inductors",
        Seat::InputBank(_) | Seat::OutputBank(_) => "capacitors",
    }
}
