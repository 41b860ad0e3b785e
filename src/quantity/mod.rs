//! Numbers with units: the only place where text becomes an SI `f64`, and back.

pub mod dimension;
pub mod format;
pub mod number;
pub mod real;

pub use dimension::{Dimension, Unit};
pub use real::{NonNegative, Positive, Share};
