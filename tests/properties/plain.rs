//! A plain reading of the loss model: its equations one by one, from typed parts to watts, without a line of the program's own
//! part laws, currents, losses or fixed points. Slow and simple, so that it can be checked by eye.

use wattsieve::account::{
    BankLosses, DriveLosses, HighSwitchLosses, InductorLosses, Losses, RectifierLosses, RmsCurrents, Temperatures,
};
use wattsieve::part::{Capacitor, CapacitorKind, Curve, Diode, DiodeKind, Inductor, Parts, Switch};
use wattsieve::rail::{LightLoad, Rail, Supply};
use wattsieve::stage::{RectifierKind, Stage};

/// What comes of a point.
#[derive(Debug, Clone, PartialEq)]
pub enum Outcome {
    /// It runs.
    Runs(Box<Numbers>),
    /// The input is too low already at ambient.
    Dropout,
    /// No fixed point up to 500 °C.
    Runaway,
    /// The gate supply does not reach the plateau.
    Underdriven,
    /// So near to runaway, or between two modes, that this reading does not settle.
    Undecided,
}

/// A running point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Numbers {
    pub continuous: bool,
    pub duty: f64,
    pub fall: f64,
    pub ripple_a: f64,
    pub peak_a: f64,
    pub valley_a: f64,
    pub rectifier_mean_a: f64,
    pub losses: Losses,
    pub rms: RmsCurrents,
    pub temperatures: Temperatures,
}

/// Which parts of the spread are taken.
#[derive(Debug, Clone, Copy)]
pub struct Spread {
    pub worst: bool,
    pub inductance_factor: f64,
}

pub const TYPICAL: Spread = Spread { worst: false, inductance_factor: 1.0 };

/// A straight line through the two points nearest to `x`, in the coordinates that `to_x` and `to_y` make.
fn line(points: &[(f64, f64)], x: f64, to_x: fn(f64) -> f64, to_y: fn(f64) -> f64) -> f64 {
    let mut k = 0;
    while k + 2 < points.len() && x > points[k + 1].0 {
        k += 1;
    }
    let ((xa, ya), (xb, yb)) = (points[k], points[k + 1]);
    to_y(ya) + (to_y(yb) - to_y(ya)) * (to_x(x) - to_x(xa)) / (to_x(xb) - to_x(xa))
}

fn same(x: f64) -> f64 {
    x
}

fn held(curve: &Curve, x: f64) -> f64 {
    let (first, last) = (curve.points()[0], curve.points()[curve.points().len() - 1]);
    x.max(first.0).min(last.0)
}

fn linear(curve: &Curve, x: f64) -> f64 {
    if curve.points().len() == 1 { curve.points()[0].1 } else { line(curve.points(), x, same, same) }
}

fn log_log(curve: &Curve, x: f64) -> f64 {
    if curve.points().len() == 1 { curve.points()[0].1 } else { line(curve.points(), x, f64::ln, f64::ln).exp() }
}

fn by_reciprocal(curve: &Curve, x: f64) -> f64 {
    if curve.points().len() == 1 {
        curve.points()[0].1
    } else {
        line(curve.points(), held(curve, x), |x| 1.0 / x, same)
    }
}

/// A charge over voltage: log-log between points, ∝ √V from the nearest point outside.
fn charge(curve: &Curve, v: f64) -> f64 {
    let nearest_v = held(curve, v);
    log_log(curve, nearest_v) * (v / nearest_v).sqrt()
}

fn on_resistance(switch: &Switch, gate_v: f64, worst: bool) -> f64 {
    let typical = by_reciprocal(&switch.on_resistance_ohm, gate_v);
    match &switch.on_resistance_max_ohm {
        Some(greatest) if worst => {
            let lowest_v = greatest.points()[0].0;
            if gate_v < lowest_v {
                typical * greatest.points()[0].1 / by_reciprocal(&switch.on_resistance_ohm, lowest_v)
            } else {
                by_reciprocal(greatest, gate_v)
            }
        }
        _ => typical,
    }
}

fn gate_charge(switch: &Switch, gate_v: f64) -> f64 {
    let points = switch.gate_charge_c.points();
    if points.len() > 1 {
        return linear(&switch.gate_charge_c, gate_v);
    }
    let ((v0, q0), plateau_v) = (points[0], switch.gate_levels.plateau_v());
    match switch.gate_source_charge_c {
        Some(qgs) if v0 > plateau_v => {
            q0 + (q0 - qgs.get() - switch.gate_drain_charge_c.get()) / (v0 - plateau_v) * (gate_v - v0)
        }
        _ => q0 * gate_v / v0,
    }
}

fn output_charge(switch: &Switch, gate_v: f64, v: f64) -> f64 {
    match &switch.output_charge_c {
        Some(curve) => charge(curve, v),
        None => gate_charge(switch, gate_v) * (v / 12.0).sqrt(),
    }
}

/// Qgs2.
fn post_threshold(switch: &Switch) -> f64 {
    match switch.gate_source_charge_c {
        Some(qgs) => qgs.get() * (1.0 - switch.gate_levels.threshold_v() / switch.gate_levels.plateau_v()),
        None => switch.gate_drain_charge_c.get() / 3.0,
    }
}

fn alpha(switch: &Switch) -> f64 {
    switch.hot_resistance.map_or(0.005, |hot| hot.coefficient_per_k())
}

/// Time from the turn-off command to an open channel, s.
pub fn turn_off_s(switch: &Switch, count: u32, rail: &Rail, high: bool) -> f64 {
    let n = f64::from(count);
    let gate_v = rail.drive.voltage_v.get();
    let (vth, vpl) = (switch.gate_levels.threshold_v(), switch.gate_levels.plateau_v());
    let (qgs2, qgd) = (post_threshold(switch), switch.gate_drain_charge_c.get());
    let qgs = switch.gate_source_charge_c.map_or(3.0 * qgs2, |q| q.get());
    let over = (gate_charge(switch, gate_v) - qgd - qgs).max(0.0);
    let ohm = rail.drive.pull_down_ohm.get() + switch.gate_resistance_ohm.map_or(1.0, |r| r.get()) / n;
    let miller = if high { qgd / vpl } else { 0.0 };
    ohm * n * (2.0 * over / (gate_v + vpl) + miller + qgs2 / ((vth + vpl) / 2.0))
}

/// Current that the gate supply must give, A.
pub fn supply_a(rail: &Rail, parts: &Parts, stage: &Stage) -> f64 {
    let gate_v = rail.drive.voltage_v.get();
    let charge_c = |choice: wattsieve::stage::Choice, with_miller: bool| {
        let switch = &parts.switches[choice.index];
        let miller_c = if with_miller { 0.0 } else { switch.gate_drain_charge_c.get() };
        (f64::from(choice.count) * (gate_charge(switch, gate_v) - miller_c)).max(0.0)
    };
    let rectifier_c = match stage.rectifier_kind {
        RectifierKind::Switch => charge_c(stage.rectifier, false),
        RectifierKind::Diode => 0.0,
    };
    (charge_c(stage.high_switch, true) + rectifier_c) * stage.frequency_hz + rail.drive.bias_a.get()
}

/// V0 and Rd of one diode at 25 °C, by the two points that bracket the current of one.
fn forward(diode: &Diode, current_a: f64) -> (f64, f64) {
    let points = diode.forward_drop_v.points();
    if points.len() == 1 {
        return (points[0].1, 0.0);
    }
    let mut k = 0;
    while k + 2 < points.len() && current_a > points[k + 1].0 {
        k += 1;
    }
    let ohm = (points[k + 1].1 - points[k].1) / (points[k + 1].0 - points[k].0);
    (points[k].1 - ohm * points[k].0, ohm)
}

fn leakage(diode: &Diode, junction_c: f64) -> f64 {
    match &diode.leakage_a {
        None => 0.0,
        Some(curve) if curve.points().len() == 1 => {
            curve.points()[0].1 * 2f64.powf((junction_c - curve.points()[0].0) / 10.0)
        }
        Some(curve) => line(curve.points(), junction_c, same, f64::ln).exp(),
    }
}

fn drop_slope(diode: &Diode) -> f64 {
    diode.drop_slope_v_per_k.unwrap_or(if diode.kind == DiodeKind::Schottky { -0.001 } else { -0.002 })
}

/// Resistance of a winding to alternating current at 25 °C.
fn winding_ac(inductor: &Inductor, frequency_hz: f64, dcr: f64) -> f64 {
    match &inductor.ac_resistance_ohm {
        None => dcr,
        Some(curve) => {
            let nearest_hz = held(curve, frequency_hz);
            let beyond = if frequency_hz > nearest_hz { (frequency_hz / nearest_hz).sqrt() } else { 1.0 };
            (log_log(curve, nearest_hz) * beyond).max(dcr)
        }
    }
}

fn winding_k_per_w(inductor: &Inductor) -> f64 {
    match &inductor.heating {
        None => 40.0,
        Some(heating) => {
            let rise = heating.rise_k.map_or(40.0, |rise| rise.get());
            let i = heating.current_a.get();
            rise / (i * i * inductor.dcr_ohm.get() * (1.0 + 0.003854 * rise))
        }
    }
}

pub fn tolerance(given: Option<wattsieve::quantity::Share>, default: f64) -> f64 {
    given.map_or(default, |share| share.get())
}

/// Capacitance of one at a bias, F.
pub fn capacitance(capacitor: &Capacitor, bias_v: f64) -> f64 {
    let (last_v, last_f) = capacitor.capacitance_f.points()[capacitor.capacitance_f.points().len() - 1];
    if bias_v > last_v && capacitor.kind == CapacitorKind::Ceramic {
        let law = |v: f64| 1.0 / (1.0 + 4.0 * (v / capacitor.voltage_rating_v.get()).powi(2));
        return last_f * law(bias_v) / law(last_v);
    }
    linear(&capacitor.capacitance_f, held(&capacitor.capacitance_f, bias_v))
}

/// ESR of one at a frequency, Ω.
pub fn esr(capacitor: &Capacitor, frequency_hz: f64) -> f64 {
    log_log(&capacitor.esr_ohm, held(&capacitor.esr_ohm, frequency_hz))
}

/// The whole model at one point.
pub fn solve(rail: &Rail, parts: &Parts, stage: &Stage, input_v: f64, load_a: f64, spread: Spread) -> Outcome {
    let ta = rail.ambient_c;
    let mut t = Temperatures { high_switch: ta, rectifier: ta, inductor: ta };
    for step in 0..40_000 {
        let found = at_temperatures(rail, parts, stage, input_v, load_a, spread, t);
        let (numbers, thermal) = match found {
            Step::Runs(numbers, thermal) => (numbers, thermal),
            Step::Dropout => return if step == 0 { Outcome::Dropout } else { Outcome::Runaway },
            Step::Underdriven => return Outcome::Underdriven,
        };
        let target = [
            ta + thermal[0] * numbers.losses.high_switch.total_w(),
            ta + thermal[1] * numbers.losses.rectifier.total_w(),
            ta + thermal[2] * numbers.losses.inductor.total_w(),
        ];
        let moves = [target[0] - t.high_switch, target[1] - t.rectifier, target[2] - t.inductor];
        if moves.iter().all(|moved| moved.abs() <= 1e-10) {
            return Outcome::Runs(numbers);
        }
        // Small steps from below: the first fixed point on the way is not passed.
        let part = 0.3;
        t.high_switch += (part * moves[0]).min(5.0);
        t.rectifier += (part * moves[1]).min(5.0);
        t.inductor += (part * moves[2]).min(5.0);
        if t.high_switch.max(t.rectifier).max(t.inductor) > 500.0 {
            return Outcome::Runaway;
        }
    }
    Outcome::Undecided
}

enum Step {
    Runs(Box<Numbers>, [f64; 3]),
    Dropout,
    Underdriven,
}

fn at_temperatures(
    rail: &Rail,
    parts: &Parts,
    stage: &Stage,
    vin: f64,
    i: f64,
    spread: Spread,
    t: Temperatures,
) -> Step {
    let f = stage.frequency_hz;
    let vo = rail.output.voltage_v.get();
    let full_load = rail.output.current_a.get();
    let vdrv = rail.drive.voltage_v.get();
    let dead_time = rail.drive.dead_time_s.get();
    let high = &parts.switches[stage.high_switch.index];
    let nh = f64::from(stage.high_switch.count);
    let nr = f64::from(stage.rectifier.count);
    let inductor = &parts.inductors[stage.inductor];
    let low = (stage.rectifier_kind == RectifierKind::Switch).then(|| &parts.switches[stage.rectifier.index]);
    let diode = (stage.rectifier_kind == RectifierKind::Diode).then(|| &parts.diodes[stage.rectifier.index]);

    let rh = on_resistance(high, vdrv, spread.worst) / nh * (1.0 + alpha(high) * (t.high_switch - 25.0));
    let dcr25 = if spread.worst { inductor.dcr_max_ohm.unwrap_or(inductor.dcr_ohm) } else { inductor.dcr_ohm }.get();
    let copper = 1.0 + 0.003854 * (t.inductor - 25.0);
    let (dcr, rac) = (dcr25 * copper, winding_ac(inductor, f, dcr25) * copper);
    let l = linear(&inductor.inductance_h, held(&inductor.inductance_h, i)) * spread.inductance_factor;
    let rr =
        low.map_or(0.0, |low| on_resistance(low, vdrv, spread.worst) / nr * (1.0 + alpha(low) * (t.rectifier - 25.0)));
    // V0 and Rd of the whole bank, at a current of the whole bank.
    let drop = |current_a: f64| match diode {
        None => (0.0, rr),
        Some(diode) => {
            let (v0, ohm) = forward(diode, current_a / nr);
            (v0 + drop_slope(diode) * (t.rectifier - 25.0), ohm / nr)
        }
    };
    let vsd = low.map_or(0.0, |low| low.body_diode_drop_v.map_or(0.8, |v| v.get()));
    let dt = if low.is_some() { 2.0 * dead_time * f } else { 0.0 };

    // Continuous conduction.
    let (v0, rd) = drop(i);
    let v = v0 + rd * i;
    let mut d = (vo + i * dcr + (1.0 - dt) * v + dt * vsd) / (vin - i * rh + v);
    if !(vin > vo && d > 0.0 && d + dt < 1.0) {
        return Step::Dropout;
    }
    let mut ripple = (vin - vo - i * (rh + dcr)) * d / (l * f);
    let continuous = (low.is_some() && rail.range.light_load == LightLoad::Forced) || i >= ripple / 2.0;
    let (valley, peak, fall, ih2, ir2, il2, icin2, icout2, mean, v0, rd);
    if continuous {
        (valley, peak, fall) = (i - ripple / 2.0, i + ripple / 2.0, 1.0 - d);
        let square = i * i + ripple * ripple / 12.0;
        (ih2, ir2, il2) = (d * square, (1.0 - d - dt) * square, square);
        icin2 = d * (1.0 - d) * i * i + d * ripple * ripple / 12.0;
        icout2 = ripple * ripple / 12.0;
        mean = (1.0 - d) * i;
        (v0, rd) = drop(i);
    } else {
        let mut ip = 0.0;
        let mut d2 = 0.0;
        for _ in 0..200 {
            let (v0, rd) = drop(ip / 2.0);
            let von = vin - vo - (rh + dcr) * ip / 2.0;
            let voff = vo + dcr * ip / 2.0 + v0 + rd * ip / 2.0;
            if von <= 0.0 || voff <= 0.0 {
                return Step::Dropout;
            }
            d = (2.0 * l * f * i * voff / (von * (von + voff))).sqrt();
            if d + dt >= 1.0 {
                return Step::Dropout;
            }
            ip = von * d / (l * f);
            d2 = d * von / voff;
        }
        ripple = ip;
        (valley, peak, fall) = (0.0, ip, d2);
        (ih2, ir2, il2) = (ip * ip * d / 3.0, ip * ip * d2 / 3.0, ip * ip * (d + d2) / 3.0);
        icin2 = ih2 - (d * ip / 2.0).powi(2);
        icout2 = il2 - i * i;
        mean = ip * d2 / 2.0;
        (v0, rd) = drop(ip / 2.0);
    }

    // Charges at the switch node.
    let qx = |v: f64| match (low, diode) {
        (Some(low), _) => nr * output_charge(low, vdrv, v),
        (_, Some(diode)) => nr * diode.junction_charge_c.as_ref().map_or(0.0, |curve| charge(curve, v)),
        _ => 0.0,
    };
    let qh = |v: f64| nh * output_charge(high, vdrv, v);
    let q = qh(vin) + qx(vin);
    let output_charge_w = if continuous {
        if valley < 0.0 && l * valley * valley >= q * vin {
            0.0
        } else {
            (qh(vin) / 3.0 + 2.0 * qx(vin) / 3.0) * vin * f
        }
    } else {
        let v = vin - vo;
        (qh(v) / 3.0 + 2.0 * qx(v) / 3.0) * v * f
    };
    let qrr = match (low, diode) {
        (Some(low), _) => nr * low.recovery_charge_c.map_or(1.5 * low.gate_drain_charge_c.get(), |q| q.get()),
        (_, Some(diode)) => nr * diode.recovery_charge_c.map_or(0.0, |q| q.get()),
        _ => 0.0,
    };
    let recovery_w = if continuous && valley >= 0.0 { qrr * vin * f } else { 0.0 };

    // Overlap.
    let (vth, vpl) = (high.gate_levels.threshold_v(), high.gate_levels.plateau_v());
    let gm = high.plateau_current_a.map_or(full_load, |current| nh * current.get()) / (vpl - vth);
    let cg = nh * post_threshold(high) / (vpl - vth);
    let qgd = nh * high.gate_drain_charge_c.get();
    let rg = high.gate_resistance_ohm.map_or(1.0, |r| r.get()) / nh;
    let (ru, rdn) = (rail.drive.pull_up_ohm.get() + rg, rail.drive.pull_down_ohm.get() + rg);
    let pl = |i: f64| vth + i / gm;
    let iv = valley.max(0.0);
    if vdrv <= pl(iv) || vdrv <= pl(peak) {
        return Step::Underdriven;
    }
    let tri = ru * cg * (iv / gm) / (vdrv - (vth + pl(iv)) / 2.0);
    let tv = (ru * qgd + q / gm) / (vdrv - pl(iv));
    let u = q / (tv * gm);
    let lag = ru * cg * u / (vdrv - pl(iv) - u / 2.0);
    let eon = 0.5 * vin * iv * (tri + tv + lag);
    let tr = (rdn * qgd + q / gm) / pl(peak);
    let ch = peak - q / tr;
    let eoff = if ch <= 0.0 {
        0.0
    } else {
        let tfi = rdn * cg * (ch / gm) / (vth + ch / (2.0 * gm));
        0.5 * vin * ch * (tr + tfi)
    };

    // Drive.
    let vs = match rail.drive.supply {
        Supply::Input => vin,
        Supply::Output => vo,
        Supply::Efficiency(efficiency) => vdrv / efficiency.get(),
    };
    let rectifier_gate =
        low.map_or(0.0, |low| (nr * (gate_charge(low, vdrv) - low.gate_drain_charge_c.get())).max(0.0) * f * vs);

    // Core.
    let core = inductor.core.map_or(0.0, |core| {
        let (a, b) = (core.alpha.map_or(1.4, |a| a.get()), core.beta.map_or(2.4, |b| b.get()));
        core.loss_w.get()
            * (f / core.frequency_hz.get()).powf(a)
            * (ripple / core.ripple_a.get()).powf(b)
            * (d.powf(1.0 - a) + fall.powf(1.0 - a))
            / 2f64.powf(a)
    });
    let bank_esr = |choice: wattsieve::stage::Choice| esr(&parts.capacitors[choice.index], f) / f64::from(choice.count);
    let losses = Losses {
        high_switch: HighSwitchLosses {
            conduction: rh * ih2,
            overlap: f * (eon + eoff),
            output_charge: output_charge_w,
            recovery: recovery_w,
        },
        rectifier: RectifierLosses {
            conduction: if low.is_some() { rr * ir2 } else { v0 * mean + rd * ir2 },
            dead_time: if low.is_some() {
                vsd * dead_time * f * (peak + if continuous { valley.abs() } else { 0.0 })
            } else {
                0.0
            },
            leakage: diode.map_or(0.0, |diode| vin * nr * leakage(diode, t.rectifier) * d),
        },
        inductor: InductorLosses { winding_dc: dcr * i * i, winding_ac: rac * (il2 - i * i), core },
        input_bank: BankLosses { esr: bank_esr(stage.input_bank) * icin2 },
        output_bank: BankLosses { esr: bank_esr(stage.output_bank) * icout2 },
        drive: DriveLosses {
            high_gate: nh * gate_charge(high, vdrv) * f * vs,
            rectifier_gate,
            bias: rail.drive.bias_a.get() * vs,
        },
    };
    let rms = |square: f64| square.max(0.0).sqrt();
    let thermal = [
        high.thermal_resistance_k_per_w.get() / nh,
        match (low, diode) {
            (Some(low), _) => low.thermal_resistance_k_per_w.get() / nr,
            (_, Some(diode)) => diode.thermal_resistance_k_per_w.get() / nr,
            _ => 0.0,
        },
        winding_k_per_w(inductor),
    ];
    let numbers = Numbers {
        continuous,
        duty: d,
        fall,
        ripple_a: ripple,
        peak_a: peak,
        valley_a: valley,
        rectifier_mean_a: mean,
        losses,
        rms: RmsCurrents {
            high_switch: rms(ih2),
            rectifier: rms(ir2),
            inductor: rms(il2),
            input_bank: rms(icin2),
            output_bank: rms(icout2),
        },
        temperatures: t,
    };
    Step::Runs(Box::new(numbers), thermal)
}
