//! The answer does not depend on the order of rows, on parts that are not in it, or on the number of threads.

use wattsieve::account::account;
use wattsieve::part::Parts;
use wattsieve::search::pruned::pruned;
use wattsieve::search::{Distinct, Found, Request};
use wattsieve::stage::NamedStage;

use crate::draw::Chance;
use crate::problem::Problem;

const DISTINCT: [Distinct; 3] = [Distinct::Triple, Distinct::Stage, Distinct::Switches];

fn request<'a>(problem: &'a Problem, parts: &'a Parts, seed: u64) -> Request<'a> {
    Request { distinct: DISTINCT[(seed % 3) as usize], threads: 1, ..Request::new(&problem.rail, parts, 5) }
}

/// The listed stages by name, with the bits of their burdens.
fn named(found: &Found, parts: &Parts) -> Vec<(NamedStage, u64)> {
    found.ranked.iter().map(|ranked| (ranked.stage.named(parts), ranked.burden.to_bits())).collect()
}

#[test]
fn rows_in_another_order_give_the_same_answer() {
    let mut answered = 0;
    for seed in 8_000..8_150 {
        let problem = Problem::new(seed);
        let expected = named(&pruned(&request(&problem, &problem.parts, seed)), &problem.parts);
        let mut chance = Chance::new(seed);
        let mut parts = problem.parts.clone();
        chance.shuffle(&mut parts.switches);
        chance.shuffle(&mut parts.diodes);
        chance.shuffle(&mut parts.inductors);
        chance.shuffle(&mut parts.capacitors);
        let found = named(&pruned(&request(&problem, &parts, seed)), &parts);
        assert_eq!(found, expected, "seed {seed}");
        answered += u32::from(!expected.is_empty());
    }
    assert!(answered > 30, "only {answered} have an answer");
}

#[test]
fn a_part_that_is_not_listed_can_go() {
    let mut gone = 0;
    for seed in 8_200..8_300 {
        let problem = Problem::new(seed);
        let parts = &problem.parts;
        let expected = named(&pruned(&request(&problem, parts, seed)), parts);
        if expected.is_empty() {
            continue;
        }
        let listed: Vec<&str> = expected
            .iter()
            .flat_map(|(stage, _)| {
                [
                    &stage.high_switch.part,
                    &stage.rectifier.part,
                    &stage.inductor.part,
                    &stage.input_bank.part,
                    &stage.output_bank.part,
                ]
            })
            .map(String::as_str)
            .collect();
        let unlisted = |part: &str| !listed.contains(&part);
        let mut fewer: Vec<Parts> = Vec::new();
        for k in 0..parts.switches.len() {
            if unlisted(&parts.switches[k].identity.part) {
                fewer.push(parts.clone());
                fewer.last_mut().expect("just pushed").switches.remove(k);
            }
        }
        for k in 0..parts.diodes.len() {
            if unlisted(&parts.diodes[k].identity.part) {
                fewer.push(parts.clone());
                fewer.last_mut().expect("just pushed").diodes.remove(k);
            }
        }
        for k in 0..parts.inductors.len() {
            if unlisted(&parts.inductors[k].identity.part) {
                fewer.push(parts.clone());
                fewer.last_mut().expect("just pushed").inductors.remove(k);
            }
        }
        for k in 0..parts.capacitors.len() {
            if unlisted(&parts.capacitors[k].identity.part) {
                fewer.push(parts.clone());
                fewer.last_mut().expect("just pushed").capacitors.remove(k);
            }
        }
        for parts in fewer {
            gone += 1;
            assert_eq!(named(&pruned(&request(&problem, &parts, seed)), &parts), expected, "seed {seed}");
        }
    }
    assert!(gone > 100, "only {gone} parts gone");
}

#[test]
fn any_number_of_threads_gives_the_same_answer() {
    for seed in 8_400..8_460 {
        let problem = Problem::new(seed);
        let [one, two, seven] = [1, 2, 7].map(|threads| {
            let found = pruned(&Request { threads, ..request(&problem, &problem.parts, seed) });
            (named(&found, &problem.parts), found.crossed, found.dropped)
        });
        assert_eq!(one, two, "seed {seed}");
        assert_eq!(one, seven, "seed {seed}");
    }
}

#[test]
fn the_account_of_a_listed_stage_has_the_bits_of_the_search() {
    let mut listed = 0;
    for seed in 8_500..8_650 {
        let problem = Problem::new(seed);
        for ranked in pruned(&request(&problem, &problem.parts, seed)).ranked {
            listed += 1;
            let account = account(&problem.rail, &problem.parts, &ranked.stage);
            assert!(account.passes(), "seed {seed}");
            assert_eq!(account.burden.map(f64::to_bits), Some(ranked.burden.to_bits()), "seed {seed}");
            assert_eq!(
                account.weighted_loss_w.map(f64::to_bits),
                Some(ranked.weighted_loss_w.to_bits()),
                "seed {seed}"
            );
        }
    }
    assert!(listed > 100, "only {listed} stages listed");
}
