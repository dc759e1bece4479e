//! What is said on every screen: troubles with the device, the invented case, a new version.

use leptos::prelude::*;

use crate::device::ready;
use crate::state::app::app;
use crate::words::start as words;

/// The notices that apply now.
#[component]
pub fn Notices() -> impl IntoView {
    let app = app();
    let demo = move || app.label().is_some_and(|label| label == words::DEMO_LABEL);
    let trouble = move || {
        app.trouble.get().map(|said| view! { <p class="notice notice-trouble" role="alert">{said}</p> })
    };
    let unsaved = move || {
        let count = app.unsaved();
        (count > 0).then(|| view! { <p class="notice notice-trouble" role="alert">{words::unsaved(count)}</p> })
    };
    let version = move || {
        (app.update.get() == "ready").then(|| {
            view! {
                <p class="notice">
                    {words::NEW_VERSION} " "
                    <button type="button" class="plain" on:click=|_| ready::take_update()>{words::TAKE_IT}</button>
                </p>
            }
        })
    };
    view! {
        <div class="notices">
            {trouble} {unsaved} {version}
            {move || demo().then(|| view! { <p class="notice">{words::DEMO_OPEN}</p> })}
        </div>
    }
}

/// Whether it works without signal, in a line.
#[component]
pub fn Readiness() -> impl IntoView {
    let app = app();
    let said = move || match app.offline.get().as_str() {
        "ready" => words::READY,
        "no" => words::NOT_READY,
        "unsupported" => words::NEVER_READY,
        _ => words::GETTING_READY,
    };
    view! { <p class="readiness" role="status">{said}</p> }
}
