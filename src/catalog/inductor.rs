//! A row of `inductors.csv` to an inductor.

use super::column::Catalog;
use super::identity;
use super::reading::{FromRow, sealed};
use super::row::Row;
use crate::part::{CoreDatum, Heating, Inductor};

const fn place(name: &str) -> usize {
    Catalog::Inductors.place(name)
}

impl sealed::Sealed for Inductor {}

impl FromRow for Inductor {
    const CATALOG: Catalog = Catalog::Inductors;

    fn from_row(row: &mut Row<'_>) -> Option<Self> {
        let core = core(row);
        let rise_k = row.positive(const { place("heating_rise") });
        let heating_current = row.positive(const { place("heating_current") });
        Some(Self {
            identity: identity::read(row)?,
            inductance_h: row.curve(const { place("inductance") })?,
            tolerance: row.share(const { place("tolerance") }),
            dcr_ohm: row.positive(const { place("dcr") })?,
            dcr_max_ohm: row.positive(const { place("dcr_max") }),
            saturation_current_a: row.curve(const { place("saturation_current") })?,
            heating: heating_current.map(|current_a| Heating { current_a, rise_k }),
            core,
            ac_resistance_ohm: row.curve(const { place("ac_resistance") }),
        })
    }
}

/// The core loss point: all three numbers of it, or none.
fn core(row: &mut Row<'_>) -> Option<CoreDatum> {
    const POINT: [usize; 3] = [place("core_loss"), place("core_frequency"), place("core_ripple")];
    match POINT.map(|column| row.positive(column)) {
        [Some(loss_w), Some(frequency_hz), Some(ripple_a)] => Some(CoreDatum {
            loss_w,
            frequency_hz,
            ripple_a,
            alpha: row.positive(const { place("core_alpha") }),
            beta: row.positive(const { place("core_beta") }),
        }),
        [None, None, None] => None,
        some => {
            let given = POINT.into_iter().zip(some).find_map(|(column, value)| value.and(row.place(column)));
            let missing: Vec<_> = POINT.into_iter().zip(some).filter(|(_, value)| value.is_none()).collect();
            if let (Some(given), false) = (given, row.bad) {
                let names: Vec<_> = missing
                    .iter()
                    .map(|(column, _)| format!("`{}`", Catalog::Inductors.columns()[*column].name))
                    .collect();
                let found = format!("{}: there is no {} with it", row.name(given), names.join(" and no "));
                row.refuse(given, found, "core_loss, core_frequency and core_ripple, or none of them", None);
            }
            None
        }
    }
}
