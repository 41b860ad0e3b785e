//! What goes in comes out or is lost, and every part is as hot as its losses make it.

use wattsieve::account::{Mode, account};
use wattsieve::part::{Inductor, Parts};
use wattsieve::stage::{RectifierKind, Stage};

use crate::draw::{close, each, losses};

#[test]
fn input_power_is_output_power_and_every_loss() {
    let mut running = 0;
    each(0..400, 6, |problem, stage, seed| {
        let account = account(&problem.rail, &problem.parts, stage);
        let (mut output_w, mut input_w, mut loss_w) = (0.0, 0.0, 0.0);
        for point in &account.points {
            let Some(reading) = &point.reading else {
                assert!(!matches!(point.mode, Mode::Continuous | Mode::Discontinuous), "seed {seed}");
                continue;
            };
            running += 1;
            let each = losses(&reading.losses_w);
            for (name, loss) in each {
                assert!(
                    loss.is_finite() && (loss >= 0.0 || name == "rectifier conduction"),
                    "seed {seed} {name} {loss}"
                );
            }
            let sum_w: f64 = each.iter().map(|(_, loss)| loss).sum();
            assert!(close(reading.loss_w, sum_w, 1e-13, 0.0), "seed {seed}");
            let point_output_w = problem.rail.output.voltage_v.get() * point.load_a;
            let point_input_w = point_output_w / reading.efficiency;
            assert!(close(point_input_w, point_output_w + sum_w, 1e-13, 0.0), "seed {seed}");
            output_w += point.share * point_output_w;
            input_w += point.share * point_input_w;
            loss_w += point.share * reading.loss_w;
        }
        if let (Some(weighted_loss_w), Some(efficiency)) = (account.weighted_loss_w, account.weighted_efficiency) {
            assert!(close(weighted_loss_w, loss_w, 1e-12, 0.0), "seed {seed}");
            assert!(close(efficiency, output_w / input_w, 1e-12, 0.0), "seed {seed}");
        }
    });
    assert!(running > 5_000, "only {running} points run");
}

fn winding_k_per_w(inductor: &Inductor) -> f64 {
    inductor.thermal_k_per_w()
}

fn thermal_k_per_w(parts: &Parts, stage: &Stage) -> [f64; 3] {
    let (nh, nr) = (f64::from(stage.high_switch.count), f64::from(stage.rectifier.count));
    let rectifier = match stage.rectifier_kind {
        RectifierKind::Switch => parts.switches[stage.rectifier.index].thermal_resistance_k_per_w,
        RectifierKind::Diode => parts.diodes[stage.rectifier.index].thermal_resistance_k_per_w,
    };
    [
        parts.switches[stage.high_switch.index].thermal_resistance_k_per_w.get() / nh,
        rectifier.get() / nr,
        winding_k_per_w(&parts.inductors[stage.inductor]),
    ]
}

#[test]
fn every_temperature_is_ambient_and_the_heat_of_its_losses() {
    let mut running = 0;
    each(1_000..1_800, 6, |problem, stage, seed| {
        let account = account(&problem.rail, &problem.parts, stage);
        for reading in account.points.iter().filter_map(|point| point.reading.as_ref()) {
            running += 1;
            let thermal = thermal_k_per_w(&problem.parts, stage);
            let losses_w = &reading.losses_w;
            let found = &reading.temperature_c;
            for (t, rth, loss_w) in [
                (found.high_switch, thermal[0], losses_w.high_switch.total_w()),
                (found.rectifier, thermal[1], losses_w.rectifier.total_w()),
                (found.inductor, thermal[2], losses_w.inductor.total_w()),
            ] {
                let rise_k = rth * loss_w;
                let expected_c = problem.rail.ambient_c + rise_k;
                assert!((t - expected_c).abs() <= 1e-9 * rise_k.abs().max(1.0), "seed {seed} {t} {expected_c}");
            }
        }
    });
    assert!(running > 10_000, "only {running} points run");
}
