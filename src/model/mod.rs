//! Currents, losses, temperatures and ripple of a stage at a point: pure functions.
