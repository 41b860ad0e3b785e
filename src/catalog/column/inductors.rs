//! Columns of `inductors.csv`.

use super::{Column, Condition, Range, at, needed, optional, with_identity};
use crate::quantity::Dimension;

/// All columns.
pub(super) const ALL: [Column; 24] = with_identity(OWN);

const AT_BIAS: Condition = Condition {
    dimension: Dimension::Current,
    range: Range::NonNegative,
    default: Some(0.0),
    words: "a direct current",
};
const AT_WINDING: Condition = Condition {
    dimension: Dimension::Temperature,
    range: Range::Temperature,
    default: Some(25.0),
    words: "a winding temperature",
};
const AT_FREQUENCY: Condition =
    Condition { dimension: Dimension::Frequency, range: Range::Positive, default: None, words: "a frequency" };

const OWN: [Column; 13] = [
    at(needed("inductance", Dimension::Inductance, "inductance, also at one or more direct currents"), AT_BIAS),
    optional("tolerance", Dimension::Ratio, Range::Share, "half-width of the band of inductance", "20 %"),
    needed("dcr", Dimension::Resistance, "typical winding resistance at 25 °C"),
    optional(
        "dcr_max",
        Dimension::Resistance,
        Range::Positive,
        "greatest winding resistance at 25 °C, taken where limits are checked",
        "the typical one",
    ),
    at(
        needed("saturation_current", Dimension::Current, "current at which the inductance has fallen as far as it may"),
        AT_WINDING,
    ),
    optional(
        "heating_current",
        Dimension::Current,
        Range::Positive,
        "direct current that heats the winding by heating_rise",
        "a thermal resistance of 40 K/W",
    ),
    optional(
        "heating_rise",
        Dimension::TemperatureDifference,
        Range::Positive,
        "temperature rise at heating_current",
        "40 K",
    ),
    optional(
        "core_loss",
        Dimension::Power,
        Range::Positive,
        "core loss at one measured point, with core_frequency and core_ripple",
        "none, and the shortlist marks it",
    ),
    optional(
        "core_frequency",
        Dimension::Frequency,
        Range::Positive,
        "frequency of the core loss point",
        "no core loss",
    ),
    optional(
        "core_ripple",
        Dimension::Current,
        Range::Positive,
        "ripple of the core loss point, peak to peak",
        "no core loss",
    ),
    optional("core_alpha", Dimension::Plain, Range::Positive, "exponent of frequency in the core loss", "1.4"),
    optional("core_beta", Dimension::Plain, Range::Positive, "exponent of ripple in the core loss", "2.4"),
    at(
        optional(
            "ac_resistance",
            Dimension::Resistance,
            Range::Positive,
            "winding resistance at 25 °C for alternating current, at one or more frequencies",
            "dcr",
        ),
        AT_FREQUENCY,
    ),
];
