//! A row of `diodes.csv` to a diode.

use super::column::Catalog;
use super::identity;
use super::reading::{FromRow, sealed};
use super::row::Row;
use crate::part::{Diode, DiodeKind};

const fn place(name: &str) -> usize {
    Catalog::Diodes.place(name)
}

/// In the order of the words of the column.
const KINDS: [DiodeKind; 2] = [DiodeKind::Schottky, DiodeKind::Silicon];

impl sealed::Sealed for Diode {}

impl FromRow for Diode {
    const CATALOG: Catalog = Catalog::Diodes;

    fn from_row(row: &mut Row<'_>) -> Option<Self> {
        let kind = row.word(const { place("kind") });
        Some(Self {
            identity: identity::read(row)?,
            kind: kind.map_or(DiodeKind::Schottky, |kind| KINDS[kind]),
            voltage_rating_v: row.positive(const { place("voltage_rating") })?,
            current_rating_a: row.positive(const { place("current_rating") })?,
            forward_drop_v: row.curve(const { place("forward_drop") })?,
            drop_slope_v_per_k: row.number(const { place("drop_slope") }),
            leakage_a: row.curve(const { place("leakage") }),
            junction_charge_c: row.curve(const { place("junction_charge") }),
            recovery_charge_c: row.non_negative(const { place("recovery_charge") }),
            junction_limit_c: row.number(const { place("junction_limit") }),
            thermal_resistance_k_per_w: row.positive(const { place("thermal_resistance") })?,
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalog::Cells;

    #[test]
    fn kinds_stand_in_the_order_of_their_words() {
        let Cells::Word(words) = Catalog::Diodes.columns()[place("kind")].cells else { panic!("no words") };
        assert_eq!((words, KINDS.len()), (&["schottky", "silicon"][..], 2));
    }
}
