#![no_main]

#[path = "../entries/number.rs"]
mod number;

libfuzzer_sys::fuzz_target!(|data: &[u8]| number::run(data));
