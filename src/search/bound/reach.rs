//! Between which values duty and currents lie at a point of a unit.

use super::span::Span;
use super::spread::Spread;
use crate::model::Conditions;

/// A point as the bounds see it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Place {
    /// Index of the input voltage.
    pub input: usize,
    /// Index of the load.
    pub load: usize,
    /// Weight in the burden.
    pub share: f64,
    /// Whether limits are judged here: full load, where they bite first.
    pub judged: bool,
}

impl Place {
    /// The points that matter: every weighted one, and full load at every input.
    pub fn all(conditions: &Conditions) -> Vec<Self> {
        let mut places = Vec::new();
        for input in 0..conditions.inputs_v.len() {
            for load in 0..conditions.loads.len() {
                let share = conditions.share(input, load);
                let judged = load == conditions.full_load;
                if share > 0.0 || judged {
                    places.push(Self { input, load, share, judged });
                }
            }
        }
        places
    }
}

/// Resistances, drops and inductance at a point: spans over a unit, or narrower ones for one candidate.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Reach {
    /// Which point.
    pub place: Place,
    /// Whether the inductance is at the low end of its tolerance.
    pub low: bool,
    /// Input, V.
    pub input_v: f64,
    /// Output, V.
    pub output_v: f64,
    /// Load, A.
    pub load_a: f64,
    /// Switching frequency, Hz.
    pub frequency_hz: f64,
    /// Share of the period in which both switches are off.
    pub dead_share: f64,
    /// Whether conduction is always continuous.
    pub forced: bool,
    /// Resistance of the high switch, Ω.
    pub high_ohm: Span,
    /// Winding resistance, Ω.
    pub winding_ohm: Span,
    /// Drop of the rectifier at the load current, V.
    pub drop_v: Span,
    /// Its drop extended to no current, V.
    pub threshold_v: Span,
    /// Its slope resistance, Ω.
    pub slope_ohm: Span,
    /// Body diode drop, V.
    pub body_v: Span,
    /// Inductance, H.
    pub inductance_h: Span,
}

/// Duty and currents at a point in one mode of conduction.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Flow {
    /// On-time / period.
    pub duty: Span,
    /// Fall time / period.
    pub fall: Span,
    /// Ripple, A peak to peak.
    pub ripple_a: Span,
}

/// What can happen at a point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Flows {
    /// In continuous conduction, if that is possible.
    pub continuous: Option<Flow>,
    /// In discontinuous conduction, if that is possible.
    pub discontinuous: Option<Flow>,
}

impl Reach {
    /// Of a whole unit.
    pub fn new(
        spread: &Spread,
        conditions: &Conditions,
        place: Place,
        frequency_hz: f64,
        switch_rectifier: bool,
        low: bool,
    ) -> Self {
        let inductance_h = if low { &spread.low_inductance_h } else { &spread.inductance_h };
        Self {
            place,
            low,
            input_v: conditions.inputs_v[place.input],
            output_v: conditions.output_v,
            load_a: conditions.loads[place.load].current_a,
            frequency_hz,
            dead_share: if switch_rectifier { 2.0 * conditions.dead_time_s * frequency_hz } else { 0.0 },
            forced: conditions.forced && switch_rectifier,
            high_ohm: spread.high_ohm,
            winding_ohm: spread.winding_ohm,
            drop_v: spread.drop_v[place.load],
            threshold_v: spread.threshold_v,
            slope_ohm: spread.slope_ohm,
            body_v: spread.body_v,
            inductance_h: inductance_h[place.load],
        }
    }

    /// Continuous duty at given figures, above 1 where the input does not reach the output.
    fn duty_at(&self, high_ohm: f64, winding_ohm: f64, drop_v: f64, body_v: f64) -> f64 {
        let i = self.load_a;
        let below_v = self.input_v - i * high_ohm + drop_v;
        let above_v = self.output_v + i * winding_ohm + (1.0 - self.dead_share) * drop_v + self.dead_share * body_v;
        if below_v > 0.0 { above_v / below_v } else { f64::INFINITY }
    }

    /// Duty rises with every resistance, and with the drop one way or the other all along. What runs has a duty above 0, though a
    /// drop taken at a temperature that nothing reaches can ask for less.
    pub fn duty(&self) -> Span {
        let lo = |drop_v| self.duty_at(self.high_ohm.lo, self.winding_ohm.lo, drop_v, self.body_v.lo);
        let hi = |drop_v| self.duty_at(self.high_ohm.hi, self.winding_ohm.hi, drop_v, self.body_v.hi);
        Span {
            lo: lo(self.drop_v.lo).min(lo(self.drop_v.hi)).max(0.0),
            hi: hi(self.drop_v.lo).max(hi(self.drop_v.hi)).min(1.0 - self.dead_share),
        }
    }

    /// Continuous ripple falls with the high switch's resistance, follows the duty over the drops, and is a concave parabola in
    /// the winding's resistance.
    fn ripple_a(&self) -> Span {
        let i = self.load_a;
        let volts = |high_ohm: f64, winding_ohm: f64, drop_v: f64, body_v: f64| {
            let on_v = self.input_v - self.output_v - i * (high_ohm + winding_ohm);
            if on_v > 0.0 { on_v * self.duty_at(high_ohm, winding_ohm, drop_v, body_v) } else { 0.0 }
        };
        let least = |drop_v: f64| {
            let at = |winding_ohm| volts(self.high_ohm.hi, winding_ohm, drop_v, self.body_v.lo);
            at(self.winding_ohm.lo).min(at(self.winding_ohm.hi))
        };
        let greatest = |drop_v: f64| {
            let turn_ohm = (self.input_v
                - i * self.high_ohm.lo
                - 2.0 * self.output_v
                - (1.0 - self.dead_share) * drop_v
                - self.dead_share * self.body_v.hi)
                / (2.0 * i);
            let winding_ohm = turn_ohm.max(self.winding_ohm.lo).min(self.winding_ohm.hi);
            volts(self.high_ohm.lo, winding_ohm, drop_v, self.body_v.hi)
        };
        Span {
            lo: least(self.drop_v.lo).min(least(self.drop_v.hi)).max(0.0) / (self.inductance_h.hi * self.frequency_hz),
            hi: greatest(self.drop_v.lo).max(greatest(self.drop_v.hi)) / (self.inductance_h.lo * self.frequency_hz),
        }
    }

    /// Discontinuous conduction: Ip² = 2·I·(von∥voff)/(L·f), so the peak rises with both voltages.
    fn discontinuous(&self) -> Option<Flow> {
        let i = self.load_a;
        let (henry_hz_lo, henry_hz_hi) =
            (self.inductance_h.lo * self.frequency_hz, self.inductance_h.hi * self.frequency_hz);
        let on_hi_v = self.input_v - self.output_v;
        if on_hi_v <= 0.0 {
            return None;
        }
        let peak_a =
            |on_v: f64, off_v: f64, henry_hz: f64| (2.0 * i * (on_v * off_v / (on_v + off_v)) / henry_hz).sqrt();
        let widest_half_a = (2.0 * i * on_hi_v / henry_hz_lo).sqrt() / 2.0;
        let off_hi_v = self.output_v
            + self.winding_ohm.hi * widest_half_a
            + self.threshold_v.hi
            + (self.slope_ohm.hi * widest_half_a).max(0.0);
        let off_lo_v = self.output_v + self.threshold_v.lo + (self.slope_ohm.lo * widest_half_a).min(0.0);
        if off_hi_v <= 0.0 {
            return None;
        }
        let peak_hi_a = peak_a(on_hi_v, off_hi_v, henry_hz_lo);
        let on_lo_v = on_hi_v - (self.high_ohm.hi + self.winding_ohm.hi) * peak_hi_a / 2.0;
        if on_lo_v <= 0.0 || off_lo_v <= 0.0 {
            let whole = Span { lo: 0.0, hi: 1.0 };
            return Some(Flow { duty: whole, fall: whole, ripple_a: Span { lo: 0.0, hi: peak_hi_a } });
        }
        let duty = |henry_hz: f64, on_v: f64, off_v: f64| (2.0 * henry_hz * i * off_v / (on_v * (on_v + off_v))).sqrt();
        Some(Flow {
            duty: Span { lo: duty(henry_hz_lo, on_hi_v, off_lo_v), hi: duty(henry_hz_hi, on_lo_v, off_hi_v).min(1.0) },
            // The same law with the two voltages changed over.
            fall: Span { lo: duty(henry_hz_lo, off_hi_v, on_lo_v), hi: duty(henry_hz_hi, off_lo_v, on_hi_v) },
            ripple_a: Span { lo: peak_a(on_lo_v, off_lo_v, henry_hz_hi), hi: peak_hi_a },
        })
    }

    /// Duty and currents in every mode that is possible; in none when the point cannot run.
    pub fn flows(&self) -> Flows {
        let (duty, ripple_a) = (self.duty(), self.ripple_a());
        let runs = duty.lo + self.dead_share < 1.0;
        let continuous = (runs && (self.forced || self.load_a >= ripple_a.lo * SHY / 2.0)).then_some(Flow {
            duty,
            fall: Span { lo: 1.0 - duty.hi, hi: 1.0 - duty.lo },
            ripple_a,
        });
        let discontinuous =
            if !self.forced && self.load_a < ripple_a.hi / SHY / 2.0 { self.discontinuous() } else { None };
        Flows { continuous, discontinuous }
    }
}

/// Lowers a bound against rounding.
pub const SHY: f64 = 1.0 - 1e-12;
