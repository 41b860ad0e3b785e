//! The search beside what a user would write instead: a numpy script that ranks triples of the same catalogs by a plain formula
//! (no heat, no limits, no banks, one load, one input).
//!
//! `WATTSIEVE_PYTHON=venv/bin/python cargo bench --bench search -- a b c d e` prints a Markdown table for each letter; all of
//! them without a letter. The program is run as a user runs it: catalogs read, shortlist printed. Processor time stands beside
//! the wall clock, because it does not count what else the machine did meanwhile.

use std::error::Error;
use std::fs::{self, File};
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use std::time::Instant;

use serde_json::Value;
use tempfile::TempDir;

#[path = "generate/mod.rs"]
mod generate;
mod process;
mod rounds;

use generate::Counts;
use process::{Run, run};
use rounds::{Median, python};

type Outcome = Result<(), Box<dyn Error>>;

const RAIL: &str = include_str!("rails/bus.toml");
const FULL: Counts = Counts { switches: 500, diodes: 200, inductors: 800, capacitors: 400 };
const HUGE: Counts = Counts { switches: 20_000, diodes: 5_000, inductors: 20_000, capacitors: 20_000 };
const ROUNDS: usize = 3;
const COLD_STARTS: usize = 51;

/// What (b) asks of (a)'s catalogs: a name, and what is replaced in the rail.
const TIGHT: [(&str, &[(&str, &str)]); 6] = [
    ("tight area", &[("area = \"600 mm²\"", "area = \"90 mm²\"")]),
    ("tight cost", &[("height = \"6 mm\"", "height = \"6 mm\"\ncost = 0.80")]),
    ("tight junction", &[("height = \"6 mm\"", "height = \"6 mm\"\njunction_margin = \"65 K\"")]),
    ("tight ripple", &[("ripple = \"20 mV\"", "ripple = \"3 mV\"")]),
    ("worth on loss alone", &[("area = 0.003", "area = 0"), ("cost = 0.5", "cost = 0")]),
    ("nothing passes", &[("height = \"6 mm\"", "height = \"6 mm\"\ncost = 0.20")]),
];

fn main() -> Outcome {
    let letters: Vec<String> = std::env::args().skip(1).filter(|word| word.len() == 1).collect();
    let wanted = |letter: &str| letters.is_empty() || letters.iter().any(|one| one == letter);
    let full = Ground::new(FULL)?;
    let mut peer = Median::default();
    if ["a", "b", "c"].into_iter().any(wanted) {
        for _ in 0..ROUNDS {
            peer.add(full.peer()?.wall_s);
        }
        println!("peer, numpy, 2 400 000 000 triples of (a)'s catalogs: {peer} s\n");
    }
    if wanted("a") {
        full_size(&full, &mut peer)?;
    }
    if wanted("b") {
        tight(&full, &mut peer)?;
    }
    if wanted("c") {
        huge(&peer)?;
    }
    if wanted("d") {
        cold_start()?;
    }
    if wanted("e") {
        growth()?;
    }
    Ok(())
}

/// A folder with catalogs.
struct Ground(TempDir);

impl Ground {
    fn new(counts: Counts) -> Result<Self, Box<dyn Error>> {
        let folder = tempfile::tempdir()?;
        for (name, text) in generate::catalogs(1, counts) {
            fs::write(folder.path().join(name), text)?;
        }
        Ok(Self(folder))
    }

    fn path(&self, name: &str) -> PathBuf {
        self.0.path().join(name)
    }

    /// One run on a rail; what it took and the number of full evaluations.
    fn shortlist(&self, rail: &str, threads: &str) -> Result<(Run, u64), Box<dyn Error>> {
        fs::write(self.path("rail.toml"), rail)?;
        let list = self.path("list.json");
        let mut command = Command::new(env!("CARGO_BIN_EXE_wattsieve"));
        command.arg("shortlist").arg(self.path("rail.toml"));
        command.args(["--quiet", "--format", "json", "--threads", threads]).stdout(File::create(&list)?);
        let run = run(&mut command)?;
        let list: Value = serde_json::from_str(&fs::read_to_string(list)?)?;
        if list["proven"] != true {
            return Err("the list is not proven".into());
        }
        Ok((run, list["evaluated"].as_u64().unwrap_or(0)))
    }

    fn peer(&self) -> Result<Run, Box<dyn Error>> {
        let script = Path::new(env!("CARGO_MANIFEST_DIR")).join("benches/peers/peers.py");
        let mut command = Command::new(python());
        command.arg(script).arg("numpy").arg(self.0.path()).stdout(Stdio::null());
        let run = run(&mut command)?;
        if !run.well {
            return Err("the peer needs Python with numpy: set WATTSIEVE_PYTHON to one that has it".into());
        }
        Ok(run)
    }
}

/// Medians of one problem.
#[derive(Default)]
struct Figures {
    wall_s: Median,
    processor_s: Median,
    peak_mb: Median,
    evaluated: u64,
}

impl Figures {
    fn add(&mut self, (run, evaluated): (Run, u64)) {
        self.wall_s.add(run.wall_s);
        self.processor_s.add(run.processor_s);
        self.peak_mb.add(run.peak_mb);
        self.evaluated = evaluated;
    }

    fn row(&self, name: &str, peer: &Median) {
        let (wall, processor, peak) = (&self.wall_s, &self.processor_s, self.peak_mb.value());
        let ratio = wall.value() / peer.value();
        println!("| {name} | {wall} | {processor} | {ratio:.3} | {} | {peak:.0} |", self.evaluated);
    }
}

fn table() {
    println!("| problem | wall, s | processor, s | wall / peer | full evaluations | peak, MB |");
    println!("|---|---|---|---|---|---|");
}

/// (a), with two threads and with one, turn by turn with the peer.
fn full_size(full: &Ground, peer: &mut Median) -> Outcome {
    let (mut two, mut one) = (Figures::default(), Figures::default());
    for _ in 0..ROUNDS {
        two.add(full.shortlist(RAIL, "2")?);
        one.add(full.shortlist(RAIL, "1")?);
        peer.add(full.peer()?.wall_s);
    }
    table();
    two.row("(a) two threads", peer);
    one.row("(a) one thread", peer);
    println!("\none thread over two: {:.2}\n", one.wall_s.value() / two.wall_s.value());
    Ok(())
}

fn tight(full: &Ground, peer: &mut Median) -> Outcome {
    let mut figures: Vec<Figures> = TIGHT.iter().map(|_| Figures::default()).collect();
    for _ in 0..ROUNDS {
        for (figures, (_, changes)) in figures.iter_mut().zip(TIGHT) {
            figures.add(full.shortlist(&changed(changes)?, "2")?);
        }
        peer.add(full.peer()?.wall_s);
    }
    table();
    for (figures, (name, _)) in figures.iter().zip(TIGHT) {
        figures.row(&format!("(b) {name}"), peer);
    }
    println!();
    Ok(())
}

/// The rail with some of its lines replaced.
fn changed(changes: &[(&str, &str)]) -> Result<String, Box<dyn Error>> {
    let mut rail = RAIL.to_owned();
    for (old, new) in changes {
        if rail.matches(old).count() != 1 {
            return Err(format!("`{old}` does not stand once in the rail").into());
        }
        rail = rail.replace(old, new);
    }
    Ok(rail)
}

fn huge(peer: &Median) -> Outcome {
    let ground = Ground::new(HUGE)?;
    let mut figures = Figures::default();
    figures.add(ground.shortlist(RAIL, "2")?);
    table();
    figures.row("(c) 20 000 switches, 5 000 diodes, 20 000 inductors, 20 000 capacitors", peer);
    println!();
    Ok(())
}

/// (d): the demo, from the start of the process to its end.
fn cold_start() -> Outcome {
    let mut wall_ms = Median::default();
    for _ in 0..COLD_STARTS {
        let start = Instant::now();
        Command::new(env!("CARGO_BIN_EXE_wattsieve")).arg("shortlist").stdout(Stdio::null()).status()?;
        wall_ms.add(start.elapsed().as_secs_f64() * 1e3);
    }
    println!("(d) the demo, cold start to exit, {COLD_STARTS} runs: {wall_ms} ms\n");
    Ok(())
}

/// (e): all catalogs twice as long at each step.
fn growth() -> Outcome {
    println!(
        "| (e) switches, diodes, inductors, capacitors | wall, s | processor, s | times the last | full evaluations |"
    );
    println!("|---|---|---|---|---|");
    let mut last = f64::NAN;
    for shift in (0..5).rev() {
        let counts = Counts {
            switches: FULL.switches >> shift,
            diodes: FULL.diodes >> shift,
            inductors: FULL.inductors >> shift,
            capacitors: FULL.capacitors >> shift,
        };
        let ground = Ground::new(counts)?;
        let mut figures = Figures::default();
        for _ in 0..ROUNDS {
            figures.add(ground.shortlist(RAIL, "2")?);
        }
        let Counts { switches, diodes, inductors, capacitors } = counts;
        let (wall, processor) = (&figures.wall_s, &figures.processor_s);
        let times = processor.value() / last;
        println!(
            "| {switches}, {diodes}, {inductors}, {capacitors} | {wall} | {processor} | {times:.1} | {} |",
            figures.evaluated
        );
        last = processor.value();
    }
    println!();
    Ok(())
}
