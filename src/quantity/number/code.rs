//! Letter codes of IEC 60062: a letter in place of the decimal mark, such as `4R7`, `R047`, `2M2`, `4n7`.

use super::decimal::Decimal;
use crate::quantity::Dimension;

/// Power of ten that a code letter stands for, in base units of `dimension`.
///
/// R in inductances is common practice for µH; the other letters are those of the standard.
fn letter_exponent(letter: char, dimension: Dimension) -> Option<i64> {
    match (dimension, letter) {
        (Dimension::Resistance, 'R') | (Dimension::Capacitance, 'F') => Some(0),
        (Dimension::Resistance, 'k' | 'K') => Some(3),
        (Dimension::Resistance, 'M') => Some(6),
        (Dimension::Resistance, 'G') => Some(9),
        (Dimension::Resistance | Dimension::Capacitance | Dimension::Inductance, 'm') => Some(-3),
        (Dimension::Capacitance | Dimension::Inductance, 'u' | 'µ' | '\u{3bc}') | (Dimension::Inductance, 'R') => {
            Some(-6)
        }
        (Dimension::Capacitance | Dimension::Inductance, 'n') => Some(-9),
        (Dimension::Capacitance, 'p') => Some(-12),
        _ => None,
    }
}

/// Digits before and behind the only letter of `text`, if that is all it is.
fn split(text: &str) -> Option<(&str, char, &str)> {
    let (at, letter) = text.char_indices().find(|(_, letter)| !letter.is_ascii_digit())?;
    let (before, behind) = (&text[..at], &text[at + letter.len_utf8()..]);
    let is_code = letter.is_alphabetic() && behind.bytes().all(|byte| byte.is_ascii_digit());
    (is_code && text.len() > letter.len_utf8()).then_some((before, letter, behind))
}

/// The number that `text` writes as a code for `dimension`, in base units; `None` if it is no such code.
///
/// A letter behind all digits is a code in resistances and for R only (`47k`, `10R`): elsewhere it may be a unit. `47m` may
/// be metres.
pub(super) fn read(text: &str, dimension: Dimension) -> Option<Decimal> {
    let (before, letter, behind) = match split(text) {
        Some(parts) => parts,
        None => return read_pointed(text, dimension),
    };
    let exponent = letter_exponent(letter, dimension)?;
    let trailing = behind.is_empty();
    if trailing && !may_trail(letter, dimension) {
        return None;
    }
    let digits = format!("{before}{behind}");
    Some(Decimal { negative: false, digits, exponent: exponent - i64::try_from(behind.len()).ok()? })
}

/// `4.7k`, `4.7R`: a point among the digits and the letter behind them.
fn read_pointed(text: &str, dimension: Dimension) -> Option<Decimal> {
    let letter = text.chars().next_back().filter(|letter| may_trail(*letter, dimension))?;
    let (before, behind) = text[..text.len() - letter.len_utf8()].split_once('.')?;
    let digits = format!("{before}{behind}");
    if before.is_empty() || behind.is_empty() || !digits.bytes().all(|byte| byte.is_ascii_digit()) {
        return None;
    }
    let exponent = letter_exponent(letter, dimension)? - i64::try_from(behind.len()).ok()?;
    Some(Decimal { negative: false, digits, exponent })
}

fn may_trail(letter: char, dimension: Dimension) -> bool {
    letter == 'R' || (dimension == Dimension::Resistance && matches!(letter, 'k' | 'K' | 'M' | 'G'))
}

/// Whether `text` is a code in some dimension, by its shape: a code letter with digits behind it, or R.
pub(super) fn looks_like_one(text: &str) -> bool {
    split(text).is_some_and(|(_, letter, behind)| {
        letter == 'R' || (!behind.is_empty() && "kKMGmuµ\u{3bc}npFL".contains(letter))
    })
}
