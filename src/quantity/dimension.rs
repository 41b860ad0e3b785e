//! Which dimensions exist, and the units they are written in.

/// What a number measures.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Dimension {
    /// Electric potential, V.
    Voltage,
    /// Electric current, A.
    Current,
    /// Resistance, Ω.
    Resistance,
    /// Electric charge, C.
    Charge,
    /// Capacitance, F.
    Capacitance,
    /// Inductance, H.
    Inductance,
    /// Frequency, Hz.
    Frequency,
    /// Time, s.
    Time,
    /// Power, W.
    Power,
    /// Absolute temperature, °C.
    Temperature,
    /// Temperature difference, K.
    TemperatureDifference,
    /// Thermal resistance, K/W.
    ThermalResistance,
    /// Change of a voltage with temperature, V/K.
    VoltageSlope,
    /// Length, m.
    Length,
    /// Area, m²; the core keeps it in mm².
    Area,
    /// A share, ratio or efficiency, without a unit or in %.
    Ratio,
    /// A plain number: money, an exponent, a count.
    Plain,
}

/// One spelling of a unit with its prefix: how many powers of ten lie between it and the SI base unit.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Unit {
    /// What it measures.
    pub dimension: Dimension,
    /// Value in SI base units = number × 10^`exponent`.
    pub exponent: i32,
}
