//! Power stages in periodic steady state against a general circuit simulator (ngspice-39): `data/buck_stage.csv`, through the
//! account. What the circuits lack (switching, gates, node charge, core loss, heat) is made too small to count.
//!
//! To judge cases that are not in the repository, name a file of the same columns in the environment variable
//! `WATTSIEVE_STAGE_CASES`.

use crate::table::{Row, rows, within};
use wattsieve::account::{Mode, account};
use wattsieve::part::{
    Capacitor, CapacitorKind, Curve, Diode, DiodeKind, GateLevels, Heating, HotRatio, Identity, Inductor, Parts, Switch,
};
use wattsieve::quantity::{NonNegative, Positive};
use wattsieve::rail::{Rail, read};
use wattsieve::stage::{Choice, RectifierKind, Stage};

/// How far the closed forms may be off: the model's published widths against these circuits (straight ramps, drops at the load
/// current, dead time that bends the triangle).
const DUTY: f64 = 0.007;
const RMS: f64 = 0.012;
const OUTPUT_RMS: f64 = 0.032;
const LOSS: f64 = 0.0035;
/// The same where the valley current is reversed, and the node stays up during the dead time before turn-on.
const REVERSED_DUTY: f64 = 0.12;
const REVERSED_LOSS: f64 = 0.02;

const NIL: f64 = 1e-18;

fn positive(value: f64) -> Positive {
    Positive::new(value).expect("a positive number")
}

fn curve(x: f64, y: f64) -> Curve {
    Curve::new(vec![(x, y)]).expect("a curve")
}

fn named(part: &str) -> Identity {
    Identity { part: part.to_owned(), ..Identity::default() }
}

fn switch(part: &str, resistance_ohm: f64, body_drop_v: f64) -> Switch {
    Switch {
        identity: named(part),
        voltage_rating_v: positive(1000.0),
        on_resistance_ohm: curve(10.0, resistance_ohm),
        on_resistance_max_ohm: None,
        gate_charge_c: curve(10.0, 3.0 * NIL),
        gate_drain_charge_c: positive(NIL),
        gate_source_charge_c: None,
        gate_levels: GateLevels::new(None, None).expect("levels"),
        plateau_current_a: Some(positive(1e6)),
        gate_resistance_ohm: NonNegative::new(0.0),
        output_charge_c: Some(curve(12.0, NIL)),
        recovery_charge_c: NonNegative::new(0.0),
        body_diode_drop_v: Some(positive(body_drop_v)),
        hot_resistance: HotRatio::new(positive(1.0), 125.0),
        current_rating_a: None,
        gate_rating_v: None,
        junction_limit_c: None,
        thermal_resistance_k_per_w: positive(1e-9),
    }
}

fn capacitor(part: &str, capacitance_f: f64, esr_ohm: f64) -> Capacitor {
    Capacitor {
        identity: named(part),
        kind: CapacitorKind::Polymer,
        capacitance_f: curve(0.0, capacitance_f),
        tolerance: None,
        voltage_rating_v: positive(1000.0),
        esr_ohm: curve(100e3, esr_ohm),
        esl_h: None,
        ripple_current_a: None,
    }
}

fn parts(row: &Row) -> Parts {
    let (threshold_v, slope_ohm) = (row.number("diode_threshold_v"), row.number("diode_resistance_ohm"));
    let load_a = row.number("load_a");
    let low_ohm = row.number("low_switch_resistance_ohm").max(NIL);
    Parts {
        switches: vec![
            switch("high", row.number("high_switch_resistance_ohm"), 0.8),
            switch("low", low_ohm, (threshold_v + slope_ohm * load_a).max(NIL)),
        ],
        diodes: vec![Diode {
            identity: named("diode"),
            kind: DiodeKind::Schottky,
            voltage_rating_v: positive(1000.0),
            current_rating_a: positive(1000.0),
            forward_drop_v: Curve::new(vec![(1.0, threshold_v + slope_ohm), (10.0, threshold_v + 10.0 * slope_ohm)])
                .expect("a curve"),
            drop_slope_v_per_k: Some(0.0),
            leakage_a: None,
            junction_charge_c: None,
            recovery_charge_c: None,
            junction_limit_c: None,
            thermal_resistance_k_per_w: positive(1e-9),
        }],
        inductors: vec![Inductor {
            identity: named("inductor"),
            inductance_h: curve(0.0, row.number("inductance_h")),
            tolerance: None,
            dcr_ohm: positive(row.number("inductor_dcr_ohm")),
            dcr_max_ohm: None,
            saturation_current_a: curve(25.0, 1e6),
            heating: Some(Heating { current_a: positive(1e6), rise_k: None }),
            core: None,
            ac_resistance_ohm: None,
        }],
        capacitors: vec![
            capacitor("input", row.number("input_capacitance_f"), row.number("input_esr_ohm")),
            capacitor("output", row.number("output_capacitance_f"), row.number("output_esr_ohm")),
        ],
    }
}

fn rail(row: &Row) -> Rail {
    let light_load = if row.text("rectifier") == "switch" { "forced" } else { "emulated" };
    let text = format!(
        "name = \"{}\"\ninput.voltage = \"{} V\"\noutput = {{ voltage = \"{} V\", current = \"{} A\" }}\n\
         ambient.temperature = 25\n\
         drive = {{ voltage = \"10 V\", dead_time = \"{} s\", supply = 1.0 }}\nstage.light_load = \"{light_load}\"\n",
        row.text("case"),
        row.text("input_v"),
        row.text("output_v"),
        row.text("load_a"),
        row.text("dead_time_s"),
    );
    read("case.toml", &text).unwrap_or_else(|faults| panic!("{}", faults.render(false))).rail
}

fn check(row: &Row) {
    let case = row.text("case");
    let diode = row.text("rectifier") == "diode";
    let one = |index| Choice { index, count: 1 };
    let stage = Stage {
        frequency_hz: row.number("frequency_hz"),
        high_switch: one(0),
        rectifier_kind: if diode { RectifierKind::Diode } else { RectifierKind::Switch },
        rectifier: one(usize::from(!diode)),
        inductor: 0,
        input_bank: one(0),
        output_bank: one(1),
    };
    let account = account(&rail(row), &parts(row), &stage);
    let [point] = account.points.as_slice() else { panic!("{case}: one point") };
    let reading = point.reading.unwrap_or_else(|| panic!("{case}: {:?}", point.mode));
    let expected_mode = if row.text("mode") == "continuous" { Mode::Continuous } else { Mode::Discontinuous };
    assert_eq!(point.mode, expected_mode, "{case}");
    let compare = |what: &str, found, column: &str, share| {
        within(&format!("{case} {what}"), found, row.number(column), share);
    };
    if row.number("inductor_valley_a") < -0.01 * row.number("load_a") {
        compare("duty", reading.duty, "duty", REVERSED_DUTY);
        compare("loss", reading.loss_w, "total_loss_w", REVERSED_LOSS);
        return;
    }
    compare("duty", reading.duty, "duty", DUTY);
    compare("high switch rms", reading.rms_a.high_switch, "high_rms_a", RMS);
    compare("inductor rms", reading.rms_a.inductor, "inductor_rms_a", RMS);
    compare("input bank rms", reading.rms_a.input_bank, "input_bank_rms_a", RMS);
    compare("output bank rms", reading.rms_a.output_bank, "output_bank_rms_a", OUTPUT_RMS);
    compare("loss", reading.loss_w, "total_loss_w", LOSS);
    // Efficiency is off by the error of the loss, scaled by its share of the input.
    compare("efficiency", reading.efficiency, "efficiency", LOSS * (1.0 - row.number("efficiency")) * 1.01);
}

#[test]
fn stage_cases() {
    let rows = rows(include_str!("data/buck_stage.csv"));
    assert_eq!(rows.len(), 13);
    rows.iter().for_each(check);
}

#[test]
fn further_stage_cases() {
    if let Ok(path) = std::env::var("WATTSIEVE_STAGE_CASES") {
        let text = std::fs::read_to_string(&path).expect("the file that WATTSIEVE_STAGE_CASES names");
        rows(&text).iter().for_each(check);
    }
}
