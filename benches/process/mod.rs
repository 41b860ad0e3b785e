//! One run of a program: its wall clock, processor time and greatest memory.

use std::fs;
use std::io;
use std::process::Command;
use std::time::{Duration, Instant};

/// How often a running process is asked for its memory. Its greatest is kept by the system; only what it gains in the last
/// interval before its end is missed.
const GLANCE: Duration = Duration::from_millis(1);
/// The system counts the processor time of a process in these, s.
const TICK_S: f64 = 0.01;

/// What one run took.
#[derive(Debug, Clone, Copy)]
pub struct Run {
    /// From start to end, s.
    pub wall_s: f64,
    /// Of all threads, s.
    pub processor_s: f64,
    /// Greatest resident memory, MB.
    pub peak_mb: f64,
    /// Whether it ended with exit status 0.
    pub well: bool,
}

/// Runs a program to its end.
pub fn run(command: &mut Command) -> io::Result<Run> {
    let before_s = children_s()?;
    let start = Instant::now();
    let mut child = command.spawn()?;
    let status_file = format!("/proc/{}/status", child.id());
    let mut peak_mb = 0.0_f64;
    let status = loop {
        if let Some(status) = child.try_wait()? {
            break status;
        }
        peak_mb = peak_mb.max(fs::read_to_string(&status_file).map_or(0.0, |text| peak_megabytes(&text)));
        std::thread::sleep(GLANCE);
    };
    let wall_s = start.elapsed().as_secs_f64();
    Ok(Run { wall_s, processor_s: children_s()? - before_s, peak_mb, well: status.success() })
}

fn peak_megabytes(status: &str) -> f64 {
    let line = status.lines().find_map(|line| line.strip_prefix("VmHWM:"));
    line.and_then(|line| line.trim().trim_end_matches("kB").trim().parse::<f64>().ok())
        .map_or(0.0, |kilo| kilo / 1024.0)
}

/// Processor time of all children that have ended, s.
fn children_s() -> io::Result<f64> {
    let text = fs::read_to_string("/proc/self/stat")?;
    let after_name = text.rsplit(')').next().unwrap_or("");
    let ticks = after_name.split_whitespace().skip(13).take(2).filter_map(|word| word.parse::<f64>().ok()).sum::<f64>();
    Ok(ticks * TICK_S)
}
