//! What an account holds.

use serde::Serialize;

use crate::limit::LimitName;
use crate::model::Conduction;
pub use crate::model::losses::{BankLosses, DriveLosses, HighSwitchLosses, InductorLosses, Losses, RectifierLosses};
use crate::stage::NamedStage;

/// Rms currents, A; the rectifier's is that of its channel.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct RmsCurrents {
    /// High switch.
    pub high_switch: f64,
    /// Rectifier.
    pub rectifier: f64,
    /// Inductor.
    pub inductor: f64,
    /// Input bank.
    pub input_bank: f64,
    /// Output bank.
    pub output_bank: f64,
}

/// Temperatures, °C.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct Temperatures {
    /// Junction of the high switch.
    pub high_switch: f64,
    /// Junction of the rectifier.
    pub rectifier: f64,
    /// Winding.
    pub inductor: f64,
}

/// How the stage conducts at a point, or why it has no numbers there.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Mode {
    /// The inductor current never rests at zero.
    Continuous,
    /// It rests at zero in each period.
    Discontinuous,
    /// The input is too low for the output.
    Dropout,
    /// No stable temperature up to 500 °C.
    Runaway,
    /// The gate supply does not reach the plateau of the current to be switched.
    Underdriven,
}

impl From<Conduction> for Mode {
    fn from(conduction: Conduction) -> Self {
        match conduction {
            Conduction::Continuous => Self::Continuous,
            Conduction::Discontinuous => Self::Discontinuous,
        }
    }
}

/// The numbers of a point at which the stage runs.
#[derive(Debug, Clone, Copy, Default, PartialEq)]
pub struct Reading {
    /// On-time of the high switch / period.
    pub duty: f64,
    /// Inductor ripple, A peak to peak.
    pub ripple_a: f64,
    /// Greatest inductor current, A.
    pub peak_a: f64,
    /// Least inductor current, A; below zero where the current reverses.
    pub valley_a: f64,
    /// Output ripple with nominal parts, V peak to peak.
    pub output_ripple_v: f64,
    /// Input ripple with nominal parts, V peak to peak.
    pub input_ripple_v: f64,
    /// Sum of all losses, W.
    pub loss_w: f64,
    /// Output power / input power.
    pub efficiency: f64,
    /// Losses by cause.
    pub losses_w: Losses,
    /// Rms currents.
    pub rms_a: RmsCurrents,
    /// Temperatures.
    pub temperature_c: Temperatures,
}

/// One operating point of a stage.
#[derive(Debug, Clone, PartialEq)]
pub struct PointAccount {
    /// Input voltage, V.
    pub input_v: f64,
    /// Load current, A.
    pub load_a: f64,
    /// Ambient, °C.
    pub ambient_c: f64,
    /// Weight in the burden; 0 off typical input and for a load without a share.
    pub share: f64,
    /// Mode.
    pub mode: Mode,
    /// The numbers; `None` where the mode has none.
    pub reading: Option<Reading>,
}

/// One limit, at its worst point.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct LimitRow {
    /// Which limit.
    pub limit: LimitName,
    /// [`Slot`](crate::part::Slot) name.
    pub slot: &'static str,
    /// Part name; empty where the limit is not of one part.
    pub part: String,
    /// What the stage has; `None` where it cannot be computed.
    pub value: Option<f64>,
    /// What it must keep to.
    pub bound: Option<f64>,
    /// Distance to the bound relative to it, negative where broken.
    pub margin: Option<f64>,
    /// Index of the worst point; `None` where the limit is not of a point.
    pub point: Option<usize>,
    /// Whether the limit holds.
    pub holds: bool,
}

/// A default that the figures rest on.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct AssumedRow {
    /// [`Slot`](crate::part::Slot) name.
    pub slot: &'static str,
    /// Part name.
    pub part: String,
    /// Missing catalog quantity.
    pub quantity: &'static str,
    /// Value taken; `None` where the missing value switches a check off.
    pub value: Option<f64>,
    /// SI unit of the value.
    pub unit: &'static str,
    /// The rule behind it.
    pub why: &'static str,
}

/// Every watt of one stage.
#[derive(Debug, Clone, PartialEq)]
pub struct Account {
    /// Name of the rail.
    pub rail: String,
    /// The stage.
    pub stage: NamedStage,
    /// The figure that is minimised; `None` where a weighted point has no numbers, or a needed cost or area is unknown.
    pub burden: Option<f64>,
    /// Sum of part costs; `None` where one is unknown.
    pub cost: Option<f64>,
    /// Sum of part areas, mm²; `None` where one is unknown.
    pub area_mm2: Option<f64>,
    /// Σ share·loss, W.
    pub weighted_loss_w: Option<f64>,
    /// Σ share·Pout / Σ share·Pin.
    pub weighted_efficiency: Option<f64>,
    /// Weighted loss that falls as on-resistance falls, W.
    pub resistance_w: Option<f64>,
    /// Weighted loss that grows with charge, W.
    pub charge_w: Option<f64>,
    /// Every corner: inputs ascending, then loads ascending.
    pub points: Vec<PointAccount>,
    /// One row a limit and slot, broken ones first.
    pub limits: Vec<LimitRow>,
    /// Defaults taken.
    pub assumed: Vec<AssumedRow>,
}

impl Account {
    /// Whether every limit holds.
    pub fn passes(&self) -> bool {
        self.limits.iter().all(|row| row.holds)
    }
}
