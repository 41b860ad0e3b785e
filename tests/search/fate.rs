//! What became of each part, against a look at every stage.

use std::collections::HashMap;

use wattsieve::answer::fate::{Options, Outcome, fates};
use wattsieve::limit::LimitName;
use wattsieve::rail::Rail;
use wattsieve::search::exhaustive::{every_stage, exhaustive};
use wattsieve::search::forced::Seat;
use wattsieve::search::{Distinct, Request, Tolerance};

use super::problem::Problem;
use super::problems;

/// The least that each limit alone must give for a stage with each part, by looking at every stage.
fn least_needs(request: &Request) -> HashMap<Seat, f64> {
    let mut needs = HashMap::new();
    for limit in LimitName::ALL.into_iter().filter(|limit| limit.can_give()) {
        let any = Request { tolerated: Some(Tolerance::any(limit)), ..*request };
        every_stage(&any, &mut |ranked| {
            for seat in Seat::of_stage(&ranked.stage) {
                let least = needs.entry(seat).or_insert(ranked.excess);
                *least = ranked.excess.min(*least);
            }
        });
    }
    needs
}

fn is_ranked_as_the_list_says(rail: &Rail, request: &Request, rank: Option<usize>, seat: Seat) {
    let list = exhaustive(&Request { top: 5, distinct: Distinct::Triple, ..*request }).ranked;
    let holds = |rank: usize| !matches!(seat, Seat::InputBank(_) | Seat::OutputBank(_)) && rank <= list.len();
    if let Some(rank) = rank.filter(|&rank| holds(rank)) {
        let first = list.iter().position(|entry| Seat::of_stage(&entry.stage).contains(&seat));
        assert_eq!(first.map(|at| at + 1), Some(rank), "{} {seat:?}", rail.name);
    }
}

#[test]
fn penalties_and_needs_are_those_of_all_stages() {
    const OUT: f64 = 3e-9;
    let (mut passing, mut hanging) = (0, 0);
    for seed in 0..problems() / 20 {
        let Problem { rail, parts } = Problem::new(4_000_000 + seed);
        let request = Request::new(&rail, &parts, 5);
        let options = Options { ranked_to: 5, least: true, threads: 2, progress: None };
        let told = fates(&rail, &parts, &options).expect("not stopped");
        let needs = least_needs(&request);
        let seats = Seat::all(&rail, &parts);
        assert_eq!(seats.len(), told.fates.len(), "seed {seed}");
        for (seat, fate) in seats.into_iter().zip(&told.fates) {
            match &fate.outcome {
                Outcome::Passes(place) => {
                    assert!(place.penalty >= 0.0, "seed {seed} {fate:?}");
                    is_ranked_as_the_list_says(&rail, &request, place.rank, seat);
                    passing += 1;
                }
                Outcome::Stopped(stop) => {
                    let need = stop.nearest.as_ref().and_then(|_| {
                        let (value, bound) = (stop.value?, stop.bound?);
                        Some((value - bound).abs() / bound.abs())
                    });
                    let expected = needs.get(&seat).copied();
                    assert_eq!(need.is_some(), expected.is_some(), "seed {seed} {fate:?} {expected:?}");
                    if let (Some(need), Some(expected)) = (need, expected) {
                        assert!((need - expected).abs() <= OUT * (1.0 + expected), "seed {seed} {fate:?} {expected}");
                        hanging += 1;
                    }
                }
                Outcome::PinnedOut | Outcome::Banned => assert!(!seat.is_allowed(&rail, &parts), "seed {seed}"),
            }
        }
    }
    assert!(passing > problems() / 20 && hanging > problems() / 40, "{passing} pass, {hanging} hang on one limit");
}
