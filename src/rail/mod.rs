//! The rail: the supply to be built, as its file describes it.

pub mod defaults;
mod origin;
mod typed;

pub use origin::{Entry, Origin, Value};
pub use typed::*;
