//! Small random problems: every optional value present or not, every limit active or not, ties planted.

use rand_chacha::ChaCha8Rng;
use rand_chacha::rand_core::{Rng, SeedableRng};
use wattsieve::part::{
    Capacitor, CapacitorKind, CoreDatum, Curve, Diode, DiodeKind, GateLevels, Heating, HotRatio, Identity, Inductor,
    Parts, Slot, Switch,
};
use wattsieve::quantity::{NonNegative, Positive, Share};
use wattsieve::rail::{
    Ban, Drive, Input, LightLoad, Limits, Load, LoadStep, Output, Parallel, Pin, Rail, Range, Supply, Worth,
};

/// A rail and its parts.
pub struct Problem {
    pub rail: Rail,
    pub parts: Parts,
}

struct Dice(ChaCha8Rng);

impl Dice {
    /// Uniform in [0, 1).
    fn unit(&mut self) -> f64 {
        (self.0.next_u64() >> 11) as f64 / (1u64 << 53) as f64
    }

    fn between(&mut self, lo: f64, hi: f64) -> f64 {
        lo + (hi - lo) * self.unit()
    }

    /// Log-uniform, rounded to two digits so that equal values happen.
    fn scale(&mut self, lo: f64, hi: f64) -> f64 {
        let x = lo * (hi / lo).powf(self.unit());
        let step = 10f64.powf(x.log10().floor() - 1.0);
        (x / step).round() * step
    }

    fn chance(&mut self, share: f64) -> bool {
        self.unit() < share
    }

    fn count(&mut self, greatest: u32) -> u32 {
        1 + (self.unit() * f64::from(greatest)) as u32
    }

    fn maybe<T>(&mut self, share: f64, make: impl FnOnce(&mut Self) -> T) -> Option<T> {
        if self.chance(share) { Some(make(self)) } else { None }
    }

    fn name(&mut self, prefix: &str, index: usize) -> String {
        // Lengths differ, so that the order by bytes is not the order by number.
        format!("{prefix}{}{index}", if self.chance(0.3) { "x" } else { "" })
    }
}

fn positive(value: f64) -> Positive {
    Positive::new(value).expect("a positive number")
}

fn curve(points: Vec<(f64, f64)>) -> Curve {
    Curve::new(points).expect("a curve")
}

fn identity(dice: &mut Dice, prefix: &str, index: usize) -> Identity {
    let known = dice.chance(0.95);
    Identity {
        part: dice.name(prefix, index),
        maker: dice.maybe(0.5, |d| format!("maker {}", d.count(3))),
        cost: dice.maybe(if known { 1.0 } else { 0.3 }, |d| NonNegative::new(d.scale(0.05, 2.0)).expect("a cost")),
        area_mm2: dice.maybe(if known { 1.0 } else { 0.3 }, |d| positive(d.scale(2.0, 80.0))),
        height_m: dice.maybe(0.9, |d| positive(d.scale(0.8e-3, 6e-3))),
        ..Identity::default()
    }
}

fn switch(dice: &mut Dice, index: usize) -> Switch {
    let r = dice.scale(3e-3, 60e-3);
    let qg = dice.scale(60e-12, 240e-12) / r;
    let qgd = qg * dice.between(0.12, 0.3);
    let plateau = dice.maybe(0.7, |d| positive(d.between(2.0, 3.2)));
    let mut on = vec![(4.5, r)];
    if dice.chance(0.6) {
        on.push((10.0, r * dice.between(0.7, 0.95)));
    }
    let on_max = dice.maybe(0.5, |d| curve(on.iter().map(|&(v, r)| (v, r * d.between(0.95, 1.4))).collect()));
    let mut gate = vec![(4.5, qg)];
    if dice.chance(0.5) {
        gate.push((10.0, qg * dice.between(1.6, 2.2)));
    }
    let source = dice.maybe(0.7, |d| positive(qg * d.between(0.2, 0.4)));
    Switch {
        identity: identity(dice, "S", index),
        voltage_rating_v: positive([30.0, 40.0, 60.0, 100.0][dice.count(4) as usize - 1]),
        on_resistance_ohm: curve(on),
        on_resistance_max_ohm: on_max,
        gate_charge_c: curve(gate),
        gate_drain_charge_c: positive(qgd),
        gate_source_charge_c: source,
        gate_levels: GateLevels::new(dice.maybe(0.4, |d| positive(d.between(1.0, 1.9))), plateau).expect("levels"),
        plateau_current_a: dice.maybe(0.7, |d| positive(d.scale(3.0, 30.0))),
        gate_resistance_ohm: dice.maybe(0.7, |d| NonNegative::new(d.scale(0.3, 3.0)).expect("a resistance")),
        output_charge_c: dice.maybe(0.7, |d| curve(vec![(d.scale(10.0, 30.0), qg * d.between(0.6, 1.6))])),
        recovery_charge_c: dice.maybe(0.7, |d| NonNegative::new(qg * d.between(0.0, 2.0)).expect("a charge")),
        body_diode_drop_v: dice.maybe(0.6, |d| positive(d.between(0.6, 1.0))),
        hot_resistance: dice.maybe(0.6, |d| HotRatio::new(positive(d.between(0.95, 2.0)), 125.0).expect("a ratio")),
        current_rating_a: dice.maybe(0.5, |d| positive(d.scale(6.0, 60.0))),
        gate_rating_v: dice.maybe(0.5, |d| positive(d.between(4.9, 20.0))),
        junction_limit_c: dice.maybe(0.4, |d| d.between(110.0, 175.0)),
        thermal_resistance_k_per_w: positive(dice.scale(15.0, 90.0)),
    }
}

fn diode(dice: &mut Dice, index: usize) -> Diode {
    let drop = dice.between(0.3, 0.6);
    let mut drops = vec![(1.0, drop)];
    if dice.chance(0.7) {
        drops.push((4.0, drop * dice.between(0.98, 1.5)));
    }
    if drops.len() == 2 && dice.chance(0.4) {
        drops.push((10.0, drops[1].1 * dice.between(1.0, 1.5)));
    }
    let mut leakage = vec![(25.0, dice.scale(1e-6, 3e-3))];
    if dice.chance(0.5) {
        leakage.push((125.0, leakage[0].1 * dice.between(5.0, 500.0)));
    }
    let silicon = dice.chance(0.2);
    Diode {
        identity: identity(dice, "D", index),
        kind: if silicon { DiodeKind::Silicon } else { DiodeKind::Schottky },
        voltage_rating_v: positive([30.0, 40.0, 60.0, 100.0][dice.count(4) as usize - 1]),
        current_rating_a: positive(dice.scale(2.0, 20.0)),
        forward_drop_v: curve(drops),
        drop_slope_v_per_k: dice.maybe(0.4, |d| d.between(-0.003, 0.0005)),
        leakage_a: dice.maybe(0.8, |_| curve(leakage)),
        junction_charge_c: dice.maybe(0.7, |d| curve(vec![(12.0, d.scale(1e-9, 2e-8))])),
        recovery_charge_c: dice
            .maybe(if silicon { 0.8 } else { 0.2 }, |d| NonNegative::new(d.scale(1e-9, 5e-8)).expect("a charge")),
        junction_limit_c: dice.maybe(0.4, |d| d.between(110.0, 175.0)),
        thermal_resistance_k_per_w: positive(dice.scale(15.0, 80.0)),
    }
}

fn inductor(dice: &mut Dice, index: usize, rated_a: f64) -> Inductor {
    let l = dice.scale(1e-6, 40e-6);
    let mut inductance = vec![(0.0, l)];
    if dice.chance(0.4) {
        inductance.push((rated_a, l * dice.between(0.6, 1.0)));
    }
    let dcr = dice.scale(4e-3, 80e-3);
    let mut saturation = vec![(25.0, rated_a * dice.between(0.9, 4.0))];
    if dice.chance(0.3) {
        saturation.push((100.0, saturation[0].1 * dice.between(0.6, 1.0)));
    }
    Inductor {
        identity: identity(dice, "L", index),
        inductance_h: curve(inductance),
        tolerance: dice.maybe(0.6, |d| Share::new(d.between(0.0, 0.3)).expect("a share")),
        dcr_ohm: positive(dcr),
        dcr_max_ohm: dice.maybe(0.5, |d| positive(dcr * d.between(0.95, 1.3))),
        saturation_current_a: curve(saturation),
        heating: dice.maybe(0.7, |d| Heating {
            current_a: positive(rated_a * d.between(0.7, 2.5)),
            rise_k: d.maybe(0.5, |d| positive(d.between(20.0, 60.0))),
        }),
        core: dice.maybe(0.8, |d| CoreDatum {
            loss_w: positive(d.scale(0.01, 0.6)),
            frequency_hz: positive(500e3),
            ripple_a: positive(rated_a * 0.4),
            alpha: d.maybe(0.4, |d| positive(d.between(0.8, 1.9))),
            beta: d.maybe(0.4, |d| positive(d.between(1.9, 2.8))),
        }),
        ac_resistance_ohm: dice
            .maybe(0.4, |d| curve(vec![(100e3, dcr * d.between(1.0, 3.0)), (1e6, dcr * d.between(3.0, 30.0))])),
    }
}

fn capacitor(dice: &mut Dice, index: usize) -> Capacitor {
    let kind =
        [CapacitorKind::Ceramic, CapacitorKind::Polymer, CapacitorKind::Electrolytic][dice.count(3) as usize - 1];
    let c = dice.scale(4.7e-6, 220e-6);
    let mut capacitance = vec![(0.0, c)];
    if dice.chance(0.5) {
        capacitance.push((10.0, c * dice.between(0.4, 1.0)));
    }
    let mut esr = vec![(100e3, dice.scale(1e-3, 60e-3))];
    if dice.chance(0.4) {
        esr.push((1e6, esr[0].1 * dice.between(0.5, 1.1)));
    }
    Capacitor {
        identity: identity(dice, "C", index),
        kind,
        capacitance_f: curve(capacitance),
        tolerance: dice.maybe(0.5, |d| Share::new(d.between(0.0, 0.3)).expect("a share")),
        voltage_rating_v: positive([10.0, 25.0, 50.0, 100.0][dice.count(4) as usize - 1]),
        esr_ohm: curve(esr),
        esl_h: dice.maybe(0.6, |d| NonNegative::new(d.scale(2e-10, 2e-9)).expect("an inductance")),
        ripple_current_a: dice.maybe(0.5, |d| positive(d.scale(0.3, 6.0))),
    }
}

fn rail(dice: &mut Dice) -> Rail {
    let typical = dice.between(9.0, 30.0);
    let narrow = dice.chance(0.3);
    let (low, high) =
        if narrow { (typical, typical) } else { (typical * dice.between(0.6, 1.0), typical * dice.between(1.0, 1.4)) };
    let output_v = low * dice.between(0.1, 0.85);
    let current = dice.scale(0.5, 10.0);
    let mut loads: Vec<f64> =
        (0..dice.count(3)).map(|_| (current * dice.between(0.03, 1.0) * 100.0).ceil() / 100.0).collect();
    if dice.chance(0.6) {
        loads.push(current);
    }
    loads.retain(|load| *load <= current);
    if loads.is_empty() {
        loads.push(current);
    }
    loads.sort_by(f64::total_cmp);
    loads.dedup();
    let weights: Vec<f64> = loads.iter().map(|_| dice.between(0.1, 1.0)).collect();
    let sum: f64 = weights.iter().sum();
    let kinds = dice.count(3);
    let frequencies: Vec<f64> = match dice.count(3) {
        1 => vec![400e3],
        2 => vec![250e3, 700e3],
        _ => vec![200e3, 500e3, 1.2e6],
    };
    let limit = |dice: &mut Dice, share: f64, lo: f64, hi: f64| dice.maybe(share, |d| positive(d.scale(lo, hi)));
    let tight = dice.chance(0.3);
    let often = if tight { 0.7 } else { 0.2 };
    let worth = match dice.count(4) {
        1 => (1.0, 0.0, 0.0),
        2 => (0.0, 0.0, 1.0),
        3 => (0.0, 0.01, 0.0),
        _ => (dice.between(0.2, 2.0), dice.between(0.0, 0.02), dice.between(0.0, 1.5)),
    };
    let non_negative = |value: f64| NonNegative::new(value).expect("a worth");
    let supply = match dice.count(3) {
        1 => Supply::Input,
        2 if output_v >= 5.0 => Supply::Output,
        _ => Supply::Efficiency(positive(dice.between(0.6, 1.0))),
    };
    Rail {
        name: "random".to_owned(),
        input: Input {
            minimum_v: positive(low),
            typical_v: positive(typical),
            maximum_v: positive(high),
            ripple_v: limit(dice, often, 0.1, 2.0),
            surge_v: positive(high * if dice.chance(0.3) { dice.between(1.0, 1.5) } else { 1.0 }),
        },
        output: Output {
            voltage_v: positive(output_v),
            current_a: positive(current),
            peak_a: positive(current * if dice.chance(0.3) { dice.between(1.0, 1.5) } else { 1.0 }),
            ripple_v: limit(dice, often, 5e-3, 0.3),
            step: dice.maybe(often, |d| LoadStep {
                current_a: positive(current * d.between(0.1, 0.7)),
                deviation_v: positive(output_v * d.between(0.02, 0.2)),
                crossover_hz: d.maybe(0.5, |d| positive(d.scale(20e3, 150e3))),
            }),
        },
        ambient_c: dice.between(-20.0, 85.0),
        drive: Drive {
            voltage_v: positive(dice.between(4.5, 8.0)),
            pull_up_ohm: positive(dice.scale(0.5, 5.0)),
            pull_down_ohm: positive(dice.scale(0.3, 3.0)),
            dead_time_s: non_negative(dice.between(10e-9, 80e-9)),
            minimum_on_s: non_negative(if dice.chance(often) { dice.between(30e-9, 400e-9) } else { 0.0 }),
            minimum_off_s: non_negative(if dice.chance(often) { dice.between(30e-9, 400e-9) } else { 0.0 }),
            bias_a: non_negative(dice.between(0.0, 5e-3)),
            supply,
            supply_limit_a: limit(dice, often, 5e-3, 0.1),
        },
        range: Range {
            switch_rectifier: kinds != 2,
            diode_rectifier: kinds != 1,
            light_load: if dice.chance(0.5) { LightLoad::Forced } else { LightLoad::Emulated },
            frequencies_hz: frequencies.into_iter().map(positive).collect(),
            parallel: Parallel {
                high_switch: dice.count(2),
                rectifier: dice.count(3),
                input: dice.count(3),
                output: dice.count(3),
            },
            ripple_ratio_min: dice.maybe(often / 2.0, |d| positive(d.between(0.05, 0.3))),
            ripple_ratio_max: dice.maybe(often / 2.0, |d| positive(d.between(0.3, 2.0))),
        },
        loads: loads
            .iter()
            .zip(&weights)
            .map(|(&load, weight)| Load { current_a: positive(load), share: positive(weight / sum) })
            .collect(),
        limits: Limits {
            junction_margin_k: non_negative(dice.between(0.0, 30.0)),
            voltage_derating: positive(dice.between(0.7, 1.0)),
            current_derating: positive(dice.between(0.6, 1.0)),
            ringing: positive(dice.between(1.0, 1.2)),
            saturation_margin: positive(dice.between(1.0, 1.3)),
            winding_temperature_c: dice.between(95.0, 155.0),
            ceramic_derating: positive(dice.between(0.6, 1.0)),
            polymer_derating: positive(dice.between(0.6, 1.0)),
            electrolytic_derating: positive(dice.between(0.6, 1.0)),
            area_mm2: limit(dice, often, 60.0, 500.0),
            height_m: limit(dice, often / 2.0, 2e-3, 6e-3),
            cost: limit(dice, often, 1.0, 8.0),
            efficiency: dice.maybe(often / 2.0, |d| positive(d.between(0.7, 0.95))),
        },
        worth: Worth { loss: non_negative(worth.0), area: non_negative(worth.1), cost: non_negative(worth.2) },
        pins: vec![],
        bans: vec![],
    }
}

impl Problem {
    /// The problem of a seed: the same on every machine.
    pub fn new(seed: u64) -> Self {
        let mut dice = Dice(ChaCha8Rng::seed_from_u64(seed));
        let mut rail = rail(&mut dice);
        let rated_a = rail.output.current_a.get();
        let counts: [u32; 4] = std::array::from_fn(|_| dice.count(6));
        let mut parts = Parts {
            switches: (0..counts[0] as usize).map(|index| switch(&mut dice, index)).collect(),
            diodes: (0..counts[1] as usize).map(|index| diode(&mut dice, index)).collect(),
            inductors: (0..counts[2] as usize).map(|index| inductor(&mut dice, index, rated_a)).collect(),
            capacitors: (0..counts[3] as usize).map(|index| capacitor(&mut dice, index)).collect(),
        };
        if dice.chance(0.3) {
            plant_ties(&mut parts);
        }
        if dice.chance(0.1) {
            rail.pins.push(Pin { slot: Slot::Inductor, parts: vec![parts.inductors[0].identity.part.clone()] });
        }
        if dice.chance(0.1) {
            rail.bans.push(Ban::Part(parts.switches[0].identity.part.clone()));
        }
        if dice.chance(0.1) {
            rail.bans.push(Ban::Maker("maker 1".to_owned()));
        }
        Self { rail, parts }
    }
}

/// The same part under another name, in every catalog.
fn plant_ties(parts: &mut Parts) {
    let twin = |identity: &Identity| Identity { part: format!("{}twin", identity.part), ..identity.clone() };
    let first = parts.switches[0].clone();
    parts.switches.push(Switch { identity: twin(&first.identity), ..first });
    let first = parts.diodes[0].clone();
    parts.diodes.push(Diode { identity: twin(&first.identity), ..first });
    let first = parts.inductors[0].clone();
    parts.inductors.push(Inductor { identity: twin(&first.identity), ..first });
    let first = parts.capacitors[0].clone();
    parts.capacitors.push(Capacitor { identity: twin(&first.identity), ..first });
}
