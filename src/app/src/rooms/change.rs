//! Trying a change: the answer, the chart that moves with it, what it costs, the steppers, and the writing.

use std::cell::Cell;
use std::rc::Rc;

use bedside::{Caution, Question, ask_about_entry};
use case::{Control, EntryKind, Settings};
use leptos::prelude::*;
use send_wrapper::SendWrapper;

use crate::device::{clock, page};
use crate::parts::buttons::{main_button, press};
use crate::parts::cautions;
use crate::parts::chart::{Compared, Picture, drawing, reading};
use crate::parts::figure::figure;
use crate::parts::form::{Form, may_write};
use crate::parts::html::{element, said};
use crate::parts::keypad::keypad;
use crate::parts::questions::questions;
use crate::parts::stepper::{Steps, stepper};
use crate::state::app::App;
use crate::state::asks::mends_change;
use crate::state::field::Field;
use crate::state::outlook;
use crate::state::present::Trial;
use crate::state::room::Room;
use crate::words::change as words;
use crate::words::now::{MMHG, when_settled};
use crate::words::values::{about, in_words, number, paco2_range, ph_range};

/// Height of the chart, in its own units: the keys must find room under it.
const CHART_HEIGHT: f64 = 176.0;
/// A change is said this long after the last step.
const SAID_AFTER_MS: u64 = 700;
/// Millilitres of one step of the tidal volume.
const VOLUME_STEP_ML: f64 = 10.0;

/// What is asked before a change is written; the steppers say themselves what is wrong in them.
const FORM: Form =
    Form { rows: |_| vec![], hint: |_, _| None, ask: unusual, mend: mends_change, press: write };

/// The room.
pub fn change(app: App) -> AnyView {
    let at = RwSignal::new(0);
    let heed = move |first: bool| {
        app.trial.with(|trial| trial.as_ref().map(|t| heeded(app, t, first)).unwrap_or_default())
    };
    let answered = move || app.trial.with(|trial| trial.as_ref().map_or_else(nothing_yet, answer));
    let costs = move || app.trial.with(|trial| trial.as_ref().map(price).unwrap_or_default());
    let there = move || app.trial.with(Option::is_some);
    let changed = move || app.trial.with(|t| t.as_ref().is_some_and(|t| !t.change.is_empty()));
    let dock = move || if changed() { "dock dock-change" } else { "dock dock-change dock-idle" };
    say_after_a_pause(app);
    view! {
        <div class="scroll change">
            <section class="answer" inner_html=move || heed(true) + &answered()></section>
            <div class="chart-side">{drawing(app, picture, at)}</div>
            <section class="change-side">
                {questions(app, FORM)}
                <div inner_html=move || costs()></div>
                <div inner_html=move || heed(false)></div>
                <button type="button" class="plain" hidden=move || !changed() on:click=press(move || undo(app))>
                    {words::UNDO}
                </button>
                {reading(app, picture, at)}
            </section>
        </div>
        <div class=move || dock() hidden=move || !there()>
            <div class="steppers">{steppers(app)}</div>
            {main_button(app, label, more, write)}
            {keypad(app, next)}
        </div>
    }
    .into_any()
}

fn picture(app: App) -> Option<Picture> {
    app.trial.with(|trial| pictured(app, trial.as_ref()?))
}

fn pictured(app: App, trial: &Trial) -> Option<Picture> {
    let forecast = outlook::value(&trial.answer)?;
    let compared = app.present.with(|present| {
        let unchanged = present.as_ref().filter(|_| !trial.change.is_empty())?;
        let forecast = outlook::value(&unchanged.answer)?.clone();
        Some(Compared { forecast, name: words::compared(&trial.in_force, &trial.change) })
    });
    Picture::new(forecast, compared, &app.case(), &trial.now, CHART_HEIGHT, false)
}

fn nothing_yet() -> String {
    said("p", "lead", words::NOTHING_YET)
}

/// Where it settles, or why that isn't known.
fn answer(trial: &Trial) -> String {
    let standing = cautions::standing(&trial.answer.standing);
    let Some(forecast) = outlook::value(&trial.answer) else { return standing };
    let settled = forecast.settled;
    let label = if trial.change.is_empty() { words::UNCHANGED } else { words::SETTLES };
    let band = in_words(&paco2_range(&settled.paco2_mmhg));
    let figures = figure(label, &about(settled.paco2_mmhg.p50, 0), MMHG, &band)
        + &figure(words::PH, &about(settled.ph.p50, 2), "", &ph_range(&settled.ph));
    let when = when_settled(&forecast.minutes_to_within_2_mmhg, &trial.now);
    element("div", "figures", &figures) + &said("p", "sentence", &when) + &standing
}

/// What to heed: the answer's cautions, and the broken limits of an offer with the same change. Dangers and broken
/// limits come `first`, over the answer; the rest stands under the price.
fn heeded(app: App, trial: &Trial, first: bool) -> String {
    let mut all: Vec<Caution> = app.present.with(|present| {
        let offers = present.as_ref().and_then(|present| present.offers.as_ref());
        let same = offers.and_then(|all| all.offers.iter().find(|offer| offer.change == trial.change));
        same.map(|offer| offer.cautions.clone()).unwrap_or_default()
    });
    for caution in &trial.answer.cautions {
        if !all.contains(caution) {
            all.push(caution.clone());
        }
    }
    all.retain(|caution| caution.comes_first() == first);
    cautions::cautions(&all)
}

fn price(trial: &Trial) -> String {
    let Some(price) = trial.price else { return String::new() };
    let values = [
        price.ml_per_kg.map(|value| number(value, 1)),
        price.plateau_cmh2o.map(|value| number(value, 0)),
        Some(number(price.minute_volume_l_min, 1)),
    ];
    let mut cells = String::new();
    for (place, value) in values.into_iter().enumerate() {
        let (value, unit) = match value {
            Some(value) => (said("b", "", &value) + " ", words::PRICE_UNITS[place]),
            None => (String::new(), words::PRICE_MISSING[place]),
        };
        let inner =
            said("dt", "", words::PRICE[place]) + &element("dd", "", &(value + &said("small", "", unit)));
        cells += &element("div", "price", &inner);
    }
    element("dl", "prices", &cells)
}

/// The steppers of what is set: drawn anew only when that changes.
fn steppers(app: App) -> AnyView {
    let set = move || {
        app.trial.with(|trial| {
            let trial = trial.as_ref()?;
            Some((trial.in_force.rate_per_min, trial.set_volume(), trial.in_force.control))
        })
    };
    let known =
        Memo::new(move |_| set().map(|(rate, volume, _)| words::known(rate, volume)).unwrap_or_default());
    let all = move || {
        known.with(|_| ());
        let Some((rate, volume, control)) = untrack(set) else { return ().into_any() };
        let mut all = vec![];
        if let Some(old) = rate {
            all.push(stepper(app, Steps { field: Field::NewRate, old, by: 1.0 }, next));
        }
        if let Some(old) = volume {
            all.push(stepper(app, Steps { field: Field::NewVolume, old, by: VOLUME_STEP_ML }, next));
        }
        let note = if rate.is_none() && volume.is_none() {
            words::NO_STEPS
        } else if control.is_some_and(|control| control != Control::Volume) {
            words::READ_AGAIN
        } else {
            ""
        };
        all.push(view! { <p class="note" hidden=note.is_empty()>{note}</p> }.into_any());
        all.into_any()
    };
    view! { {move || all()} }.into_any()
}

/// The Next key: from the rate to the volume, then the keys close.
fn next(app: App) {
    let field = app.active.get_untracked();
    if field.is_some_and(|field| app.says_wrong(field)) {
        return;
    }
    let volume = app.trial.with_untracked(|trial| trial.as_ref().is_some_and(|t| t.set_volume().is_some()));
    if field == Some(Field::NewRate) && volume {
        page::focus(Field::NewVolume.spec().id);
    } else {
        app.active.set(None);
        page::focus("main-button");
    }
}

fn label(app: App) -> String {
    words::made(&app.label().unwrap_or_default(), &app.now.get())
}

fn more(app: App) -> Option<String> {
    app.still().or_else(|| {
        let change = app.trial.with(|trial| trial.as_ref().map(|t| t.change)).unwrap_or_default();
        Some(if change.is_empty() { words::STEP_FIRST.to_owned() } else { words::changes(&change) })
    })
}

/// The questions about the change that were not answered yet.
fn unusual(app: App) -> Vec<Question> {
    let change = app.trial.with(|trial| trial.as_ref().map(|t| t.change)).unwrap_or_default();
    app.unanswered(ask_about_entry(&app.case(), &EntryKind::Settings(change)))
}

fn undo(app: App) {
    app.sheet.update(|sheet| sheet.clear(&[Field::NewRate, Field::NewVolume], &[]));
    app.active.set(None);
}

fn write(app: App) {
    // A number that is wrong is not silently left out of what is written.
    if let Some(field) = [Field::NewRate, Field::NewVolume].into_iter().find(|field| app.says_wrong(*field)) {
        page::focus(field.spec().id);
        return;
    }
    let change: Settings =
        app.trial.with_untracked(|trial| trial.as_ref().map(|t| t.change)).unwrap_or_default();
    if change.is_empty() {
        app.tell(words::STEP_FIRST);
        return;
    }
    if !may_write(app, FORM) {
        return;
    }
    let now = app.tick();
    if app.write(vec![(now.wall, EntryKind::Settings(change))]) {
        undo(app);
        app.tell(&words::written(&change, now.wall, &now));
        page::go(Room::Now.hash());
    }
}

/// One polite sentence, a little after the last step.
fn say_after_a_pause(app: App) {
    let timer = Rc::new(Cell::new(None::<TimeoutHandle>));
    let (pending, gone) = (Rc::clone(&timer), SendWrapper::new(timer));
    Effect::new(move |before: Option<Settings>| {
        let (change, said) = app.trial.with(|trial| {
            let change = trial.as_ref().map(|t| t.change).unwrap_or_default();
            let said = trial.as_ref().and_then(|t| Some(words::said(&t.change, outlook::value(&t.answer)?)));
            (change, said.unwrap_or_default())
        });
        if before.is_some_and(|before| before != change) && !change.is_empty() {
            stop(&pending);
            pending.set(clock::after(SAID_AFTER_MS, move || app.tell(&said)));
        }
        change
    });
    on_cleanup(move || stop(&gone));
}

fn stop(timer: &Cell<Option<TimeoutHandle>>) {
    if let Some(timer) = timer.take() {
        timer.clear();
    }
}
