//! Every part fitted to the rail once: what the search crosses.

use std::ops::ControlFlow;

use super::request::{Request, Tolerance};
use crate::footing::Footing;
use crate::limit::{Check, LimitName, own, total};
use crate::model::Conditions;
use crate::part::{Bank, Choke, DiodeBank, Identity, Parts, Slot, SwitchBank};
use crate::rail::{Ban, Rail, Worth};
use crate::stage::Choice;

/// Parts of one slot dropped before crossing because they break a limit of their own.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Dropped {
    /// Which limit.
    pub limit: LimitName,
    /// The slot.
    pub slot: Slot,
    /// How many parts.
    pub parts: usize,
}

/// So many equal parts, fitted to the rail.
#[derive(Debug, Clone, PartialEq)]
pub struct Candidate<B> {
    /// Part and count.
    pub choice: Choice,
    /// Its figures.
    pub bank: B,
    /// Cost, area, height.
    pub footing: Footing,
}

/// Everything that can stand in each slot of a stage, own limits kept.
#[derive(Debug, Clone)]
pub struct Field<'a> {
    /// The rail.
    pub rail: &'a Rail,
    /// The parts.
    pub parts: &'a Parts,
    /// What the burden is made of.
    pub worth: Worth,
    /// Points and drive.
    pub conditions: Conditions,
    /// High switches beside a switch rectifier.
    pub high_beside_switch: Vec<Candidate<SwitchBank>>,
    /// High switches beside a diode.
    pub high_beside_diode: Vec<Candidate<SwitchBank>>,
    /// Switch rectifiers.
    pub switch_rectifiers: Vec<Candidate<SwitchBank>>,
    /// Diode rectifiers.
    pub diode_rectifiers: Vec<Candidate<DiodeBank>>,
    /// Indices of the inductors.
    pub inductors: Vec<usize>,
    /// Input capacitors and counts.
    pub input_choices: Vec<Choice>,
    /// Output capacitors and counts.
    pub output_choices: Vec<Choice>,
    /// Stages of the catalogs after pins and bans, before any limit.
    pub crossed: u128,
    /// Parts dropped before crossing.
    pub dropped: Vec<Dropped>,
}

/// What depends on the frequency.
#[derive(Debug, Clone)]
pub struct AtFrequency {
    /// The frequency, Hz.
    pub frequency_hz: f64,
    /// Inductors.
    pub chokes: Vec<Candidate<Choke>>,
    /// Input banks.
    pub input_banks: Vec<Candidate<Bank>>,
    /// Output banks.
    pub output_banks: Vec<Candidate<Bank>>,
}

impl<'a> Field<'a> {
    /// Fits all parts to the rail. A part that breaks a limit of its own is dropped, unless that is tolerated.
    pub fn new(request: &Request<'a>) -> Self {
        let Request { rail, parts, worth, tolerated, .. } = *request;
        let conditions = Conditions::of(rail);
        let around = conditions.surroundings();
        let mut sieve = Sieve { rail, tolerated, dropped: Vec::new() };
        let allowed = |slot, identity: &Identity| is_allowed(rail, slot, identity);
        let range = &rail.range;
        let switches = |slot, greatest, switch_rectifier, sieve: &mut Sieve| {
            sieve.choose(
                slot,
                greatest,
                &parts.switches,
                |s| &s.identity,
                |s, count| s.bank(count, &around),
                |s, bank, keep| own::switch(s, bank, slot, switch_rectifier, rail, &conditions, keep),
            )
        };
        let high_count = range.parallel.high_switch;
        let rectifier_count = range.parallel.rectifier;
        let (mut high_beside_switch, mut switch_rectifiers) = (Vec::new(), Vec::new());
        let (mut high_beside_diode, mut diode_rectifiers) = (Vec::new(), Vec::new());
        if range.diode_rectifier {
            high_beside_diode = switches(Slot::HighSwitch, high_count, false, &mut sieve);
            diode_rectifiers = sieve.choose(
                Slot::Rectifier,
                rectifier_count,
                &parts.diodes,
                |d| &d.identity,
                |d, count| d.bank(count, &around),
                |d, _, keep| own::diode(d, rail, keep),
            );
        }
        if range.switch_rectifier {
            // With diodes in play a slow high switch is not dropped, only kept from switch rectifiers.
            let mut apart = Sieve { rail, tolerated, dropped: Vec::new() };
            let counted = if range.diode_rectifier { &mut apart } else { &mut sieve };
            high_beside_switch = switches(Slot::HighSwitch, high_count, true, counted);
            switch_rectifiers = switches(Slot::Rectifier, rectifier_count, true, &mut sieve);
        }
        let inductors = sieve
            .choose(
                Slot::Inductor,
                1,
                &parts.inductors,
                |l| &l.identity,
                |_, _| (),
                |l, (), keep| own::missing(&l.identity, Slot::Inductor, rail, keep),
            )
            .iter()
            .map(|candidate| candidate.choice.index)
            .collect();
        let mut capacitors = |slot, greatest| -> Vec<Choice> {
            sieve
                .choose(
                    slot,
                    greatest,
                    &parts.capacitors,
                    |c| &c.identity,
                    |_, _| (),
                    |c, (), keep| own::capacitor(c, slot, rail, keep),
                )
                .iter()
                .map(|candidate| candidate.choice)
                .collect()
        };
        let input_choices = capacitors(Slot::InputBank, range.parallel.input);
        let output_choices = capacitors(Slot::OutputBank, range.parallel.output);
        let dropped = sieve.dropped;
        let count = |slot, identities: &mut dyn Iterator<Item = &Identity>, greatest: u32| {
            identities.filter(|identity| allowed(slot, identity)).count() as u128 * u128::from(greatest)
        };
        let switch_ids = || parts.switches.iter().map(|s| &s.identity);
        let capacitor_ids = || parts.capacitors.iter().map(|c| &c.identity);
        let mut rectifiers = 0;
        if range.switch_rectifier {
            rectifiers += count(Slot::Rectifier, &mut switch_ids(), rectifier_count);
        }
        if range.diode_rectifier {
            rectifiers += count(Slot::Rectifier, &mut parts.diodes.iter().map(|d| &d.identity), rectifier_count);
        }
        let crossed = range.frequencies_hz.len() as u128
            * count(Slot::HighSwitch, &mut switch_ids(), high_count)
            * rectifiers
            * count(Slot::Inductor, &mut parts.inductors.iter().map(|l| &l.identity), 1)
            * count(Slot::InputBank, &mut capacitor_ids(), range.parallel.input)
            * count(Slot::OutputBank, &mut capacitor_ids(), range.parallel.output);
        Self {
            rail,
            parts,
            worth,
            conditions,
            high_beside_switch,
            high_beside_diode,
            switch_rectifiers,
            diode_rectifiers,
            inductors,
            input_choices,
            output_choices,
            crossed,
            dropped,
        }
    }

    /// Inductors and banks at one frequency.
    pub fn at_frequency(&self, frequency_hz: f64) -> AtFrequency {
        let loads_a = || self.conditions.loads.iter().map(|load| load.current_a);
        let bank = |choice: &Choice, biases_v| {
            let capacitor = &self.parts.capacitors[choice.index];
            Candidate {
                choice: *choice,
                bank: capacitor.bank(choice.count, frequency_hz, biases_v),
                footing: Footing::of(&capacitor.identity, choice.count),
            }
        };
        AtFrequency {
            frequency_hz,
            chokes: self
                .inductors
                .iter()
                .map(|&index| Candidate {
                    choice: Choice { index, count: 1 },
                    bank: self.parts.inductors[index].choke(frequency_hz, loads_a()),
                    footing: Footing::of(&self.parts.inductors[index].identity, 1),
                })
                .collect(),
            input_banks: self.input_choices.iter().map(|c| bank(c, self.conditions.input_biases_v())).collect(),
            output_banks: self.output_choices.iter().map(|c| bank(c, self.conditions.output_biases_v())).collect(),
        }
    }
}

/// Whether pins and bans let a part into a slot.
pub fn is_allowed(rail: &Rail, slot: Slot, identity: &Identity) -> bool {
    let pinned = rail.pins.iter().filter(|pin| pin.slot == slot).all(|pin| pin.parts.contains(&identity.part));
    let banned = rail.bans.iter().any(|ban| match ban {
        Ban::Part(part) => *part == identity.part,
        Ban::Maker(maker) => identity.maker.as_ref() == Some(maker),
    });
    pinned && !banned
}

struct Sieve<'a> {
    rail: &'a Rail,
    tolerated: Option<Tolerance>,
    dropped: Vec<Dropped>,
}

impl Sieve<'_> {
    /// Every allowed part in every count that keeps its own limits.
    fn choose<P, B>(
        &mut self,
        slot: Slot,
        greatest: u32,
        parts: &[P],
        identity: impl Fn(&P) -> &Identity,
        fit: impl Fn(&P, u32) -> B,
        own: impl Fn(&P, &B, &mut dyn FnMut(Check) -> ControlFlow<()>) -> ControlFlow<()>,
    ) -> Vec<Candidate<B>> {
        let mut kept = Vec::new();
        for (index, part) in parts.iter().enumerate() {
            if !is_allowed(self.rail, slot, identity(part)) {
                continue;
            }
            let before = kept.len();
            let mut first_broken = None;
            for count in 1..=greatest {
                let bank = fit(part, count);
                let footing = Footing::of(identity(part), count);
                let mut broken = None;
                let mut keep = |check: Check| {
                    if check.holds() || self.tolerated.is_some_and(|tolerance| tolerance.admits(&check).is_some()) {
                        return ControlFlow::Continue(());
                    }
                    broken = Some(check.limit);
                    ControlFlow::Break(())
                };
                let _ = match own(part, &bank, &mut keep) {
                    ControlFlow::Continue(()) => total::footing(&footing, &self.rail.limits, &mut keep),
                    stopped @ ControlFlow::Break(()) => stopped,
                };
                match broken {
                    None => kept.push(Candidate { choice: Choice { index, count }, bank, footing }),
                    Some(limit) => first_broken = first_broken.or(Some(limit)),
                }
            }
            if let (Some(limit), true) = (first_broken, kept.len() == before) {
                self.count(limit, slot);
            }
        }
        kept
    }

    fn count(&mut self, limit: LimitName, slot: Slot) {
        match self.dropped.iter_mut().find(|row| row.limit == limit && row.slot == slot) {
            Some(row) => row.parts += 1,
            None => self.dropped.push(Dropped { limit, slot, parts: 1 }),
        }
    }
}
