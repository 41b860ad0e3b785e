//! Figures that no passing stage of a unit can undercut.
//!
//! A *unit* is a set of stages: one frequency, one kind of rectifier, the high switches and rectifiers still in play, a few
//! inductors of like ripple. [`spread`] holds between which values resistances, drops and charges lie over a unit, [`reach`] what
//! that says of duty and currents at each point, and [`high`], [`rectifier`], [`choke`], [`bank`] give, for one candidate in one slot,
//! the least loss it can have in any stage of the unit, or the proof that no stage with it passes.
//!
//! Every loss is monotone in each of the figures it depends on, so it is least at a known end of each span.

pub mod around;
pub mod bank;
pub mod choke;
pub mod high;
pub mod price;
pub mod reach;
pub mod rectifier;
pub mod span;
pub mod spread;

pub use around::Around;
pub use price::{Price, Rates};
pub use reach::{Flow, Place, Reach};
pub use span::Span;
pub use spread::Spread;
