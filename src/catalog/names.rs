//! Part names met so far, each with its line; small, because a catalog may have a million.

use std::collections::HashMap;
use std::hash::{BuildHasher, BuildHasherDefault, Hasher, RandomState};

/// Names and the lines they stand in.
#[derive(Debug, Default)]
pub(super) struct Names {
    state: RandomState,
    /// All names, one behind the other.
    text: String,
    entries: Vec<Entry>,
    /// The last entry for each hash.
    by_hash: HashMap<u64, usize, BuildHasherDefault<AsItIs>>,
}

#[derive(Debug)]
struct Entry {
    start: usize,
    end: usize,
    line: usize,
    /// Another entry with the same hash.
    next: Option<usize>,
}

/// Hands a hash through, so that a growing table does not hash every name again.
#[derive(Debug, Default)]
struct AsItIs(u64);

impl Hasher for AsItIs {
    fn finish(&self) -> u64 {
        self.0
    }

    fn write(&mut self, bytes: &[u8]) {
        self.0 = bytes.iter().fold(self.0, |hash, byte| (hash << 8) | u64::from(*byte));
    }

    fn write_u64(&mut self, hash: u64) {
        self.0 = hash;
    }
}

impl Names {
    /// The line in which `name` stood before; if it did not, it now stands in `line`.
    pub(super) fn meet(&mut self, name: &str, line: usize) -> Option<usize> {
        let hash = self.state.hash_one(name);
        let first = self.by_hash.get(&hash).copied();
        if let Some(earlier) = self.among(first, name) {
            return Some(earlier);
        }
        let start = self.text.len();
        self.text.push_str(name);
        self.by_hash.insert(hash, self.entries.len());
        self.entries.push(Entry { start, end: self.text.len(), line, next: first });
        None
    }

    /// Whether `name` has been met.
    pub(super) fn contains(&self, name: &str) -> bool {
        self.among(self.by_hash.get(&self.state.hash_one(name)).copied(), name).is_some()
    }

    fn among(&self, mut at: Option<usize>, name: &str) -> Option<usize> {
        while let Some(entry) = at.and_then(|at| self.entries.get(at)) {
            if &self.text[entry.start..entry.end] == name {
                return Some(entry.line);
            }
            at = entry.next;
        }
        None
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_name_is_met_once() {
        let mut names = Names::default();
        assert_eq!(names.meet("a", 2), None);
        assert_eq!(names.meet("b", 3), None);
        assert_eq!(names.meet("a", 9), Some(2));
        assert!(names.contains("b") && !names.contains("c"));
    }

    #[test]
    fn names_of_one_hash_are_told_apart() {
        let mut names = Names::default();
        names.meet("a", 2);
        names.meet("b", 3);
        names.entries[1].next = Some(0);
        assert_eq!(names.among(Some(1), "a"), Some(2));
        assert_eq!(names.among(Some(1), "b"), Some(3));
        assert_eq!(names.among(Some(1), "c"), None);
    }
}
