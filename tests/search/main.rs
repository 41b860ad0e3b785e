//! The pruned search against the exhaustive one, on random small problems.

mod fate;
mod forced;
mod problem;

use problem::Problem;
use wattsieve::limit::LimitName;
use wattsieve::search::exhaustive::{every_stage, exhaustive};
use wattsieve::search::pruned::pruned;
use wattsieve::search::relax::relaxed;
use wattsieve::search::{Distinct, Ranked, Request, Tolerance};

/// How many problems; the environment variable `WATTSIEVE_PROBLEMS` sets another number for a longer run.
fn problems() -> u64 {
    let usual = if cfg!(debug_assertions) { 300 } else { 20_000 };
    std::env::var("WATTSIEVE_PROBLEMS").ok().and_then(|text| text.parse().ok()).unwrap_or(usual)
}

/// Problems beyond the usual range that a bound once got wrong: a low output behind a diode whose drop falls steeply with heat.
const HARD: [u64; 1] = [24_261];

#[test]
fn pruned_equals_exhaustive_bit_for_bit() {
    let mut passing = 0;
    for seed in (0..problems()).chain(HARD) {
        let Problem { rail, parts } = Problem::new(seed);
        let distinct = [Distinct::Triple, Distinct::Stage, Distinct::Switches][(seed % 3) as usize];
        let top = [1, 3, 10][(seed / 3 % 3) as usize];
        let threads = [1, 2, 7][(seed / 9 % 3) as usize];
        let request = Request { distinct, threads, ..Request::new(&rail, &parts, top) };
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

/// The least excess over a limit, by looking at every stage.
fn least_excess(request: &Request, limit: LimitName) -> Option<f64> {
    let mut least: Option<f64> = None;
    let any = Request { tolerated: Some(Tolerance::any(limit)), ..*request };
    every_stage(&any, &mut |ranked| least = Some(least.map_or(ranked.excess, |found| found.min(ranked.excess))));
    least
}

/// The best stage whose excess is at most this.
fn best_within(request: &Request, limit: LimitName, excess: f64) -> Option<Ranked> {
    let tolerated = Some(Tolerance { limit, excess: excess * (1.0 + 1e-9) + 1e-9 });
    exhaustive(&Request { tolerated, top: 1, ..*request }).ranked.first().copied()
}

#[test]
fn each_limit_alone_gives_by_the_least_that_anything_needs() {
    let mut helped = 0;
    for seed in 0..problems() / 10 {
        let Problem { rail, parts } = Problem::new(1_000_000 + seed);
        let request = Request { threads: [1, 2, 7][(seed % 3) as usize], ..Request::new(&rail, &parts, 1) };
        for limit in LimitName::ALL.into_iter().filter(|limit| limit.can_give()) {
            let found = relaxed(&request, limit);
            let least = least_excess(&request, limit);
            assert_eq!(found.is_some(), least.is_some(), "seed {seed} {limit:?}");
            if let (Some(found), Some(least)) = (found, least) {
                assert!(
                    (found.excess - least).abs() <= 3e-9 * (1.0 + least),
                    "seed {seed} {limit:?} {found:?} {least}"
                );
                assert_eq!(Some(found), best_within(&request, limit, least), "seed {seed} {limit:?}");
                helped += u64::from(least > 0.0);
            }
        }
    }
    assert!(helped * 60 > problems(), "too few limits help: {helped}");
    eprintln!("{helped} limits help");
}
