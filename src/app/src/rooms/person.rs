//! The case sheet: label, person, other cases.

use case::Person as Who;
use leptos::prelude::*;

use crate::device::page;
use crate::parts::chips::Fault;
use crate::parts::form::{Form, may_write, next};
use crate::parts::keypad::Keypad;
use crate::parts::main_button::MainButton;
use crate::parts::notices::Readiness;
use crate::state::app::{App, app};
use crate::state::choice::Choice;
use crate::state::field::Field;
use crate::state::room::Room;
use crate::state::rows::{PERSON_ROWS, Row};
use crate::state::sheet::Sheet;
use crate::state::writing;
use crate::words::person as words;
use crate::words::values::as_typed;

/// The room.
#[component]
pub fn Person() -> impl IntoView {
    let app = app();
    offer_what_is_known(app);
    let rows = Memo::new(|_| PERSON_ROWS.to_vec());
    let label = Signal::derive(move || words::save(&app.label().unwrap_or_default()));
    let more = Signal::derive(move || app.still());
    let press = Callback::new(move |()| press(app, rows));
    let open = move || app.open.with(Option::is_some);
    let sheet = move || {
        open().then(|| {
            view! {
                <LabelField />
                <Form rows hint=Callback::new(|_| None) />
            }
        })
    };
    view! {
        <div class="scroll form">
            {move || (!open()).then(|| view! { <p class="note">{words::NO_CASE}</p> })}
            {sheet}
            <Others />
            <Readiness />
        </div>
        <div class="dock">
            {move || open().then(|| view! { <MainButton label more press /> })}
            <Keypad next=Callback::new(move |()| next(app, rows)) />
        </div>
    }
}

/// Puts what is known into fields that nobody has begun to change.
fn offer_what_is_known(app: App) {
    let Some(open) = app.open.get_untracked() else { return };
    let person = open.case.person;
    let begun = app.sheet.with_untracked(|sheet| !sheet.text(Field::Label).is_empty());
    if !begun {
        app.sheet.update(|sheet| fill(sheet, &open.case.label, &person));
    }
}

fn fill(sheet: &mut Sheet, label: &str, person: &Who) {
    sheet.set_text(Field::Label, label);
    let numbers = [
        (Field::Age, person.age_years),
        (Field::Height, person.height_cm),
        (Field::Weight, person.weight_kg),
    ];
    for (field, value) in numbers {
        if let Some(value) = value {
            sheet.set_text(field, as_typed(value));
        }
    }
    let chip = |chips: u8, is: &dyn Fn(u8) -> bool| (0..chips).find(|pick| is(*pick));
    use crate::state::choice::{height_how, sex};
    if let Some(pick) = chip(2, &|pick| person.sex.is_some() && sex(pick) == person.sex) {
        sheet.restore_pick(Choice::Sex, pick);
    }
    if let Some(pick) =
        chip(3, &|pick| person.height_how.is_some() && height_how(pick) == person.height_how)
    {
        sheet.restore_pick(Choice::HeightHow, pick);
    }
}

/// The label: words, so the phone's own keyboard.
#[component]
fn LabelField() -> impl IntoView {
    let app = app();
    let id = Field::Label.spec().id;
    let fault = Signal::derive(move || app.sheet.with(|sheet| label_fault(sheet.text(Field::Label))));
    let text = Memo::new(move |_| app.sheet.with(|sheet| sheet.text(Field::Label).to_owned()));
    let typed = move |event: web_sys::Event| {
        if let Some(input) = page::input(&event) {
            app.sheet.update(|sheet| sheet.set_text(Field::Label, input.value()));
        }
    };
    view! {
        <div class="field label-field">
            <label class="field-label" for=id>{Field::Label.spec().label}</label>
            <input
                type="text"
                id=id
                class="label-input"
                autocomplete="off"
                aria-describedby="label-hint f-label-fault"
                aria-invalid=move || if fault.get().is_some() { "true" } else { "false" }
                prop:value=text
                on:input=typed
                on:focus=move |_| app.active.set(None)
            />
            <p class="hint" id="label-hint">{words::LABEL_HINT}</p>
            <Fault id="f-label-fault".to_owned() words=fault />
        </div>
    }
}

fn label_fault(text: &str) -> Option<String> {
    if text.trim().is_empty() {
        Some(words::LABEL_NEEDED.to_owned())
    } else if text.trim().chars().count() > words::LABEL_MOST {
        Some(words::LABEL_LONG.to_owned())
    } else {
        None
    }
}

fn press(app: App, rows: Memo<Vec<Row>>) {
    let label = app.sheet.with_untracked(|sheet| sheet.text(Field::Label).trim().to_owned());
    if let Some(fault) = label_fault(&label) {
        app.tell(&fault);
        page::focus(Field::Label.spec().id);
        return;
    }
    if may_write(app, rows) {
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
}

/// The other cases, and a new one.
#[component]
fn Others() -> impl IntoView {
    let app = app();
    let new_case = move |_| {
        if app.start_another() {
            page::go(Room::Gas.hash());
        }
    };
    let others = move || {
        let others = app.other_cases().into_iter().map(|(id, label)| {
            let open = move |_| {
                app.select(&id);
                page::go(Room::Now.hash());
            };
            view! { <li><button type="button" class="plain" on:click=open>{words::open(&label)}</button></li> }
        });
        others.collect_view()
    };
    let any = move || !app.other_cases().is_empty();
    view! {
        <h2 class="form-heading" hidden=move || !any()>{words::OTHERS}</h2>
        <ul class="plain-list">{others}</ul>
        <div class="ways">
            <button type="button" class="plain" on:click=new_case>{words::NEW_CASE}</button>
            <a class="plain" href=Room::Start.hash()>{words::CAUTIONS}</a>
        </div>
    }
}
