//! Limits that a part breaks by itself in a slot, whatever its partners.

use std::ops::ControlFlow;

use crate::footing::Footing;
use crate::limit::{Check, LimitName, own, total};
use crate::model::Conditions;
use crate::part::{Parts, Slot};
use crate::rail::Rail;
use crate::search::forced::Seat;

/// What a part breaks by itself, for each count, and for a high switch beside each kind of rectifier.
pub(super) struct OwnLimits {
    broken: Vec<Vec<Check>>,
}

impl OwnLimits {
    pub fn of(seat: Seat, rail: &Rail, parts: &Parts, conditions: &Conditions) -> Self {
        let parallel = &rail.range.parallel;
        let greatest = match seat {
            Seat::HighSwitch(_) => parallel.high_switch,
            Seat::SwitchRectifier(_) | Seat::DiodeRectifier(_) => parallel.rectifier,
            Seat::Inductor(_) => 1,
            Seat::InputBank(_) => parallel.input,
            Seat::OutputBank(_) => parallel.output,
        };
        let beside: &[bool] = match (seat, rail.range.switch_rectifier, rail.range.diode_rectifier) {
            (Seat::HighSwitch(_), true, true) => &[true, false],
            (Seat::HighSwitch(_), false, true) => &[false],
            _ => &[true],
        };
        let broken = (1..=greatest)
            .flat_map(|count| beside.iter().map(move |&switch| (count, switch)))
            .map(|(count, beside_switch)| broken(seat, count, beside_switch, rail, parts, conditions))
            .collect();
        Self { broken }
    }

    /// What stops the part for good, when every count breaks something that cannot give.
    pub fn hopeless(&self) -> Option<LimitName> {
        let fatal = |checks: &Vec<Check>| checks.iter().map(|check| check.limit).find(|limit| !limit.can_give());
        self.broken.iter().map(fatal).collect::<Option<Vec<_>>>()?.first().copied()
    }

    /// Whether the part could pass if this limit alone gave.
    pub fn may_hang_on(&self, limit: LimitName) -> bool {
        self.broken.iter().any(|checks| checks.iter().all(|check| check.limit == limit))
    }

    /// The least by which the part alone breaks this limit, relative to its bound, where it breaks nothing else.
    pub fn least_excess(&self, limit: LimitName) -> f64 {
        let excess = |checks: &Vec<Check>| {
            let alone = checks.iter().all(|check| check.limit == limit);
            let worst = checks.iter().map(|check| -check.rank_margin()).fold(0.0, f64::max);
            if alone { worst } else { f64::INFINITY }
        };
        self.broken.iter().map(excess).fold(f64::INFINITY, f64::min)
    }

    /// The part breaks this in any case.
    pub fn always(&self) -> Option<Check> {
        self.broken.iter().map(|checks| checks.first().copied()).collect::<Option<Vec<_>>>()?.first().copied()
    }
}

fn broken(
    seat: Seat,
    count: u32,
    beside_switch: bool,
    rail: &Rail,
    parts: &Parts,
    conditions: &Conditions,
) -> Vec<Check> {
    let mut broken = Vec::new();
    let mut receive = |check: Check| {
        if !check.holds() {
            broken.push(check);
        }
        ControlFlow::Continue(())
    };
    let slot = seat.slot();
    // The receiver never breaks off.
    let _ = match seat {
        Seat::HighSwitch(index) | Seat::SwitchRectifier(index) => {
            let part = &parts.switches[index];
            let bank = part.bank(count, &conditions.surroundings());
            own::switch(part, &bank, slot, beside_switch, rail, conditions, &mut receive)
        }
        Seat::DiodeRectifier(index) => own::diode(&parts.diodes[index], rail, &mut receive),
        Seat::Inductor(index) => own::missing(&parts.inductors[index].identity, Slot::Inductor, rail, &mut receive),
        Seat::InputBank(index) | Seat::OutputBank(index) => {
            own::capacitor(&parts.capacitors[index], slot, rail, &mut receive)
        }
    };
    let _ = total::footing(&Footing::of(seat.identity(parts), count), &rail.limits, &mut receive);
    broken
}
