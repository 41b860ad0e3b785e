//! What a stage must hold, what it is worth, and which parts are allowed.

use super::{Bounds, Key, Kind, Preset};
use crate::quantity::Dimension;

const DERATING: Kind = Kind::Number(Dimension::Ratio, Bounds::UpToOne);
const NO_LIMIT: &str = "no limit";
const NO_WORTH: &str = "not weighed";
const ANY_PART: &str = "any part of the catalog";

/// `limits.junction_margin`
pub const LIMITS_JUNCTION_MARGIN: Key = Key::or(
    "limits.junction_margin",
    Kind::Number(Dimension::TemperatureDifference, Bounds::ZeroOrMore),
    Preset::Number(15.0),
    "common practice, no source",
    "kept below each part's own junction limit",
);

/// `limits.voltage_derating`
pub const LIMITS_VOLTAGE_DERATING: Key = Key::or(
    "limits.voltage_derating",
    DERATING,
    Preset::Number(0.8),
    "common practice, no source",
    "share of a semiconductor's voltage rating that may be used",
);

/// `limits.current_derating`
pub const LIMITS_CURRENT_DERATING: Key = Key::or(
    "limits.current_derating",
    DERATING,
    Preset::Number(0.9),
    "common practice, no source",
    "share of a diode's current rating that may be used",
);

/// `limits.ringing`
pub const LIMITS_RINGING: Key = Key::or(
    "limits.ringing",
    Kind::Number(Dimension::Ratio, Bounds::OneOrMore),
    Preset::Number(1.2),
    "an ordinary layout (common practice, no source)",
    "overshoot of the switch node, multiplies the highest input or the surge",
);

/// `limits.saturation_margin`
pub const LIMITS_SATURATION_MARGIN: Key = Key::or(
    "limits.saturation_margin",
    Kind::Number(Dimension::Ratio, Bounds::AboveZero),
    Preset::Number(1.2),
    "common practice, no source",
    "saturation current over peak current, at least",
);

/// `limits.winding_temperature`
pub const LIMITS_WINDING_TEMPERATURE: Key = Key::or(
    "limits.winding_temperature",
    Kind::Number(Dimension::Temperature, Bounds::Celsius),
    Preset::Number(125.0),
    "ordinary rating of power inductors (common practice, no source)",
    "greatest winding temperature",
);

/// `limits.capacitor_voltage_derating.ceramic`
pub const DERATING_CERAMIC: Key = Key::or(
    "limits.capacitor_voltage_derating.ceramic",
    DERATING,
    Preset::Number(0.8),
    "common practice, no source",
    "share of a ceramic capacitor's voltage rating that may be used",
);

/// `limits.capacitor_voltage_derating.polymer`
pub const DERATING_POLYMER: Key = Key::or(
    "limits.capacitor_voltage_derating.polymer",
    DERATING,
    Preset::Number(0.8),
    "common practice, no source",
    "share of a polymer capacitor's voltage rating that may be used",
);

/// `limits.capacitor_voltage_derating.electrolytic`
pub const DERATING_ELECTROLYTIC: Key = Key::or(
    "limits.capacitor_voltage_derating.electrolytic",
    DERATING,
    Preset::Number(0.8),
    "common practice, no source",
    "share of an electrolytic capacitor's voltage rating that may be used",
);

/// `limits.area`
pub const LIMITS_AREA: Key = Key::or(
    "limits.area",
    Kind::Number(Dimension::Area, Bounds::AboveZero),
    Preset::Nothing,
    NO_LIMIT,
    "greatest sum of part areas",
);

/// `limits.height`
pub const LIMITS_HEIGHT: Key = Key::or(
    "limits.height",
    Kind::Number(Dimension::Length, Bounds::AboveZero),
    Preset::Nothing,
    NO_LIMIT,
    "greatest height of any part",
);

/// `limits.cost`
pub const LIMITS_COST: Key = Key::or(
    "limits.cost",
    Kind::Number(Dimension::Plain, Bounds::AboveZero),
    Preset::Nothing,
    NO_LIMIT,
    "greatest sum of part costs, in the user's money",
);

/// `limits.efficiency`
pub const LIMITS_EFFICIENCY: Key = Key::or(
    "limits.efficiency",
    Kind::Number(Dimension::Ratio, Bounds::BelowOne),
    Preset::Nothing,
    NO_LIMIT,
    "least weighted efficiency",
);

/// `worth.loss`
pub const WORTH_LOSS: Key = Key::or(
    "worth.loss",
    Kind::Rate(Some("1/W")),
    Preset::Number(1.0),
    "rank by weighted loss",
    "what a watt of weighted loss is worth, in the user's money",
);

/// `worth.area`
pub const WORTH_AREA: Key = Key::or(
    "worth.area",
    Kind::Rate(Some("1/mm²")),
    Preset::Number(0.0),
    NO_WORTH,
    "what a mm² is worth, in the user's money",
);

/// `worth.cost`
pub const WORTH_COST: Key =
    Key::or("worth.cost", Kind::Rate(None), Preset::Number(0.0), NO_WORTH, "multiplies the part cost");

/// `parts.pin.high_switch`
pub const PIN_HIGH_SWITCH: Key =
    Key::or("parts.pin.high_switch", Kind::Names, Preset::Nothing, ANY_PART, "the only high switches allowed");

/// `parts.pin.rectifier`
pub const PIN_RECTIFIER: Key =
    Key::or("parts.pin.rectifier", Kind::Names, Preset::Nothing, ANY_PART, "the only rectifiers allowed");

/// `parts.pin.inductor`
pub const PIN_INDUCTOR: Key =
    Key::or("parts.pin.inductor", Kind::Names, Preset::Nothing, ANY_PART, "the only inductors allowed");

/// `parts.pin.input`
pub const PIN_INPUT: Key =
    Key::or("parts.pin.input", Kind::Names, Preset::Nothing, ANY_PART, "the only input capacitors allowed");

/// `parts.pin.output`
pub const PIN_OUTPUT: Key =
    Key::or("parts.pin.output", Kind::Names, Preset::Nothing, ANY_PART, "the only output capacitors allowed");

/// `parts.ban`
pub const PARTS_BAN: Key = Key::or(
    "parts.ban",
    Kind::Names,
    Preset::Nothing,
    "nothing is banned",
    "parts never used, by name or as maker:NAME",
);
