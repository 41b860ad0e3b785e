//! What an audit of the catalogs found, for people.

use crate::fault::{Faults, Severity};

/// The whole screen.
pub fn screen(faults: &Faults, parts: usize) -> String {
    if faults.is_empty() {
        return format!("{parts} parts read, nothing to report\n");
    }
    format!(
        "{}\n{parts} parts read, {} bad, {} doubtful\n",
        faults.render(false),
        faults.count(Severity::Error),
        faults.count(Severity::Warning)
    )
}
