//! A row of chips: one of a few words. Pressing one chooses it and leads on.

use leptos::prelude::*;

use super::buttons::press;
use crate::device::clock;
use crate::state::app::App;
use crate::state::choice::Choice;
use crate::words::form::time_meant;

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
        all.push(chip(words, (place == 0).then_some(spec.id), pressed, choose));
    }
    let meant = move || {
        let at = app.sheet.with(|sheet| sheet.moment(choice));
        at.map(|at| time_meant(at, &app.now.get())).unwrap_or_default()
    };
    let meant = view! { <p class="hint" hidden=move || meant().is_empty()>{move || meant()}</p> }.into_any();
    group(spec.label, vec![row(spec.columns, all), meant], Some(spec.fault_id), fault)
}

/// One chip.
pub fn chip(
    words: &'static str,
    id: Option<&'static str>,
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

/// Chips beside each other, so many in a line of a phone.
pub fn row(columns: u8, chips: Vec<AnyView>) -> AnyView {
    let columns = if columns == 2 { "chips-row chips-2" } else { "chips-row chips-3" };
    view! { <div class=columns>{chips}</div> }.into_any()
}

/// A named group around a row of chips, with its error, which has an id where there can be one.
pub fn group(
    label: &'static str,
    inner: Vec<AnyView>,
    fault_id: Option<&'static str>,
    fault: impl Fn() -> Option<String> + Copy + Send + Sync + 'static,
) -> AnyView {
    view! {
        <div
            class="field chips"
            role="group"
            aria-label=crate::words::spoken::spoken(label)
            aria-describedby=fault_id
        >
            <span class="field-label" aria-hidden="true">{label}</span>
            {inner}
            {error(fault_id, fault)}
        </div>
    }
    .into_any()
}

/// What is wrong, beside its control.
pub fn error(
    id: Option<&'static str>,
    words: impl Fn() -> Option<String> + Copy + Send + Sync + 'static,
) -> AnyView {
    view! {
        <p class="fault" id=id hidden=move || words().is_none()>
            {move || words().unwrap_or_default()}
        </p>
    }
    .into_any()
}
