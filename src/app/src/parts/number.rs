//! A number field. The raw text is the state; the parsed number stands beside it in the sheet.

use leptos::ev::KeyboardEvent;
use leptos::prelude::*;

use super::chips::Fault;
use crate::device::page;
use crate::state::app::app;
use crate::state::field::Field;
use crate::words::form as words;

/// A number field with its label, unit and error.
#[component]
pub fn NumberField(
    /// The field.
    field: Field,
    /// What is wrong, as a sentence.
    #[prop(into)]
    fault: Signal<Option<String>>,
    /// The old value as a hint.
    #[prop(into)]
    hint: Signal<Option<String>>,
    /// Runs when Enter is pressed.
    next: Callback<()>,
) -> impl IntoView {
    let app = app();
    let spec = field.spec();
    let fault_id = format!("{}-fault", spec.id);
    let label = Memo::new(move |_| app.sheet.with(|sheet| sheet.label(field, app.group())));
    let unit = Memo::new(move |_| app.sheet.with(|sheet| sheet.unit(field, app.group())));
    let active = move || app.active.get() == Some(field);
    let unit_view = if field.takes_kpa() {
        let change = move |_| app.sheet.update(|sheet| sheet.kpa = !sheet.kpa);
        view! {
            <button type="button" class="unit unit-button" on:click=change aria-describedby="unit-note">
                {unit}
            </button>
            <span class="unseen" id="unit-note">{words::OTHER_UNIT}</span>
        }
        .into_any()
    } else {
        view! { <span class="unit" aria-hidden="true">{unit}</span> }.into_any()
    };
    view! {
        <div class="field number" class:active=active>
            <label class="field-label" for=spec.id>
                {label}
                <span class="unseen">{move || spoken_unit(unit.get())}</span>
            </label>
            <NumberInput field next described=fault_id.clone() fault hint />
            {unit_view}
            <Fault id=fault_id words=fault />
        </div>
    }
}

fn spoken_unit(unit: &'static str) -> String {
    if unit.is_empty() { String::new() } else { format!(", {unit}") }
}

/// The input alone.
#[component]
pub fn NumberInput(
    /// The field.
    field: Field,
    /// Runs when Enter is pressed.
    next: Callback<()>,
    /// Id of what describes it.
    described: String,
    /// What is wrong.
    #[prop(into)]
    fault: Signal<Option<String>>,
    /// The old value as a hint.
    #[prop(into)]
    hint: Signal<Option<String>>,
) -> impl IntoView {
    let app = app();
    let text = Memo::new(move |_| app.sheet.with(|sheet| sheet.text(field).to_owned()));
    let typed = move |event: web_sys::Event| {
        if let Some(input) = page::input(&event) {
            app.sheet.update(|sheet| sheet.set_text(field, input.value()));
        }
    };
    let keyed = move |event: KeyboardEvent| match event.key().as_str() {
        "Enter" => {
            event.prevent_default();
            next.run(());
        }
        "Escape" => app.active.set(None),
        _ => {}
    };
    view! {
        <input
            type="text"
            id=field.spec().id
            class="number-input"
            autocomplete="off"
            maxlength="16"
            inputmode=move || if app.phone_keys.get() { "decimal" } else { "none" }
            placeholder=move || hint.get().unwrap_or_default()
            aria-invalid=move || if fault.get().is_some() { "true" } else { "false" }
            aria-describedby=described
            prop:value=text
            on:input=typed
            on:keydown=keyed
            on:focus=move |_| {
                app.active.set(Some(field));
                page::into_sight(field.spec().id);
            }
            on:blur=move |_| {
                app.left.update(|left| if !left.contains(&field) { left.push(field) });
            }
        />
    }
}
