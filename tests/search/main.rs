//! The pruned search against the exhaustive one, on random small problems.

mod problem;

use problem::Problem;
use wattsieve::search::exhaustive::exhaustive;
use wattsieve::search::pruned::pruned;
use wattsieve::search::{Distinct, Request};

/// How many problems; the environment variable `WATTSIEVE_PROBLEMS` sets another number for a longer run.
fn problems() -> u64 {
    let usual = if cfg!(debug_assertions) { 300 } else { 20_000 };
    std::env::var("WATTSIEVE_PROBLEMS").ok().and_then(|text| text.parse().ok()).unwrap_or(usual)
}

#[test]
fn pruned_equals_exhaustive_bit_for_bit() {
    let mut passing = 0;
    for seed in 0..problems() {
        let Problem { rail, parts } = Problem::new(seed);
        let distinct = [Distinct::Triple, Distinct::Stage, Distinct::Switches][(seed % 3) as usize];
        let top = [1, 3, 10][(seed / 3 % 3) as usize];
        let threads = [1, 2, 7][(seed / 9 % 3) as usize];
        let request = Request { rail: &rail, parts: &parts, top, distinct, threads, tolerated: None };
        let expected = exhaustive(&request);
        let found = pruned(&request);
        assert_eq!(found.ranked, expected.ranked, "seed {seed}");
        for (a, b) in found.ranked.iter().zip(&expected.ranked) {
            assert_eq!(a.burden.to_bits(), b.burden.to_bits(), "seed {seed}");
        }
        assert_eq!(found.crossed, expected.crossed, "seed {seed}");
        passing += u64::from(!found.ranked.is_empty());
    }
    assert!(passing * 5 > problems(), "too few problems have an answer: {passing}");
    eprintln!("{passing} of {} problems have an answer", problems());
}
