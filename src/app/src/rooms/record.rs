//! Everything written, latest first; export and import.

use case::{Entry, Now};
use leptos::prelude::*;

use crate::parts::case_file::{Export, Import};
use crate::state::app::{App, app};
use crate::words::record as words;
use crate::words::values::day_and_clock;

/// The room.
#[component]
pub fn Record() -> impl IntoView {
    let app = app();
    let entries = move || {
        let case = app.case();
        let now = app.now.get();
        let rows = case.entries().iter().rev().map(|entry| row(entry, app, &now));
        rows.collect_view()
    };
    let empty = move || app.case().entries().is_empty();
    let there = move || app.open.with(Option::is_some);
    view! {
        <div class="scroll record">
            <p class="note" hidden=move || !empty()>{words::EMPTY}</p>
            <ol class="entries">{entries}</ol>
            <SetAside />
            <div class="ways"><Import /></div>
        </div>
        <div class="dock">{move || there().then(|| view! { <Export /> })}</div>
    }
}

fn row(entry: &Entry, app: App, now: &Now) -> impl IntoView + use<> {
    let said = words::entry(entry, &app.case(), now);
    let unknown = (!entry.not_understood.is_empty()).then(|| words::not_understood(&entry.not_understood));
    view! {
        <li class="entry">
            <span class="entry-time">{day_and_clock(entry.at, now)}</span>
            <span class="entry-words">
                {said}
                {unknown.map(|said| view! { <span class="entry-unknown">{said}</span> })}
            </span>
        </li>
    }
}

/// Texts that could not be read: moved aside, shown as found, never written over.
#[component]
fn SetAside() -> impl IntoView {
    let app = app();
    move || {
        let aside = app.set_aside();
        (!aside.is_empty()).then(|| {
            let rows = aside.into_iter().map(|one| {
                view! {
                    <li>
                        <p class="caution">{one.why}</p>
                        <p class="hint">{one.key}</p>
                        <pre class="aside-text" tabindex="0">{one.text}</pre>
                    </li>
                }
            });
            view! {
                <h2>{words::SET_ASIDE}</h2>
                <ul class="plain-list">{rows.collect_view()}</ul>
            }
        })
    }
}
