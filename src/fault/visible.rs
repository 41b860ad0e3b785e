//! A user's text as it may be sent to a terminal.

/// `text` with every character that moves the cursor, hides or reorders text replaced by a visible one.
pub fn visible(text: &str) -> String {
    text.chars().map(visible_char).collect()
}

/// Control characters as their pictures; marks that reorder or join text, and those without a width, as the replacement
/// character.
pub(super) fn visible_char(letter: char) -> char {
    match letter {
        '\u{0}'..='\u{1f}' => char::from_u32(0x2400 + u32::from(letter)).unwrap_or(char::REPLACEMENT_CHARACTER),
        '\u{7f}' => '\u{2421}',
        '\u{80}'..='\u{9f}'
        | '\u{ad}'
        | '\u{61c}'
        | '\u{180e}'
        | '\u{200b}'..='\u{200f}'
        | '\u{2028}'..='\u{202e}'
        | '\u{2060}'..='\u{206f}'
        | '\u{feff}'
        | '\u{fff9}'..='\u{fffb}'
        | '\u{e0000}'..='\u{e0fff}' => char::REPLACEMENT_CHARACTER,
        plain => plain,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn nothing_reaches_the_terminal_that_it_would_obey() {
        assert_eq!(visible("a\u{1b}[31mb\u{7}\u{7f}\u{9b}\u{202e}"), "a␛[31mb␇␡\u{fffd}\u{fffd}");
        assert_eq!(visible("4.7 mΩ\u{a0}µ"), "4.7 mΩ\u{a0}µ");
    }
}
