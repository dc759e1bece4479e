//! Controls, a file each. What is only read is drawn as HTML text by pure functions; what is touched is a
//! Leptos view. Either way a control is a plain function: the program has to stay small.

pub mod bar;
pub mod buttons;
pub mod case_file;
pub mod cautions;
pub mod chart;
pub mod chips;
pub mod figure;
pub mod form;
pub mod header;
pub mod html;
pub mod keypad;
pub mod keys;
pub mod notices;
pub mod number;
pub mod questions;
pub mod scale;
pub mod stepper;
pub mod touch;
