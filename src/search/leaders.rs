//! The k best different stages seen so far.

use std::cmp::Ordering;

use super::order::{Ranked, compare};
use super::request::Distinct;
use crate::part::Parts;

/// At most `top` stages, best first, no two of the same identity.
#[derive(Debug, Clone)]
pub struct Leaders<'a> {
    parts: &'a Parts,
    distinct: Distinct,
    top: usize,
    entries: Vec<Ranked>,
}

impl<'a> Leaders<'a> {
    /// An empty list.
    pub const fn new(parts: &'a Parts, distinct: Distinct, top: usize) -> Self {
        Self { parts, distinct, top, entries: Vec::new() }
    }

    /// The burden above which nothing can enter any more; infinite while there is room.
    pub fn threshold(&self) -> f64 {
        if self.entries.len() < self.top {
            return f64::INFINITY;
        }
        self.entries.last().map_or(f64::NEG_INFINITY, |last| last.burden)
    }

    /// Takes a stage in if it is among the best of its identity.
    pub fn offer(&mut self, ranked: Ranked) {
        if ranked.burden > self.threshold() {
            return;
        }
        let identity = ranked.identity(self.distinct);
        if let Some(at) = self.entries.iter().position(|entry| entry.identity(self.distinct) == identity) {
            if compare(self.parts, &ranked, &self.entries[at]) != Ordering::Less {
                return;
            }
            self.entries.remove(at);
        }
        let at = self.entries.partition_point(|entry| compare(self.parts, entry, &ranked) == Ordering::Less);
        if at < self.top {
            self.entries.insert(at, ranked);
            self.entries.truncate(self.top);
        }
    }

    /// Takes in another list.
    pub fn merge(mut self, other: Self) -> Self {
        for ranked in other.entries {
            self.offer(ranked);
        }
        self
    }

    /// The list, best first.
    pub fn into_entries(self) -> Vec<Ranked> {
        self.entries
    }
}
