//! Random draws, the same on every machine for the same seed.

use rand_chacha::ChaCha8Rng;
use rand_chacha::rand_core::SeedableRng;
use rand_distr::{Distribution, StandardNormal, StandardUniform};

/// How often a cell that a catalog may leave out is empty, as in catalogs that people keep.
const UNKNOWN: f64 = 0.1;

/// One stream of random draws.
pub struct Chance(ChaCha8Rng);

impl Chance {
    /// The given stream of `seed`.
    pub fn new(seed: u64, stream: u64) -> Self {
        let mut generator = ChaCha8Rng::seed_from_u64(seed);
        generator.set_stream(stream);
        Self(generator)
    }

    /// Even between `low` and `high`.
    pub fn between(&mut self, low: f64, high: f64) -> f64 {
        let share: f64 = StandardUniform.sample(&mut self.0);
        low + share * (high - low)
    }

    /// Even in the logarithm between `low` and `high`, both above zero.
    pub fn log_between(&mut self, low: f64, high: f64) -> f64 {
        self.between(low.ln(), high.ln()).exp()
    }

    /// A factor about 1, normal in the logarithm with standard deviation `sigma`.
    pub fn scatter(&mut self, sigma: f64) -> f64 {
        let deviation: f64 = StandardNormal.sample(&mut self.0);
        (sigma * deviation).exp()
    }

    /// True with the given probability.
    pub fn happens(&mut self, probability: f64) -> bool {
        self.between(0.0, 1.0) < probability
    }

    /// Whether a value that a catalog may leave out is given.
    pub fn knows(&mut self) -> bool {
        !self.happens(UNKNOWN)
    }

    /// One of `choices`, each equally likely.
    pub fn pick<T: Copy>(&mut self, choices: &[T]) -> T {
        let index = self.between(0.0, choices.len() as f64) as usize;
        choices[index.min(choices.len() - 1)]
    }
}
