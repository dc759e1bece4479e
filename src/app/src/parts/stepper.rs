//! A stepper: a number with a key less and a key more. A spin button for screen readers and arrow keys.

use leptos::ev::{FocusEvent, KeyboardEvent};
use leptos::prelude::*;

use super::chips::error;
use super::keys::step;
use super::number::{input_mode, leaving, typing};
use super::touch::{Acts, Look, key};
use crate::device::page;
use crate::state::app::App;
use crate::state::field::Field;
use crate::state::sheet::Reading;
use crate::words::{change as words, values::as_typed};

/// What a stepper steps: its field, the value in force, and how much a step is.
#[derive(Clone, Copy)]
pub struct Steps {
    /// The field.
    pub field: Field,
    /// The value in force.
    pub old: f64,
    /// One step.
    pub by: f64,
}

/// A stepper; `next` runs at Enter.
pub fn stepper(app: App, steps: Steps, next: fn(App)) -> AnyView {
    let Steps { field, old, by } = steps;
    let spec = field.spec();
    let Some(limit) = spec.quantity.map(|quantity| units::limit(quantity, untrack(|| app.group()))) else {
        return ().into_any();
    };
    let reading = move || app.sheet.with(|sheet| sheet.read(field, app.group()));
    let value = move || reading().value().unwrap_or(old);
    let shown = move || {
        let text = app.sheet.with(|sheet| sheet.text(field).to_owned());
        let open = app.active.get() == Some(field);
        if text.is_empty() && !open { as_typed(old) } else { text }
    };
    let fault = move || match reading() {
        Reading::Wrong(words) if app.was_left(field) => Some(words),
        _ => None,
    };
    let move_by = move |by: f64| {
        let (next, stop) = step(untrack(value), by, old, limit.least, limit.most);
        let text = if next == old { String::new() } else { as_typed(next) };
        app.sheet.update(|sheet| sheet.set_text(field, text));
        stop
    };
    let keyed: Box<dyn FnMut(KeyboardEvent)> = Box::new(move |event| {
        match event.key().as_str() {
            "ArrowUp" => move_by(by),
            "ArrowDown" => move_by(-by),
            "Enter" => {
                next(app);
                true
            }
            "Escape" => {
                app.active.set(None);
                true
            }
            _ => return,
        };
        event.prevent_default();
    });
    let look = |sign, name| Look { sign, name, class: "step", acts: Acts::WhileHeld };
    // The answer and the chart are what is watched while it is typed.
    let opened: Box<dyn FnMut(FocusEvent)> = Box::new(move |_| {
        app.active.set(Some(field));
        page::to_top();
    });
    let class = move || if app.active.get() == Some(field) { "stepper active" } else { "stepper" };
    let said = move || format!("{} {}", as_typed(value()), limit.unit);
    view! {
        <div class=move || class()>
            <label class="field-label" for=spec.id>
                {limit.label} " " <span class="faint">{words::was(old)}</span>
            </label>
            {key(look("\u{2212}", words::less(limit.label)), Box::new(move || move_by(-by)))}
            <span class="stepper-middle">
                <input
                    type="text"
                    role="spinbutton"
                    id=spec.id
                    class="stepper-input"
                    autocomplete="off"
                    maxlength="16"
                    inputmode=move || input_mode(app)
                    aria-valuenow=move || as_typed(value())
                    aria-valuemin=as_typed(limit.least)
                    aria-valuemax=as_typed(limit.most)
                    aria-valuetext=move || said()
                    aria-invalid=move || if fault().is_some() { "true" } else { "false" }
                    aria-describedby=spec.fault_id
                    placeholder=move || as_typed(old)
                    prop:value=move || shown()
                    on:input=typing(app, field)
                    on:keydown=keyed
                    on:focus=opened
                    on:blur=leaving(app, field)
                />
                <span class="unit">{limit.unit}</span>
            </span>
            {key(look("+", words::more(limit.label)), Box::new(move || move_by(by)))}
            {error(Some(spec.fault_id), fault)}
        </div>
    }
    .into_any()
}
