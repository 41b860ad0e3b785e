//! The rail: the supply to be built, as its file describes it.

pub mod defaults;
mod file;
mod origin;
mod typed;

pub use file::{Reading, read};
pub use origin::{Entry, Origin, Value};
pub use typed::*;
