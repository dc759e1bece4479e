//! First open: three lines of caution and the ways in.

use leptos::prelude::*;

use crate::device::page;
use crate::parts::buttons::{main_button, perhaps, plain};
use crate::parts::case_file::import;
use crate::parts::html::said;
use crate::parts::notices::readiness;
use crate::state::app::App;
use crate::state::room::Room;
use crate::words::{person, start as words};

/// The room.
pub fn start(app: App) -> AnyView {
    let cautions: String = words::CAUTIONS.iter().map(|line| said("p", "", line)).collect();
    let not_for: String = words::NOT_FOR_LIST.iter().map(|line| said("li", "", line)).collect();
    let another = untrack(|| app.open.with(Option::is_some))
        .then(|| plain(person::NEW_CASE.to_owned(), move || new_case(app)));
    view! {
        <div class="scroll start">
            <p class="lead">{words::JOB}</p>
            <div class="cautions" inner_html=cautions></div>
            <details class="not-for">
                <summary>{words::NOT_FOR}</summary>
                <ul inner_html=not_for></ul>
            </details>
            <div class="ways">
                {perhaps(another)}
                {import(app)}
                {plain(words::INVENTED.to_owned(), move || app.open_demo())}
                <p class="hint">{words::INVENTED_MORE}</p>
            </div>
            {readiness(app)}
        </div>
        <div class="dock">{main_button(app, label, more, go_on)}</div>
    }
    .into_any()
}

/// Goes on to the next patient.
pub fn new_case(app: App) {
    if app.start_another() {
        page::go(Room::Gas.hash());
    }
}

fn label(app: App) -> String {
    app.label().map_or_else(|| words::TYPE_A_GAS.to_owned(), |label| words::back_to(&label))
}

fn more(app: App) -> Option<String> {
    app.label().is_none().then(|| words::ACCEPTS.to_owned())
}

fn go_on(app: App) {
    let open = app.open.with_untracked(Option::is_some);
    page::go(if open { Room::Now } else { Room::Gas }.hash());
}
