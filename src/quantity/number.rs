//! Decimal text, prefix and unit to the nearest `f64`.
