//! Full evaluations of the model a second, beside a plain reading of the same model in Python on one thread.
//!
//! `cargo bench --bench evaluations`. An evaluation is an account: parts fitted to the rail, three inputs, one load, every limit
//! at every corner with the worst parts and the tolerances, nothing refused early and nothing kept for the next one. Both take
//! the same stages, spread over the whole crossing, and their losses must agree.

use std::error::Error;
use std::fs;
use std::path::Path;
use std::process::Command;
use std::time::Instant;

use rayon::ThreadPoolBuilder;
use rayon::iter::{IntoParallelIterator, ParallelIterator};
use wattsieve::account::account;
use wattsieve::catalog::{ReadOptions, read_texts};
use wattsieve::part::Parts;
use wattsieve::rail::{self, Rail};
use wattsieve::stage::{Choice, RectifierKind, Stage};

#[path = "generate/mod.rs"]
mod generate;
mod rounds;

use rounds::{Median, python};

const ROUNDS: usize = 5;
/// Evaluations of each round: about a second for either side.
const OURS: usize = 100_000;
const PLAIN: usize = 1_000;
const THREADS: usize = 2;
/// Stages in both runs whose losses are compared.
const AGREEMENT: f64 = 1e-9;

const RAIL: &str = include_str!("rails/one_load.toml");
const COUNTS: generate::Counts = generate::Counts { switches: 60, diodes: 30, inductors: 60, capacitors: 60 };

fn main() -> Result<(), Box<dyn Error>> {
    let rail = rail::read("one_load.toml", RAIL).map_err(|faults| faults.render(false))?.rail;
    let texts = generate::catalogs(1, COUNTS);
    let read = read_texts(texts.iter().map(|(name, text)| (*name, text.as_bytes())), ReadOptions::default());
    let crossing = Crossing::new(&rail, &read.parts);

    let folder = tempfile::tempdir()?;
    for (name, text) in &texts {
        fs::write(folder.path().join(name), text)?;
    }
    let rail_path = folder.path().join("rail.toml");
    fs::write(&rail_path, RAIL)?;

    let (one, two) =
        (ThreadPoolBuilder::new().num_threads(1).build()?, ThreadPoolBuilder::new().num_threads(THREADS).build()?);
    let (mut plain, mut ours_one, mut ours_two) = (Median::default(), Median::default(), Median::default());
    for _ in 0..ROUNDS {
        let run = plain_run(&rail_path, folder.path())?;
        plain.add(PLAIN as f64 / run.seconds);
        let same = crossing.losses(PLAIN);
        if same.0 != run.known || (same.1 - run.loss_w).abs() > AGREEMENT * run.loss_w {
            return Err(format!("the two disagree: {same:?}, and {} with {} W", run.known, run.loss_w).into());
        }
        ours_one.add(one.install(|| crossing.rate()));
        ours_two.add(two.install(|| crossing.rate()));
    }
    println!("full evaluations a second, median of {ROUNDS} rounds (least to most)");
    println!("  plain reading, Python, one thread: {plain}");
    println!("  accounts, one thread:              {ours_one}");
    println!("  accounts, {THREADS} threads:               {ours_two}");
    println!("  ratio, {THREADS} threads:                  {:.0}", ours_two.value() / plain.value());
    Ok(())
}

/// Every stage of a rail and its catalogs, by number.
struct Crossing<'a> {
    rail: &'a Rail,
    parts: &'a Parts,
    high: Vec<Choice>,
    rectifiers: Vec<(RectifierKind, Choice)>,
    inputs: Vec<Choice>,
    outputs: Vec<Choice>,
}

impl<'a> Crossing<'a> {
    fn new(rail: &'a Rail, parts: &'a Parts) -> Self {
        let parallel = &rail.range.parallel;
        let choices = |parts: usize, most: u32| -> Vec<Choice> {
            (0..parts).flat_map(|index| (1..=most).map(move |count| Choice { index, count })).collect()
        };
        let mut rectifiers = Vec::new();
        for (kind, parts) in [(RectifierKind::Switch, parts.switches.len()), (RectifierKind::Diode, parts.diodes.len())]
        {
            rectifiers.extend(choices(parts, parallel.rectifier).into_iter().map(|choice| (kind, choice)));
        }
        Self {
            rail,
            parts,
            high: choices(parts.switches.len(), parallel.high_switch),
            rectifiers,
            inputs: choices(parts.capacitors.len(), parallel.input),
            outputs: choices(parts.capacitors.len(), parallel.output),
        }
    }

    /// A stage of a sequence that wanders over the whole crossing; the plain reading takes the same one.
    fn stage(&self, number: usize) -> Stage {
        let frequencies_hz = &self.rail.range.frequencies_hz;
        let sizes = [
            frequencies_hz.len(),
            self.high.len(),
            self.rectifiers.len(),
            self.parts.inductors.len(),
            self.inputs.len(),
            self.outputs.len(),
        ];
        let all: u128 = sizes.iter().map(|size| *size as u128).product();
        let mut left = (number as u128 * 2_654_435_761) % all;
        let mut place = [0_usize; 6];
        for (place, size) in place.iter_mut().zip(sizes).rev() {
            *place = (left % size as u128) as usize;
            left /= size as u128;
        }
        let (rectifier_kind, rectifier) = self.rectifiers[place[2]];
        Stage {
            frequency_hz: frequencies_hz[place[0]].get(),
            high_switch: self.high[place[1]],
            rectifier_kind,
            rectifier,
            inductor: place[3],
            input_bank: self.inputs[place[4]],
            output_bank: self.outputs[place[5]],
        }
    }

    fn loss_w(&self, number: usize) -> Option<f64> {
        account(self.rail, self.parts, &self.stage(number)).weighted_loss_w
    }

    /// How many of the first stages have a weighted loss, and the sum of these, W.
    fn losses(&self, count: usize) -> (usize, f64) {
        let known: Vec<f64> = (0..count).filter_map(|number| self.loss_w(number)).collect();
        (known.len(), known.iter().sum())
    }

    /// Evaluations a second on the threads of the pool around it.
    fn rate(&self) -> f64 {
        let start = Instant::now();
        let known = (0..OURS).into_par_iter().filter(|number| self.loss_w(*number).is_some()).count();
        let seconds = start.elapsed().as_secs_f64();
        std::hint::black_box(known);
        OURS as f64 / seconds
    }
}

struct PlainRun {
    seconds: f64,
    known: usize,
    loss_w: f64,
}

fn plain_run(rail: &Path, catalogs: &Path) -> Result<PlainRun, Box<dyn Error>> {
    let script = Path::new(env!("CARGO_MANIFEST_DIR")).join("benches/plain_reading/plain_model.py");
    let output =
        Command::new(python()).arg(script).arg("bench").arg(rail).arg(catalogs).arg(PLAIN.to_string()).output()?;
    let text = String::from_utf8(output.stdout)?;
    let words: Vec<&str> = text.split_whitespace().collect();
    let [_, seconds, known, loss_w] = words[..] else {
        return Err(String::from_utf8_lossy(&output.stderr).into_owned().into());
    };
    Ok(PlainRun { seconds: seconds.parse()?, known: known.parse()?, loss_w: loss_w.parse()? })
}
