//! Invented catalogs of any size, physically coherent and the same for the same seed.
//!
//! Every catalog has its own stream of random numbers and every row follows from the rows above it alone: a longer
//! catalog of the same seed begins with the rows of the shorter one.

mod capacitors;
mod chance;
mod diodes;
mod inductors;
mod packages;
mod preferred;
mod sheet;
mod switches;

use chance::Chance;
use sheet::Row;

/// How many parts each catalog holds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Counts {
    /// Rows of `switches.csv`.
    pub switches: usize,
    /// Rows of `diodes.csv`.
    pub diodes: usize,
    /// Rows of `inductors.csv`.
    pub inductors: usize,
    /// Rows of `capacitors.csv`.
    pub capacitors: usize,
}

/// File name and text of the four catalogs.
pub fn catalogs(seed: u64, counts: Counts) -> [(&'static str, String); 4] {
    let catalog = |stream: u64, rows: usize, row: fn(&mut Chance, usize) -> Row| {
        let mut chance = Chance::new(seed, stream);
        sheet::text((0..rows).map(|index| row(&mut chance, index)))
    };
    [
        ("switches.csv", catalog(0, counts.switches, switches::row)),
        ("diodes.csv", catalog(1, counts.diodes, diodes::row)),
        ("inductors.csv", catalog(2, counts.inductors, inductors::row)),
        ("capacitors.csv", catalog(3, counts.capacitors, capacitors::row)),
    ]
}
