//! Invented transistors: charge and resistance trade along the line of their technology.

use super::chance::Chance;
use super::packages::{Package, around};
use super::sheet::Row;

const MAKERS: [(&str, &str); 4] = [
    ("cidvum", "Imaginary Cidvum Works"),
    ("twigzum", "Pretend Twigzum Devices"),
    ("mulchum", "Fabled Mulchum Silicon"),
    ("sapwim", "Make-Believe Sapwim"),
];

const RATINGS_V: [f64; 6] = [20.0, 30.0, 40.0, 60.0, 80.0, 100.0];

/// A technology, by its figures at a rating of 30 V.
#[derive(Clone, Copy)]
struct Technology {
    /// On-resistance × gate charge at 4.5 V, mΩ·nC.
    merit: f64,
    /// On-resistance at 4.5 V × die area, mΩ·mm².
    specific: f64,
    /// Gate-drain charge / gate charge at 4.5 V.
    miller: f64,
    /// Price of a die per mm².
    die_cost: f64,
    /// Greatest gate voltage, V.
    gate_rating_v: f64,
}

/// Older ones first: each is better than the one before, and dearer.
const TECHNOLOGIES: [Technology; 4] = [
    Technology { merit: 118.0, specific: 15.0, miller: 0.31, die_cost: 0.032, gate_rating_v: 20.0 },
    Technology { merit: 82.0, specific: 11.0, miller: 0.27, die_cost: 0.045, gate_rating_v: 20.0 },
    Technology { merit: 57.0, specific: 8.0, miller: 0.22, die_cost: 0.068, gate_rating_v: 16.0 },
    Technology { merit: 41.0, specific: 6.0, miller: 0.18, die_cost: 0.105, gate_rating_v: 12.0 },
];

#[rustfmt::skip]
const PACKAGES: [Package; 4] = [
    Package { name: "Q20", area_mm2: 4.4, height_mm: 0.6, die_mm2: 1.2, lead_mohm: 0.8, k_per_w: 66.0, cost: 0.05 },
    Package { name: "Q33", area_mm2: 11.6, height_mm: 0.9, die_mm2: 4.0, lead_mohm: 0.5, k_per_w: 48.0, cost: 0.09 },
    Package { name: "Q56", area_mm2: 31.7, height_mm: 1.1, die_mm2: 11.0, lead_mohm: 0.35, k_per_w: 36.0, cost: 0.16 },
    Package { name: "Q89", area_mm2: 74.0, height_mm: 2.3, die_mm2: 30.0, lead_mohm: 0.25, k_per_w: 27.0, cost: 0.38 },
];

/// How many transistors come one package larger than their die needs: room for heat, at a price.
const ROOMY: f64 = 0.3;

/// Heat at the rated current × thermal resistance on the board, K: ratings hold with the case kept cold, hence several
/// times what the board can carry away.
const RATED_RISE_K: f64 = 600.0;

/// The transistor of the given index.
pub fn row(chance: &mut Chance, index: usize) -> Row {
    let (stem, maker) = chance.pick(&MAKERS);
    let rating_v = RATINGS_V[index % RATINGS_V.len()];
    let stress = rating_v / 30.0;
    let technology = chance.pick(&TECHNOLOGIES);

    let specific = technology.specific * stress.powf(1.5) * chance.scatter(0.06);
    let wanted_mohm = chance.log_between(1.6, 26.0) * stress.powf(0.9);
    let die_mm2 = (specific / wanted_mohm).clamp(0.25, PACKAGES[PACKAGES.len() - 1].die_mm2);
    let die_mohm = specific / die_mm2;
    let package = around(&PACKAGES, die_mm2, usize::from(chance.happens(ROOMY)));

    let mut row = Row::default();
    row.text("part", format!("{stem}-{rating_v}-{:03}", index + 1));
    row.text("maker", maker);
    row.text("package", package.name);
    row.number("cost", (package.cost + die_mm2 * technology.die_cost) * chance.scatter(0.14));
    row.number("area [mm²]", package.area_mm2);
    row.number("height [mm]", package.height_mm);
    row.number("voltage_rating [V]", rating_v);
    add_resistance(&mut row, chance, die_mohm, package);
    let merit = technology.merit * stress.powf(1.25) * chance.scatter(0.15);
    add_charge(&mut row, chance, merit / die_mohm, technology.miller, stress);
    row.maybe(chance.knows(), "body_diode_drop [V]", 0.72 + chance.between(0.0, 0.16));
    row.maybe(chance.knows(), "hot_resistance_ratio @ 125 °C", chance.between(1.38, 1.55) + 0.05 * stress);
    let rated_w = RATED_RISE_K / package.k_per_w;
    row.maybe(chance.knows(), "current_rating [A]", (rated_w / (die_mohm + package.lead_mohm) * 1e3).sqrt());
    row.maybe(chance.knows(), "gate_rating [V]", technology.gate_rating_v);
    row.maybe(chance.knows(), "junction_limit [°C]", chance.pick(&[150.0, 150.0, 175.0]));
    row.number("thermal_resistance [K/W]", package.k_per_w * chance.scatter(0.04) / die_mm2.powf(0.05));
    row
}

fn add_resistance(row: &mut Row, chance: &mut Chance, die_mohm: f64, package: &Package) {
    let at_4v5 = die_mohm + package.lead_mohm;
    let at_10v = die_mohm * chance.between(0.70, 0.82) + package.lead_mohm;
    let greatest = chance.between(1.2, 1.3);
    row.number("on_resistance [mΩ] @ 4.5 V", at_4v5);
    row.number("on_resistance [mΩ] @ 10 V", at_10v);
    let headers = ["on_resistance_max [mΩ] @ 4.5 V", "on_resistance_max [mΩ] @ 10 V"];
    row.maybe_all(chance.knows(), &[(headers[0], Some(at_4v5 * greatest)), (headers[1], Some(at_10v * greatest))]);
}

/// Gate, output and recovery charges, and the levels that divide the gate charge; `gate_nc` at 4.5 V.
fn add_charge(row: &mut Row, chance: &mut Chance, gate_nc: f64, miller: f64, stress: f64) {
    let drain_nc = gate_nc * miller * stress.powf(0.1) * chance.scatter(0.08);
    let source_nc = gate_nc * chance.between(0.30, 0.38);
    let threshold_v = chance.between(1.2, 1.9);
    let plateau_v = threshold_v + chance.between(0.7, 1.2);
    // Beyond the plateau the gate is a plain capacitance.
    let per_volt_nc = (gate_nc - drain_nc - source_nc) / (4.5 - plateau_v);
    row.number("gate_charge [nC] @ 4.5 V", gate_nc);
    row.maybe(chance.knows(), "gate_charge [nC] @ 10 V", gate_nc + per_volt_nc * 5.5);
    row.number("gate_drain_charge [nC]", drain_nc);
    row.maybe(chance.knows(), "gate_source_charge [nC]", source_nc);
    row.maybe(chance.knows(), "threshold_voltage [V]", threshold_v);
    row.maybe(chance.knows(), "plateau_voltage [V]", plateau_v);
    row.maybe(chance.knows(), "plateau_current [A]", chance.pick(&[8.0, 10.0, 15.0, 20.0]));
    row.maybe(chance.knows(), "gate_resistance [Ω]", chance.log_between(0.5, 2.2));
    row.maybe(chance.knows(), "output_charge [nC] @ 12 V", gate_nc * chance.between(0.9, 1.4));
    row.number("recovery_charge [nC]", gate_nc * stress.powf(0.35) * chance.log_between(0.5, 1.5));
}
