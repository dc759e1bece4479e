//! Controls, a file each.

pub mod bar;
pub mod case_file;
pub mod cautions;
pub mod chart;
pub mod chips;
pub mod figure;
pub mod form;
pub mod header;
pub mod keypad;
pub mod keys;
pub mod main_button;
pub mod notices;
pub mod number;
pub mod questions;
pub mod scale;
pub mod stepper;
