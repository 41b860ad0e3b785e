//! At fixed currents every loss grows with its own resistance, charge, drop or time. (The total need not: duty and core loss
//! answer too.)

use wattsieve::model::current::{Circuit, Currents, Drop, continuous, discontinuous, discontinuous_peak_a};
use wattsieve::model::high_switch::{GateDrive, Node, overlap_j, switching_w};
use wattsieve::model::{Conditions, drive, inductor, rectifier, ripple, step, thermal};
use wattsieve::part::SwitchBank;

use crate::draw::{Chance, each};
use crate::problem::Problem;

/// Currents of a random circuit in either mode.
fn currents(problem: &Problem, chance: &mut Chance) -> Option<Currents> {
    let rail = &problem.rail;
    let circuit = Circuit {
        input_v: rail.input.typical_v.get(),
        output_v: rail.output.voltage_v.get(),
        load_a: rail.output.current_a.get() * chance.scale(0.05, 1.0),
        frequency_hz: chance.scale(2e5, 1e6),
        inductance_h: chance.scale(1e-6, 3e-5),
        high_ohm: chance.scale(1e-3, 5e-2),
        winding_ohm: chance.scale(1e-3, 5e-2),
        dead_share: 0.0,
        body_drop_v: 0.0,
    };
    let drop = Drop { threshold_v: 0.4, resistance_ohm: 0.02 };
    let found = continuous(&circuit, drop).running(0.0).ok()?;
    if found.valley_a < 0.0 && chance.unit() < 0.7 {
        let peak_a = discontinuous_peak_a(&circuit, |_| drop).ok()?;
        return discontinuous(&circuit, drop, peak_a).ok();
    }
    Some(found)
}

/// A figure of a bank made a little greater.
type Raise = fn(&mut SwitchBank, f64);

#[test]
fn switching_losses_grow_with_each_charge_and_resistance() {
    let raises: [(&str, Raise); 2] = [
        ("gate resistance", |bank, by| bank.gate_resistance_ohm *= by),
        ("gate capacitance", |bank, by| bank.gate_capacitance_f *= by),
    ];
    let mut compared = 0;
    each(0..600, 2, |problem, stage, seed| {
        let mut chance = Chance::new(seed);
        let Some(currents) = currents(problem, &mut chance) else { return };
        let conditions = Conditions::of(&problem.rail);
        let bank =
            problem.parts.switches[stage.high_switch.index].bank(stage.high_switch.count, &conditions.surroundings());
        let drive = GateDrive {
            gate_v: conditions.gate_v,
            pull_up_ohm: conditions.pull_up_ohm,
            pull_down_ohm: conditions.pull_down_ohm,
        };
        let input_v = conditions.inputs_v[0];
        let node = Node {
            input_v,
            swing_v: input_v - conditions.output_v,
            own_at_input_c: bank.charge_at_input_c[0],
            rectifier_at_input_c: 5e-9,
            own_at_swing_c: bank.charge_at_swing_c[0],
            rectifier_at_swing_c: 4e-9,
            recovery_c: 8e-9,
        };
        let (l, f) = (10e-6, 500e3);
        let Ok([overlap, charge, recovery]) = switching_w(&bank, &drive, &node, &currents, l, f) else { return };
        compared += 1;
        let by = chance.scale(1.01, 3.0);
        for (name, raise) in raises {
            let mut raised = bank.clone();
            raise(&mut raised, by);
            let [more, ..] = switching_w(&raised, &drive, &node, &currents, l, f).expect("the plateau has not moved");
            assert!(more >= overlap, "seed {seed} {name}");
        }
        for (up, down) in [(by, 1.0), (1.0, by)] {
            let slower =
                GateDrive { pull_up_ohm: up * drive.pull_up_ohm, pull_down_ohm: down * drive.pull_down_ohm, ..drive };
            let [more, ..] = switching_w(&bank, &slower, &node, &currents, l, f).expect("the plateau has not moved");
            assert!(more >= overlap, "seed {seed} drive");
        }
        // A greater Miller charge also slows the node, so less of the node's charge flows through the channel at turn-on: there the
        // sum grows for sure only without that charge.
        let slow = SwitchBank { miller_charge_c: by * bank.miller_charge_c, ..bank.clone() };
        let edges =
            |bank: &SwitchBank, node_c| overlap_j(bank, &drive, input_v, node_c, currents.valley_a, currents.peak_a);
        let (bare, slow_bare) = (edges(&bank, 0.0).expect("runs"), edges(&slow, 0.0).expect("runs"));
        assert!(slow_bare.0 >= bare.0 && slow_bare.1 > bare.1, "seed {seed} Miller charge");
        let full_c = node.own_at_input_c;
        assert!(
            edges(&slow, full_c).expect("runs").1 >= edges(&bank, full_c).expect("runs").1,
            "seed {seed} Miller charge"
        );
        // The node's charge burdens the turn-on and relieves the turn-off.
        let node_c = node.own_at_input_c + node.rectifier_at_input_c;
        let (on_j, off_j) =
            overlap_j(&bank, &drive, input_v, node_c, currents.valley_a, currents.peak_a).expect("runs");
        let (more_j, less_j) =
            overlap_j(&bank, &drive, input_v, by * node_c, currents.valley_a, currents.peak_a).expect("runs");
        assert!(more_j >= on_j && less_j <= off_j, "seed {seed} node");
        let reversed = currents.valley_a < 0.0;
        for (name, raised) in [
            (
                "own",
                Node { own_at_input_c: by * node.own_at_input_c, own_at_swing_c: by * node.own_at_swing_c, ..node },
            ),
            (
                "rectifier",
                Node {
                    rectifier_at_input_c: by * node.rectifier_at_input_c,
                    rectifier_at_swing_c: by * node.rectifier_at_swing_c,
                    ..node
                },
            ),
        ] {
            let [_, more, _] = switching_w(&bank, &drive, &raised, &currents, l, f).expect("the plateau has not moved");
            assert!(if reversed { more >= charge } else { more > charge }, "seed {seed} {name} charge");
        }
        let raised = Node { recovery_c: by * node.recovery_c, ..node };
        let [_, _, more] = switching_w(&bank, &drive, &raised, &currents, l, f).expect("the plateau has not moved");
        assert!(more > recovery || (more == 0.0 && recovery == 0.0), "seed {seed} recovery");
        // Both edges grow with the current they switch.
        let (more_j, _) = overlap_j(&bank, &drive, input_v, node_c, currents.peak_a, currents.peak_a).expect("runs");
        assert!(more_j >= on_j, "seed {seed} turn-on");
    });
    assert!(compared > 300, "only {compared} compared");
}

#[test]
fn other_losses_grow_with_their_own_figure() {
    each(0..400, 2, |problem, stage, seed| {
        let mut chance = Chance::new(seed);
        let Some(currents) = currents(problem, &mut chance) else { return };
        let conditions = Conditions::of(&problem.rail);
        let bank = problem.parts.switches[stage.high_switch.index].bank(1, &conditions.surroundings());
        let choke = problem.parts.inductors[stage.inductor].choke(5e5, [1.0].into_iter());
        let by = chance.scale(1.001, 3.0);
        let grows = |name: &str, law: &dyn Fn(f64) -> f64| {
            let (now, more) = (law(1.0), law(by));
            assert!(more > now && now >= 0.0, "seed {seed} {name}: {more} after {now}");
        };
        grows("body drop", &|x| {
            let raised = SwitchBank { body_drop_v: x * bank.body_drop_v, ..bank.clone() };
            rectifier::dead_time_w(&raised, &currents, 20e-9, 5e5)
        });
        grows("dead time", &|x| rectifier::dead_time_w(&bank, &currents, x * 20e-9, 5e5));
        grows("threshold", &|x| rectifier::diode_conduction_w(x * 0.4, 0.02, &currents));
        grows("slope resistance", &|x| rectifier::diode_conduction_w(0.4, x * 0.02, &currents));
        grows("leakage", &|x| rectifier::leakage_w(12.0, x * 1e-5, currents.duty));
        grows("winding", &|x| inductor::winding_w(x * 0.01, 0.02, 1.0, &currents)[0]);
        grows("winding to ripple", &|x| inductor::winding_w(0.01, x * 0.02, 0.0, &currents)[1]);
        grows("high gate", &|x| {
            let raised = SwitchBank { gate_charge_c: x * bank.gate_charge_c, ..bank.clone() };
            drive::drive_w(&raised, None, 1e-3, 5.0, 5e5).high_gate
        });
        grows("rectifier gate", &|x| {
            let raised = SwitchBank { gate_charge_c: x * bank.gate_charge_c, miller_charge_c: 0.0, ..bank.clone() };
            drive::drive_w(&bank, Some(&raised), 1e-3, 5.0, 5e5).rectifier_gate
        });
        grows("bias", &|x| drive::drive_w(&bank, None, x * 1e-3, 5.0, 5e5).bias);
        grows("supply", &|x| drive::drive_w(&bank, Some(&bank), 1e-3, x * 5.0, 5e5).total_w());
        grows("on-resistance", &|x| thermal::rising_w(x * 0.1, 0.005, 80.0));
        if choke.core.is_some() {
            grows("core", &|x| {
                let core = choke.core.map(|core| wattsieve::part::choke::CoreLaw { scale: x * core.scale, ..core });
                inductor::core_w(&wattsieve::part::Choke { core, ..choke.clone() }, &currents)
            });
        }
        grows("heat", &|x| thermal::linear_c(0.0, x * 10.0, 0.1, 0.1, 0.005).expect("a fixed point"));
        grows("step over resistance", &|x| step::deviation_v(12.0, 3.3, 10e-6, 1e-5, x * 0.05, 2.0, Some(6e4)));
        grows("step over inductance", &|x| step::deviation_v(12.0, 3.3, x * 10e-6, 1e-5, 0.001, 2.0, None));
        grows("input ripple over resistance", &|x| {
            let bank = problem.parts.capacitors[0].bank(1, 5e5, [5.0; 3]);
            let raised = wattsieve::part::Bank { esr_ohm: x * bank.esr_ohm, ..bank };
            ripple::input_v(&currents, 5e5, &raised, 1e-5)
        });
    });
}
