//! A capacitor as its catalog row describes it.

use super::{Curve, Identity};
use crate::quantity::{NonNegative, Positive, Share};

/// What the dielectric is.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum CapacitorKind {
    /// Ceramic of class II or III: loses capacitance with bias.
    Ceramic,
    /// Conductive polymer.
    Polymer,
    /// Aluminium electrolytic.
    Electrolytic,
}

impl CapacitorKind {
    /// The name in files and on screens.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Ceramic => "ceramic",
            Self::Polymer => "polymer",
            Self::Electrolytic => "electrolytic",
        }
    }
}

/// A capacitor.
#[derive(Debug, Clone, PartialEq)]
pub struct Capacitor {
    /// Name, maker, price, size.
    pub identity: Identity,
    /// Kind of dielectric.
    pub kind: CapacitorKind,
    /// Capacitance, F over bias V; positive.
    pub capacitance_f: Curve,
    /// Half-width of the tolerance band.
    pub tolerance: Option<Share>,
    /// Rated voltage, V.
    pub voltage_rating_v: Positive,
    /// Equivalent series resistance, Ω over frequency Hz; positive.
    pub esr_ohm: Curve,
    /// Equivalent series inductance, H.
    pub esl_h: Option<NonNegative>,
    /// Greatest ripple current, A rms.
    pub ripple_current_a: Option<Positive>,
}
