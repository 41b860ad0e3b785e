//! Everything that can refuse a stage.

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

/// Which side of its bound a value must keep to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Side {
    /// value ≤ bound.
    Upper,
    /// value ≥ bound.
    Lower,
}
