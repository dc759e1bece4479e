//! The root: header, the open room, bar.

use leptos::prelude::*;

use crate::device::page;
use crate::parts::bar::bar;
use crate::parts::header::{header, title};
use crate::parts::notices::notices;
use crate::rooms::{change, gas, now, person, record, settings, start};
use crate::state::app::App;
use crate::state::room::Room;
use crate::words::start::NAME;

/// The whole page.
pub fn root() -> AnyView {
    let app = App::new();
    app.follow();
    Effect::new(move |before: Option<Room>| {
        let room = app.room.get();
        page::title(&format!("{}: {NAME}", title(room)));
        if before.is_some() {
            page::enter_room("room-title");
        }
        room
    });
    // The case is part of the key: another case's room is drawn anew.
    let place = Memo::new(move |_| {
        let case = app.open.with(|open| open.as_ref().map(|open| open.id.0.clone()));
        app.room.get().hash().to_owned() + &case.unwrap_or_default()
    });
    let room = move || {
        // Read, not only tracked: a memo that was never read follows nothing.
        place.with(|_| ());
        match app.room.get_untracked() {
            Room::Start => start::start(app),
            Room::Gas => gas::gas(app),
            Room::Settings => settings::settings(app),
            Room::Now => now::now(app),
            Room::Change => change::change(app),
            Room::Record => record::record(app),
            Room::Person => person::person(app),
        }
    };
    let class = move || if app.active.get().is_some() { "page keys-open" } else { "page" };
    view! {
        <div class=move || class()>
            {header(app)}
            {notices(app)}
            <main class="room">{move || room()}</main>
            {bar(app)}
        </div>
        <p class="unseen" role="status" aria-live="polite">{move || app.told.get()}</p>
    }
    .into_any()
}
