//! Every label, error and sentence, one file a room: short, plain, British.

pub mod change;
pub mod form;
pub mod header;
pub mod now;
pub mod person;
pub mod record;
pub mod spoken;
pub mod start;
pub mod values;
