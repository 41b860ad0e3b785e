//! Worked examples of published documents (`data/published_examples.csv`), each through the model's own function at 0.5 % of the
//! recomputed figure; what the document prints is quoted beside it.

use crate::table::{rows, within};
use wattsieve::model::current::{Circuit, Drop, continuous};

/// The documents print two to four digits.
const PRINTED: f64 = 0.005;

fn expected(id: &str, quantity: &str) -> f64 {
    rows(include_str!("data/published_examples.csv"))
        .iter()
        .find(|row| row.text("id") == id && row.text("quantity") == quantity)
        .unwrap_or_else(|| panic!("no example {id} {quantity}"))
        .number("recomputed")
}

fn lossless(input_v: f64, output_v: f64, inductance_h: f64, frequency_hz: f64, load_a: f64) -> Circuit {
    Circuit {
        input_v,
        output_v,
        load_a,
        frequency_hz,
        inductance_h,
        high_ohm: 0.0,
        winding_ohm: 0.0,
        dead_share: 0.0,
        body_drop_v: 0.0,
    }
}

const NO_DROP: Drop = Drop { threshold_v: 0.0, resistance_ohm: 0.0 };

/// TI TPS54360 data sheet SLVSBB4E §9.2.2: conduction 0.47 W, inductor peak 3.97 A, input capacitor 1.72 A, boundary 0.300 A.
#[test]
fn tps54360() {
    // Without ripple the high switch carries the load for its duty: an inductance beyond all sizes.
    let flat = continuous(&lossless(12.0, 5.0, 1.0, 600e3, 3.5), NO_DROP);
    within("E1 conduction", 0.092 * flat.high_a2, expected("E1", "hs_conduction_ripple_free"), PRINTED);
    let peak = continuous(&lossless(60.0, 5.0, 8.2e-6, 600e3, 3.5), NO_DROP);
    within("E1b peak", peak.peak_a, expected("E1b", "inductor_peak"), PRINTED);
    let bank = continuous(&lossless(8.5, 5.0, 1.0, 600e3, 3.5), NO_DROP);
    within("E1b input rms", bank.input_bank_a2.sqrt(), expected("E1b", "cin_rms"), PRINTED);
    let edge = continuous(&lossless(12.0, 5.0, 8.2e-6, 600e3, 0.3), NO_DROP);
    within("E1b boundary", edge.ripple_a / 2.0, expected("E1b", "dcm_boundary"), PRINTED);
}

/// ADI ADP2102 Rev B p. 21: output capacitor 0.045 A.
#[test]
fn adp2102() {
    let currents = continuous(&lossless(4.2, 1.8, 2.2e-6, 3e6, 0.6), NO_DROP);
    within("E6 output rms", currents.output_bank_a2.sqrt(), expected("E6", "cout_rms"), PRINTED);
}

/// onsemi AND90146/D Rev 1 Tables 3 to 5: 0.504 W at 6 A and 14 mΩ; greatest ambient 127.5 °C for 0.9324 W at 51 K/W and 175 °C.
#[test]
fn and90146() {
    use wattsieve::model::thermal::linear_c;
    for (current_a, resistance_ohm, printed_w) in [
        (6.0, 10.3e-3, 0.3708),
        (8.0, 7.3e-3, 0.4672),
        (10.0, 4.8e-3, 0.48),
        (6.0, 25.9e-3, 0.9324),
        (8.0, 14.4e-3, 0.9216),
    ] {
        // A duty of nearly 1 and no ripple: the load current in the channel.
        let currents = continuous(&lossless(1.0, 0.999_999, 1.0, 1e5, current_a), NO_DROP);
        within("E11 conduction", resistance_ohm * currents.high_a2, printed_w, PRINTED);
    }
    let junction_c = linear_c(expected("E11", "ta_max"), 51.0, 0.9324, 0.0, 0.0).expect("a fixed point");
    within("E11 junction", junction_c, 175.0, PRINTED);
}
