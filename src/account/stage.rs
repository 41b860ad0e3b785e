//! From a stage to its account.

use std::ops::ControlFlow;

use super::data::{
    Account, AssumedRow, BankLosses, LimitRow, Losses, Mode, PointAccount, Reading, RmsCurrents, Temperatures,
};
use crate::burden::{Weighted, burden};
use crate::footing::Footing;
use crate::limit::{self, Check, Finding, Side, total::Totals};
use crate::model::{Conditions, Core, Operation, Outcome, RectifierBank, Variant, ripple, solve};
use crate::part::{Assumed, Bank, Choke, DiodeBank, Parts, Slot, SwitchBank};
use crate::rail::Rail;
use crate::stage::{NamedStage, RectifierKind, Stage};

/// Everything about one stage, whether it passes or not.
pub fn account(rail: &Rail, parts: &Parts, stage: &Stage) -> Account {
    let conditions = Conditions::of(rail);
    let fitted = Fitted::new(&conditions, parts, stage);
    let core = fitted.core(&conditions, stage.frequency_hz);
    let points = readings(&core, &fitted);
    let footing = fitted.footing(parts, stage);
    let weighted = weighted(&core);
    let loss_w = weighted.map(|sums| sums.loss_w(fitted.input.esr_ohm, fitted.output.esr_ohm));
    let efficiency = weighted.zip(loss_w).map(|(sums, loss_w)| sums.efficiency(loss_w));
    let totals = Totals { footing, weighted_efficiency: efficiency };
    let named = stage.named(parts);
    let checks = all_checks(rail, parts, stage, &core, &fitted, &totals);
    Account {
        rail: rail.name.clone(),
        burden: loss_w.and_then(|loss_w| burden(&rail.worth, loss_w, &footing)),
        cost: footing.cost,
        area_mm2: footing.area_mm2,
        weighted_loss_w: loss_w,
        weighted_efficiency: efficiency,
        resistance_w: weighted.map(|sums| sums.resistance_w),
        charge_w: weighted.map(|sums| sums.charge_w),
        points,
        limits: limit_rows(&checks, &named),
        assumed: assumed(&conditions, parts, stage),
        stage: named,
    }
}

/// The parts of a stage at its working point.
struct Fitted {
    high: SwitchBank,
    rectifier: FittedRectifier,
    choke: Choke,
    input: Bank,
    output: Bank,
}

enum FittedRectifier {
    Switch(SwitchBank),
    Diode(DiodeBank),
}

impl Fitted {
    fn new(conditions: &Conditions, parts: &Parts, stage: &Stage) -> Self {
        let around = conditions.surroundings();
        let loads_a = conditions.loads.iter().map(|load| load.current_a);
        let capacitor = |index: usize| &parts.capacitors[index];
        let (index, count) = (stage.rectifier.index, stage.rectifier.count);
        Self {
            high: parts.switches[stage.high_switch.index].bank(stage.high_switch.count, &around),
            rectifier: match stage.rectifier_kind {
                RectifierKind::Switch => FittedRectifier::Switch(parts.switches[index].bank(count, &around)),
                RectifierKind::Diode => FittedRectifier::Diode(parts.diodes[index].bank(count, &around)),
            },
            choke: parts.inductors[stage.inductor].choke(stage.frequency_hz, loads_a),
            input: capacitor(stage.input_bank.index).bank(
                stage.input_bank.count,
                stage.frequency_hz,
                conditions.input_biases_v(),
            ),
            output: capacitor(stage.output_bank.index).bank(
                stage.output_bank.count,
                stage.frequency_hz,
                conditions.output_biases_v(),
            ),
        }
    }

    fn core<'a>(&'a self, conditions: &'a Conditions, frequency_hz: f64) -> Core<'a> {
        let rectifier = match &self.rectifier {
            FittedRectifier::Switch(bank) => RectifierBank::Switch(bank),
            FittedRectifier::Diode(bank) => RectifierBank::Diode(bank),
        };
        Core { conditions, frequency_hz, high: &self.high, rectifier, choke: &self.choke }
    }

    fn footing(&self, parts: &Parts, stage: &Stage) -> Footing {
        let rectifier = match stage.rectifier_kind {
            RectifierKind::Switch => &parts.switches[stage.rectifier.index].identity,
            RectifierKind::Diode => &parts.diodes[stage.rectifier.index].identity,
        };
        Footing::of(&parts.switches[stage.high_switch.index].identity, stage.high_switch.count)
            .with(Footing::of(rectifier, stage.rectifier.count))
            .with(Footing::of(&parts.inductors[stage.inductor].identity, 1))
            .with(Footing::of(&parts.capacitors[stage.input_bank.index].identity, stage.input_bank.count))
            .with(Footing::of(&parts.capacitors[stage.output_bank.index].identity, stage.output_bank.count))
    }
}

fn each_point(conditions: &Conditions) -> impl Iterator<Item = (usize, usize)> {
    let loads = conditions.loads.len();
    (0..conditions.points()).map(move |point| (point / loads, point % loads))
}

fn weighted(core: &Core) -> Option<Weighted> {
    let mut sums = Weighted::default();
    let switch_rectifier = matches!(core.rectifier, RectifierBank::Switch(_));
    for (load, point) in core.conditions.loads.iter().enumerate() {
        if point.share > 0.0 {
            match solve(core, core.conditions.typical, load, Variant::TYPICAL) {
                Outcome::Running(operation) => sums.add(core.conditions, load, &operation, switch_rectifier),
                _ => return None,
            }
        }
    }
    Some(sums)
}

fn readings(core: &Core, fitted: &Fitted) -> Vec<PointAccount> {
    let conditions = core.conditions;
    each_point(conditions)
        .map(|(input, load)| {
            let (mode, reading) = match solve(core, input, load, Variant::TYPICAL) {
                Outcome::Running(operation) => {
                    (operation.currents.conduction.into(), Some(reading(core, fitted, input, load, &operation)))
                }
                Outcome::Dropout => (Mode::Dropout, None),
                Outcome::Runaway => (Mode::Runaway, None),
                Outcome::Underdriven(_) => (Mode::Underdriven, None),
            };
            PointAccount {
                input_v: conditions.inputs_v[input],
                load_a: conditions.loads[load].current_a,
                ambient_c: conditions.ambient_c,
                share: conditions.share(input, load),
                mode,
                reading,
            }
        })
        .collect()
}

fn reading(core: &Core, fitted: &Fitted, input: usize, load: usize, operation: &Operation) -> Reading {
    let (currents, load_a) = (&operation.currents, core.conditions.loads[load].current_a);
    let losses_w = Losses {
        input_bank: BankLosses { esr: fitted.input.esr_ohm * currents.input_bank_a2 },
        output_bank: BankLosses { esr: fitted.output.esr_ohm * currents.output_bank_a2 },
        ..operation.losses
    };
    let loss_w = losses_w.total_w();
    let output_w = core.conditions.output_v * load_a;
    let rms = |square_a2: f64| square_a2.max(0.0).sqrt();
    let (input_f, output_f) = (fitted.input.capacitance_f[input], fitted.output.capacitance_f[input]);
    Reading {
        duty: currents.duty,
        ripple_a: currents.ripple_a,
        peak_a: currents.peak_a,
        valley_a: currents.valley_a,
        output_ripple_v: ripple::output_v(currents, load_a, core.frequency_hz, &fitted.output, output_f),
        input_ripple_v: ripple::input_v(currents, core.frequency_hz, &fitted.input, input_f),
        loss_w,
        efficiency: output_w / (output_w + loss_w),
        losses_w,
        rms_a: RmsCurrents {
            high_switch: rms(currents.high_a2),
            rectifier: rms(currents.rectifier_a2),
            inductor: rms(currents.inductor_a2),
            input_bank: rms(currents.input_bank_a2),
            output_bank: rms(currents.output_bank_a2),
        },
        temperature_c: Temperatures {
            high_switch: operation.heat.high_c,
            rectifier: operation.heat.rectifier_c,
            inductor: operation.heat.winding_c,
        },
    }
}

fn all_checks(rail: &Rail, parts: &Parts, stage: &Stage, core: &Core, fitted: &Fitted, totals: &Totals) -> Vec<Check> {
    let conditions = core.conditions;
    let mut checks = Vec::new();
    let receive = &mut |check: Check| {
        checks.push(check);
        ControlFlow::Continue(())
    };
    // The receiver above never breaks off, so neither do the limits.
    let _ = own_checks(rail, parts, stage, core, fitted, receive);
    let _ = limit::core::supply(core, rail, receive);
    for (input, load) in each_point(conditions) {
        if let ControlFlow::Continue(solution) = limit::core::point(core, rail, input, load, receive) {
            let _ = limit::bank::input(&fitted.input, core, rail, (input, load), &solution, receive);
            let _ = limit::bank::output(&fitted.output, core, rail, (input, load), &solution, receive);
        }
    }
    let _ = limit::bank::load_step(&fitted.output, core, rail, receive);
    let _ = limit::total::check(totals, &rail.limits, receive);
    for limit in [limit::LimitName::Dropout, limit::LimitName::Runaway] {
        if checks.iter().all(|check| check.limit != limit) {
            checks.push(Check::plain(limit, Slot::Stage, true));
        }
    }
    checks
}

fn own_checks(
    rail: &Rail,
    parts: &Parts,
    stage: &Stage,
    core: &Core,
    fitted: &Fitted,
    receive: &mut (impl limit::Receiver + ?Sized),
) -> ControlFlow<()> {
    let conditions = core.conditions;
    let switch_rectifier = stage.rectifier_kind == RectifierKind::Switch;
    let high = &parts.switches[stage.high_switch.index];
    limit::own::switch(high, &fitted.high, Slot::HighSwitch, switch_rectifier, rail, conditions, receive)?;
    match &fitted.rectifier {
        FittedRectifier::Switch(bank) => {
            let low = &parts.switches[stage.rectifier.index];
            limit::own::switch(low, bank, Slot::Rectifier, true, rail, conditions, receive)?;
        }
        FittedRectifier::Diode(_) => limit::own::diode(&parts.diodes[stage.rectifier.index], rail, receive)?,
    }
    limit::own::missing(&parts.inductors[stage.inductor].identity, Slot::Inductor, rail, receive)?;
    limit::own::capacitor(&parts.capacitors[stage.input_bank.index], Slot::InputBank, rail, receive)?;
    limit::own::capacitor(&parts.capacitors[stage.output_bank.index], Slot::OutputBank, rail, receive)
}

/// One row a limit, slot and side, at its worst point; broken ones first, else in the order of the limits.
fn limit_rows(checks: &[Check], stage: &NamedStage) -> Vec<LimitRow> {
    let mut worst: Vec<Check> = Vec::new();
    let upper = |check: &Check| matches!(check.finding, Finding::Compared { side: Side::Upper, .. });
    for check in checks {
        let same =
            |kept: &&mut Check| kept.limit == check.limit && kept.slot == check.slot && upper(kept) == upper(check);
        match worst.iter_mut().find(same) {
            Some(kept) => {
                let key = |c: &Check| (c.holds(), ordered_float::OrderedFloat(c.rank_margin()));
                if key(check) < key(kept) {
                    *kept = *check;
                }
            }
            None => worst.push(*check),
        }
    }
    worst.sort_by_key(|check| (check.holds(), check.limit, check.slot, upper(check)));
    worst.iter().map(|check| limit_row(check, stage)).collect()
}

fn limit_row(check: &Check, stage: &NamedStage) -> LimitRow {
    let (value, bound) = match check.finding {
        Finding::Compared { value, bound, .. } => (Some(value), Some(bound)),
        Finding::Plain { .. } => (None, None),
    };
    let part = match check.slot {
        Slot::HighSwitch => stage.high_switch.part.clone(),
        Slot::Rectifier => stage.rectifier.part.clone(),
        Slot::Inductor => stage.inductor.part.clone(),
        Slot::InputBank => stage.input_bank.part.clone(),
        Slot::OutputBank => stage.output_bank.part.clone(),
        Slot::Drive | Slot::Stage => String::new(),
    };
    LimitRow {
        limit: check.limit,
        slot: check.slot.name(),
        part,
        value,
        bound,
        margin: check.margin(),
        point: check.point,
        holds: check.holds(),
    }
}

/// Every default that the figures of a stage rest on.
pub fn assumed(conditions: &Conditions, parts: &Parts, stage: &Stage) -> Vec<AssumedRow> {
    let around = conditions.surroundings();
    let highest_v = conditions.inputs_v[conditions.inputs_v.len() - 1];
    let rectifier = match stage.rectifier_kind {
        RectifierKind::Switch => parts.switches[stage.rectifier.index].assumed(Slot::Rectifier, &around),
        RectifierKind::Diode => parts.diodes[stage.rectifier.index].assumed(),
    };
    [
        parts.switches[stage.high_switch.index].assumed(Slot::HighSwitch, &around),
        rectifier,
        parts.inductors[stage.inductor].assumed(),
        parts.capacitors[stage.input_bank.index].assumed(Slot::InputBank, highest_v),
        parts.capacitors[stage.output_bank.index].assumed(Slot::OutputBank, conditions.output_v),
    ]
    .into_iter()
    .flatten()
    .map(|Assumed { slot, part, quantity, value, unit, why }| AssumedRow {
        slot: slot.name(),
        part,
        quantity,
        value,
        unit,
        why,
    })
    .collect()
}
