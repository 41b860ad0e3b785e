//! One combination: a frequency, five parts and their counts.

use serde::{Deserialize, Serialize};

use crate::part::Parts;

/// What kind of rectifier a stage has.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum RectifierKind {
    /// A transistor that is switched on while it conducts.
    Switch,
    /// A diode.
    Diode,
}

impl RectifierKind {
    /// The name in files and on screens.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Switch => "switch",
            Self::Diode => "diode",
        }
    }
}

/// So many equal parts in parallel: an index into its catalog, and a count from 1.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Choice {
    /// Index into the catalog's parts.
    pub index: usize,
    /// How many in parallel.
    pub count: u32,
}

/// A stage by reference to the parts it was built from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Stage {
    /// Switching frequency, Hz.
    pub frequency_hz: f64,
    /// Index and count among the switches.
    pub high_switch: Choice,
    /// Which catalog the rectifier is from.
    pub rectifier_kind: RectifierKind,
    /// Index and count among the switches or the diodes.
    pub rectifier: Choice,
    /// Index among the inductors; its count is 1.
    pub inductor: usize,
    /// Index and count among the capacitors.
    pub input_bank: Choice,
    /// Index and count among the capacitors.
    pub output_bank: Choice,
}

/// So many equal parts in parallel, by name.
#[derive(Debug, Clone, PartialEq, Eq, Hash, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct NamedChoice {
    /// Part name.
    pub part: String,
    /// How many in parallel.
    pub count: u32,
}

/// A rectifier by name.
#[derive(Debug, Clone, PartialEq, Eq, Hash, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct NamedRectifier {
    /// Which catalog it is from.
    pub kind: RectifierKind,
    /// Part name.
    pub part: String,
    /// How many in parallel.
    pub count: u32,
}

/// A stage by the names of its parts: how it is written in files.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct NamedStage {
    /// Switching frequency, Hz.
    pub frequency_hz: f64,
    /// High switch.
    pub high_switch: NamedChoice,
    /// Rectifier.
    pub rectifier: NamedRectifier,
    /// Inductor; its count is 1.
    pub inductor: NamedChoice,
    /// Input bank.
    pub input_bank: NamedChoice,
    /// Output bank.
    pub output_bank: NamedChoice,
}

impl Stage {
    /// The same stage by name.
    pub fn named(&self, parts: &Parts) -> NamedStage {
        let choice = |part: &str, count| NamedChoice { part: part.to_owned(), count };
        let rectifier = match self.rectifier_kind {
            RectifierKind::Switch => &parts.switches[self.rectifier.index].identity,
            RectifierKind::Diode => &parts.diodes[self.rectifier.index].identity,
        };
        let capacitor = |bank: Choice| choice(&parts.capacitors[bank.index].identity.part, bank.count);
        NamedStage {
            frequency_hz: self.frequency_hz,
            high_switch: choice(&parts.switches[self.high_switch.index].identity.part, self.high_switch.count),
            rectifier: NamedRectifier {
                kind: self.rectifier_kind,
                part: rectifier.part.clone(),
                count: self.rectifier.count,
            },
            inductor: choice(&parts.inductors[self.inductor].identity.part, 1),
            input_bank: capacitor(self.input_bank),
            output_bank: capacitor(self.output_bank),
        }
    }
}
