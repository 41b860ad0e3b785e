//! Limits that a part breaks or keeps by itself, whatever its partners.

use std::ops::ControlFlow;

use super::{Check, LimitName, Receiver};
use crate::model::Conditions;
use crate::part::{Capacitor, Diode, DiodeKind, Identity, Slot, Switch, SwitchBank};
use crate::rail::Rail;

/// The highest voltage across switches and diodes, V: the greatest input or the surge, with ringing.
fn node_stress_v(rail: &Rail) -> f64 {
    highest_input_v(rail) * rail.limits.ringing.get()
}

fn highest_input_v(rail: &Rail) -> f64 {
    rail.input.maximum_v.get().max(rail.input.surge_v.get())
}

/// Values that a limit or a worth needs and the catalog does not give: unknown never wins for being unknown.
pub fn missing(
    identity: &Identity,
    slot: Slot,
    rail: &Rail,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<()> {
    let needs_area = rail.limits.area_mm2.is_some() || rail.worth.area.get() > 0.0;
    let needs_cost = rail.limits.cost.is_some() || rail.worth.cost.get() > 0.0;
    if needs_area && identity.area_mm2.is_none() {
        receive(Check::plain(LimitName::MissingArea, slot, false))?;
    }
    if rail.limits.height_m.is_some() && identity.height_m.is_none() {
        receive(Check::plain(LimitName::MissingHeight, slot, false))?;
    }
    if needs_cost && identity.cost.is_none() {
        receive(Check::plain(LimitName::MissingCost, slot, false))?;
    }
    ControlFlow::Continue(())
}

/// Limits of `bank`, made of `switch`, in `slot`; dead time counts where the stage's rectifier is a switch.
pub fn switch(
    switch: &Switch,
    bank: &SwitchBank,
    slot: Slot,
    switch_rectifier: bool,
    rail: &Rail,
    conditions: &Conditions,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<()> {
    missing(&switch.identity, slot, rail, receive)?;
    let derated_v = rail.limits.voltage_derating.get() * switch.voltage_rating_v.get();
    receive(Check::upper(LimitName::Voltage, slot, node_stress_v(rail), derated_v))?;
    let gate_v = conditions.gate_v;
    receive(Check::lower(LimitName::GateVoltage, slot, gate_v, switch.lowest_gate_v()))?;
    receive(Check::above(LimitName::GateVoltage, slot, gate_v, bank.plateau_v))?;
    if let Some(rating) = switch.gate_rating_v {
        receive(Check::upper(LimitName::GateVoltage, slot, gate_v, rating.get()))?;
    }
    if switch_rectifier {
        let turn_off_s = bank.turn_off_s(conditions.pull_down_ohm, gate_v, slot == Slot::HighSwitch);
        receive(Check::upper(LimitName::DeadTime, slot, turn_off_s, conditions.dead_time_s))?;
    }
    ControlFlow::Continue(())
}

/// Limits of a diode.
pub fn diode(diode: &Diode, rail: &Rail, receive: &mut (impl Receiver + ?Sized)) -> ControlFlow<()> {
    let slot = Slot::Rectifier;
    missing(&diode.identity, slot, rail, receive)?;
    if diode.kind == DiodeKind::Silicon && diode.recovery_charge_c.is_none() {
        receive(Check::plain(LimitName::MissingRecoveryCharge, slot, false))?;
    }
    let derated_v = rail.limits.voltage_derating.get() * diode.voltage_rating_v.get();
    receive(Check::upper(LimitName::Voltage, slot, node_stress_v(rail), derated_v))
}

/// Limits of a capacitor in the input or the output bank.
pub fn capacitor(
    capacitor: &Capacitor,
    slot: Slot,
    rail: &Rail,
    receive: &mut (impl Receiver + ?Sized),
) -> ControlFlow<()> {
    missing(&capacitor.identity, slot, rail, receive)?;
    let stress_v = if slot == Slot::InputBank { highest_input_v(rail) } else { rail.output.voltage_v.get() };
    let derated_v = rail.limits.capacitor_derating(capacitor.kind) * capacitor.voltage_rating_v.get();
    receive(Check::upper(LimitName::CapacitorVoltage, slot, stress_v, derated_v))
}
