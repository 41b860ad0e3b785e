//! Between which values the figures of the parts in play lie.

use super::span::Span;
use crate::model::thermal::HIGHEST_C;
use crate::part::choke::COPPER_PER_K;
use crate::part::{Choke, DiodeBank, INPUTS, SwitchBank};

/// Spans over every high switch, rectifier and inductor of a unit, at any temperature they can have.
#[derive(Debug, Clone, PartialEq)]
pub struct Spread {
    /// Resistance of the high switch, Ω.
    pub high_ohm: Span,
    /// Output charge of the high switch at each input, C.
    pub high_at_input_c: [Span; INPUTS],
    /// Drop of the rectifier at each load current, V.
    pub drop_v: Vec<Span>,
    /// Drop of the rectifier extended to no current, V.
    pub threshold_v: Span,
    /// Slope resistance of the rectifier, Ω.
    pub slope_ohm: Span,
    /// Body diode drop, V; 0 for diodes.
    pub body_v: Span,
    /// Charge of the rectifier at each input, C.
    pub rectifier_at_input_c: [Span; INPUTS],
    /// Charge of the rectifier at each input less the output, C.
    pub rectifier_at_swing_c: [Span; INPUTS],
    /// Recovery charge, C.
    pub recovery_c: Span,
    /// Winding resistance, Ω.
    pub winding_ohm: Span,
    /// Inductance at each load, H.
    pub inductance_h: Vec<Span>,
    /// The same at the low end of the tolerance, H.
    pub low_inductance_h: Vec<Span>,
}

impl Spread {
    /// Over nothing yet.
    pub fn empty(loads: usize) -> Self {
        Self {
            high_ohm: Span::EMPTY,
            high_at_input_c: [Span::EMPTY; INPUTS],
            drop_v: vec![Span::EMPTY; loads],
            threshold_v: Span::EMPTY,
            slope_ohm: Span::EMPTY,
            body_v: Span::EMPTY,
            rectifier_at_input_c: [Span::EMPTY; INPUTS],
            rectifier_at_swing_c: [Span::EMPTY; INPUTS],
            recovery_c: Span::EMPTY,
            winding_ohm: Span::EMPTY,
            inductance_h: vec![Span::EMPTY; loads],
            low_inductance_h: vec![Span::EMPTY; loads],
        }
    }

    /// With a high switch of `r25_ohm` at 25 °C that gets no hotter than `hottest_c`.
    pub fn add_high(&mut self, bank: &SwitchBank, r25_ohm: f64, ambient_c: f64, hottest_c: f64) {
        self.high_ohm = self.high_ohm.hull(resistance_ohm(bank, r25_ohm, ambient_c, hottest_c));
        widen(&mut self.high_at_input_c, &bank.charge_at_input_c);
    }

    /// With a switch rectifier of `r25_ohm` at 25 °C that gets no hotter than `hottest_c`.
    pub fn add_switch(&mut self, bank: &SwitchBank, r25_ohm: f64, loads_a: &[f64], ambient_c: f64, hottest_c: f64) {
        let ohm = resistance_ohm(bank, r25_ohm, ambient_c, hottest_c);
        for (drop_v, load_a) in self.drop_v.iter_mut().zip(loads_a) {
            *drop_v = drop_v.hull(Span { lo: ohm.lo * load_a, hi: ohm.hi * load_a });
        }
        self.threshold_v = self.threshold_v.hull(Span::at(0.0));
        self.slope_ohm = self.slope_ohm.hull(ohm);
        self.body_v = self.body_v.hull(Span::at(bank.body_drop_v));
        widen(&mut self.rectifier_at_input_c, &bank.charge_at_input_c);
        widen(&mut self.rectifier_at_swing_c, &bank.charge_at_swing_c);
        self.recovery_c = self.recovery_c.hull(Span::at(bank.recovery_c));
    }

    /// With a diode that gets no hotter than `hottest_c`.
    pub fn add_diode(&mut self, bank: &DiodeBank, loads_a: &[f64], ambient_c: f64, hottest_c: f64) {
        for (drop_v, &load_a) in self.drop_v.iter_mut().zip(loads_a) {
            *drop_v = drop_v.hull(diode_drop_v(bank, load_a, ambient_c, hottest_c));
        }
        let shift_v = temperature_shift_v(bank, ambient_c, hottest_c);
        for span in &bank.forward {
            let threshold_v = Span { lo: span.threshold_v + shift_v.lo, hi: span.threshold_v + shift_v.hi };
            self.threshold_v = self.threshold_v.hull(threshold_v);
            self.slope_ohm = self.slope_ohm.hull(Span::at(span.resistance_ohm));
        }
        self.body_v = self.body_v.hull(Span::at(0.0));
        widen(&mut self.rectifier_at_input_c, &bank.charge_at_input_c);
        widen(&mut self.rectifier_at_swing_c, &bank.charge_at_swing_c);
        self.recovery_c = self.recovery_c.hull(Span::at(bank.recovery_c));
    }

    /// With an inductor of winding resistance `r25_ohm` at 25 °C that gets no hotter than `hottest_c`.
    pub fn add_choke(&mut self, choke: &Choke, r25_ohm: f64, ambient_c: f64, hottest_c: f64) {
        self.winding_ohm = self.winding_ohm.hull(winding_ohm(r25_ohm, ambient_c, hottest_c));
        for (load, &inductance_h) in choke.inductance_h.iter().enumerate() {
            self.inductance_h[load] = self.inductance_h[load].hull(Span::at(inductance_h));
            let low_h = Span::at(inductance_h * (1.0 - choke.tolerance));
            self.low_inductance_h[load] = self.low_inductance_h[load].hull(low_h);
        }
    }
}

fn widen(spans: &mut [Span; INPUTS], values: &[f64; INPUTS]) {
    for (span, &value) in spans.iter_mut().zip(values) {
        *span = span.hull(Span::at(value));
    }
}

/// On-resistance between ambient and the hottest, Ω.
pub fn resistance_ohm(bank: &SwitchBank, r25_ohm: f64, ambient_c: f64, hottest_c: f64) -> Span {
    Span::between(bank.resistance_ohm(r25_ohm, ambient_c), bank.resistance_ohm(r25_ohm, hottest_c))
}

/// Winding resistance between ambient and the hottest, Ω.
pub fn winding_ohm(r25_ohm: f64, ambient_c: f64, hottest_c: f64) -> Span {
    let hot_ohm = |t: f64| r25_ohm * (1.0 + COPPER_PER_K * (t - 25.0));
    Span { lo: hot_ohm(ambient_c), hi: hot_ohm(hottest_c) }
}

/// Change of a diode's drop from 25 °C between ambient and the hottest, V.
pub fn temperature_shift_v(bank: &DiodeBank, ambient_c: f64, hottest_c: f64) -> Span {
    Span::between(bank.slope_v_per_k * (ambient_c - 25.0), bank.slope_v_per_k * (hottest_c - 25.0))
}

/// Drop of a diode at a current between ambient and the hottest, V.
pub fn diode_drop_v(bank: &DiodeBank, current_a: f64, ambient_c: f64, hottest_c: f64) -> Span {
    let span = bank.forward_at(current_a);
    let drop25_v = span.threshold_v + span.resistance_ohm * current_a;
    let shift_v = temperature_shift_v(bank, ambient_c, hottest_c);
    Span { lo: drop25_v + shift_v.lo, hi: drop25_v + shift_v.hi }
}

/// No running part is hotter than this, °C: what is known before anything else is.
pub const UNKNOWN_C: f64 = HIGHEST_C;
