//! Equal capacitors in parallel at one frequency and at the bias of their place.

use super::switch_bank::INPUTS;
use super::{Assumed, Capacitor, CapacitorKind, Slot};

/// Tolerance of a ceramic where it is not given.
const CERAMIC_TOLERANCE: f64 = 0.1;
/// Tolerance of the others where it is not given.
const OTHER_TOLERANCE: f64 = 0.2;
/// Loss of ceramic capacitance with bias: C(V)/C(0) = 1/(1 + this·(V/rating)²), a fit to two published facts.
const CERAMIC_BIAS_LOSS: f64 = 4.0;

/// `count` equal capacitors in parallel.
#[derive(Debug, Clone, PartialEq)]
pub struct Bank {
    /// Capacitance at the bias of each input voltage (of the output, in all places, for an output bank), F.
    pub capacitance_f: [f64; INPUTS],
    /// Half-width of the tolerance band.
    pub tolerance: f64,
    /// Equivalent series resistance at the switching frequency, Ω.
    pub esr_ohm: f64,
    /// Equivalent series inductance, H.
    pub esl_h: f64,
    /// Ripple current rating of one capacitor, A rms.
    pub ripple_current_a: Option<f64>,
    /// How many in parallel.
    pub count: u32,
}

impl Capacitor {
    /// Half-width of the tolerance band.
    pub fn tolerance_or_default(&self) -> f64 {
        self.tolerance.map_or(self.default_tolerance(), |share| share.get())
    }

    fn default_tolerance(&self) -> f64 {
        match self.kind {
            CapacitorKind::Ceramic => CERAMIC_TOLERANCE,
            CapacitorKind::Polymer | CapacitorKind::Electrolytic => OTHER_TOLERANCE,
        }
    }

    /// Capacitance of one at this bias, F: linear between the given points, beyond the last one held, or for a ceramic
    /// falling by the bias law from there.
    pub fn capacitance_at_f(&self, bias_v: f64) -> f64 {
        let (last_v, last_f) = self.capacitance_f.last();
        if bias_v <= last_v || self.kind != CapacitorKind::Ceramic {
            return self.capacitance_f.linear_held(bias_v);
        }
        let share = |v: f64| 1.0 / (1.0 + CERAMIC_BIAS_LOSS * (v / self.voltage_rating_v.get()).powi(2));
        last_f * (share(bias_v) / share(last_v))
    }

    /// `count` of these in parallel at the bias voltages of their place.
    pub fn bank(&self, count: u32, frequency_hz: f64, biases_v: [f64; INPUTS]) -> Bank {
        let n = f64::from(count);
        Bank {
            capacitance_f: biases_v.map(|v| n * self.capacitance_at_f(v)),
            tolerance: self.tolerance_or_default(),
            esr_ohm: self.esr_ohm.log_log_held(frequency_hz) / n,
            esl_h: self.esl_h.map_or(0.0, |esl| esl.get()) / n,
            ripple_current_a: self.ripple_current_a.map(|current| current.get()),
            count,
        }
    }

    /// Every default that a stage with this capacitor in `slot` rests on; `highest_bias_v` is the greatest working voltage there.
    pub fn assumed(&self, slot: Slot, highest_bias_v: f64) -> Vec<Assumed> {
        let mut rows = Vec::new();
        let mut missing = |absent: bool, quantity, value: Option<f64>, unit, why| {
            if absent {
                rows.push(Assumed { slot, part: self.identity.part.clone(), quantity, value, unit, why });
            }
        };
        missing(self.tolerance.is_none(), "tolerance", Some(self.default_tolerance()), "", "usual for its kind");
        missing(
            self.kind == CapacitorKind::Ceramic && highest_bias_v > self.capacitance_f.last().0,
            "capacitance",
            Some(self.capacitance_at_f(highest_bias_v)),
            "F",
            "bias beyond the given points: falls as 1/(1 + 4 (V/rating)²)",
        );
        missing(self.esl_h.is_none(), "esl", Some(0.0), "H", "unknown: its ripple step is left out");
        missing(self.ripple_current_a.is_none(), "ripple_current", None, "A", "capacitor_current is not checked");
        rows
    }
}

impl Bank {
    /// Least capacitance at the `input`-th bias within tolerance, F.
    pub fn least_f(&self, input: usize) -> f64 {
        self.capacitance_f[input] * (1.0 - self.tolerance)
    }
}
