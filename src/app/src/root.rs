//! The root: header, the open room, bar.

use leptos::prelude::*;

use crate::device::page;
use crate::parts::bar::Bar;
use crate::parts::header::{Header, title};
use crate::parts::notices::Notices;
use crate::rooms::{change, gas, now, person, record, settings, start};
use crate::state::app::App;
use crate::state::room::Room;
use crate::words::start::NAME;

/// The whole page.
#[component]
pub fn Root() -> impl IntoView {
    let app = App::new();
    provide_context(app);
    app.follow();
    Effect::new(move |before: Option<Room>| {
        let room = app.room.get();
        page::title(&format!("{}: {NAME}", title(room)));
        if before.is_some() {
            page::focus("room-title");
        }
        room
    });
    let room = move || match app.room.get() {
        Room::Start => view! { <start::Start /> }.into_any(),
        Room::Gas => view! { <gas::Gas /> }.into_any(),
        Room::Settings => view! { <settings::Settings /> }.into_any(),
        Room::Now => view! { <now::Now /> }.into_any(),
        Room::Change => view! { <change::Change /> }.into_any(),
        Room::Record => view! { <record::Record /> }.into_any(),
        Room::Person => view! { <person::Person /> }.into_any(),
    };
    view! {
        <div class="page" class:keys-open=move || app.active.get().is_some()>
            <Header />
            <Notices />
            <main class="room">{room}</main>
            <Bar />
        </div>
        <p class="unseen" role="status" aria-live="polite">{app.told}</p>
    }
}
