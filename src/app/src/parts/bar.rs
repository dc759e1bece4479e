//! The bar along the bottom: the rooms by their names. It leaves while keys are open.

use leptos::prelude::*;

use crate::state::app::App;
use crate::state::room::Room;
use crate::words::{change, header as words, now};

const ROOMS: [(Room, &str); 2] = [(Room::Now, now::TITLE), (Room::Change, change::BAR)];

/// The bar.
pub fn bar(app: App) -> AnyView {
    let gone = move || app.room.get() == Room::Start || app.active.get().is_some();
    let mut links = vec![];
    for (room, name) in ROOMS {
        let current = move || if app.room.get() == room { "page" } else { "false" };
        links.push(
            view! { <a class="bar-room" href=room.hash() aria-current=move || current()>{name}</a> }
                .into_any(),
        );
    }
    view! { <nav class="bar" aria-label=words::ROOMS hidden=move || gone()>{links}</nav> }.into_any()
}
