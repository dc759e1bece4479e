//! The page. Only mounts: rooms are in `rooms`, controls in `parts`, what they share in `state`, the browser
//! in `device`, and every word in `words`.

// A closure written out inside `view!` is brought to one type with all others (see `--cfg erase_components`);
// a function or a variable in its place is not, and each then carries the whole machinery of drawing with it.
#![allow(clippy::redundant_closure, reason = "written-out closures keep the program small")]

mod device;
mod parts;
mod rooms;
mod root;
mod state;
mod words;

fn main() {
    leptos::mount::mount_to_body(root::root);
}
