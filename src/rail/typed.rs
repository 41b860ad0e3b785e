//! The typed rail: it cannot hold a value that its file could not.

use crate::part::{CapacitorKind, Slot};
use crate::quantity::{NonNegative, Positive};

/// Input voltages: least ≤ typical ≤ greatest, all above the output.
#[derive(Debug, Clone, PartialEq)]
pub struct Input {
    /// Least, V.
    pub minimum_v: Positive,
    /// Typical, V.
    pub typical_v: Positive,
    /// Greatest, V.
    pub maximum_v: Positive,
    /// Greatest ripple peak to peak, V; `None` for no limit.
    pub ripple_v: Option<Positive>,
    /// Transient that the parts must stand, V; below the greatest input it asks for nothing more.
    pub surge_v: Positive,
}

/// A load step and the deviation allowed for it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LoadStep {
    /// Change of the load, A.
    pub current_a: Positive,
    /// Greatest deviation of the output, V.
    pub deviation_v: Positive,
    /// Crossover frequency of the control loop, Hz; without it the floor that no controller can beat is taken.
    pub crossover_hz: Option<Positive>,
}

/// The output.
#[derive(Debug, Clone, PartialEq)]
pub struct Output {
    /// Voltage, V.
    pub voltage_v: Positive,
    /// Full load, A.
    pub current_a: Positive,
    /// Current limit or start-up load, A; below full load it asks for nothing more.
    pub peak_a: Positive,
    /// Greatest ripple peak to peak, V; `None` for no limit.
    pub ripple_v: Option<Positive>,
    /// Load step.
    pub step: Option<LoadStep>,
}

/// Where gate charge and controller bias come from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Supply {
    /// The input, through a linear regulator.
    Input,
    /// The output.
    Output,
    /// A converter of this efficiency, in (0, 1].
    Efficiency(Positive),
}

/// Gate drive and controller.
#[derive(Debug, Clone, PartialEq)]
pub struct Drive {
    /// Gate supply, V.
    pub voltage_v: Positive,
    /// Driver and external resistance while charging the gate, Ω.
    pub pull_up_ohm: Positive,
    /// The same while discharging, Ω.
    pub pull_down_ohm: Positive,
    /// Dead time at each edge, s.
    pub dead_time_s: NonNegative,
    /// Least on-time of the controller, s.
    pub minimum_on_s: NonNegative,
    /// Least off-time of the controller, s.
    pub minimum_off_s: NonNegative,
    /// Controller supply current, A.
    pub bias_a: NonNegative,
    /// Where it all comes from.
    pub supply: Supply,
    /// Greatest current of that supply, A.
    pub supply_limit_a: Option<Positive>,
}

/// What a switch rectifier does when the current reaches zero.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum LightLoad {
    /// It stays on: conduction is always continuous.
    Forced,
    /// It opens like a diode.
    Emulated,
}

/// Greatest counts of equal parts in parallel that are tried, from 1.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Parallel {
    /// High switches.
    pub high_switch: u32,
    /// Rectifiers.
    pub rectifier: u32,
    /// Input capacitors.
    pub input: u32,
    /// Output capacitors.
    pub output: u32,
}

/// The range of stages to cross.
#[derive(Debug, Clone, PartialEq)]
pub struct Range {
    /// Cross switch rectifiers.
    pub switch_rectifier: bool,
    /// Cross diode rectifiers.
    pub diode_rectifier: bool,
    /// Light-load behaviour of a switch rectifier.
    pub light_load: LightLoad,
    /// Switching frequencies, Hz, ascending and distinct, at least one.
    pub frequencies_hz: Vec<Positive>,
    /// Counts.
    pub parallel: Parallel,
    /// Least inductor ripple / full load at typical input.
    pub ripple_ratio_min: Option<Positive>,
    /// Greatest inductor ripple / full load at typical input.
    pub ripple_ratio_max: Option<Positive>,
}

/// One entry of the load profile.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Load {
    /// Current, A.
    pub current_a: Positive,
    /// Share of time, normalised: the shares of a rail sum to 1.
    pub share: Positive,
}

/// What a stage must hold.
#[derive(Debug, Clone, PartialEq)]
pub struct Limits {
    /// Kept below each part's own junction limit, K.
    pub junction_margin_k: NonNegative,
    /// Share of a voltage rating that may be used, in (0, 1].
    pub voltage_derating: Positive,
    /// Share of a diode's current rating that may be used, in (0, 1].
    pub current_derating: Positive,
    /// Switch-node overshoot, multiplies the highest input or the surge; at least 1.
    pub ringing: Positive,
    /// Saturation current over peak current, at least.
    pub saturation_margin: Positive,
    /// Greatest winding temperature, °C.
    pub winding_temperature_c: f64,
    /// Share of a ceramic capacitor's rating that may be used, in (0, 1].
    pub ceramic_derating: Positive,
    /// The same for polymer.
    pub polymer_derating: Positive,
    /// The same for electrolytic.
    pub electrolytic_derating: Positive,
    /// Greatest sum of part areas, mm².
    pub area_mm2: Option<Positive>,
    /// Greatest part height, m.
    pub height_m: Option<Positive>,
    /// Greatest sum of part costs.
    pub cost: Option<Positive>,
    /// Least weighted efficiency, in (0, 1).
    pub efficiency: Option<Positive>,
}

impl Limits {
    /// The voltage derating of a capacitor kind.
    pub fn capacitor_derating(&self, kind: CapacitorKind) -> f64 {
        match kind {
            CapacitorKind::Ceramic => self.ceramic_derating,
            CapacitorKind::Polymer => self.polymer_derating,
            CapacitorKind::Electrolytic => self.electrolytic_derating,
        }
        .get()
    }
}

/// What a watt, a square millimetre and a unit of cost are worth to the user.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Worth {
    /// Per watt of weighted loss.
    pub loss: NonNegative,
    /// Per mm².
    pub area: NonNegative,
    /// Multiplies part cost.
    pub cost: NonNegative,
}

/// A part that must never be used.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Ban {
    /// By part name, whatever its catalog.
    Part(String),
    /// By maker.
    Maker(String),
}

/// The only parts allowed in a slot.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Pin {
    /// The slot: one of the five parts of a stage.
    pub slot: Slot,
    /// Part names; any of them will do.
    pub parts: Vec<String>,
}

/// The supply to be built.
#[derive(Debug, Clone, PartialEq)]
pub struct Rail {
    /// What the user calls it.
    pub name: String,
    /// Input.
    pub input: Input,
    /// Output.
    pub output: Output,
    /// Still air at the board, °C.
    pub ambient_c: f64,
    /// Gate drive and controller.
    pub drive: Drive,
    /// What to cross.
    pub range: Range,
    /// Load profile, ascending and distinct in current, at least one.
    pub loads: Vec<Load>,
    /// Limits.
    pub limits: Limits,
    /// Exchange rates.
    pub worth: Worth,
    /// Pins, at most one a slot.
    pub pins: Vec<Pin>,
    /// Bans.
    pub bans: Vec<Ban>,
}
