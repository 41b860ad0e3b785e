//! Limits of switches and inductor together, at every point.

use std::ops::ControlFlow;

use super::{Check, LimitName, Receiver};
use crate::model::{Conduction, Core, Operation, Outcome, RectifierBank, Variant, drive, solve};
use crate::part::{Slot, SwitchBank};
use crate::rail::Rail;

/// How badly diodes in parallel share their current (common practice, no source).
const DIODE_SHARING: f64 = 1.3;

/// The solutions that one point asks for; `None` where a variant has no numbers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PointSolution {
    /// Typical parts.
    pub typical: Option<Operation>,
    /// Inductance at the low end of its tolerance.
    pub low_inductance: Option<Operation>,
    /// Greatest resistances.
    pub worst: Option<Operation>,
}

impl PointSolution {
    /// Whether every variant runs.
    pub const fn is_whole(&self) -> bool {
        self.typical.is_some() && self.low_inductance.is_some() && self.worst.is_some()
    }
}

/// The limit of the core that is not of a point: what the gate supply must give.
pub fn supply(core: &Core, rail: &Rail, receive: &mut (impl Receiver + ?Sized)) -> ControlFlow<()> {
    let Some(limit) = rail.drive.supply_limit_a else { return ControlFlow::Continue(()) };
    let drawn_a = drive::supply_a(core.high, switch_rectifier(core), core.conditions.bias_a, core.frequency_hz);
    receive(Check::upper(LimitName::DriveCurrent, Slot::Drive, drawn_a, limit.get()))
}

/// Solves a point in its three variants and checks all that the core must keep there.
pub fn point(
    core: &Core,
    rail: &Rail,
    input: usize,
    load: usize,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<(), PointSolution> {
    let index = core.conditions.point(input, load);
    let typical = running(solve(core, input, load, Variant::TYPICAL), index, receive)?;
    if let Some(operation) = &typical {
        typical_checks(core, rail, input, load, operation, receive)?;
    }
    let low_inductance = running(solve(core, input, load, Variant::low_inductance(core.choke)), index, receive)?;
    if let Some(operation) = &low_inductance {
        peak_checks(core, rail, load, operation, index, receive)?;
    }
    let worst = running(solve(core, input, load, Variant::WORST), index, receive)?;
    if let Some(operation) = &worst {
        heat_checks(core, rail, operation, index, receive)?;
    }
    ControlFlow::Continue(PointSolution { typical, low_inductance, worst })
}

/// The operation of a running point; else the limit that it breaks is handed on.
fn running(
    outcome: Outcome,
    index: usize,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<(), Option<Operation>> {
    let check = match outcome {
        Outcome::Running(operation) => return ControlFlow::Continue(Some(operation)),
        Outcome::Dropout => Check::plain(LimitName::Dropout, Slot::Stage, false),
        Outcome::Runaway => Check::plain(LimitName::Runaway, Slot::Stage, false),
        Outcome::Underdriven(why) => Check::above(LimitName::GateVoltage, Slot::HighSwitch, why.gate_v, why.needed_v),
    };
    receive(check.at(index))?;
    ControlFlow::Continue(None)
}

fn typical_checks(
    core: &Core,
    rail: &Rail,
    input: usize,
    load: usize,
    operation: &Operation,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<()> {
    let index = core.conditions.point(input, load);
    let currents = &operation.currents;
    if let RectifierBank::Diode(bank) = core.rectifier {
        let sharing = if bank.count > 1 { DIODE_SHARING } else { 1.0 };
        let mean_a = currents.rectifier_mean_a / f64::from(bank.count) * sharing;
        let bound_a = rail.limits.current_derating.get() * bank.current_rating_a;
        receive(Check::upper(LimitName::RectifierCurrent, Slot::Rectifier, mean_a, bound_a).at(index))?;
    }
    if currents.conduction == Conduction::Continuous {
        let period_s = 1.0 / core.frequency_hz;
        let (on_s, off_s) = (currents.duty * period_s, (1.0 - currents.duty) * period_s);
        let (least_on_s, least_off_s) = (rail.drive.minimum_on_s.get(), rail.drive.minimum_off_s.get());
        if least_on_s > 0.0 {
            receive(Check::lower(LimitName::MinimumOn, Slot::Stage, on_s, least_on_s).at(index))?;
        }
        if least_off_s > 0.0 {
            receive(Check::lower(LimitName::MinimumOff, Slot::Stage, off_s, least_off_s).at(index))?;
        }
    }
    if input == core.conditions.typical && load == core.conditions.full_load {
        let ratio = currents.ripple_a / core.conditions.loads[load].current_a;
        if let Some(bound) = rail.range.ripple_ratio_max {
            receive(Check::upper(LimitName::RippleRatio, Slot::Inductor, ratio, bound.get()).at(index))?;
        }
        if let Some(bound) = rail.range.ripple_ratio_min {
            receive(Check::lower(LimitName::RippleRatio, Slot::Inductor, ratio, bound.get()).at(index))?;
        }
    }
    ControlFlow::Continue(())
}

/// Saturation and switch current, by the peak at the low end of the inductance tolerance, at full load raised by what the
/// output may draw beyond it.
fn peak_checks(
    core: &Core,
    rail: &Rail,
    load: usize,
    operation: &Operation,
    index: usize,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<()> {
    let beyond_a = (rail.output.peak_a.get() - rail.output.current_a.get()).max(0.0);
    let raised_a = if load == core.conditions.full_load { beyond_a } else { 0.0 };
    let peak_a = operation.currents.peak_a + raised_a;
    let saturation_a = core.choke.saturation_a.linear_held(operation.heat.winding_c);
    let needed_a = peak_a * rail.limits.saturation_margin.get();
    receive(Check::upper(LimitName::Saturation, Slot::Inductor, needed_a, saturation_a).at(index))?;
    let mut switch_check = |bank: &SwitchBank, slot| match bank.current_rating_a {
        Some(rating_a) => {
            receive(Check::upper(LimitName::SwitchCurrent, slot, peak_a / f64::from(bank.count), rating_a).at(index))
        }
        None => ControlFlow::Continue(()),
    };
    switch_check(core.high, Slot::HighSwitch)?;
    match core.rectifier {
        RectifierBank::Switch(bank) => switch_check(bank, Slot::Rectifier),
        RectifierBank::Diode(_) => ControlFlow::Continue(()),
    }
}

fn heat_checks(
    core: &Core,
    rail: &Rail,
    operation: &Operation,
    index: usize,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<()> {
    let margin_k = rail.limits.junction_margin_k.get();
    let heat = &operation.heat;
    let high_c = core.high.junction_limit_c - margin_k;
    receive(Check::upper(LimitName::Junction, Slot::HighSwitch, heat.high_c, high_c).at(index))?;
    let limit_c = match core.rectifier {
        RectifierBank::Switch(bank) => bank.junction_limit_c,
        RectifierBank::Diode(bank) => bank.junction_limit_c,
    };
    receive(Check::upper(LimitName::Junction, Slot::Rectifier, heat.rectifier_c, limit_c - margin_k).at(index))?;
    let winding_c = rail.limits.winding_temperature_c;
    receive(Check::upper(LimitName::Winding, Slot::Inductor, heat.winding_c, winding_c).at(index))
}

/// The bank of a switch rectifier.
pub fn switch_rectifier<'a>(core: &Core<'a>) -> Option<&'a SwitchBank> {
    match core.rectifier {
        RectifierBank::Switch(bank) => Some(bank),
        RectifierBank::Diode(_) => None,
    }
}
