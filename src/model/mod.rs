//! Currents, losses, temperatures and ripple of a stage at a point: pure functions, no I/O, no allocation.
//!
//! [`point::solve`] is where to start reading: it asks [`current`] for the currents at given temperatures, the loss files
//! for the heat, [`thermal`] for the temperatures, and repeats until they agree.

pub mod conditions;
pub mod current;
pub mod drive;
pub mod high_switch;
pub mod inductor;
pub mod losses;
pub mod point;
pub mod rectifier;
pub mod ripple;
pub mod step;
pub mod thermal;

pub use conditions::Conditions;
pub use current::{Conduction, Currents};
pub use losses::Losses;
pub use point::{Core, Operation, Outcome, RectifierBank, Variant, solve};
