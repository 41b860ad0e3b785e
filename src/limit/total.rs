//! Limits of the whole stage.

use std::ops::ControlFlow;

use super::{Check, LimitName, Receiver};
use crate::footing::Footing;
use crate::part::Slot;
use crate::quantity::Positive;
use crate::rail::Limits;

/// The sums that the limits of a whole stage are about.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Totals {
    /// Area, height and cost.
    pub footing: Footing,
    /// Σ share·Pout / Σ share·Pin; `None` where a weighted point has no numbers.
    pub weighted_efficiency: Option<f64>,
}

/// Area, height, cost, efficiency.
pub fn check(totals: &Totals, limits: &Limits, receive: &mut (impl Receiver + ?Sized)) -> ControlFlow<()> {
    footing(&totals.footing, limits, receive)?;
    match limits.efficiency {
        None => ControlFlow::Continue(()),
        Some(bound) => receive(match totals.weighted_efficiency {
            Some(value) => Check::lower(LimitName::Efficiency, Slot::Stage, value, bound.get()),
            None => Check::plain(LimitName::Efficiency, Slot::Stage, false),
        }),
    }
}

/// Area, height and cost of a stage, or of a part of it: what is broken by a part alone is broken by every stage with it.
pub fn footing(footing: &Footing, limits: &Limits, receive: &mut (impl Receiver + ?Sized)) -> ControlFlow<()> {
    let mut cap = |limit, value: Option<f64>, bound: Option<Positive>| match (value, bound) {
        (Some(value), Some(bound)) => receive(Check::upper(limit, Slot::Stage, value, bound.get())),
        _ => ControlFlow::Continue(()),
    };
    cap(LimitName::Area, footing.area_mm2, limits.area_mm2)?;
    cap(LimitName::Height, footing.height_m, limits.height_m)?;
    cap(LimitName::Cost, footing.cost, limits.cost)
}
