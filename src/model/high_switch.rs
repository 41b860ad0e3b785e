//! Losses in the high switch: both edges, the node's charge and the rectifier's recovery.

use super::current::{Conduction, Currents};
use crate::part::SwitchBank;

/// What the high switch meets at its edges, at one point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Node {
    /// Input, V.
    pub input_v: f64,
    /// Voltage through which the node is pulled at turn-on, V: the input, less the output in discontinuous conduction.
    pub swing_v: f64,
    /// Output charge of the high switch at the input voltage, C.
    pub own_at_input_c: f64,
    /// Charge of the rectifier at the input voltage, C.
    pub rectifier_at_input_c: f64,
    /// Output charge of the high switch at the swing, C.
    pub own_at_swing_c: f64,
    /// Charge of the rectifier at the swing, C.
    pub rectifier_at_swing_c: f64,
    /// Recovery charge of the rectifier, C.
    pub recovery_c: f64,
}

/// Gate drive of the high switch.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GateDrive {
    /// Gate supply, V.
    pub gate_v: f64,
    /// Driver and external resistance while charging, Ω.
    pub pull_up_ohm: f64,
    /// The same while discharging, Ω.
    pub pull_down_ohm: f64,
}

/// The gate supply does not switch the part: it does not exceed the plateau of a current to be switched, or lies below the
/// lowest gate voltage for which there is an on-resistance.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Underdriven {
    /// Gate supply, V.
    pub gate_v: f64,
    /// What it would have to exceed or reach, V.
    pub needed_v: f64,
}

/// Channel energy of one turn-on at `valley_a` (0 when the current is reversed), J.
///
/// The channel carries the load and Q/t while the node falls; the gate sits at the plateau of both, and the extra gate
/// travel delays the edge (Kirchhoff at the node with the Miller relation dV/dt = Ig/Cgd).
fn turn_on_j(switch: &SwitchBank, drive: &GateDrive, node_v: f64, node_c: f64, valley_a: f64) -> f64 {
    let ohm = drive.pull_up_ohm + switch.gate_resistance_ohm;
    let gm = switch.transconductance_s;
    let plateau_v = switch.plateau_at_v(valley_a);
    let headroom_v = drive.gate_v - plateau_v;
    let current_rise_s =
        ohm * switch.gate_capacitance_f * (valley_a / gm) / (drive.gate_v - (switch.threshold_v + plateau_v) / 2.0);
    let voltage_fall_s = (ohm * switch.miller_charge_c + node_c / gm) / headroom_v;
    let lift_v = node_c / (voltage_fall_s * gm);
    let lag_s = ohm * switch.gate_capacitance_f * lift_v / (headroom_v - lift_v / 2.0);
    0.5 * node_v * valley_a * (current_rise_s + voltage_fall_s + lag_s)
}

/// Channel energy of one turn-off at `peak_a`, J: 0 where the node's charge takes the whole current.
fn turn_off_j(switch: &SwitchBank, drive: &GateDrive, node_v: f64, node_c: f64, peak_a: f64) -> f64 {
    let ohm = drive.pull_down_ohm + switch.gate_resistance_ohm;
    let gm = switch.transconductance_s;
    let voltage_rise_s = (ohm * switch.miller_charge_c + node_c / gm) / switch.plateau_at_v(peak_a);
    let channel_a = peak_a - node_c / voltage_rise_s;
    if channel_a <= 0.0 {
        return 0.0;
    }
    let travel_v = channel_a / gm;
    let current_fall_s = ohm * switch.gate_capacitance_f * travel_v / (switch.threshold_v + travel_v / 2.0);
    0.5 * node_v * channel_a * (voltage_rise_s + current_fall_s)
}

/// Overlap energy of both edges in one period, J, with turn-on at `valley_a` and turn-off at `peak_a`; `node_c` is the
/// charge of everything at the node, C, `node_v` the input, V.
///
/// # Errors
/// [`Underdriven`] when the gate supply does not exceed the plateau of either current.
pub fn overlap_j(
    switch: &SwitchBank,
    drive: &GateDrive,
    node_v: f64,
    node_c: f64,
    valley_a: f64,
    peak_a: f64,
) -> Result<(f64, f64), Underdriven> {
    let valley_a = valley_a.max(0.0);
    let plateau_v = switch.plateau_at_v(peak_a.max(valley_a));
    if plateau_v >= drive.gate_v {
        return Err(Underdriven { gate_v: drive.gate_v, needed_v: plateau_v });
    }
    Ok((turn_on_j(switch, drive, node_v, node_c, valley_a), turn_off_j(switch, drive, node_v, node_c, peak_a)))
}

/// Energy lost in charging the node once, J: a third of the own charge (its energy is Q·V/3 when C ∝ V^−1/2), two thirds
/// of the rectifier's; nothing where the reversed inductor current does it.
fn output_charge_j(node: &Node, currents: &Currents, inductance_h: f64) -> f64 {
    let node_c = node.own_at_input_c + node.rectifier_at_input_c;
    let valley_a = currents.valley_a;
    match currents.conduction {
        Conduction::Continuous if valley_a < 0.0 && inductance_h * valley_a * valley_a >= node_c * node.input_v => 0.0,
        Conduction::Continuous => (node.own_at_input_c / 3.0 + 2.0 * node.rectifier_at_input_c / 3.0) * node.input_v,
        Conduction::Discontinuous => (node.own_at_swing_c / 3.0 + 2.0 * node.rectifier_at_swing_c / 3.0) * node.swing_v,
    }
}

/// Losses of the high switch that do not depend on its temperature, W: overlap, output charge, recovery.
///
/// # Errors
/// [`Underdriven`] as in [`overlap_j`].
pub fn switching_w(
    switch: &SwitchBank,
    drive: &GateDrive,
    node: &Node,
    currents: &Currents,
    inductance_h: f64,
    frequency_hz: f64,
) -> Result<[f64; 3], Underdriven> {
    let node_c = node.own_at_input_c + node.rectifier_at_input_c;
    let (on_j, off_j) = overlap_j(switch, drive, node.input_v, node_c, currents.valley_a, currents.peak_a)?;
    let recovers = currents.conduction == Conduction::Continuous && currents.valley_a >= 0.0;
    let recovery_w = if recovers { node.recovery_c * node.input_v * frequency_hz } else { 0.0 };
    Ok([frequency_hz * (on_j + off_j), output_charge_j(node, currents, inductance_h) * frequency_hz, recovery_w])
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    fn switch(
        threshold_v: f64,
        plateau_v: f64,
        at_a: f64,
        post_threshold_c: f64,
        miller_c: f64,
        gate_ohm: f64,
    ) -> SwitchBank {
        SwitchBank {
            r25_ohm: 0.01,
            worst_r25_ohm: 0.01,
            coefficient_per_k: 0.005,
            gate_charge_c: 10e-9,
            miller_charge_c: miller_c,
            overdrive_charge_c: 0.0,
            post_threshold_charge_c: post_threshold_c,
            lowest_gate_v: 0.0,
            threshold_v,
            plateau_v,
            transconductance_s: at_a / (plateau_v - threshold_v),
            gate_capacitance_f: post_threshold_c / (plateau_v - threshold_v),
            gate_resistance_ohm: gate_ohm,
            charge_at_input_c: [0.0; 3],
            charge_at_swing_c: [0.0; 3],
            recovery_c: 0.0,
            body_drop_v: 0.8,
            thermal_k_per_w: 40.0,
            junction_limit_c: 150.0,
            current_rating_a: None,
            count: 1,
        }
    }

    // The `closed_form_aware` columns of the circuit-simulation edge cases E03 and E07: the same law, computed elsewhere. They
    // hold the stored energy too, which with linear capacitances is half of charge times voltage.
    #[test]
    fn edges_with_node_charge() {
        let fast = GateDrive { gate_v: 5.0, pull_up_ohm: 1.5, pull_down_ohm: 0.8 };
        let e03 = switch(1.6, 2.3, 6.0, 6.65e-10, 1.2e-9, 1.0);
        let (on_j, off_j) = overlap_j(&e03, &fast, 24.0, 24.0 * 6.5e-10, 6.0, 6.0).expect("it switches");
        assert_relative_eq!(on_j + 1.872e-7, 4.34575143e-7, max_relative = 1e-6);
        assert_eq!(off_j, 0.0);
        let slow = GateDrive { gate_v: 5.0, pull_up_ohm: 1.2, pull_down_ohm: 0.6 };
        let e07 = switch(1.4, 2.2, 25.0, 2.56e-9, 2.4e-9, 0.7);
        let (on_j, off_j) = overlap_j(&e07, &slow, 12.0, 12.0 * 2e-9, 25.0, 35.0).expect("it switches");
        assert_relative_eq!(on_j + 1.44e-7, 7.99098474e-7, max_relative = 1e-6);
        assert_relative_eq!(off_j, 3.56484848e-7, max_relative = 1e-6);
    }

    #[test]
    fn a_plateau_at_the_gate_supply_is_underdriven() {
        let drive = GateDrive { gate_v: 3.0, pull_up_ohm: 1.0, pull_down_ohm: 1.0 };
        let weak = switch(1.5, 2.5, 8.0, 6.65e-10, 1.2e-9, 1.0);
        let found = overlap_j(&weak, &drive, 24.0, 1e-9, 0.0, 12.0);
        assert_eq!(found, Err(Underdriven { gate_v: 3.0, needed_v: 3.0 }));
    }
}
