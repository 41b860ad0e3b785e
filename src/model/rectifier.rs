//! Losses in the rectifier.

use super::current::{Conduction, Currents};
use crate::part::SwitchBank;

/// Loss of the body diode during both dead times, W; in discontinuous conduction only the first carries current.
pub fn dead_time_w(switch: &SwitchBank, currents: &Currents, dead_time_s: f64, frequency_hz: f64) -> f64 {
    let carried_a = match currents.conduction {
        Conduction::Continuous => currents.peak_a + currents.valley_a.abs(),
        Conduction::Discontinuous => currents.peak_a,
    };
    switch.body_drop_v * dead_time_s * frequency_hz * carried_a
}

/// Forward loss of a diode, W: V0·mean + Rd·mean square.
pub fn diode_conduction_w(threshold_v: f64, resistance_ohm: f64, currents: &Currents) -> f64 {
    threshold_v * currents.rectifier_mean_a + resistance_ohm * currents.rectifier_a2
}

/// Leakage loss of a diode blocking the input while the high switch is on, W.
pub fn leakage_w(input_v: f64, leakage_a: f64, duty: f64) -> f64 {
    input_v * leakage_a * duty
}
