//! The demo is what its README says, and its ranking is worth looking at.

use std::collections::BTreeSet;

use wattsieve::answer::shortlist::{Options, Shortlist, shortlist};
use wattsieve::catalog::{ReadOptions, read_texts};
use wattsieve::demo::{CATALOGS, RAIL_NAME, RAIL_TEXT, RAILS};
use wattsieve::part::Parts;
use wattsieve::rail::{Rail, read};
use wattsieve::search::Distinct;
use wattsieve::stage::RectifierKind;

#[path = "../benches/generate/mod.rs"]
mod generate;

/// As in the command of `catalogs/README.md`.
const SEED: u64 = 21;
const COUNTS: generate::Counts = generate::Counts { switches: 60, diodes: 30, inductors: 60, capacitors: 60 };

fn rail(file: &str, text: &str) -> Rail {
    match read(file, text) {
        Ok(reading) => reading.rail,
        Err(faults) => panic!("{}", faults.render(false)),
    }
}

fn parts() -> Parts {
    let read = read_texts(CATALOGS.map(|(file, text)| (file, text.as_bytes())), ReadOptions::default());
    assert!(read.faults.is_empty(), "{}", read.faults.render(false));
    read.parts
}

/// The first fifty triples.
fn fifty(rail: &Rail, parts: &Parts) -> Shortlist {
    shortlist(rail, parts, &Options { top: 50, distinct: Distinct::Triple, threads: 0, progress: None })
}

#[test]
fn the_catalogs_come_from_the_generator() {
    for ((file, committed), (generated_file, generated)) in CATALOGS.into_iter().zip(generate::catalogs(SEED, COUNTS)) {
        assert_eq!(file, generated_file);
        assert_eq!(committed, generated, "{file}");
    }
}

#[test]
fn the_readme_gives_the_command_that_makes_them() {
    let generate::Counts { switches, diodes, inductors, capacitors } = COUNTS;
    let command = format!(
        "--seed {SEED} --switches {switches} --diodes {diodes} --inductors {inductors} --capacitors {capacitors}"
    );
    assert!(include_str!("../catalogs/README.md").contains(&command), "{command}");
}

#[test]
fn there_are_parts_enough() {
    let parts = parts();
    assert!(parts.switches.len() >= 24);
    assert!(parts.diodes.len() >= 12);
    assert!(parts.inductors.len() >= 24);
    assert!(parts.capacitors.len() >= 24);
}

#[test]
fn something_passes_on_every_rail() {
    let parts = parts();
    for (file, text) in RAILS {
        assert_eq!(fifty(&rail(file, text), &parts).picks.len(), 50, "{file}");
    }
}

#[test]
fn both_kinds_of_rectifier_and_several_parts_are_near_the_top() {
    let picks = fifty(&rail(RAIL_NAME, RAIL_TEXT), &parts()).picks;
    for kind in [RectifierKind::Switch, RectifierKind::Diode] {
        let stages = picks.iter().filter(|pick| pick.stage.rectifier.kind == kind).count();
        assert!(stages >= 3, "{} rectifiers in {stages} triples", kind.name());
    }
    let high_switches: BTreeSet<&str> = picks.iter().map(|pick| pick.stage.high_switch.part.as_str()).collect();
    let inductors: BTreeSet<&str> = picks.iter().map(|pick| pick.stage.inductor.part.as_str()).collect();
    assert!(high_switches.len() >= 5 && inductors.len() >= 3, "{high_switches:?} {inductors:?}");
}

#[test]
fn four_limits_drop_parts_before_crossing() {
    let dropped = fifty(&rail(RAIL_NAME, RAIL_TEXT), &parts()).dropped;
    let limits: BTreeSet<&str> = dropped.iter().map(|row| row.limit.name()).collect();
    assert!(limits.len() >= 4, "{limits:?}");
}

#[test]
fn the_tightest_limit_is_not_always_the_same() {
    let picks = fifty(&rail(RAIL_NAME, RAIL_TEXT), &parts()).picks;
    let tightest: BTreeSet<&str> = picks.iter().filter_map(|pick| Some(pick.tightest?.limit.name())).collect();
    assert!(tightest.len() >= 3, "{tightest:?}");
}

#[test]
fn the_least_on_resistance_is_not_the_best_high_switch() {
    let (rail, parts) = (rail(RAIL_NAME, RAIL_TEXT), parts());
    let list = fifty(&rail, &parts);
    let best = &list.picks[0].stage.high_switch.part;
    let on_resistance_ohm = |part: &str| {
        let switch = parts.switches.iter().find(|switch| switch.identity.part == part).expect("a listed switch");
        switch.on_resistance_ohm.reciprocal_held(rail.drive.voltage_v.get())
    };
    let least = |names: &mut dyn Iterator<Item = &'_ str>| {
        names.map(str::to_owned).min_by(|a, b| on_resistance_ohm(a).total_cmp(&on_resistance_ohm(b)))
    };
    let of_all = least(&mut parts.switches.iter().map(|switch| switch.identity.part.as_str()));
    let of_listed = least(&mut list.picks.iter().map(|pick| pick.stage.high_switch.part.as_str()));
    assert_ne!(Some(best), of_all.as_ref());
    assert_ne!(Some(best), of_listed.as_ref());
}
