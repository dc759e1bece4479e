//! The header: which case, what time, the record; in a room entered from another, the way back.

use leptos::prelude::*;

use super::html::{said, tag, text};
use crate::state::app::App;
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
const fn back(room: Room, open: bool) -> Option<Room> {
    match room {
        Room::Start | Room::Now | Room::Change => None,
        Room::Settings if !open => Some(Room::Gas),
        _ if open => Some(Room::Now),
        _ => Some(Room::Start),
    }
}

fn link(class: &str, room: Room, name: &str, words: &str) -> String {
    tag("a", &[("class", class), ("href", room.hash()), ("aria-label", name)], &text(words))
}

/// The header of the open room: links around its title.
pub fn header(app: App) -> AnyView {
    let main = move || matches!(app.room.get(), Room::Now | Room::Change) && app.open.with(Option::is_some);
    let case_link = move || {
        let on_sheet = matches!(app.room.get(), Room::Person | Room::Start);
        let label = app.label().filter(|_| !on_sheet);
        label.map(|label| link("header-link header-case", Room::Person, &words::case(&label), &label))
    };
    let left = Memo::new(move |_| {
        if main() {
            return case_link().unwrap_or_default();
        }
        let back = back(app.room.get(), app.open.with(Option::is_some));
        back.map(|room| link("header-link", room, words::BACK, words::BACK)).unwrap_or_default()
    });
    // The links stand apart from the time and are drawn anew only when they are others, so that the focus on one
    // is not lost each minute.
    let right = Memo::new(move |_| {
        if main() {
            link("header-link", Room::Record, record::TITLE, record::TITLE)
        } else {
            case_link().unwrap_or_default()
        }
    });
    let time = move || {
        let now = app.now.get();
        let clock = main().then(|| said("span", "header-time", &values::clock(now.wall, &now)));
        clock.unwrap_or_default()
    };
    view! {
        <header class="header">
            <div class="header-side" inner_html=move || left.get()></div>
            <h1 id="room-title" tabindex="-1" class=move || if main() { "unseen" } else { "" }>
                {move || title(app.room.get()).to_owned()}
            </h1>
            <div class="header-side" inner_html=move || time()></div>
            <div class="header-side" inner_html=move || right.get()></div>
        </header>
    }
    .into_any()
}
