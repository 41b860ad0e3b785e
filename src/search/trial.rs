//! Judges one core, its banks, and the whole stage: the full model with every limit at every point, stopping at the first
//! broken one.

use std::ops::ControlFlow;

use super::field::{AtFrequency, Candidate, Field};
use super::order::Ranked;
use super::request::Tolerance;
use crate::burden::{Weighted, burden};
use crate::footing::Footing;
use crate::limit::core::PointSolution;
use crate::limit::total::{self, Totals};
use crate::limit::{self, Check};
use crate::model::{Core, Outcome, RectifierBank, Variant, solve};
use crate::part::{Bank, Choke, DiodeBank, Slot, SwitchBank};
use crate::stage::{Choice, RectifierKind, Stage};

/// Lets through what holds, and the one limit that may be broken.
#[derive(Debug, Clone, Copy)]
struct Gatekeeper {
    tolerated: Option<Tolerance>,
    excess: f64,
}

impl Gatekeeper {
    fn judge(&mut self, check: &Check) -> ControlFlow<()> {
        if check.holds() {
            return ControlFlow::Continue(());
        }
        match self.tolerated.and_then(|tolerance| tolerance.admits(check)) {
            Some(excess) => {
                self.excess = self.excess.max(excess);
                ControlFlow::Continue(())
            }
            None => ControlFlow::Break(()),
        }
    }
}

/// A rectifier candidate of either kind.
#[derive(Debug, Clone, Copy)]
pub enum Rectifier<'a> {
    /// Transistors.
    Switch(&'a Candidate<SwitchBank>),
    /// Diodes.
    Diode(&'a Candidate<DiodeBank>),
}

impl<'a> Rectifier<'a> {
    /// Part and count.
    pub const fn choice(self) -> Choice {
        match self {
            Self::Switch(candidate) => candidate.choice,
            Self::Diode(candidate) => candidate.choice,
        }
    }

    /// Which catalog.
    pub const fn kind(self) -> RectifierKind {
        match self {
            Self::Switch(_) => RectifierKind::Switch,
            Self::Diode(_) => RectifierKind::Diode,
        }
    }

    /// Cost, area, height.
    pub const fn footing(self) -> Footing {
        match self {
            Self::Switch(candidate) => candidate.footing,
            Self::Diode(candidate) => candidate.footing,
        }
    }

    /// Its figures.
    pub const fn bank(self) -> RectifierBank<'a> {
        match self {
            Self::Switch(candidate) => RectifierBank::Switch(&candidate.bank),
            Self::Diode(candidate) => RectifierBank::Diode(&candidate.bank),
        }
    }
}

/// The three candidates of a core.
#[derive(Debug, Clone, Copy)]
pub struct Trio<'a> {
    /// High switch.
    pub high: &'a Candidate<SwitchBank>,
    /// Rectifier.
    pub rectifier: Rectifier<'a>,
    /// Inductor.
    pub choke: &'a Candidate<Choke>,
}

impl<'a> Trio<'a> {
    fn core(&self, field: &'a Field, at: &AtFrequency) -> Core<'a> {
        Core {
            conditions: &field.conditions,
            frequency_hz: at.frequency_hz,
            high: &self.high.bank,
            rectifier: self.rectifier.bank(),
            choke: &self.choke.bank,
        }
    }

    /// Cost, area and height.
    pub fn footing(&self) -> Footing {
        self.high.footing.with(self.rectifier.footing()).with(self.choke.footing)
    }

    /// The weighted sums alone, without any limit; `None` where a weighted point has no numbers.
    pub fn weigh(&self, field: &'a Field, at: &AtFrequency) -> Option<Weighted> {
        let core = self.core(field, at);
        let mut weighted = Weighted::default();
        let switch_rectifier = self.rectifier.kind() == RectifierKind::Switch;
        for (load, point) in field.conditions.loads.iter().enumerate() {
            if point.share > 0.0 {
                match solve(&core, field.conditions.typical, load, Variant::TYPICAL) {
                    Outcome::Running(operation) => weighted.add(&field.conditions, load, &operation, switch_rectifier),
                    _ => return None,
                }
            }
        }
        Some(weighted)
    }
}

/// A core that keeps every limit it has without its banks, with the solutions that the banks are judged by.
#[derive(Debug)]
pub struct CoreTrial<'a> {
    field: &'a Field<'a>,
    trio: Trio<'a>,
    core: Core<'a>,
    own: Gatekeeper,
    weighted: Weighted,
    footing: Footing,
    solutions: Vec<PointSolution>,
}

/// A bank that keeps its limits on a core.
#[derive(Debug, Clone, Copy)]
pub struct BankTrial<'a> {
    /// The bank.
    pub candidate: &'a Candidate<Bank>,
    keeper: Gatekeeper,
}

impl BankTrial<'_> {
    /// By how much it breaks a tolerated limit.
    pub const fn excess(&self) -> f64 {
        self.keeper.excess
    }
}

/// Which bank of a stage.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Place {
    /// Across the input.
    Input,
    /// Across the output.
    Output,
}

impl<'a> CoreTrial<'a> {
    /// Solves and checks a core at every point.
    ///
    /// # Errors
    /// The memory of `solutions`, when the core breaks a limit that is not tolerated.
    pub fn new(
        field: &'a Field<'a>,
        at: &'a AtFrequency,
        trio: Trio<'a>,
        tolerated: Option<Tolerance>,
        mut solutions: Vec<PointSolution>,
    ) -> Result<Self, Vec<PointSolution>> {
        solutions.clear();
        let conditions = &field.conditions;
        let core = trio.core(field, at);
        let mut own = Gatekeeper { tolerated, excess: 0.0 };
        if own_limits(field, &trio, &mut own).is_break() {
            return Err(solutions);
        }
        let mut receive = |check: Check| own.judge(&check);
        if limit::core::supply(&core, field.rail, &mut receive).is_break() {
            return Err(solutions);
        }
        for input in 0..conditions.inputs_v.len() {
            for load in 0..conditions.loads.len() {
                match limit::core::point(&core, field.rail, input, load, &mut receive) {
                    ControlFlow::Continue(solution) if solution.is_whole() => solutions.push(solution),
                    _ => return Err(solutions),
                }
            }
        }
        let mut weighted = Weighted::default();
        let switch_rectifier = trio.rectifier.kind() == RectifierKind::Switch;
        for (load, point) in conditions.loads.iter().enumerate() {
            if point.share > 0.0 {
                match solutions[conditions.point(conditions.typical, load)].typical {
                    Some(operation) => weighted.add(conditions, load, &operation, switch_rectifier),
                    None => return Err(solutions),
                }
            }
        }
        Ok(Self { field, trio, core, own, weighted, footing: trio.footing(), solutions })
    }

    /// Gives the memory of the solutions back.
    pub fn into_solutions(self) -> Vec<PointSolution> {
        self.solutions
    }

    /// Weighted sums.
    pub const fn weighted(&self) -> &Weighted {
        &self.weighted
    }

    /// A bank on this core; `None` when it breaks a limit that is not tolerated.
    pub fn bank<'b>(&self, candidate: &'b Candidate<Bank>, place: Place) -> Option<BankTrial<'b>> {
        let mut keeper = Gatekeeper { tolerated: self.own.tolerated, excess: 0.0 };
        let own = match place {
            Place::Input => {
                let part = &self.field.parts.capacitors[candidate.choice.index];
                limit::own::capacitor(part, Slot::InputBank, self.field.rail, &mut |c: Check| keeper.judge(&c))
            }
            Place::Output => {
                let part = &self.field.parts.capacitors[candidate.choice.index];
                limit::own::capacitor(part, Slot::OutputBank, self.field.rail, &mut |c: Check| keeper.judge(&c))
            }
        };
        if own.is_break() {
            return None;
        }
        let loads = self.core.conditions.loads.len();
        for (index, solution) in self.solutions.iter().enumerate() {
            let at = (index / loads, index % loads);
            let receive = &mut |check: Check| keeper.judge(&check);
            let flow = match place {
                Place::Input => limit::bank::input(&candidate.bank, &self.core, self.field.rail, at, solution, receive),
                Place::Output => {
                    limit::bank::output(&candidate.bank, &self.core, self.field.rail, at, solution, receive)
                }
            };
            if flow.is_break() {
                return None;
            }
        }
        let receive = &mut |check: Check| keeper.judge(&check);
        if place == Place::Output
            && limit::bank::load_step(&candidate.bank, &self.core, self.field.rail, receive).is_break()
        {
            return None;
        }
        Some(BankTrial { candidate, keeper })
    }

    /// The whole stage; `None` when it breaks a limit that is not tolerated.
    pub fn stage(&self, input: &BankTrial, output: &BankTrial) -> Option<Ranked> {
        let footing = self.footing.with(input.candidate.footing).with(output.candidate.footing);
        let (input_ohm, output_ohm) = (input.candidate.bank.esr_ohm, output.candidate.bank.esr_ohm);
        let weighted_loss_w = self.weighted.loss_w(input_ohm, output_ohm);
        let mut keeper = Gatekeeper {
            excess: self.own.excess.max(input.keeper.excess).max(output.keeper.excess),
            tolerated: self.own.tolerated,
        };
        let totals = Totals { footing, weighted_efficiency: Some(self.weighted.efficiency(weighted_loss_w)) };
        if total::check(&totals, &self.field.rail.limits, &mut |check: Check| keeper.judge(&check)).is_break() {
            return None;
        }
        Some(Ranked {
            stage: Stage {
                frequency_hz: self.core.frequency_hz,
                high_switch: self.trio.high.choice,
                rectifier_kind: self.trio.rectifier.kind(),
                rectifier: self.trio.rectifier.choice(),
                inductor: self.trio.choke.choice.index,
                input_bank: input.candidate.choice,
                output_bank: output.candidate.choice,
            },
            excess: keeper.excess,
            burden: burden(&self.field.worth, weighted_loss_w, &footing)?,
            weighted_loss_w,
        })
    }
}

/// The parts' own limits hold already, but for a tolerated one, whose excess must be known.
fn own_limits(field: &Field, trio: &Trio, keeper: &mut Gatekeeper) -> ControlFlow<()> {
    if keeper.tolerated.is_none() {
        return ControlFlow::Continue(());
    }
    let (rail, parts, conditions) = (field.rail, field.parts, &field.conditions);
    let receive = &mut |check: Check| keeper.judge(&check);
    let beside_switch = trio.rectifier.kind() == RectifierKind::Switch;
    let high = &parts.switches[trio.high.choice.index];
    limit::own::switch(high, &trio.high.bank, Slot::HighSwitch, beside_switch, rail, conditions, receive)?;
    match trio.rectifier {
        Rectifier::Switch(low) => {
            let part = &parts.switches[low.choice.index];
            limit::own::switch(part, &low.bank, Slot::Rectifier, true, rail, conditions, receive)
        }
        Rectifier::Diode(diode) => limit::own::diode(&parts.diodes[diode.choice.index], rail, receive),
    }
}
