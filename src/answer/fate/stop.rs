//! Which single limit stops a part, and by how much.

use rayon::iter::{IntoParallelRefIterator, ParallelIterator};

use super::data::Stop;
use super::own::OwnLimits;
use crate::account::{LimitRow, account};
use crate::limit::check::Finding;
use crate::limit::{Check, LimitName};
use crate::model::Conditions;
use crate::rail::{Pin, Rail};
use crate::search::forced::{Seat, Wish, forced};
use crate::search::relax::{least_excess, sum_alone};
use crate::search::{Ranked, Request, Tolerance};
use crate::stage::Stage;

/// Parts × inductors × frequencies × parts whose least need is searched for without being asked: beyond, that of the best stage
/// is told.
const QUICK: usize = 1_000_000;

/// For each part, none of which passes: the limit that would have to give least, in the order of the limits where two are equal.
/// By how much it must give at least is a search for each part; `least` asks for it however long it takes.
pub(super) fn stops(request: &Request, seats: &[Seat], least: bool) -> Vec<Stop> {
    let conditions = Conditions::of(request.rail);
    let own: Vec<OwnLimits> =
        seats.iter().map(|&seat| OwnLimits::of(seat, request.rail, request.parts, &conditions)).collect();
    let mut nearest: Vec<Option<Nearest>> = vec![None; seats.len()];
    for limit in LimitName::ALL.into_iter().filter(|limit| limit.can_give()) {
        let open: Vec<Open> = (0..seats.len())
            .filter(|&at| own[at].hopeless().is_none() && own[at].may_hang_on(limit))
            .map(|at| Open {
                at,
                seat: seats[at],
                own_excess: own[at].least_excess(limit),
                known_excess: nearest[at].map_or(f64::INFINITY, |nearest| nearest.found.excess),
            })
            .collect();
        for (at, found, is_least) in nearer(request, limit, &open, least) {
            nearest[at] = Some(Nearest { limit, found, is_least });
        }
    }
    nearest.iter().zip(&own).map(|(nearest, own)| stop(request, *nearest, own)).collect()
}

/// The limit that would have to give least so far, and the best stage that passes then.
#[derive(Debug, Clone, Copy)]
struct Nearest {
    limit: LimitName,
    found: Ranked,
    /// Whether no stage with the part needs less of the limit.
    is_least: bool,
}

/// A part that a limit may be what stops it.
struct Open {
    at: usize,
    seat: Seat,
    /// By how much the part alone breaks the limit.
    own_excess: f64,
    /// By how much another limit would have to give.
    known_excess: f64,
}

/// The parts that need less of this limit than is known of any other, with the best stage when it gives by just that, and
/// whether that is the least.
fn nearer(request: &Request, limit: LimitName, open: &[Open], always: bool) -> Vec<(usize, Ranked, bool)> {
    let any = Request { tolerated: Some(Tolerance::any(limit)), ..*request };
    let best_within = |wanted: &[(&Open, f64)]| -> Vec<Option<Ranked>> {
        let wishes: Vec<Wish> = wanted.iter().map(|(open, excess)| Wish { seat: open.seat, excess: *excess }).collect();
        if wishes.is_empty() { Vec::new() } else { forced(&any, &wishes) }
    };
    let open: Vec<&Open> = open.iter().filter(|open| open.own_excess < short_of(open.known_excess)).collect();
    // What a part breaks by itself no partner can mend: when a stage breaks no more than that, nothing breaks less.
    let alone: Vec<(&Open, f64)> =
        open.iter().filter(|open| open.own_excess > 0.0).map(|open| (*open, within(open.own_excess))).collect();
    let found: Vec<(usize, Ranked, bool)> =
        alone.iter().zip(best_within(&alone)).filter_map(|((open, _), found)| Some((open.at, found?, true))).collect();
    let rest: Vec<(&Open, f64)> = open
        .iter()
        .filter(|open| found.iter().all(|(at, ..)| *at != open.at))
        .map(|open| (*open, short_of(open.known_excess)))
        .collect();
    let first: Vec<(&Open, Ranked)> =
        rest.iter().zip(best_within(&rest)).filter_map(|((open, _), first)| Some((*open, first?))).collect();
    if sum_alone(limit).is_none() && !always && work(request, first.len()) > QUICK {
        return found.into_iter().chain(first.into_iter().map(|(open, first)| (open.at, first, false))).collect();
    }
    let least: Vec<(&Open, f64)> = match sum_alone(limit) {
        Some(worth) => {
            let wishes: Vec<Wish> = first.iter().map(|(open, _)| Wish::new(open.seat)).collect();
            let least = forced(&Request { worth, ..any }, &wishes);
            let excess = |((open, first), least): (&(_, Ranked), Option<Ranked>)| {
                (*open, within(least.map_or(first.excess, |least| least.excess)))
            };
            first.iter().zip(least).map(excess).collect()
        }
        None => first
            .par_iter()
            .map(|(open, first)| {
                let rail = pinned(request, open.seat);
                let alone = Request { rail: &rail, threads: 1, ..any };
                (*open, within(least_excess(&alone, limit, first.excess)))
            })
            .collect(),
    };
    let last = best_within(&least);
    let last = least.iter().zip(last).filter_map(|((open, _), found)| Some((open.at, found?, true)));
    found.into_iter().chain(last).collect()
}

/// How much there is to look at in a search for the least of so many parts.
fn work(request: &Request, searched: usize) -> usize {
    let parts = request.parts;
    let all = parts.switches.len() + parts.diodes.len() + parts.inductors.len() + parts.capacitors.len();
    searched * request.rail.range.frequencies_hz.len() * parts.inductors.len() * all
}

/// An excess that is less by more than rounding.
fn short_of(excess: f64) -> f64 {
    excess * (1.0 - 1e-9) - 1e-9
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

fn stop(request: &Request, nearest: Option<Nearest>, own: &OwnLimits) -> Stop {
    let nothing = Stop { limit: None, value: None, bound: None, nearest: None, is_least: true, elsewhere: None };
    match (nearest, own.hopeless()) {
        (Some(Nearest { limit, found, is_least }), _) => {
            let broken = worst_row(request, limit, &found.stage);
            let (value, bound) = broken.map_or((None, None), |row| (row.value, row.bound));
            Stop {
                limit: Some(limit),
                value,
                bound,
                nearest: Some(found.stage.named(request.parts)),
                is_least,
                ..nothing
            }
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
