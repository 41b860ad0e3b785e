//! What a candidate meets in a unit.

use super::reach::Reach;
use super::spread::Spread;
use crate::limit::LimitName;
use crate::model::Conditions;
use crate::model::high_switch::GateDrive;
use crate::rail::Rail;
use crate::search::request::Tolerance;

/// A temperature or current bound is lowered by this before it refuses anything: limits themselves hold within 1e-9.
pub const SHORT_OF_LIMIT: f64 = 1.0 - 1e-8;

/// The unit around a candidate.
#[derive(Debug, Clone, Copy)]
pub struct Around<'a> {
    /// The rail.
    pub rail: &'a Rail,
    /// Points and drive.
    pub conditions: &'a Conditions,
    /// A limit that may be broken, and so refuses nothing.
    pub tolerated: Option<Tolerance>,
    /// Spans over the unit with typical parts.
    pub spread: &'a Spread,
    /// The weighted points and full load at every input, with typical parts.
    pub typical: &'a [Reach],
    /// Full load at every input, at the low end of the inductance tolerance.
    pub low: &'a [Reach],
    /// Full load at every input, with the greatest resistances.
    pub worst: &'a [Reach],
}

impl<'a> Around<'a> {
    /// The weighted points.
    pub fn weighed(&self) -> impl Iterator<Item = &'a Reach> + use<'a> {
        self.typical.iter().filter(|reach| reach.place.share > 0.0)
    }

    /// Full load at every input, with typical parts.
    pub fn full(&self) -> impl Iterator<Item = &'a Reach> + use<'a> {
        self.typical.iter().filter(|reach| reach.place.judged)
    }

    /// Every point of which a hottest temperature must speak.
    pub fn every(&self) -> impl Iterator<Item = &'a Reach> + use<'a> {
        self.typical.iter().chain(self.low)
    }

    /// The gate drive.
    pub fn drive(&self) -> GateDrive {
        GateDrive {
            gate_v: self.conditions.gate_v,
            pull_up_ohm: self.conditions.pull_up_ohm,
            pull_down_ohm: self.conditions.pull_down_ohm,
        }
    }

    /// An upper limit with what may be broken of it.
    pub fn raised(&self, limit: LimitName, bound: f64) -> f64 {
        raised_limit(self.tolerated, limit, bound)
    }

    /// A lower limit with what may be broken of it.
    pub fn lowered(&self, limit: LimitName, bound: f64) -> f64 {
        lowered_limit(self.tolerated, limit, bound)
    }

    /// Where a junction must stay, °C.
    pub fn junction_limit_c(&self, own_limit_c: f64) -> f64 {
        junction_limit_c(self.rail, self.tolerated, own_limit_c)
    }

    /// Whether a reversed valley current can charge the node in some stage of the unit, so that its charge costs nothing.
    pub fn choke_may_charge(&self, reach: &Reach, valley_lo_a: f64, node_lo_c: f64) -> bool {
        valley_lo_a < 0.0
            && reach.inductance_h.hi * valley_lo_a * valley_lo_a >= node_lo_c * reach.input_v * SHORT_OF_LIMIT
    }
}

/// An upper limit with what may be broken of it.
pub fn raised_limit(tolerated: Option<Tolerance>, limit: LimitName, bound: f64) -> f64 {
    bound + slack(tolerated, limit, bound)
}

/// A lower limit with what may be broken of it.
pub fn lowered_limit(tolerated: Option<Tolerance>, limit: LimitName, bound: f64) -> f64 {
    bound - slack(tolerated, limit, bound)
}

fn slack(tolerated: Option<Tolerance>, limit: LimitName, bound: f64) -> f64 {
    match tolerated {
        Some(tolerance) if tolerance.limit == limit => {
            if tolerance.excess.is_finite() {
                tolerance.excess * bound.abs()
            } else {
                f64::INFINITY
            }
        }
        _ => 0.0,
    }
}

/// Where a junction with this limit of its own must stay, °C.
pub fn junction_limit_c(rail: &Rail, tolerated: Option<Tolerance>, own_limit_c: f64) -> f64 {
    raised_limit(tolerated, LimitName::Junction, own_limit_c - rail.limits.junction_margin_k.get())
}

/// Where a winding must stay, °C.
pub fn winding_limit_c(rail: &Rail, tolerated: Option<Tolerance>) -> f64 {
    raised_limit(tolerated, LimitName::Winding, rail.limits.winding_temperature_c)
}
