//! Import and export of a case file: plain buttons.

use leptos::prelude::*;
use logbook::FileError;

use crate::device::{clock, files, page};
use crate::state::app::App;
use crate::state::room::Room;
use crate::words::record as words;

/// Chooses a case file and opens it as a new case.
pub fn import(app: App) -> AnyView {
    let chosen = move |event: leptos::ev::Event| {
        let Some(input) = page::input(&event) else { return };
        files::chosen(&input, logbook::LARGEST_FILE_BYTES, move |read| match read {
            Ok(text) => {
                if app.import(&text) {
                    app.tell(&words::imported(&app.label().unwrap_or_default()));
                    page::go(Room::Now.hash());
                }
            }
            Err(0) => app.trouble.set(words::UNREADABLE.to_owned()),
            Err(bytes) => app.trouble.set(FileError::TooLarge { bytes }.to_string()),
        });
    };
    view! {
        <label class="plain file-button">
            {words::IMPORT}
            <input type="file" class="file-input" accept=".json,application/json" on:change=chosen />
        </label>
    }
    .into_any()
}

/// Downloads the open case.
pub fn export(app: App) {
    let Some(text) = app.export() else { return };
    let name = words::file_name(&untrack(|| app.label()).unwrap_or_default(), &clock::now());
    if files::download(&name, &text).is_err() {
        app.trouble.set(words::NO_EXPORT.to_owned());
    }
}
