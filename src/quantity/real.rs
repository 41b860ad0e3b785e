//! Finite reals whose range is part of their type, so that the model cannot meet a NaN or a wrong sign.

/// A finite number above zero.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Positive(f64);

/// A finite number at or above zero.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct NonNegative(f64);

/// A share: a number in [0, 1).
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct Share(f64);

impl Positive {
    /// `None` unless `value` is finite and above zero.
    pub fn new(value: f64) -> Option<Self> {
        (value.is_finite() && value > 0.0).then_some(Self(value))
    }

    /// The number.
    pub const fn get(self) -> f64 {
        self.0
    }
}

impl NonNegative {
    /// Zero.
    pub const ZERO: Self = Self(0.0);

    /// `None` unless `value` is finite and not below zero; a negative zero becomes zero.
    pub fn new(value: f64) -> Option<Self> {
        (value.is_finite() && value >= 0.0).then_some(Self(value + 0.0))
    }

    /// The number.
    pub const fn get(self) -> f64 {
        self.0
    }
}

impl Share {
    /// `None` unless `value` is in [0, 1).
    pub fn new(value: f64) -> Option<Self> {
        (0.0..1.0).contains(&value).then_some(Self(value + 0.0))
    }

    /// The number.
    pub const fn get(self) -> f64 {
        self.0
    }
}

impl From<Positive> for NonNegative {
    fn from(value: Positive) -> Self {
        Self(value.0)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn only_numbers_in_range_can_be_built() {
        for bad in [0.0, -1.0, f64::NAN, f64::INFINITY] {
            assert!(Positive::new(bad).is_none(), "{bad}");
        }
        for bad in [-1e-300, f64::NAN, f64::INFINITY] {
            assert!(NonNegative::new(bad).is_none(), "{bad}");
        }
        for bad in [-0.1, 1.0, f64::NAN] {
            assert!(Share::new(bad).is_none(), "{bad}");
        }
        assert!(NonNegative::new(-0.0).is_some_and(|zero| zero.get().is_sign_positive()));
    }
}
