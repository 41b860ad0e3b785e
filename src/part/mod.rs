//! Typed parts, valid by construction, and their laws at a working point.

pub mod assumed;
pub mod bank;
pub mod capacitor;
pub mod choke;
pub mod curve;
pub mod diode;
pub mod diode_bank;
pub mod identity;
pub mod inductor;
pub mod switch;
pub mod switch_bank;

pub use assumed::{Assumed, Slot};
pub use bank::Bank;
pub use capacitor::{Capacitor, CapacitorKind};
pub use choke::Choke;
pub use curve::Curve;
pub use diode::{Diode, DiodeKind};
pub use diode_bank::DiodeBank;
pub use identity::Identity;
pub use inductor::{CoreDatum, Heating, Inductor};
pub use switch::{GateLevels, HotRatio, Switch};
pub use switch_bank::{INPUTS, Surroundings, SwitchBank};

/// Every approved part, catalog by catalog, in the order of the catalogs' rows.
#[derive(Debug, Clone, Default)]
pub struct Parts {
    /// Transistors, for the high switch and for a switch rectifier.
    pub switches: Vec<Switch>,
    /// Diodes, for a diode rectifier.
    pub diodes: Vec<Diode>,
    /// Inductors.
    pub inductors: Vec<Inductor>,
    /// Capacitors, for both banks.
    pub capacitors: Vec<Capacitor>,
}
