//! Equal diodes in parallel: every figure the loss model needs of them.

use super::switch_bank::{DEFAULT_JUNCTION_LIMIT_C, INPUTS, Surroundings, charge_at_c};
use super::{Assumed, Curve, Diode, DiodeKind, Slot};

/// Change of a Schottky drop with temperature where it is not given, V/K.
const SCHOTTKY_SLOPE_V_PER_K: f64 = -0.001;
/// The same for silicon, V/K.
const SILICON_SLOPE_V_PER_K: f64 = -0.002;
/// Rise that doubles a leakage of which only one point is known, K.
const LEAKAGE_DOUBLING_K: f64 = 10.0;

/// A straight piece of the forward characteristic of a bank at 25 °C.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ForwardSpan {
    /// Bank current up to which the piece holds, A; infinite for the last.
    pub up_to_a: f64,
    /// Drop extended to no current, V.
    pub threshold_v: f64,
    /// Slope resistance of the bank, Ω.
    pub resistance_ohm: f64,
}

/// A piece of ln(leakage) over temperature.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LeakageSpan {
    /// Temperature up to which the piece holds, °C; infinite for the last.
    pub up_to_c: f64,
    /// ln of the bank's leakage at 0 °C.
    pub log_at_zero: f64,
    /// Growth of the logarithm, 1/K.
    pub growth_per_k: f64,
}

impl LeakageSpan {
    /// Leakage, A.
    pub fn leakage_a(&self, junction_c: f64) -> f64 {
        (self.log_at_zero + self.growth_per_k * junction_c).exp()
    }
}

/// `count` equal diodes in parallel, each carrying an equal share.
#[derive(Debug, Clone, PartialEq)]
pub struct DiodeBank {
    /// Forward characteristic, ascending in current.
    pub forward: Vec<ForwardSpan>,
    /// Change of the drop with temperature, V/K.
    pub slope_v_per_k: f64,
    /// Leakage of the bank, ascending in temperature; empty where it is unknown.
    pub leakage: Vec<LeakageSpan>,
    /// Junction charge at each input voltage, C.
    pub charge_at_input_c: [f64; INPUTS],
    /// Junction charge at each input voltage less the output voltage, C.
    pub charge_at_swing_c: [f64; INPUTS],
    /// Recovery charge, C.
    pub recovery_c: f64,
    /// Junction to ambient for the loss of the whole bank, K/W.
    pub thermal_k_per_w: f64,
    /// Junction limit, °C.
    pub junction_limit_c: f64,
    /// Mean current rating of one diode, A.
    pub current_rating_a: f64,
    /// How many in parallel.
    pub count: u32,
}

impl Diode {
    fn slope_v_per_k(&self) -> f64 {
        self.drop_slope_v_per_k.unwrap_or(match self.kind {
            DiodeKind::Schottky => SCHOTTKY_SLOPE_V_PER_K,
            DiodeKind::Silicon => SILICON_SLOPE_V_PER_K,
        })
    }

    /// `count` of these in parallel.
    pub fn bank(&self, count: u32, at: &Surroundings) -> DiodeBank {
        let n = f64::from(count);
        let junction_c = |v: f64| self.junction_charge_c.as_ref().map_or(0.0, |curve| n * charge_at_c(curve, v));
        DiodeBank {
            forward: forward_spans(&self.forward_drop_v, n),
            slope_v_per_k: self.slope_v_per_k(),
            leakage: self.leakage_a.as_ref().map_or_else(Vec::new, |curve| leakage_spans(curve, n)),
            charge_at_input_c: at.inputs_v.map(junction_c),
            charge_at_swing_c: at.inputs_v.map(|v| junction_c((v - at.output_v).max(0.0))),
            recovery_c: self.recovery_charge_c.map_or(0.0, |charge| n * charge.get()),
            thermal_k_per_w: self.thermal_resistance_k_per_w.get() / n,
            junction_limit_c: self.junction_limit_c.unwrap_or(DEFAULT_JUNCTION_LIMIT_C),
            current_rating_a: self.current_rating_a.get(),
            count,
        }
    }

    /// Every default that a stage with this rectifier rests on.
    pub fn assumed(&self) -> Vec<Assumed> {
        let mut rows = Vec::new();
        let mut missing = |absent: bool, quantity, value: Option<f64>, unit, why| {
            if absent {
                let part = self.identity.part.clone();
                rows.push(Assumed { slot: Slot::Rectifier, part, quantity, value, unit, why });
            }
        };
        let kind = match self.kind {
            DiodeKind::Schottky => "usual for a Schottky diode",
            DiodeKind::Silicon => "usual for a silicon diode",
        };
        missing(self.drop_slope_v_per_k.is_none(), "drop_slope", Some(self.slope_v_per_k()), "V/K", kind);
        missing(self.leakage_a.is_none(), "leakage", Some(0.0), "A", "unknown: thermal runaway is not checked");
        missing(self.junction_charge_c.is_none(), "junction_charge", Some(0.0), "C", "unknown: its loss is left out");
        missing(self.recovery_charge_c.is_none(), "recovery_charge", Some(0.0), "C", "a Schottky diode stores none");
        missing(self.junction_limit_c.is_none(), "junction_limit", Some(DEFAULT_JUNCTION_LIMIT_C), "°C", "usual limit");
        rows
    }
}

impl DiodeBank {
    /// The piece of the forward characteristic at this bank current.
    pub fn forward_at(&self, current_a: f64) -> ForwardSpan {
        let last = self.forward.len() - 1;
        self.forward[..last].iter().find(|span| current_a <= span.up_to_a).copied().unwrap_or(self.forward[last])
    }

    /// Leakage of the bank, A.
    pub fn leakage_at_a(&self, junction_c: f64) -> f64 {
        self.leakage
            .iter()
            .find(|span| junction_c <= span.up_to_c)
            .or(self.leakage.last())
            .map_or(0.0, |span| span.leakage_a(junction_c))
    }
}

fn forward_spans(drops: &Curve, n: f64) -> Vec<ForwardSpan> {
    let points = drops.points();
    if let [(_, drop_v)] = *points {
        return vec![ForwardSpan { up_to_a: f64::INFINITY, threshold_v: drop_v, resistance_ohm: 0.0 }];
    }
    let last = points.len() - 2;
    points
        .windows(2)
        .enumerate()
        .map(|(k, pair)| {
            let resistance_ohm = (pair[1].1 - pair[0].1) / (pair[1].0 - pair[0].0);
            ForwardSpan {
                up_to_a: if k == last { f64::INFINITY } else { n * pair[1].0 },
                threshold_v: pair[0].1 - resistance_ohm * pair[0].0,
                resistance_ohm: resistance_ohm / n,
            }
        })
        .collect()
}

fn leakage_spans(leakage: &Curve, n: f64) -> Vec<LeakageSpan> {
    let points = leakage.points();
    if let [(at_c, leakage_a)] = *points {
        let growth_per_k = std::f64::consts::LN_2 / LEAKAGE_DOUBLING_K;
        let log_at_zero = (n * leakage_a).ln() - growth_per_k * at_c;
        return vec![LeakageSpan { up_to_c: f64::INFINITY, log_at_zero, growth_per_k }];
    }
    let last = points.len() - 2;
    points
        .windows(2)
        .enumerate()
        .map(|(k, pair)| {
            let growth_per_k = (pair[1].1.ln() - pair[0].1.ln()) / (pair[1].0 - pair[0].0);
            LeakageSpan {
                up_to_c: if k == last { f64::INFINITY } else { pair[1].0 },
                log_at_zero: (n * pair[0].1).ln() - growth_per_k * pair[0].0,
                growth_per_k,
            }
        })
        .collect()
}
