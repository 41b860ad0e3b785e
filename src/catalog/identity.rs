//! What every row says: name, maker, price and size of its part.

use super::column::Catalog;
use super::row::Row;
use crate::part::Identity;
use crate::quantity::Positive;

/// The columns of [`Identity`] stand at the same places in every catalog.
const fn place(name: &str) -> usize {
    Catalog::Switches.place(name)
}

/// Place of the part name in the columns of every catalog.
pub(super) const PART: usize = place("part");
/// Place of the equivalent in the columns of every catalog.
pub(super) const EQUIVALENT_TO: usize = place("equivalent_to");

const LENGTH: usize = place("length");
const WIDTH: usize = place("width");

/// The identity of the part in `row`; `None` when it has no name.
pub(super) fn read(row: &mut Row<'_>) -> Option<Identity> {
    let area_mm2 = area_mm2(row);
    Some(Identity {
        part: row.text(PART)?,
        maker: row.text(const { place("maker") }),
        package: row.text(const { place("package") }),
        cost: row.non_negative(const { place("cost") }),
        area_mm2,
        height_m: row.positive(const { place("height") }),
        stock: row.non_negative(const { place("stock") }),
        note: row.text(const { place("note") }),
        equivalent_to: row.text(EQUIVALENT_TO),
    })
}

/// The area, or length times width.
fn area_mm2(row: &mut Row<'_>) -> Option<Positive> {
    let area = row.positive(const { place("area") });
    if area.is_some() {
        return area;
    }
    let in_mm = |length_m: Positive| length_m.get() * 1e3;
    match (row.positive(LENGTH), row.positive(WIDTH)) {
        (Some(length), Some(width)) => Positive::new(in_mm(length) * in_mm(width)),
        (None, None) => None,
        (Some(_), None) => alone(row, LENGTH, "width"),
        (None, Some(_)) => alone(row, WIDTH, "length"),
    }
}

fn alone(row: &mut Row<'_>, given: usize, missing: &str) -> Option<Positive> {
    if let (Some(place), false) = (row.place(given), row.bad) {
        let found = format!("{}: there is no `{missing}` with it", row.name(place));
        row.refuse(place, found, "length and width, or area, or none of them", None);
    }
    None
}
