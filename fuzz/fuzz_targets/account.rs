#![no_main]

#[path = "../entries/account.rs"]
mod account;

libfuzzer_sys::fuzz_target!(|data: &[u8]| account::run(data));
