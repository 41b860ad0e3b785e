//! The account against a plain reading of the model's equations.

use wattsieve::account::{Mode, account};
use wattsieve::limit::LimitName;
use wattsieve::model::Conditions;
use wattsieve::part::{Capacitor, CapacitorKind, Inductor};
use wattsieve::rail::Rail;
use wattsieve::stage::{Choice, Stage};

use crate::draw::{close, each, losses};
use crate::plain::{self, Numbers, Outcome, Spread, TYPICAL};
use crate::problem::Problem;

#[test]
fn every_figure_of_every_point_is_that_of_a_plain_reading() {
    let mut count = std::collections::BTreeMap::new();
    each(2_000..3_000, 4, |problem, stage, seed| {
        let (rail, parts) = (&problem.rail, &problem.parts);
        let account = account(rail, parts, stage);
        for point in &account.points {
            let expected = plain::solve(rail, parts, stage, point.input_v, point.load_a, TYPICAL);
            let mode = match expected {
                Outcome::Runs(ref numbers) if numbers.continuous => Mode::Continuous,
                Outcome::Runs(_) => Mode::Discontinuous,
                Outcome::Dropout => Mode::Dropout,
                Outcome::Runaway => Mode::Runaway,
                Outcome::Underdriven => Mode::Underdriven,
                Outcome::Undecided => {
                    *count.entry("undecided".to_owned()).or_insert(0) += 1;
                    continue;
                }
            };
            *count.entry(format!("{mode:?}")).or_insert(0) += 1;
            assert_eq!(point.mode, mode, "seed {seed} {stage:?} {point:?}");
            let (Outcome::Runs(numbers), Some(reading)) = (expected, &point.reading) else { continue };
            let same = |name: &str, found: f64, expected: f64, floor: f64| {
                assert!(close(found, expected, 1e-8, floor), "seed {seed} {name}: {found}, not {expected}; {stage:?}");
            };
            same("duty", reading.duty, numbers.duty, 0.0);
            same("ripple", reading.ripple_a, numbers.ripple_a, 0.0);
            same("peak", reading.peak_a, numbers.peak_a, 0.0);
            same("valley", reading.valley_a, numbers.valley_a, numbers.peak_a);
            let (found, expected) = (&reading.rms_a, &numbers.rms);
            same("high switch rms", found.high_switch, expected.high_switch, 0.0);
            same("rectifier rms", found.rectifier, expected.rectifier, 0.0);
            same("inductor rms", found.inductor, expected.inductor, 0.0);
            same("input bank rms", found.input_bank, expected.input_bank, numbers.ripple_a);
            same("output bank rms", found.output_bank, expected.output_bank, numbers.ripple_a);
            let (found, expected) = (&reading.temperature_c, &numbers.temperatures);
            same("high switch temperature", found.high_switch, expected.high_switch, 10.0);
            same("rectifier temperature", found.rectifier, expected.rectifier, 10.0);
            same("winding temperature", found.inductor, expected.inductor, 10.0);
            for ((name, found), (_, expected)) in losses(&reading.losses_w).into_iter().zip(losses(&numbers.losses)) {
                same(name, found, expected, 1e-6);
            }
        }
    });
    for mode in ["Continuous", "Discontinuous", "Dropout", "Runaway", "Underdriven"] {
        assert!(count.get(mode).is_some_and(|&points| points >= 10), "too few points: {count:?}");
    }
    assert!(count.get("undecided").is_none_or(|&points| points < 100), "{count:?}");
}

/// The greatest of a figure over every point, at full load only or at all.
fn greatest(
    problem: &Problem,
    stage: &Stage,
    spread: Spread,
    figure: impl Fn(&Numbers, f64, f64) -> Option<f64>,
) -> Option<f64> {
    let conditions = Conditions::of(&problem.rail);
    let mut greatest: Option<f64> = None;
    for &input_v in &conditions.inputs_v {
        for load in &conditions.loads {
            match plain::solve(&problem.rail, &problem.parts, stage, input_v, load.current_a, spread) {
                Outcome::Runs(numbers) => {
                    let Some(value) = figure(&numbers, input_v, load.current_a) else { continue };
                    greatest = Some(greatest.map_or(value, |found| found.max(value)));
                }
                _ => return None,
            }
        }
    }
    greatest
}

/// Peak to peak of the voltage that a current of straight pieces (from, to, for how long) makes on a capacitance with series
/// resistance and inductance, by looking at very many moments.
fn swing_v(pieces: &[(f64, f64, f64)], capacitance_f: f64, esr_ohm: f64, esl_h: f64) -> f64 {
    const MOMENTS: u32 = 4_000;
    let (mut lo, mut hi, mut charge_c) = (f64::INFINITY, f64::NEG_INFINITY, 0.0);
    for &(from_a, to_a, duration_s) in pieces {
        for k in 0..=MOMENTS {
            let share = f64::from(k) / f64::from(MOMENTS);
            let now_a = from_a + (to_a - from_a) * share;
            let v = (charge_c + (from_a + now_a) / 2.0 * share * duration_s) / capacitance_f
                + esr_ohm * now_a
                + esl_h * (to_a - from_a) / duration_s;
            (lo, hi) = (lo.min(v), hi.max(v));
        }
        charge_c += (from_a + to_a) / 2.0 * duration_s;
    }
    hi - lo
}

fn output_swing_v(numbers: &Numbers, stage: &Stage, load_a: f64, capacitance_f: f64, esr_ohm: f64, esl_h: f64) -> f64 {
    let period_s = 1.0 / stage.frequency_hz;
    let (valley_a, peak_a) = (numbers.valley_a - load_a, numbers.peak_a - load_a);
    let mut pieces = vec![(valley_a, peak_a, numbers.duty * period_s), (peak_a, valley_a, numbers.fall * period_s)];
    if !numbers.continuous {
        pieces.push((-load_a, -load_a, (1.0 - numbers.duty - numbers.fall) * period_s));
    }
    swing_v(&pieces, capacitance_f, esr_ohm, esl_h)
}

fn input_swing_v(numbers: &Numbers, stage: &Stage, capacitance_f: f64, esr_ohm: f64) -> f64 {
    let period_s = 1.0 / stage.frequency_hz;
    let source_a = numbers.duty * (numbers.valley_a + numbers.peak_a) / 2.0;
    let pieces = [
        (source_a - numbers.valley_a, source_a - numbers.peak_a, numbers.duty * period_s),
        (source_a, source_a, (1.0 - numbers.duty) * period_s),
    ];
    swing_v(&pieces, capacitance_f, esr_ohm, 0.0)
}

fn step_v(rail: &Rail, inductor: &Inductor, capacitance_f: f64, esr_ohm: f64) -> Option<f64> {
    let jump = rail.output.step?;
    let (di, vo) = (jump.current_a.get(), rail.output.voltage_v.get());
    let at_load = inductor.inductance_h.linear_held(rail.output.current_a.get());
    let l = at_load * (1.0 + plain::tolerance(inductor.tolerance, 0.2));
    let mut greatest: f64 = 0.0;
    for volts in [rail.input.minimum_v.get() - vo, vo] {
        let m = volts / l;
        let t = di / m - esr_ohm * capacitance_f;
        let held = di * di / (2.0 * m * capacitance_f) + m * esr_ohm * esr_ohm * capacitance_f / 2.0;
        greatest = greatest.max(if t > 0.0 { held } else { esr_ohm * di });
    }
    if let Some(hz) = jump.crossover_hz {
        greatest = greatest.max(di / (2.0 * std::f64::consts::PI * hz.get() * capacitance_f) + esr_ohm * di);
    }
    Some(greatest)
}

#[test]
fn every_value_beside_a_limit_is_that_of_a_plain_reading() {
    let mut count = std::collections::BTreeMap::new();
    each(3_000..3_300, 3, |problem, stage, seed| {
        let (rail, parts) = (&problem.rail, &problem.parts);
        let inductor = &parts.inductors[stage.inductor];
        let band = plain::tolerance(inductor.tolerance, 0.2);
        let low = Spread { worst: false, inductance_factor: 1.0 - band };
        let worst = Spread { worst: true, inductance_factor: 1.0 };
        // Where a variant does not run, the rest of its point is not judged.
        if [TYPICAL, low, worst].iter().any(|spread| greatest(problem, stage, *spread, |_, _, _| Some(0.0)).is_none()) {
            return;
        }
        let of = |spread, figure: &dyn Fn(&Numbers, f64, f64) -> Option<f64>| greatest(problem, stage, spread, figure);
        let full_load_a = rail.output.current_a.get();
        let beyond_a = (rail.output.peak_a.get() - full_load_a).max(0.0);
        let peak = |numbers: &Numbers, load_a: f64| numbers.peak_a + if load_a == full_load_a { beyond_a } else { 0.0 };
        let bank = |choice: Choice| (&parts.capacitors[choice.index], f64::from(choice.count));
        let least_f = |capacitor: &Capacitor, n: f64, v: f64| {
            let band = if capacitor.kind == CapacitorKind::Ceramic { 0.1 } else { 0.2 };
            n * plain::capacitance(capacitor, v) * (1.0 - plain::tolerance(capacitor.tolerance, band))
        };
        let ((input, ni), (output, no)) = (bank(stage.input_bank), bank(stage.output_bank));
        let (input_ohm, output_ohm) =
            (plain::esr(input, stage.frequency_hz) / ni, plain::esr(output, stage.frequency_hz) / no);
        let output_f = least_f(output, no, rail.output.voltage_v.get());
        let esl_h = output.esl_h.map_or(0.0, |l| l.get()) / no;
        let (nh, nr) = (f64::from(stage.high_switch.count), f64::from(stage.rectifier.count));
        let sharing = if stage.rectifier.count > 1 { 1.3 } else { 1.0 };
        let period_s = 1.0 / stage.frequency_hz;
        for row in &account(rail, parts, stage).limits {
            let expected = match (row.limit, row.slot) {
                (LimitName::Junction, "high_switch") => of(worst, &|n, _, _| Some(n.temperatures.high_switch)),
                (LimitName::Junction, _) => of(worst, &|n, _, _| Some(n.temperatures.rectifier)),
                (LimitName::Winding, _) => of(worst, &|n, _, _| Some(n.temperatures.inductor)),
                (LimitName::SwitchCurrent, "high_switch") => of(low, &|n, _, load_a| Some(peak(n, load_a) / nh)),
                (LimitName::SwitchCurrent, _) => of(low, &|n, _, load_a| Some(peak(n, load_a) / nr)),
                (LimitName::RectifierCurrent, _) => of(TYPICAL, &|n, _, _| Some(n.rectifier_mean_a / nr * sharing)),
                (LimitName::CapacitorCurrent, "input_bank") => of(TYPICAL, &|n, _, _| Some(n.rms.input_bank / ni)),
                (LimitName::CapacitorCurrent, _) => of(TYPICAL, &|n, _, _| Some(n.rms.output_bank / no)),
                (LimitName::MinimumOn, _) => {
                    of(TYPICAL, &|n, _, _| n.continuous.then_some(-n.duty * period_s)).map(|least| -least)
                }
                (LimitName::MinimumOff, _) => {
                    of(TYPICAL, &|n, _, _| n.continuous.then_some((n.duty - 1.0) * period_s)).map(|least| -least)
                }
                (LimitName::OutputRipple, _) => {
                    of(low, &|n, _, load_a| Some(output_swing_v(n, stage, load_a, output_f, output_ohm, esl_h)))
                }
                (LimitName::InputRipple, _) => {
                    of(TYPICAL, &|n, input_v, _| Some(input_swing_v(n, stage, least_f(input, ni, input_v), input_ohm)))
                }
                (LimitName::LoadStep, _) => step_v(rail, inductor, output_f, output_ohm),
                (LimitName::DriveCurrent, _) => Some(plain::supply_a(rail, parts, stage)),
                (LimitName::DeadTime, slot) => {
                    let (high, choice) = match slot {
                        "high_switch" => (true, stage.high_switch),
                        _ => (false, stage.rectifier),
                    };
                    Some(plain::turn_off_s(&parts.switches[choice.index], choice.count, rail, high))
                }
                _ => continue,
            };
            let (Some(expected), Some(found)) = (expected, row.value) else { continue };
            *count.entry(row.limit).or_insert(0) += 1;
            let (share, floor) = match row.limit {
                // Looking at moments misses the turning point by up to a millionth of the swing.
                LimitName::OutputRipple | LimitName::InputRipple => (1e-6, 0.0),
                LimitName::Junction | LimitName::Winding => (1e-8, 10.0),
                _ => (1e-8, 0.0),
            };
            assert!(close(found, expected, share, floor), "seed {seed} {row:?}: {expected} expected");
        }
    });
    let rows = [
        LimitName::Junction,
        LimitName::Winding,
        LimitName::SwitchCurrent,
        LimitName::RectifierCurrent,
        LimitName::CapacitorCurrent,
        LimitName::MinimumOn,
        LimitName::MinimumOff,
        LimitName::OutputRipple,
        LimitName::InputRipple,
        LimitName::LoadStep,
        LimitName::DeadTime,
        LimitName::DriveCurrent,
    ];
    for limit in rows {
        assert!(count.get(&limit).is_some_and(|&rows| rows >= 20), "too few rows: {count:?}");
    }
}

#[test]
fn the_ripples_of_every_point_are_those_of_a_plain_reading() {
    each(3_400..3_500, 3, |problem, stage, seed| {
        let (rail, parts) = (&problem.rail, &problem.parts);
        for point in account(rail, parts, stage).points {
            let Some(reading) = point.reading else { continue };
            let Outcome::Runs(n) = plain::solve(rail, parts, stage, point.input_v, point.load_a, TYPICAL) else {
                continue;
            };
            let bank = |choice: Choice, bias_v: f64| {
                let (capacitor, count) = (&parts.capacitors[choice.index], f64::from(choice.count));
                let esr_ohm = plain::esr(capacitor, stage.frequency_hz) / count;
                let esl_h = capacitor.esl_h.map_or(0.0, |l| l.get()) / count;
                (count * plain::capacitance(capacitor, bias_v), esr_ohm, esl_h)
            };
            let (c, esr_ohm, esl_h) = bank(stage.output_bank, rail.output.voltage_v.get());
            let expected_v = output_swing_v(&n, stage, point.load_a, c, esr_ohm, esl_h);
            assert!(close(reading.output_ripple_v, expected_v, 1e-6, 0.0), "seed {seed} {expected_v} {reading:?}");
            let (c, esr_ohm, _) = bank(stage.input_bank, point.input_v);
            let expected_v = input_swing_v(&n, stage, c, esr_ohm);
            assert!(close(reading.input_ripple_v, expected_v, 1e-6, 0.0), "seed {seed} {expected_v} {reading:?}");
        }
    });
}

#[test]
fn the_point_of_a_limit_is_where_its_value_is_found() {
    let mut compared = std::collections::BTreeSet::new();
    each(3_500..3_600, 3, |problem, stage, seed| {
        let (rail, parts) = (&problem.rail, &problem.parts);
        let account = account(rail, parts, stage);
        for row in &account.limits {
            let (Some(index), Some(value)) = (row.point, row.value) else { continue };
            let worst = Spread { worst: true, inductance_factor: 1.0 };
            let Some(point) = account.points.get(index) else { panic!("seed {seed} {row:?}") };
            let Outcome::Runs(n) = plain::solve(rail, parts, stage, point.input_v, point.load_a, worst) else {
                continue;
            };
            let expected = match (row.limit, row.slot) {
                (LimitName::Junction, "high_switch") => n.temperatures.high_switch,
                (LimitName::Junction, _) => n.temperatures.rectifier,
                (LimitName::Winding, _) => n.temperatures.inductor,
                _ => continue,
            };
            compared.insert(index);
            assert!(close(value, expected, 1e-8, 10.0), "seed {seed} {row:?}: {expected} expected");
        }
    });
    assert!(compared.len() >= 6, "only at {compared:?}");
}
