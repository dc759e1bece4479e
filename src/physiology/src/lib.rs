//! The body: acid–base chemistry, CO2 contents, the pools, their course over time, and learning from gases.
//! Pure: no clock, no input or output, no random source but a seed, no panic. Numbers go through `libm`, so
//! that the same seed gives the same bits natively and in wasm.

mod acid_base;
mod body;
mod chemistry;
mod content;
mod course;
mod draws;
mod ensemble;
mod learn;
mod linear;
mod normal;
mod person;
mod priors;
mod proposal;
mod quantile;
mod saturation;
mod stepper;

pub use acid_base::{be_blood, hco3_mmol_l, ph_at, ph_of_blood, standard_base_excess};
pub use body::{Body, Drive, State};
pub use chemistry::{Chemistry, ChemistryInput, Unsound};
pub use content::{blood_content_ml_l, blood_to_plasma_ratio, plasma_content_ml_dl};
pub use course::{Course, Input, minutes_to_share, minutes_to_within};
pub use draws::standard_normals;
pub use ensemble::{Ensemble, Future, Past};
pub use learn::{Learning, NoMode, Observation};
pub use normal::{normal_cdf, normal_quantile};
pub use person::{
    Patient, SedationDepth, Sex, predicted_body_weight_kg, production_factor, resting_production,
};
pub use priors::{Exact, JUMP_FIRST, Means, Member, Priors, Step};
pub use quantile::{sort_weighted, weighted_quantile, weighted_quantiles};
pub use saturation::{oxygen_saturation, saturation_in_blood};
