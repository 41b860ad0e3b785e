//! Across the edge between the modes of conduction currents are continuous, and only what the model says jumps.

use wattsieve::account::{Mode, Reading, account};
use wattsieve::part::Parts;
use wattsieve::quantity::{NonNegative, Positive};
use wattsieve::rail::{LightLoad, Load, Rail};
use wattsieve::stage::{RectifierKind, Stage};

use crate::draw::{close, each, figures};

/// The rail with one load beside full load, without dead time, both modes allowed.
fn with_load(rail: &Rail, load_a: f64) -> Rail {
    let mut rail = rail.clone();
    let share = Positive::new(1.0).expect("positive");
    rail.loads = vec![Load { current_a: Positive::new(load_a).expect("positive"), share }];
    rail.range.light_load = LightLoad::Emulated;
    rail.drive.dead_time_s = NonNegative::ZERO;
    rail
}

/// Parts that stay at ambient.
fn cold(parts: &Parts) -> Parts {
    let mut parts = parts.clone();
    let none = Positive::new(1e-12).expect("positive");
    parts.switches.iter_mut().for_each(|switch| switch.thermal_resistance_k_per_w = none);
    parts.diodes.iter_mut().for_each(|diode| diode.thermal_resistance_k_per_w = none);
    for inductor in &mut parts.inductors {
        let current_a = Positive::new(1e9).expect("positive");
        inductor.heating = Some(wattsieve::part::Heating { current_a, rise_k: None });
    }
    parts
}

fn at(rail: &Rail, parts: &Parts, stage: &Stage, load_a: f64) -> Option<(Mode, Reading)> {
    let account = account(&with_load(rail, load_a), parts, stage);
    let point = account.points.iter().find(|point| point.share > 0.0 && point.load_a == load_a)?;
    Some((point.mode, point.reading?))
}

/// Loads a hair below and above the edge between the modes.
fn edge(rail: &Rail, parts: &Parts, stage: &Stage) -> Option<(f64, f64)> {
    let (mut below_a, mut above_a) = (rail.output.current_a.get() * 1e-4, rail.output.current_a.get());
    if at(rail, parts, stage, below_a)?.0 != Mode::Discontinuous
        || at(rail, parts, stage, above_a)?.0 != Mode::Continuous
    {
        return None;
    }
    while above_a - below_a > 1e-13 * above_a {
        let middle_a = (below_a + above_a) / 2.0;
        match at(rail, parts, stage, middle_a)?.0 {
            Mode::Continuous => above_a = middle_a,
            _ => below_a = middle_a,
        }
        if middle_a == (below_a + above_a) / 2.0 {
            break;
        }
    }
    Some((below_a, above_a))
}

#[test]
fn currents_are_continuous_and_charges_jump_as_the_model_says() {
    let mut edges = 0;
    each(6_000..6_400, 3, |problem, stage, seed| {
        let (rail, parts) = (&problem.rail, &cold(&problem.parts));
        let Some((below_a, above_a)) = edge(rail, parts, stage) else { return };
        edges += 1;
        let (_, below) = at(rail, parts, stage, below_a).expect("it runs");
        let (_, above) = at(rail, parts, stage, above_a).expect("it runs");
        let jumping = ["output charge", "recovery", "loss", "efficiency"];
        for ((name, a), (_, b)) in figures(&below).into_iter().zip(figures(&above)) {
            if jumping.contains(&name) || name.ends_with("temperature") {
                continue;
            }
            assert!(close(a, b, 1e-9, 1e-3 * below.peak_a), "seed {seed} {name} {a} {b}");
        }
        assert!(below.valley_a == 0.0 && above.valley_a.abs() <= 1e-9 * above.peak_a, "seed {seed}");
        let around = wattsieve::model::Conditions::of(rail).surroundings();
        let high = parts.switches[stage.high_switch.index].bank(stage.high_switch.count, &around);
        let (index, count) = (stage.rectifier.index, stage.rectifier.count);
        let input = around.inputs_v.iter().position(|v| *v == rail.input.typical_v.get()).expect("typical input");
        let (at_input_c, at_swing_c, recovery_c) = match stage.rectifier_kind {
            RectifierKind::Switch => {
                let bank = parts.switches[index].bank(count, &around);
                (bank.charge_at_input_c[input], bank.charge_at_swing_c[input], bank.recovery_c)
            }
            RectifierKind::Diode => {
                let bank = parts.diodes[index].bank(count, &around);
                (bank.charge_at_input_c[input], bank.charge_at_swing_c[input], bank.recovery_c)
            }
        };
        let (v, f) = (rail.input.typical_v.get(), stage.frequency_hz);
        let node_w = |own_c: f64, other_c: f64, v: f64| (own_c / 3.0 + 2.0 * other_c / 3.0) * v * f;
        let (below_w, above_w) = (&below.losses_w.high_switch, &above.losses_w.high_switch);
        let swing_v = v - rail.output.voltage_v.get();
        assert!(close(above_w.output_charge, node_w(high.charge_at_input_c[input], at_input_c, v), 1e-12, 0.0));
        assert!(close(below_w.output_charge, node_w(high.charge_at_swing_c[input], at_swing_c, swing_v), 1e-12, 0.0));
        // On the upper side the valley is zero but for rounding, of either sign: with a reversed current nothing recovers.
        let expected_w = if above.valley_a >= 0.0 { recovery_c * v * f } else { 0.0 };
        assert!(close(above_w.recovery, expected_w, 1e-12, 0.0), "seed {seed}");
        assert_eq!(below_w.recovery, 0.0, "seed {seed}");
        let jump_w = above.loss_w - below.loss_w;
        let by_charges_w = above_w.output_charge + above_w.recovery - below_w.output_charge;
        assert!((jump_w - by_charges_w).abs() <= 1e-9 * above.loss_w, "seed {seed} {jump_w} {by_charges_w}");
    });
    assert!(edges > 200, "only {edges} edges");
}
