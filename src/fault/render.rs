//! Faults as text.

use std::fmt::Write;

use annotate_snippets::{AnnotationKind, Group, Level, Renderer, Snippet};
use anstyle::{AnsiColor, Style};

use super::collected::FAULTS_SHOWN;
use super::visible::visible;
use super::{Fault, Faults, Severity};
use crate::quantity::shortened;

/// Sentences are cut beyond this many characters.
const LONGEST_SENTENCE: usize = 400;

impl Fault {
    /// The first line: `file:line:column: error: what was found`.
    pub fn headline(&self) -> String {
        format!("{}{}: {}", self.place(), self.severity.name(), self.sentence())
    }

    /// The headline, the line of the file with the place underlined, what was expected and what to do. `styled` adds
    /// terminal colours.
    pub fn render(&self, styled: bool) -> String {
        let (bold, level) = match (styled, self.severity) {
            (false, _) => (Style::new(), Style::new()),
            (true, Severity::Error) => (Style::new().bold(), AnsiColor::BrightRed.on_default().bold()),
            (true, Severity::Warning) => (Style::new().bold(), AnsiColor::Yellow.on_default().bold()),
        };
        let severity = self.severity.name();
        let mut text =
            format!("{bold}{}{bold:#}{level}{severity}{level:#}{bold}: {}{bold:#}\n", self.place(), self.sentence());
        if let Some(body) = self.body(styled) {
            text.push_str(&body);
            text.push('\n');
        }
        text
    }

    fn place(&self) -> String {
        let file = visible(&self.file);
        match (self.line, self.column) {
            (0, _) => format!("{file}: "),
            (line, 0) => format!("{file}:{line}: "),
            (line, column) => format!("{file}:{line}:{column}: "),
        }
    }

    fn sentence(&self) -> String {
        visible(&shortened(&self.found, LONGEST_SENTENCE))
    }

    fn body(&self, styled: bool) -> Option<String> {
        let level = match self.severity {
            Severity::Error => Level::ERROR,
            Severity::Warning => Level::WARNING,
        };
        let expected = visible(&shortened(&self.expected, LONGEST_SENTENCE));
        let help = self.help.as_deref().map(|help| visible(&shortened(help, LONGEST_SENTENCE)));
        let expected_sentence = format!("expected {expected}");
        let mut group = Group::with_level(level);
        if self.line > 0 {
            let annotation = AnnotationKind::Primary.span(self.mark.clone());
            let annotation =
                if expected.is_empty() { annotation } else { annotation.label(expected_sentence.as_str()) };
            group = group.element(Snippet::source(self.excerpt.as_str()).line_start(self.line).annotation(annotation));
        } else if !expected.is_empty() {
            group = group.element(Level::NOTE.message(expected_sentence.as_str()));
        }
        if let Some(help) = &help {
            group = group.element(Level::HELP.message(help.as_str()));
        }
        let renderer = if styled { Renderer::styled() } else { Renderer::plain() };
        (!group.is_empty()).then(|| renderer.term_width(usize::from(u16::MAX)).render(&[group]))
    }
}

impl Faults {
    /// All faults, errors first, each in full; the ones beyond [`FAULTS_SHOWN`] of a file are counted. Empty without faults.
    pub fn render(&self, styled: bool) -> String {
        let mut text = String::new();
        for ((severity, file), of_file) in &self.by_file {
            for fault in &of_file.kept {
                text.push_str(&fault.render(styled));
            }
            if let Some(more @ 1..) = of_file.count.checked_sub(FAULTS_SHOWN) {
                let plural = if more == 1 { "" } else { "s" };
                // Writing to a string cannot fail.
                let _ = writeln!(text, "{}: {more} more {}{plural}", visible(file), severity.name());
            }
        }
        text
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_cell_is_underlined() {
        let text = "part,dcr [mΩ]\nQ1,4.7 nC\n";
        let fault = Fault::in_text(
            "inductors.csv",
            text,
            text.find("nC").map_or(0..0, |at| at..at + 2),
            "`nC` is a charge",
            "a resistance",
        )
        .with_help("write mΩ");
        let expected = "\
inductors.csv:2:8: error: `nC` is a charge
  |
2 | Q1,4.7 nC
  |        ^^ expected a resistance
  |
  = help: write mΩ
";
        assert_eq!(fault.render(false), expected);
        assert_eq!(fault.headline(), "inductors.csv:2:8: error: `nC` is a charge");
    }

    #[test]
    fn a_fault_of_the_whole_file_has_no_excerpt() {
        let fault = Fault::of_file("rail.toml", "the file is empty", "a rail").with_help("see `wattsieve starter`");
        let expected = "\
rail.toml: error: the file is empty
 = note: expected a rail
 = help: see `wattsieve starter`
";
        assert_eq!(fault.render(false), expected);
    }

    #[test]
    fn what_is_not_shown_is_counted() {
        let mut faults = Faults::new();
        for line in 1..=22 {
            faults.push(Fault { line, ..Fault::of_file("a", "x", "") });
        }
        assert!(faults.render(false).ends_with("a: 2 more errors\n"));
    }

    #[test]
    fn control_characters_stay_in_the_file() {
        let fault = Fault::in_text("a\u{1b}", "\u{1b}[2Jx", 0..4, "`\u{1b}[2J` is odd", "\u{7}").with_help("\u{8}");
        assert!(fault.render(false).chars().all(|letter| letter == '\n' || !letter.is_control()));
    }
}
