//! Record files of every version that ever was, and files that must be refused with a clear sentence. The
//! fixtures are invented; those of a version that was released are never changed.

#![allow(clippy::unwrap_used, reason = "a test fails by it")]

mod files;
mod journals;
mod refused;
