//! Name, input, output and surroundings.

use super::{Bounds, Key, Kind, Preset};
use crate::quantity::Dimension;

const VOLTAGE: Kind = Kind::Number(Dimension::Voltage, Bounds::AboveZero);
const CURRENT: Kind = Kind::Number(Dimension::Current, Bounds::AboveZero);
const RIPPLE: Kind = Kind::NumberOrNone(Dimension::Voltage, Bounds::AboveZero);
const NO_STEP: &str = "no load step is checked";

/// `name`
pub const NAME: Key = Key::required("name", Kind::Text, "what the supply is called on screens and in files");

/// `input.voltage.min`
pub const INPUT_MIN: Key = Key::required("input.voltage.min", VOLTAGE, "least input voltage");

/// `input.voltage.typical`
pub const INPUT_TYPICAL: Key =
    Key::required("input.voltage.typical", VOLTAGE, "input voltage at which losses are weighted");

/// `input.voltage.max`
pub const INPUT_MAX: Key = Key::required("input.voltage.max", VOLTAGE, "greatest input voltage");

/// `input.ripple`
pub const INPUT_RIPPLE: Key = Key::or(
    "input.ripple",
    RIPPLE,
    Preset::Times(0.05),
    "5 % of the least input (common practice, no source)",
    "greatest input ripple, peak to peak; \"none\" for no limit",
);

/// `input.surge`
pub const INPUT_SURGE: Key = Key::or(
    "input.surge",
    VOLTAGE,
    Preset::Times(1.0),
    "the greatest input: no transient beyond it",
    "transient that the parts must stand; not an operating corner",
);

/// `output.voltage`
pub const OUTPUT_VOLTAGE: Key = Key::required("output.voltage", VOLTAGE, "output voltage, below the least input");

/// `output.current`
pub const OUTPUT_CURRENT: Key = Key::required("output.current", CURRENT, "full load");

/// `output.peak`
pub const OUTPUT_PEAK: Key = Key::or(
    "output.peak",
    CURRENT,
    Preset::Times(1.0),
    "the full load: no current limit or start-up load above it",
    "current limit or start-up load, for saturation and switch current",
);

/// `output.ripple`
pub const OUTPUT_RIPPLE: Key = Key::or(
    "output.ripple",
    RIPPLE,
    Preset::Times(0.01),
    "1 % of the output (common practice, no source)",
    "greatest output ripple, peak to peak; \"none\" for no limit",
);

/// `output.step.current`
pub const STEP_CURRENT: Key =
    Key::or("output.step.current", CURRENT, Preset::Nothing, NO_STEP, "change of the load in a load step");

/// `output.step.deviation`
pub const STEP_DEVIATION: Key = Key::or(
    "output.step.deviation",
    VOLTAGE,
    Preset::Nothing,
    NO_STEP,
    "greatest deviation of the output after the load step",
);

/// `output.step.crossover`
pub const STEP_CROSSOVER: Key = Key::or(
    "output.step.crossover",
    Kind::Number(Dimension::Frequency, Bounds::AboveZero),
    Preset::Nothing,
    "the deviation is the floor that no controller can beat",
    "crossover frequency of the control loop",
);

/// `ambient.temperature`
pub const AMBIENT_TEMPERATURE: Key = Key::or(
    "ambient.temperature",
    Kind::Number(Dimension::Temperature, Bounds::Celsius),
    Preset::Number(25.0),
    "room temperature, to which data sheets refer",
    "the worst still air at the board",
);
