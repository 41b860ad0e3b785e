//! A default that stands in for a value the catalog does not give.

/// The place of a part in a stage, or the thing a limit is about.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Slot {
    /// The switch between input and inductor.
    HighSwitch,
    /// The switch or diode that carries the inductor current while the high switch is off.
    Rectifier,
    /// The inductor.
    Inductor,
    /// The capacitors across the input.
    InputBank,
    /// The capacitors across the output.
    OutputBank,
    /// The gate supply.
    Drive,
    /// The stage as a whole.
    Stage,
}

impl Slot {
    /// The name in files and on screens.
    pub const fn name(self) -> &'static str {
        match self {
            Self::HighSwitch => "high_switch",
            Self::Rectifier => "rectifier",
            Self::Inductor => "inductor",
            Self::InputBank => "input_bank",
            Self::OutputBank => "output_bank",
            Self::Drive => "drive",
            Self::Stage => "stage",
        }
    }
}

/// One default, carried to the account: unknown is not zero.
#[derive(Debug, Clone, PartialEq)]
pub struct Assumed {
    /// Where the part sits.
    pub slot: Slot,
    /// The part whose value is missing.
    pub part: String,
    /// The catalog quantity that is missing.
    pub quantity: &'static str,
    /// The value taken, in `unit`; `None` where the missing value switches a check off.
    pub value: Option<f64>,
    /// SI unit of `value`; empty for a pure number.
    pub unit: &'static str,
    /// The rule behind the value.
    pub why: &'static str,
}
