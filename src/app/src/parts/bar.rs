//! The bar along the bottom: the rooms by their names. It leaves while keys are open.

use leptos::prelude::*;

use crate::state::app::app;
use crate::state::room::Room;
use crate::words::{change, now};

const ROOMS: [(Room, &str); 2] = [(Room::Now, now::TITLE), (Room::Change, change::BAR)];

/// The bar.
#[component]
pub fn Bar() -> impl IntoView {
    let app = app();
    let gone = move || app.room.get() == Room::Start || app.active.get().is_some();
    let links = ROOMS.map(|(room, name)| {
        let current = move || (app.room.get() == room).then_some("page");
        view! { <a class="bar-room" href=room.hash() aria-current=current>{name}</a> }
    });
    view! { <nav class="bar" aria-label="Rooms" hidden=gone>{links.collect_view()}</nav> }
}
