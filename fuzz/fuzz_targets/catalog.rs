#![no_main]

#[path = "../entries/catalog.rs"]
mod catalog;

libfuzzer_sys::fuzz_target!(|data: &[u8]| catalog::run(data));
