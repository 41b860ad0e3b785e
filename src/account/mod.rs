//! Every watt of one stage, by cause, at every point: [`account`] asks the model and the limits, [`data`] is what comes of it.

pub mod data;
mod stage;

pub use data::{
    Account, AssumedRow, BankLosses, DriveLosses, HighSwitchLosses, InductorLosses, LimitRow, Losses, Mode,
    PointAccount, Reading, RectifierLosses, RmsCurrents, Temperatures,
};
pub use stage::account;
