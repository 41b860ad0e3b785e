//! The demo is what its README says.

use wattsieve::demo::{CATALOGS, RAILS};
use wattsieve::rail::read;

#[path = "../benches/generate/mod.rs"]
mod generate;

/// As in the command of `catalogs/README.md`.
const SEED: u64 = 4;
const COUNTS: generate::Counts = generate::Counts { switches: 24, diodes: 12, inductors: 24, capacitors: 24 };

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
fn every_rail_reads_without_a_fault() {
    for (file, text) in RAILS {
        match read(file, text) {
            Ok(reading) => assert!(reading.rail.range.switch_rectifier && reading.rail.range.diode_rectifier, "{file}"),
            Err(faults) => panic!("{}", faults.render(false)),
        }
    }
}
