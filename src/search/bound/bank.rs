//! The least loss of a bank in a unit, and whether it can pass at all.

use super::around::{Around, SHORT_OF_LIMIT};
use super::choke::ripple_square_a2;
use super::reach::{Flow, Flows, Reach};
use super::span::Span;
use crate::limit::LimitName;
use crate::model::step;
use crate::part::Bank;

/// A point with what can flow there.
#[derive(Debug, Clone, Copy)]
pub struct Stream {
    /// The point.
    pub reach: Reach,
    /// Its flows.
    pub flows: Flows,
}

impl Stream {
    /// What can flow at a point.
    pub fn new(reach: Reach) -> Self {
        Self { reach, flows: reach.flows() }
    }

    /// The least of a figure over the modes that are possible.
    fn least(&self, figure: impl Fn(&Flow, bool) -> f64) -> f64 {
        let continuous = self.flows.continuous.map(|flow| figure(&flow, true));
        let discontinuous = self.flows.discontinuous.map(|flow| figure(&flow, false));
        match (continuous, discontinuous) {
            (Some(a), Some(b)) => a.min(b),
            (one, other) => one.or(other).unwrap_or(0.0),
        }
    }
}

/// Least mean square current of an input bank, A².
pub fn least_input_a2(stream: &Stream) -> f64 {
    let i = stream.reach.load_a;
    stream.least(|flow, continuous| {
        let ripple_a2 = flow.ripple_a.lo * flow.ripple_a.lo;
        if continuous {
            least_parabola(flow.duty, 1.0) * i * i + flow.duty.lo * ripple_a2 / 12.0
        } else {
            // Ip²·(D/3 − D²/4).
            ripple_a2
                * (flow.duty.lo * (1.0 / 3.0 - flow.duty.lo / 4.0)).min(flow.duty.hi * (1.0 / 3.0 - flow.duty.hi / 4.0))
        }
    })
}

/// Least mean square current of an output bank, A².
pub fn least_output_a2(stream: &Stream) -> f64 {
    stream.least(|flow, continuous| ripple_square_a2(&stream.reach, flow.ripple_a.lo, continuous))
}

/// Least of D·(whole − D): a concave parabola.
fn least_parabola(duty: Span, whole: f64) -> f64 {
    (duty.lo * (whole - duty.lo)).min(duty.hi * (whole - duty.hi)).max(0.0)
}

/// Whether an input bank passes in no stage of the unit.
pub fn input_refused(bank: &Bank, full: &[Stream], around: &Around) -> bool {
    full.iter().any(|stream| {
        over_current(bank, least_input_a2(stream), around)
            || around.rail.input.ripple_v.is_some_and(|bound| {
                let bound_v = around.raised(LimitName::InputRipple, bound.get());
                least_input_ripple_v(bank, stream) * SHORT_OF_LIMIT > bound_v
            })
    })
}

/// The bank charges by the mean input current while the high switch is off, and steps by ESR times the peak when it opens.
fn least_input_ripple_v(bank: &Bank, stream: &Stream) -> f64 {
    let reach = &stream.reach;
    let farad_hz = bank.least_f(reach.place.input) * reach.frequency_hz;
    stream.least(|flow, continuous| {
        if continuous {
            least_parabola(flow.duty, 1.0) * reach.load_a / farad_hz
                + bank.esr_ohm * (reach.load_a + flow.ripple_a.lo / 2.0)
        } else {
            least_parabola(flow.duty, 1.0) * flow.ripple_a.lo / 2.0 / farad_hz + bank.esr_ohm * flow.ripple_a.lo
        }
    })
}

/// Whether an output bank passes in no stage of the unit; `low` are the full-load points at the low end of the inductance
/// tolerance, `inductance_h` the inductances that a load step can meet.
pub fn output_refused(bank: &Bank, full: &[Stream], low: &[Stream], inductance_h: Span, around: &Around) -> bool {
    full.iter().any(|stream| over_current(bank, least_output_a2(stream), around))
        || around.rail.output.ripple_v.is_some_and(|bound| {
            let bound_v = around.raised(LimitName::OutputRipple, bound.get());
            low.iter().any(|stream| least_output_ripple_v(bank, stream) * SHORT_OF_LIMIT > bound_v)
        })
        || full.iter().any(|stream| step_refused(bank, &stream.reach, inductance_h, around))
}

/// Between the ends of the rise the capacitance's voltage is the same, so ESR and ESL show in full; between its middle and
/// that of the fall the current is the same, so the capacitance does, less what the ESL gives back.
fn least_output_ripple_v(bank: &Bank, stream: &Stream) -> f64 {
    let reach = &stream.reach;
    let f = reach.frequency_hz;
    let capacitance_f = bank.least_f(reach.place.input);
    stream.least(|flow, continuous| {
        if !continuous {
            return 0.0;
        }
        let ripple_a = flow.ripple_a.lo;
        let edges_at = |duty: f64| f * (1.0 / duty + 1.0 / (1.0 - duty).max(f64::MIN_POSITIVE));
        let most_edges = edges_at(flow.duty.lo).max(edges_at(flow.duty.hi));
        let by_resistance = bank.esr_ohm + 4.0 * f * bank.esl_h;
        let by_capacitance = 1.0 / (8.0 * f * capacitance_f) - bank.esl_h * most_edges;
        ripple_a * by_resistance.max(by_capacitance)
    })
}

/// The deviation grows with the inductance while the capacitance holds the output, and is ESR·ΔI where it does not.
fn step_refused(bank: &Bank, reach: &Reach, inductance_h: Span, around: &Around) -> bool {
    let Some(jump) = &around.rail.output.step else { return false };
    let deviation_v = step::deviation_v(
        reach.input_v,
        reach.output_v,
        inductance_h.lo,
        bank.least_f(reach.place.input),
        bank.esr_ohm,
        jump.current_a.get(),
        jump.crossover_hz.map(|hz| hz.get()),
    );
    deviation_v * SHORT_OF_LIMIT > around.raised(LimitName::LoadStep, jump.deviation_v.get())
}

fn over_current(bank: &Bank, least_a2: f64, around: &Around) -> bool {
    bank.ripple_current_a.is_some_and(|rating_a| {
        let each_a = least_a2.max(0.0).sqrt() / f64::from(bank.count);
        each_a * SHORT_OF_LIMIT > around.raised(LimitName::CapacitorCurrent, rating_a)
    })
}
