//! The program from outside: what it prints, returns, reads and writes.

mod faults;
mod files;
mod golden;
mod ground;
mod json;
mod status;
mod streams;
