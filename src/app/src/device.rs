//! The one place that touches the browser: a file for each thing it does.

pub mod clock;
pub mod files;
pub mod ids;
pub mod page;
pub mod ready;
pub mod shelf;
