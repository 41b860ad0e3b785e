//! Any text as a number: a finite double or a fault that can be told, and what is read is written back to the same bits.

use wattsieve::quantity::{Dimension, Mark, Unit, format, number};

/// The first byte picks the dimension, the second what is assumed of marks and units; the rest is the text.
pub fn run(data: &[u8]) {
    let [pick, assume, text @ ..] = data else { return };
    let Ok(text) = std::str::from_utf8(text) else { return };
    let dimension = Dimension::ALL[usize::from(*pick) % Dimension::ALL.len()];
    let mark = if assume & 1 == 0 { Mark::Point } else { Mark::PointOrComma };
    let bare = (assume & 2 == 2).then(|| Unit::base(dimension));
    match number::parse(text, dimension, bare, mark) {
        Ok(value) => {
            assert!(value.is_finite(), "{text:?} is {value}");
            let written = format::exact(value, dimension);
            let again = number::parse(&written, dimension, bare, Mark::Point);
            assert_eq!(again.map(f64::to_bits).ok(), Some(value.to_bits()), "{text:?} is written as {written:?}");
            let _ = format::engineering(value, dimension, 3);
        }
        Err(fault) => {
            assert!(fault.span.end <= text.len() && fault.span.start <= fault.span.end, "{text:?} {:?}", fault.span);
            assert!(text.is_char_boundary(fault.span.start) && text.is_char_boundary(fault.span.end), "{text:?}");
            let _ = (fault.to_string(), fault.expected(), fault.help());
        }
    }
}
