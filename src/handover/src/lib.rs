//! What leaves the tool: answers as JSON. The names are stable; more may be added.

mod answer;
mod forecast;

pub use forecast::{forecast_json, forecast_value};
