//! One kind of fault for every file a user can write: where it is, what was found, what was expected, what to do.
//!
//! A reader makes a [`Fault`] where it meets one, with [`Fault::in_text`] for a file held as a whole or
//! [`Fault::in_passage`] for a piece of it, pushes it into [`Faults`] and goes on. All faults of a run are rendered once, at the end.

mod collected;
mod nearest;
mod place;
mod render;
mod visible;

use std::ops::Range;

pub use collected::{FAULTS_SHOWN, Faults};
pub use nearest::nearest;
pub use visible::visible;

/// Whether a fault stops the run.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Severity {
    /// The text cannot be used.
    Error,
    /// The text is used, and may not say what its writer thinks.
    Warning,
}

impl Severity {
    /// The word in front of a message.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Error => "error",
            Self::Warning => "warning",
        }
    }
}

/// Something wrong in a user's text.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Fault {
    /// Whether it stops the run.
    pub severity: Severity,
    /// The file as the user named it; `-` for standard input.
    pub file: String,
    /// Line, from 1; 0 when the whole file is meant.
    pub line: usize,
    /// Column in characters, from 1; 0 when the whole line or file is meant.
    pub column: usize,
    /// The line, or a window around the place in a long line; without control characters.
    pub excerpt: String,
    /// Bytes of `excerpt` to underline.
    pub mark: Range<usize>,
    /// What was found, a whole sentence without a full stop.
    pub found: String,
    /// What was expected instead; stands at the mark. May be empty.
    pub expected: String,
    /// What to do about it.
    pub help: Option<String>,
}

impl Fault {
    /// An error about the bytes `span` of `text`, the whole of `file`.
    ///
    /// A span that is empty, or beyond the text, marks a single place; one over several lines is marked on its first.
    pub fn in_text(
        file: &str,
        text: &str,
        span: Range<usize>,
        found: impl Into<String>,
        expected: impl Into<String>,
    ) -> Self {
        Self::in_passage(file, 1, text, span, found, expected)
    }

    /// An error about the bytes `span` of `passage`, a piece of `file` that starts at the start of line `first_line`.
    pub fn in_passage(
        file: &str,
        first_line: usize,
        passage: &str,
        span: Range<usize>,
        found: impl Into<String>,
        expected: impl Into<String>,
    ) -> Self {
        let place = place::locate(passage, span);
        Self {
            line: first_line + place.lines_before,
            column: place.column,
            excerpt: place.excerpt,
            mark: place.mark,
            ..Self::of_file(file, found, expected)
        }
    }

    /// An error about `file` as a whole.
    pub fn of_file(file: &str, found: impl Into<String>, expected: impl Into<String>) -> Self {
        Self {
            severity: Severity::Error,
            file: file.to_owned(),
            line: 0,
            column: 0,
            excerpt: String::new(),
            mark: 0..0,
            found: found.into(),
            expected: expected.into(),
            help: None,
        }
    }

    /// The same with advice.
    #[must_use]
    pub fn with_help(self, help: impl Into<String>) -> Self {
        Self { help: Some(help.into()), ..self }
    }

    /// The same with advice, if there is any.
    #[must_use]
    pub fn with_help_if(self, help: Option<String>) -> Self {
        Self { help: help.or(self.help), ..self }
    }

    /// The same as a warning.
    #[must_use]
    pub fn as_warning(self) -> Self {
        Self { severity: Severity::Warning, ..self }
    }
}
