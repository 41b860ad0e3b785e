//! A transistor as its catalog row describes it.

use super::{Curve, Identity};
use crate::quantity::{NonNegative, Positive};

/// Threshold and plateau voltage of a gate, consistent with each other.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct GateLevels {
    threshold_v: Option<f64>,
    plateau_v: Option<f64>,
}

/// What lies between threshold and plateau where only one of them is known, V (common practice).
pub const PLATEAU_OVER_THRESHOLD_V: f64 = 0.8;
/// Plateau voltage where neither is known, V.
pub const DEFAULT_PLATEAU_V: f64 = 2.5;

impl GateLevels {
    /// `None` unless the plateau lies above the threshold, and the threshold above zero.
    pub fn new(threshold_v: Option<Positive>, plateau_v: Option<Positive>) -> Option<Self> {
        let levels = Self { threshold_v: threshold_v.map(Positive::get), plateau_v: plateau_v.map(Positive::get) };
        (levels.threshold_v() > 0.0 && levels.plateau_v() > levels.threshold_v()).then_some(levels)
    }

    /// Plateau voltage, V; by default [`PLATEAU_OVER_THRESHOLD_V`] above the threshold, else [`DEFAULT_PLATEAU_V`].
    pub fn plateau_v(self) -> f64 {
        self.plateau_v.unwrap_or_else(|| self.threshold_v.map_or(DEFAULT_PLATEAU_V, |v| v + PLATEAU_OVER_THRESHOLD_V))
    }

    /// Threshold voltage, V; by default [`PLATEAU_OVER_THRESHOLD_V`] below the plateau.
    pub fn threshold_v(self) -> f64 {
        self.threshold_v.unwrap_or_else(|| self.plateau_v() - PLATEAU_OVER_THRESHOLD_V)
    }

    /// Whether the catalog gives the plateau.
    pub const fn plateau_given(self) -> bool {
        self.plateau_v.is_some()
    }

    /// Whether the catalog gives the threshold.
    pub const fn threshold_given(self) -> bool {
        self.threshold_v.is_some()
    }
}

/// Hot over cold on-resistance at one temperature above 25 °C.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct HotRatio {
    /// R(hot)/R(25 °C).
    pub ratio: Positive,
    temperature_c: f64,
}

impl HotRatio {
    /// `None` unless the temperature is finite and above 25 °C.
    pub fn new(ratio: Positive, temperature_c: f64) -> Option<Self> {
        (temperature_c.is_finite() && temperature_c > 25.0).then_some(Self { ratio, temperature_c })
    }

    /// Temperature coefficient α of the on-resistance, 1/K, referred to 25 °C.
    pub fn coefficient_per_k(self) -> f64 {
        (self.ratio.get() - 1.0) / (self.temperature_c - 25.0)
    }
}

/// A transistor. Curves hold positive values; the x of a gate curve is the gate voltage in V.
#[derive(Debug, Clone, PartialEq)]
pub struct Switch {
    /// Name, maker, price, size.
    pub identity: Identity,
    /// Drain-source rating, V.
    pub voltage_rating_v: Positive,
    /// On-resistance at 25 °C, Ω over gate voltage V.
    pub on_resistance_ohm: Curve,
    /// Greatest on-resistance at 25 °C, Ω over gate voltage V.
    pub on_resistance_max_ohm: Option<Curve>,
    /// Total gate charge, C over gate voltage V.
    pub gate_charge_c: Curve,
    /// Gate-drain (Miller) charge, C.
    pub gate_drain_charge_c: Positive,
    /// Gate-source charge up to the plateau, C.
    pub gate_source_charge_c: Option<Positive>,
    /// Threshold and plateau.
    pub gate_levels: GateLevels,
    /// Drain current of the gate-charge test, A.
    pub plateau_current_a: Option<Positive>,
    /// Internal gate resistance, Ω.
    pub gate_resistance_ohm: Option<NonNegative>,
    /// Output charge, C over drain voltage V.
    pub output_charge_c: Option<Curve>,
    /// Recovery charge of the body diode, C.
    pub recovery_charge_c: Option<NonNegative>,
    /// Body diode drop, V.
    pub body_diode_drop_v: Option<Positive>,
    /// Growth of the on-resistance with temperature.
    pub hot_resistance: Option<HotRatio>,
    /// Greatest drain current, A.
    pub current_rating_a: Option<Positive>,
    /// Greatest gate voltage, V.
    pub gate_rating_v: Option<Positive>,
    /// Greatest junction temperature, °C.
    pub junction_limit_c: Option<f64>,
    /// Junction to ambient, K/W.
    pub thermal_resistance_k_per_w: Positive,
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn gate_levels_fill_each_other() {
        let v = |value| Positive::new(value);
        let both = |t, p| GateLevels::new(t, p).map(|g| (g.threshold_v(), g.plateau_v()));
        assert_eq!(both(None, None), Some((1.7, 2.5)));
        assert_eq!(both(v(1.5), None), Some((1.5, 2.3)));
        assert_eq!(both(None, v(3.0)), Some((2.2, 3.0)));
        assert_eq!(both(v(2.0), v(2.0)), None);
        assert_eq!(both(None, v(0.5)), None);
    }
}
