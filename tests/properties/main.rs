//! Properties that hold whatever the patient.

mod body;
mod study;
