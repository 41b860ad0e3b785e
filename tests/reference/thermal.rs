//! Fixed points of T = Ta + Rth·P(T), by scan and Brent's method to 1e-12 K (scipy 1.17.1): `data/thermal_fixed_points.csv`.
//!
//! Left out: T02, whose resistance follows a power of the absolute temperature, which the model does not express.

use crate::table::{rows, within};
use wattsieve::model::thermal::{DiodeHeat, linear_c};
use wattsieve::part::{Curve, Diode, DiodeKind, Identity, Surroundings};
use wattsieve::quantity::Positive;

/// The table prints nine digits.
const PRINTED: f64 = 1e-8;

#[test]
fn linear_laws() {
    for row in rows(include_str!("data/thermal_fixed_points.csv")).iter().filter(|row| row.text("law") == "linear") {
        let rising_w = row.number("rms_a").powi(2) * row.number("r25_ohm");
        let found = linear_c(
            row.number("ambient_c"),
            row.number("thermal_resistance_k_per_w"),
            row.number("fixed_loss_w"),
            rising_w,
            row.number("coefficient"),
        );
        match row.number("roots") {
            0.0 => assert_eq!(found, None, "{}", row.text("case")),
            _ => within(row.text("case"), found.expect("a root"), row.number("temperature_c"), PRINTED),
        }
    }
}

#[test]
fn the_lower_root_of_a_leaky_diode() {
    let positive = |value| Positive::new(value).expect("a positive number");
    for row in rows(include_str!("data/thermal_fixed_points.csv")).iter().filter(|row| row.text("law") == "diode") {
        assert_eq!(row.number("leakage_doubling_k"), 10.0, "the model doubles a single leakage point every 10 K");
        let diode = Diode {
            identity: Identity::default(),
            kind: DiodeKind::Schottky,
            voltage_rating_v: positive(60.0),
            current_rating_a: positive(10.0),
            forward_drop_v: Curve::new(vec![(1.0, row.number("drop25_v"))]).expect("a curve"),
            drop_slope_v_per_k: Some(row.number("drop_slope_v_per_k")),
            leakage_a: Some(Curve::new(vec![(25.0, row.number("leakage25_a"))]).expect("a curve")),
            junction_charge_c: None,
            recovery_charge_c: None,
            junction_limit_c: None,
            thermal_resistance_k_per_w: positive(row.number("thermal_resistance_k_per_w")),
        };
        let around = Surroundings { gate_v: 5.0, full_load_a: 1.0, output_v: 5.0, inputs_v: [12.0; 3] };
        let mean_a = row.number("mean_a");
        let fixed_w = if row.text("fixed_loss_w").is_empty() { 0.0 } else { row.number("fixed_loss_w") };
        let heat = DiodeHeat {
            diode: &diode.bank(1, &around),
            forward25_w: fixed_w
                + mean_a * row.number("drop25_v")
                + row.number("rms_a").powi(2) * row.number("r25_ohm"),
            mean_a,
            reverse_v: row.number("reverse_v") * row.number("reverse_share"),
        };
        let found = heat.fixed_point_c(row.number("ambient_c")).expect("a root");
        within(row.text("case"), found, row.number("temperature_c"), PRINTED);
    }
}
