//! Invented inductors: the volume sets the energy, the winding and the heat of every value of a series.

use super::chance::Chance;
use super::preferred::{E12, nearest};
use super::sheet::Row;

const MAKERS: [(&str, &str); 4] = [
    ("rootvum", "Fabled Rootvum Magnetics"),
    ("barkvum", "Pretend Barkvum Windings"),
    ("knurlip", "Imaginary Knurlip Chokes"),
    ("mossvum", "Make-Believe Mossvum"),
];

/// A size: edge and heights, mm.
const SIZES_MM: [(f64, [f64; 2]); 7] = [
    (8.0, [3.0, 4.0]),
    (10.0, [4.0, 5.0]),
    (6.0, [3.0, 4.5]),
    (12.5, [5.0, 6.5]),
    (5.0, [2.0, 3.0]),
    (7.0, [3.0, 5.0]),
    (4.0, [1.5, 2.0]),
];

/// A core material.
#[derive(Clone, Copy)]
struct Core {
    /// Energy at the saturation current, µJ/mm³.
    energy: f64,
    /// Loss at 500 kHz and a ripple of a fifth of the saturation current, mW/mm³.
    loss: f64,
    alpha: f64,
    beta: f64,
    /// Saturation current at 100 °C over that at 25 °C.
    hot: f64,
    /// Share of the inductance lost at the saturation current.
    roll_off: f64,
    cost: f64,
}

const POWDER: Core = Core { energy: 1.15, loss: 1.4, alpha: 1.25, beta: 2.15, hot: 0.97, roll_off: 0.3, cost: 1.0 };
const FINE_POWDER: Core =
    Core { energy: 1.0, loss: 0.8, alpha: 1.35, beta: 2.3, hot: 0.96, roll_off: 0.25, cost: 1.35 };
const FERRITE: Core = Core { energy: 0.55, loss: 0.3, alpha: 1.5, beta: 2.6, hot: 0.76, roll_off: 0.08, cost: 0.9 };

const BIAS_A: [(&str, f64); 2] = [("inductance [µH] @ 4 A", 4.0), ("inductance [µH] @ 8 A", 8.0)];
/// Resistance for alternating current over the direct one, at three frequencies, for a winding of thick wire.
const SKIN: [(&str, f64); 3] =
    [("ac_resistance [mΩ] @ 100 kHz", 1.6), ("ac_resistance [mΩ] @ 500 kHz", 4.5), ("ac_resistance [mΩ] @ 1 MHz", 7.0)];

/// How many inductors have their core loss measured, how many their resistance for alternating current.
const CORE_MEASURED: f64 = 0.85;
const WINDING_MEASURED: f64 = 0.5;

/// The inductor of the given index.
pub fn row(chance: &mut Chance, index: usize) -> Row {
    let (stem, maker) = chance.pick(&MAKERS);
    let (edge_mm, heights_mm) = SIZES_MM[index % SIZES_MM.len()];
    let height_mm = chance.pick(&heights_mm);
    let volume_mm3 = edge_mm * edge_mm * height_mm;
    let core = chance.pick(&[POWDER, POWDER, FINE_POWDER, FERRITE]);
    let inductance_uh = nearest(&E12, (4.7 * chance.scatter(0.9)).clamp(0.33, 47.0));
    let dcr_mohm = inductance_uh * 2.5 * (400.0 / volume_mm3).powf(0.8) * chance.scatter(0.1);
    let saturation_a = (2.0 * core.energy * volume_mm3 / inductance_uh).sqrt() * chance.scatter(0.05);
    let rise_k_per_w = 24.0 * (400.0 / volume_mm3).powf(0.22) * chance.scatter(0.05);

    let mut row = Row::default();
    row.text("part", format!("{stem}-{edge_mm}x{height_mm}-{:03}", index + 1));
    row.text("maker", maker);
    row.number("cost", (0.12 + 0.0011 * volume_mm3) * core.cost * chance.scatter(0.12));
    row.number("area [mm²]", (edge_mm + 0.3) * (edge_mm + 0.3));
    row.number("height [mm]", height_mm);
    row.number("inductance [µH]", inductance_uh);
    let left = |current_a: f64| inductance_uh * (1.0 - core.roll_off * (current_a / saturation_a).powi(2));
    row.maybe_all(chance.knows(), &BIAS_A.map(|(header, a)| (header, (a < saturation_a).then(|| left(a)))));
    row.maybe(chance.knows(), "tolerance [%]", chance.pick(&[20.0, 20.0, 20.0, 30.0]));
    row.number("dcr [mΩ]", dcr_mohm);
    row.maybe(chance.knows(), "dcr_max [mΩ]", dcr_mohm * chance.between(1.08, 1.2));
    row.number("saturation_current [A] @ 25 °C", saturation_a);
    row.maybe(chance.knows(), "saturation_current [A] @ 100 °C", saturation_a * core.hot);
    // The winding is hot, hence more resistive, when it has risen by 40 K.
    let heating_a = (40.0 / (rise_k_per_w * dcr_mohm * 1e-3 * 1.154)).sqrt();
    row.maybe_all(chance.knows(), &[("heating_current [A]", Some(heating_a)), ("heating_rise [K]", Some(40.0))]);
    add_core(&mut row, chance, core, volume_mm3, saturation_a);
    let skin = chance.between(0.6, 1.4);
    let measured = chance.happens(WINDING_MEASURED);
    for (header, ratio) in SKIN {
        row.known(header, measured.then_some(dcr_mohm * (1.0 + (ratio - 1.0) * skin)));
    }
    row
}

fn add_core(row: &mut Row, chance: &mut Chance, core: Core, volume_mm3: f64, saturation_a: f64) {
    let loss_mw = core.loss * volume_mm3 * chance.scatter(0.15);
    let measured = chance.happens(CORE_MEASURED);
    row.known("core_loss [mW]", measured.then_some(loss_mw));
    row.known("core_frequency [kHz]", measured.then_some(500.0));
    row.known("core_ripple [A]", measured.then_some(saturation_a / 5.0));
    let fitted = measured && !chance.happens(0.2);
    row.known("core_alpha", fitted.then_some(core.alpha));
    row.known("core_beta", fitted.then_some(core.beta));
}
