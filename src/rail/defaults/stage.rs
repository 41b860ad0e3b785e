//! What is crossed, and the loads it is weighted by.

use super::{Bounds, Key, Kind, MOST_LISTED, MOST_PARALLEL, Preset};
use crate::quantity::Dimension;

const FREQUENCY: Kind = Kind::Number(Dimension::Frequency, Bounds::AboveZero);
const COUNT: Kind = Kind::Count(MOST_PARALLEL);
const ONE: Preset = Preset::Count(1);
const NO_PARALLEL: &str = "nothing in parallel";
const RATIO: Kind = Kind::Number(Dimension::Ratio, Bounds::AboveZero);
const NO_WINDOW: &str = "no limit";
const ONE_FREQUENCY: &str = "only for a range of frequencies";

/// `stage.rectifier`
pub const STAGE_RECTIFIER: Key = Key::or(
    "stage.rectifier",
    Kind::Words(&["switch", "diode"]),
    Preset::Words(&["switch", "diode"]),
    "both kinds are crossed",
    "kinds of rectifier to cross",
);

/// `stage.light_load`
pub const STAGE_LIGHT_LOAD: Key = Key::or(
    "stage.light_load",
    Kind::Word(&["forced", "emulated"]),
    Preset::Word("forced"),
    "a switch rectifier stays on when its current reverses (common practice, no source)",
    "what a switch rectifier does when its current reaches zero: \"forced\" continuous conduction or \"emulated\" diode",
);

/// `stage.frequency`
pub const STAGE_FREQUENCY: Key = Key::or(
    "stage.frequency",
    Kind::Frequencies,
    Preset::Number(500e3),
    "an ordinary frequency for a stage of this kind (common practice, no source)",
    "switching frequencies to cross: one, a list, or { from, to, steps } spaced in equal ratios",
);

/// `stage.frequency.from`
pub const FREQUENCY_FROM: Key =
    Key::or("stage.frequency.from", FREQUENCY, Preset::Nothing, ONE_FREQUENCY, "least switching frequency");

/// `stage.frequency.to`
pub const FREQUENCY_TO: Key =
    Key::or("stage.frequency.to", FREQUENCY, Preset::Nothing, ONE_FREQUENCY, "greatest switching frequency");

/// `stage.frequency.steps`
pub const FREQUENCY_STEPS: Key = Key::or(
    "stage.frequency.steps",
    Kind::Count(MOST_LISTED as u32),
    Preset::Nothing,
    ONE_FREQUENCY,
    "how many frequencies, both ends included",
);

/// `stage.parallel.high_switch`
pub const PARALLEL_HIGH_SWITCH: Key =
    Key::or("stage.parallel.high_switch", COUNT, ONE, NO_PARALLEL, "most high switches in parallel");

/// `stage.parallel.rectifier`
pub const PARALLEL_RECTIFIER: Key =
    Key::or("stage.parallel.rectifier", COUNT, ONE, NO_PARALLEL, "most rectifiers in parallel");

/// `stage.parallel.input`
pub const PARALLEL_INPUT: Key =
    Key::or("stage.parallel.input", COUNT, ONE, NO_PARALLEL, "most input capacitors in parallel");

/// `stage.parallel.output`
pub const PARALLEL_OUTPUT: Key =
    Key::or("stage.parallel.output", COUNT, ONE, NO_PARALLEL, "most output capacitors in parallel");

/// `stage.ripple_ratio.min`
pub const RIPPLE_RATIO_MIN: Key = Key::or(
    "stage.ripple_ratio.min",
    RATIO,
    Preset::Nothing,
    NO_WINDOW,
    "least inductor ripple over full load, at typical input",
);

/// `stage.ripple_ratio.max`
pub const RIPPLE_RATIO_MAX: Key = Key::or(
    "stage.ripple_ratio.max",
    RATIO,
    Preset::Nothing,
    NO_WINDOW,
    "greatest inductor ripple over full load, at typical input",
);

/// `load.current`
pub const LOAD_CURRENT: Key = Key::or(
    "load.current",
    Kind::Number(Dimension::Current, Bounds::AboveZero),
    Preset::Times(1.0),
    "full load, all the time",
    "a current of the load profile, at most the full load",
);

/// `load.share`
pub const LOAD_SHARE: Key = Key::or(
    "load.share",
    Kind::Number(Dimension::Ratio, Bounds::AboveZero),
    Preset::Number(1.0),
    "equal shares",
    "share of time at that current; the shares are normalised to sum 1",
);
