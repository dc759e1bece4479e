//! Trying a change: the answer, the chart that moves with it, what it costs, the steppers, and the writing.

mod price;

use bedside::{Answer, Forecast};
use case::{EntryKind, Now as Clock, Settings};
use leptos::prelude::*;

use crate::device::{clock, page};
use crate::parts::cautions::{Conditions, Sentences};
use crate::parts::chart::{Chart, Picture};
use crate::parts::figure::Figure;
use crate::parts::keypad::Keypad;
use crate::parts::main_button::MainButton;
use crate::parts::stepper::Stepper;
use crate::state::app::{App, app};
use crate::state::field::Field;
use crate::state::outlook;
use crate::state::room::Room;
use crate::state::writing;
use crate::words::change as words;
use crate::words::now::{MMHG, when_settled};
use crate::words::values::{about, in_words, paco2_range, ph_range};

/// Height of the chart, in its own units: the keys must find room under it.
const CHART_HEIGHT: f64 = 236.0;
/// A change is said this long after the last step.
const SAID_AFTER_MS: u64 = 700;
/// Millilitres of one step of the tidal volume.
const VOLUME_STEP_ML: f64 = 10.0;

/// What is tried, and what comes of it.
#[derive(Clone, PartialEq)]
struct Trial {
    now: Clock,
    in_force: Settings,
    change: Settings,
    answer: Answer<Forecast>,
}

impl Trial {
    fn of(app: App) -> Option<Self> {
        let now = app.now.get();
        let in_force = app.in_force();
        in_force.airway?;
        let change = app.sheet.with(|sheet| writing::change(sheet, &in_force, app.group()));
        let minutes = minutes(app, &now);
        app.study.with(|study| {
            let given = (!change.is_empty()).then_some(&change);
            let answer = study.as_ref()?.forecast(&now, given, &minutes);
            Some(Self { now, in_force, change, answer })
        })
    }
}

fn minutes(app: App, now: &Clock) -> Vec<f64> {
    let start = app.open.with(|open| outlook::start(&open.as_ref()?.case));
    outlook::minutes(start, now)
}

/// The room.
#[component]
pub fn Change() -> impl IntoView {
    let app = app();
    let trial = Memo::new(move |_| Trial::of(app));
    // What happens if nothing is changed: asked once a minute, not at every step.
    let unchanged = Memo::new(move |_| {
        let now = app.now.get();
        let minutes = minutes(app, &now);
        app.study.with(|study| outlook::value(&study.as_ref()?.forecast(&now, None, &minutes)).cloned())
    });
    let picture = Memo::new(move |_| {
        trial.with(|trial| {
            let trial = trial.as_ref()?;
            let forecast = outlook::value(&trial.answer)?;
            let compared = (!trial.change.is_empty()).then(|| {
                unchanged.get().map(|other| (other, words::compared(&trial.in_force, &trial.change)))
            });
            Picture::new(forecast, compared.flatten(), &app.case(), &trial.now, CHART_HEIGHT, false)
        })
    });
    say_after_a_pause(app, trial);
    let standing = Signal::derive(move || trial.with(|t| t.as_ref().map(|t| t.answer.standing.clone())));
    let cautions = Signal::derive(move || {
        trial.with(|t| t.as_ref().map(|t| t.answer.cautions.clone()).unwrap_or_default())
    });
    let there = Memo::new(move |_| trial.with(Option::is_some));
    view! {
        <div class="scroll change">
            <p class="lead" hidden=move || there.get()>{words::NOTHING_YET}</p>
            <section class="answer">
                {move || trial.with(|trial| trial.as_ref().map(answer))}
                <Conditions standing />
            </section>
            <div class="chart-side"><Chart picture /></div>
            <section class="change-side">
                <price::PriceView trial cautions=Signal::derive(move || offered_cautions(app, trial)) />
                <Sentences cautions />
                <Steppers trial />
            </section>
        </div>
        <div class="dock">
            <Made trial />
            <Keypad next=Callback::new(move |()| next(app, trial)) />
        </div>
    }
}

/// The broken limits that an offer with the same change carries.
fn offered_cautions(app: App, trial: Memo<Option<Trial>>) -> Vec<bedside::Caution> {
    trial.with(|trial| {
        let Some(trial) = trial.as_ref() else { return vec![] };
        app.study
            .with(|study| {
                let offers = study.as_ref()?.offers(&trial.now).value?;
                offers.offers.into_iter().find(|offer| offer.change == trial.change)
            })
            .map(|offer| offer.cautions)
            .unwrap_or_default()
    })
}

fn answer(trial: &Trial) -> AnyView {
    let Some(forecast) = outlook::value(&trial.answer) else { return ().into_any() };
    let settled = forecast.settled;
    let label = if trial.change.is_empty() { words::UNCHANGED } else { words::SETTLES };
    view! {
        <div class="figures">
            <Figure
                label
                value=about(settled.paco2_mmhg.p50, 0)
                unit=MMHG
                band=in_words(&paco2_range(&settled.paco2_mmhg))
            />
            <Figure label=words::PH value=about(settled.ph.p50, 2) unit="" band=ph_range(&settled.ph) />
        </div>
        <p class="sentence">{when_settled(&forecast.minutes_to_within_2_mmhg, &trial.now)}</p>
    }
    .into_any()
}

/// The steppers of what is set.
#[component]
fn Steppers(trial: Memo<Option<Trial>>) -> impl IntoView {
    let app = app();
    let old = Memo::new(move |_| {
        trial.with(|trial| {
            let settings = trial.as_ref()?.in_force;
            let volume = settings.tidal_volume_ml.filter(|_| settings.control == Some(case::Control::Volume));
            Some((settings.rate_per_min, volume, settings.control))
        })
    });
    move || {
        let (rate, volume, control) = old.get()?;
        let next = Callback::new(move |()| next(app, trial));
        let pressure = control.is_some_and(|control| control != case::Control::Volume);
        Some(view! {
            {rate.map(|old| view! { <Stepper field=Field::NewRate old by=1.0 next /> })}
            {volume.map(|old| view! { <Stepper field=Field::NewVolume old by=VOLUME_STEP_ML next /> })}
            {(rate.is_none() && volume.is_none()).then(|| view! { <p class="note">{words::NO_STEPS}</p> })}
            {(pressure && rate.is_some()).then(|| view! { <p class="note">{words::READ_AGAIN}</p> })}
        })
    }
}

/// The Next key: from the rate to the volume, then the keys close.
fn next(app: App, trial: Memo<Option<Trial>>) {
    let field = app.active.get_untracked();
    if let Some(field) = field {
        let wrong = app.sheet.with_untracked(|sheet| sheet.read(field, app.group()));
        if let crate::state::sheet::Reading::Wrong(said) = wrong {
            app.left.update(|left| left.push(field));
            return app.tell(&said);
        }
    }
    let volume = trial.with_untracked(|trial| {
        trial.as_ref().is_some_and(|t| t.in_force.control == Some(case::Control::Volume))
    });
    if field == Some(Field::NewRate) && volume {
        page::focus(Field::NewVolume.spec().id);
    } else {
        app.active.set(None);
        page::focus("main-button");
    }
}

/// The button that writes, and the way back to what is set.
#[component]
fn Made(trial: Memo<Option<Trial>>) -> impl IntoView {
    let app = app();
    let label = Signal::derive(move || words::made(&app.label().unwrap_or_default(), &app.now.get()));
    let changed = Memo::new(move |_| {
        trial.with(|trial| trial.as_ref().map(|t| t.change).filter(|change| !change.is_empty()))
    });
    let more = Signal::derive(move || {
        app.still().or_else(|| {
            Some(changed.get().map_or_else(|| words::STEP_FIRST.to_owned(), |c| words::changes(&c)))
        })
    });
    let undo = move |_| {
        app.sheet.update(|sheet| sheet.clear(&[Field::NewRate, Field::NewVolume], &[]));
        app.active.set(None);
    };
    let press = Callback::new(move |()| write(app, trial));
    let there = move || trial.with(Option::is_some);
    view! {
        <div class="dock-buttons" hidden=move || !there()>
            <button type="button" class="plain" on:click=undo hidden=move || changed.get().is_none()>
                {words::UNDO}
            </button>
            <MainButton label more press />
        </div>
    }
}

fn write(app: App, trial: Memo<Option<Trial>>) {
    // A number that is wrong is not silently left out of what is written.
    for field in [Field::NewRate, Field::NewVolume] {
        let reading = app.sheet.with_untracked(|sheet| sheet.read(field, app.group()));
        if let crate::state::sheet::Reading::Wrong(said) = reading {
            app.left.update(|left| left.push(field));
            app.tell(&said);
            page::focus(field.spec().id);
            return;
        }
    }
    let change = trial.with_untracked(|trial| trial.as_ref().map(|t| t.change)).unwrap_or_default();
    if change.is_empty() {
        app.tell(words::STEP_FIRST);
        return;
    }
    let now = app.tick();
    if app.write(vec![(now.wall, EntryKind::Settings(change))]) {
        app.sheet.update(|sheet| sheet.clear(&[Field::NewRate, Field::NewVolume], &[]));
        app.tell(&words::written(&change, now.wall, &now));
        page::go(Room::Now.hash());
    }
}

/// One polite sentence, a little after the last step.
fn say_after_a_pause(app: App, trial: Memo<Option<Trial>>) {
    let timer = StoredValue::new(None::<TimeoutHandle>);
    Effect::new(move |before: Option<Settings>| {
        let (change, said) = trial.with(|trial| {
            let change = trial.as_ref().map(|t| t.change).unwrap_or_default();
            let said = trial.as_ref().and_then(|t| Some(words::said(&t.change, outlook::value(&t.answer)?)));
            (change, said)
        });
        if before.is_some_and(|before| before != change) && !change.is_empty() {
            if let Some(timer) = timer.try_update_value(Option::take).flatten() {
                timer.clear();
            }
            let tell = move || {
                if let Some(said) = said {
                    app.tell(&said);
                }
            };
            timer.set_value(clock::after(SAID_AFTER_MS, tell));
        }
        change
    });
    on_cleanup(move || {
        if let Some(timer) = timer.try_update_value(Option::take).flatten() {
            timer.clear();
        }
    });
}
