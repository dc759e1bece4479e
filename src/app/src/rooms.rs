//! The rooms, one a task.

pub mod change;
pub mod gas;
pub mod now;
pub mod person;
pub mod record;
pub mod settings;
pub mod start;
