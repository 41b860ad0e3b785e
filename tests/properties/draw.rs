//! Random stages of random small problems.

use rand_chacha::ChaCha8Rng;
use rand_chacha::rand_core::{Rng, SeedableRng};
use wattsieve::account::{Losses, Reading};
use wattsieve::stage::{Choice, RectifierKind, Stage};

use crate::problem::Problem;

/// A chance of its own, apart from that of the problems.
pub struct Chance(ChaCha8Rng);

impl Chance {
    pub fn new(seed: u64) -> Self {
        Self(ChaCha8Rng::seed_from_u64(seed ^ 0x5eed_0000))
    }

    /// Uniform in [0, 1).
    pub fn unit(&mut self) -> f64 {
        (self.0.next_u64() >> 11) as f64 / (1u64 << 53) as f64
    }

    /// An index below `count`.
    pub fn below(&mut self, count: usize) -> usize {
        ((self.unit() * count as f64) as usize).min(count - 1)
    }

    /// Log-uniform.
    pub fn scale(&mut self, lo: f64, hi: f64) -> f64 {
        lo * (hi / lo).powf(self.unit())
    }

    /// In random order.
    pub fn shuffle<T>(&mut self, items: &mut [T]) {
        for k in (1..items.len()).rev() {
            items.swap(k, self.below(k + 1));
        }
    }
}

/// Any stage of the problem's parts, whether it passes or not.
pub fn stage(problem: &Problem, chance: &mut Chance) -> Stage {
    let parts = &problem.parts;
    let mut choice =
        |count: usize, greatest: usize| Choice { index: chance.below(count), count: 1 + chance.below(greatest) as u32 };
    let high_switch = choice(parts.switches.len(), 2);
    let (low, diode) = (choice(parts.switches.len(), 3), choice(parts.diodes.len(), 3));
    let (input_bank, output_bank) = (choice(parts.capacitors.len(), 4), choice(parts.capacitors.len(), 4));
    let rectifier_kind = if chance.unit() < 0.5 { RectifierKind::Switch } else { RectifierKind::Diode };
    let frequencies = &problem.rail.range.frequencies_hz;
    Stage {
        frequency_hz: frequencies[chance.below(frequencies.len())].get(),
        high_switch,
        rectifier_kind,
        rectifier: if rectifier_kind == RectifierKind::Switch { low } else { diode },
        inductor: chance.below(parts.inductors.len()),
        input_bank,
        output_bank,
    }
}

/// `stages` random stages of each of the problems.
pub fn each(seeds: std::ops::Range<u64>, stages: usize, mut visit: impl FnMut(&Problem, &Stage, u64)) {
    for seed in seeds {
        let problem = Problem::new(seed);
        let mut chance = Chance::new(seed);
        for _ in 0..stages {
            let stage = stage(&problem, &mut chance);
            visit(&problem, &stage, seed);
        }
    }
}

/// Every loss by name.
pub fn losses(losses: &Losses) -> [(&'static str, f64); 15] {
    let Losses { high_switch, rectifier, inductor, input_bank, output_bank, drive } = losses;
    [
        ("high switch conduction", high_switch.conduction),
        ("overlap", high_switch.overlap),
        ("output charge", high_switch.output_charge),
        ("recovery", high_switch.recovery),
        ("rectifier conduction", rectifier.conduction),
        ("dead time", rectifier.dead_time),
        ("leakage", rectifier.leakage),
        ("winding dc", inductor.winding_dc),
        ("winding ac", inductor.winding_ac),
        ("core", inductor.core),
        ("input bank", input_bank.esr),
        ("output bank", output_bank.esr),
        ("high gate", drive.high_gate),
        ("rectifier gate", drive.rectifier_gate),
        ("bias", drive.bias),
    ]
}

/// Every number of a reading by name.
pub fn figures(reading: &Reading) -> Vec<(&'static str, f64)> {
    let Reading { rms_a, temperature_c, .. } = reading;
    let mut all = vec![
        ("duty", reading.duty),
        ("ripple", reading.ripple_a),
        ("peak", reading.peak_a),
        ("valley", reading.valley_a),
        ("output ripple", reading.output_ripple_v),
        ("input ripple", reading.input_ripple_v),
        ("loss", reading.loss_w),
        ("efficiency", reading.efficiency),
        ("high switch rms", rms_a.high_switch),
        ("rectifier rms", rms_a.rectifier),
        ("inductor rms", rms_a.inductor),
        ("input bank rms", rms_a.input_bank),
        ("output bank rms", rms_a.output_bank),
        ("high switch temperature", temperature_c.high_switch),
        ("rectifier temperature", temperature_c.rectifier),
        ("winding temperature", temperature_c.inductor),
    ];
    all.extend(losses(&reading.losses_w));
    all
}

/// Whether two figures agree within `share` of a scale that is at least `floor`.
pub fn close(a: f64, b: f64, share: f64, floor: f64) -> bool {
    (a - b).abs() <= share * a.abs().max(b.abs()).max(floor)
}
