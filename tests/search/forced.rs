//! The best stage with each part, against a look at every stage.

use std::cmp::Ordering;
use std::collections::HashMap;

use wattsieve::limit::LimitName;
use wattsieve::search::exhaustive::every_stage;
use wattsieve::search::forced::{Seat, Wish, forced};
use wattsieve::search::order::compare;
use wattsieve::search::{Ranked, Request, Tolerance};

use super::problem::Problem;
use super::problems;

/// The best of all stages with each part, those only that break the tolerated limit by no more than this.
fn by_hand(request: &Request, excess: f64) -> HashMap<Seat, Ranked> {
    let mut best: HashMap<Seat, Ranked> = HashMap::new();
    every_stage(request, &mut |ranked| {
        if ranked.excess > excess {
            return;
        }
        for seat in Seat::of_stage(&ranked.stage) {
            let entry = best.entry(seat).or_insert(ranked);
            if compare(request.parts, &ranked, entry) == Ordering::Less {
                *entry = ranked;
            }
        }
    });
    best
}

#[test]
fn every_part_gets_its_best_stage_bit_for_bit() {
    let (mut with, mut without) = (0, 0);
    for seed in 0..problems() / 2 {
        let Problem { rail, parts } = Problem::new(2_000_000 + seed);
        let request = Request { threads: [1, 2, 7][(seed % 3) as usize], ..Request::new(&rail, &parts, 1) };
        let wishes: Vec<Wish> = Seat::all(&rail, &parts).into_iter().map(Wish::new).collect();
        let expected = by_hand(&request, f64::INFINITY);
        for (wish, found) in wishes.iter().zip(forced(&request, &wishes)) {
            assert_eq!(found.as_ref(), expected.get(&wish.seat), "seed {seed} {:?}", wish.seat);
            *(if found.is_some() { &mut with } else { &mut without }) += 1;
        }
    }
    assert!(with > problems() && without > problems() / 2, "{with} parts with a stage, {without} without");
    eprintln!("{with} parts with a stage, {without} without");
}

#[test]
fn a_part_may_break_a_limit_by_as_much_as_its_wish_says() {
    const EXCESSES: [f64; 3] = [0.02, 0.2, f64::INFINITY];
    let mut found_any = 0;
    for seed in 0..problems() / 10 {
        let Problem { rail, parts } = Problem::new(3_000_000 + seed);
        let limit = LimitName::ALL[(seed % 23) as usize];
        let request = Request { tolerated: Some(Tolerance::any(limit)), ..Request::new(&rail, &parts, 1) };
        let expected = EXCESSES.map(|excess| by_hand(&request, excess));
        let seats = Seat::all(&rail, &parts);
        let wish = |(place, seat)| Wish { seat, excess: EXCESSES[place % 3] };
        let wishes: Vec<Wish> = seats.into_iter().enumerate().map(wish).collect();
        for (place, found) in forced(&request, &wishes).iter().enumerate() {
            let seat = wishes[place].seat;
            assert_eq!(found.as_ref(), expected[place % 3].get(&seat), "seed {seed} {limit:?} {seat:?}");
            found_any += u64::from(found.is_some());
        }
    }
    assert!(found_any > problems() / 10, "{found_any}");
}
