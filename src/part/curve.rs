//! Points of a measured curve and the interpolations that the laws use.

/// Points (x, y), finite, sorted by x, no x twice, at least one.
#[derive(Debug, Clone, PartialEq)]
pub struct Curve {
    points: Vec<(f64, f64)>,
}

/// Why points do not make a curve.
#[derive(Debug, Clone, Copy, PartialEq, thiserror::Error)]
pub enum CurveFault {
    /// There is no point.
    #[error("no point is given")]
    Empty,
    /// A coordinate is NaN or infinite.
    #[error("a point is not finite")]
    NotFinite,
    /// The same x stands twice.
    #[error("two points stand at {0}")]
    Twice(f64),
}

impl Curve {
    /// A curve through `points` in any order.
    ///
    /// # Errors
    /// When there is no point, a coordinate is not finite, or an x stands twice.
    pub fn new(mut points: Vec<(f64, f64)>) -> Result<Self, CurveFault> {
        if points.is_empty() {
            return Err(CurveFault::Empty);
        }
        if points.iter().any(|(x, y)| !x.is_finite() || !y.is_finite()) {
            return Err(CurveFault::NotFinite);
        }
        points.sort_by(|a, b| a.0.total_cmp(&b.0));
        match points.windows(2).find(|pair| pair[0].0 == pair[1].0) {
            Some(pair) => Err(CurveFault::Twice(pair[0].0)),
            None => Ok(Self { points }),
        }
    }

    /// The points, ascending in x.
    pub fn points(&self) -> &[(f64, f64)] {
        &self.points
    }

    /// The point with the least x.
    pub fn first(&self) -> (f64, f64) {
        self.points[0]
    }

    /// The point with the greatest x.
    pub fn last(&self) -> (f64, f64) {
        self.points[self.points.len() - 1]
    }

    /// The two neighbouring points whose span holds `x` (on a point: the span that ends there; outside: the end span);
    /// `None` for a single point.
    pub fn bracket(&self, x: f64) -> Option<[(f64, f64); 2]> {
        let last = self.points.len().checked_sub(2)?;
        let above = self.points.partition_point(|point| point.0 < x);
        let left = above.saturating_sub(1).min(last);
        Some([self.points[left], self.points[left + 1]])
    }

    /// Linear between points, end spans extended; a single point is a constant.
    pub fn linear_extended(&self, x: f64) -> f64 {
        match self.bracket(x) {
            Some(span) => line(span, x),
            None => self.points[0].1,
        }
    }

    /// Linear between points, held at both ends.
    pub fn linear_held(&self, x: f64) -> f64 {
        self.linear_extended(x.clamp(self.first().0, self.last().0))
    }

    /// Linear in 1/x between points, held at both ends; every x must be above zero.
    pub fn reciprocal_held(&self, x: f64) -> f64 {
        let x = x.clamp(self.first().0, self.last().0);
        match self.bracket(x) {
            Some([a, b]) => line([(1.0 / a.0, a.1), (1.0 / b.0, b.1)], 1.0 / x),
            None => self.points[0].1,
        }
    }

    /// A straight line between the logarithms of x and y, held at both ends; coordinates must be above zero.
    pub fn log_log_held(&self, x: f64) -> f64 {
        let x = x.clamp(self.first().0, self.last().0);
        match self.bracket(x) {
            Some([a, b]) if x > a.0 && x < b.0 => line([(a.0.ln(), a.1.ln()), (b.0.ln(), b.1.ln())], x.ln()).exp(),
            Some([a, b]) => {
                if x <= a.0 {
                    a.1
                } else {
                    b.1
                }
            }
            None => self.points[0].1,
        }
    }

    /// A straight line of ln y over x, end spans extended; every y must be above zero, a single point is a constant.
    pub fn log_linear_extended(&self, x: f64) -> f64 {
        match self.bracket(x) {
            Some([a, b]) => line([(a.0, a.1.ln()), (b.0, b.1.ln())], x).exp(),
            None => self.points[0].1,
        }
    }
}

fn line([a, b]: [(f64, f64); 2], x: f64) -> f64 {
    if x == b.0 {
        return b.1;
    }
    a.1 + (b.1 - a.1) * ((x - a.0) / (b.0 - a.0))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn curve(points: &[(f64, f64)]) -> Curve {
        Curve::new(points.to_vec()).expect("valid points")
    }

    #[test]
    fn points_are_sorted_and_distinct() {
        assert_eq!(curve(&[(2.0, 1.0), (1.0, 3.0)]).points(), [(1.0, 3.0), (2.0, 1.0)]);
        assert_eq!(Curve::new(vec![(1.0, 1.0), (1.0, 2.0)]), Err(CurveFault::Twice(1.0)));
        assert_eq!(Curve::new(vec![]), Err(CurveFault::Empty));
        assert_eq!(Curve::new(vec![(f64::NAN, 1.0)]), Err(CurveFault::NotFinite));
    }

    #[test]
    fn every_interpolation_meets_its_points() {
        let c = curve(&[(1.0, 8.0), (2.0, 4.0), (4.0, 1.0)]);
        for &(x, y) in c.points() {
            for law in [Curve::linear_extended, Curve::linear_held, Curve::reciprocal_held, Curve::log_log_held] {
                assert_eq!(law(&c, x), y, "at {x}");
            }
            approx::assert_relative_eq!(c.log_linear_extended(x), y, max_relative = 1e-14);
        }
    }

    #[test]
    fn laws_between_and_beyond_points() {
        let c = curve(&[(1.0, 8.0), (4.0, 2.0)]);
        assert_eq!(c.linear_extended(2.5), 5.0);
        assert_eq!(c.linear_extended(5.0), 0.0);
        assert_eq!(c.linear_held(5.0), 2.0);
        approx::assert_relative_eq!(c.reciprocal_held(2.0), 4.0, max_relative = 1e-14);
        approx::assert_relative_eq!(c.log_log_held(2.0), 4.0, max_relative = 1e-14);
        approx::assert_relative_eq!(c.log_linear_extended(2.5), 4.0, max_relative = 1e-14);
        approx::assert_relative_eq!(c.log_linear_extended(5.5), 1.0, max_relative = 1e-14);
    }

    #[test]
    fn a_point_belongs_to_the_span_that_ends_there() {
        let c = curve(&[(1.0, 0.0), (2.0, 1.0), (3.0, 5.0)]);
        assert_eq!(c.bracket(2.0), Some([(1.0, 0.0), (2.0, 1.0)]));
        assert_eq!(c.bracket(0.5), Some([(1.0, 0.0), (2.0, 1.0)]));
        assert_eq!(c.bracket(9.0), Some([(2.0, 1.0), (3.0, 5.0)]));
    }
}
