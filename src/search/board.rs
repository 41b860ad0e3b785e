//! The best stages that all workers have found together, and the burden that is still of interest.

use std::sync::Mutex;
use std::sync::atomic::{AtomicU64, Ordering};

use super::leaders::Leaders;
use super::order::Ranked;

/// One list for all workers; the threshold is read without a lock.
#[derive(Debug)]
pub struct Board<'a> {
    leaders: Mutex<Leaders<'a>>,
    threshold_bits: AtomicU64,
}

impl<'a> Board<'a> {
    /// A board around an empty list.
    pub fn new(leaders: Leaders<'a>) -> Self {
        let threshold_bits = AtomicU64::new(leaders.threshold().to_bits());
        Self { leaders: Mutex::new(leaders), threshold_bits }
    }

    /// The burden above which nothing can enter any more.
    pub fn threshold(&self) -> f64 {
        f64::from_bits(self.threshold_bits.load(Ordering::Relaxed))
    }

    /// Takes a stage in if it is among the best.
    pub fn offer(&self, ranked: Ranked) {
        if ranked.burden > self.threshold() {
            return;
        }
        // A worker that panicked has left the list whole: every change to it is one insertion.
        let mut leaders = self.leaders.lock().unwrap_or_else(std::sync::PoisonError::into_inner);
        leaders.offer(ranked);
        self.threshold_bits.store(leaders.threshold().to_bits(), Ordering::Relaxed);
    }

    /// The list, best first.
    pub fn into_entries(self) -> Vec<Ranked> {
        self.leaders.into_inner().unwrap_or_else(std::sync::PoisonError::into_inner).into_entries()
    }
}
