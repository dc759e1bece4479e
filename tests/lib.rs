//! The checks of the project; each folder here is one test program. The library itself is empty.
