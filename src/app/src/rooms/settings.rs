//! Typing settings: all of them the first time, then only what changed.

use bedside::Question;
use case::{EntryKind, Settings as Given};
use leptos::prelude::*;

use super::gas;
use crate::device::page;
use crate::parts::buttons::main_button;
use crate::parts::form::{Form, form, is_ready, may_write, next};
use crate::parts::keypad::keypad;
use crate::state::app::App;
use crate::state::asks;
use crate::state::choice::Choice;
use crate::state::room::Room;
use crate::state::rows::{self, settings_rows};
use crate::state::writing;
use crate::words::form as words;

const FORM: Form = Form {
    rows: |app| app.sheet.with(|sheet| settings_rows(sheet, &app.in_force())),
    hint: |app, field| writing::value_in_force(&app.in_force(), field).map(words::was),
    ask: questions,
    mend: asks::mends_settings,
    press,
};

/// The room.
pub fn settings(app: App) -> AnyView {
    view! {
        <div class="scroll form">{form(app, FORM)}</div>
        <div class="dock">
            {main_button(app, label, |app| app.still(), press)}
            {keypad(app, |app| next(app, FORM))}
        </div>
    }
    .into_any()
}

fn label(app: App) -> String {
    match app.label() {
        Some(label) if gas_is_typed(app) => words::answer_for(&label),
        Some(label) => words::write_settings(&label),
        None => words::ANSWER.to_owned(),
    }
}

fn gas_is_typed(app: App) -> bool {
    app.sheet.with(|sheet| sheet.any_text(&rows::GAS_FIELDS))
}

fn typed(app: App) -> Given {
    app.sheet.with(|sheet| writing::settings(sheet, &app.in_force(), app.group()))
}

/// The questions about the settings as typed that were not answered yet.
fn questions(app: App) -> Vec<Question> {
    let (settings, now) = (typed(app), app.now.get());
    app.unanswered(app.sheet.with(|sheet| asks::about_settings(sheet, &app.case(), &settings, &now)))
}

/// Writes the settings, and the gas that was typed with them.
fn press(app: App) {
    if !may_write(app, FORM) {
        return;
    }
    let now = app.tick();
    let (drawn, changed) =
        app.sheet.with_untracked(|sheet| (sheet.moment(Choice::Drawn), sheet.moment(Choice::Changed)));
    let gas = untrack(|| app.sheet.with(|sheet| writing::gas(sheet, app.group(), None)));
    if untrack(|| gas_is_typed(app)) && !is_ready(app, gas::FORM) {
        app.trouble.set(words::GAS_UNFINISHED.to_owned());
        page::go(Room::Gas.hash());
        return;
    }
    let settings = untrack(|| typed(app));
    let gas = drawn.zip(gas);
    if settings.is_empty() && gas.is_none() {
        app.trouble.set(words::NOTHING_TYPED.to_owned());
        return;
    }
    // The first settings stood when the gas was drawn; Now asks how long they had been held by then.
    let since = changed.or(gas.map(|(at, _)| at)).unwrap_or(now.wall);
    let mut entries = vec![];
    if !settings.is_empty() {
        entries.push((since, EntryKind::Settings(settings)));
    }
    let gas_written = gas.is_some();
    entries.extend(gas.map(|(at, gas)| (at, EntryKind::Gas(gas))));
    let there = app.open.with_untracked(Option::is_some) || app.start_case();
    if there && app.write(entries) {
        app.clear_typed(&rows::SETTINGS_FIELDS, &rows::SETTINGS_CHOICES);
        if gas_written {
            app.clear_typed(&rows::GAS_FIELDS, &rows::GAS_CHOICES);
        }
        page::go_instead(Room::Now.hash());
    }
}
