//! What a slot adds to the burden, and the exchange rates that turn it into one figure.

use crate::footing::Footing;
use crate::rail::Worth;

/// A lower bound of what a slot adds to the sums of a stage. Values that nobody asked for count as 0.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Price {
    /// Weighted loss, W.
    pub loss_w: f64,
    /// Area, mm².
    pub area_mm2: f64,
    /// Cost.
    pub cost: f64,
}

/// What each sum counts for: the user's worth, raised where a cap on the sum binds (Lagrange multipliers).
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Rates {
    /// Per watt.
    pub loss: f64,
    /// Per mm².
    pub area: f64,
    /// Per unit of cost.
    pub cost: f64,
    /// What the raises allow for: Σ raise · cap, to be taken off the sum of all slots.
    pub allowance: f64,
}

impl Rates {
    /// The user's worth, nothing raised.
    pub fn worth(worth: &Worth) -> Self {
        Self { loss: worth.loss.get(), area: worth.area.get(), cost: worth.cost.get(), allowance: 0.0 }
    }
}

impl Price {
    /// A slot that adds this loss and footing.
    pub fn new(loss_w: f64, footing: &Footing) -> Self {
        Self { loss_w, area_mm2: footing.area_mm2.unwrap_or(0.0), cost: footing.cost.unwrap_or(0.0) }
    }

    /// Both together.
    pub fn plus(&self, other: &Self) -> Self {
        Self {
            loss_w: self.loss_w + other.loss_w,
            area_mm2: self.area_mm2 + other.area_mm2,
            cost: self.cost + other.cost,
        }
    }

    /// As one figure.
    pub fn at(&self, rates: &Rates) -> f64 {
        rates.loss * self.loss_w + rates.area * self.area_mm2 + rates.cost * self.cost
    }
}
