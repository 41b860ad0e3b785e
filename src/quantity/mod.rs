//! Numbers with units: the only place where text becomes an `f64` in base units, and back.

pub mod dimension;
pub mod format;
pub mod number;
pub mod real;
mod spelling;

pub use dimension::{Dimension, Unit};
pub use number::{Mark, NumberFault};
pub use real::{NonNegative, Positive, Share};

/// At most `greatest` characters of `text`, an ellipsis in place of the rest: for texts of users in messages.
pub fn shortened(text: &str, greatest: usize) -> String {
    match text.char_indices().nth(greatest) {
        Some((at, _)) => format!("{}…", &text[..at]),
        None => text.to_owned(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn long_texts_are_cut_between_characters() {
        assert_eq!(shortened("ΩΩΩ", 2), "ΩΩ…");
        assert_eq!(shortened("ΩΩ", 2), "ΩΩ");
    }
}
