//! Losses in the gate supply.

use super::losses::DriveLosses;
use crate::part::SwitchBank;

/// Charge drawn from the gate supply in a period by a switch rectifier, C: it switches at no voltage, so without its
/// Miller charge (Micrel MIC2103 eq. 6).
pub fn rectifier_gate_c(rectifier: &SwitchBank) -> f64 {
    (rectifier.gate_charge_c - rectifier.miller_charge_c).max(0.0)
}

/// Gate and bias losses, W, paid for at `supply_v`.
pub fn drive_w(
    high: &SwitchBank,
    rectifier: Option<&SwitchBank>,
    bias_a: f64,
    supply_v: f64,
    frequency_hz: f64,
) -> DriveLosses {
    DriveLosses {
        high_gate: high.gate_charge_c * frequency_hz * supply_v,
        rectifier_gate: rectifier.map_or(0.0, |bank| rectifier_gate_c(bank) * frequency_hz * supply_v),
        bias: bias_a * supply_v,
    }
}

/// Current drawn from the gate supply, A.
pub fn supply_a(high: &SwitchBank, rectifier: Option<&SwitchBank>, bias_a: f64, frequency_hz: f64) -> f64 {
    (high.gate_charge_c + rectifier.map_or(0.0, rectifier_gate_c)) * frequency_hz + bias_a
}
