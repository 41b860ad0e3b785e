//! Duty and currents at given resistances and drops.

/// How the inductor conducts.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Conduction {
    /// The current never rests at zero.
    Continuous,
    /// It rests at zero in each period.
    Discontinuous,
}

/// What the currents depend on, at one point and given temperatures.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Circuit {
    /// Input, V.
    pub input_v: f64,
    /// Output, V.
    pub output_v: f64,
    /// Load, A.
    pub load_a: f64,
    /// Switching frequency, Hz.
    pub frequency_hz: f64,
    /// Inductance, H.
    pub inductance_h: f64,
    /// Resistance of the high switch, Ω.
    pub high_ohm: f64,
    /// Resistance of the winding, Ω.
    pub winding_ohm: f64,
    /// Share of the period in which both switches of a switch rectifier are off; 0 for a diode.
    pub dead_share: f64,
    /// Body diode drop during it, V; 0 for a diode.
    pub body_drop_v: f64,
}

/// The rectifier's drop at a current: `threshold_v` + `resistance_ohm`·I.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Drop {
    /// Drop extended to no current, V; 0 for a switch.
    pub threshold_v: f64,
    /// Slope resistance, Ω.
    pub resistance_ohm: f64,
}

impl Drop {
    /// Drop at a current, V.
    pub fn at_v(&self, current_a: f64) -> f64 {
        self.threshold_v + self.resistance_ohm * current_a
    }
}

/// Currents of one period. Squares are mean squares, A².
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Currents {
    /// Mode.
    pub conduction: Conduction,
    /// On-time of the high switch / period.
    pub duty: f64,
    /// Share of the period in which the inductor current falls.
    pub fall: f64,
    /// Inductor ripple, A peak to peak.
    pub ripple_a: f64,
    /// Greatest inductor current, A.
    pub peak_a: f64,
    /// Least inductor current, A.
    pub valley_a: f64,
    /// High switch.
    pub high_a2: f64,
    /// Rectifier channel.
    pub rectifier_a2: f64,
    /// Mean rectifier current outside dead time, A.
    pub rectifier_mean_a: f64,
    /// Inductor.
    pub inductor_a2: f64,
    /// Input bank.
    pub input_bank_a2: f64,
    /// Output bank.
    pub output_bank_a2: f64,
}

/// The input is too low for the output.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Dropout;

/// Continuous conduction, by averaging with all drops at the load current (Erickson & Maksimović, ch. 3; switch and
/// capacitor rms: TI SLUS774B eq. 16 and 39, SLUS676A eq. 23). Where the input does not reach the output these are only figures:
/// see [`Currents::running`].
pub fn continuous(circuit: &Circuit, drop: Drop) -> Currents {
    let i = circuit.load_a;
    let dead = circuit.dead_share;
    let drop_v = drop.at_v(i);
    let duty = (circuit.output_v + i * circuit.winding_ohm + (1.0 - dead) * drop_v + dead * circuit.body_drop_v)
        / (circuit.input_v - i * circuit.high_ohm + drop_v);
    let on_v = circuit.input_v - circuit.output_v - i * (circuit.high_ohm + circuit.winding_ohm);
    let ripple_a = on_v * duty / (circuit.inductance_h * circuit.frequency_hz);
    let ripple_a2 = ripple_a * ripple_a / 12.0;
    let inductor_a2 = i * i + ripple_a2;
    Currents {
        conduction: Conduction::Continuous,
        duty,
        fall: 1.0 - duty,
        ripple_a,
        peak_a: i + ripple_a / 2.0,
        valley_a: i - ripple_a / 2.0,
        high_a2: duty * inductor_a2,
        rectifier_a2: (1.0 - duty - dead) * inductor_a2,
        rectifier_mean_a: (1.0 - duty) * i,
        inductor_a2,
        input_bank_a2: duty * (1.0 - duty) * i * i + duty * ripple_a2,
        output_bank_a2: ripple_a2,
    }
}

impl Currents {
    /// These currents, if they can flow.
    ///
    /// # Errors
    /// [`Dropout`] when on-time and dead time fill the period.
    pub fn running(self, dead_share: f64) -> Result<Self, Dropout> {
        if self.duty > 0.0 && self.duty + dead_share < 1.0 { Ok(self) } else { Err(Dropout) }
    }
}

/// Relative movement of the peak current at which it has settled.
const SETTLED: f64 = 1e-15;
/// Steps for the peak current; halving alone would settle within 60.
const PEAK_STEPS: u32 = 100;

/// Peak current of discontinuous conduction, A, with drops at half of it: the root of Ip² = 2·I·(von∥voff)/(L·f), which falls with
/// the peak through von. Newton steps, kept between bounds that halve where a step leaves them.
///
/// # Errors
/// [`Dropout`] when nothing is left to drive the current up.
pub fn discontinuous_peak_a(circuit: &Circuit, drop_at: impl Fn(f64) -> Drop) -> Result<f64, Dropout> {
    let across_v = circuit.input_v - circuit.output_v;
    if across_v <= 0.0 {
        return Err(Dropout);
    }
    let on_ohm = circuit.high_ohm + circuit.winding_ohm;
    let scale = 2.0 * circuit.load_a / (circuit.inductance_h * circuit.frequency_hz);
    let (mut lo_a, mut hi_a) = (0.0, (scale * across_v).sqrt());
    let mut peak_a = hi_a.min(across_v / on_ohm);
    for _ in 0..PEAK_STEPS {
        let half_a = peak_a / 2.0;
        let drop = drop_at(half_a);
        let on_v = across_v - on_ohm * half_a;
        let off_v = circuit.output_v + circuit.winding_ohm * half_a + drop.at_v(half_a);
        let (off_slope_ohm, sum_v) = (circuit.winding_ohm + drop.resistance_ohm, on_v + off_v);
        let excess_a2 = peak_a * peak_a - scale * on_v * off_v / sum_v;
        if on_v <= 0.0 || excess_a2 > 0.0 {
            hi_a = peak_a;
        } else {
            lo_a = peak_a;
        }
        let slope_a =
            2.0 * peak_a - scale / 2.0 * (on_v * on_v * off_slope_ohm - off_v * off_v * on_ohm) / (sum_v * sum_v);
        let newton_a = peak_a - excess_a2 / slope_a;
        let next_a = if newton_a > lo_a && newton_a < hi_a { newton_a } else { lo_a + (hi_a - lo_a) / 2.0 };
        let moved_a = (next_a - peak_a).abs();
        peak_a = next_a;
        if moved_a <= SETTLED * peak_a {
            break;
        }
    }
    Ok(peak_a)
}

/// Discontinuous conduction at that peak, by charge balance (Erickson & Maksimović, ch. 5).
///
/// # Errors
/// [`Dropout`] when nothing is left to drive the current up, or on-time and dead time fill the period.
pub fn discontinuous(circuit: &Circuit, drop: Drop, peak_a: f64) -> Result<Currents, Dropout> {
    let i = circuit.load_a;
    let half_a = peak_a / 2.0;
    let on_v = circuit.input_v - circuit.output_v - (circuit.high_ohm + circuit.winding_ohm) * half_a;
    let off_v = circuit.output_v + circuit.winding_ohm * half_a + drop.at_v(half_a);
    let henry_hz = circuit.inductance_h * circuit.frequency_hz;
    if !(on_v > 0.0 && off_v > 0.0) {
        return Err(Dropout);
    }
    let duty = (2.0 * henry_hz * i * off_v / (on_v * (on_v + off_v))).sqrt();
    if duty + circuit.dead_share >= 1.0 {
        return Err(Dropout);
    }
    let fall = duty * on_v / off_v;
    let peak_a = on_v * duty / henry_hz;
    let third_a2 = peak_a * peak_a / 3.0;
    let high_a2 = third_a2 * duty;
    let inductor_a2 = third_a2 * (duty + fall);
    let high_mean_a = duty * peak_a / 2.0;
    Ok(Currents {
        conduction: Conduction::Discontinuous,
        duty,
        fall,
        ripple_a: peak_a,
        peak_a,
        valley_a: 0.0,
        high_a2,
        rectifier_a2: third_a2 * fall,
        rectifier_mean_a: peak_a * fall / 2.0,
        inductor_a2,
        input_bank_a2: high_a2 - high_mean_a * high_mean_a,
        output_bank_a2: inductor_a2 - i * i,
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    fn lossless(input_v: f64, output_v: f64, inductance_h: f64, frequency_hz: f64, load_a: f64) -> Circuit {
        Circuit {
            input_v,
            output_v,
            load_a,
            frequency_hz,
            inductance_h,
            high_ohm: 0.0,
            winding_ohm: 0.0,
            dead_share: 0.0,
            body_drop_v: 0.0,
        }
    }

    // Derived by hand from the textbook formulas, six digits.
    #[test]
    fn continuous_vector() {
        let circuit = lossless(12.0, 1.2, 0.47e-6, 500e3, 10.0);
        let currents = continuous(&circuit, Drop { threshold_v: 0.0, resistance_ohm: 0.0 });
        assert_relative_eq!(currents.ripple_a, 4.595745, max_relative = 2e-7);
        assert_relative_eq!(currents.high_a2.sqrt(), 3.189985, max_relative = 2e-7);
        assert_relative_eq!(currents.rectifier_a2.sqrt(), 9.569956, max_relative = 2e-7);
        assert_relative_eq!(currents.input_bank_a2.sqrt(), 3.029193, max_relative = 2e-7);
        assert_relative_eq!(currents.output_bank_a2.sqrt(), 1.326677, max_relative = 4e-7);
    }

    // Derived by hand from the textbook formulas, six digits.
    #[test]
    fn discontinuous_vector() {
        let circuit = lossless(12.0, 3.3, 10e-6, 400e3, 0.15);
        let drop = Drop { threshold_v: 0.45, resistance_ohm: 0.0 };
        let peak_a = discontinuous_peak_a(&circuit, |_| drop).expect("it runs");
        let currents = discontinuous(&circuit, drop, peak_a).expect("it runs");
        let expect = |found: f64, six_digits: f64| assert_relative_eq!(found, six_digits, max_relative = 4e-6);
        expect(currents.duty, 0.203827);
        expect(currents.fall, 0.472879);
        expect(currents.peak_a, 0.443324);
        expect(currents.high_a2.sqrt(), 0.115556);
        expect(currents.rectifier_mean_a, 0.104819);
        expect(currents.rectifier_a2.sqrt(), 0.176009);
        expect(currents.inductor_a2.sqrt(), 0.210553);
        expect(currents.input_bank_a2.sqrt(), 0.106357);
        expect(currents.output_bank_a2.sqrt(), 0.147758);
        let boundary = continuous(&Circuit { load_a: 0.327560, ..circuit }, drop);
        expect(boundary.ripple_a / 2.0, 0.327560);
    }

    #[test]
    fn an_input_that_does_not_reach_the_output_is_dropout() {
        let drop = Drop { threshold_v: 0.4, resistance_ohm: 0.0 };
        assert_eq!(continuous(&lossless(5.0, 5.0, 10e-6, 400e3, 1.0), drop).running(0.0), Err(Dropout));
        assert_eq!(discontinuous(&lossless(5.0, 5.0, 10e-6, 400e3, 1.0), drop, 0.0), Err(Dropout));
        assert_eq!(discontinuous_peak_a(&lossless(5.0, 5.0, 10e-6, 400e3, 1.0), |_| drop), Err(Dropout));
        let dead = Circuit { dead_share: 0.1, ..lossless(5.0, 4.6, 10e-6, 400e3, 1.0) };
        assert_eq!(continuous(&dead, Drop { threshold_v: 0.0, resistance_ohm: 0.0 }).running(0.1), Err(Dropout));
    }
}
