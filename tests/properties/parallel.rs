//! n equal parts in parallel against one part with a resistance, a thermal and a gate resistance n times smaller and charges
//! and currents n times greater.

use wattsieve::account::{LimitRow, account};
use wattsieve::limit::LimitName;
use wattsieve::part::{Capacitor, Curve, Diode, Inductor, Parts, Switch};
use wattsieve::quantity::{NonNegative, Positive};
use wattsieve::stage::{Choice, RectifierKind, Stage};

use crate::draw::{close, each, figures};

fn positive(value: f64) -> Positive {
    Positive::new(value).expect("a positive number")
}

fn times(value: Option<Positive>, n: f64) -> Option<Positive> {
    value.map(|value| positive(value.get() * n))
}

fn scaled(curve: &Curve, x: f64, y: f64) -> Curve {
    Curve::new(curve.points().iter().map(|&(a, b)| (a * x, b * y)).collect()).expect("a curve")
}

fn wide_switch(one: &Switch, n: f64) -> Switch {
    let gate_ohm = one.gate_resistance_ohm.map_or(1.0, |r| r.get()) / n;
    Switch {
        on_resistance_ohm: scaled(&one.on_resistance_ohm, 1.0, 1.0 / n),
        on_resistance_max_ohm: one.on_resistance_max_ohm.as_ref().map(|curve| scaled(curve, 1.0, 1.0 / n)),
        gate_charge_c: scaled(&one.gate_charge_c, 1.0, n),
        gate_drain_charge_c: positive(one.gate_drain_charge_c.get() * n),
        gate_source_charge_c: times(one.gate_source_charge_c, n),
        plateau_current_a: times(one.plateau_current_a, n),
        gate_resistance_ohm: NonNegative::new(gate_ohm),
        output_charge_c: one.output_charge_c.as_ref().map(|curve| scaled(curve, 1.0, n)),
        recovery_charge_c: one.recovery_charge_c.and_then(|q| NonNegative::new(q.get() * n)),
        current_rating_a: times(one.current_rating_a, n),
        thermal_resistance_k_per_w: positive(one.thermal_resistance_k_per_w.get() / n),
        ..one.clone()
    }
}

fn wide_diode(one: &Diode, n: f64) -> Diode {
    Diode {
        forward_drop_v: scaled(&one.forward_drop_v, n, 1.0),
        leakage_a: one.leakage_a.as_ref().map(|curve| scaled(curve, 1.0, n)),
        junction_charge_c: one.junction_charge_c.as_ref().map(|curve| scaled(curve, 1.0, n)),
        recovery_charge_c: one.recovery_charge_c.and_then(|q| NonNegative::new(q.get() * n)),
        current_rating_a: positive(one.current_rating_a.get() * n),
        thermal_resistance_k_per_w: positive(one.thermal_resistance_k_per_w.get() / n),
        ..one.clone()
    }
}

fn wide_capacitor(one: &Capacitor, n: f64) -> Capacitor {
    Capacitor {
        capacitance_f: scaled(&one.capacitance_f, 1.0, n),
        esr_ohm: scaled(&one.esr_ohm, 1.0, 1.0 / n),
        esl_h: one.esl_h.and_then(|l| NonNegative::new(l.get() / n)),
        ripple_current_a: times(one.ripple_current_a, n),
        ..one.clone()
    }
}

/// The stage with one wide part in each slot for its parts in parallel.
fn wide(parts: &Parts, stage: &Stage) -> (Parts, Stage) {
    let n = |choice: Choice| f64::from(choice.count);
    let switch = |choice: Choice| wide_switch(&parts.switches[choice.index], n(choice));
    let capacitor = |choice: Choice| wide_capacitor(&parts.capacitors[choice.index], n(choice));
    let (mut switches, mut diodes) = (vec![switch(stage.high_switch)], vec![]);
    match stage.rectifier_kind {
        RectifierKind::Switch => switches.push(switch(stage.rectifier)),
        RectifierKind::Diode => diodes.push(wide_diode(&parts.diodes[stage.rectifier.index], n(stage.rectifier))),
    }
    let inductors: Vec<Inductor> = vec![parts.inductors[stage.inductor].clone()];
    let capacitors = vec![capacitor(stage.input_bank), capacitor(stage.output_bank)];
    let one = |index| Choice { index, count: 1 };
    let stage = Stage {
        high_switch: one(0),
        rectifier: one(usize::from(stage.rectifier_kind == RectifierKind::Switch)),
        inductor: 0,
        input_bank: one(0),
        output_bank: one(1),
        ..*stage
    };
    (Parts { switches, diodes, inductors, capacitors }, stage)
}

#[test]
fn parts_in_parallel_are_one_wide_part() {
    let mut compared = 0;
    each(5_000..5_500, 4, |problem, stage, seed| {
        let rail = &problem.rail;
        let many = account(rail, &problem.parts, stage);
        let (parts, one) = wide(&problem.parts, stage);
        let one = account(rail, &parts, &one);
        for (a, b) in many.points.iter().zip(&one.points) {
            assert_eq!(a.mode, b.mode, "seed {seed}");
            let (Some(a), Some(b)) = (&a.reading, &b.reading) else { continue };
            compared += 1;
            for ((name, a_value), (_, b_value)) in figures(a).into_iter().zip(figures(b)) {
                // Rounding grows with the thermal loop gain, and is of the size of the peak where currents cancel.
                assert!(close(a_value, b_value, 1e-10, 1e-4 * a.peak_a), "seed {seed} {name} {a_value} {b_value}");
            }
        }
        let one_is_another = [LimitName::Area, LimitName::Cost, LimitName::RectifierCurrent];
        for row in many.limits.iter().filter(|row| !one_is_another.contains(&row.limit)) {
            // A two-sided limit has two rows, told apart by their bounds.
            let same = |other: &&LimitRow| other.limit == row.limit && other.slot == row.slot;
            let nearest = one.limits.iter().filter(same).filter_map(|other| other.margin).min_by(|a, b| {
                let distance = |margin: &f64| (margin - row.margin.unwrap_or(0.0)).abs();
                distance(a).total_cmp(&distance(b))
            });
            let agrees = match (row.margin, nearest) {
                (Some(a), Some(b)) => close(a, b, 1e-9, 1.0),
                (None, None) => true,
                _ => false,
            };
            assert!(agrees, "seed {seed} {row:?} {nearest:?}");
        }
    });
    assert!(compared > 5_000, "only {compared} compared");
}
