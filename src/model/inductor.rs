//! Losses in the inductor.

use super::current::Currents;
use crate::part::Choke;

/// Core loss, W; 0 where the catalog gives none (carried to the account as assumed).
pub fn core_w(choke: &Choke, currents: &Currents) -> f64 {
    choke.core.map_or(0.0, |core| core.loss_w(currents.ripple_a, currents.duty, currents.fall))
}

/// Winding loss at 25 °C to the load current and to the ripple, W, and so with the resistances given.
pub fn winding_w(dcr_ohm: f64, rac_ohm: f64, load_a: f64, currents: &Currents) -> [f64; 2] {
    let load_a2 = load_a * load_a;
    [dcr_ohm * load_a2, rac_ohm * (currents.inductor_a2 - load_a2)]
}
