//! A part in a slot of a stage.

use crate::part::{Identity, Parts, Slot};
use crate::rail::Rail;
use crate::search::field::is_allowed;
use crate::stage::{RectifierKind, Stage};

/// A slot and the part that must fill it, by its place in its catalog.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Seat {
    /// A transistor as high switch.
    HighSwitch(usize),
    /// A transistor as rectifier.
    SwitchRectifier(usize),
    /// A diode as rectifier.
    DiodeRectifier(usize),
    /// An inductor.
    Inductor(usize),
    /// A capacitor across the input.
    InputBank(usize),
    /// A capacitor across the output.
    OutputBank(usize),
}

impl Seat {
    /// Every part in every slot that the rail's kinds of rectifier let it stand in, catalog by catalog.
    pub fn all(rail: &Rail, parts: &Parts) -> Vec<Self> {
        let range = &rail.range;
        let mut seats: Vec<Self> = (0..parts.switches.len()).map(Self::HighSwitch).collect();
        if range.switch_rectifier {
            seats.extend((0..parts.switches.len()).map(Self::SwitchRectifier));
        }
        if range.diode_rectifier {
            seats.extend((0..parts.diodes.len()).map(Self::DiodeRectifier));
        }
        seats.extend((0..parts.inductors.len()).map(Self::Inductor));
        seats.extend((0..parts.capacitors.len()).map(Self::InputBank));
        seats.extend((0..parts.capacitors.len()).map(Self::OutputBank));
        seats
    }

    /// The five seats of a stage.
    pub const fn of_stage(stage: &Stage) -> [Self; 5] {
        [
            Self::HighSwitch(stage.high_switch.index),
            match stage.rectifier_kind {
                RectifierKind::Switch => Self::SwitchRectifier(stage.rectifier.index),
                RectifierKind::Diode => Self::DiodeRectifier(stage.rectifier.index),
            },
            Self::Inductor(stage.inductor),
            Self::InputBank(stage.input_bank.index),
            Self::OutputBank(stage.output_bank.index),
        ]
    }

    /// The slot.
    pub const fn slot(self) -> Slot {
        match self {
            Self::HighSwitch(_) => Slot::HighSwitch,
            Self::SwitchRectifier(_) | Self::DiodeRectifier(_) => Slot::Rectifier,
            Self::Inductor(_) => Slot::Inductor,
            Self::InputBank(_) => Slot::InputBank,
            Self::OutputBank(_) => Slot::OutputBank,
        }
    }

    /// What identifies the part.
    pub fn identity(self, parts: &Parts) -> &Identity {
        match self {
            Self::HighSwitch(index) | Self::SwitchRectifier(index) => &parts.switches[index].identity,
            Self::DiodeRectifier(index) => &parts.diodes[index].identity,
            Self::Inductor(index) => &parts.inductors[index].identity,
            Self::InputBank(index) | Self::OutputBank(index) => &parts.capacitors[index].identity,
        }
    }

    /// Whether pins and bans let the part into the slot.
    pub fn is_allowed(self, rail: &Rail, parts: &Parts) -> bool {
        is_allowed(rail, self.slot(), self.identity(parts))
    }
}
