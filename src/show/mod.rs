//! Plain data to text: tables for people, CSV for spreadsheets, JSON for programs. Nothing is computed here but layout.

pub mod account;
pub mod audit;
pub mod csv;
pub mod fate;
pub mod grid;
pub mod json;
pub mod number;
pub mod rail;
pub mod shortlist;

/// How a result is written.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Format {
    /// For people.
    #[default]
    Table,
    /// For spreadsheets.
    Csv,
    /// For programs.
    Json,
}
