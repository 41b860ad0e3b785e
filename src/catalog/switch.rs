//! A row of `switches.csv` to a transistor.

use super::column::Catalog;
use super::identity;
use super::reading::{FromRow, sealed};
use super::row::Row;
use crate::part::{GateLevels, HotRatio, Switch};

const fn place(name: &str) -> usize {
    Catalog::Switches.place(name)
}

const THRESHOLD: usize = place("threshold_voltage");
const PLATEAU: usize = place("plateau_voltage");

impl sealed::Sealed for Switch {}

impl FromRow for Switch {
    const CATALOG: Catalog = Catalog::Switches;

    fn from_row(row: &mut Row<'_>) -> Option<Self> {
        let gate_levels = gate_levels(row);
        let hot_resistance = hot_resistance(row);
        Some(Self {
            identity: identity::read(row)?,
            voltage_rating_v: row.positive(const { place("voltage_rating") })?,
            on_resistance_ohm: row.curve(const { place("on_resistance") })?,
            on_resistance_max_ohm: row.curve(const { place("on_resistance_max") }),
            gate_charge_c: row.curve(const { place("gate_charge") })?,
            gate_drain_charge_c: row.positive(const { place("gate_drain_charge") })?,
            gate_source_charge_c: row.positive(const { place("gate_source_charge") }),
            gate_levels: gate_levels?,
            plateau_current_a: row.positive(const { place("plateau_current") }),
            gate_resistance_ohm: row.non_negative(const { place("gate_resistance") }),
            output_charge_c: row.curve(const { place("output_charge") }),
            recovery_charge_c: row.non_negative(const { place("recovery_charge") }),
            body_diode_drop_v: row.positive(const { place("body_diode_drop") }),
            hot_resistance,
            current_rating_a: row.positive(const { place("current_rating") }),
            gate_rating_v: row.positive(const { place("gate_rating") }),
            junction_limit_c: row.number(const { place("junction_limit") }),
            thermal_resistance_k_per_w: row.positive(const { place("thermal_resistance") })?,
        })
    }
}

/// Threshold and plateau, the plateau above the threshold.
fn gate_levels(row: &mut Row<'_>) -> Option<GateLevels> {
    let (threshold, plateau) = (row.positive(THRESHOLD), row.positive(PLATEAU));
    let levels = GateLevels::new(threshold, plateau);
    if let (None, Some(at), false) = (levels, row.place(PLATEAU), row.bad) {
        let (expected, help) = match threshold {
            Some(threshold) => (format!("a voltage above the threshold of {} V", threshold.get()), None),
            None => (
                "a voltage above 0.8 V, which the threshold is taken to lie below it".to_owned(),
                Some("give the `threshold_voltage` of this part".to_owned()),
            ),
        };
        let found = format!("{}: the plateau leaves no room for the threshold", row.name(at));
        row.refuse(at, found, expected, help);
    }
    levels
}

/// The hot ratio at its one temperature.
fn hot_resistance(row: &Row<'_>) -> Option<HotRatio> {
    const COLUMN: usize = place("hot_resistance_ratio");
    let (temperature_c, ratio, _) = row.points(COLUMN).last()?;
    HotRatio::new(crate::quantity::Positive::new(ratio)?, temperature_c)
}
