//! Preferred values of IEC 60063.

/// Three values a decade.
pub const E3: [f64; 3] = [1.0, 2.2, 4.7];
/// Twelve values a decade.
pub const E12: [f64; 12] = [1.0, 1.2, 1.5, 1.8, 2.2, 2.7, 3.3, 3.9, 4.7, 5.6, 6.8, 8.2];

/// The value of `series` nearest to `value` (above zero) in the logarithm.
pub fn nearest(series: &[f64], value: f64) -> f64 {
    let decade = value.log10().floor() as i32;
    let distance = |candidate: &f64| (candidate / value).ln().abs();
    (decade..=decade + 1)
        .flat_map(|power| series.iter().map(move |step| rounded(step * 10f64.powi(power))))
        .min_by(|a, b| distance(a).total_cmp(&distance(b)))
        .unwrap_or(value)
}

fn rounded(value: f64) -> f64 {
    super::sheet::three_digits(value).parse().unwrap_or(value)
}
