//! The one figure that is minimised, and the sums that it is made of.

use crate::footing::Footing;
use crate::model::{Conditions, Losses, Operation};
use crate::rail::Worth;

/// Weighted losses of a core: sums over the load profile at typical input.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct Weighted {
    /// Σ share·loss without the banks, W.
    pub core_loss_w: f64,
    /// Σ share·mean square current of the input bank, A².
    pub input_bank_a2: f64,
    /// Σ share·mean square current of the output bank, A².
    pub output_bank_a2: f64,
    /// Σ share·output power, W.
    pub output_w: f64,
    /// Σ share·conduction of the switches, W: what falls as on-resistance falls.
    pub resistance_w: f64,
    /// Σ share·(overlap, output charge, recovery, gates), W: what grows with charge.
    pub charge_w: f64,
}

impl Weighted {
    /// Adds one point of the profile, `switch_rectifier` telling whether the rectifier's conduction is an on-resistance.
    pub fn add(&mut self, conditions: &Conditions, load: usize, operation: &Operation, switch_rectifier: bool) {
        let share = conditions.loads[load].share;
        let Losses { high_switch, rectifier, drive, .. } = &operation.losses;
        let rectifier_w = if switch_rectifier { rectifier.conduction } else { 0.0 };
        self.core_loss_w += share * operation.losses.core_w();
        self.input_bank_a2 += share * operation.currents.input_bank_a2;
        self.output_bank_a2 += share * operation.currents.output_bank_a2;
        self.output_w += share * (conditions.output_v * conditions.loads[load].current_a);
        self.resistance_w += share * (high_switch.conduction + rectifier_w);
        self.charge_w += share
            * (high_switch.overlap
                + high_switch.output_charge
                + high_switch.recovery
                + drive.high_gate
                + drive.rectifier_gate);
    }

    /// Weighted loss with these bank resistances, W.
    pub fn loss_w(&self, input_esr_ohm: f64, output_esr_ohm: f64) -> f64 {
        self.core_loss_w + input_esr_ohm * self.input_bank_a2 + output_esr_ohm * self.output_bank_a2
    }

    /// Weighted efficiency at that loss.
    pub fn efficiency(&self, loss_w: f64) -> f64 {
        self.output_w / (self.output_w + loss_w)
    }
}

/// worth.loss · weighted loss + worth.area · area + worth.cost · cost; `None` where a value that has a worth is unknown.
pub fn burden(worth: &Worth, weighted_loss_w: f64, footing: &Footing) -> Option<f64> {
    let priced = |worth: f64, value: Option<f64>| if worth == 0.0 { Some(0.0) } else { value.map(|v| worth * v) };
    let area = priced(worth.area.get(), footing.area_mm2)?;
    let cost = priced(worth.cost.get(), footing.cost)?;
    Some(worth.loss.get() * weighted_loss_w + area + cost)
}
