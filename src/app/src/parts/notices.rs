//! What is said on every screen: troubles with the device, the invented case, a new version.

use leptos::prelude::*;

use super::buttons::plain;
use crate::state::app::App;
use crate::state::room::Room;
use crate::words::{record, start as words};

/// The notices that apply now.
pub fn notices(app: App) -> AnyView {
    let unsaved = move || match app.unsaved() {
        0 => String::new(),
        count => words::unsaved(count),
    };
    // It stays as long as the text does: the forecast goes on doing without it.
    let aside = move || match app.set_aside().len() {
        0 => String::new(),
        count => words::set_aside(count),
    };
    let demo = move || app.label().is_some_and(|label| label == words::DEMO_LABEL);
    view! {
        <div class="notices">
            <p class="notice notice-trouble" role="alert" hidden=move || app.trouble.get().is_empty()>
                {move || app.trouble.get()}
            </p>
            <p class="notice notice-trouble" role="alert" hidden=move || unsaved().is_empty()>
                {move || unsaved()}
            </p>
            <p class="notice notice-trouble" role="alert" hidden=move || !app.draft_lost.get()>
                {words::DRAFT_LOST}
            </p>
            <p class="notice notice-trouble" hidden=move || aside().is_empty()>
                {move || aside()} " " <a href=Room::Record.hash()>{record::TITLE}</a>
            </p>
            <div class="notice" hidden=move || app.update.get() != "ready">
                {words::NEW_VERSION} {plain(words::TAKE_IT.to_owned(), move || app.take_update())}
            </div>
            <p class="notice" hidden=move || !demo()>{words::DEMO_OPEN}</p>
        </div>
    }
    .into_any()
}

/// Whether it works without signal, in a line.
pub fn readiness(app: App) -> AnyView {
    let said = move || match app.offline.get().as_str() {
        "ready" => words::READY,
        "no" => words::NOT_READY,
        "unsupported" => words::NEVER_READY,
        _ => words::GETTING_READY,
    };
    view! { <p class="readiness" role="status">{move || said().to_owned()}</p> }.into_any()
}
