//! A diode as its catalog row describes it.

use super::{Curve, Identity};
use crate::quantity::{NonNegative, Positive};

/// What the junction is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum DiodeKind {
    /// Metal to semiconductor: no stored charge to speak of.
    Schottky,
    /// A p-n junction: without a recovery charge it cannot be judged.
    Silicon,
}

/// A diode.
#[derive(Debug, Clone, PartialEq)]
pub struct Diode {
    /// Name, maker, price, size.
    pub identity: Identity,
    /// Kind of junction.
    pub kind: DiodeKind,
    /// Repetitive reverse voltage, V.
    pub voltage_rating_v: Positive,
    /// Mean forward current, A.
    pub current_rating_a: Positive,
    /// Forward drop at 25 °C, V over current A; positive.
    pub forward_drop_v: Curve,
    /// Change of the drop with temperature, V/K.
    pub drop_slope_v_per_k: Option<f64>,
    /// Reverse leakage, A over junction temperature °C; positive.
    pub leakage_a: Option<Curve>,
    /// Junction charge, C over reverse voltage V; positive.
    pub junction_charge_c: Option<Curve>,
    /// Recovery charge, C.
    pub recovery_charge_c: Option<NonNegative>,
    /// Greatest junction temperature, °C.
    pub junction_limit_c: Option<f64>,
    /// Junction to ambient, K/W.
    pub thermal_resistance_k_per_w: Positive,
}
