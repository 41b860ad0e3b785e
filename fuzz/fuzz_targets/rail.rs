#![no_main]

#[path = "../entries/rail.rs"]
mod rail;

libfuzzer_sys::fuzz_target!(|data: &[u8]| rail::run(data));
