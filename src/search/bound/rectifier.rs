//! The least loss of a rectifier in a unit, with what it costs the high switch, and the hottest it can get.

use super::around::{Around, SHORT_OF_LIMIT};
use super::high::{lesser, most_rising};
use super::reach::{Flow, Reach};
use super::span::Span;
use super::spread::{UNKNOWN_C, diode_drop_v, resistance_ohm, temperature_shift_v};
use crate::model::drive::rectifier_gate_c;
use crate::model::thermal::{DiodeHeat, linear_c};
use crate::part::diode_bank::ForwardSpan;
use crate::part::{DiodeBank, INPUTS, SwitchBank};

/// Charges of a rectifier.
struct Charges<'a> {
    at_input_c: &'a [f64; INPUTS],
    at_swing_c: &'a [f64; INPUTS],
    recovery_c: f64,
}

/// Least loss of the high switch by the rectifier's charges, W.
fn foreign_w(charges: &Charges, reach: &Reach, flow: &Flow, continuous: bool, around: &Around) -> f64 {
    let (input, f) = (reach.place.input, reach.frequency_hz);
    if !continuous {
        return 2.0 * charges.at_swing_c[input] / 3.0 * (reach.input_v - reach.output_v) * f;
    }
    let valley_a = reach.load_a - flow.ripple_a.hi / 2.0;
    let node_lo_c = around.spread.high_at_input_c[input].lo + charges.at_input_c[input];
    if around.choke_may_charge(reach, valley_a, node_lo_c) {
        return 0.0;
    }
    let recovery_c = if valley_a >= 0.0 { charges.recovery_c } else { 0.0 };
    (2.0 * charges.at_input_c[input] / 3.0 + recovery_c) * reach.input_v * f
}

/// Mean square current of the rectifier, A².
fn mean_square_a2(reach: &Reach, flow: &Flow, continuous: bool) -> Span {
    let square = |ripple_a: f64| ripple_a * ripple_a;
    if continuous {
        let i2 = reach.load_a * reach.load_a;
        Span {
            lo: (flow.fall.lo - reach.dead_share).max(0.0) * (i2 + square(flow.ripple_a.lo) / 12.0),
            hi: (flow.fall.hi - reach.dead_share).max(0.0) * (i2 + square(flow.ripple_a.hi) / 12.0),
        }
    } else {
        Span { lo: square(flow.ripple_a.lo) / 3.0 * flow.fall.lo, hi: square(flow.ripple_a.hi) / 3.0 * flow.fall.hi }
    }
}

/// Mean current of a diode, A.
fn mean_a(reach: &Reach, flow: &Flow, continuous: bool) -> Span {
    if continuous {
        Span { lo: flow.fall.lo * reach.load_a, hi: flow.fall.hi * reach.load_a }
    } else {
        Span { lo: flow.ripple_a.lo * flow.fall.lo / 2.0, hi: flow.ripple_a.hi * flow.fall.hi / 2.0 }
    }
}

/// Least weighted loss of a switch rectifier, with its gate charge and what its charges cost the high switch, W; `None` when no
/// stage of the unit with it passes.
pub fn least_switch_w(bank: &SwitchBank, hottest_c: f64, around: &Around) -> Option<f64> {
    let limit_c = around.junction_limit_c(bank.junction_limit_c);
    let ambient_c = around.conditions.ambient_c;
    for reach in around.worst {
        let ohm = resistance_ohm(bank, bank.worst_r25_ohm, ambient_c, limit_c.min(UNKNOWN_C));
        let (_, least_c) = least_switch_at(bank, bank.worst_r25_ohm, &of_switch(bank, ohm, reach), around)?;
        if least_c * SHORT_OF_LIMIT > limit_c {
            return None;
        }
    }
    let ohm = resistance_ohm(bank, bank.r25_ohm, ambient_c, hottest_c);
    let charges = switch_charges(bank);
    let mut sum_w = 0.0;
    for reach in around.weighed() {
        let reach = &of_switch(bank, ohm, reach);
        let (own_w, _) = least_switch_at(bank, bank.r25_ohm, reach, around)?;
        let gate_w = rectifier_gate_c(bank) * reach.frequency_hz * around.conditions.supply_v(reach.input_v);
        sum_w += reach.place.share * (own_w + gate_w + least_foreign_w(&charges, reach, around));
    }
    Some(sum_w)
}

fn switch_charges(bank: &SwitchBank) -> Charges<'_> {
    Charges { at_input_c: &bank.charge_at_input_c, at_swing_c: &bank.charge_at_swing_c, recovery_c: bank.recovery_c }
}

fn least_foreign_w(charges: &Charges, reach: &Reach, around: &Around) -> f64 {
    let flows = reach.flows();
    let of = |flow: Option<Flow>, continuous| flow.map(|flow| foreign_w(charges, reach, &flow, continuous, around));
    match (of(flows.continuous, true), of(flows.discontinuous, false)) {
        (Some(a), Some(b)) => a.min(b),
        (one, other) => one.or(other).unwrap_or(0.0),
    }
}

fn of_switch(bank: &SwitchBank, ohm: Span, reach: &Reach) -> Reach {
    Reach {
        drop_v: Span { lo: ohm.lo * reach.load_a, hi: ohm.hi * reach.load_a },
        slope_ohm: ohm,
        body_v: Span::at(bank.body_drop_v),
        ..*reach
    }
}

fn least_switch_at(bank: &SwitchBank, r25_ohm: f64, reach: &Reach, around: &Around) -> Option<(f64, f64)> {
    let flows = reach.flows();
    let ambient_c = around.conditions.ambient_c;
    let settle = |flow: Option<Flow>, continuous: bool| {
        let flow = flow?;
        // Peak and magnitude of the valley add up to twice the load, or to the ripple where the current reverses.
        let carried_a = if continuous { (2.0 * reach.load_a).max(flow.ripple_a.lo) } else { flow.ripple_a.lo };
        let dead_w = bank.body_drop_v * around.conditions.dead_time_s * reach.frequency_hz * carried_a;
        let rising25_w = r25_ohm * mean_square_a2(reach, &flow, continuous).lo;
        let alpha = bank.coefficient_per_k;
        if alpha < 0.0 {
            return Some((dead_w + rising25_w * (1.0 + alpha * (UNKNOWN_C - 25.0)), ambient_c));
        }
        let c = linear_c(ambient_c, bank.thermal_k_per_w, dead_w, rising25_w, alpha)?;
        Some((dead_w + rising25_w * (1.0 + alpha * (c - 25.0)), c))
    };
    lesser(settle(flows.continuous, true), settle(flows.discontinuous, false))
}

/// No stage of the unit makes this switch rectifier hotter at any point with typical parts, °C.
pub fn hottest_switch_c(bank: &SwitchBank, hottest_c: f64, around: &Around) -> f64 {
    let ambient_c = around.conditions.ambient_c;
    let ohm = resistance_ohm(bank, bank.r25_ohm, ambient_c, hottest_c);
    let mut highest_c = ambient_c;
    for reach in around.every() {
        let reach = &of_switch(bank, ohm, reach);
        let flows = reach.flows();
        for (flow, continuous) in [(flows.continuous, true), (flows.discontinuous, false)] {
            let Some(flow) = flow else { continue };
            let carried_a = if continuous { (2.0 * reach.load_a).max(flow.ripple_a.hi) } else { flow.ripple_a.hi };
            let dead_w = bank.body_drop_v * around.conditions.dead_time_s * reach.frequency_hz * carried_a;
            let rising25_w = bank.r25_ohm * mean_square_a2(reach, &flow, continuous).hi;
            let (rising25_w, alpha) = most_rising(rising25_w, bank.coefficient_per_k, ambient_c);
            match linear_c(ambient_c, bank.thermal_k_per_w, dead_w, rising25_w, alpha) {
                Some(c) => highest_c = highest_c.max(c),
                None => return UNKNOWN_C,
            }
        }
    }
    highest_c
}

/// Least weighted loss of a diode, with what its charges cost the high switch, W; `None` when no stage of the unit with it passes.
pub fn least_diode_w(bank: &DiodeBank, hottest_c: f64, around: &Around) -> Option<f64> {
    let limit_c = around.junction_limit_c(bank.junction_limit_c);
    for reach in around.worst {
        let reach = &of_diode(bank, limit_c.min(UNKNOWN_C), reach, around);
        let (_, least_c) = least_diode_at(bank, limit_c.min(UNKNOWN_C), reach, around)?;
        if least_c * SHORT_OF_LIMIT > limit_c {
            return None;
        }
    }
    let charges = Charges {
        at_input_c: &bank.charge_at_input_c,
        at_swing_c: &bank.charge_at_swing_c,
        recovery_c: bank.recovery_c,
    };
    let mut sum_w = 0.0;
    for reach in around.weighed() {
        let reach = &of_diode(bank, hottest_c, reach, around);
        let (own_w, _) = least_diode_at(bank, hottest_c, reach, around)?;
        sum_w += reach.place.share * (own_w + least_foreign_w(&charges, reach, around));
    }
    Some(sum_w)
}

fn of_diode(bank: &DiodeBank, hottest_c: f64, reach: &Reach, around: &Around) -> Reach {
    let ambient_c = around.conditions.ambient_c;
    let shift_v = temperature_shift_v(bank, ambient_c, hottest_c);
    let (mut threshold_v, mut slope_ohm) = (Span::EMPTY, Span::EMPTY);
    for span in &bank.forward {
        threshold_v = threshold_v.hull(Span { lo: span.threshold_v + shift_v.lo, hi: span.threshold_v + shift_v.hi });
        slope_ohm = slope_ohm.hull(Span::at(span.resistance_ohm));
    }
    Reach {
        drop_v: diode_drop_v(bank, reach.load_a, ambient_c, hottest_c),
        threshold_v,
        slope_ohm,
        body_v: Span::at(0.0),
        ..*reach
    }
}

/// The forward pieces that a diode can be on at a point.
fn pieces<'a>(
    bank: &'a DiodeBank,
    reach: &Reach,
    flow: &Flow,
    continuous: bool,
) -> impl Iterator<Item = &'a ForwardSpan> {
    let (lo_a, hi_a) = if continuous {
        (reach.load_a, reach.load_a)
    } else {
        (flow.ripple_a.lo / 2.0 * SHORT_OF_LIMIT, flow.ripple_a.hi / 2.0 / SHORT_OF_LIMIT)
    };
    let first = bank.forward.partition_point(|span| span.up_to_a < lo_a);
    let last = bank.forward.partition_point(|span| span.up_to_a < hi_a).min(bank.forward.len() - 1);
    bank.forward[first.min(last)..=last].iter()
}

/// Least leakage between ambient and the hottest, A.
fn least_leakage_a(bank: &DiodeBank, ambient_c: f64) -> f64 {
    let grows = bank.leakage.iter().all(|span| span.growth_per_k >= 0.0);
    if grows { bank.leakage_at_a(ambient_c) } else { 0.0 }
}

/// Least and greatest forward loss at 25 °C of one piece, W.
fn forward25_w(span: &ForwardSpan, mean_a: Span, square_a2: Span) -> Span {
    Span {
        lo: mean_a.least_of(span.threshold_v) + square_a2.least_of(span.resistance_ohm),
        hi: mean_a.greatest_of(span.threshold_v) + square_a2.greatest_of(span.resistance_ohm),
    }
}

fn least_diode_at(bank: &DiodeBank, hottest_c: f64, reach: &Reach, around: &Around) -> Option<(f64, f64)> {
    let flows = reach.flows();
    let ambient_c = around.conditions.ambient_c;
    let settle = |flow: Option<Flow>, continuous: bool| {
        let flow = flow?;
        let (mean_a, square_a2) = (mean_a(reach, &flow, continuous), mean_square_a2(reach, &flow, continuous));
        let least25_w = pieces(bank, reach, &flow, continuous)
            .map(|span| forward25_w(span, mean_a, square_a2).lo)
            .fold(f64::INFINITY, f64::min);
        let shift_v = temperature_shift_v(bank, ambient_c, hottest_c).lo;
        let leakage_w = reach.input_v * flow.duty.lo * least_leakage_a(bank, ambient_c);
        let loss_w = least25_w + mean_a.least_of(shift_v) + leakage_w;
        Some((loss_w, (ambient_c + bank.thermal_k_per_w * loss_w).max(ambient_c)))
    };
    lesser(settle(flows.continuous, true), settle(flows.discontinuous, false))
}

/// No stage of the unit makes this diode hotter at any point with typical parts, °C.
pub fn hottest_diode_c(bank: &DiodeBank, hottest_c: f64, around: &Around) -> f64 {
    let ambient_c = around.conditions.ambient_c;
    let mut highest_c = ambient_c;
    for reach in around.every() {
        let reach = &of_diode(bank, hottest_c, reach, around);
        let flows = reach.flows();
        for (flow, continuous) in [(flows.continuous, true), (flows.discontinuous, false)] {
            let Some(flow) = flow else { continue };
            let (mean_a, square_a2) = (mean_a(reach, &flow, continuous), mean_square_a2(reach, &flow, continuous));
            let most25_w = pieces(bank, reach, &flow, continuous)
                .map(|span| forward25_w(span, mean_a, square_a2).hi)
                .fold(f64::NEG_INFINITY, f64::max);
            let below25_k = (25.0 - ambient_c).max(0.0);
            let heat = DiodeHeat {
                diode: bank,
                // A drop that falls with temperature takes heat away above 25 °C, by the least current the least, and adds some below.
                forward25_w: most25_w + (mean_a.hi - mean_a.lo) * bank.slope_v_per_k.abs() * below25_k,
                mean_a: if bank.slope_v_per_k < 0.0 { mean_a.lo } else { mean_a.hi },
                reverse_v: reach.input_v * flow.duty.hi,
            };
            match heat.fixed_point_c(ambient_c) {
                Some(c) => highest_c = highest_c.max(c),
                None => return UNKNOWN_C,
            }
        }
    }
    highest_c
}
