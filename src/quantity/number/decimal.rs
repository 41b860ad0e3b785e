//! Digits and a power of ten to the nearest `f64`.

/// A decimal number as it was written, its marks taken out.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub(super) struct Decimal {
    /// Whether a minus stands before it.
    pub negative: bool,
    /// All digits, those after the mark too; ASCII.
    pub digits: String,
    /// Value = `digits` × 10^`exponent`.
    pub exponent: i64,
}

/// Powers of ten that are exact as `f64`.
const EXACT_POWERS: [f64; 23] = [
    1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20,
    1e21, 1e22,
];

/// `mantissa` × 10^`exponent` to the nearest `f64`, where one rounding suffices: both factors are exact.
pub(super) fn exact_scale(mantissa: u64, exponent: i64) -> Option<f64> {
    let power = *EXACT_POWERS.get(usize::try_from(exponent.unsigned_abs()).ok()?)?;
    #[allow(clippy::cast_precision_loss, reason = "at most 2^53, which is exact")]
    (mantissa <= 1 << 53).then(|| if exponent < 0 { mantissa as f64 / power } else { mantissa as f64 * power })
}

/// A plain number of at most 18 digits, `[-]digits[.digits]`, as mantissa and power of ten: what nearly every cell is.
pub(super) fn plain(text: &[u8]) -> Option<(bool, u64, i64)> {
    let (negative, digits) = match text {
        [b'-', rest @ ..] => (true, rest),
        all => (false, all),
    };
    if digits.len() > 19 || !digits.first()?.is_ascii_digit() {
        return None;
    }
    let (mut mantissa, mut point) = (0, None);
    for (place, byte) in digits.iter().enumerate() {
        match byte {
            b'0'..=b'9' => mantissa = mantissa * 10 + u64::from(byte - b'0'),
            b'.' if point.is_none() => point = Some(place),
            _ => return None,
        }
    }
    if digits.len() == 19 && point.is_none() {
        return None;
    }
    let behind = point.map_or(0, |place| digits.len() - place - 1);
    Some((negative, mantissa, -i64::try_from(behind).ok()?))
}

impl Decimal {
    /// The nearest `f64`; infinite on overflow.
    pub(super) fn value(&self) -> f64 {
        let text = format!("{}{}e{}", if self.negative { "-" } else { "" }, self.digits, self.exponent);
        text.parse().unwrap_or(f64::NAN)
    }

    /// Whether every digit is a zero.
    pub(super) fn is_zero(&self) -> bool {
        self.digits.bytes().all(|digit| digit == b'0')
    }
}
