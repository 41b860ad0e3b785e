//! Losses by cause, W.

use serde::Serialize;

/// Losses of the high switch, W.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct HighSwitchLosses {
    /// On-resistance.
    pub conduction: f64,
    /// Voltage and current together in the channel at both edges.
    pub overlap: f64,
    /// Charging the switch node.
    pub output_charge: f64,
    /// Recovery of the rectifier.
    pub recovery: f64,
}

/// Losses of the rectifier, W.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct RectifierLosses {
    /// On-resistance or forward drop.
    pub conduction: f64,
    /// Body diode during dead time.
    pub dead_time: f64,
    /// Reverse leakage.
    pub leakage: f64,
}

/// Losses of the inductor, W.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct InductorLosses {
    /// Load current in the winding.
    pub winding_dc: f64,
    /// Ripple current in the winding.
    pub winding_ac: f64,
    /// Core.
    pub core: f64,
}

/// Losses of a bank, W.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct BankLosses {
    /// Equivalent series resistance.
    pub esr: f64,
}

/// Losses in the gate supply, W.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct DriveLosses {
    /// Gate charge of the high switch.
    pub high_gate: f64,
    /// Gate charge of a switch rectifier.
    pub rectifier_gate: f64,
    /// Controller.
    pub bias: f64,
}

/// Every loss of a stage at a point, W.
#[derive(Debug, Clone, Copy, Default, PartialEq, Serialize)]
pub struct Losses {
    /// High switch.
    pub high_switch: HighSwitchLosses,
    /// Rectifier.
    pub rectifier: RectifierLosses,
    /// Inductor.
    pub inductor: InductorLosses,
    /// Input bank.
    pub input_bank: BankLosses,
    /// Output bank.
    pub output_bank: BankLosses,
    /// Gates and controller.
    pub drive: DriveLosses,
}

impl HighSwitchLosses {
    /// The heat in the high switch, W.
    pub fn total_w(&self) -> f64 {
        self.conduction + self.overlap + self.output_charge + self.recovery
    }
}

impl RectifierLosses {
    /// The heat in the rectifier, W.
    pub fn total_w(&self) -> f64 {
        self.conduction + self.dead_time + self.leakage
    }
}

impl InductorLosses {
    /// The heat in the inductor, W.
    pub fn total_w(&self) -> f64 {
        self.winding_dc + self.winding_ac + self.core
    }
}

impl DriveLosses {
    /// The heat in gate supply, drivers and controller, W.
    pub fn total_w(&self) -> f64 {
        self.high_gate + self.rectifier_gate + self.bias
    }
}

impl Losses {
    /// Everything but the banks, W.
    pub fn core_w(&self) -> f64 {
        self.high_switch.total_w() + self.rectifier.total_w() + self.inductor.total_w() + self.drive.total_w()
    }

    /// All losses, W.
    pub fn total_w(&self) -> f64 {
        self.core_w() + self.input_bank.esr + self.output_bank.esr
    }
}
