//! Columns of `switches.csv`.

use super::{Column, Condition, Range, at, needed, optional, with_identity};
use crate::quantity::Dimension;

/// All columns.
pub(super) const ALL: [Column; 29] = with_identity(OWN);

const AT_GATE: Condition =
    Condition { dimension: Dimension::Voltage, range: Range::Positive, default: None, words: "a gate voltage" };
const AT_DRAIN: Condition =
    Condition { dimension: Dimension::Voltage, range: Range::Positive, default: Some(12.0), words: "a drain voltage" };
const WHEN_HOT: Condition = Condition {
    dimension: Dimension::Temperature,
    range: Range::AboveRoom,
    default: Some(125.0),
    words: "a junction temperature",
};

const OWN: [Column; 18] = [
    needed("voltage_rating", Dimension::Voltage, "greatest drain-source voltage"),
    at(
        needed("on_resistance", Dimension::Resistance, "typical on-resistance at 25 °C, at one or more gate voltages"),
        AT_GATE,
    ),
    at(
        optional(
            "on_resistance_max",
            Dimension::Resistance,
            Range::Positive,
            "greatest on-resistance at 25 °C, taken where limits are checked",
            "the typical one",
        ),
        AT_GATE,
    ),
    at(needed("gate_charge", Dimension::Charge, "total gate charge, at one or more gate voltages"), AT_GATE),
    needed("gate_drain_charge", Dimension::Charge, "gate-drain charge, also called Miller charge"),
    optional(
        "gate_source_charge",
        Dimension::Charge,
        Range::Positive,
        "gate-source charge up to the plateau",
        "a third of the gate-drain charge between threshold and plateau",
    ),
    optional(
        "threshold_voltage",
        Dimension::Voltage,
        Range::Positive,
        "gate voltage at which the channel begins to conduct",
        "plateau less 0.8 V",
    ),
    optional(
        "plateau_voltage",
        Dimension::Voltage,
        Range::Positive,
        "gate voltage of the plateau, at the drain current of the gate-charge test",
        "threshold plus 0.8 V, else 2.5 V",
    ),
    optional(
        "plateau_current",
        Dimension::Current,
        Range::Positive,
        "drain current of the gate-charge test",
        "the full load of the rail",
    ),
    optional("gate_resistance", Dimension::Resistance, Range::NonNegative, "internal gate resistance", "1 Ω"),
    at(
        optional(
            "output_charge",
            Dimension::Charge,
            Range::Positive,
            "charge of the output capacitance, at one or more drain voltages",
            "the gate charge, at 12 V",
        ),
        AT_DRAIN,
    ),
    optional(
        "recovery_charge",
        Dimension::Charge,
        Range::NonNegative,
        "recovery charge of the body diode",
        "1.5 times the gate-drain charge",
    ),
    optional("body_diode_drop", Dimension::Voltage, Range::Positive, "forward drop of the body diode", "0.8 V"),
    at(
        optional(
            "hot_resistance_ratio",
            Dimension::Ratio,
            Range::Positive,
            "on-resistance when hot over that at 25 °C",
            "1.5 at 125 °C",
        ),
        WHEN_HOT,
    ),
    optional("current_rating", Dimension::Current, Range::Positive, "greatest drain current", "not checked"),
    optional("gate_rating", Dimension::Voltage, Range::Positive, "greatest gate voltage", "not checked"),
    optional("junction_limit", Dimension::Temperature, Range::Temperature, "greatest junction temperature", "150 °C"),
    needed("thermal_resistance", Dimension::ThermalResistance, "junction to ambient, on the board"),
];
