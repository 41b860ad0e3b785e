//! Columns of `capacitors.csv`.

use super::{Cells, Column, Condition, Range, at, needed, optional, with_identity};
use crate::quantity::Dimension;

/// All columns.
pub(super) const ALL: [Column; 18] = with_identity(OWN);

const AT_BIAS: Condition =
    Condition { dimension: Dimension::Voltage, range: Range::NonNegative, default: Some(0.0), words: "a bias voltage" };
const AT_FREQUENCY: Condition =
    Condition { dimension: Dimension::Frequency, range: Range::Positive, default: Some(100e3), words: "a frequency" };

const OWN: [Column; 7] = [
    Column {
        name: "kind",
        cells: Cells::Word(&["ceramic", "polymer", "electrolytic"]),
        required: true,
        meaning: "kind of dielectric",
        default: "",
    },
    at(needed("capacitance", Dimension::Capacitance, "capacitance, also at one or more bias voltages"), AT_BIAS),
    optional(
        "tolerance",
        Dimension::Ratio,
        Range::Share,
        "half-width of the band of capacitance",
        "10 % for ceramic, 20 % for others",
    ),
    needed("voltage_rating", Dimension::Voltage, "greatest voltage"),
    at(needed("esr", Dimension::Resistance, "equivalent series resistance, at one or more frequencies"), AT_FREQUENCY),
    optional("esl", Dimension::Inductance, Range::NonNegative, "equivalent series inductance", "none"),
    optional("ripple_current", Dimension::Current, Range::Positive, "greatest ripple current, rms", "not checked"),
];
