//! An inductor as its catalog row describes it.

use super::{Curve, Identity};
use crate::quantity::{Positive, Share};

/// One measured core loss point, and the exponents of the Steinmetz law through it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CoreDatum {
    /// Loss at the point, W.
    pub loss_w: Positive,
    /// Frequency of the point, Hz.
    pub frequency_hz: Positive,
    /// Ripple of the point, A peak to peak.
    pub ripple_a: Positive,
    /// Exponent of frequency.
    pub alpha: Option<Positive>,
    /// Exponent of ripple.
    pub beta: Option<Positive>,
}

/// A direct current and the temperature rise it causes.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Heating {
    /// The current, A.
    pub current_a: Positive,
    /// The rise, K.
    pub rise_k: Option<Positive>,
}

/// An inductor.
#[derive(Debug, Clone, PartialEq)]
pub struct Inductor {
    /// Name, maker, price, size.
    pub identity: Identity,
    /// Inductance, H over current A; positive.
    pub inductance_h: Curve,
    /// Half-width of the tolerance band.
    pub tolerance: Option<Share>,
    /// Winding resistance at 25 °C, Ω.
    pub dcr_ohm: Positive,
    /// Greatest winding resistance at 25 °C, Ω.
    pub dcr_max_ohm: Option<Positive>,
    /// Saturation current, A over winding temperature °C; positive.
    pub saturation_current_a: Curve,
    /// Heating current.
    pub heating: Option<Heating>,
    /// Core loss.
    pub core: Option<CoreDatum>,
    /// Winding resistance at 25 °C for alternating current, Ω over frequency Hz; positive.
    pub ac_resistance_ohm: Option<Curve>,
}
