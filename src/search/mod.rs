//! The best stages of all, with proof.
//!
//! [`field`] fits every part to the rail once, [`trial`] judges one core and its banks, [`order`] says which of two stages comes
//! first, [`leaders`] keeps the best. [`exhaustive`] tries every stage, [`forced`] finds the best stage with each part.

pub mod bound;
pub mod completion;
pub mod exhaustive;
pub mod field;
pub mod forced;
pub mod leaders;
pub mod order;
mod pool;
pub mod progress;
pub mod pruned;
pub mod relax;
pub mod request;
pub mod trial;
pub mod unit;

pub use field::{Dropped, Field};
pub use order::Ranked;
pub use progress::Progress;
pub use request::{Distinct, Found, Request, Tolerance};
