//! Columns of every catalog.

use super::{Cells, Column, Range, optional};
use crate::quantity::Dimension;

const fn text(name: &'static str, meaning: &'static str, default: &'static str) -> Column {
    Column { name, cells: Cells::Text, required: false, meaning, default }
}

/// What every part has.
pub(super) const COLUMNS: [Column; 11] = [
    Column {
        name: "part",
        cells: Cells::Text,
        required: true,
        meaning: "part name, unique in its catalog",
        default: "",
    },
    text("maker", "who makes it; a rail may ban a maker", "no maker"),
    text("package", "package name", "no package"),
    optional(
        "cost",
        Dimension::Plain,
        Range::NonNegative,
        "price of one, in your money",
        "unknown: left out where cost counts",
    ),
    optional(
        "area",
        Dimension::Area,
        Range::Positive,
        "board area of one",
        "length times width, else unknown: left out where area counts",
    ),
    optional(
        "length",
        Dimension::Length,
        Range::Positive,
        "length on the board, together with width in place of area",
        "unknown",
    ),
    optional(
        "width",
        Dimension::Length,
        Range::Positive,
        "width on the board, together with length in place of area",
        "unknown",
    ),
    optional(
        "height",
        Dimension::Length,
        Range::Positive,
        "height above the board",
        "unknown: left out where height is limited",
    ),
    optional("stock", Dimension::Plain, Range::NonNegative, "pieces held", "unknown"),
    text("note", "your own words", "no note"),
    text("equivalent_to", "a part of the same catalog that this one may stand in for", "no equivalent"),
];
