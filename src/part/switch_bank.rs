//! Equal switches in parallel at one gate supply: every figure the loss model needs of them.

use super::{Assumed, Curve, Slot, Switch};

/// Greatest number of input voltages at which a rail is judged.
pub const INPUTS: usize = 3;

/// Gate resistance where it is not given, Ω.
const DEFAULT_GATE_RESISTANCE_OHM: f64 = 1.0;
/// Temperature coefficient of the on-resistance where no hot ratio is given, 1/K: 1.5 at 125 °C.
const DEFAULT_COEFFICIENT_PER_K: f64 = 0.005;
/// Body diode drop where it is not given, V.
const DEFAULT_BODY_DROP_V: f64 = 0.8;
/// Recovery charge over gate-drain charge where it is not given.
const RECOVERY_OVER_MILLER: f64 = 1.5;
/// Gate-drain charge over post-threshold gate-source charge where no gate-source charge is given.
const MILLER_OVER_POST_THRESHOLD: f64 = 3.0;
/// Voltage of an output charge without one, V.
const OUTPUT_CHARGE_TEST_V: f64 = 12.0;
/// Junction limit where it is not given, °C.
pub(super) const DEFAULT_JUNCTION_LIMIT_C: f64 = 150.0;

/// The electrical surroundings that are the same for every switch of a rail.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Surroundings {
    /// Gate supply, V.
    pub gate_v: f64,
    /// Full load, A: the plateau current of a part that gives none.
    pub full_load_a: f64,
    /// Output voltage, V.
    pub output_v: f64,
    /// Input voltages ascending; unused places repeat the last.
    pub inputs_v: [f64; INPUTS],
}

/// `count` equal switches in parallel at one gate supply. Charges and conductances are of the whole bank.
#[derive(Debug, Clone, PartialEq)]
pub struct SwitchBank {
    /// On-resistance at 25 °C, Ω.
    pub r25_ohm: f64,
    /// The same with the greatest on-resistance where the catalog gives one, Ω.
    pub worst_r25_ohm: f64,
    /// Temperature coefficient of the on-resistance referred to 25 °C, 1/K.
    pub coefficient_per_k: f64,
    /// Gate charge at the gate supply, C.
    pub gate_charge_c: f64,
    /// Gate-drain charge, C.
    pub miller_charge_c: f64,
    /// Gate charge beyond the plateau, C.
    pub overdrive_charge_c: f64,
    /// Gate-source charge between threshold and plateau, C.
    pub post_threshold_charge_c: f64,
    /// Lowest gate voltage at which the on-resistance is given, V: below it there is none.
    pub lowest_gate_v: f64,
    /// Threshold, V.
    pub threshold_v: f64,
    /// Plateau, V.
    pub plateau_v: f64,
    /// Transconductance between threshold and plateau, S.
    pub transconductance_s: f64,
    /// Gate capacitance between threshold and plateau, F.
    pub gate_capacitance_f: f64,
    /// Internal gate resistance, Ω.
    pub gate_resistance_ohm: f64,
    /// Output charge at each input voltage, C.
    pub charge_at_input_c: [f64; INPUTS],
    /// Output charge at each input voltage less the output voltage, C.
    pub charge_at_swing_c: [f64; INPUTS],
    /// Recovery charge of the body diodes, C.
    pub recovery_c: f64,
    /// Body diode drop, V.
    pub body_drop_v: f64,
    /// Junction to ambient for the loss of the whole bank, K/W.
    pub thermal_k_per_w: f64,
    /// Junction limit, °C.
    pub junction_limit_c: f64,
    /// Current rating of one switch, A.
    pub current_rating_a: Option<f64>,
    /// How many in parallel.
    pub count: u32,
}

impl Switch {
    /// On-resistance at 25 °C and this gate voltage, Ω: linear in 1/V between the given points, held above and below.
    /// Below the lowest point the part is refused by its gate voltage limit.
    fn resistance_at_ohm(&self, gate_v: f64) -> f64 {
        self.on_resistance_ohm.reciprocal_held(gate_v)
    }

    /// Greatest on-resistance at 25 °C and this gate voltage, Ω; below the lowest gate voltage of its own column the
    /// typical value grows by the ratio known there.
    fn greatest_resistance_at_ohm(&self, gate_v: f64) -> f64 {
        let typical_ohm = self.resistance_at_ohm(gate_v);
        match &self.on_resistance_max_ohm {
            None => typical_ohm,
            Some(curve) => {
                let (lowest_v, lowest_ohm) = curve.first();
                if gate_v < lowest_v {
                    typical_ohm * lowest_ohm / self.resistance_at_ohm(lowest_v)
                } else {
                    curve.reciprocal_held(gate_v)
                }
            }
        }
    }

    /// Gate charge at this gate voltage, C.
    pub fn gate_charge_at_c(&self, gate_v: f64) -> f64 {
        if self.gate_charge_c.points().len() > 1 {
            return self.gate_charge_c.linear_extended(gate_v).max(0.0);
        }
        let (test_v, charge_c) = self.gate_charge_c.first();
        let plateau_v = self.gate_levels.plateau_v();
        match self.gate_source_charge_c {
            Some(source) if test_v > plateau_v => {
                let beyond_c = charge_c - source.get() - self.gate_drain_charge_c.get();
                (charge_c + beyond_c / (test_v - plateau_v) * (gate_v - test_v)).max(0.0)
            }
            _ => charge_c * gate_v / test_v,
        }
    }

    /// Gate-source charge between threshold and plateau, C.
    fn post_threshold_charge_c(&self) -> f64 {
        match self.gate_source_charge_c {
            Some(source) => source.get() * (1.0 - self.gate_levels.threshold_v() / self.gate_levels.plateau_v()),
            None => self.gate_drain_charge_c.get() / MILLER_OVER_POST_THRESHOLD,
        }
    }

    /// Gate charge beyond the plateau, C.
    fn overdrive_charge_c(&self, gate_v: f64) -> f64 {
        let source_c = self
            .gate_source_charge_c
            .map_or_else(|| MILLER_OVER_POST_THRESHOLD * self.post_threshold_charge_c(), |source| source.get());
        (self.gate_charge_at_c(gate_v) - self.gate_drain_charge_c.get() - source_c).max(0.0)
    }

    /// The lowest gate voltage at which the on-resistance is given, V.
    pub fn lowest_gate_v(&self) -> f64 {
        self.on_resistance_ohm.first().0
    }

    /// `count` of these in parallel.
    pub fn bank(&self, count: u32, at: &Surroundings) -> SwitchBank {
        let n = f64::from(count);
        let (threshold_v, plateau_v) = (self.gate_levels.threshold_v(), self.gate_levels.plateau_v());
        let plateau_current_a = self.plateau_current_a.map_or(at.full_load_a, |current| n * current.get());
        let given = self.output_charge_c.as_ref();
        let output_c = |v: f64| {
            n * match given {
                Some(curve) => charge_at_c(curve, v),
                None => self.gate_charge_at_c(at.gate_v) * root_of_ratio(v, OUTPUT_CHARGE_TEST_V),
            }
        };
        let gate_resistance_ohm = self.gate_resistance_ohm.map_or(DEFAULT_GATE_RESISTANCE_OHM, |r| r.get());
        let recovery_c = self
            .recovery_charge_c
            .map_or_else(|| RECOVERY_OVER_MILLER * self.gate_drain_charge_c.get(), |charge| charge.get());
        SwitchBank {
            r25_ohm: self.resistance_at_ohm(at.gate_v) / n,
            worst_r25_ohm: self.greatest_resistance_at_ohm(at.gate_v) / n,
            coefficient_per_k: self.hot_resistance.map_or(DEFAULT_COEFFICIENT_PER_K, |hot| hot.coefficient_per_k()),
            gate_charge_c: n * self.gate_charge_at_c(at.gate_v),
            miller_charge_c: n * self.gate_drain_charge_c.get(),
            overdrive_charge_c: n * self.overdrive_charge_c(at.gate_v),
            post_threshold_charge_c: n * self.post_threshold_charge_c(),
            lowest_gate_v: self.lowest_gate_v(),
            threshold_v,
            plateau_v,
            transconductance_s: plateau_current_a / (plateau_v - threshold_v),
            gate_capacitance_f: n * self.post_threshold_charge_c() / (plateau_v - threshold_v),
            gate_resistance_ohm: gate_resistance_ohm / n,
            charge_at_input_c: at.inputs_v.map(output_c),
            charge_at_swing_c: at.inputs_v.map(|v| output_c((v - at.output_v).max(0.0))),
            recovery_c: n * recovery_c,
            body_drop_v: self.body_diode_drop_v.map_or(DEFAULT_BODY_DROP_V, |v| v.get()),
            thermal_k_per_w: self.thermal_resistance_k_per_w.get() / n,
            junction_limit_c: self.junction_limit_c.unwrap_or(DEFAULT_JUNCTION_LIMIT_C),
            current_rating_a: self.current_rating_a.map(|current| current.get()),
            count,
        }
    }

    /// Every default that a stage with this switch in `slot` rests on.
    pub fn assumed(&self, slot: Slot, at: &Surroundings) -> Vec<Assumed> {
        let mut rows = Vec::new();
        let mut missing = |absent: bool, quantity, value: Option<f64>, unit, why| {
            if absent {
                rows.push(Assumed { slot, part: self.identity.part.clone(), quantity, value, unit, why });
            }
        };
        let levels = self.gate_levels;
        missing(
            !levels.threshold_given(),
            "threshold_voltage",
            Some(levels.threshold_v()),
            "V",
            "0.8 V below the plateau",
        );
        let plateau_why = if levels.threshold_given() { "0.8 V above the threshold" } else { "logic-level gate" };
        missing(!levels.plateau_given(), "plateau_voltage", Some(levels.plateau_v()), "V", plateau_why);
        missing(
            self.gate_source_charge_c.is_none(),
            "gate_source_charge",
            Some(MILLER_OVER_POST_THRESHOLD * self.post_threshold_charge_c()),
            "C",
            "as much as the gate-drain charge, a third of it beyond the threshold",
        );
        missing(
            self.plateau_current_a.is_none(),
            "plateau_current",
            Some(at.full_load_a),
            "A",
            "the plateau is taken at full load",
        );
        missing(
            self.gate_resistance_ohm.is_none(),
            "gate_resistance",
            Some(DEFAULT_GATE_RESISTANCE_OHM),
            "Ω",
            "usual size",
        );
        missing(
            self.output_charge_c.is_none(),
            "output_charge",
            Some(self.gate_charge_at_c(at.gate_v)),
            "C",
            "at 12 V, equal to the gate charge",
        );
        missing(self.hot_resistance.is_none(), "hot_resistance_ratio", Some(1.5), "", "at 125 °C");
        missing(self.junction_limit_c.is_none(), "junction_limit", Some(DEFAULT_JUNCTION_LIMIT_C), "°C", "usual limit");
        missing(self.current_rating_a.is_none(), "current_rating", None, "A", "switch_current is not checked");
        missing(self.gate_rating_v.is_none(), "gate_rating", None, "V", "the upper gate_voltage is not checked");
        if slot == Slot::Rectifier {
            missing(
                self.recovery_charge_c.is_none(),
                "recovery_charge",
                Some(RECOVERY_OVER_MILLER * self.gate_drain_charge_c.get()),
                "C",
                "1.5 times the gate-drain charge",
            );
            missing(
                self.body_diode_drop_v.is_none(),
                "body_diode_drop",
                Some(DEFAULT_BODY_DROP_V),
                "V",
                "silicon junction",
            );
        }
        rows
    }
}

impl SwitchBank {
    /// On-resistance at this junction temperature, Ω.
    pub fn resistance_ohm(&self, r25_ohm: f64, junction_c: f64) -> f64 {
        r25_ohm * (1.0 + self.coefficient_per_k * (junction_c - 25.0))
    }

    /// Gate voltage at which the channel carries `current_a`, V.
    pub fn plateau_at_v(&self, current_a: f64) -> f64 {
        self.threshold_v + current_a / self.transconductance_s
    }

    /// Time from the turn-off command to an open channel, s; the Miller charge counts where the drain moves at turn-off.
    pub fn turn_off_s(&self, pull_down_ohm: f64, gate_v: f64, drain_moves: bool) -> f64 {
        let middle_v = (self.threshold_v + self.plateau_v) / 2.0;
        let miller = if drain_moves { self.miller_charge_c / self.plateau_v } else { 0.0 };
        (pull_down_ohm + self.gate_resistance_ohm)
            * (2.0 * self.overdrive_charge_c / (gate_v + self.plateau_v)
                + miller
                + self.post_threshold_charge_c / middle_v)
    }
}

/// A charge at a voltage: straight between the given points in log-log, beyond them ∝ √V (capacitance ∝ V^−1/2).
pub(super) fn charge_at_c(curve: &Curve, v: f64) -> f64 {
    let ((lowest_v, lowest_c), (highest_v, highest_c)) = (curve.first(), curve.last());
    if v < lowest_v {
        lowest_c * root_of_ratio(v, lowest_v)
    } else if v > highest_v {
        highest_c * root_of_ratio(v, highest_v)
    } else {
        curve.log_log_held(v)
    }
}

fn root_of_ratio(v: f64, reference_v: f64) -> f64 {
    (v / reference_v).sqrt()
}
