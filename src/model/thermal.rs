//! Temperatures at which a part gives off as much heat as it makes.

use crate::part::DiodeBank;

/// Above this no fixed point is looked for, °C: the part has run away.
pub const HIGHEST_C: f64 = 500.0;

/// The fixed point of T = Ta + Rth·(fixed + rising·(1 + coefficient·(T − 25))), °C; `None` where the loop gain
/// Rth·rising·coefficient reaches 1 or the point lies above [`HIGHEST_C`].
pub fn linear_c(
    ambient_c: f64,
    thermal_k_per_w: f64,
    fixed_w: f64,
    rising_w: f64,
    coefficient_per_k: f64,
) -> Option<f64> {
    let gain = thermal_k_per_w * rising_w * coefficient_per_k;
    if gain >= 1.0 {
        return None;
    }
    let fixed_point_c =
        (ambient_c + thermal_k_per_w * (fixed_w + rising_w * (1.0 - 25.0 * coefficient_per_k))) / (1.0 - gain);
    (fixed_point_c <= HIGHEST_C).then_some(fixed_point_c)
}

/// A diode's heat over its junction temperature.
#[derive(Debug, Clone, Copy)]
pub struct DiodeHeat<'a> {
    /// The bank: slope, leakage, thermal resistance.
    pub diode: &'a DiodeBank,
    /// Forward loss at 25 °C, W.
    pub forward25_w: f64,
    /// Mean forward current, A.
    pub mean_a: f64,
    /// Reverse voltage × its share of the period, V.
    pub reverse_v: f64,
}

impl DiodeHeat<'_> {
    /// The lowest fixed point at or above ambient, °C; `None` where there is none up to [`HIGHEST_C`].
    ///
    /// Heat minus cooling is convex in each span of the leakage, so Newton steps from below never pass the lowest root, and a
    /// step past the end of a span proves that the span holds none.
    pub fn fixed_point_c(&self, ambient_c: f64) -> Option<f64> {
        let rth = self.diode.thermal_k_per_w;
        let slope_w_per_k = self.mean_a * self.diode.slope_v_per_k;
        if self.diode.leakage.is_empty() {
            let gain = rth * slope_w_per_k;
            if gain >= 1.0 {
                return None;
            }
            let t = (ambient_c + rth * (self.forward25_w - 25.0 * slope_w_per_k)) / (1.0 - gain);
            return (t <= HIGHEST_C).then_some(t);
        }
        let mut t = ambient_c;
        for span in &self.diode.leakage {
            let end_c = span.up_to_c.min(HIGHEST_C);
            while t < end_c {
                let leakage_w = self.reverse_v * span.leakage_a(t);
                let heat_w = self.forward25_w + slope_w_per_k * (t - 25.0) + leakage_w;
                let excess_k = ambient_c + rth * heat_w - t;
                let slope = rth * (slope_w_per_k + leakage_w * span.growth_per_k) - 1.0;
                if slope >= 0.0 {
                    t = end_c;
                    break;
                }
                let step_k = -excess_k / slope;
                if step_k <= CLOSE_K {
                    return Some(t + step_k.max(0.0));
                }
                t = (t + step_k).min(end_c);
            }
        }
        None
    }
}

/// A Newton step so small that the fixed point is reached, K: well below the 1e-9 K that the model asks for.
const CLOSE_K: f64 = 1e-12;

/// Loss of a resistance that grows with temperature, W.
pub fn rising_w(at25_w: f64, coefficient_per_k: f64, temperature_c: f64) -> f64 {
    at25_w * (1.0 + coefficient_per_k * (temperature_c - 25.0))
}
