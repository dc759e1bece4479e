//! The decisions of the bedside, each from a case and a [`Now`](case::Now) to a standing, an answer and its
//! cautions. Pure: no clock, no storage, no random source but a seed.

mod answer;
mod ask;
mod assumed;
mod cautions;
mod forecast;
mod history;
mod offer;
mod standing;
mod stretch;
mod study;
mod summary;

pub use answer::{Answer, Assumed, Caution, Condition, Standing, Status, Withheld};
pub use ask::{Question, QuestionKind, ask_about_entry};
pub use forecast::{Band, Forecast, Quantiles, Ratio, Settled};
pub use offer::{Offer, Offers, Price};
pub use study::{Doubt, Freshness, HORIZON_MIN, Options, Study};
pub use summary::{Anchor, Members, PACO2_READ_WITHIN, members_at, reading_95, summarise};
