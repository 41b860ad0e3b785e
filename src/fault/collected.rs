//! All faults of a run, in the order of their places, only so many of one file.

use std::collections::BTreeMap;

use super::{Fault, Severity};

/// Faults of one severity shown of one file; the rest are counted.
pub const FAULTS_SHOWN: usize = 20;

/// The first faults of one file, by place, and how many there are.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub(super) struct OfFile {
    /// In order of line and column, at most [`FAULTS_SHOWN`].
    pub kept: Vec<Fault>,
    /// All of them.
    pub count: usize,
}

/// All faults of a run. Memory is bounded, however many are pushed.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Faults {
    pub(super) by_file: BTreeMap<(Severity, String), OfFile>,
}

impl Faults {
    /// No faults.
    pub const fn new() -> Self {
        Self { by_file: BTreeMap::new() }
    }

    /// Adds a fault.
    pub fn push(&mut self, fault: Fault) {
        let of_file = self.by_file.entry((fault.severity, fault.file.clone())).or_default();
        of_file.count += 1;
        let place = |fault: &Fault| (fault.line, fault.column);
        let at = of_file.kept.partition_point(|kept| place(kept) <= place(&fault));
        if at < FAULTS_SHOWN {
            of_file.kept.insert(at, fault);
            of_file.kept.truncate(FAULTS_SHOWN);
        }
    }

    /// Adds all faults of `other`.
    pub fn append(&mut self, other: Self) {
        for (key, theirs) in other.by_file {
            let beyond = theirs.count - theirs.kept.len();
            for fault in theirs.kept {
                self.push(fault);
            }
            if let Some(of_file) = self.by_file.get_mut(&key) {
                of_file.count += beyond;
            }
        }
    }

    /// The errors kept, by file, line and column.
    pub fn errors(&self) -> impl Iterator<Item = &Fault> {
        self.kept(Severity::Error)
    }

    /// The warnings kept, by file, line and column.
    pub fn warnings(&self) -> impl Iterator<Item = &Fault> {
        self.kept(Severity::Warning)
    }

    /// How many faults of `severity` were pushed, those not kept too.
    pub fn count(&self, severity: Severity) -> usize {
        self.of(severity).map(|(_, of_file)| of_file.count).sum()
    }

    /// Whether anything stops the run.
    pub fn has_errors(&self) -> bool {
        self.of(Severity::Error).next().is_some()
    }

    /// Whether there is neither error nor warning.
    pub fn is_empty(&self) -> bool {
        self.by_file.is_empty()
    }

    /// The same with every error turned into a warning: for a run that goes on without the bad rows.
    #[must_use]
    pub fn as_warnings(self) -> Self {
        let mut all = Self::new();
        for ((severity, file), of_file) in self.by_file {
            let turned = OfFile { kept: of_file.kept.into_iter().map(Fault::as_warning).collect(), ..of_file };
            match severity {
                Severity::Error => all.append(Self { by_file: [((Severity::Warning, file), turned)].into() }),
                Severity::Warning => all.append(Self { by_file: [((severity, file), turned)].into() }),
            }
        }
        all
    }

    fn of(&self, severity: Severity) -> impl Iterator<Item = (&str, &OfFile)> {
        self.by_file
            .iter()
            .filter(move |((of, _), _)| *of == severity)
            .map(|((_, file), of_file)| (file.as_str(), of_file))
    }

    fn kept(&self, severity: Severity) -> impl Iterator<Item = &Fault> {
        self.of(severity).flat_map(|(_, of_file)| &of_file.kept)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn fault(file: &str, line: usize) -> Fault {
        Fault { line, column: 1, ..Fault::of_file(file, "x", "y") }
    }

    #[test]
    fn faults_stand_in_the_order_of_their_places() {
        let mut faults = Faults::new();
        for (file, line) in [("b", 1), ("a", 9), ("a", 2)] {
            faults.push(fault(file, line));
        }
        faults.push(fault("a", 1).as_warning());
        let places: Vec<_> = faults.errors().map(|fault| (fault.file.as_str(), fault.line)).collect();
        assert_eq!(places, [("a", 2), ("a", 9), ("b", 1)]);
        assert_eq!(faults.warnings().count(), 1);
    }

    #[test]
    fn the_first_are_kept_and_all_are_counted() {
        let mut faults = Faults::new();
        for line in (1..=100).rev() {
            faults.push(fault("a", line));
        }
        let lines: Vec<_> = faults.errors().map(|fault| fault.line).collect();
        assert_eq!(lines, (1..=FAULTS_SHOWN).collect::<Vec<_>>());
        assert_eq!(faults.count(Severity::Error), 100);
        let mut both = Faults::new();
        both.push(fault("a", 0).as_warning());
        both.append(faults.as_warnings());
        assert_eq!((both.count(Severity::Warning), both.has_errors()), (101, false));
    }
}
