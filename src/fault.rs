//! One kind of fault for every file a user can write: where it is, what was found, what was expected, what to do.

use std::ops::Range;

/// Something wrong in a user's text.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Fault {
    /// The file as the user named it; `-` for standard input.
    pub file: String,
    /// Line, from 1; 0 when the whole file is meant.
    pub line: usize,
    /// Column in characters, from 1; 0 when the whole line or file is meant.
    pub column: usize,
    /// The line, or a window around the place in a long line.
    pub excerpt: String,
    /// Bytes of `excerpt` to underline.
    pub mark: Range<usize>,
    /// What was found, a whole sentence without a full stop.
    pub found: String,
    /// What was expected instead; stands at the mark.
    pub expected: String,
    /// What to do about it.
    pub help: Option<String>,
}
