//! The least loss of an inductor in a unit, and whether it can pass at all.

use super::around::{Around, SHORT_OF_LIMIT, winding_limit_c};
use super::high::lesser;
use super::reach::{Flow, Reach};
use super::span::Span;
use super::spread::{UNKNOWN_C, winding_ohm};
use crate::limit::LimitName;
use crate::model::thermal::linear_c;
use crate::part::Choke;
use crate::part::choke::{COPPER_PER_K, CoreLaw};

/// A reach narrowed to one inductor, of winding resistance `dcr25_ohm` at 25 °C that gets no hotter than `hottest_c`.
pub fn of_choke(choke: &Choke, dcr25_ohm: f64, hottest_c: f64, reach: &Reach, ambient_c: f64) -> Reach {
    let factor = if reach.low { 1.0 - choke.tolerance } else { 1.0 };
    Reach {
        winding_ohm: winding_ohm(dcr25_ohm, ambient_c, hottest_c),
        inductance_h: Span::at(choke.inductance_h[reach.place.load] * factor),
        ..*reach
    }
}

/// Least weighted loss of an inductor, W; `None` when no stage of the unit with it passes.
pub fn least_loss_w(choke: &Choke, hottest_c: f64, around: &Around) -> Option<f64> {
    let ambient_c = around.conditions.ambient_c;
    let limit_c = winding_limit_c(around.rail, around.tolerated);
    for reach in around.worst {
        let worst = of_choke(choke, choke.worst_dcr25_ohm, limit_c.clamp(ambient_c, UNKNOWN_C), reach, ambient_c);
        let (_, least_c) = least_at(choke, [choke.worst_dcr25_ohm, choke.worst_rac25_ohm], &worst, around)?;
        if least_c * SHORT_OF_LIMIT > limit_c {
            return None;
        }
    }
    if around.low.iter().any(|reach| saturates(choke, hottest_c, reach, around)) {
        return None;
    }
    if around.full().any(|reach| ripple_out_of_window(choke, hottest_c, reach, around)) {
        return None;
    }
    let mut sum_w = 0.0;
    for reach in around.weighed() {
        let reach = of_choke(choke, choke.dcr25_ohm, hottest_c, reach, ambient_c);
        let (loss_w, _) = least_at(choke, [choke.dcr25_ohm, choke.rac25_ohm], &reach, around)?;
        sum_w += reach.place.share * loss_w;
    }
    Some(sum_w)
}

fn least_at(choke: &Choke, [dcr25_ohm, rac25_ohm]: [f64; 2], reach: &Reach, around: &Around) -> Option<(f64, f64)> {
    let flows = reach.flows();
    let settle = |flow: Option<Flow>, continuous: bool| {
        let flow = flow?;
        let load_a2 = reach.load_a * reach.load_a;
        let ripple_a2 = ripple_square_a2(reach, flow.ripple_a.lo, continuous);
        let core_w = choke.core.map_or(0.0, |core| least_core_w(&core, &flow, continuous));
        let rising25_w = dcr25_ohm * load_a2 + rac25_ohm * ripple_a2;
        let c = linear_c(around.conditions.ambient_c, choke.thermal_k_per_w, core_w, rising25_w, COPPER_PER_K)?;
        Some((core_w + rising25_w * (1.0 + COPPER_PER_K * (c - 25.0)), c))
    };
    lesser(settle(flows.continuous, true), settle(flows.discontinuous, false))
}

/// Mean square of the ripple part of the inductor current, A²: Δ²/12, or I·(2·Ip/3 − I) in discontinuous conduction.
pub fn ripple_square_a2(reach: &Reach, ripple_a: f64, continuous: bool) -> f64 {
    if continuous {
        ripple_a * ripple_a / 12.0
    } else {
        (reach.load_a * (2.0 * ripple_a / 3.0 - reach.load_a)).max(0.0)
    }
}

/// Least core loss: at the least ripple, and at the ends of the intervals' spans or at equal intervals, whichever is least.
fn least_core_w(core: &CoreLaw, flow: &Flow, continuous: bool) -> f64 {
    let share = |x: f64| x.clamp(f64::MIN_POSITIVE, 1.0).powf(core.interval_exponent);
    let least_share = |span: Span| share(span.lo).min(share(span.hi));
    let continuous_sum = |duty: f64| share(duty) + share(1.0 - duty);
    let intervals = if continuous {
        let ends = continuous_sum(flow.duty.lo).min(continuous_sum(flow.duty.hi));
        if flow.duty.lo < 0.5 && flow.duty.hi > 0.5 { ends.min(continuous_sum(0.5)) } else { ends }
    } else {
        least_share(flow.duty) + least_share(flow.fall)
    };
    core.scale * flow.ripple_a.lo.powf(core.beta) * intervals
}

/// Whether the peak at the low end of the tolerance exceeds the saturation current of any winding temperature.
fn saturates(choke: &Choke, hottest_c: f64, reach: &Reach, around: &Around) -> bool {
    let ambient_c = around.conditions.ambient_c;
    let reach = of_choke(choke, choke.dcr25_ohm, hottest_c, reach, ambient_c);
    let Some(peak_a) = least_peak_a(&reach) else { return true };
    let beyond_a = (around.rail.output.peak_a.get() - around.rail.output.current_a.get()).max(0.0);
    let needed_a = (peak_a + beyond_a) * around.rail.limits.saturation_margin.get();
    let saturation = &choke.saturation_a;
    let greatest_a = saturation
        .points()
        .iter()
        .filter(|point| point.0 > ambient_c)
        .map(|point| point.1)
        .fold(saturation.linear_held(ambient_c), f64::max);
    needed_a * SHORT_OF_LIMIT > around.raised(LimitName::Saturation, greatest_a)
}

/// Least peak current at a point, A; `None` when it cannot run.
pub fn least_peak_a(reach: &Reach) -> Option<f64> {
    let flows = reach.flows();
    let continuous = flows.continuous.map(|flow| reach.load_a + flow.ripple_a.lo / 2.0);
    let discontinuous = flows.discontinuous.map(|flow| flow.ripple_a.lo);
    match (continuous, discontinuous) {
        (Some(a), Some(b)) => Some(a.min(b)),
        (one, other) => one.or(other),
    }
}

fn ripple_out_of_window(choke: &Choke, hottest_c: f64, reach: &Reach, around: &Around) -> bool {
    if reach.place.input != around.conditions.typical {
        return false;
    }
    let range = &around.rail.range;
    let reach = of_choke(choke, choke.dcr25_ohm, hottest_c, reach, around.conditions.ambient_c);
    let flows = reach.flows();
    let mut ripple_a = Span::EMPTY;
    for flow in [flows.continuous, flows.discontinuous].into_iter().flatten() {
        ripple_a = ripple_a.hull(flow.ripple_a);
    }
    let ratio = |ripple_a: f64| ripple_a / reach.load_a;
    range
        .ripple_ratio_max
        .is_some_and(|bound| ratio(ripple_a.lo) * SHORT_OF_LIMIT > around.raised(LimitName::RippleRatio, bound.get()))
        || range.ripple_ratio_min.is_some_and(|bound| {
            ratio(ripple_a.hi) < around.lowered(LimitName::RippleRatio, bound.get()) * SHORT_OF_LIMIT
        })
}

/// No stage of the unit makes this winding hotter at any point with typical parts, °C.
pub fn hottest_c(choke: &Choke, hottest_c: f64, around: &Around) -> f64 {
    let ambient_c = around.conditions.ambient_c;
    let mut highest_c = ambient_c;
    for reach in around.every() {
        let reach = of_choke(choke, choke.dcr25_ohm, hottest_c, reach, ambient_c);
        let flows = reach.flows();
        for (flow, continuous) in [(flows.continuous, true), (flows.discontinuous, false)] {
            let Some(flow) = flow else { continue };
            let core_w = choke.core.map_or(0.0, |core| most_core_w(&core, &flow));
            let rising25_w = choke.dcr25_ohm * reach.load_a * reach.load_a
                + choke.rac25_ohm * ripple_square_a2(&reach, flow.ripple_a.hi, continuous);
            match linear_c(ambient_c, choke.thermal_k_per_w, core_w, rising25_w, COPPER_PER_K) {
                Some(c) => highest_c = highest_c.max(c),
                None => return UNKNOWN_C,
            }
        }
    }
    highest_c
}

fn most_core_w(core: &CoreLaw, flow: &Flow) -> f64 {
    let share = |x: f64| x.clamp(f64::MIN_POSITIVE, 1.0).powf(core.interval_exponent);
    let most_share = |span: Span| share(span.lo).max(share(span.hi));
    core.scale * flow.ripple_a.hi.powf(core.beta) * (most_share(flow.duty) + most_share(flow.fall))
}
