//! Invented capacitors of three kinds, each by the size of its case.

use super::chance::Chance;
use super::preferred::{E3, nearest};
use super::sheet::Row;

/// A case: name, area in mm², height in mm.
type Case = (&'static str, f64, f64);

const CERAMIC: [Case; 4] = [("3225", 9.8, 2.5), ("3216", 6.6, 1.6), ("2012", 3.6, 1.25), ("1608", 2.0, 0.8)];
const POLYMER: [Case; 3] = [("7343-19", 36.0, 1.9), ("7343-28", 36.0, 2.8), ("can 8x7", 78.0, 6.9)];
const ELECTROLYTIC: [Case; 3] = [("can 6x6", 47.0, 5.8), ("can 8x10", 78.0, 10.2), ("can 10x10", 118.0, 10.2)];

/// Bias points that a ceramic is measured at, V.
const BIAS_V: [(&str, f64); 5] = [
    ("capacitance [µF] @ 3.3 V", 3.3),
    ("capacitance [µF] @ 5 V", 5.0),
    ("capacitance [µF] @ 12 V", 12.0),
    ("capacitance [µF] @ 24 V", 24.0),
    ("capacitance [µF] @ 36 V", 36.0),
];

/// What is particular to a kind of capacitor.
struct Body {
    stem: &'static str,
    maker: &'static str,
    kind: &'static str,
    case: Case,
    cost: f64,
    rating_v: f64,
    capacitance_uf: f64,
    /// Capacitance = nominal/(1 + bias·(V/rating)²); none where bias does nothing.
    bias: Option<f64>,
    tolerance_percent: f64,
    esr_100khz_mohm: f64,
    esr_1mhz_mohm: f64,
    esl_nh: f64,
    ripple_a: f64,
}

/// The capacitor of the given index: of every eight five are ceramic, two polymer, one electrolytic.
pub fn row(chance: &mut Chance, index: usize) -> Row {
    let body = match index % 8 {
        2 | 6 => polymer(chance),
        4 => electrolytic(chance),
        _ => ceramic(chance),
    };
    let (case, area_mm2, height_mm) = body.case;
    let nominal_uf = body.capacitance_uf;
    let mut row = Row::default();
    row.text("part", format!("{}-{nominal_uf}u-{}-{:03}", body.stem, body.rating_v, index + 1));
    row.text("maker", body.maker);
    row.text("package", case);
    row.number("cost", body.cost * chance.scatter(0.12));
    row.number("area [mm²]", area_mm2);
    row.number("height [mm]", height_mm);
    row.text("kind", body.kind);
    row.number("voltage_rating [V]", body.rating_v);
    row.number("capacitance [µF]", nominal_uf);
    let left = |bias: f64, voltage_v: f64| nominal_uf / (1.0 + bias * (voltage_v / body.rating_v).powi(2));
    let measured = BIAS_V.map(|(header, voltage_v)| {
        (header, body.bias.filter(|_| voltage_v <= body.rating_v).map(|bias| left(bias, voltage_v)))
    });
    row.maybe_all(chance.knows(), &measured);
    row.maybe(chance.knows(), "tolerance [%]", body.tolerance_percent);
    row.number("esr [mΩ] @ 100 kHz", body.esr_100khz_mohm);
    row.number("esr [mΩ] @ 1 MHz", body.esr_1mhz_mohm);
    row.maybe(chance.knows(), "esl [nH]", body.esl_nh);
    row.maybe(chance.knows(), "ripple_current [A]", body.ripple_a);
    row
}

fn ceramic(chance: &mut Chance) -> Body {
    let (stem, maker) =
        chance.pick(&[("leafvum", "Imaginary Leafvum Ceramics"), ("blozvum", "Pretend Blozvum Dielectrics")]);
    let case = chance.pick(&CERAMIC);
    let rating_v: f64 = chance.pick(&[6.3, 10.0, 16.0, 25.0, 50.0, 50.0, 100.0]);
    let volume_mm3 = case.1 * case.2 * 0.8;
    // Thin layers hold more and lose more of it under bias.
    let thinness = chance.pick(&[0.5, 1.0]);
    let most_uf = 1.25 * volume_mm3 * (25.0 / rating_v).powf(1.15) * thinness;
    let capacitance_uf = nearest(&E3, most_uf.min(100.0));
    let lossy_mohm = chance.between(0.012, 0.025) / (2e5 * std::f64::consts::PI * capacitance_uf * 1e-6) * 1e3;
    let plates_mohm = chance.between(1.0, 1.8) * (9.8 / case.1).sqrt();
    let esr_mohm = lossy_mohm + plates_mohm;
    Body {
        stem,
        maker,
        kind: "ceramic",
        case,
        cost: 0.012 + 0.0065 * volume_mm3 * thinness.sqrt() * (rating_v / 25.0).powf(0.25),
        rating_v,
        capacitance_uf,
        bias: Some(3.2 * thinness.powf(1.3) * chance.scatter(0.15)),
        tolerance_percent: chance.pick(&[10.0, 20.0]),
        esr_100khz_mohm: esr_mohm,
        esr_1mhz_mohm: lossy_mohm / 10.0 + plates_mohm,
        esl_nh: chance.between(0.3, 0.45) + 0.03 * case.1,
        ripple_a: (0.011 * case.1 / (esr_mohm * 1e-3)).sqrt(),
    }
}

fn polymer(chance: &mut Chance) -> Body {
    let case = chance.pick(&POLYMER);
    let rating_v: f64 = chance.pick(&[6.3, 10.0, 16.0, 25.0, 50.0]);
    let volume_mm3 = case.1 * case.2;
    let esr_mohm = chance.log_between(9.0, 40.0);
    Body {
        stem: "dewdim",
        maker: "Fabled Dewdim Capacitors",
        kind: "polymer",
        case,
        cost: 0.22 + 0.0007 * volume_mm3 + 1.5 / esr_mohm,
        rating_v,
        capacitance_uf: nearest(&[1.0, 1.5, 2.2, 3.3, 4.7, 6.8], 1.6 * volume_mm3 * (6.3 / rating_v).powf(1.1)),
        bias: None,
        tolerance_percent: 20.0,
        esr_100khz_mohm: esr_mohm,
        esr_1mhz_mohm: esr_mohm * chance.between(0.8, 0.95),
        esl_nh: chance.between(1.6, 3.0),
        ripple_a: (0.0028 * case.1 / (esr_mohm * 1e-3)).sqrt(),
    }
}

fn electrolytic(chance: &mut Chance) -> Body {
    let case = chance.pick(&ELECTROLYTIC);
    let rating_v: f64 = chance.pick(&[10.0, 25.0, 35.0, 50.0, 63.0]);
    let volume_mm3 = case.1 * case.2;
    let esr_mohm = 75_000.0 / volume_mm3 * (rating_v / 25.0).powf(0.2) * chance.scatter(0.2);
    Body {
        stem: "drizvum",
        maker: "Make-Believe Drizvum Foils",
        kind: "electrolytic",
        case,
        cost: 0.05 + 0.00016 * volume_mm3,
        rating_v,
        capacitance_uf: nearest(&E3, 0.45 * volume_mm3 * (25.0 / rating_v).powf(1.2)),
        bias: None,
        tolerance_percent: 20.0,
        esr_100khz_mohm: esr_mohm,
        esr_1mhz_mohm: esr_mohm * chance.between(0.85, 0.97),
        esl_nh: chance.between(8.0, 15.0),
        ripple_a: (0.0009 * case.1 / (esr_mohm * 1e-3)).sqrt(),
    }
}
