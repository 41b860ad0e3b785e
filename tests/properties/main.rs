//! Laws that the model, the account and the searches must keep for whatever parts: on random small problems.

mod agreement;
mod balance;
mod bounds;
mod draw;
mod heat;
mod modes;
mod monotone;
mod order;
mod parallel;
mod plain;
#[path = "../search/problem.rs"]
mod problem;
mod units;
