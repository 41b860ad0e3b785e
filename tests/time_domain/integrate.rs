//! The ideal stage in time: one inductor between two switched voltages, integrated step by step until a period repeats itself.
//!
//! The output is a voltage source (an infinite bank) and there is no dead time. Nothing here knows the closed forms.

use wattsieve::model::current::{Circuit, Drop};

/// Steps of one interval.
const STEPS: u32 = 400;

/// The inductor current and what it has added up to since the interval began.
#[derive(Debug, Clone, Copy, Default)]
pub struct State {
    /// Current, A.
    pub current_a: f64,
    /// ∫ i dt, C.
    pub charge_c: f64,
    /// ∫ i² dt, A²s.
    pub square_a2s: f64,
}

impl State {
    fn plus(self, slope: Self, dt: f64) -> Self {
        Self {
            current_a: self.current_a + slope.current_a * dt,
            charge_c: self.charge_c + slope.charge_c * dt,
            square_a2s: self.square_a2s + slope.square_a2s * dt,
        }
    }
}

/// An interval: L di/dt = `volts` − `ohm`·i.
#[derive(Debug, Clone, Copy)]
pub struct Interval {
    pub volts: f64,
    pub ohm: f64,
    pub henry: f64,
    pub seconds: f64,
}

impl Interval {
    fn slope(&self, state: State) -> State {
        State {
            current_a: (self.volts - self.ohm * state.current_a) / self.henry,
            charge_c: state.current_a,
            square_a2s: state.current_a * state.current_a,
        }
    }

    /// The states at the end of every step of the classical fourth-order Runge-Kutta method, the first included.
    pub fn states(&self, from_a: f64) -> Vec<State> {
        let dt = self.seconds / f64::from(STEPS);
        let mut state = State { current_a: from_a, ..State::default() };
        let mut states = vec![state];
        for _ in 0..STEPS {
            let k1 = self.slope(state);
            let k2 = self.slope(state.plus(k1, dt / 2.0));
            let k3 = self.slope(state.plus(k2, dt / 2.0));
            let k4 = self.slope(state.plus(k3, dt));
            state = state.plus(k1, dt / 6.0).plus(k2, dt / 3.0).plus(k3, dt / 3.0).plus(k4, dt / 6.0);
            states.push(state);
        }
        states
    }

    /// The state at the end.
    pub fn end(&self, from_a: f64) -> State {
        let states = self.states(from_a);
        states[states.len() - 1]
    }
}

/// A period that repeats itself and carries the load on average.
#[derive(Debug, Clone)]
pub struct Period {
    pub duty: f64,
    pub fall: f64,
    pub valley_a: f64,
    pub on: Vec<State>,
    pub off: Vec<State>,
    pub seconds: f64,
}

fn rise(circuit: &Circuit, seconds: f64) -> Interval {
    Interval {
        volts: circuit.input_v - circuit.output_v,
        ohm: circuit.high_ohm + circuit.winding_ohm,
        henry: circuit.inductance_h,
        seconds,
    }
}

fn drop(circuit: &Circuit, rectifier: Drop, seconds: f64) -> Interval {
    Interval {
        volts: -circuit.output_v - rectifier.threshold_v,
        ohm: circuit.winding_ohm + rectifier.resistance_ohm,
        henry: circuit.inductance_h,
        seconds,
    }
}

/// The root of a rising function between two ends.
fn root(mut lo: f64, mut hi: f64, rising: impl Fn(f64) -> f64) -> f64 {
    for _ in 0..60 {
        let middle = lo + (hi - lo) / 2.0;
        if rising(middle) < 0.0 { lo = middle } else { hi = middle }
    }
    lo + (hi - lo) / 2.0
}

impl Period {
    fn new(circuit: &Circuit, rectifier: Drop, duty: f64, fall: f64, valley_a: f64) -> Self {
        let seconds = 1.0 / circuit.frequency_hz;
        let on = rise(circuit, duty * seconds).states(valley_a);
        let off = drop(circuit, rectifier, fall * seconds).states(on[on.len() - 1].current_a);
        Self { duty, fall, valley_a, on, off, seconds }
    }

    /// In continuous conduction: the duty at which the period repeats itself around the load.
    pub fn continuous(circuit: &Circuit, rectifier: Drop) -> Self {
        let seconds = 1.0 / circuit.frequency_hz;
        let lossless = circuit.high_ohm + circuit.winding_ohm + rectifier.resistance_ohm == 0.0;
        // The end of a period is a straight function of its beginning.
        let end_a = |duty: f64, from_a: f64| {
            let peak_a = rise(circuit, duty * seconds).end(from_a).current_a;
            drop(circuit, rectifier, (1.0 - duty) * seconds).end(peak_a).current_a
        };
        let with_mean = |duty: f64, valley_a: f64| {
            let period = Self::new(circuit, rectifier, duty, 1.0 - duty, valley_a);
            (period.mean_a(), period)
        };
        if lossless {
            // Without resistance the current's level is free: the duty holds the level, and the level is the load's.
            let duty = root(0.0, 1.0, |duty| end_a(duty, 0.0));
            let (mean_a, _) = with_mean(duty, 0.0);
            return with_mean(duty, circuit.load_a - mean_a).1;
        }
        let steady_a = |duty: f64| {
            let (at_zero_a, at_one_a) = (end_a(duty, 0.0), end_a(duty, 1.0));
            at_zero_a / (1.0 - (at_one_a - at_zero_a))
        };
        let duty = root(0.0, 1.0, |duty| with_mean(duty, steady_a(duty)).0 - circuit.load_a);
        with_mean(duty, steady_a(duty)).1
    }

    /// In discontinuous conduction: the duty at which a pulse from nothing to nothing carries the load.
    pub fn discontinuous(circuit: &Circuit, rectifier: Drop) -> Self {
        let seconds = 1.0 / circuit.frequency_hz;
        let pulse = |duty: f64| {
            let peak_a = rise(circuit, duty * seconds).end(0.0).current_a;
            let fall = root(0.0, 20.0, |fall| -drop(circuit, rectifier, fall * seconds).end(peak_a).current_a);
            Self::new(circuit, rectifier, duty, fall, 0.0)
        };
        let duty = root(0.0, 1.0, |duty| pulse(duty).mean_a() - circuit.load_a);
        pulse(duty)
    }

    fn ends(&self) -> [State; 2] {
        [self.on[self.on.len() - 1], self.off[self.off.len() - 1]]
    }

    pub fn peak_a(&self) -> f64 {
        self.ends()[0].current_a
    }

    /// Mean inductor current.
    pub fn mean_a(&self) -> f64 {
        let [on, off] = self.ends();
        (on.charge_c + off.charge_c) / self.seconds
    }

    /// Mean current of the rectifier.
    pub fn rectifier_mean_a(&self) -> f64 {
        self.ends()[1].charge_c / self.seconds
    }

    /// Mean squares of the high switch, the rectifier, the inductor, the input bank and the output bank.
    pub fn squares_a2(&self) -> [f64; 5] {
        let [on, off] = self.ends();
        let (high, rectifier) = (on.square_a2s / self.seconds, off.square_a2s / self.seconds);
        let high_mean_a = on.charge_c / self.seconds;
        let mean_a = self.mean_a();
        let inductor = high + rectifier;
        [high, rectifier, inductor, high - high_mean_a * high_mean_a, inductor - mean_a * mean_a]
    }

    /// Peak to peak of the voltage that the inductor current less the load makes on an output bank, V.
    pub fn output_ripple_v(&self, load_a: f64, capacitance_f: f64, esr_ohm: f64) -> f64 {
        let (mut lo, mut hi) = (f64::INFINITY, f64::NEG_INFINITY);
        let mut before_c = 0.0;
        for (states, share) in [(&self.on, self.duty), (&self.off, self.fall)] {
            let dt = share * self.seconds / f64::from(STEPS);
            for (k, state) in (0u32..).zip(states.iter()) {
                let charge_c = before_c + state.charge_c - load_a * dt * f64::from(k);
                let v = charge_c / capacitance_f + esr_ohm * (state.current_a - load_a);
                (lo, hi) = (lo.min(v), hi.max(v));
            }
            before_c += states[states.len() - 1].charge_c - load_a * share * self.seconds;
        }
        if self.duty + self.fall < 1.0 - 1e-9 {
            // At rest the bank alone carries the load, to the level where the period began.
            let v = |charge_c: f64| charge_c / capacitance_f - esr_ohm * load_a;
            (lo, hi) = (lo.min(v(before_c)).min(v(0.0)), hi.max(v(before_c)).max(v(0.0)));
        }
        hi - lo
    }

    /// Peak to peak of the voltage that the mean input current less that of the high switch makes on an input bank, V.
    pub fn input_ripple_v(&self, capacitance_f: f64, esr_ohm: f64) -> f64 {
        let source_a = self.ends()[0].charge_c / self.seconds;
        let dt = self.duty * self.seconds / f64::from(STEPS);
        let (mut lo, mut hi) = (f64::INFINITY, f64::NEG_INFINITY);
        for (k, state) in (0u32..).zip(self.on.iter()) {
            let charge_c = source_a * dt * f64::from(k) - state.charge_c;
            let v = charge_c / capacitance_f + esr_ohm * (source_a - state.current_a);
            (lo, hi) = (lo.min(v), hi.max(v));
        }
        let closed_c = source_a * self.duty * self.seconds - self.ends()[0].charge_c;
        for charge_c in [closed_c, 0.0] {
            let v = charge_c / capacitance_f + esr_ohm * source_a;
            (lo, hi) = (lo.min(v), hi.max(v));
        }
        hi - lo
    }
}
