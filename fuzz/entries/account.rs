//! Arbitrary typed parts, rail and stage: the account ends, does not panic and holds no NaN.

use wattsieve::account::account;
use wattsieve::part::{
    Capacitor, CapacitorKind, CoreDatum, Curve, Diode, DiodeKind, GateLevels, Heating, HotRatio, Identity, Inductor,
    Parts, Switch,
};
use wattsieve::quantity::{NonNegative, Positive, Share};
use wattsieve::rail::{Drive, Input, LightLoad, Limits, Load, LoadStep, Output, Parallel, Rail, Range, Supply, Worth};
use wattsieve::stage::{Choice, RectifierKind, Stage};

/// Numbers out of bytes; when they run out, everything is as usual.
struct Bytes<'a>(&'a [u8]);

impl Bytes<'_> {
    fn byte(&mut self) -> u8 {
        match self.0 {
            [first, rest @ ..] => {
                self.0 = rest;
                *first
            }
            [] => 0,
        }
    }

    fn flag(&mut self) -> bool {
        self.byte() & 1 == 1
    }

    /// A factor: 1 for 0, else within three decades, or for a few bytes within twelve.
    fn factor(&mut self) -> f64 {
        match self.byte() {
            0 => 1.0,
            byte @ 1..=239 => 10f64.powf((f64::from(byte) - 120.0) / 40.0),
            byte => 10f64.powf((f64::from(byte) - 247.5) * 1.6),
        }
    }

    fn about(&mut self, usual: f64) -> Positive {
        Positive::new(usual * self.factor()).expect("a product of positive numbers")
    }

    fn zero_or(&mut self, usual: f64) -> NonNegative {
        if self.flag() { NonNegative::ZERO } else { self.about(usual).into() }
    }

    fn maybe<T>(&mut self, make: impl FnOnce(&mut Self) -> T) -> Option<T> {
        if self.flag() { Some(make(self)) } else { None }
    }

    fn share(&mut self) -> Share {
        Share::new(f64::from(self.byte()) / 256.0).expect("below 1")
    }

    /// A part in (0, 1].
    fn part(&mut self) -> Positive {
        Positive::new((256.0 - f64::from(self.byte())) / 256.0).expect("above 0")
    }

    /// Up to three points about the usual one.
    fn curve(&mut self, x: f64, y: f64) -> Curve {
        let count = 1 + self.byte() % 3;
        let mut points = vec![(x, self.about(y).get())];
        for _ in 1..count {
            points.push((self.about(x).get(), self.about(y).get()));
        }
        points.sort_by(|a, b| a.0.total_cmp(&b.0));
        points.dedup_by(|a, b| a.0 == b.0);
        Curve::new(points).expect("distinct points")
    }

    fn celsius(&mut self) -> f64 {
        f64::from(self.byte()) - 50.0
    }
}

fn switch(b: &mut Bytes) -> Switch {
    let levels = GateLevels::new(b.maybe(|b| b.about(1.5)), b.maybe(|b| b.about(2.5)));
    Switch {
        identity: identity(b),
        voltage_rating_v: b.about(60.0),
        on_resistance_ohm: b.curve(4.5, 10e-3),
        on_resistance_max_ohm: b.maybe(|b| b.curve(4.5, 12e-3)),
        gate_charge_c: b.curve(4.5, 10e-9),
        gate_drain_charge_c: b.about(2e-9),
        gate_source_charge_c: b.maybe(|b| b.about(3e-9)),
        gate_levels: levels.unwrap_or_else(|| GateLevels::new(None, None).expect("the usual levels")),
        plateau_current_a: b.maybe(|b| b.about(10.0)),
        gate_resistance_ohm: b.maybe(|b| b.zero_or(1.0)),
        output_charge_c: b.maybe(|b| b.curve(12.0, 10e-9)),
        recovery_charge_c: b.maybe(|b| b.zero_or(10e-9)),
        body_diode_drop_v: b.maybe(|b| b.about(0.8)),
        hot_resistance: b.maybe(|b| HotRatio::new(b.about(1.5), 125.0).expect("above room temperature")),
        current_rating_a: b.maybe(|b| b.about(30.0)),
        gate_rating_v: b.maybe(|b| b.about(20.0)),
        junction_limit_c: b.maybe(Bytes::celsius),
        thermal_resistance_k_per_w: b.about(40.0),
    }
}

fn identity(b: &mut Bytes) -> Identity {
    Identity {
        part: "P".into(),
        cost: b.maybe(|b| b.zero_or(1.0)),
        area_mm2: b.maybe(|b| b.about(20.0)),
        height_m: b.maybe(|b| b.about(2e-3)),
        ..Identity::default()
    }
}

fn diode(b: &mut Bytes) -> Diode {
    Diode {
        identity: identity(b),
        kind: if b.flag() { DiodeKind::Silicon } else { DiodeKind::Schottky },
        voltage_rating_v: b.about(60.0),
        current_rating_a: b.about(10.0),
        forward_drop_v: b.curve(3.0, 0.5),
        drop_slope_v_per_k: b.maybe(|b| (f64::from(b.byte()) - 200.0) * 2e-5),
        leakage_a: b.maybe(|b| b.curve(25.0, 1e-5)),
        junction_charge_c: b.maybe(|b| b.curve(12.0, 5e-9)),
        recovery_charge_c: b.maybe(|b| b.zero_or(10e-9)),
        junction_limit_c: b.maybe(Bytes::celsius),
        thermal_resistance_k_per_w: b.about(40.0),
    }
}

fn inductor(b: &mut Bytes) -> Inductor {
    Inductor {
        identity: identity(b),
        inductance_h: b.curve(3.0, 10e-6),
        tolerance: b.maybe(Bytes::share),
        dcr_ohm: b.about(15e-3),
        dcr_max_ohm: b.maybe(|b| b.about(18e-3)),
        saturation_current_a: b.curve(25.0, 10.0),
        heating: b.maybe(|b| Heating { current_a: b.about(5.0), rise_k: b.maybe(|b| b.about(40.0)) }),
        core: b.maybe(|b| CoreDatum {
            loss_w: b.about(0.1),
            frequency_hz: b.about(500e3),
            ripple_a: b.about(1.0),
            alpha: b.maybe(|b| b.about(1.4)),
            beta: b.maybe(|b| b.about(2.4)),
        }),
        ac_resistance_ohm: b.maybe(|b| b.curve(500e3, 50e-3)),
    }
}

fn capacitor(b: &mut Bytes) -> Capacitor {
    Capacitor {
        identity: identity(b),
        kind: [CapacitorKind::Ceramic, CapacitorKind::Polymer, CapacitorKind::Electrolytic][usize::from(b.byte() % 3)],
        capacitance_f: b.curve(5.0, 22e-6),
        tolerance: b.maybe(Bytes::share),
        voltage_rating_v: b.about(50.0),
        esr_ohm: b.curve(500e3, 5e-3),
        esl_h: b.maybe(|b| b.zero_or(1e-9)),
        ripple_current_a: b.maybe(|b| b.about(3.0)),
    }
}

fn rail(b: &mut Bytes) -> Rail {
    let output_v = b.about(3.3);
    let above = |v: f64, b: &mut Bytes| Positive::new(v * (1.0 + f64::from(b.byte()) / 64.0)).expect("positive");
    let minimum_v = Positive::new(output_v.get() * (1.001 + b.factor())).expect("positive");
    let typical_v = above(minimum_v.get(), b);
    let maximum_v = above(typical_v.get(), b);
    let current_a = b.about(5.0);
    let mut loads_a = vec![current_a.get()];
    for _ in 0..b.byte() % 3 {
        loads_a.push(current_a.get() * b.part().get());
    }
    loads_a.sort_by(f64::total_cmp);
    loads_a.dedup();
    let share = Positive::new(1.0 / loads_a.len() as f64).expect("positive");
    let supply = match b.byte() % 3 {
        0 => Supply::Input,
        1 => Supply::Output,
        _ => Supply::Efficiency(b.part()),
    };
    Rail {
        name: "fuzz".to_owned(),
        input: Input {
            minimum_v,
            typical_v,
            maximum_v,
            ripple_v: b.maybe(|b| b.about(0.3)),
            surge_v: above(maximum_v.get(), b),
        },
        output: Output {
            voltage_v: output_v,
            current_a,
            peak_a: above(current_a.get(), b),
            ripple_v: b.maybe(|b| b.about(0.03)),
            step: b.maybe(|b| LoadStep {
                current_a: b.about(2.0),
                deviation_v: b.about(0.1),
                crossover_hz: b.maybe(|b| b.about(60e3)),
            }),
        },
        ambient_c: b.celsius(),
        drive: Drive {
            voltage_v: b.about(5.0),
            pull_up_ohm: b.about(1.5),
            pull_down_ohm: b.about(0.8),
            dead_time_s: b.zero_or(20e-9),
            minimum_on_s: b.zero_or(60e-9),
            minimum_off_s: b.zero_or(120e-9),
            bias_a: b.zero_or(2e-3),
            supply,
            supply_limit_a: b.maybe(|b| b.about(0.06)),
        },
        range: Range {
            switch_rectifier: true,
            diode_rectifier: true,
            light_load: if b.flag() { LightLoad::Forced } else { LightLoad::Emulated },
            frequencies_hz: vec![b.about(500e3)],
            parallel: Parallel { high_switch: 1, rectifier: 1, input: 1, output: 1 },
            ripple_ratio_min: b.maybe(|b| b.about(0.2)),
            ripple_ratio_max: b.maybe(|b| b.about(0.6)),
        },
        loads: loads_a
            .iter()
            .map(|&load_a| Load { current_a: Positive::new(load_a).expect("positive"), share })
            .collect(),
        limits: Limits {
            junction_margin_k: b.zero_or(15.0),
            voltage_derating: b.part(),
            current_derating: b.part(),
            ringing: above(1.0, b),
            saturation_margin: b.about(1.2),
            winding_temperature_c: b.celsius(),
            ceramic_derating: b.part(),
            polymer_derating: b.part(),
            electrolytic_derating: b.part(),
            area_mm2: b.maybe(|b| b.about(400.0)),
            height_m: b.maybe(|b| b.about(5e-3)),
            cost: b.maybe(|b| b.about(5.0)),
            efficiency: b.maybe(Bytes::part),
        },
        worth: Worth { loss: b.zero_or(1.0), area: b.zero_or(0.01), cost: b.zero_or(1.0) },
        pins: vec![],
        bans: vec![],
    }
}

/// The bytes say how far each value is from a usual one.
pub fn run(data: &[u8]) {
    let b = &mut Bytes(data);
    let kind = if b.flag() { RectifierKind::Diode } else { RectifierKind::Switch };
    let mut choice = |index| Choice { index, count: 1 + u32::from(b.byte() % 4) };
    let (high_switch, rectifier, input_bank, output_bank) =
        (choice(0), choice(if kind == RectifierKind::Switch { 1 } else { 0 }), choice(0), choice(1));
    let rail = rail(b);
    let parts = Parts {
        switches: vec![switch(b), switch(b)],
        diodes: vec![diode(b)],
        inductors: vec![inductor(b)],
        capacitors: vec![capacitor(b), capacitor(b)],
    };
    let stage = Stage {
        frequency_hz: rail.range.frequencies_hz[0].get(),
        high_switch,
        rectifier_kind: kind,
        rectifier,
        inductor: 0,
        input_bank,
        output_bank,
    };
    let account = account(&rail, &parts, &stage);
    let text = format!("{account:?}");
    assert!(!text.contains("NaN"), "{text}");
    for reading in account.points.iter().filter_map(|point| point.reading.as_ref()) {
        assert!(reading.loss_w.is_finite() && reading.duty > 0.0 && reading.duty < 1.0, "{reading:?}");
    }
}
