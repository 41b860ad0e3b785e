//! `wattsieve` crosses every approved part of a step-down supply through an electro-thermal loss
//! model and ranks what is left, exactly.
//!
//! The house, in the order in which data flows through it. A room imports only rooms above it:
//!
//! 1. [`quantity`]: numbers with units, text to `f64` in SI and back.
//! 2. [`fault`]: what is wrong with a user's text, and where.
//! 3. [`part`]: typed parts and their laws at a working point.
//! 4. [`rail`]: the supply to be built, typed, and the file it is written in.
//! 5. [`catalog`]: the lists of approved parts, from tables of text to typed parts.
//! 6. [`stage`]: one combination of parts, counts and a frequency; [`footing`]: what parts cost and take up.
//! 7. [`model`]: currents, losses, temperatures and ripple of a stage at a point; pure functions.
//! 8. [`burden`]: the one figure that is minimised.
//! 9. [`limit`]: everything that can refuse a stage.
//! 10. [`account`]: every watt of one stage, by cause, at every point.
//! 11. [`search`]: the best stages of all, with proof.
//! 12. [`answer`]: one file for each question a user asks.
//! 13. [`demo`]: the built-in rail and catalogs.
//! 14. [`show`]: plain data to tables, CSV and JSON.
//! 15. [`command`]: the command line.
#![forbid(unsafe_code)]
#![warn(missing_docs)]

pub mod account;
pub mod answer;
pub mod burden;
pub mod catalog;
pub mod command;
pub mod demo;
pub mod fault;
pub mod footing;
pub mod limit;
pub mod model;
pub mod part;
pub mod quantity;
pub mod rail;
pub mod search;
pub mod show;
pub mod stage;
