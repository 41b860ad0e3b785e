//! Deviation of the output after a load step.

use std::f64::consts::TAU;

/// Deviation, V, when the load jumps by `step_a` and the inductor current follows at its greatest slope, up or down, whichever
/// is worse (charge balance, ADI EVAL-ADP1828LC eq. 2 and 3 with K = 1); with the crossover of the control loop at least
/// ΔI/(2π·fc·C) + ESR·ΔI (common practice, no source).
pub fn deviation_v(
    input_v: f64,
    output_v: f64,
    inductance_h: f64,
    capacitance_f: f64,
    esr_ohm: f64,
    step_a: f64,
    crossover_hz: Option<f64>,
) -> f64 {
    let follow_v = |slope_a_per_s: f64| {
        let turn_s = step_a / slope_a_per_s - esr_ohm * capacitance_f;
        if turn_s > 0.0 {
            step_a * step_a / (2.0 * slope_a_per_s * capacitance_f)
                + slope_a_per_s * esr_ohm * esr_ohm * capacitance_f / 2.0
        } else {
            esr_ohm * step_a
        }
    };
    let floor_v = follow_v((input_v - output_v) / inductance_h).max(follow_v(output_v / inductance_h));
    crossover_hz.map_or(floor_v, |hz| floor_v.max(step_a / (TAU * hz * capacitance_f) + esr_ohm * step_a))
}
