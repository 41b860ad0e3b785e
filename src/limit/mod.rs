//! Everything that can refuse a stage: the only room that says "refused".
//!
//! A limit belongs to the least part of a stage that decides it, so that a search can refuse early: [`own`] to one part,
//! [`core`] to switches and inductor together, [`bank`] to one bank on such a core, [`total`] to the whole stage. Each hands its
//! checks to a receiver that may stop at the first broken one.

pub mod bank;
pub mod check;
pub mod core;
pub mod name;
pub mod own;
pub mod total;

pub use check::{Check, Finding, Receiver, Side};
pub use name::LimitName;
