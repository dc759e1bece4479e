//! Where PaCO2 and pH are at this minute, where they are heading, when they have settled, and what would help.

mod answer;
mod doubt;
mod held;
mod narrow;
mod offers;

use bedside::{Answer, Caution, Forecast, Freshness, Status};
use case::{EntryKind, Now as Clock};
use leptos::prelude::*;

use crate::device::page;
use crate::parts::chart::{Chart, Picture, last_gas};
use crate::parts::main_button::MainButton;
use crate::state::app::{App, app};
use crate::state::outlook;
use crate::state::room::Room;
use crate::words::now as words;

/// Height of the chart, in its own units.
const CHART_HEIGHT: f64 = 300.0;

/// What the study says at this minute.
#[derive(Clone, PartialEq)]
struct View {
    now: Clock,
    freshness: Freshness,
    answer: Answer<Forecast>,
    cautions: Vec<Caution>,
}

impl View {
    fn of(app: App) -> Option<Self> {
        let now = app.now.get();
        app.study.with(|study| {
            let study = study.as_ref()?;
            let start = app.open.with(|open| outlook::start(&open.as_ref()?.case));
            let minutes = outlook::minutes(start, &now);
            Some(Self {
                now,
                freshness: study.freshness(&now),
                answer: study.forecast(&now, None, &minutes),
                cautions: study.cautions(&now),
            })
        })
    }

    /// The forecast, unless it is withheld or nobody has confirmed it for an hour.
    fn shown(&self) -> Option<&Forecast> {
        let expired = matches!(self.freshness, Freshness::Expired { .. });
        outlook::value(&self.answer).filter(|_| !expired)
    }

    fn stale(&self) -> bool {
        matches!(self.freshness, Freshness::StillSo { .. })
    }

    /// Whether it is still on its way: then the chart comes before the offers.
    fn moving(&self) -> bool {
        self.shown().is_some_and(|forecast| {
            outlook::at(forecast, 0.0)
                .is_some_and(|(paco2, _)| (paco2.p50 - forecast.settled.paco2_mmhg.p50).abs() >= 2.0)
        })
    }
}

/// The room.
#[component]
pub fn Now() -> impl IntoView {
    let app = app();
    let view = Memo::new(move |_| View::of(app));
    let picture = Memo::new(move |_| {
        view.with(|view| {
            let view = view.as_ref()?;
            Picture::new(view.shown()?, None, &app.case(), &view.now, CHART_HEIGHT, view.stale())
        })
    });
    let moving = Memo::new(move |_| view.with(|view| view.as_ref().is_some_and(View::moving)));
    let side = move || {
        let chart = view! { <div class="chart-side"><Chart picture /></div> };
        let offers = view! { <offers::Offers view /> };
        if moving.get() {
            view! { {chart} {offers} }.into_any()
        } else {
            view! { {offers} {chart} }.into_any()
        }
    };
    view! {
        <div class="scroll now">
            <answer::AnswerView view />
            <doubt::DoubtView />
            <held::Held />
            {side}
            <narrow::Narrow view />
        </div>
        <div class="dock">
            <div class="dock-buttons"><Buttons view /></div>
        </div>
    }
}

/// The next action, named by the state of the case, and the other one.
#[component]
fn Buttons(view: Memo<Option<View>>) -> impl IntoView {
    let app = app();
    let next = Memo::new(move |_| view.with(|view| Next::of(app, view.as_ref())));
    move || {
        let next = next.get();
        let label = next.label(app);
        let more = if next == Next::StillSo { app.still() } else { None };
        let press = Callback::new(move |()| next.press(app));
        let gas = (next != Next::TypeGas).then(|| {
            view! { <a class="plain" href=Room::Gas.hash()>{words::NEXT_GAS}</a> }
        });
        view! {
            {gas}
            <MainButton label more press />
        }
    }
}

/// The next action.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Next {
    TypeGas,
    TypeSettings,
    StillSo,
    Try,
}

impl Next {
    fn of(app: App, view: Option<&View>) -> Next {
        let Some(view) = view else { return Next::TypeGas };
        if app.case().gases().is_empty() {
            return Next::TypeGas;
        }
        if app.in_force().airway.is_none() {
            return Next::TypeSettings;
        }
        match view.freshness {
            Freshness::NoEntries | Freshness::Expired { .. } => Next::TypeGas,
            Freshness::StillSo { .. } => Next::StillSo,
            Freshness::Fresh if view.answer.standing.status == Status::Withheld => Next::TypeGas,
            Freshness::Fresh => Next::Try,
        }
    }

    fn label(self, app: App) -> String {
        match self {
            Next::TypeGas => words::TYPE_A_GAS.to_owned(),
            Next::TypeSettings => words::TYPE_SETTINGS.to_owned(),
            Next::StillSo => words::still_so_button(&app.label().unwrap_or_default()),
            Next::Try => words::TRY_A_RATE.to_owned(),
        }
    }

    fn press(self, app: App) {
        match self {
            Next::TypeGas => page::go(Room::Gas.hash()),
            Next::TypeSettings => page::go(Room::Settings.hash()),
            Next::StillSo => write_unchanged(app),
            Next::Try => page::go(Room::Change.hash()),
        }
    }
}

/// Somebody looked and nothing has changed.
fn write_unchanged(app: App) {
    let now = app.tick();
    app.write(vec![(now.wall, EntryKind::Unchanged)]);
}
