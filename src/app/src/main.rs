//! The page. Only mounts: rooms are in `rooms`, controls in `parts`, what they share in `state`, the browser
//! in `device`, and every word in `words`.

mod device;
mod parts;
mod rooms;
mod root;
mod state;
mod words;

fn main() {
    leptos::mount::mount_to_body(root::root);
}
