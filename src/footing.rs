//! What parts cost and take up on the board.

use crate::part::Identity;

/// What parts cost and take up; `None` where a value is unknown.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Footing {
    /// Cost.
    pub cost: Option<f64>,
    /// Area, mm².
    pub area_mm2: Option<f64>,
    /// Height, m.
    pub height_m: Option<f64>,
}

impl Footing {
    /// Nothing at all.
    pub const NONE: Self = Self { cost: Some(0.0), area_mm2: Some(0.0), height_m: Some(0.0) };

    /// `count` equal parts.
    pub fn of(identity: &Identity, count: u32) -> Self {
        let n = f64::from(count);
        Self {
            cost: identity.cost.map(|cost| n * cost.get()),
            area_mm2: identity.area_mm2.map(|area| n * area.get()),
            height_m: identity.height_m.map(|height| height.get()),
        }
    }

    /// These and others.
    pub fn with(self, other: Self) -> Self {
        let both = |a: Option<f64>, b: Option<f64>, join: fn(f64, f64) -> f64| Some(join(a?, b?));
        Self {
            cost: both(self.cost, other.cost, |a, b| a + b),
            area_mm2: both(self.area_mm2, other.area_mm2, |a, b| a + b),
            height_m: both(self.height_m, other.height_m, f64::max),
        }
    }
}
