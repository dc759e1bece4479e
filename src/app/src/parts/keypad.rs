//! The keypad: large keys that act on release. A physical keyboard types into the field itself, so the keys
//! are not in the tab order; touch exploration finds them.

use leptos::ev::{MouseEvent, PointerEvent};
use leptos::prelude::*;

use super::keys::{Bounce, Key, press, within_slop};
use crate::device::{clock, files, page};
use crate::state::app::{App, app};
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

/// Our keypad, or the strip that stands in its place while the phone's is used. Nothing while no field is open.
#[component]
pub fn Keypad(
    /// Goes to the next field.
    next: Callback<()>,
) -> impl IntoView {
    let app = app();
    move || {
        app.active.get().is_some().then(|| {
            if app.phone_keys.get() {
                view! { <PhoneStrip next /> }.into_any()
            } else {
                view! { <Keys next /> }.into_any()
            }
        })
    }
}

#[component]
fn PhoneStrip(next: Callback<()>) -> impl IntoView {
    let app = app();
    let ours = move |_| {
        app.use_phone_keys(false);
        if let Some(field) = app.active.get_untracked() {
            page::focus(field.spec().id);
        }
    };
    view! {
        <div class="strip">
            <button type="button" class="plain" on:mousedown=keep_focus on:click=ours>{words::OUR_KEYS}</button>
            <button type="button" class="plain" on:mousedown=keep_focus on:click=move |_| next.run(())>
                {words::NEXT}
            </button>
        </div>
    }
}

#[component]
fn Keys(next: Callback<()>) -> impl IntoView {
    let app = app();
    let bounce = StoredValue::new(Bounce::default());
    let act = Callback::new(move |act: Act| match act {
        Act::Next => next.run(()),
        Act::Paste => paste(app),
        Act::PhoneKeys => to_phone_keys(app),
        Act::Close => app.active.set(None),
        Act::Type(key) => {
            let counts = bounce.try_update_value(|bounce| bounce.counts(key, clock::since_load_ms()));
            if counts == Some(true) {
                type_key(app, key);
            }
        }
    });
    view! {
        <div class="keypad" role="group" aria-label=words::KEYPAD>
            {KEYS.map(|(label, what)| view! { <KeyButton label what act /> }).collect_view()}
        </div>
    }
}

/// A press and its release with the same finger on the same key, or a click without either: from a switch
/// or a screen reader.
#[component]
fn KeyButton(label: &'static str, what: Act, act: Callback<Act>) -> impl IntoView {
    let down = StoredValue::new(None::<(i32, f64, f64)>);
    let acted = StoredValue::new(f64::NEG_INFINITY);
    let pressed = move |event: PointerEvent| {
        down.set_value(Some((event.pointer_id(), f64::from(event.client_x()), f64::from(event.client_y()))));
    };
    let released = move |event: PointerEvent| {
        let (x, y) = (f64::from(event.client_x()), f64::from(event.client_y()));
        let hit = down.get_value().is_some_and(|(id, x0, y0)| {
            id == event.pointer_id() && within_slop(x0, y0, x, y)
        });
        down.set_value(None);
        // A slide off the key is neither a press nor the click that may follow it.
        acted.set_value(event.time_stamp());
        if hit {
            act.run(what);
        }
    };
    let clicked = move |event: MouseEvent| {
        if event.time_stamp() - acted.get_value() > AFTER_POINTER_MS {
            act.run(what);
        }
    };
    let class = match what {
        Act::Next => "key key-next",
        Act::Type(Key::Digit(_) | Key::Point) => "key",
        _ => "key key-word",
    };
    view! {
        <button
            type="button"
            class=class
            tabindex="-1"
            on:mousedown=keep_focus
            on:pointerdown=pressed
            on:pointerup=released
            on:click=clicked
        >
            {label}
        </button>
    }
}

/// A click this soon after a release belongs to it.
const AFTER_POINTER_MS: f64 = 400.0;

/// The field keeps its focus while keys are pressed.
fn keep_focus(event: MouseEvent) {
    event.prevent_default();
}

fn type_key(app: App, key: Key) {
    let Some(field) = app.active.get_untracked() else { return };
    let text = app.sheet.with_untracked(|sheet| sheet.text(field).to_owned());
    match press(&text, key, field.spec().keys) {
        Ok(text) => app.sheet.update(|sheet| sheet.set_text(field, text)),
        Err(words) => app.tell(words),
    }
}

fn paste(app: App) {
    let Some(field) = app.active.get_untracked() else { return };
    files::pasted(move |text| match text.as_deref().map(str::trim) {
        Some(text) if !text.is_empty() => {
            let text: String = text.chars().take(16).collect();
            app.sheet.update(|sheet| sheet.set_text(field, text));
            // What was pasted is judged at once: nobody goes on typing it.
            app.left.update(|left| left.push(field));
        }
        _ => app.trouble.set(Some(words::NO_PASTE.to_owned())),
    });
}

fn to_phone_keys(app: App) {
    app.use_phone_keys(true);
    if let Some(field) = app.active.get_untracked() {
        page::refocus(field.spec().id);
    }
}
