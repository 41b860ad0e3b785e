//! One comparison of a limit with what a stage has.

use std::ops::ControlFlow;

use super::LimitName;
use crate::part::Slot;

/// A value meets a limit within this, relative to the bound.
const CLOSE: f64 = 1e-9;

/// Which side of its bound a value must keep to.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Side {
    /// value ≤ bound.
    Upper,
    /// value ≥ bound.
    Lower,
    /// value > bound, and not by rounding.
    Above,
}

/// What a check found.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Finding {
    /// A value beside its bound.
    Compared {
        /// What the stage has.
        value: f64,
        /// What it must keep to.
        bound: f64,
        /// On which side.
        side: Side,
    },
    /// Something that is or is not so; there is no number to compare.
    Plain {
        /// Whether the limit holds.
        holds: bool,
    },
}

/// One limit on one slot, at one point or at none.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Check {
    /// Which limit.
    pub limit: LimitName,
    /// What it is about.
    pub slot: Slot,
    /// What was found.
    pub finding: Finding,
    /// Index of the point; `None` where the limit is not of a point.
    pub point: Option<usize>,
}

/// Takes checks one by one; breaks off when it has seen enough.
pub trait Receiver: FnMut(Check) -> ControlFlow<()> {}
impl<F: FnMut(Check) -> ControlFlow<()> + ?Sized> Receiver for F {}

impl Check {
    /// value ≤ bound, not of a point.
    pub const fn upper(limit: LimitName, slot: Slot, value: f64, bound: f64) -> Self {
        Self { limit, slot, finding: Finding::Compared { value, bound, side: Side::Upper }, point: None }
    }

    /// value ≥ bound, not of a point.
    pub const fn lower(limit: LimitName, slot: Slot, value: f64, bound: f64) -> Self {
        Self { limit, slot, finding: Finding::Compared { value, bound, side: Side::Lower }, point: None }
    }

    /// value > bound, not of a point.
    pub const fn above(limit: LimitName, slot: Slot, value: f64, bound: f64) -> Self {
        Self { limit, slot, finding: Finding::Compared { value, bound, side: Side::Above }, point: None }
    }

    /// Something without a number.
    pub const fn plain(limit: LimitName, slot: Slot, holds: bool) -> Self {
        Self { limit, slot, finding: Finding::Plain { holds }, point: None }
    }

    /// The same at a point.
    pub const fn at(self, point: usize) -> Self {
        Self { point: Some(point), ..self }
    }

    /// Whether the limit holds.
    pub fn holds(&self) -> bool {
        match self.finding {
            Finding::Compared { value, bound, side: Side::Upper } => value - bound <= CLOSE * bound.abs(),
            Finding::Compared { value, bound, side: Side::Lower } => bound - value <= CLOSE * bound.abs(),
            Finding::Compared { value, bound, side: Side::Above } => value > bound,
            Finding::Plain { holds } => holds,
        }
    }

    /// Distance to the bound relative to it, negative beyond it; `None` without numbers or for a bound of 0.
    pub fn margin(&self) -> Option<f64> {
        match self.finding {
            Finding::Compared { bound: 0.0, .. } | Finding::Plain { .. } => None,
            Finding::Compared { value, bound, side: Side::Upper } => Some((bound - value) / bound.abs()),
            Finding::Compared { value, bound, side: Side::Lower | Side::Above } => Some((value - bound) / bound.abs()),
        }
    }

    /// Margin for ranking: a broken limit without numbers is the worst, one that holds without numbers the best.
    pub fn rank_margin(&self) -> f64 {
        self.margin().unwrap_or(if self.holds() { f64::INFINITY } else { f64::NEG_INFINITY })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn upper(value: f64, bound: f64) -> Check {
        Check::upper(LimitName::Area, Slot::Stage, value, bound)
    }

    #[test]
    fn a_value_meets_its_limit_within_a_billionth() {
        assert!(upper(100.0, 100.0).holds());
        assert!(upper(100.0 * (1.0 + 0.9e-9), 100.0).holds());
        assert!(!upper(100.0 * (1.0 + 1.1e-9), 100.0).holds());
        assert!(Check::lower(LimitName::Efficiency, Slot::Stage, 0.9 * (1.0 - 0.9e-9), 0.9).holds());
        assert!(!Check::lower(LimitName::Efficiency, Slot::Stage, 0.9 * (1.0 - 1.1e-9), 0.9).holds());
        assert!(!Check::above(LimitName::GateVoltage, Slot::HighSwitch, 2.5, 2.5).holds());
    }

    #[test]
    fn margins_have_the_sign_of_the_distance() {
        assert_eq!(upper(75.0, 100.0).margin(), Some(0.25));
        assert_eq!(upper(125.0, 100.0).margin(), Some(-0.25));
        assert_eq!(Check::lower(LimitName::Efficiency, Slot::Stage, 0.75, 0.5).margin(), Some(0.5));
        assert_eq!(Check::plain(LimitName::Runaway, Slot::Stage, false).rank_margin(), f64::NEG_INFINITY);
    }
}
