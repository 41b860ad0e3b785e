//! What a rail asks of every stage: the points at which it is judged, and the drive.

use crate::part::{INPUTS, Surroundings};
use crate::rail::{LightLoad, Rail, Supply};

/// One load current of the rail.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LoadPoint {
    /// Current, A.
    pub current_a: f64,
    /// Share of time; 0 for a full load that the profile does not name.
    pub share: f64,
}

/// The points of a rail and everything about it that the model needs.
#[derive(Debug, Clone, PartialEq)]
pub struct Conditions {
    /// Input voltages, ascending and distinct, at most [`INPUTS`].
    pub inputs_v: Vec<f64>,
    /// Index of the typical input.
    pub typical: usize,
    /// Load currents, ascending and distinct.
    pub loads: Vec<LoadPoint>,
    /// Index of the full load.
    pub full_load: usize,
    /// Ambient, °C.
    pub ambient_c: f64,
    /// Output, V.
    pub output_v: f64,
    /// Gate supply, V.
    pub gate_v: f64,
    /// Driver and external resistance while charging the gate, Ω.
    pub pull_up_ohm: f64,
    /// The same while discharging, Ω.
    pub pull_down_ohm: f64,
    /// Dead time at each edge of a switch rectifier, s.
    pub dead_time_s: f64,
    /// Controller supply current, A.
    pub bias_a: f64,
    /// Where gate charge and bias come from.
    pub supply: Supply,
    /// Whether a switch rectifier stays on through zero current.
    pub forced: bool,
}

impl Conditions {
    /// The conditions of a rail.
    pub fn of(rail: &Rail) -> Self {
        let mut inputs_v: Vec<f64> =
            [rail.input.minimum_v, rail.input.typical_v, rail.input.maximum_v].iter().map(|v| v.get()).collect();
        inputs_v.dedup();
        let typical = inputs_v.iter().position(|&v| v == rail.input.typical_v.get()).unwrap_or(0);
        let mut loads: Vec<LoadPoint> = rail
            .loads
            .iter()
            .map(|load| LoadPoint { current_a: load.current_a.get(), share: load.share.get() })
            .collect();
        let full_load_a = rail.output.current_a.get();
        if loads.iter().all(|load| load.current_a != full_load_a) {
            loads.push(LoadPoint { current_a: full_load_a, share: 0.0 });
        }
        loads.sort_by(|a, b| a.current_a.total_cmp(&b.current_a));
        let full_load = loads.iter().position(|load| load.current_a == full_load_a).unwrap_or(loads.len() - 1);
        Self {
            inputs_v,
            typical,
            loads,
            full_load,
            ambient_c: rail.ambient_c,
            output_v: rail.output.voltage_v.get(),
            gate_v: rail.drive.voltage_v.get(),
            pull_up_ohm: rail.drive.pull_up_ohm.get(),
            pull_down_ohm: rail.drive.pull_down_ohm.get(),
            dead_time_s: rail.drive.dead_time_s.get(),
            bias_a: rail.drive.bias_a.get(),
            supply: rail.drive.supply,
            forced: rail.range.light_load == LightLoad::Forced,
        }
    }

    /// The electrical surroundings of every switch and diode.
    pub fn surroundings(&self) -> Surroundings {
        let last = self.inputs_v.len() - 1;
        Surroundings {
            gate_v: self.gate_v,
            full_load_a: self.loads[self.full_load].current_a,
            output_v: self.output_v,
            inputs_v: std::array::from_fn(|k| self.inputs_v[k.min(last)]),
        }
    }

    /// Input voltages as the biases of an input bank.
    pub fn input_biases_v(&self) -> [f64; INPUTS] {
        self.surroundings().inputs_v
    }

    /// The bias of an output bank.
    pub fn output_biases_v(&self) -> [f64; INPUTS] {
        [self.output_v; INPUTS]
    }

    /// How many points there are.
    pub fn points(&self) -> usize {
        self.inputs_v.len() * self.loads.len()
    }

    /// Index of a point: inputs ascending, then loads ascending.
    pub fn point(&self, input: usize, load: usize) -> usize {
        input * self.loads.len() + load
    }

    /// Weight of a point in the burden: its load's share at typical input, else 0.
    pub fn share(&self, input: usize, load: usize) -> f64 {
        if input == self.typical { self.loads[load].share } else { 0.0 }
    }

    /// Voltage at which gate charge and bias are paid for, V.
    pub fn supply_v(&self, input_v: f64) -> f64 {
        match self.supply {
            Supply::Input => input_v,
            Supply::Output => self.output_v,
            Supply::Efficiency(efficiency) => self.gate_v / efficiency.get(),
        }
    }
}
