//! How far a search has come, and the wish that it stop.

use std::sync::atomic::{AtomicBool, AtomicU64, Ordering};

/// Shared by a search and whoever watches it.
#[derive(Debug, Default)]
pub struct Progress {
    stop: AtomicBool,
    ruled_out_bits: AtomicU64,
    best_bits: AtomicU64,
    open_bits: AtomicU64,
}

/// How far a search has come.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Snapshot {
    /// Share of the stages that are proven not to enter the list any more, or have been tried.
    pub ruled_out: f64,
    /// Burden of the last place of the list; `None` while it is not full.
    pub best: Option<f64>,
    /// Least burden that an untried stage could have; `None` while that is not known.
    pub open: Option<f64>,
}

impl Progress {
    /// Nothing done yet.
    pub fn new() -> Self {
        Self::default()
    }

    /// Asks the search to stop.
    pub fn stop(&self) {
        self.stop.store(true, Ordering::Relaxed);
    }

    /// Whether the search is asked to stop.
    pub fn stopped(&self) -> bool {
        self.stop.load(Ordering::Relaxed)
    }

    /// How far the search has come.
    pub fn snapshot(&self) -> Snapshot {
        let known = |bits: &AtomicU64| Some(f64::from_bits(bits.load(Ordering::Relaxed))).filter(|x| x.is_normal());
        Snapshot {
            ruled_out: f64::from_bits(self.ruled_out_bits.load(Ordering::Relaxed)),
            best: known(&self.best_bits),
            open: known(&self.open_bits),
        }
    }

    /// Tells how far the search has come.
    pub(super) fn tell(&self, ruled_out: f64, best: f64, open: f64) {
        self.ruled_out_bits.store(ruled_out.to_bits(), Ordering::Relaxed);
        self.best_bits.store(best.to_bits(), Ordering::Relaxed);
        self.open_bits.store(open.to_bits(), Ordering::Relaxed);
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_not_known_is_not_told() {
        let progress = Progress::new();
        assert_eq!(progress.snapshot(), Snapshot { ruled_out: 0.0, best: None, open: None });
        progress.tell(0.5, f64::INFINITY, 1.25);
        assert_eq!(progress.snapshot(), Snapshot { ruled_out: 0.5, best: None, open: Some(1.25) });
        assert!(!progress.stopped());
        progress.stop();
        assert!(progress.stopped());
    }
}
