//! The temperature of a part is the first at which it gives off as much as it makes.

use wattsieve::model::thermal::{DiodeHeat, HIGHEST_C, linear_c};

use crate::draw::{Chance, each};

/// The first temperature, by small steps from ambient, at which the heat does not exceed the cooling.
fn first_root_c(ambient_c: f64, excess_k: impl Fn(f64) -> f64) -> Option<f64> {
    if excess_k(ambient_c) <= 0.0 {
        return Some(ambient_c);
    }
    const STEP_K: f64 = 0.02;
    let mut t = ambient_c;
    while t < HIGHEST_C {
        let next = t + STEP_K;
        if excess_k(next) <= 0.0 {
            let (mut lo, mut hi) = (t, next);
            for _ in 0..60 {
                let middle = (lo + hi) / 2.0;
                if excess_k(middle) > 0.0 { lo = middle } else { hi = middle }
            }
            return Some(hi);
        }
        t = next;
    }
    None
}

#[test]
fn a_diode_settles_at_its_lowest_root_or_runs_away() {
    let (mut settled, mut away) = (0, 0);
    each(7_000..7_300, 2, |problem, stage, seed| {
        let mut chance = Chance::new(seed + u64::from(stage.input_bank.count));
        let around = wattsieve::model::Conditions::of(&problem.rail).surroundings();
        let bank = problem.parts.diodes[chance.below(problem.parts.diodes.len())].bank(1, &around);
        let (mean_a, duty, v) = (chance.scale(0.1, 5.0), chance.scale(0.05, 0.9), chance.scale(5.0, 40.0));
        let heat = DiodeHeat { diode: &bank, forward25_w: mean_a * 0.4, mean_a, reverse_v: v * duty };
        let ambient_c = problem.rail.ambient_c;
        let excess_k = |t: f64| {
            let loss_w = heat.forward25_w + mean_a * bank.slope_v_per_k * (t - 25.0) + v * duty * bank.leakage_at_a(t);
            ambient_c + bank.thermal_k_per_w * loss_w - t
        };
        let expected = first_root_c(ambient_c, excess_k);
        // Roots nearer to each other than a step may be passed unseen.
        let least_k = (0..25_000).map(|k| excess_k(ambient_c + 0.02 * f64::from(k))).fold(f64::INFINITY, f64::min);
        match (heat.fixed_point_c(ambient_c), expected) {
            (Some(found), Some(expected)) if expected > ambient_c => {
                settled += 1;
                assert!((found - expected).abs() <= 1e-9 * expected.abs().max(1.0), "seed {seed} {found} {expected}");
            }
            (None, None) => away += 1,
            (found, expected) => {
                let tangent = least_k.abs() < 1e-3;
                let cooled = expected == Some(ambient_c);
                assert!(tangent || cooled, "seed {seed} {found:?} {expected:?} {least_k}");
            }
        }
    });
    assert!(settled > 200 && away > 20, "{settled} settled, {away} away");
}

#[test]
fn a_resistance_settles_at_its_root_or_runs_away() {
    let mut chance = Chance::new(70);
    let (mut settled, mut away) = (0, 0);
    for _ in 0..2_000 {
        let (ambient_c, rth) = (chance.scale(1.0, 90.0), chance.scale(1.0, 100.0));
        let (fixed_w, rising_w) = (chance.scale(0.01, 3.0), chance.scale(0.1, 20.0));
        let coefficient = chance.scale(0.001, 0.01) * if chance.unit() < 0.1 { -1.0 } else { 1.0 };
        let loss_w = |t: f64| fixed_w + rising_w * (1.0 + coefficient * (t - 25.0));
        match linear_c(ambient_c, rth, fixed_w, rising_w, coefficient) {
            Some(t) => {
                settled += 1;
                let gain = rth * rising_w * coefficient;
                assert!(gain < 1.0 && t <= HIGHEST_C);
                assert!((ambient_c + rth * loss_w(t) - t).abs() <= 1e-11 * t.abs().max(1.0) / (1.0 - gain).min(1.0));
            }
            None => {
                away += 1;
                assert!(ambient_c + rth * loss_w(HIGHEST_C) - HIGHEST_C > 0.0);
            }
        }
    }
    assert!(settled > 500 && away > 100, "{settled} settled, {away} away");
}
