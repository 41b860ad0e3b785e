//! Invented diodes: the barrier of a Schottky diode sets its drop and its leakage together.

use super::chance::Chance;
use super::packages::{Package, around};
use super::sheet::Row;

const MAKERS: [(&str, &str); 3] = [
    ("budwik", "Imaginary Budwik Junctions"),
    ("stemvum", "Pretend Stemvum Rectifiers"),
    ("cidvum", "Imaginary Cidvum Works"),
];

const RATINGS_V: [f64; 5] = [40.0, 60.0, 30.0, 100.0, 20.0];
const RATINGS_A: [f64; 6] = [3.0, 5.0, 8.0, 10.0, 15.0, 20.0];
const DROP_A: [(&str, f64); 4] = [
    ("forward_drop [V] @ 1 A", 1.0),
    ("forward_drop [V] @ 3 A", 3.0),
    ("forward_drop [V] @ 6 A", 6.0),
    ("forward_drop [V] @ 12 A", 12.0),
];

#[rustfmt::skip]
const PACKAGES: [Package; 3] = [
    Package { name: "D26", area_mm2: 9.2, height_mm: 1.0, die_mm2: 1.6, lead_mohm: 3.0, k_per_w: 64.0, cost: 0.04 },
    Package { name: "D46", area_mm2: 26.0, height_mm: 1.1, die_mm2: 4.5, lead_mohm: 1.5, k_per_w: 46.0, cost: 0.08 },
    Package { name: "D66", area_mm2: 62.0, height_mm: 2.2, die_mm2: 12.0, lead_mohm: 0.8, k_per_w: 31.0, cost: 0.17 },
];

/// How many diodes are silicon.
const SILICON: f64 = 0.12;
/// How many come one package larger than their die needs.
const ROOMY: f64 = 0.25;
/// Thermal voltage at 25 °C, V.
const THERMAL_V: f64 = 0.0257;

/// One diode: its die and its junction.
struct Junction {
    die_mm2: f64,
    rating_v: f64,
    /// Drop without the resistance, V, at 1 A.
    junction_v: f64,
    resistance_ohm: f64,
    slope_mv_per_k: f64,
    leakage_25c_a: f64,
    leakage_125c_a: f64,
    recovery_nc: Option<f64>,
}

/// The diode of the given index.
pub fn row(chance: &mut Chance, index: usize) -> Row {
    let (stem, maker) = chance.pick(&MAKERS);
    let rating_v = RATINGS_V[index % RATINGS_V.len()];
    let rating_a = chance.pick(&RATINGS_A);
    let die_mm2 = rating_a * chance.between(0.28, 0.5);
    let package = around(&PACKAGES, die_mm2, usize::from(chance.happens(ROOMY)));
    let silicon = chance.happens(SILICON);
    let junction =
        if silicon { silicon_junction(chance, die_mm2, rating_v) } else { schottky(chance, die_mm2, rating_v) };

    let mut row = Row::default();
    row.text("part", format!("{stem}-d{rating_a}-{rating_v}-{:03}", index + 1));
    row.text("maker", maker);
    row.text("package", package.name);
    row.number("cost", (package.cost + 0.022 * die_mm2) * chance.scatter(0.15));
    row.number("area [mm²]", package.area_mm2);
    row.number("height [mm]", package.height_mm);
    row.text("kind", if silicon { "silicon" } else { "schottky" });
    row.number("voltage_rating [V]", rating_v);
    row.number("current_rating [A]", rating_a);
    add_junction(&mut row, chance, &junction, rating_a, package);
    row.maybe(chance.knows(), "junction_limit [°C]", chance.pick(&[125.0, 150.0, 150.0, 175.0]));
    row.number("thermal_resistance [K/W]", package.k_per_w * chance.scatter(0.04));
    row
}

/// A Schottky junction by thermionic emission over a barrier of 0.66 to 0.8 eV: I = A·S·T²·exp(−φ/kT), A = 120 A/cm²K².
fn schottky(chance: &mut Chance, die_mm2: f64, rating_v: f64) -> Junction {
    let barrier_v = chance.between(0.66, 0.80);
    let emission_a = |kelvin: f64| 1.2 * die_mm2 * kelvin.powi(2) * (-barrier_v / (8.617e-5 * kelvin)).exp();
    let junction_v = 1.05 * THERMAL_V * (1.0 / emission_a(298.15)).ln();
    // The field of the blocking junction lowers its barrier.
    let lowered = chance.log_between(8.0, 25.0);
    Junction {
        die_mm2,
        rating_v,
        junction_v,
        resistance_ohm: 0.028 / die_mm2 * (rating_v / 40.0).powf(1.4) * chance.scatter(0.1),
        slope_mv_per_k: (junction_v - barrier_v) / 298.15 * 1000.0 - 0.17,
        leakage_25c_a: emission_a(298.15) * lowered,
        leakage_125c_a: emission_a(398.15) * lowered * 0.6,
        recovery_nc: None,
    }
}

fn silicon_junction(chance: &mut Chance, die_mm2: f64, rating_v: f64) -> Junction {
    let leakage_25c_a = die_mm2 * chance.log_between(1e-7, 1e-6);
    Junction {
        die_mm2,
        rating_v,
        junction_v: chance.between(0.70, 0.80),
        resistance_ohm: 0.03 / die_mm2 * chance.scatter(0.1),
        slope_mv_per_k: -chance.between(1.7, 2.2),
        leakage_25c_a,
        leakage_125c_a: leakage_25c_a * chance.log_between(60.0, 200.0),
        recovery_nc: Some(die_mm2 * chance.log_between(5.0, 15.0)),
    }
}

fn add_junction(row: &mut Row, chance: &mut Chance, junction: &Junction, rating_a: f64, package: &Package) {
    let resistance_ohm = junction.resistance_ohm + package.lead_mohm * 1e-3;
    let drop_v = |current_a: f64| junction.junction_v + 1.05 * THERMAL_V * current_a.ln() + resistance_ohm * current_a;
    for (header, current_a) in DROP_A {
        let tested = current_a <= rating_a && current_a >= rating_a / 10.0;
        row.known(header, tested.then(|| drop_v(current_a)));
    }
    row.maybe(chance.knows(), "drop_slope [mV/K]", junction.slope_mv_per_k);
    row.maybe(chance.knows(), "leakage [µA] @ 25 °C", junction.leakage_25c_a * 1e6);
    row.number("leakage [µA] @ 125 °C", junction.leakage_125c_a * 1e6);
    row.maybe(
        chance.knows(),
        "junction_charge [nC] @ 12 V",
        2.4 * junction.die_mm2 * (40.0 / junction.rating_v).sqrt(),
    );
    row.known("recovery_charge [nC]", junction.recovery_nc);
}
