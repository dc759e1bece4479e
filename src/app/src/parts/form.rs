//! A form drawn from its rows, and the leading on from row to row.

use leptos::prelude::*;

use super::chips::Chips;
use super::number::NumberField;
use crate::device::page;
use crate::state::app::{App, app};
use crate::state::field::Field;
use crate::state::rows::{self, Place, Row};
use crate::state::sheet::Reading;

/// The rows of a form; `rows` may change with what is chosen.
#[component]
pub fn Form(
    /// The rows.
    rows: Memo<Vec<Row>>,
    /// The old value of a field, as a hint.
    hint: Callback<Field, Option<String>>,
) -> impl IntoView {
    view! {
        <For each=move || rows.get() key=|row| *row let(row)>
            <OneRow row rows hint />
        </For>
    }
}

#[component]
fn OneRow(row: Row, rows: Memo<Vec<Row>>, hint: Callback<Field, Option<String>>) -> impl IntoView {
    let app = app();
    let fault = Signal::derive(move || said_fault(app, row));
    match row {
        Row::Heading(words) => view! { <h2 class="form-heading">{words}</h2> }.into_any(),
        Row::Note(words) => view! { <p class="note">{words}</p> }.into_any(),
        Row::Chips(choice, _) => {
            let then = Callback::new(move |()| lead_on(app, rows, Place::Chips(choice)));
            view! { <Chips choice fault then /> }.into_any()
        }
        Row::Number(field, _) => {
            let hint = Signal::derive(move || hint.run(field));
            let next = Callback::new(move |()| next(app, rows));
            view! { <NumberField field fault hint next /> }.into_any()
        }
    }
}

/// A fault is said once its field was left or the form was to be written.
fn said_fault(app: App, row: Row) -> Option<String> {
    let asked = app.asked.get();
    let left = match row {
        Row::Number(field, _) => app.left.with(|left| left.contains(&field)),
        _ => false,
    };
    let words = app.sheet.with(|sheet| match row {
        // What is missing is said only when the form was to be written.
        Row::Number(field, _) if !asked && sheet.read(field, app.group()) == Reading::Empty => None,
        _ => rows::fault(sheet, row, app.group()),
    })?;
    (asked || left).then_some(words)
}

/// Goes to the row after `place` once the rows are drawn.
fn lead_on(app: App, rows: Memo<Vec<Row>>, place: Place) {
    match rows.with_untracked(|rows| rows::after(rows, place)) {
        Some(next) => open(app, next),
        None => app.active.set(None),
    }
}

/// Opens a place: its keys when it is a number, and the focus.
pub fn open(app: App, place: Place) {
    app.active.set(if let Place::Number(field) = place { Some(field) } else { None });
    page::focus(place.id());
}

/// The Next key: on to the next row, unless the number is wrong: then its sentence is said.
pub fn next(app: App, rows: Memo<Vec<Row>>) {
    let Some(field) = app.active.get_untracked() else { return };
    let reading = app.sheet.with_untracked(|sheet| sheet.read(field, app.group()));
    if let Reading::Wrong(words) = reading {
        app.left.update(|left| left.push(field));
        app.tell(&words);
        return;
    }
    lead_on(app, rows, Place::Number(field));
}

/// Whether the form may be written; if not, says why and goes to the first fault.
pub fn may_write(app: App, rows: Memo<Vec<Row>>) -> bool {
    let faults =
        app.sheet.with_untracked(|sheet| rows.with_untracked(|rows| rows::faults(sheet, rows, app.group())));
    app.asked.set(true);
    let Some((place, words)) = faults.into_iter().next() else { return true };
    app.tell(&words);
    open(app, place);
    false
}
