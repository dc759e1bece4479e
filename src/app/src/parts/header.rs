//! The header: which case, what time, the record; in a room entered from another, the way back.

use leptos::prelude::*;

use crate::state::app::{App, app};
use crate::state::room::Room;
use crate::words::{change, form, header as words, now, person, record, start, values};

/// A room's title.
pub const fn title(room: Room) -> &'static str {
    match room {
        Room::Start => start::NAME,
        Room::Gas => form::GAS_TITLE,
        Room::Settings => form::SETTINGS_TITLE,
        Room::Now => now::TITLE,
        Room::Change => change::TITLE,
        Room::Record => record::TITLE,
        Room::Person => person::TITLE,
    }
}

/// Where the way back leads.
fn back(app: App, room: Room) -> Option<Room> {
    let open = app.open.with(Option::is_some);
    match room {
        Room::Start | Room::Now | Room::Change => None,
        Room::Settings if !open => Some(Room::Gas),
        _ if open => Some(Room::Now),
        _ => Some(Room::Start),
    }
}

/// The header of the open room.
#[component]
pub fn Header() -> impl IntoView {
    let app = app();
    let heading = move || title(app.room.get());
    let main_room = move || matches!(app.room.get(), Room::Now | Room::Change);
    let back_link = move || {
        back(app, app.room.get())
            .map(|room| view! { <a class="header-link" href=room.hash()>{words::BACK}</a> })
    };
    let case_link = move || {
        let on_sheet = app.room.get() == Room::Person || app.room.get() == Room::Start;
        let label = app.label().filter(|_| !on_sheet)?;
        let spoken = words::case(&label);
        Some(view! {
            <a class="header-link header-case" href=Room::Person.hash() aria-label=spoken>{label}</a>
        })
    };
    let record_link = move || {
        (main_room() && app.open.with(Option::is_some)).then(|| {
            view! {
                <span class="header-time">{move || values::clock(app.now.get().wall, &app.now.get())}</span>
                <a class="header-link" href=Room::Record.hash()>{record::TITLE}</a>
            }
        })
    };
    view! {
        <header class="header">
            {back_link}
            {move || main_room().then(case_link)}
            <h1 id="room-title" tabindex="-1" class:unseen=move || {
                main_room() && app.open.with(Option::is_some)
            }>{heading}</h1>
            {record_link}
            {move || (!main_room()).then(case_link)}
        </header>
    }
}
