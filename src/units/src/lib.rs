//! Units and limits: the quantities of the bedside as types, their conversions, the reading of typed
//! numbers, and the one table of limits with its words.
//!
//! Gas volumes come in two kinds that are never mixed: STPD (0 °C, 760 mmHg, dry) for amounts of gas
//! made or used, BTPS (body temperature, ambient pressure, saturated) for volumes breathed.

mod limits;
mod number;
mod quantity;

pub use limits::{AgeGroup, Limit, OutOfLimits, check, limit};
pub use number::{NotANumber, read_number};
pub use quantity::{FlowBtps, FlowStpd, KPA_IN_MMHG, Kpa, Mmhg, Quantity};
