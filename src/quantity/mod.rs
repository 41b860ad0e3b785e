//! Numbers with units: the only place where text becomes an `f64` in base units, and back.

pub mod dimension;
pub mod format;
pub mod number;
pub mod real;
mod spelling;

pub use dimension::{Dimension, Unit};
pub use number::{Mark, NumberFault};
pub use real::{NonNegative, Positive, Share};
