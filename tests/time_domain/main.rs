//! The closed forms of duty, currents and ripple against an integration in time of the ideal stage: one that knows nothing of
//! averages, triangles or mean squares.
//!
//! Without resistances both describe the same stage, so they must agree to the integration's own error. With resistances the true
//! current bends: i″ = −(R/L)·i′, so within an interval of length t it leaves the straight line by at most Δ·(R·t/L)/8. With
//! x = R·T/L of the period T and the greater of the two loops' resistances, that moves
//!
//! - a mean square's root by no more than Δ·x/8 times the root of the interval's share (triangle inequality of the norm), twice that
//!   with what the ends of the line move;
//! - the mean of an interval by Δ·x/12, hence duty and ripple in continuous conduction only by its drop, R·Δ·x/12 in a voltage of at
//!   least R·Δ/x: a share of x²/12, with the two intervals taken at their worst x²/4;
//! - the charge of a pulse in discontinuous conduction by a share of x/6, hence its height and length, which go with the root
//!   of the charge, by x/12, and with the pulse's own bend by no more than x/4;
//! - the charge that swings on a bank, Δ·T/8, by Δ·T·x/12, a share below x.
//!
//! The worst that random stages show is about a quarter of these.

mod integrate;

use integrate::Period;
use proptest::prelude::{ProptestConfig, Strategy, proptest};
use wattsieve::model::current::{Circuit, Currents, Drop, continuous, discontinuous, discontinuous_peak_a};
use wattsieve::model::ripple;
use wattsieve::part::Bank;

/// What a random stage is made of.
#[derive(Debug, Clone, Copy)]
struct Draw {
    circuit: Circuit,
    rectifier: Drop,
    capacitance_f: f64,
    esr_ohm: f64,
}

/// Random stages: a ripple (as continuous) of `ripple` times the load, and resistances of up to `bend` as a share of L·f.
fn draws(ripple: std::ops::Range<f64>, bend: f64) -> impl Strategy<Value = Draw> {
    let voltages = (3.0..60.0f64, 0.05..0.9f64, 0.0..0.6f64);
    let load = (0.05..20.0f64, ripple, 1e5..2e6f64);
    let resistances = (0.0..1.0f64, 0.0..1.0f64, 0.0..1.0f64);
    let bank = (0.1..10.0f64, 0.0..3.0f64);
    (voltages, load, resistances, bank).prop_map(
        move |((input_v, step_down, threshold_v), (load_a, ratio, frequency_hz), (high, winding, slope), (c, esr))| {
            let output_v = input_v * step_down;
            let ripple_a = ratio * load_a;
            let inductance_h = (input_v - output_v) * step_down / (ripple_a * frequency_hz);
            let ohm = |share: f64| bend / 2.0 * share * inductance_h * frequency_hz;
            let capacitance_f = c / (frequency_hz * input_v / load_a);
            Draw {
                circuit: Circuit {
                    input_v,
                    output_v,
                    load_a,
                    frequency_hz,
                    inductance_h,
                    high_ohm: ohm(high),
                    winding_ohm: ohm(winding),
                    dead_share: 0.0,
                    body_drop_v: 0.0,
                },
                rectifier: Drop { threshold_v, resistance_ohm: ohm(slope) },
                capacitance_f,
                esr_ohm: esr / (frequency_hz * capacitance_f),
            }
        },
    )
}

impl Draw {
    fn bend(&self) -> f64 {
        let Circuit { high_ohm, winding_ohm, inductance_h, frequency_hz, .. } = self.circuit;
        (winding_ohm + high_ohm.max(self.rectifier.resistance_ohm)) / (inductance_h * frequency_hz)
    }

    fn bank(&self) -> Bank {
        Bank {
            capacitance_f: [self.capacitance_f; 3],
            tolerance: 0.0,
            esr_ohm: self.esr_ohm,
            esl_h: 0.0,
            ripple_current_a: None,
            count: 1,
        }
    }

    /// The closed forms in continuous conduction, where there is such a period.
    fn continuous(&self) -> Option<Currents> {
        let currents = continuous(&self.circuit, self.rectifier).running(0.0).ok()?;
        (currents.valley_a >= 0.0 && currents.duty < 0.97 && currents.ripple_a > 0.0).then_some(currents)
    }

    /// The closed forms in discontinuous conduction, where there is such a period.
    fn discontinuous(&self) -> Option<Currents> {
        let whole = continuous(&self.circuit, self.rectifier).running(0.0).ok()?;
        if whole.valley_a >= 0.0 {
            return None;
        }
        let peak_a = discontinuous_peak_a(&self.circuit, |_| self.rectifier).ok()?;
        let currents = discontinuous(&self.circuit, self.rectifier, peak_a).ok()?;
        (currents.duty + currents.fall < 0.97).then_some(currents)
    }

    /// Compares everything: `first` is allowed as a share of duty, fall and ripple, `rms` as a share of the ripple in a
    /// root mean square over its interval, `swing` as a share of the voltage ripples.
    fn compare(&self, found: &Currents, period: &Period, first: f64, rms: f64, swing: f64) {
        let near = |what: &str, found: f64, expected: f64, allowed: f64| {
            assert!((found - expected).abs() <= allowed, "{what}: {found}, not {expected} ± {allowed}: {self:?}");
        };
        near("duty", found.duty, period.duty, first * period.duty);
        near("fall", found.fall, period.fall, first * period.fall);
        let ripple_a = period.peak_a() - period.valley_a;
        near("ripple", found.ripple_a, ripple_a, first * ripple_a);
        let mean_a = period.rectifier_mean_a();
        near("rectifier mean", found.rectifier_mean_a, mean_a, (first + rms) * mean_a.max(ripple_a));
        let names = ["high switch", "rectifier", "inductor", "input bank", "output bank"];
        let closed = [found.high_a2, found.rectifier_a2, found.inductor_a2, found.input_bank_a2, found.output_bank_a2];
        for ((name, closed), square) in names.into_iter().zip(closed).zip(period.squares_a2()) {
            let (closed_a, expected_a) = (closed.max(0.0).sqrt(), square.max(0.0).sqrt());
            near(name, closed_a, expected_a, rms * ripple_a + first * expected_a);
        }
        let load_a = self.circuit.load_a;
        let expected_v = period.output_ripple_v(load_a, self.capacitance_f, self.esr_ohm);
        let found_v = ripple::output_v(found, load_a, self.circuit.frequency_hz, &self.bank(), self.capacitance_f);
        near("output ripple", found_v, expected_v, swing * expected_v);
        let expected_v = period.input_ripple_v(self.capacitance_f, self.esr_ohm);
        let found_v = ripple::input_v(found, self.circuit.frequency_hz, &self.bank(), self.capacitance_f);
        near("input ripple", found_v, expected_v, swing * expected_v);
    }
}

/// What the integration itself is off by: rounding, and the turning point of a ripple between two of its steps.
const OWN_ERROR: f64 = 1e-8;
const OWN_SWING_ERROR: f64 = 1e-5;

proptest! {
    #![proptest_config(ProptestConfig { cases: 60, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn continuous_without_resistance(draw in draws(0.02..1.9, 0.0)) {
        if let Some(found) = draw.continuous() {
            let period = Period::continuous(&draw.circuit, draw.rectifier);
            draw.compare(&found, &period, OWN_ERROR, OWN_ERROR, OWN_SWING_ERROR);
        }
    }

    #[test]
    fn discontinuous_without_resistance(draw in draws(2.5..30.0, 0.0)) {
        if let Some(found) = draw.discontinuous() {
            let period = Period::discontinuous(&draw.circuit, draw.rectifier);
            draw.compare(&found, &period, OWN_ERROR, OWN_ERROR, OWN_SWING_ERROR);
        }
    }

    #[test]
    fn continuous_with_resistance(draw in draws(0.1..1.9, 0.2)) {
        if let Some(found) = draw.continuous() {
            let period = Period::continuous(&draw.circuit, draw.rectifier);
            let x = draw.bend();
            draw.compare(&found, &period, OWN_ERROR + x * x / 4.0, OWN_ERROR + x / 4.0, OWN_SWING_ERROR + x);
        }
    }

    #[test]
    fn discontinuous_with_resistance(draw in draws(2.5..30.0, 0.2)) {
        if let Some(found) = draw.discontinuous() {
            let period = Period::discontinuous(&draw.circuit, draw.rectifier);
            let x = draw.bend();
            draw.compare(&found, &period, OWN_ERROR + x / 4.0, OWN_ERROR + x / 4.0, OWN_SWING_ERROR + x);
        }
    }
}

#[test]
fn the_random_stages_are_of_both_modes() {
    let mut runner = proptest::test_runner::TestRunner::deterministic();
    let mut count = |ripple, bend| {
        let strategy = draws(ripple, bend);
        (0..200)
            .filter_map(|_| strategy.new_tree(&mut runner).ok())
            .map(|tree| proptest::strategy::ValueTree::current(&tree))
            .filter(|draw| draw.continuous().is_some() || draw.discontinuous().is_some())
            .count()
    };
    assert!(count(0.1..1.9, 0.2) > 80);
    assert!(count(2.5..30.0, 0.2) > 80);
}
