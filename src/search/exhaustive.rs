//! Tries every stage: the reference that any other search must equal.

use rayon::iter::{IntoParallelRefIterator, ParallelIterator};

use super::field::{AtFrequency, Candidate, Field};
use super::leaders::Leaders;
use super::order::Ranked;
use super::request::{Found, Request};
use super::trial::{BankTrial, CoreTrial, Place, Rectifier, Trio};
use crate::limit::core::PointSolution;
use crate::part::SwitchBank;

/// The best stages, by trying all that are left when the parts that break a limit of their own are gone. Banks do not act on
/// the core, so a core is solved once for all of its banks.
pub fn exhaustive(request: &Request) -> Found {
    let field = Field::new(request);
    let frequencies = frequencies(request, &field);
    let tasks: Vec<Task> = frequencies.iter().flat_map(|at| tasks(&field, at)).collect();
    let empty = || Leaders::new(request.parts, request.distinct, request.top);
    let run = || {
        tasks
            .par_iter()
            .map(|task| {
                let mut leaders = empty();
                let evaluated = each_stage(request, &field, task, &mut |ranked| leaders.offer(ranked));
                (leaders, evaluated)
            })
            .reduce(|| (empty(), 0), |(a, m), (b, n)| (a.merge(b), m + n))
    };
    // Without a pool of its own the work runs on the one every program has: the answer is the same.
    let (leaders, evaluated) = match rayon::ThreadPoolBuilder::new().num_threads(request.threads).build() {
        Ok(pool) => pool.install(run),
        Err(_) => run(),
    };
    Found {
        ranked: leaders.into_entries(),
        crossed: field.crossed,
        evaluated,
        proven: true,
        open_bound: None,
        dropped: field.dropped.clone(),
    }
}

/// Every stage that passes, but for what is tolerated, in no particular order.
pub fn every_stage(request: &Request, visit: &mut dyn FnMut(Ranked)) {
    let field = Field::new(request);
    for at in &frequencies(request, &field) {
        for task in tasks(&field, at) {
            each_stage(request, &field, &task, visit);
        }
    }
}

fn frequencies(request: &Request, field: &Field) -> Vec<AtFrequency> {
    request.rail.range.frequencies_hz.iter().map(|f| field.at_frequency(f.get())).collect()
}

/// One high switch with all rectifiers of one kind, at one frequency.
struct Task<'a> {
    at: &'a AtFrequency,
    high: &'a Candidate<SwitchBank>,
    rectifiers: Vec<Rectifier<'a>>,
}

fn tasks<'a>(field: &'a Field, at: &'a AtFrequency) -> Vec<Task<'a>> {
    let beside_switch = field.high_beside_switch.iter().map(|high| Task {
        at,
        high,
        rectifiers: field.switch_rectifiers.iter().map(Rectifier::Switch).collect(),
    });
    let beside_diode = field.high_beside_diode.iter().map(|high| Task {
        at,
        high,
        rectifiers: field.diode_rectifiers.iter().map(Rectifier::Diode).collect(),
    });
    beside_switch.chain(beside_diode).collect()
}

/// Visits the passing stages of a task; how many cores were solved.
fn each_stage(request: &Request, field: &Field, task: &Task, visit: &mut dyn FnMut(Ranked)) -> u64 {
    let mut evaluated = 0;
    let mut memory: Vec<PointSolution> = Vec::new();
    for &rectifier in &task.rectifiers {
        for choke in &task.at.chokes {
            evaluated += 1;
            let trio = Trio { high: task.high, rectifier, choke };
            memory = match CoreTrial::new(field, task.at, trio, request.tolerated, memory) {
                Err(memory) => memory,
                Ok(core) => {
                    with_banks(&core, task.at, visit);
                    core.into_solutions()
                }
            };
        }
    }
    evaluated
}

fn with_banks(core: &CoreTrial, at: &AtFrequency, visit: &mut dyn FnMut(Ranked)) {
    let inputs: Vec<BankTrial> = at.input_banks.iter().filter_map(|bank| core.bank(bank, Place::Input)).collect();
    if inputs.is_empty() {
        return;
    }
    let outputs: Vec<BankTrial> = at.output_banks.iter().filter_map(|bank| core.bank(bank, Place::Output)).collect();
    for input in &inputs {
        for output in &outputs {
            if let Some(ranked) = core.stage(input, output) {
                visit(ranked);
            }
        }
    }
}
