//! An inductor at one switching frequency: every figure the loss model needs of it.

use super::{Assumed, Curve, Inductor, Slot};

/// Temperature coefficient of copper referred to 25 °C, 1/K: 0.393 %/K at 20 °C (IEC 60028).
pub const COPPER_PER_K: f64 = 0.003_854;
/// Tolerance where it is not given.
const DEFAULT_TOLERANCE: f64 = 0.2;
/// Rise that a heating current stands for where it is not given, K.
const DEFAULT_HEATING_RISE_K: f64 = 40.0;
/// Winding to ambient where no heating current is given, K/W.
const DEFAULT_THERMAL_K_PER_W: f64 = 40.0;
/// Steinmetz exponent of frequency where it is not given.
const DEFAULT_ALPHA: f64 = 1.4;
/// Steinmetz exponent of ripple where it is not given.
const DEFAULT_BETA: f64 = 2.4;

/// The core's law at one frequency: P = `scale`·ΔI^β·(D1^(1−α) + D2^(1−α)).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct CoreLaw {
    /// W/A^β.
    pub scale: f64,
    /// Exponent of the intervals' shares, 1 − α.
    pub interval_exponent: f64,
    /// Exponent of ripple.
    pub beta: f64,
}

/// An inductor at one switching frequency.
#[derive(Debug, Clone, PartialEq)]
pub struct Choke {
    /// Inductance at each load of the rail, H.
    pub inductance_h: Vec<f64>,
    /// Half-width of the tolerance band.
    pub tolerance: f64,
    /// Winding resistance at 25 °C, Ω.
    pub dcr25_ohm: f64,
    /// The same with the greatest resistance where the catalog gives one, Ω.
    pub worst_dcr25_ohm: f64,
    /// Winding resistance to the ripple current at 25 °C, Ω.
    pub rac25_ohm: f64,
    /// The same with the greatest resistance, Ω.
    pub worst_rac25_ohm: f64,
    /// Winding to ambient, K/W.
    pub thermal_k_per_w: f64,
    /// Core loss; `None` where it is unknown.
    pub core: Option<CoreLaw>,
    /// Saturation current, A over winding temperature °C.
    pub saturation_a: Curve,
}

impl Inductor {
    /// Half-width of the tolerance band.
    pub fn tolerance_or_default(&self) -> f64 {
        self.tolerance.map_or(DEFAULT_TOLERANCE, |share| share.get())
    }

    /// Winding resistance to a sine of this frequency at 25 °C, Ω: log-log through the given points, held below them,
    /// ∝ √f above (skin effect), never below the direct-current value `dcr_ohm`.
    fn ac_resistance_at_ohm(&self, frequency_hz: f64, dcr_ohm: f64) -> f64 {
        self.ac_resistance_ohm.as_ref().map_or(dcr_ohm, |curve| {
            let (highest_hz, highest_ohm) = curve.last();
            let measured_ohm = if frequency_hz > highest_hz {
                highest_ohm * (frequency_hz / highest_hz).sqrt()
            } else {
                curve.log_log_held(frequency_hz)
            };
            measured_ohm.max(dcr_ohm)
        })
    }

    /// Winding to ambient, K/W: the heating current's rise over the loss of the hot winding at that current.
    pub fn thermal_k_per_w(&self) -> f64 {
        self.heating.map_or(DEFAULT_THERMAL_K_PER_W, |heating| {
            let rise_k = heating.rise_k.map_or(DEFAULT_HEATING_RISE_K, |rise| rise.get());
            let current_a = heating.current_a.get();
            rise_k / (current_a * current_a * self.dcr_ohm.get() * (1.0 + COPPER_PER_K * rise_k))
        })
    }

    /// This inductor at a frequency and at the loads of a rail.
    pub fn choke(&self, frequency_hz: f64, loads_a: impl Iterator<Item = f64>) -> Choke {
        let dcr25_ohm = self.dcr_ohm.get();
        let worst_dcr25_ohm = self.dcr_max_ohm.map_or(dcr25_ohm, |dcr| dcr.get());
        let core = self.core.map(|datum| {
            let alpha = datum.alpha.map_or(DEFAULT_ALPHA, |a| a.get());
            let beta = datum.beta.map_or(DEFAULT_BETA, |b| b.get());
            let scale = datum.loss_w.get() * (frequency_hz / datum.frequency_hz.get()).powf(alpha)
                / (datum.ripple_a.get().powf(beta) * 2f64.powf(alpha));
            CoreLaw { scale, interval_exponent: 1.0 - alpha, beta }
        });
        Choke {
            inductance_h: loads_a.map(|load_a| self.inductance_h.linear_held(load_a)).collect(),
            tolerance: self.tolerance_or_default(),
            dcr25_ohm,
            worst_dcr25_ohm,
            rac25_ohm: self.ac_resistance_at_ohm(frequency_hz, dcr25_ohm),
            worst_rac25_ohm: self.ac_resistance_at_ohm(frequency_hz, worst_dcr25_ohm),
            thermal_k_per_w: self.thermal_k_per_w(),
            core,
            saturation_a: self.saturation_current_a.clone(),
        }
    }

    /// Every default that a stage with this inductor rests on.
    pub fn assumed(&self) -> Vec<Assumed> {
        let mut rows = Vec::new();
        let mut missing = |absent: bool, quantity, value: Option<f64>, unit, why| {
            if absent {
                let part = self.identity.part.clone();
                rows.push(Assumed { slot: Slot::Inductor, part, quantity, value, unit, why });
            }
        };
        missing(self.tolerance.is_none(), "tolerance", Some(DEFAULT_TOLERANCE), "", "usual for a power inductor");
        match &self.heating {
            None => missing(true, "heating_current", None, "A", "winding to ambient taken as 40 K/W"),
            Some(heating) => missing(
                heating.rise_k.is_none(),
                "heating_rise",
                Some(DEFAULT_HEATING_RISE_K),
                "K",
                "usual definition of a heating current",
            ),
        }
        match &self.core {
            None => missing(true, "core_loss", Some(0.0), "W", "unknown: the core loss is left out"),
            Some(core) => {
                missing(core.alpha.is_none(), "core_alpha", Some(DEFAULT_ALPHA), "", "usual for a power ferrite");
                missing(core.beta.is_none(), "core_beta", Some(DEFAULT_BETA), "", "usual for a power ferrite");
            }
        }
        missing(
            self.ac_resistance_ohm.is_none(),
            "ac_resistance",
            Some(self.dcr_ohm.get()),
            "Ω",
            "equal to the direct-current resistance",
        );
        rows
    }
}

impl Choke {
    /// A resistance of the winding at this winding temperature, Ω.
    pub fn hot_ohm(r25_ohm: f64, winding_c: f64) -> f64 {
        r25_ohm * (1.0 + COPPER_PER_K * (winding_c - 25.0))
    }
}

impl CoreLaw {
    /// Core loss, W, of a triangular ripple rising for `rise` and falling for `fall` of the period: the improved
    /// generalised Steinmetz equation (Venkatachalam, Sullivan, Abdallah, Tacca 2002) referred to a datum at equal intervals.
    pub fn loss_w(&self, ripple_a: f64, rise: f64, fall: f64) -> f64 {
        self.scale * ripple_a.powf(self.beta) * (rise.powf(self.interval_exponent) + fall.powf(self.interval_exponent))
    }
}
