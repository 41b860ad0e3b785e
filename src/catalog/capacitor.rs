//! A row of `capacitors.csv` to a capacitor.

use super::column::Catalog;
use super::identity;
use super::reading::{FromRow, sealed};
use super::row::Row;
use crate::part::{Capacitor, CapacitorKind};

const fn place(name: &str) -> usize {
    Catalog::Capacitors.place(name)
}

/// In the order of the words of the column.
const KINDS: [CapacitorKind; 3] = [CapacitorKind::Ceramic, CapacitorKind::Polymer, CapacitorKind::Electrolytic];

impl sealed::Sealed for Capacitor {}

impl FromRow for Capacitor {
    const CATALOG: Catalog = Catalog::Capacitors;

    fn from_row(row: &mut Row<'_>) -> Option<Self> {
        let kind = row.word(const { place("kind") });
        Some(Self {
            identity: identity::read(row)?,
            kind: KINDS[kind?],
            capacitance_f: row.curve(const { place("capacitance") })?,
            tolerance: row.share(const { place("tolerance") }),
            voltage_rating_v: row.positive(const { place("voltage_rating") })?,
            esr_ohm: row.curve(const { place("esr") })?,
            esl_h: row.non_negative(const { place("esl") }),
            ripple_current_a: row.positive(const { place("ripple_current") }),
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalog::Cells;

    #[test]
    fn kinds_stand_in_the_order_of_their_words() {
        let Cells::Word(words) = Catalog::Capacitors.columns()[place("kind")].cells else { panic!("no words") };
        assert_eq!(words, KINDS.map(CapacitorKind::name));
    }
}
