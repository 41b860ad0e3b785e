//! The names of the limits.

use serde::Serialize;

/// The name of a limit.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum LimitName {
    /// Drain or reverse voltage.
    Voltage,
    /// Gate supply within what the switch is specified for, and above its plateau.
    GateVoltage,
    /// Both switches off before the other one turns on.
    DeadTime,
    /// Current of the gate supply.
    DriveCurrent,
    /// The input reaches the output at all.
    Dropout,
    /// A stable temperature exists.
    Runaway,
    /// Junction temperature.
    Junction,
    /// Winding temperature.
    Winding,
    /// Peak current and saturation.
    Saturation,
    /// Peak current of a switch.
    SwitchCurrent,
    /// Mean current of a diode.
    RectifierCurrent,
    /// Bias of a capacitor.
    CapacitorVoltage,
    /// Ripple current of a capacitor.
    CapacitorCurrent,
    /// Output ripple.
    OutputRipple,
    /// Input ripple.
    InputRipple,
    /// Deviation after a load step.
    LoadStep,
    /// Window on the inductor ripple.
    RippleRatio,
    /// Shortest on-time.
    MinimumOn,
    /// Shortest off-time.
    MinimumOff,
    /// Sum of part areas.
    Area,
    /// Tallest part.
    Height,
    /// Sum of part costs.
    Cost,
    /// Weighted efficiency.
    Efficiency,
    /// Area needed but unknown.
    MissingArea,
    /// Height needed but unknown.
    MissingHeight,
    /// Cost needed but unknown.
    MissingCost,
    /// Silicon diode without a recovery charge.
    MissingRecoveryCharge,
}

impl LimitName {
    /// Every limit, in the order in which they are listed.
    pub const ALL: [Self; 27] = [
        Self::Voltage,
        Self::GateVoltage,
        Self::DeadTime,
        Self::DriveCurrent,
        Self::Dropout,
        Self::Runaway,
        Self::Junction,
        Self::Winding,
        Self::Saturation,
        Self::SwitchCurrent,
        Self::RectifierCurrent,
        Self::CapacitorVoltage,
        Self::CapacitorCurrent,
        Self::OutputRipple,
        Self::InputRipple,
        Self::LoadStep,
        Self::RippleRatio,
        Self::MinimumOn,
        Self::MinimumOff,
        Self::Area,
        Self::Height,
        Self::Cost,
        Self::Efficiency,
        Self::MissingArea,
        Self::MissingHeight,
        Self::MissingCost,
        Self::MissingRecoveryCharge,
    ];

    /// The name in files and on screens.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Voltage => "voltage",
            Self::GateVoltage => "gate_voltage",
            Self::DeadTime => "dead_time",
            Self::DriveCurrent => "drive_current",
            Self::Dropout => "dropout",
            Self::Runaway => "runaway",
            Self::Junction => "junction",
            Self::Winding => "winding",
            Self::Saturation => "saturation",
            Self::SwitchCurrent => "switch_current",
            Self::RectifierCurrent => "rectifier_current",
            Self::CapacitorVoltage => "capacitor_voltage",
            Self::CapacitorCurrent => "capacitor_current",
            Self::OutputRipple => "output_ripple",
            Self::InputRipple => "input_ripple",
            Self::LoadStep => "load_step",
            Self::RippleRatio => "ripple_ratio",
            Self::MinimumOn => "minimum_on",
            Self::MinimumOff => "minimum_off",
            Self::Area => "area",
            Self::Height => "height",
            Self::Cost => "cost",
            Self::Efficiency => "efficiency",
            Self::MissingArea => "missing_area",
            Self::MissingHeight => "missing_height",
            Self::MissingCost => "missing_cost",
            Self::MissingRecoveryCharge => "missing_recovery_charge",
        }
    }

    /// Whether the limit compares a value with a bound that could be moved, rather than saying that something is missing or
    /// cannot work at all.
    pub const fn can_give(self) -> bool {
        !matches!(
            self,
            Self::Dropout
                | Self::Runaway
                | Self::MissingArea
                | Self::MissingHeight
                | Self::MissingCost
                | Self::MissingRecoveryCharge
        )
    }

    /// SI unit of the compared values on screens and in files; empty for a pure number.
    pub const fn unit(self) -> &'static str {
        match self {
            Self::Voltage
            | Self::GateVoltage
            | Self::CapacitorVoltage
            | Self::OutputRipple
            | Self::InputRipple
            | Self::LoadStep => "V",
            Self::DeadTime | Self::MinimumOn | Self::MinimumOff => "s",
            Self::DriveCurrent
            | Self::Saturation
            | Self::SwitchCurrent
            | Self::RectifierCurrent
            | Self::CapacitorCurrent => "A",
            Self::Junction | Self::Winding => "°C",
            Self::Area => "mm²",
            Self::Height => "m",
            _ => "",
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_are_those_of_the_files() {
        for limit in LimitName::ALL {
            assert_eq!(serde_json::to_string(&limit).expect("a name"), format!("\"{}\"", limit.name()));
        }
    }
}
