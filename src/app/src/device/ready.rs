//! What the page's start script says: whether everything is kept for no signal, and whether a new version waits.

use leptos::prelude::*;
use wasm_bindgen::closure::Closure;
use wasm_bindgen::{JsCast, JsValue};
use web_sys::{HtmlElement, js_sys::Function, js_sys::Reflect};

/// What is said about working without signal, now and whenever it changes: "working", "ready", "no" or
/// "unsupported".
pub fn offline() -> RwSignal<String> {
    followed("offline", "slackwater:offline")
}

/// "ready" when a new version waits.
pub fn update() -> RwSignal<String> {
    followed("update", "slackwater:update")
}

fn said(name: &str) -> String {
    let root = document().document_element().and_then(|root| root.dyn_into::<HtmlElement>().ok());
    root.and_then(|root| root.dataset().get(name)).unwrap_or_default()
}

/// Lives as long as the page: call it from the root only.
fn followed(name: &'static str, event: &str) -> RwSignal<String> {
    let signal = RwSignal::new(said(name));
    let look = Closure::<dyn Fn()>::new(move || {
        signal.try_set(said(name));
    });
    // Refused only by a page that is being torn down.
    let _ = document().add_event_listener_with_callback(event, look.as_ref().unchecked_ref());
    look.forget();
    signal
}

/// Takes the new version, where the start script offers one.
pub fn take_update() {
    let take = Reflect::get(&window(), &JsValue::from_str("slackwaterUpdate")).ok();
    if let Some(take) = take.and_then(|take| take.dyn_into::<Function>().ok()) {
        // What it throws is its own affair: the page stays as it is.
        let _ = take.call0(&JsValue::NULL);
    }
}
