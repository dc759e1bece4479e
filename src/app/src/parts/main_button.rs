//! The one filled button of a screen.

use leptos::prelude::*;

/// The main button: what it does, and a line under it where there is one.
#[component]
pub fn MainButton(
    /// What it does.
    #[prop(into)]
    label: Signal<String>,
    /// The line under it.
    #[prop(into)]
    more: Signal<Option<String>>,
    /// Runs when it is pressed.
    press: Callback<()>,
) -> impl IntoView {
    view! {
        <button type="button" id="main-button" class="main-button" on:click=move |_| press.run(())>
            <span class="main-label">{label}</span>
            {move || more.get().map(|more| view! { <span class="main-more">{more}</span> })}
        </button>
    }
}
