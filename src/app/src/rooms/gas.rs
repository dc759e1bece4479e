//! Typing a gas.

use bedside::ask_about_entry;
use case::{EntryKind, Moment};
use leptos::prelude::*;

use crate::device::page;
use crate::parts::form::{Form, may_write, next};
use crate::parts::keypad::Keypad;
use crate::parts::main_button::MainButton;
use crate::parts::questions::Questions;
use crate::state::app::{App, app};
use crate::state::choice::Choice;
use crate::state::field::Field;
use crate::state::room::Room;
use crate::state::rows::{Row, gas_rows};
use crate::state::writing;
use crate::words::form as words;

/// The room.
#[component]
pub fn Gas() -> impl IntoView {
    let app = app();
    let rows = Memo::new(move |_| app.sheet.with(gas_rows));
    let open = Memo::new(move |_| if app.asked.get() { questions(app) } else { vec![] });
    let later = move || app.in_force().airway.is_some();
    let label = Signal::derive(move || match app.label().filter(|_| later()) {
        Some(label) => words::answer_for(&label),
        None => words::TO_SETTINGS.to_owned(),
    });
    let more = Signal::derive(move || {
        if !later() {
            return None;
        }
        app.still().or_else(|| {
            let now = app.now.get();
            settings_since(app).map(|since| words::settings_same(since, &now))
        })
    });
    let press = Callback::new(move |()| press(app, rows));
    let other = move |_| {
        if ready(app, rows) {
            page::go(Room::Settings.hash());
        }
    };
    view! {
        <div class="scroll form">
            <Form rows hint=Callback::new(|_| None) />
            <Questions open mend=Field::Ph then=press />
        </div>
        <div class="dock">
            <div class="dock-buttons">
                {move || later().then(|| view! {
                    <button type="button" class="plain" on:click=other>{words::SETTINGS_OTHER}</button>
                })}
                <MainButton label more press />
            </div>
            <Keypad next=Callback::new(move |()| next(app, rows)) />
        </div>
    }
}

/// The questions about the gas as typed that were not answered yet.
fn questions(app: App) -> Vec<bedside::Question> {
    let gas = app.sheet.with(|sheet| writing::gas(sheet, app.group(), None));
    let Some(gas) = gas else { return vec![] };
    let asked = ask_about_entry(&app.case(), &EntryKind::Gas(gas));
    app.sheet.with(|sheet| asked.into_iter().filter(|q| !sheet.answered.contains(&q.words)).collect())
}

/// Whether the gas is whole and nothing is left to ask.
fn ready(app: App, rows: Memo<Vec<Row>>) -> bool {
    if !may_write(app, rows) {
        return false;
    }
    let open = untrack(|| questions(app));
    if let Some(question) = open.first() {
        app.active.set(None);
        app.tell(&question.words);
        page::focus("questions");
    }
    open.is_empty()
}

fn press(app: App, rows: Memo<Vec<Row>>) {
    if !ready(app, rows) {
        return;
    }
    if untrack(|| app.in_force()).airway.is_none() {
        page::go(Room::Settings.hash());
        return;
    }
    let now = app.tick();
    let held = untrack(|| settings_since(app));
    let drawn = app.sheet.with_untracked(|sheet| sheet.moment(Choice::Drawn, &now));
    let held = drawn.zip(held).map(|(drawn, since)| drawn.minutes_since(since)).filter(|held| *held >= 0.0);
    let entry = app.sheet.with_untracked(|sheet| writing::gas(sheet, app.group(), held));
    if let Some((at, gas)) = drawn.zip(entry)
        && app.write(vec![(at, EntryKind::Gas(gas))])
    {
        app.clear_typed();
        page::go_instead(Room::Now.hash());
    }
}


/// Since when the settings in force are unchanged.
fn settings_since(app: App) -> Option<Moment> {
    let now = app.now.get();
    app.case().settings_steps().into_iter().map(|(at, _)| at).filter(|at| *at <= now.wall).last()
}
