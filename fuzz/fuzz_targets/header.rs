#![no_main]

#[path = "../entries/header.rs"]
mod header;

libfuzzer_sys::fuzz_target!(|data: &[u8]| header::run(data));
