//! Which single limit stops a part, and by how much.

use super::data::Stop;
use super::own::OwnLimits;
use crate::account::{LimitRow, account};
use crate::limit::check::Finding;
use crate::limit::{Check, LimitName};
use crate::model::Conditions;
use crate::rail::{Pin, Rail};
use crate::search::forced::{Seat, Wish, forced};
use crate::search::relax::relaxed;
use crate::search::{Ranked, Request, Tolerance};
use crate::stage::Stage;

/// For each part, none of which passes: the limit that would have to give least, in the order of the limits where two are equal.
pub(super) fn stops(request: &Request, seats: &[Seat]) -> Vec<Stop> {
    let conditions = Conditions::of(request.rail);
    let own: Vec<OwnLimits> =
        seats.iter().map(|&seat| OwnLimits::of(seat, request.rail, request.parts, &conditions)).collect();
    let mut nearest: Vec<Option<(LimitName, Ranked)>> = vec![None; seats.len()];
    for limit in LimitName::ALL.into_iter().filter(|limit| limit.can_give()) {
        let open: Vec<usize> =
            (0..seats.len()).filter(|&at| own[at].hopeless().is_none() && own[at].may_hang_on(limit)).collect();
        if open.is_empty() {
            continue;
        }
        for (at, found) in open.iter().zip(least(request, limit, &open, seats, &own)) {
            let nearer = |found: &Ranked| nearest[*at].is_none_or(|(_, best)| found.excess < best.excess);
            if let Some(found) = found.filter(nearer) {
                nearest[*at] = Some((limit, found));
            }
        }
    }
    nearest.iter().zip(&own).map(|(nearest, own)| stop(request, *nearest, own)).collect()
}

/// The best stage with each part that breaks the limit by the least that anything with it must.
fn least(
    request: &Request,
    limit: LimitName,
    open: &[usize],
    seats: &[Seat],
    own: &[OwnLimits],
) -> Vec<Option<Ranked>> {
    let any = Request { tolerated: Some(Tolerance::any(limit)), ..*request };
    // What a part breaks by itself no partner can mend: when a stage breaks no more than that, nothing breaks less.
    let least_own = |at: usize| own[at].least_excess(limit);
    let wishes: Vec<Wish> = open.iter().map(|&at| Wish { seat: seats[at], excess: within(least_own(at)) }).collect();
    let mut found = forced(&any, &wishes);
    let rest: Vec<usize> = (0..open.len()).filter(|&place| found[place].is_none()).collect();
    let wishes: Vec<Wish> = rest.iter().map(|&place| Wish::new(seats[open[place]])).collect();
    for (&place, first) in rest.iter().zip(forced(&any, &wishes)) {
        found[place] = first.and_then(|_| {
            let rail = pinned(request, seats[open[place]]);
            relaxed(&Request { rail: &rail, ..*request }, limit)
        });
    }
    found
}

/// An excess with the room that limits have for rounding.
fn within(excess: f64) -> f64 {
    excess * (1.0 + 1e-9) + 1e-9
}

/// The rail with one slot pinned to one part.
fn pinned(request: &Request, seat: Seat) -> Rail {
    let mut rail = request.rail.clone();
    match seat {
        Seat::SwitchRectifier(_) => rail.range.diode_rectifier = false,
        Seat::DiodeRectifier(_) => rail.range.switch_rectifier = false,
        _ => {}
    }
    rail.pins.push(Pin { slot: seat.slot(), parts: vec![seat.identity(request.parts).part.clone()] });
    rail
}

fn stop(request: &Request, nearest: Option<(LimitName, Ranked)>, own: &OwnLimits) -> Stop {
    let nothing = Stop { limit: None, value: None, bound: None, nearest: None, elsewhere: None };
    match (nearest, own.hopeless()) {
        (Some((limit, ranked)), _) => {
            let broken = worst_row(request, limit, &ranked.stage);
            let (value, bound) = broken.map_or((None, None), |row| (row.value, row.bound));
            Stop { limit: Some(limit), value, bound, nearest: Some(ranked.stage.named(request.parts)), ..nothing }
        }
        (None, Some(limit)) => Stop { limit: Some(limit), ..nothing },
        (None, None) => match own.always() {
            Some(check) => {
                let (value, bound) = numbers(&check);
                Stop { limit: Some(check.limit), value, bound, ..nothing }
            }
            None => nothing,
        },
    }
}

const fn numbers(check: &Check) -> (Option<f64>, Option<f64>) {
    match check.finding {
        Finding::Compared { value, bound, .. } => (Some(value), Some(bound)),
        Finding::Plain { .. } => (None, None),
    }
}

/// The row of an account that breaks a limit most.
fn worst_row(request: &Request, limit: LimitName, stage: &Stage) -> Option<LimitRow> {
    let account = account(request.rail, request.parts, stage);
    account
        .limits
        .into_iter()
        .filter(|row| row.limit == limit && !row.holds)
        .min_by_key(|row| ordered_float::OrderedFloat(row.margin.unwrap_or(f64::NEG_INFINITY)))
}
