//! Properties of the body that hold whatever the patient.

mod body;
