//! Buttons: the one filled button of a screen, and the outlined ones.

use leptos::ev::MouseEvent;
use leptos::prelude::*;

use crate::state::app::App;

/// What a press does, of one type whatever it does: closures of their own types would each carry the
/// machinery of drawing with them.
pub type Press = Box<dyn FnMut(MouseEvent)>;

/// A press that does `act`.
pub fn press(mut act: impl FnMut() + 'static) -> Press {
    Box::new(move |_| act())
}

/// The main button: what it does, and a line under it where there is one. It lies in the same place in every
/// room, so it takes no press just after a room was entered.
pub fn main_button(
    app: App,
    label: fn(App) -> String,
    more: fn(App) -> Option<String>,
    act: fn(App),
) -> AnyView {
    view! {
        <button
            type="button"
            id="main-button"
            class="main-button"
            disabled=move || !app.settled.get()
            on:click=press(move || act(app))
        >
            <span class="main-label">{move || label(app)}</span>
            <span class="main-more">{move || more(app).unwrap_or_default()}</span>
        </button>
    }
    .into_any()
}

/// An outlined button.
pub fn plain(label: String, act: impl FnMut() + 'static) -> AnyView {
    view! { <button type="button" class="plain" on:click=press(act)>{label}</button> }.into_any()
}

/// A link that looks like an outlined button.
pub fn link(label: String, hash: &'static str) -> AnyView {
    view! { <a class="plain" href=hash>{label}</a> }.into_any()
}

/// The view, or nothing.
pub fn perhaps(view: Option<AnyView>) -> AnyView {
    view.unwrap_or_else(|| ().into_any())
}
