//! From tables of text to typed parts.
//!
//! [`read_folder`] reads the four catalogs of a folder, [`read_texts`] those in memory. A cell goes through
//! `encoding` (bytes to UTF-8), `table` (records and cells), `layout` (which column it is in), `row` (its number) and one of
//! `switch`, `diode`, `inductor` and `capacitor` (the part). [`Catalog::columns`] is the list of columns they all follow.

mod alias;
mod capacitor;
mod column;
mod diode;
mod encoding;
mod folder;
mod header;
mod identity;
mod inductor;
mod layout;
mod marks;
mod names;
mod raw;
mod reading;
mod row;
mod scan;
mod sheet;
mod switch;
mod table;

pub use alias::ALIAS_FILE;
pub use column::{Catalog, Cells, Column, Condition, Range};
pub use folder::{RawTables, Read, ReadOptions, for_each_part, read_folder, read_texts};
pub use raw::{RawRow, RawTable};
pub use reading::{FromRow, Outcome};
pub use row::Row;
pub use table::{LONGEST_CELL, LONGEST_RECORD, MOST_CELLS};

#[cfg(test)]
mod tests;
