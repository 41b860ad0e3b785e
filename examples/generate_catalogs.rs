//! Writes four invented catalogs, the same for the same seed.
//!
//! `cargo run --release --example generate_catalogs -- --seed 1 --switches 500 --diodes 200 --inductors 800
//! --capacitors 400 --out DIR`

use std::fs;
use std::io;
use std::path::PathBuf;

use clap::Parser;

#[path = "../benches/generate/mod.rs"]
mod generate;

/// Writes four invented catalogs, the same for the same seed
#[derive(Parser)]
struct Arguments {
    /// Seed of the random numbers
    #[arg(long, default_value_t = 1)]
    seed: u64,
    /// Rows of switches.csv
    #[arg(long, default_value_t = 500)]
    switches: usize,
    /// Rows of diodes.csv
    #[arg(long, default_value_t = 200)]
    diodes: usize,
    /// Rows of inductors.csv
    #[arg(long, default_value_t = 800)]
    inductors: usize,
    /// Rows of capacitors.csv
    #[arg(long, default_value_t = 400)]
    capacitors: usize,
    /// Folder to write to; files of the same names are replaced
    #[arg(long)]
    out: PathBuf,
}

fn main() -> io::Result<()> {
    let wanted = Arguments::parse();
    let counts = generate::Counts {
        switches: wanted.switches,
        diodes: wanted.diodes,
        inductors: wanted.inductors,
        capacitors: wanted.capacitors,
    };
    fs::create_dir_all(&wanted.out)?;
    for (file, text) in generate::catalogs(wanted.seed, counts) {
        fs::write(wanted.out.join(file), text)?;
    }
    Ok(())
}
