//! The case: a person, the entries made about them, and what the entries amount to at a moment.
//! No storage, no JSON, no clock: times come in as [`Moment`] and [`Now`].

mod entry;
mod moment;
mod person;
mod settings;
mod timeline;

pub use entry::{
    AirwayState, Circulation, Condition, Correction, EndTidal, Entry, EntryId, EntryKind, Gas, GasChoice,
    GasVerdict, Measured, NotUnderstood, Sedation, SedationLevel, Site, Trace,
};
pub use moment::{Moment, Now};
pub use person::{HeightHow, Person, Sex};
pub use settings::{Airway, Breath, Control, Effort, Leak, Settings};
pub use timeline::{Case, CaseError};
