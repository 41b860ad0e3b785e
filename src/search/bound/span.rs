//! An interval of reals.

/// From `lo` to `hi`, both included; empty when `lo` exceeds `hi`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Span {
    /// Least value.
    pub lo: f64,
    /// Greatest value.
    pub hi: f64,
}

impl Span {
    /// Nothing yet: what a hull starts from.
    pub const EMPTY: Self = Self { lo: f64::INFINITY, hi: f64::NEG_INFINITY };

    /// One value.
    pub const fn at(value: f64) -> Self {
        Self { lo: value, hi: value }
    }

    /// Two values in any order.
    pub const fn between(a: f64, b: f64) -> Self {
        Self { lo: a.min(b), hi: a.max(b) }
    }

    /// The least interval that holds both.
    pub const fn hull(self, other: Self) -> Self {
        Self { lo: self.lo.min(other.lo), hi: self.hi.max(other.hi) }
    }

    /// The least of `coefficient`·x over the interval.
    pub fn least_of(self, coefficient: f64) -> f64 {
        if coefficient >= 0.0 { coefficient * self.lo } else { coefficient * self.hi }
    }

    /// The greatest of `coefficient`·x over the interval.
    pub fn greatest_of(self, coefficient: f64) -> f64 {
        if coefficient >= 0.0 { coefficient * self.hi } else { coefficient * self.lo }
    }
}
