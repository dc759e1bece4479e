//! A row of chips: one of a few words. Pressing one chooses it and leads on.

use leptos::prelude::*;

use super::buttons::press;
use crate::device::clock;
use crate::state::app::App;
use crate::state::choice::Choice;

/// The chips of `choice`; `then` runs after one was chosen, `fault` says what is wrong.
pub fn chips(
    app: App,
    choice: Choice,
    fault: impl Fn() -> Option<String> + Copy + Send + Sync + 'static,
    then: impl Fn() + Copy + 'static,
) -> AnyView {
    let spec = choice.spec();
    let pick = move || app.sheet.with(|sheet| sheet.pick(choice));
    let mut all = vec![];
    for (place, words) in (0_u8..).zip(spec.options) {
        let choose = move || {
            app.sheet.update(|sheet| sheet.choose(choice, Some(place), &clock::now()));
            then();
        };
        let pressed = move || pick() == Some(place);
        // The first chip carries the group's id, so that focus can be led to the group.
        all.push(chip(words, if place == 0 { spec.id } else { "" }, pressed, choose));
    }
    group(spec.label, spec.columns, all, fault)
}

/// One chip.
pub fn chip(
    words: &'static str,
    id: &'static str,
    pressed: impl Fn() -> bool + Send + 'static,
    choose: impl FnMut() + 'static,
) -> AnyView {
    view! {
        <button
            type="button"
            class="chip"
            id=id
            aria-pressed=move || if pressed() { "true" } else { "false" }
            on:click=press(choose)
        >
            {words}
        </button>
    }
    .into_any()
}

/// A named group of chips with its error.
pub fn group(
    label: &'static str,
    columns: u8,
    chips: Vec<AnyView>,
    fault: impl Fn() -> Option<String> + Copy + Send + Sync + 'static,
) -> AnyView {
    let columns = if columns == 2 { "chips-row chips-2" } else { "chips-row chips-3" };
    view! {
        <div class="field chips" role="group" aria-label=crate::words::spoken::spoken(label)>
            <span class="field-label" aria-hidden="true">{label}</span>
            <div class=columns>{chips}</div>
            {error("", fault)}
        </div>
    }
    .into_any()
}

/// What is wrong, beside its control.
pub fn error(id: &'static str, words: impl Fn() -> Option<String> + Copy + Send + Sync + 'static) -> AnyView {
    view! {
        <p class="fault" id=id hidden=move || words().is_none()>
            {move || words().unwrap_or_default()}
        </p>
    }
    .into_any()
}
