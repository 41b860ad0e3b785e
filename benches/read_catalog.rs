//! Reads catalogs of a million rows, and compares with plain passes of the csv crate over the same bytes.
//!
//! `cargo bench --bench read_catalog` prints the speed of each, their ratios, and the memory at its peak.

use std::error::Error;
use std::fs::{self, File};
use std::io::{self, BufWriter, Write as _};
use std::path::Path;
use std::time::Instant;

use wattsieve::catalog::{FromRow, for_each_part};
use wattsieve::demo;
use wattsieve::part::{Capacitor, Diode, Inductor, Switch};

const ROWS: usize = 1_000_000;
const RUNS: usize = 3;

fn main() -> Result<(), Box<dyn Error>> {
    let folder = tempfile::tempdir()?;
    for (name, text) in demo::CATALOGS {
        let path = folder.path().join(name);
        write_catalog(&path, text)?;
        let megabytes = fs::metadata(&path)?.len() as f64 / 1e6;
        let reused = megabytes / fastest(|| csv_pass_reusing(&path))?;
        let plain = megabytes / fastest(|| csv_pass(&path))?;
        let parts = megabytes
            / fastest(|| match name {
                "switches.csv" => parts_pass::<Switch>(&path),
                "diodes.csv" => parts_pass::<Diode>(&path),
                "inductors.csv" => parts_pass::<Inductor>(&path),
                _ => parts_pass::<Capacitor>(&path),
            })?;
        println!("{name}: {megabytes:.0} MB, {ROWS} rows, peak memory {:.0} MB", peak_megabytes()?);
        println!("  csv crate, records():     {plain:.0} MB/s; parts at {:.2} of it", parts / plain);
        println!("  csv crate, one record:    {reused:.0} MB/s; parts at {:.2} of it", parts / reused);
        println!("  parts:                    {parts:.0} MB/s");
        fs::remove_file(&path)?;
    }
    Ok(())
}

/// The rows of `text` over and over, each under a name of its own.
fn write_catalog(path: &Path, text: &str) -> io::Result<()> {
    let mut file = BufWriter::new(File::create(path)?);
    let (header, rows) = text.split_once('\n').unwrap_or((text, ""));
    writeln!(file, "{header}")?;
    for (number, row) in rows.lines().cycle().take(ROWS).enumerate() {
        writeln!(file, "{number}-{row}")?;
    }
    file.flush()
}

/// Seconds of the fastest of several runs.
fn fastest(run: impl Fn() -> Result<usize, Box<dyn Error>>) -> Result<f64, Box<dyn Error>> {
    let mut best = f64::INFINITY;
    for _ in 0..RUNS {
        let start = Instant::now();
        let rows = run()?;
        best = best.min(start.elapsed().as_secs_f64());
        if rows != ROWS {
            return Err(format!("{rows} rows instead of {ROWS}").into());
        }
    }
    Ok(best)
}

/// The pass that the csv crate's guide begins with: a record of its own for each row.
fn csv_pass(path: &Path) -> Result<usize, Box<dyn Error>> {
    let mut rows = 0;
    for record in csv::Reader::from_path(path)?.records() {
        rows += usize::from(!record?.is_empty());
    }
    Ok(rows)
}

/// The fastest pass that the csv crate makes over text: one record for all rows.
fn csv_pass_reusing(path: &Path) -> Result<usize, Box<dyn Error>> {
    let mut reader = csv::Reader::from_path(path)?;
    let mut record = csv::StringRecord::new();
    let mut rows = 0;
    while reader.read_record(&mut record)? {
        rows += 1;
    }
    Ok(rows)
}

fn parts_pass<P: FromRow>(path: &Path) -> Result<usize, Box<dyn Error>> {
    let mut rows = 0;
    let outcome = for_each_part::<P>("catalog", File::open(path)?, |_, _| rows += 1);
    if outcome.bad_rows > 0 || outcome.file_faults.has_errors() {
        return Err(outcome.row_faults.render(false).into());
    }
    Ok(rows)
}

/// The most memory that this process has held, as the system counts it.
fn peak_megabytes() -> Result<f64, Box<dyn Error>> {
    let status = fs::read_to_string("/proc/self/status")?;
    let line = status.lines().find(|line| line.starts_with("VmHWM")).ok_or("no VmHWM")?;
    let kilobytes: f64 = line.split_whitespace().nth(1).ok_or("no number")?.parse()?;
    Ok(kilobytes / 1024.0)
}
