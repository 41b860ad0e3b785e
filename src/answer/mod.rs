//! One file for each question a user asks; each returns plain data.

pub mod fate;
pub mod rail;
pub mod shortlist;
