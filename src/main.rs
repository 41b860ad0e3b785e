use std::process::ExitCode;

fn main() -> ExitCode {
    wattsieve::command::run(std::env::args_os())
}
