//! The keypad: large keys that act on release, and the strip that stands in its place while the phone's is used.

use std::cell::Cell;
use std::rc::Rc;

use leptos::prelude::*;

use super::buttons::{perhaps, press};
use super::keys::{Bounce, Key, press as pressed};
use super::touch::{Acts, Look, key, stay};
use crate::device::{clock, files, page};
use crate::state::app::App;
use crate::words::form as words;

/// What a key does.
#[derive(Clone, Copy, PartialEq)]
enum Act {
    Type(Key),
    Next,
    Paste,
    PhoneKeys,
    Close,
}

const fn digit(digit: u8) -> Act {
    Act::Type(Key::Digit(digit))
}

/// Row by row; Next stands at the bottom right.
const KEYS: [(&str, Act); 16] = [
    ("1", digit(1)),
    ("2", digit(2)),
    ("3", digit(3)),
    (words::DELETE, Act::Type(Key::Delete)),
    ("4", digit(4)),
    ("5", digit(5)),
    ("6", digit(6)),
    (words::PASTE, Act::Paste),
    ("7", digit(7)),
    ("8", digit(8)),
    ("9", digit(9)),
    (words::PHONE_KEYS, Act::PhoneKeys),
    (". ,", Act::Type(Key::Point)),
    ("0", digit(0)),
    (words::CLOSE_KEYS, Act::Close),
    (words::NEXT, Act::Next),
];

/// The keypad, while a field is open; `next` goes to the next field.
pub fn keypad(app: App, next: fn(App)) -> AnyView {
    let open = Memo::new(move |_| app.active.get().is_some());
    let keys = move || {
        perhaps(open.get().then(|| if app.phone_keys.get() { strip(app, next) } else { all(app, next) }))
    };
    view! { {move || keys()} }.into_any()
}

fn strip(app: App, next: fn(App)) -> AnyView {
    let ours = move || {
        app.use_phone_keys(false);
        refocus(app);
    };
    let close = move || app.active.set(None);
    view! {
        <div class="strip" on:mousedown=stay()>
            <button type="button" class="plain" on:click=press(ours)>{words::OUR_KEYS}</button>
            <button type="button" class="plain" on:click=press(close)>{words::CLOSE_KEYS}</button>
            <button type="button" class="plain" on:click=press(move || next(app))>{words::NEXT}</button>
        </div>
    }
    .into_any()
}

fn all(app: App, next: fn(App)) -> AnyView {
    let bounce = Rc::new(Cell::new(Bounce::default()));
    let mut keys = vec![];
    for (sign, what) in KEYS {
        let class = match what {
            Act::Next => "key key-next",
            Act::Type(Key::Digit(_) | Key::Point) => "key",
            _ => "key key-word",
        };
        let bounce = Rc::clone(&bounce);
        let act = move || {
            if what == Act::Next {
                next(app);
            } else {
                act(app, what, &bounce);
            }
            true
        };
        let acts = if matches!(what, Act::Type(_)) { Acts::AtRelease } else { Acts::AtClick };
        keys.push(key(Look { sign, name: sign.to_owned(), class, acts }, Box::new(act)));
    }
    view! { <div class="keypad" role="group" aria-label=words::KEYPAD>{keys}</div> }.into_any()
}

fn act(app: App, what: Act, bounce: &Cell<Bounce>) {
    match what {
        Act::Type(key) => {
            let mut last = bounce.get();
            let counts = last.counts(key, clock::since_load_ms());
            bounce.set(last);
            if counts {
                type_key(app, key);
            }
        }
        Act::Paste => paste(app),
        Act::PhoneKeys => {
            app.use_phone_keys(true);
            refocus(app);
        }
        Act::Close | Act::Next => app.active.set(None),
    }
}

fn type_key(app: App, key: Key) {
    let Some(field) = app.active.get_untracked() else { return };
    let text = app.sheet.with_untracked(|sheet| sheet.text(field).to_owned());
    match pressed(&text, key, field.spec().keys) {
        Ok(text) => app.type_text(field, text),
        Err(words) => app.tell(words),
    }
}

fn paste(app: App) {
    let Some(field) = app.active.get_untracked() else { return };
    files::pasted(move |text| match text.as_deref().map(str::trim) {
        Some(text) if !text.is_empty() => {
            let text: String = text.chars().take(16).collect();
            app.type_text(field, text);
            // What was pasted is judged at once: nobody goes on typing it.
            app.leave(field);
        }
        _ => app.trouble.set(words::NO_PASTE.to_owned()),
    });
}

fn refocus(app: App) {
    if let Some(field) = app.active.get_untracked() {
        page::refocus(field.spec().id);
    }
}
