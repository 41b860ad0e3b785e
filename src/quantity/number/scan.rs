//! The digits, marks and exponent at the start of a text.

use std::ops::Range;

use super::Mark;
use super::decimal::Decimal;
use super::fault::{Cause, quoted};

/// Exponents beyond this are as good as infinite.
const GREATEST_EXPONENT: i64 = 1_000_000;

/// The number at the start of `text`, and how many bytes it takes.
pub(super) fn scan(text: &str, mark: Mark) -> Result<(Decimal, usize), (Cause, Range<usize>)> {
    let (negative, after_sign) = sign(text);
    let body = &text[after_sign..];
    let length = digits_and_marks(body);
    let written = &body[..length];
    if !written.contains(|letter: char| letter.is_ascii_digit()) {
        return Err((no_digit(text, body), 0..text.len()));
    }
    let (digits, behind) = unmark(written, mark).map_err(|cause| (cause, after_sign..after_sign + length))?;
    let (exponent, after_exponent) = exponent(&body[length..]);
    let exponent = exponent.saturating_sub(i64::try_from(behind).unwrap_or(GREATEST_EXPONENT));
    Ok((Decimal { negative, digits, exponent }, after_sign + length + after_exponent))
}

fn sign(text: &str) -> (bool, usize) {
    match text.chars().next() {
        Some(first @ ('-' | '\u{2212}')) => (true, first.len_utf8()),
        Some('+') => (false, 1),
        _ => (false, 0),
    }
}

fn no_digit(text: &str, body: &str) -> Cause {
    let word = body.trim_matches(|letter: char| !letter.is_alphanumeric() && letter != '∞').to_ascii_lowercase();
    match word.as_str() {
        "nan" | "inf" | "infinity" | "∞" => Cause::NotFinite(quoted(text)),
        _ => Cause::NotANumber(quoted(text)),
    }
}

/// Blanks that may stand between groups of digits.
pub(super) fn is_blank(letter: char) -> bool {
    matches!(letter, ' ' | '\u{a0}' | '\u{202f}' | '\u{2009}' | '\u{2007}')
}

/// How many bytes of digits, marks, and blanks between digits `text` starts with.
fn digits_and_marks(text: &str) -> usize {
    let mut end = 0;
    let mut letters = text.char_indices().peekable();
    while let Some((at, letter)) = letters.next() {
        let before_digit = letters.peek().is_some_and(|(_, next)| next.is_ascii_digit());
        match letter {
            '0'..='9' | '.' | ',' => end = at + letter.len_utf8(),
            '\'' | '\u{2019}' | '_' if before_digit && at > 0 => end = at + letter.len_utf8(),
            blank if is_blank(blank) && before_digit && at > 0 => end = at + blank.len_utf8(),
            _ => break,
        }
    }
    end
}

/// All digits of `written`, and how many stand behind its decimal mark.
fn unmark(written: &str, mark: Mark) -> Result<(String, usize), Cause> {
    let points = written.matches('.').count();
    let commas = written.matches(',').count();
    let decimal_at = match (points, commas, mark) {
        (0, 0, _) => None,
        (1, 0, _) => written.find('.'),
        (0, 1, Mark::PointOrComma) => written.find(','),
        (_, 1, Mark::PointOrComma) if written.rfind(',') > written.rfind('.') => written.find(','),
        (_, 0, _) => return Err(separated(written)),
        _ => return Err(comma(written)),
    };
    let (before, behind) = decimal_at.map_or((written, ""), |at| (&written[..at], &written[at + 1..]));
    let points_group = commas == 1;
    let is_group_mark = |letter: char| is_blank(letter) || (points_group && letter == '.');
    if !grouped_by_three(before, is_group_mark, true) || !grouped_by_three(behind, is_blank, false) {
        return Err(separated(written));
    }
    let digits: String = written.chars().filter(char::is_ascii_digit).collect();
    let behind = behind.bytes().filter(u8::is_ascii_digit).count();
    Ok((digits, behind))
}

/// Whether `digits` has no marks, or marks that leave groups of exactly three; the first group may be shorter in front of
/// the decimal mark.
fn grouped_by_three(digits: &str, is_mark: impl Fn(char) -> bool + Copy, in_front: bool) -> bool {
    if digits.bytes().all(|byte| byte.is_ascii_digit()) {
        return true;
    }
    let mut marks = digits.chars().filter(|letter| !letter.is_ascii_digit());
    let first = marks.next();
    let uniform = first.is_some_and(is_mark) && marks.all(|mark| Some(mark) == first);
    uniform
        && digits.split(is_mark).enumerate().all(|(place, group)| match place {
            0 if in_front => (1..=3).contains(&group.len()),
            _ => group.len() == 3,
        })
}

fn separated(written: &str) -> Cause {
    let is_mark = |letter: char| !letter.is_ascii_digit();
    if written.matches('.').count() == 1 || !grouped_by_three(written, is_mark, true) {
        return Cause::NotANumber(quoted(written));
    }
    let plain: String = written.chars().filter(char::is_ascii_digit).collect();
    Cause::Grouped { text: quoted(written), plain: quoted(&plain) }
}

/// Why a comma cannot be read.
fn comma(written: &str) -> Cause {
    let as_decimal = written.replace('.', "").replace(',', ".");
    let as_group = written.replace(',', "");
    let sound = |reading: &str| {
        reading.matches('.').count() <= 1 && reading.bytes().all(|byte| byte.is_ascii_digit() || byte == b'.')
    };
    match (sound(&as_decimal), sound(&as_group)) {
        (true, true) => Cause::Ambiguous { text: quoted(written), readings: [quoted(&as_decimal), quoted(&as_group)] },
        (true, false) => Cause::Grouped { text: quoted(written), plain: quoted(&as_decimal) },
        (false, true) => Cause::Grouped { text: quoted(written), plain: quoted(&as_group) },
        (false, false) => Cause::NotANumber(quoted(written)),
    }
}

/// The exponent that `text` starts with, and its length; 0 for none.
fn exponent(text: &str) -> (i64, usize) {
    let Some(rest) = text.strip_prefix(['e', 'E']) else { return (0, 0) };
    let (negative, after_sign) = sign(rest);
    let digits = rest[after_sign..].bytes().take_while(u8::is_ascii_digit).count();
    if digits == 0 {
        return (0, 0);
    }
    let end = after_sign + digits;
    let size = rest[after_sign..end].parse().unwrap_or(GREATEST_EXPONENT).min(GREATEST_EXPONENT);
    (if negative { -size } else { size }, 1 + end)
}
