//! The least loss of a high switch in a unit, and the hottest it can get.

use super::around::{Around, SHORT_OF_LIMIT};
use super::reach::{Flow, Reach};
use super::spread::{UNKNOWN_C, resistance_ohm};
use crate::model::high_switch::{Underdriven, overlap_j};
use crate::model::thermal::linear_c;
use crate::part::SwitchBank;

/// Heat that does not depend on the junction's temperature, and heat that does (at 25 °C), W.
#[derive(Debug, Clone, Copy)]
struct Heat {
    own_fixed_w: f64,
    /// What the rectifier adds: its share of the node's charge, and recovery.
    foreign_w: f64,
    rising25_w: f64,
}

/// Least weighted loss of a high switch with its gate charge, W; `None` when no stage of the unit with it passes.
/// Its share of the node's charge counts here, the rectifier's with the rectifier.
pub fn least_loss_w(bank: &SwitchBank, hottest_c: f64, around: &Around) -> Option<f64> {
    let limit_c = around.junction_limit_c(bank.junction_limit_c);
    let worst_ohm = resistance_ohm(bank, bank.worst_r25_ohm, around.conditions.ambient_c, limit_c.min(UNKNOWN_C));
    for reach in around.worst {
        let (_, least_c) = least_at(bank, bank.worst_r25_ohm, &Reach { high_ohm: worst_ohm, ..*reach }, around)?;
        if least_c * SHORT_OF_LIMIT > limit_c {
            return None;
        }
    }
    let ohm = resistance_ohm(bank, bank.r25_ohm, around.conditions.ambient_c, hottest_c);
    let mut sum_w = 0.0;
    for reach in around.weighed() {
        let (loss_w, _) = least_at(bank, bank.r25_ohm, &Reach { high_ohm: ohm, ..*reach }, around)?;
        let gate_w = bank.gate_charge_c * reach.frequency_hz * around.conditions.supply_v(reach.input_v);
        sum_w += reach.place.share * (loss_w + gate_w);
    }
    Some(sum_w)
}

/// No stage of the unit makes this switch hotter at any point with typical parts, °C.
pub fn hottest_c(bank: &SwitchBank, hottest_c: f64, around: &Around) -> f64 {
    let ohm = resistance_ohm(bank, bank.r25_ohm, around.conditions.ambient_c, hottest_c);
    let mut highest_c = around.conditions.ambient_c;
    for reach in around.every() {
        let flows = Reach { high_ohm: ohm, ..*reach }.flows();
        for (flow, continuous) in [(flows.continuous, true), (flows.discontinuous, false)] {
            let Some(flow) = flow else { continue };
            let heat = most(bank, reach, &flow, continuous, around);
            let fixed_w = heat.own_fixed_w + heat.foreign_w;
            let ambient_c = around.conditions.ambient_c;
            let (rising25_w, coefficient) = most_rising(heat.rising25_w, bank.coefficient_per_k, ambient_c);
            match linear_c(ambient_c, bank.thermal_k_per_w, fixed_w, rising25_w, coefficient) {
                Some(c) => highest_c = highest_c.max(c),
                None => return UNKNOWN_C,
            }
        }
    }
    highest_c
}

/// Least loss, W, and temperature, °C, at a point; `None` when it cannot run there.
fn least_at(bank: &SwitchBank, r25_ohm: f64, reach: &Reach, around: &Around) -> Option<(f64, f64)> {
    let flows = reach.flows();
    let ambient_c = around.conditions.ambient_c;
    let settle = |flow: Option<Flow>, continuous: bool| {
        let heat = least(bank, r25_ohm, reach, &flow?, continuous, around).ok()?;
        let fixed_w = heat.own_fixed_w + heat.foreign_w;
        // A resistance that falls with temperature is least at the hottest there is.
        let alpha = bank.coefficient_per_k;
        if alpha < 0.0 {
            let rising_w = heat.rising25_w * (1.0 + alpha * (UNKNOWN_C - 25.0));
            return Some((heat.own_fixed_w + rising_w, ambient_c));
        }
        let c = linear_c(ambient_c, bank.thermal_k_per_w, fixed_w, heat.rising25_w, alpha)?;
        Some((heat.own_fixed_w + heat.rising25_w * (1.0 + alpha * (c - 25.0)), c))
    };
    lesser(settle(flows.continuous, true), settle(flows.discontinuous, false))
}

/// Loss at 25 °C and temperature coefficient of a resistance that is nowhere less than one that falls with temperature: such a
/// one is greatest at ambient.
pub(super) fn most_rising(rising25_w: f64, coefficient_per_k: f64, ambient_c: f64) -> (f64, f64) {
    if coefficient_per_k < 0.0 {
        (rising25_w * (1.0 + coefficient_per_k * (ambient_c - 25.0)), 0.0)
    } else {
        (rising25_w, coefficient_per_k)
    }
}

/// The lesser of two alternatives in each figure.
pub(super) fn lesser(a: Option<(f64, f64)>, b: Option<(f64, f64)>) -> Option<(f64, f64)> {
    match (a, b) {
        (Some(a), Some(b)) => Some((a.0.min(b.0), a.1.min(b.1))),
        (one, other) => one.or(other),
    }
}

/// Least heat at a point in one mode.
fn least(
    bank: &SwitchBank,
    r25_ohm: f64,
    reach: &Reach,
    flow: &Flow,
    continuous: bool,
    around: &Around,
) -> Result<Heat, Underdriven> {
    let spread = around.spread;
    let (input, f, i) = (reach.place.input, reach.frequency_hz, reach.load_a);
    let own_c = bank.charge_at_input_c[input];
    let (valley_a, peak_a) =
        if continuous { (i - flow.ripple_a.hi / 2.0, i + flow.ripple_a.lo / 2.0) } else { (0.0, flow.ripple_a.lo) };
    let charge_c = spread.rectifier_at_input_c[input];
    // Turn-on grows with the node's charge and the valley, turn-off shrinks with the charge and grows with the peak.
    let (on_j, _) = overlap_j(bank, &around.drive(), reach.input_v, own_c + charge_c.lo, valley_a, valley_a.max(0.0))?;
    let (_, off_j) = overlap_j(bank, &around.drive(), reach.input_v, own_c + charge_c.hi, 0.0, peak_a)?;
    let (own_node_w, foreign_w) = if !continuous {
        let swing_v = reach.input_v - reach.output_v;
        (
            bank.charge_at_swing_c[input] / 3.0 * swing_v * f,
            2.0 * spread.rectifier_at_swing_c[input].lo / 3.0 * swing_v * f,
        )
    } else if around.choke_may_charge(reach, valley_a, own_c + charge_c.lo) {
        (0.0, 0.0)
    } else {
        let recovery_c = if valley_a >= 0.0 { spread.recovery_c.lo } else { 0.0 };
        (own_c / 3.0 * reach.input_v * f, (2.0 * charge_c.lo / 3.0 + recovery_c) * reach.input_v * f)
    };
    let ripple_a2 = flow.ripple_a.lo * flow.ripple_a.lo;
    let mean_a2 = if continuous { i * i + ripple_a2 / 12.0 } else { ripple_a2 / 3.0 };
    Ok(Heat { own_fixed_w: f * (on_j + off_j) + own_node_w, foreign_w, rising25_w: r25_ohm * flow.duty.lo * mean_a2 })
}

/// Greatest heat at a point in one mode.
fn most(bank: &SwitchBank, reach: &Reach, flow: &Flow, continuous: bool, around: &Around) -> Heat {
    let spread = around.spread;
    let (input, f, i) = (reach.place.input, reach.frequency_hz, reach.load_a);
    let own_c = bank.charge_at_input_c[input];
    let (valley_a, peak_a) =
        if continuous { (i - flow.ripple_a.lo / 2.0, i + flow.ripple_a.hi / 2.0) } else { (0.0, flow.ripple_a.hi) };
    let charge_c = spread.rectifier_at_input_c[input];
    let drive = around.drive();
    let (v, swing_v) = (reach.input_v, reach.input_v - reach.output_v);
    let edges_j = overlap_j(bank, &drive, v, own_c + charge_c.hi, valley_a, valley_a.max(0.0)).and_then(|(on_j, _)| {
        overlap_j(bank, &drive, v, own_c + charge_c.lo, 0.0, peak_a).map(|(_, off_j)| on_j + off_j)
    });
    let node_w = if continuous {
        (own_c / 3.0 + 2.0 * charge_c.hi / 3.0 + spread.recovery_c.hi) * v * f
    } else {
        (bank.charge_at_swing_c[input] / 3.0 + 2.0 * spread.rectifier_at_swing_c[input].hi / 3.0) * swing_v * f
    };
    let ripple_a2 = flow.ripple_a.hi * flow.ripple_a.hi;
    let mean_a2 = if continuous { i * i + ripple_a2 / 12.0 } else { ripple_a2 / 3.0 };
    Heat {
        // Underdriven at the greatest peak: nothing is known of the rest.
        own_fixed_w: edges_j.map_or(f64::INFINITY, |j| f * j),
        foreign_w: node_w,
        rising25_w: bank.r25_ohm * flow.duty.hi.min(1.0) * mean_a2,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_falling_resistance_is_greatest_at_ambient() {
        let at_w = |(rising25_w, coefficient): (f64, f64), t: f64| rising25_w * (1.0 + coefficient * (t - 25.0));
        for ambient_c in [-20.0, 60.0] {
            let most = most_rising(2.0, -0.001, ambient_c);
            for above_k in [0.0, 10.0, 100.0] {
                assert!(at_w(most, ambient_c + above_k) >= at_w((2.0, -0.001), ambient_c + above_k));
            }
        }
        assert_eq!(most_rising(2.0, 0.005, -20.0), (2.0, 0.005));
    }
}
