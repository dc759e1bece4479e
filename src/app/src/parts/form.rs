//! A form drawn from its rows, the leading on from row to row, and what must be right before it is written.

use bedside::Question;
use leptos::prelude::*;

use super::chips::chips;
use super::number::number_field;
use super::questions::questions;
use crate::device::page;
use crate::state::app::App;
use crate::state::field::Field;
use crate::state::rows::{self, Place, Row};
use crate::state::sheet::Reading;

/// A form as data.
#[derive(Clone, Copy)]
pub struct Form {
    /// Its rows, which may change with what is chosen.
    pub rows: fn(App) -> Vec<Row>,
    /// The old value of a field, as a hint.
    pub hint: fn(App, Field) -> Option<String>,
    /// What is asked before it is written.
    pub ask: fn(App) -> Vec<Question>,
    /// The field that Mend it leads to.
    pub mend: fn(&Question) -> Field,
    /// Writes it, or goes on.
    pub press: fn(App),
}

/// The rows and the open questions.
pub fn form(app: App, form: Form) -> AnyView {
    let rows = Memo::new(move |_| (form.rows)(app));
    let all = move || {
        let mut all = vec![];
        for row in rows.get() {
            all.push(one_row(app, row, form));
        }
        all.into_any()
    };
    view! {
        {move || all()}
        {questions(app, form)}
    }
    .into_any()
}

fn one_row(app: App, row: Row, form: Form) -> AnyView {
    let fault = move || said_fault(app, row);
    match row {
        Row::Heading(words) => view! { <h2 class="form-heading">{words}</h2> }.into_any(),
        Row::Note(words) => view! { <p class="note">{words}</p> }.into_any(),
        Row::Chips(choice, _) => chips(app, choice, fault, move || lead_on(app, form, Place::Chips(choice))),
        Row::Number(field, _) => number_field(app, field, fault, form.hint, move || next(app, form)),
    }
}

/// A fault is said once its field was left or the form was to be written.
fn said_fault(app: App, row: Row) -> Option<String> {
    let asked = app.asked.get();
    let left = match row {
        Row::Number(field, _) => app.was_left(field),
        _ => false,
    };
    if !asked && !left {
        return None;
    }
    app.sheet.with(|sheet| match row {
        // What is missing is said only when the form was to be written.
        Row::Number(field, _) if !asked && sheet.read(field, app.group()) == Reading::Empty => None,
        _ => rows::fault(sheet, row, app.group()),
    })
}

/// Goes to the row after `place` once the rows are drawn.
fn lead_on(app: App, form: Form, place: Place) {
    match rows::after(&untrack(|| (form.rows)(app)), place) {
        Some(next) => open(app, next),
        None => {
            app.active.set(None);
            page::focus("main-button");
        }
    }
}

/// Opens a place: its keys when it is a number, and the focus.
fn open(app: App, place: Place) {
    app.active.set(if let Place::Number(field) = place { Some(field) } else { None });
    page::focus(place.id());
}

/// The Next key: on to the next row, unless the number is wrong: then its sentence is said.
pub fn next(app: App, form: Form) {
    let Some(field) = app.active.get_untracked() else { return };
    if !app.says_wrong(field) {
        lead_on(app, form, Place::Number(field));
    }
}

/// Whether a form could be written as it stands.
pub fn is_ready(app: App, form: Form) -> bool {
    let faults = untrack(|| app.sheet.with(|sheet| rows::faults(sheet, &(form.rows)(app), app.group())));
    faults.is_empty() && untrack(|| (form.ask)(app)).is_empty()
}

/// Whether the form may be written; if not, says why and goes to the first fault or question.
pub fn may_write(app: App, form: Form) -> bool {
    let faults = untrack(|| app.sheet.with(|sheet| rows::faults(sheet, &(form.rows)(app), app.group())));
    app.asked.set(true);
    app.trouble.set(String::new());
    if let Some((place, words)) = faults.into_iter().next() {
        app.tell(&words);
        open(app, place);
        if let Place::Number(field) = place {
            page::into_sight(field.spec().fault_id);
        }
        return false;
    }
    let open = untrack(|| (form.ask)(app));
    if let Some(question) = open.first() {
        app.active.set(None);
        app.tell(&question.words);
        page::focus("questions");
    }
    open.is_empty()
}
