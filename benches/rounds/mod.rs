//! What the benches share: medians with their spread, and which Python runs the baselines.

use std::ffi::OsString;
use std::fmt;

/// Figures of several rounds.
#[derive(Debug, Clone, Default)]
pub struct Median(Vec<f64>);

impl Median {
    /// One more round.
    pub fn add(&mut self, figure: f64) {
        self.0.push(figure);
        self.0.sort_by(f64::total_cmp);
    }

    /// The middle one.
    pub fn value(&self) -> f64 {
        self.0.get(self.0.len() / 2).copied().unwrap_or(f64::NAN)
    }

    fn ends(&self) -> (f64, f64) {
        (self.0.first().copied().unwrap_or(f64::NAN), self.0.last().copied().unwrap_or(f64::NAN))
    }
}

impl fmt::Display for Median {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let digits = if self.value() < 100.0 { 3 } else { 0 };
        let (least, most) = self.ends();
        write!(f, "{:.digits$} ({least:.digits$} to {most:.digits$})", self.value())
    }
}

/// The Python of the baselines: `WATTSIEVE_PYTHON`, or `python3`.
pub fn python() -> OsString {
    std::env::var_os("WATTSIEVE_PYTHON").unwrap_or_else(|| "python3".into())
}
