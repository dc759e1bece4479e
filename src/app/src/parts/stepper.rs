//! A stepper: a number with a key less and a key more. A spin button for screen readers and arrow keys.

use std::time::Duration;

use leptos::ev::{KeyboardEvent, MouseEvent};
use leptos::prelude::*;

use super::chips::Fault;
use crate::device::page;
use crate::state::app::{App, app};
use crate::state::field::Field;
use crate::state::sheet::Reading;
use crate::words::{change as words, values::as_typed};

/// Four steps a second while a key is held.
const REPEAT: Duration = Duration::from_millis(250);
/// A click this soon after a release belongs to it.
const AFTER_POINTER_MS: f64 = 400.0;

/// One step from `value`, and whether a held key stops there: at the old value and at the limits.
fn step(value: f64, by: f64, old: f64, least: f64, most: f64) -> (f64, bool) {
    let next = value + by;
    let crosses = (value - old) * (next - old) <= 0.0 && value != old;
    if crosses {
        (old, true)
    } else if next > most || next < least {
        (value, true)
    } else {
        (next, false)
    }
}

/// A stepper of `field`, which starts at the old value.
#[component]
pub fn Stepper(
    /// The field.
    field: Field,
    /// The value in force.
    old: f64,
    /// How much a step is.
    by: f64,
    /// Runs when Enter or Next is pressed.
    next: Callback<()>,
) -> impl IntoView {
    let app = app();
    let limit = field.spec().quantity.map(|quantity| units::limit(quantity, app.group()));
    let (label, unit) = limit.map_or(("", ""), |limit| (limit.label, limit.unit));
    let (least, most) = limit.map_or((0.0, 0.0), |limit| (limit.least, limit.most));
    let reading = Memo::new(move |_| app.sheet.with(|sheet| sheet.read(field, app.group())));
    let value = move || reading.get().value().unwrap_or(old);
    let shown = Memo::new(move |_| {
        let text = app.sheet.with(|sheet| sheet.text(field).to_owned());
        let open = app.active.get() == Some(field);
        if text.is_empty() && !open { as_typed(old) } else { text }
    });
    let fault = Signal::derive(move || match reading.get() {
        Reading::Wrong(words) if app.left.with(|left| left.contains(&field)) => Some(words),
        _ => None,
    });
    let move_by = move |by: f64| {
        let value = reading.get_untracked().value().unwrap_or(old);
        let (next, stop) = step(value, by, old, least, most);
        let text = if next == old { String::new() } else { as_typed(next) };
        app.sheet.update(|sheet| sheet.set_text(field, text));
        stop
    };
    let keyed = move |event: KeyboardEvent| {
        let by = match event.key().as_str() {
            "ArrowUp" => by,
            "ArrowDown" => -by,
            "Enter" => return next.run(()),
            "Escape" => return app.active.set(None),
            _ => return,
        };
        event.prevent_default();
        move_by(by);
    };
    let fault_id = format!("{}-fault", field.spec().id);
    view! {
        <div class="field stepper">
            <span class="field-label" id=format!("{}-label", field.spec().id)>
                {label}
                <span class="faint">{words::was(old)}</span>
            </span>
            <StepKey label=words::less(label) sign="\u{2212}" act=Callback::new(move |()| move_by(-by)) />
            <span class="stepper-middle">
                <input
                    type="text"
                    role="spinbutton"
                    id=field.spec().id
                    class="stepper-input"
                    autocomplete="off"
                    maxlength="16"
                    inputmode=move || if app.phone_keys.get() { "decimal" } else { "none" }
                    aria-labelledby=format!("{}-label", field.spec().id)
                    aria-valuenow=move || as_typed(value())
                    aria-valuemin=as_typed(least)
                    aria-valuemax=as_typed(most)
                    aria-valuetext=move || format!("{} {unit}", as_typed(value()))
                    aria-invalid=move || if fault.get().is_some() { "true" } else { "false" }
                    aria-describedby=fault_id.clone()
                    placeholder=as_typed(old)
                    prop:value=shown
                    on:input=move |event| typed(app, field, &event)
                    on:keydown=keyed
                    on:focus=move |_| {
                        app.active.set(Some(field));
                        page::into_sight(field.spec().id);
                    }
                    on:blur=move |_| app.left.update(|left| left.push(field))
                />
                <span class="unit" aria-hidden="true">{unit}</span>
            </span>
            <StepKey label=words::more(label) sign="+" act=Callback::new(move |()| move_by(by)) />
            <Fault id=fault_id words=fault />
        </div>
    }
}

fn typed(app: App, field: Field, event: &web_sys::Event) {
    if let Some(input) = page::input(event) {
        app.sheet.update(|sheet| sheet.set_text(field, input.value()));
    }
}

/// A key that steps on release, and four times a second while it is held until `act` says stop.
#[component]
fn StepKey(label: String, sign: &'static str, act: Callback<(), bool>) -> impl IntoView {
    let timer = StoredValue::new(None::<IntervalHandle>);
    let repeated = StoredValue::new(false);
    let released_at = StoredValue::new(f64::NEG_INFINITY);
    let stop = move || {
        if let Some(timer) = timer.try_update_value(Option::take).flatten() {
            timer.clear();
        }
    };
    let pressed = move |_| {
        stop();
        repeated.set_value(false);
        let again = move || {
            repeated.try_update_value(|repeated| *repeated = true);
            if act.try_run(()).unwrap_or(true) {
                stop();
            }
        };
        timer.set_value(set_interval_with_handle(again, REPEAT).ok());
    };
    let released = move |event: leptos::ev::PointerEvent| {
        let held = timer.with_value(Option::is_some);
        stop();
        released_at.set_value(event.time_stamp());
        if held && !repeated.get_value() {
            act.run(());
        }
    };
    let clicked = move |event: MouseEvent| {
        if event.time_stamp() - released_at.get_value() > AFTER_POINTER_MS {
            act.run(());
        }
    };
    on_cleanup(stop);
    view! {
        <button
            type="button"
            class="step"
            tabindex="-1"
            aria-label=label
            on:mousedown=|event: MouseEvent| event.prevent_default()
            on:contextmenu=|event: MouseEvent| event.prevent_default()
            on:pointerdown=pressed
            on:pointerup=released
            on:pointerleave=move |_| stop()
            on:pointercancel=move |_| stop()
            on:click=clicked
        >
            {sign}
        </button>
    }
}

#[cfg(test)]
mod tests {
    use super::step;

    #[test]
    fn a_held_key_stops_at_the_old_value_and_at_the_limits() {
        assert_eq!(step(18.0, 1.0, 18.0, 2.0, 80.0), (19.0, false));
        assert_eq!(step(19.0, -1.0, 18.0, 2.0, 80.0), (18.0, true));
        assert_eq!(step(345.0, -10.0, 340.0, 50.0, 2000.0), (340.0, true));
        assert_eq!(step(80.0, 1.0, 18.0, 2.0, 80.0), (80.0, true));
        assert_eq!(step(2.0, -1.0, 18.0, 2.0, 80.0), (2.0, true));
        assert_eq!(step(18.0, -1.0, 18.0, 2.0, 80.0), (17.0, false));
    }
}
