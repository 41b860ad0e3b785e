//! Every key of the rail file, once: what it means, what may be written, and what holds without it.
//!
//! The reader, the `rail` command, the help and the guide all take their defaults from here.

mod drive;
mod key;
mod limits;
mod stage;
mod supply;

pub use drive::*;
pub use key::{Bounds, Key, Kind, Preset};
pub use limits::*;
pub use stage::*;
pub use supply::*;

/// The greatest count of equal parts in parallel that may be asked for.
pub const MOST_PARALLEL: u32 = 64;

/// The most entries of a list that is crossed or evaluated in full: frequencies, loads.
pub const MOST_LISTED: usize = 1000;

/// Every key in the order of the file.
pub const KEYS: &[&Key] = &[
    &NAME,
    &INPUT_MIN,
    &INPUT_TYPICAL,
    &INPUT_MAX,
    &INPUT_RIPPLE,
    &INPUT_SURGE,
    &OUTPUT_VOLTAGE,
    &OUTPUT_CURRENT,
    &OUTPUT_PEAK,
    &OUTPUT_RIPPLE,
    &STEP_CURRENT,
    &STEP_DEVIATION,
    &STEP_CROSSOVER,
    &AMBIENT_TEMPERATURE,
    &DRIVE_VOLTAGE,
    &DRIVE_PULL_UP,
    &DRIVE_PULL_DOWN,
    &DRIVE_DEAD_TIME,
    &DRIVE_MINIMUM_ON,
    &DRIVE_MINIMUM_OFF,
    &DRIVE_BIAS,
    &DRIVE_SUPPLY,
    &DRIVE_SUPPLY_LIMIT,
    &STAGE_RECTIFIER,
    &STAGE_LIGHT_LOAD,
    &STAGE_FREQUENCY,
    &FREQUENCY_FROM,
    &FREQUENCY_TO,
    &FREQUENCY_STEPS,
    &PARALLEL_HIGH_SWITCH,
    &PARALLEL_RECTIFIER,
    &PARALLEL_INPUT,
    &PARALLEL_OUTPUT,
    &RIPPLE_RATIO_MIN,
    &RIPPLE_RATIO_MAX,
    &LOAD_CURRENT,
    &LOAD_SHARE,
    &LIMITS_JUNCTION_MARGIN,
    &LIMITS_VOLTAGE_DERATING,
    &LIMITS_CURRENT_DERATING,
    &LIMITS_RINGING,
    &LIMITS_SATURATION_MARGIN,
    &LIMITS_WINDING_TEMPERATURE,
    &DERATING_CERAMIC,
    &DERATING_POLYMER,
    &DERATING_ELECTROLYTIC,
    &LIMITS_AREA,
    &LIMITS_HEIGHT,
    &LIMITS_COST,
    &LIMITS_EFFICIENCY,
    &WORTH_LOSS,
    &WORTH_AREA,
    &WORTH_COST,
    &PIN_HIGH_SWITCH,
    &PIN_RECTIFIER,
    &PIN_INDUCTOR,
    &PIN_INPUT,
    &PIN_OUTPUT,
    &PARTS_BAN,
];

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_default_is_within_its_own_bounds_and_has_a_reason() {
        for key in KEYS {
            assert_eq!(key.reason.is_empty(), key.preset == Preset::Required, "{}", key.path);
            assert!(!key.meaning.is_empty(), "{}", key.path);
            match (key.kind, key.preset) {
                (Kind::Number(_, bounds) | Kind::NumberOrNone(_, bounds), Preset::Number(value)) => {
                    assert!(bounds.hold(value), "{}", key.path);
                }
                (Kind::Rate(_), Preset::Number(value)) => assert!(value >= 0.0, "{}", key.path),
                (Kind::Count(most), Preset::Count(count)) => assert!((1..=most).contains(&count), "{}", key.path),
                (Kind::Word(words), Preset::Word(word)) => assert!(words.contains(&word), "{}", key.path),
                (Kind::Words(words), Preset::Words(some)) => {
                    assert!(!some.is_empty() && some.iter().all(|word| words.contains(word)), "{}", key.path);
                }
                (Kind::Supply, Preset::Word(word)) => assert!(SUPPLY_WORDS.contains(&word)),
                (Kind::Frequencies, Preset::Number(frequency_hz)) => assert!(frequency_hz > 0.0),
                (_, Preset::Required | Preset::Times(_) | Preset::Nothing) => {}
                (kind, preset) => panic!("{}: {preset:?} is no value of {kind:?}", key.path),
            }
        }
    }

    #[test]
    fn a_path_is_listed_once_and_splits_into_section_and_name() {
        let mut paths: Vec<_> = KEYS.iter().map(|key| key.path).collect();
        paths.sort_unstable();
        paths.dedup();
        assert_eq!(paths.len(), KEYS.len());
        assert_eq!(
            (DERATING_CERAMIC.section(), DERATING_CERAMIC.name()),
            ("limits.capacitor_voltage_derating", "ceramic")
        );
        assert_eq!((NAME.section(), NAME.name()), ("", "name"));
    }
}
