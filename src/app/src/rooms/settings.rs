//! Typing settings: all of them the first time, then only what changed.

use bedside::ask_about_entry;
use case::{EntryKind, Moment, Settings as Given};
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
use crate::state::rows::{self, Row, settings_rows};
use crate::state::writing;
use crate::words::form as words;

/// The room.
#[component]
pub fn Settings() -> impl IntoView {
    let app = app();
    let rows = Memo::new(move |_| app.sheet.with(|sheet| settings_rows(sheet, &app.in_force())));
    let open = Memo::new(move |_| if app.asked.get() { questions(app) } else { vec![] });
    let label = Signal::derive(move || match app.label() {
        Some(label) if gas_is_typed(app) => words::answer_for(&label),
        Some(label) => words::write_settings(&label),
        None => words::ANSWER.to_owned(),
    });
    let more = Signal::derive(move || app.still());
    let press = Callback::new(move |()| press(app, rows));
    let hint = Callback::new(move |field| in_force(&app.in_force(), field).map(words::was));
    view! {
        <div class="scroll form">
            <Form rows hint />
            <Questions open mend=Field::TidalVolume then=press />
        </div>
        <div class="dock">
            <MainButton label more press />
            <Keypad next=Callback::new(move |()| next(app, rows)) />
        </div>
    }
}

/// The value in force that a field would change.
fn in_force(settings: &Given, field: Field) -> Option<f64> {
    match field {
        Field::TidalVolume => settings.tidal_volume_ml,
        Field::ExpiredVolume => settings.tidal_volume_expired_ml,
        Field::Rate => settings.rate_per_min,
        Field::TotalRate => settings.rate_total_per_min,
        Field::Peep => settings.peep_cmh2o,
        Field::Plateau => settings.plateau_cmh2o,
        Field::Fio2 => settings.fio2,
        Field::InspiratoryTime => settings.inspiratory_time_s,
        Field::MinuteVolume => settings.minute_volume_l_min,
        Field::InspiratoryPressure => settings.inspiratory_pressure_cmh2o,
        _ => None,
    }
}

fn gas_is_typed(app: App) -> bool {
    app.sheet.with(|sheet| sheet.any_text(&rows::GAS_FIELDS))
}

fn typed(app: App) -> Given {
    app.sheet.with(|sheet| writing::settings(sheet, &app.in_force(), app.group()))
}

fn questions(app: App) -> Vec<bedside::Question> {
    let asked = ask_about_entry(&app.case(), &EntryKind::Settings(typed(app)));
    app.sheet.with(|sheet| asked.into_iter().filter(|q| !sheet.answered.contains(&q.words)).collect())
}

/// Writes the settings, and the gas that was typed with them.
fn press(app: App, rows: Memo<Vec<Row>>) {
    if !may_write(app, rows) {
        return;
    }
    if let Some(question) = untrack(|| questions(app)).first() {
        app.active.set(None);
        app.tell(&question.words);
        page::focus("questions");
        return;
    }
    let now = app.tick();
    let drawn = app.sheet.with_untracked(|sheet| sheet.moment(Choice::Drawn, &now));
    let gas = app.sheet.with_untracked(|sheet| writing::gas(sheet, app.group(), None));
    if untrack(|| gas_is_typed(app)) && (gas.is_none() || drawn.is_none()) {
        app.trouble.set(Some(words::GAS_UNFINISHED.to_owned()));
        page::go(Room::Gas.hash());
        return;
    }
    let settings = untrack(|| typed(app));
    if settings.is_empty() && gas.is_none() {
        app.trouble.set(Some(words::NOTHING_TYPED.to_owned()));
        return;
    }
    let gas = drawn.zip(gas);
    let changed = app.sheet.with_untracked(|sheet| sheet.moment(Choice::Changed, &now));
    // The first settings stood when the gas was drawn; Now asks how long they had been held by then.
    let since: Moment = changed.or(gas.map(|(at, _)| at)).unwrap_or(now.wall);
    let mut entries = vec![];
    if !settings.is_empty() {
        entries.push((since, EntryKind::Settings(settings)));
    }
    entries.extend(gas.map(|(at, gas)| (at, EntryKind::Gas(gas))));
    let there = app.open.with_untracked(Option::is_some) || app.new_case(None);
    if there && app.write(entries) {
        app.clear_typed();
        page::go_instead(Room::Now.hash());
    }
}
