//! Exact peak-to-peak ripple of a current made of straight lines into a capacitance with series resistance and inductance.

use super::current::Currents;
use crate::part::Bank;

/// A straight piece of a current.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Piece {
    start_a: f64,
    slope_a_per_s: f64,
    duration_s: f64,
}

/// The shares of a period that duty and fall leave over by rounding alone.
const NO_REST: f64 = 1e-12;

/// Peak to peak of q(t)/C + R·i(t) + L·di/dt over the pieces, V. Within a piece the voltage is a parabola: its ends and its
/// turning point are all there is to look at.
fn peak_to_peak_v(pieces: &[Piece], capacitance_f: f64, esr_ohm: f64, esl_h: f64) -> f64 {
    let (mut lowest_v, mut highest_v) = (f64::INFINITY, f64::NEG_INFINITY);
    let mut charge_v = 0.0;
    for piece in pieces {
        let at_v = |t: f64| {
            let charged_c = (piece.start_a + piece.slope_a_per_s * t / 2.0) * t;
            charge_v
                + charged_c / capacitance_f
                + esr_ohm * (piece.start_a + piece.slope_a_per_s * t)
                + esl_h * piece.slope_a_per_s
        };
        let mut look = |v: f64| {
            lowest_v = lowest_v.min(v);
            highest_v = highest_v.max(v);
        };
        look(at_v(0.0));
        look(at_v(piece.duration_s));
        let turn_s = -piece.start_a / piece.slope_a_per_s - esr_ohm * capacitance_f;
        if turn_s > 0.0 && turn_s < piece.duration_s {
            look(at_v(turn_s));
        }
        charge_v += (piece.start_a + piece.slope_a_per_s * piece.duration_s / 2.0) * piece.duration_s / capacitance_f;
    }
    highest_v - lowest_v
}

/// Output ripple, V peak to peak: the inductor current less the load into the output bank, with `capacitance_f` in place of
/// the bank's own (nominal, or the low end of its tolerance).
pub fn output_v(currents: &Currents, load_a: f64, frequency_hz: f64, bank: &Bank, capacitance_f: f64) -> f64 {
    let period_s = 1.0 / frequency_hz;
    let swing_a = currents.peak_a - currents.valley_a;
    let (rise_s, fall_s) = (currents.duty * period_s, currents.fall * period_s);
    let rest = 1.0 - currents.duty - currents.fall;
    let pieces = [
        Piece { start_a: currents.valley_a - load_a, slope_a_per_s: swing_a / rise_s, duration_s: rise_s },
        Piece { start_a: currents.peak_a - load_a, slope_a_per_s: -swing_a / fall_s, duration_s: fall_s },
        Piece { start_a: currents.valley_a - load_a, slope_a_per_s: 0.0, duration_s: rest * period_s },
    ];
    let used = if rest > NO_REST { &pieces[..] } else { &pieces[..2] };
    peak_to_peak_v(used, capacitance_f, bank.esr_ohm, bank.esl_h)
}

/// Input ripple, V peak to peak: a constant source current less that of the high switch into the input bank, its step through
/// the series inductance left out.
pub fn input_v(currents: &Currents, frequency_hz: f64, bank: &Bank, capacitance_f: f64) -> f64 {
    let period_s = 1.0 / frequency_hz;
    let source_a = currents.duty * (currents.valley_a + currents.peak_a) / 2.0;
    let on_s = currents.duty * period_s;
    let pieces = [
        Piece {
            start_a: source_a - currents.valley_a,
            slope_a_per_s: -(currents.peak_a - currents.valley_a) / on_s,
            duration_s: on_s,
        },
        Piece { start_a: source_a, slope_a_per_s: 0.0, duration_s: period_s - on_s },
    ];
    peak_to_peak_v(&pieces, capacitance_f, bank.esr_ohm, 0.0)
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    fn triangle(duty: f64) -> [Piece; 2] {
        // 2 A peak to peak at 500 kHz.
        let (rise_s, fall_s) = (duty * 2e-6, (1.0 - duty) * 2e-6);
        [
            Piece { start_a: -1.0, slope_a_per_s: 2.0 / rise_s, duration_s: rise_s },
            Piece { start_a: 1.0, slope_a_per_s: -2.0 / fall_s, duration_s: fall_s },
        ]
    }

    #[test]
    fn a_capacitance_alone_sees_a_quarter_of_the_charge_triangle() {
        let v = peak_to_peak_v(&triangle(0.3), 20e-6, 0.0, 0.0);
        assert_relative_eq!(v, 2.0 / (8.0 * 500e3 * 20e-6), max_relative = 1e-12);
    }

    #[test]
    fn a_resistance_alone_sees_the_current() {
        assert_relative_eq!(peak_to_peak_v(&triangle(0.3), 1.0, 0.01, 0.0), 0.02, max_relative = 1e-5);
    }

    #[test]
    fn an_inductance_alone_sees_the_change_of_slope() {
        let v = peak_to_peak_v(&triangle(0.25), 1.0, 0.0, 1e-9);
        assert_relative_eq!(v, 1e-9 * (2.0 / 0.5e-6 + 2.0 / 1.5e-6), max_relative = 1e-3);
    }

    // Δ/(8fC)·(1 + 4τ²f²/(D(1−D))) while τ = ESR·C is below half of either interval: the reference data's own closed form.
    #[test]
    fn capacitance_with_resistance_closed_form() {
        let (f, c, esr, duty) = (500e3, 20e-6, 0.01, 0.3);
        let tau_f = esr * c * f;
        let expected = 2.0 / (8.0 * f * c) * (1.0 + 4.0 * tau_f * tau_f / (duty * (1.0 - duty)));
        assert_relative_eq!(peak_to_peak_v(&triangle(duty), c, esr, 0.0), expected, max_relative = 1e-12);
    }
}
