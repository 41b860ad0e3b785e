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

#[cfg(test)]
mod tests {
    use super::*;
    use crate::part::diode_bank::LeakageSpan;
    use approx::assert_relative_eq;

    // onsemi AND90146/D Rev 1, Tables 3 to 5: 0.504 W at 25 °C, 51 K/W; the source prints 175 °C at 127.5 °C ambient.
    #[test]
    fn linear_vector() {
        let t = |ambient_c| linear_c(ambient_c, 51.0, 0.0, 0.504, 0.005_666_7).expect("a fixed point");
        assert_relative_eq!(t(127.5), 175.061, max_relative = 1e-5);
        assert_relative_eq!(t(24.0), 53.916, max_relative = 1e-5);
    }

    #[test]
    fn no_fixed_point_is_runaway() {
        assert_eq!(linear_c(55.0, 60.0, 0.5, 4.0, 0.0055), None);
        assert_eq!(linear_c(55.0, 10.0, 45.0, 0.0, 0.005), None, "beyond the highest temperature");
    }

    fn leaky(leakage_at_25_a: f64) -> DiodeBank {
        let growth_per_k = std::f64::consts::LN_2 / 10.0;
        DiodeBank {
            forward: vec![],
            slope_v_per_k: -0.001,
            leakage: vec![LeakageSpan {
                up_to_c: f64::INFINITY,
                log_at_zero: leakage_at_25_a.ln() - growth_per_k * 25.0,
                growth_per_k,
            }],
            charge_at_input_c: [0.0; 3],
            charge_at_swing_c: [0.0; 3],
            recovery_c: 0.0,
            thermal_k_per_w: 40.0,
            junction_limit_c: 150.0,
            current_rating_a: 1.0,
            count: 1,
        }
    }

    // Reference case T06, solved by scan and Brent's method (scipy): root 90.6877861, next root 142.392854.
    #[test]
    fn the_lowest_of_two_roots_is_found() {
        let diode = leaky(2e-5);
        let heat =
            DiodeHeat { diode: &diode, forward25_w: 2.0 * 0.35 + 2.3 * 2.3 * 0.03, mean_a: 2.0, reverse_v: 30.0 * 0.7 };
        let t = heat.fixed_point_c(60.0).expect("a fixed point");
        assert_relative_eq!(t, 90.687_786_1, max_relative = 1e-8);
    }

    #[test]
    fn enough_leakage_runs_away() {
        let diode = leaky(2e-3);
        let heat = DiodeHeat { diode: &diode, forward25_w: 0.7, mean_a: 2.0, reverse_v: 21.0 };
        assert_eq!(heat.fixed_point_c(60.0), None);
    }
}
