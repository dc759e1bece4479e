//! The case sheet: label, person, other cases.

use leptos::prelude::*;

use super::start::new_case;
use crate::device::page;
use crate::parts::buttons::{link, main_button, perhaps, plain};
use crate::parts::chips::error;
use crate::parts::form::{Form, form, may_write, next};
use crate::parts::keypad::keypad;
use crate::parts::notices::readiness;
use crate::parts::number::typing;
use crate::state::app::App;
use crate::state::choice::Choice;
use crate::state::field::Field;
use crate::state::room::Room;
use crate::state::rows::PERSON_ROWS;
use crate::state::writing;
use crate::words::person as words;

const FORM: Form = Form {
    rows: |_| PERSON_ROWS.to_vec(),
    hint: |_, _| None,
    ask: |_| vec![],
    mend: |_| Field::Label,
    press,
};

/// The room.
pub fn person(app: App) -> AnyView {
    let open = app.open.get_untracked();
    if let Some(open) = &open {
        app.sheet.update(|sheet| writing::offer_person(sheet, &open.case));
    }
    let sheet = open.is_some().then(|| view! { {label_field(app)} {form(app, FORM)} }.into_any());
    let save = open.is_some().then(|| main_button(app, label, |app| app.still(), press));
    let no_case = open.is_none().then(|| view! { <p class="note">{words::NO_CASE}</p> }.into_any());
    view! {
        <div class="scroll form">
            {perhaps(no_case)}
            {perhaps(sheet)}
            {others(app)}
            {readiness(app)}
        </div>
        <div class="dock">{perhaps(save)} {keypad(app, |app| next(app, FORM))}</div>
    }
    .into_any()
}

fn label(app: App) -> String {
    words::save(&app.label().unwrap_or_default())
}

/// The label: words, so the phone's own keyboard.
fn label_field(app: App) -> AnyView {
    let spec = Field::Label.spec();
    let fault = move || app.sheet.with(|sheet| words::label_fault(sheet.text(Field::Label)));
    view! {
        <div class="field label-field">
            <label class="field-label" for=spec.id>{words::LABEL}</label>
            <input
                type="text"
                id=spec.id
                class="label-input"
                autocomplete="off"
                aria-describedby="label-hint f-label-fault"
                aria-invalid=move || if fault().is_some() { "true" } else { "false" }
                prop:value=move || app.sheet.with(|sheet| sheet.text(Field::Label).to_owned())
                on:input=typing(app, Field::Label)
                on:focus=move |_| app.active.set(None)
            />
            <p class="hint" id="label-hint">{words::LABEL_HINT}</p>
            {error(Some(spec.fault_id), fault)}
        </div>
    }
    .into_any()
}

fn press(app: App) {
    let label = app.sheet.with_untracked(|sheet| sheet.text(Field::Label).trim().to_owned());
    if let Some(fault) = words::label_fault(&label) {
        app.tell(&fault);
        page::focus(Field::Label.spec().id);
        return;
    }
    if !may_write(app, FORM) {
        return;
    }
    let person = app.sheet.with_untracked(writing::person);
    if app.write_person(person, &label) {
        app.sheet.update(|sheet| {
            sheet.clear(
                &[Field::Label, Field::Age, Field::Height, Field::Weight],
                &[Choice::Sex, Choice::HeightHow],
            );
        });
        app.tell(words::SAVED);
        page::go_instead(Room::Now.hash());
    }
}

/// The other cases, and a new one.
fn others(app: App) -> AnyView {
    let mut ways = vec![];
    for (id, label) in untrack(|| app.other_cases()) {
        ways.push(plain(words::open(&label), move || {
            app.select(&id);
            page::go(Room::Now.hash());
        }));
    }
    let heading =
        (!ways.is_empty()).then(|| view! { <h2 class="form-heading">{words::OTHERS}</h2> }.into_any());
    ways.push(plain(words::NEW_CASE.to_owned(), move || new_case(app)));
    ways.push(link(words::CAUTIONS.to_owned(), Room::Start.hash()));
    view! {
        {perhaps(heading)}
        <div class="ways">{ways}</div>
    }
    .into_any()
}
