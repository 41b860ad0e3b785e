//! Limits of one bank on a given core, at every point.

use std::ops::ControlFlow;

use super::core::PointSolution;
use super::{Check, LimitName, Receiver};
use crate::model::{Core, ripple, step};
use crate::part::{Bank, Slot};
use crate::rail::Rail;

/// Limits of an input bank at a point.
pub fn input(
    bank: &Bank,
    core: &Core,
    rail: &Rail,
    (input, load): (usize, usize),
    solution: &PointSolution,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<()> {
    let index = core.conditions.point(input, load);
    let Some(typical) = &solution.typical else { return ControlFlow::Continue(()) };
    let currents = &typical.currents;
    current(bank, Slot::InputBank, currents.input_bank_a2, index, receive)?;
    match rail.input.ripple_v {
        Some(bound) => {
            let ripple_v = ripple::input_v(currents, core.frequency_hz, bank, bank.least_f(input));
            receive(Check::upper(LimitName::InputRipple, Slot::InputBank, ripple_v, bound.get()).at(index))
        }
        None => ControlFlow::Continue(()),
    }
}

/// Limits of an output bank at a point, but for the load step.
pub fn output(
    bank: &Bank,
    core: &Core,
    rail: &Rail,
    (input, load): (usize, usize),
    solution: &PointSolution,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<()> {
    let index = core.conditions.point(input, load);
    if let Some(typical) = &solution.typical {
        current(bank, Slot::OutputBank, typical.currents.output_bank_a2, index, receive)?;
    }
    match (&solution.low_inductance, rail.output.ripple_v) {
        (Some(low), Some(bound)) => {
            let load_a = core.conditions.loads[load].current_a;
            let ripple_v = ripple::output_v(&low.currents, load_a, core.frequency_hz, bank, bank.least_f(input));
            receive(Check::upper(LimitName::OutputRipple, Slot::OutputBank, ripple_v, bound.get()).at(index))
        }
        _ => ControlFlow::Continue(()),
    }
}

/// The load step at full load, at every input: it depends on inductor and bank alone.
pub fn load_step(bank: &Bank, core: &Core, rail: &Rail, receive: &mut (impl Receiver + ?Sized)) -> ControlFlow<()> {
    let Some(jump) = &rail.output.step else { return ControlFlow::Continue(()) };
    let conditions = core.conditions;
    let load = conditions.full_load;
    for (input, &input_v) in conditions.inputs_v.iter().enumerate() {
        let deviation_v = step::deviation_v(
            input_v,
            conditions.output_v,
            core.choke.inductance_h[load] * (1.0 + core.choke.tolerance),
            bank.least_f(input),
            bank.esr_ohm,
            jump.current_a.get(),
            jump.crossover_hz.map(|hz| hz.get()),
        );
        let check = Check::upper(LimitName::LoadStep, Slot::OutputBank, deviation_v, jump.deviation_v.get());
        receive(check.at(conditions.point(input, load)))?;
    }
    ControlFlow::Continue(())
}

fn current(
    bank: &Bank,
    slot: Slot,
    current_a2: f64,
    index: usize,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<()> {
    let Some(rating_a) = bank.ripple_current_a else { return ControlFlow::Continue(()) };
    let each_a = current_a2.max(0.0).sqrt() / f64::from(bank.count);
    receive(Check::upper(LimitName::CapacitorCurrent, slot, each_a, rating_a).at(index))
}
