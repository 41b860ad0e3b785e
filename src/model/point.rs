//! A stage without its banks at one point: currents, losses and temperatures solved together.

use super::conditions::Conditions;
use super::current::{self, Circuit, Currents, Drop, Dropout};
use super::high_switch::{self, GateDrive, Node, Underdriven};
use super::losses::{HighSwitchLosses, InductorLosses, Losses, RectifierLosses};
use super::thermal::{self, DiodeHeat};
use super::{drive, inductor, rectifier};
use crate::part::choke::COPPER_PER_K;
use crate::part::{Choke, DiodeBank, SwitchBank};

/// The rectifier of a stage.
#[derive(Debug, Clone, Copy)]
pub enum RectifierBank<'a> {
    /// Transistors.
    Switch(&'a SwitchBank),
    /// Diodes.
    Diode(&'a DiodeBank),
}

/// A stage without its banks, which take no part in currents and temperatures.
#[derive(Debug, Clone, Copy)]
pub struct Core<'a> {
    /// Points and drive.
    pub conditions: &'a Conditions,
    /// Switching frequency, Hz.
    pub frequency_hz: f64,
    /// High switch.
    pub high: &'a SwitchBank,
    /// Rectifier.
    pub rectifier: RectifierBank<'a>,
    /// Inductor at that frequency.
    pub choke: &'a Choke,
}

/// Which parts of the spread are taken.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Variant {
    /// Greatest on-resistance and winding resistance where the catalogs give them.
    pub worst: bool,
    /// Multiplies the inductance.
    pub inductance_factor: f64,
}

impl Variant {
    /// Typical parts.
    pub const TYPICAL: Self = Self { worst: false, inductance_factor: 1.0 };
    /// Greatest resistances.
    pub const WORST: Self = Self { worst: true, inductance_factor: 1.0 };

    /// Typical parts at the low end of the inductance tolerance.
    pub fn low_inductance(choke: &Choke) -> Self {
        Self { worst: false, inductance_factor: 1.0 - choke.tolerance }
    }
}

/// Temperatures, °C.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Heat {
    /// Junction of the high switch.
    pub high_c: f64,
    /// Junction of the rectifier.
    pub rectifier_c: f64,
    /// Winding.
    pub winding_c: f64,
}

/// A running stage at one point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Operation {
    /// Currents.
    pub currents: Currents,
    /// Losses; those of the banks are 0.
    pub losses: Losses,
    /// Temperatures.
    pub heat: Heat,
}

/// What comes of a point.
#[derive(Debug, Clone, Copy, PartialEq)]
#[expect(
    clippy::large_enum_variant,
    reason = "the large variant is the usual one, and boxing it would allocate a stage"
)]
pub enum Outcome {
    /// It runs.
    Running(Operation),
    /// The input is too low for the output, already at ambient.
    Dropout,
    /// No stable temperature up to [`thermal::HIGHEST_C`].
    Runaway,
    /// The gate supply does not switch a part.
    Underdriven(Underdriven),
}

/// Temperatures that move less than this between two steps have settled, K; the model asks for 1e-9.
const SETTLED_K: f64 = 1e-10;
/// Steps of the direct iteration before the damped one takes over.
const DIRECT_STEPS: u32 = 40;
/// Steps of the damped iteration: halving a gap of 500 K down to the resolution takes 60.
const DAMPED_STEPS: u32 = 400;
/// Steps of the creeping iteration: enough for a loop gain of 0.99.
const CREEPING_STEPS: u32 = 4_000;
/// How far a part moves up in a half step at the most, K.
const CLIMB_K: f64 = 40.0;

/// The model at one point: the lowest fixed point at or above ambient.
///
/// At given currents every part's temperature has a closed form (or a safe Newton search), so only the weak feedback of
/// temperature on duty and ripple is iterated. Where that does not settle at once, near runaway or on the edge between two modes,
/// a damped iteration from ambient decides.
pub fn solve(core: &Core, input: usize, load: usize, variant: Variant) -> Outcome {
    if let Some(why) = unspecified(core) {
        return Outcome::Underdriven(why);
    }
    let place = Place::new(core, input, load, variant);
    let ambient_c = core.conditions.ambient_c;
    let mut heat = Heat { high_c: ambient_c, rectifier_c: ambient_c, winding_c: ambient_c };
    for step in 0..DIRECT_STEPS {
        let flow = match place.flow(&heat) {
            Ok(flow) => flow,
            Err(Stop::Underdriven(why)) => return Outcome::Underdriven(why),
            Err(Stop::Dropout) if step == 0 => return Outcome::Dropout,
            Err(Stop::Dropout) => break,
        };
        let Some(next) = flow.settled(ambient_c) else { break };
        let moved_k = distance_k(&heat, &next);
        heat = next;
        if moved_k <= SETTLED_K {
            return Outcome::Running(flow.operation(&heat));
        }
    }
    damped(&place, ambient_c)
}

/// A switch without an on-resistance at the gate supply.
fn unspecified(core: &Core) -> Option<Underdriven> {
    let gate_v = core.conditions.gate_v;
    let rectifier_v = match core.rectifier {
        RectifierBank::Switch(bank) => bank.lowest_gate_v,
        RectifierBank::Diode(_) => 0.0,
    };
    let needed_v = core.high.lowest_gate_v.max(rectifier_v);
    (gate_v < needed_v * (1.0 - GATE_CLOSE)).then_some(Underdriven { gate_v, needed_v })
}

/// A gate supply this near below a given gate voltage meets it: limits hold within 1e-9.
const GATE_CLOSE: f64 = 1e-9;

/// The same by half steps to where each part settles at the present currents. They do not arrive where a part settles nowhere at
/// some of the currents on the way; what is left is decided by creeping.
fn damped(place: &Place, ambient_c: f64) -> Outcome {
    let towards = |flow: &Flow, heat: &Heat| {
        let warmed = flow.warmed(heat, ambient_c);
        let [high, rectifier, winding] = flow.targets(ambient_c);
        Heat {
            high_c: high.unwrap_or(warmed.high_c),
            rectifier_c: rectifier.unwrap_or(warmed.rectifier_c),
            winding_c: winding.unwrap_or(warmed.winding_c),
        }
    };
    let (outcome, decided) = approach(place, ambient_c, DAMPED_STEPS, towards);
    if decided { outcome } else { creeping(place, ambient_c) }
}

/// The same by half of what the present heat would warm each part by: below the lowest fixed point it is never leapt over.
///
/// A point that does not settle even so lies on the edge between two modes, which a stage there takes by turns: it stays where
/// the steps end.
fn creeping(place: &Place, ambient_c: f64) -> Outcome {
    approach(place, ambient_c, CREEPING_STEPS, |flow, heat| flow.warmed(heat, ambient_c)).0
}

/// Half steps from ambient towards what `towards` says, none above [`CLIMB_K`]: where they end, and whether that decides.
fn approach(place: &Place, ambient_c: f64, steps: u32, towards: impl Fn(&Flow, &Heat) -> Heat) -> (Outcome, bool) {
    let mut heat = Heat { high_c: ambient_c, rectifier_c: ambient_c, winding_c: ambient_c };
    let mut last = Outcome::Runaway;
    for _ in 0..steps {
        let flow = match place.flow(&heat) {
            Ok(flow) => flow,
            Err(Stop::Underdriven(why)) => return (Outcome::Underdriven(why), true),
            Err(Stop::Dropout) => return (Outcome::Runaway, true),
        };
        let target = towards(&flow, &heat);
        let step = |now: f64, target: f64| now + ((target - now) / 2.0).min(CLIMB_K);
        let next = Heat {
            high_c: step(heat.high_c, target.high_c),
            rectifier_c: step(heat.rectifier_c, target.rectifier_c),
            winding_c: step(heat.winding_c, target.winding_c),
        };
        // Figures beyond all measure make heat that is no number: that leads to no temperature either.
        let lost = target.high_c.is_nan() || target.rectifier_c.is_nan() || target.winding_c.is_nan();
        if lost || next.high_c.max(next.rectifier_c).max(next.winding_c) > thermal::HIGHEST_C {
            return (Outcome::Runaway, true);
        }
        let moved_k = distance_k(&heat, &next);
        heat = next;
        last = Outcome::Running(flow.operation(&heat));
        if moved_k <= SETTLED_K / 2.0 {
            return (last, true);
        }
    }
    (last, false)
}

fn distance_k(a: &Heat, b: &Heat) -> f64 {
    (a.high_c - b.high_c).abs().max((a.rectifier_c - b.rectifier_c).abs()).max((a.winding_c - b.winding_c).abs())
}

enum Stop {
    Dropout,
    Underdriven(Underdriven),
}

impl From<Dropout> for Stop {
    fn from(_: Dropout) -> Self {
        Self::Dropout
    }
}

/// One point of one stage: all that does not change with temperature.
struct Place<'a> {
    core: &'a Core<'a>,
    circuit: Circuit,
    drive: GateDrive,
    node: Node,
    supply_v: f64,
    high25_ohm: f64,
    rectifier25_ohm: f64,
    dcr25_ohm: f64,
    rac25_ohm: f64,
}

/// Currents at given temperatures, and the heat they make.
struct Flow<'a> {
    place: &'a Place<'a>,
    currents: Currents,
    switching_w: [f64; 3],
    high25_w: f64,
    rectifier25_w: f64,
    dead_time_w: f64,
    winding25_w: [f64; 2],
    core_w: f64,
}

impl<'a> Place<'a> {
    fn new(core: &'a Core<'a>, input: usize, load: usize, variant: Variant) -> Self {
        let conditions = core.conditions;
        let input_v = conditions.inputs_v[input];
        let (high, choke) = (core.high, core.choke);
        let pick = |typical: f64, worst: f64| if variant.worst { worst } else { typical };
        let (rectifier25_ohm, dead_share, body_drop_v, at_input_c, at_swing_c, recovery_c) = match core.rectifier {
            RectifierBank::Switch(bank) => (
                pick(bank.r25_ohm, bank.worst_r25_ohm),
                2.0 * conditions.dead_time_s * core.frequency_hz,
                bank.body_drop_v,
                bank.charge_at_input_c[input],
                bank.charge_at_swing_c[input],
                bank.recovery_c,
            ),
            RectifierBank::Diode(bank) => {
                (0.0, 0.0, 0.0, bank.charge_at_input_c[input], bank.charge_at_swing_c[input], bank.recovery_c)
            }
        };
        Self {
            core,
            circuit: Circuit {
                input_v,
                output_v: conditions.output_v,
                load_a: conditions.loads[load].current_a,
                frequency_hz: core.frequency_hz,
                inductance_h: choke.inductance_h[load] * variant.inductance_factor,
                high_ohm: 0.0,
                winding_ohm: 0.0,
                dead_share,
                body_drop_v,
            },
            drive: GateDrive {
                gate_v: conditions.gate_v,
                pull_up_ohm: conditions.pull_up_ohm,
                pull_down_ohm: conditions.pull_down_ohm,
            },
            node: Node {
                input_v,
                swing_v: input_v - conditions.output_v,
                own_at_input_c: high.charge_at_input_c[input],
                rectifier_at_input_c: at_input_c,
                own_at_swing_c: high.charge_at_swing_c[input],
                rectifier_at_swing_c: at_swing_c,
                recovery_c,
            },
            supply_v: conditions.supply_v(input_v),
            high25_ohm: pick(high.r25_ohm, high.worst_r25_ohm),
            rectifier25_ohm,
            dcr25_ohm: pick(choke.dcr25_ohm, choke.worst_dcr25_ohm),
            rac25_ohm: pick(choke.rac25_ohm, choke.worst_rac25_ohm),
        }
    }

    /// The rectifier's drop at its present temperature and a bank current.
    fn drop_at(&self, rectifier_c: f64, current_a: f64) -> Drop {
        match self.core.rectifier {
            RectifierBank::Switch(bank) => {
                Drop { threshold_v: 0.0, resistance_ohm: bank.resistance_ohm(self.rectifier25_ohm, rectifier_c) }
            }
            RectifierBank::Diode(bank) => {
                let span = bank.forward_at(current_a);
                Drop {
                    threshold_v: span.threshold_v + bank.slope_v_per_k * (rectifier_c - 25.0),
                    resistance_ohm: span.resistance_ohm,
                }
            }
        }
    }

    fn currents(&self, heat: &Heat) -> Result<(Currents, Drop), Dropout> {
        let circuit = Circuit {
            high_ohm: self.core.high.resistance_ohm(self.high25_ohm, heat.high_c),
            winding_ohm: Choke::hot_ohm(self.dcr25_ohm, heat.winding_c),
            ..self.circuit
        };
        let drop = self.drop_at(heat.rectifier_c, circuit.load_a);
        let currents = current::continuous(&circuit, drop);
        let forced = self.core.conditions.forced && matches!(self.core.rectifier, RectifierBank::Switch(_));
        if forced || circuit.load_a >= currents.ripple_a / 2.0 {
            return Ok((currents.running(circuit.dead_share)?, drop));
        }
        let drop_at = |current_a: f64| self.drop_at(heat.rectifier_c, current_a);
        let peak_a = current::discontinuous_peak_a(&circuit, drop_at)?;
        let drop = drop_at(peak_a / 2.0);
        Ok((current::discontinuous(&circuit, drop, peak_a)?, drop))
    }

    fn flow(&self, heat: &Heat) -> Result<Flow<'_>, Stop> {
        let (currents, drop) = self.currents(heat)?;
        let frequency_hz = self.core.frequency_hz;
        let switching_w = high_switch::switching_w(
            self.core.high,
            &self.drive,
            &self.node,
            &currents,
            self.circuit.inductance_h,
            frequency_hz,
        )
        .map_err(Stop::Underdriven)?;
        let (rectifier25_w, dead_time_w) = match self.core.rectifier {
            RectifierBank::Switch(bank) => (
                self.rectifier25_ohm * currents.rectifier_a2,
                rectifier::dead_time_w(bank, &currents, self.core.conditions.dead_time_s, frequency_hz),
            ),
            RectifierBank::Diode(bank) => {
                let threshold25_v = drop.threshold_v - bank.slope_v_per_k * (heat.rectifier_c - 25.0);
                (rectifier::diode_conduction_w(threshold25_v, drop.resistance_ohm, &currents), 0.0)
            }
        };
        Ok(Flow {
            place: self,
            currents,
            switching_w,
            high25_w: self.high25_ohm * currents.high_a2,
            rectifier25_w,
            dead_time_w,
            winding25_w: inductor::winding_w(self.dcr25_ohm, self.rac25_ohm, self.circuit.load_a, &currents),
            core_w: inductor::core_w(self.core.choke, &currents),
        })
    }
}

impl Flow<'_> {
    /// Where each part's temperature settles at these currents; `None` where it does not.
    fn targets(&self, ambient_c: f64) -> [Option<f64>; 3] {
        let core = self.place.core;
        let high = thermal::linear_c(
            ambient_c,
            core.high.thermal_k_per_w,
            self.switching_w.iter().sum(),
            self.high25_w,
            core.high.coefficient_per_k,
        );
        let rectifier = match core.rectifier {
            RectifierBank::Switch(bank) => thermal::linear_c(
                ambient_c,
                bank.thermal_k_per_w,
                self.dead_time_w,
                self.rectifier25_w,
                bank.coefficient_per_k,
            ),
            RectifierBank::Diode(bank) => DiodeHeat {
                diode: bank,
                forward25_w: self.rectifier25_w,
                mean_a: self.currents.rectifier_mean_a,
                reverse_v: self.place.circuit.input_v * self.currents.duty,
            }
            .fixed_point_c(ambient_c),
        };
        let winding = thermal::linear_c(
            ambient_c,
            core.choke.thermal_k_per_w,
            self.core_w,
            self.winding25_w[0] + self.winding25_w[1],
            COPPER_PER_K,
        );
        [high, rectifier, winding]
    }

    fn settled(&self, ambient_c: f64) -> Option<Heat> {
        let [high_c, rectifier_c, winding_c] = self.targets(ambient_c);
        Some(Heat { high_c: high_c?, rectifier_c: rectifier_c?, winding_c: winding_c? })
    }

    /// Ambient and what each part's heat at `heat` would warm it by.
    fn warmed(&self, heat: &Heat, ambient_c: f64) -> Heat {
        let core = self.place.core;
        let Operation { losses, .. } = self.operation(heat);
        let rectifier_k_per_w = match core.rectifier {
            RectifierBank::Switch(bank) => bank.thermal_k_per_w,
            RectifierBank::Diode(bank) => bank.thermal_k_per_w,
        };
        Heat {
            high_c: ambient_c + core.high.thermal_k_per_w * losses.high_switch.total_w(),
            rectifier_c: ambient_c + rectifier_k_per_w * losses.rectifier.total_w(),
            winding_c: ambient_c + core.choke.thermal_k_per_w * losses.inductor.total_w(),
        }
    }

    fn operation(&self, heat: &Heat) -> Operation {
        let core = self.place.core;
        let [overlap, output_charge, recovery] = self.switching_w;
        let rectifier = match core.rectifier {
            RectifierBank::Switch(bank) => RectifierLosses {
                conduction: thermal::rising_w(self.rectifier25_w, bank.coefficient_per_k, heat.rectifier_c),
                dead_time: self.dead_time_w,
                leakage: 0.0,
            },
            RectifierBank::Diode(bank) => RectifierLosses {
                conduction: self.rectifier25_w
                    + self.currents.rectifier_mean_a * bank.slope_v_per_k * (heat.rectifier_c - 25.0),
                dead_time: 0.0,
                leakage: rectifier::leakage_w(
                    self.place.circuit.input_v,
                    bank.leakage_at_a(heat.rectifier_c),
                    self.currents.duty,
                ),
            },
        };
        let switch_rectifier = match core.rectifier {
            RectifierBank::Switch(bank) => Some(bank),
            RectifierBank::Diode(_) => None,
        };
        let losses = Losses {
            high_switch: HighSwitchLosses {
                conduction: thermal::rising_w(self.high25_w, core.high.coefficient_per_k, heat.high_c),
                overlap,
                output_charge,
                recovery,
            },
            rectifier,
            inductor: InductorLosses {
                winding_dc: thermal::rising_w(self.winding25_w[0], COPPER_PER_K, heat.winding_c),
                winding_ac: thermal::rising_w(self.winding25_w[1], COPPER_PER_K, heat.winding_c),
                core: self.core_w,
            },
            drive: drive::drive_w(
                core.high,
                switch_rectifier,
                core.conditions.bias_a,
                self.place.supply_v,
                core.frequency_hz,
            ),
            ..Losses::default()
        };
        Operation { currents: self.currents, losses, heat: *heat }
    }
}
