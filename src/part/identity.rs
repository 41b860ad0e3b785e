//! What every part has, whatever it does.

use crate::quantity::{NonNegative, Positive};

/// Name, maker, price and size of a part.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Identity {
    /// Part name, unique in its catalog.
    pub part: String,
    /// Who makes it.
    pub maker: Option<String>,
    /// Package name.
    pub package: Option<String>,
    /// Price of one, in the user's money.
    pub cost: Option<NonNegative>,
    /// Board area of one, mm².
    pub area_mm2: Option<Positive>,
    /// Height, m.
    pub height_m: Option<Positive>,
    /// Pieces held.
    pub stock: Option<NonNegative>,
    /// The user's own words.
    pub note: Option<String>,
    /// Another part of the same catalog that may stand in for this one.
    pub equivalent_to: Option<String>,
}
