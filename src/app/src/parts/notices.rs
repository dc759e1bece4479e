//! What is said on every screen: troubles with the device, the invented case, a new version.

use leptos::prelude::*;

use super::buttons::plain;
use crate::device::ready;
use crate::state::app::App;
use crate::words::start as words;

/// The notices that apply now.
pub fn notices(app: App) -> AnyView {
    let unsaved = move || match app.unsaved() {
        0 => String::new(),
        count => words::unsaved(count),
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
            <div class="notice" hidden=move || app.update.get() != "ready">
                {words::NEW_VERSION} {plain(words::TAKE_IT.to_owned(), ready::take_update)}
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
