//! Columns of `diodes.csv`.

use super::{Cells, Column, Condition, Range, at, needed, optional, with_identity};
use crate::quantity::Dimension;

/// All columns.
pub(super) const ALL: [Column; 21] = with_identity(OWN);

const AT_CURRENT: Condition =
    Condition { dimension: Dimension::Current, range: Range::Positive, default: None, words: "a forward current" };
const AT_REVERSE: Condition = Condition {
    dimension: Dimension::Voltage,
    range: Range::Positive,
    default: Some(12.0),
    words: "a reverse voltage",
};
const AT_JUNCTION: Condition = Condition {
    dimension: Dimension::Temperature,
    range: Range::Temperature,
    default: Some(25.0),
    words: "a junction temperature",
};

const OWN: [Column; 10] = [
    Column {
        name: "kind",
        cells: Cells::Word(&["schottky", "silicon"]),
        required: false,
        meaning: "kind of junction",
        default: "schottky",
    },
    needed("voltage_rating", Dimension::Voltage, "greatest repetitive reverse voltage"),
    needed("current_rating", Dimension::Current, "greatest mean forward current"),
    at(needed("forward_drop", Dimension::Voltage, "forward drop at 25 °C, at one or more currents"), AT_CURRENT),
    optional(
        "drop_slope",
        Dimension::VoltageSlope,
        Range::Any,
        "change of the forward drop with temperature, usually below zero",
        "-1 mV/K for schottky, -2 mV/K for silicon",
    ),
    at(
        optional(
            "leakage",
            Dimension::Current,
            Range::Positive,
            "reverse leakage, at one or more junction temperatures",
            "none, and runaway is not checked",
        ),
        AT_JUNCTION,
    ),
    at(
        optional(
            "junction_charge",
            Dimension::Charge,
            Range::Positive,
            "charge of the junction capacitance, at one or more reverse voltages",
            "none",
        ),
        AT_REVERSE,
    ),
    optional(
        "recovery_charge",
        Dimension::Charge,
        Range::NonNegative,
        "recovery charge; a silicon diode cannot be judged without it",
        "none for schottky; silicon is left out",
    ),
    optional("junction_limit", Dimension::Temperature, Range::Temperature, "greatest junction temperature", "150 °C"),
    needed("thermal_resistance", Dimension::ThermalResistance, "junction to ambient, on the board"),
];
