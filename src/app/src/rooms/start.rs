//! First open: three lines of caution and the ways in.

use leptos::prelude::*;

use crate::device::page;
use crate::parts::case_file::Import;
use crate::parts::main_button::MainButton;
use crate::parts::notices::Readiness;
use crate::state::app::app;
use crate::state::room::Room;
use crate::words::{person, start as words};

/// The room.
#[component]
pub fn Start() -> impl IntoView {
    let app = app();
    let label = Signal::derive(move || {
        app.label().map_or_else(|| words::TYPE_A_GAS.to_owned(), |label| words::back_to(&label))
    });
    let more = Signal::derive(move || app.label().is_none().then(|| words::ACCEPTS.to_owned()));
    let press = Callback::new(move |()| {
        let open = app.open.with_untracked(Option::is_some);
        page::go(if open { Room::Now } else { Room::Gas }.hash());
    });
    let new_case = move |_| {
        if app.start_another() {
            page::go(Room::Gas.hash());
        }
    };
    view! {
        <div class="scroll start">
            <p class="lead">{words::JOB}</p>
            <div class="cautions">
                {words::CAUTIONS.map(|line| view! { <p>{line}</p> }).collect_view()}
            </div>
            <details class="not-for">
                <summary>{words::NOT_FOR}</summary>
                <ul>{words::NOT_FOR_LIST.map(|line| view! { <li>{line}</li> }).collect_view()}</ul>
            </details>
            <div class="ways">
                {move || app.open.with(Option::is_some).then(|| view! {
                    <button type="button" class="plain" on:click=new_case>{person::NEW_CASE}</button>
                })}
                <Import />
                <button type="button" class="plain" on:click=move |_| app.open_demo()>
                    {words::INVENTED} <span class="faint">{words::INVENTED_MORE}</span>
                </button>
            </div>
            <Readiness />
        </div>
        <div class="dock">
            <MainButton label more press />
        </div>
    }
}
