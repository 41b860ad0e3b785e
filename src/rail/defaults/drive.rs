//! Gate drive and controller.

use super::{Bounds, Key, Kind, Preset};
use crate::quantity::Dimension;

const RESISTANCE: Kind = Kind::Number(Dimension::Resistance, Bounds::AboveZero);
const TIME: Kind = Kind::Number(Dimension::Time, Bounds::ZeroOrMore);

/// The supplies that have a name.
pub const SUPPLY_WORDS: &[&str] = &["input", "output"];

/// `drive.voltage`
pub const DRIVE_VOLTAGE: Key = Key::or(
    "drive.voltage",
    Kind::Number(Dimension::Voltage, Bounds::AboveZero),
    Preset::Number(5.0),
    "gate supply of logic-level switches (common practice, no source)",
    "gate supply of both switches",
);

/// `drive.pull_up`
pub const DRIVE_PULL_UP: Key = Key::or(
    "drive.pull_up",
    RESISTANCE,
    Preset::Number(2.0),
    "an ordinary integrated driver (common practice, no source)",
    "driver and external gate resistance while the gate is charged",
);

/// `drive.pull_down`
pub const DRIVE_PULL_DOWN: Key = Key::or(
    "drive.pull_down",
    RESISTANCE,
    Preset::Number(1.0),
    "an ordinary integrated driver pulls down harder than up (common practice, no source)",
    "driver and external gate resistance while the gate is discharged",
);

/// `drive.dead_time`
pub const DRIVE_DEAD_TIME: Key = Key::or(
    "drive.dead_time",
    TIME,
    Preset::Number(20e-9),
    "an ordinary controller (common practice, no source)",
    "time with both switches off, at each edge",
);

/// `drive.minimum_on`
pub const DRIVE_MINIMUM_ON: Key = Key::or(
    "drive.minimum_on",
    TIME,
    Preset::Number(0.0),
    "the controller is taken to reach any on-time",
    "shortest on-time of the controller",
);

/// `drive.minimum_off`
pub const DRIVE_MINIMUM_OFF: Key = Key::or(
    "drive.minimum_off",
    TIME,
    Preset::Number(0.0),
    "the controller is taken to reach any off-time",
    "shortest off-time of the controller",
);

/// `drive.bias`
pub const DRIVE_BIAS: Key = Key::or(
    "drive.bias",
    Kind::Number(Dimension::Current, Bounds::ZeroOrMore),
    Preset::Number(0.0),
    "the controller's own consumption is left out",
    "supply current of the controller, from the same supply as the gates",
);

/// `drive.supply`
pub const DRIVE_SUPPLY: Key = Key::or(
    "drive.supply",
    Kind::Supply,
    Preset::Word("input"),
    "the linear regulator inside the controller (common practice, no source)",
    "where gate charge and bias come from: \"input\" through a linear regulator, \"output\", \
     or the efficiency of a converter",
);

/// `drive.supply_limit`
pub const DRIVE_SUPPLY_LIMIT: Key = Key::or(
    "drive.supply_limit",
    Kind::Number(Dimension::Current, Bounds::AboveZero),
    Preset::Nothing,
    "no limit",
    "greatest current of the gate supply",
);
