//! A number field. The raw text is the state; the parsed number stands beside it in the sheet.

use leptos::ev::{FocusEvent, KeyboardEvent};
use leptos::prelude::*;

use super::buttons::press;
use super::chips::error;
use crate::device::page;
use crate::state::app::App;
use crate::state::field::Field;
use crate::words::form as words;

/// A number field with its label, unit and error; `hint` is the old value, `next` runs at Enter.
pub fn number_field(
    app: App,
    field: Field,
    fault: impl Fn() -> Option<String> + Copy + Send + Sync + 'static,
    hint: fn(App, Field) -> Option<String>,
    next: impl Fn() + Copy + 'static,
) -> AnyView {
    let spec = field.spec();
    let label = move || app.sheet.with(|sheet| sheet.label(field, app.group())).to_owned();
    let unit = move || app.sheet.with(|sheet| sheet.unit(field, app.group())).to_owned();
    let class = move || if app.active.get() == Some(field) { "field number active" } else { "field number" };
    let unit_view = if field.takes_kpa() {
        let change = move || app.sheet.update(|sheet| sheet.set_unit(field, !sheet.in_kpa(field)));
        view! {
            <button type="button" class="unit unit-button" on:click=press(change)>
                {move || unit()}
                <span class="unseen">{words::OTHER_UNIT}</span>
            </button>
        }
        .into_any()
    } else {
        view! { <span class="unit">{move || unit()}</span> }.into_any()
    };
    view! {
        <div class=move || class()>
            <label class="field-label" for=spec.id>{move || label()}</label>
            <input
                type="text"
                id=spec.id
                class="number-input"
                autocomplete="off"
                maxlength="16"
                inputmode=move || input_mode(app)
                placeholder=move || hint(app, field).unwrap_or_default()
                aria-invalid=move || if fault().is_some() { "true" } else { "false" }
                aria-describedby=spec.fault_id
                prop:value=move || app.sheet.with(|sheet| sheet.text(field).to_owned())
                on:input=typing(app, field)
                on:keydown=keys(app, next)
                on:focus=opening(app, field)
                on:blur=leaving(app, field)
            />
            {unit_view}
            {error(Some(spec.fault_id), fault)}
        </div>
    }
    .into_any()
}

/// Our keypad needs none of the phone's.
pub fn input_mode(app: App) -> &'static str {
    if app.phone_keys.get() { "decimal" } else { "none" }
}

/// What was typed goes into the sheet as it is.
pub fn typing(app: App, field: Field) -> Box<dyn FnMut(leptos::ev::Event)> {
    Box::new(move |event| {
        if let Some(input) = page::input(&event) {
            app.type_text(field, input.value());
        }
    })
}

/// Enter goes on, Escape closes the keypad.
pub fn keys(app: App, next: impl Fn() + 'static) -> Box<dyn FnMut(KeyboardEvent)> {
    Box::new(move |event| match event.key().as_str() {
        "Enter" => {
            event.prevent_default();
            next();
        }
        "Escape" => app.active.set(None),
        _ => {}
    })
}

/// A field that gets the focus opens the keypad and stays in sight above it.
pub fn opening(app: App, field: Field) -> Box<dyn FnMut(FocusEvent)> {
    Box::new(move |_| {
        app.active.set(Some(field));
        page::into_sight(field.spec().id);
    })
}

/// A field that was left may say what is wrong in it.
pub fn leaving(app: App, field: Field) -> Box<dyn FnMut(FocusEvent)> {
    Box::new(move |_| app.leave(field))
}
