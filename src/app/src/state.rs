//! State of the whole app, owned by the root: the book, the open case and its study, what is being typed.

pub mod app;
pub mod asks;
pub mod book;
pub mod choice;
pub mod demo;
pub mod draft;
pub mod field;
pub mod kept;
pub mod outlook;
pub mod present;
pub mod room;
pub mod rows;
pub mod sheet;
pub mod writing;
