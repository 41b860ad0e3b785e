//! The rail: the supply to be built, as its file describes it.

mod typed;

pub use typed::*;
