//! Typing a gas.

use bedside::Question;
use case::{EntryKind, Moment};
use leptos::prelude::*;

use crate::device::page;
use crate::parts::buttons::{main_button, perhaps, plain};
use crate::parts::form::{Form, form, may_write, next};
use crate::parts::keypad::keypad;
use crate::state::app::App;
use crate::state::asks;
use crate::state::choice::Choice;
use crate::state::room::Room;
use crate::state::rows::{GAS_CHOICES, GAS_FIELDS, gas_rows};
use crate::state::writing;
use crate::words::form as words;

/// The form, which Settings looks at too before it writes the gas.
pub const FORM: Form = Form {
    rows: |app| app.sheet.with(gas_rows),
    hint: |_, _| None,
    ask: questions,
    mend: asks::mends_gas,
    press,
};

/// The room.
pub fn gas(app: App) -> AnyView {
    let other = untrack(|| is_later(app)).then(|| {
        plain(words::SETTINGS_OTHER.to_owned(), move || {
            if may_write(app, FORM) {
                page::go(Room::Settings.hash());
            }
        })
    });
    view! {
        <div class="scroll form">{form(app, FORM)}</div>
        <div class="dock">
            <div class="dock-buttons">{perhaps(other)} {main_button(app, label, more, press)}</div>
            {keypad(app, |app| next(app, FORM))}
        </div>
    }
    .into_any()
}

/// Whether settings are known already, so that the gas alone can be written.
fn is_later(app: App) -> bool {
    app.in_force().airway.is_some()
}

fn label(app: App) -> String {
    match app.label().filter(|_| is_later(app)) {
        Some(label) => words::answer_for(&label),
        None => words::TO_SETTINGS.to_owned(),
    }
}

fn more(app: App) -> Option<String> {
    if !is_later(app) {
        return None;
    }
    let now = app.now.get();
    app.still().or_else(|| settings_since(app).map(|since| words::settings_same(since, &now)))
}

/// The questions about the gas as typed that were not answered yet.
fn questions(app: App) -> Vec<Question> {
    let now = app.now.get();
    let asked = app.sheet.with(|sheet| {
        let gas = writing::gas(sheet, app.group(), None)?;
        Some(asks::about_gas(sheet, &app.case(), &gas, &now))
    });
    app.unanswered(asked.unwrap_or_default())
}

fn press(app: App) {
    if !may_write(app, FORM) {
        return;
    }
    if !untrack(|| is_later(app)) {
        page::go(Room::Settings.hash());
        return;
    }
    app.tick();
    let since = untrack(|| settings_since(app));
    let drawn = app.sheet.with_untracked(|sheet| sheet.moment(Choice::Drawn));
    let held = drawn.zip(since).and_then(|(drawn, since)| writing::held_min(since, drawn));
    let gas = untrack(|| app.sheet.with(|sheet| writing::gas(sheet, app.group(), held)));
    if let Some((at, gas)) = drawn.zip(gas)
        && app.write(vec![(at, EntryKind::Gas(gas))])
    {
        app.clear_typed(&GAS_FIELDS, &GAS_CHOICES);
        page::go_instead(Room::Now.hash());
    }
}

/// Since when the settings in force are unchanged.
fn settings_since(app: App) -> Option<Moment> {
    let now = app.now.get();
    app.case().settings_steps().into_iter().map(|(at, _)| at).rfind(|at| *at <= now.wall)
}
