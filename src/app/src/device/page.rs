//! The page itself: its address, title, and where the focus stands.

use leptos::ev::{beforeunload, hashchange, storage, visibilitychange};
use leptos::prelude::*;
use wasm_bindgen::JsCast;
use web_sys::{HtmlElement, HtmlInputElement, ScrollIntoViewOptions, ScrollLogicalPosition};

/// The part of the address after `#`, with it.
pub fn hash() -> String {
    window().location().hash().unwrap_or_default()
}

/// Goes to another room; Back comes here again.
pub fn go(hash: &str) {
    // Refused only while the page is being torn down.
    let _ = window().location().set_hash(hash);
}

/// Goes to another room in place of this one: Back does not come here again.
pub fn go_instead(hash: &str) {
    let _ = window().location().replace(hash);
}

/// Calls `act` with the new address whenever it changes.
pub fn on_hash(act: impl Fn(String) + 'static) {
    // Dropping the handle leaves the listener in place: it lives as long as the page.
    let _ = window_event_listener(hashchange, move |_| act(hash()));
}

/// Has the browser ask before the page is left while `lose` says that something would be lost.
pub fn before_leaving(lose: impl Fn() -> bool + 'static) {
    let _ = window_event_listener(beforeunload, move |event| {
        if lose() {
            event.prevent_default();
        }
    });
}

/// Calls `act` with the key that another tab stored under; with none when it emptied the storage.
pub fn on_stored(act: impl Fn(Option<String>) + 'static) {
    let _ = window_event_listener(storage, move |event| act(event.key()));
}

/// Calls `act` whenever the page is looked at again.
pub fn on_seen(act: impl Fn() + 'static) {
    let _ = window_event_listener(visibilitychange, move |_| {
        if !document().hidden() {
            act();
        }
    });
}

/// Names the page for the tab and for screen readers.
pub fn title(words: &str) {
    document().set_title(words);
}

fn element(id: &str) -> Option<HtmlElement> {
    document().get_element_by_id(id)?.dyn_into().ok()
}

/// Moves the focus once what was just changed is drawn, and brings the place into sight.
pub fn focus(id: &'static str) {
    request_animation_frame(move || {
        if let Some(element) = element(id) {
            let _ = element.focus();
            show(&element);
        }
    });
}

/// Shows the top of the room.
pub fn to_top() {
    if let Ok(Some(scroll)) = document().query_selector(".scroll") {
        scroll.set_scroll_top(0);
    }
}

/// A room that was entered is read from its title and seen from its top.
pub fn enter_room(title_id: &'static str) {
    request_animation_frame(move || {
        to_top();
        if let Some(title) = element(title_id) {
            let _ = title.focus();
        }
    });
}

/// Brings the place with this id into sight once what was just changed is drawn.
pub fn into_sight(id: &'static str) {
    request_animation_frame(move || {
        if let Some(element) = element(id) {
            show(&element);
        }
    });
}

fn show(element: &HtmlElement) {
    let options = ScrollIntoViewOptions::new();
    options.set_block(ScrollLogicalPosition::Nearest);
    element.scroll_into_view_with_scroll_into_view_options(&options);
}

/// The input behind an event.
pub fn input(event: &web_sys::Event) -> Option<HtmlInputElement> {
    event.target()?.dyn_into().ok()
}

/// Takes the focus away and gives it back, so that the phone's own keypad comes up.
pub fn refocus(id: &'static str) {
    if let Some(element) = element(id) {
        let _ = element.blur();
    }
    focus(id);
}
