//! The answer: the two numbers with their bands, one sentence, and what it depends on.

use bedside::Freshness;
use leptos::prelude::*;

use super::{View, last_gas, words, write_unchanged};
use crate::parts::cautions::{Conditions, Sentences};
use crate::parts::figure::Figure;
use crate::state::app::{App, app};
use crate::state::outlook;
use crate::words::values::{about, in_words, paco2_range, ph_range};

/// The answer, or why there is none.
#[component]
pub fn AnswerView(view: Memo<Option<View>>) -> impl IntoView {
    let app = app();
    let numbers = move || {
        view.with(|view| match view {
            None => view! { <p class="lead">{words::NO_CASE}</p> }.into_any(),
            Some(view) => one(app, view),
        })
    };
    let cautions = Signal::derive(move || {
        view.with(|view| view.as_ref().map(|view| view.cautions.clone()).unwrap_or_default())
    });
    let standing =
        Signal::derive(move || view.with(|view| view.as_ref().map(|view| view.answer.standing.clone())));
    view! {
        <section class="answer">
            {numbers}
            <Conditions standing />
            <Sentences cautions />
        </section>
    }
}

fn one(app: App, view: &View) -> AnyView {
    if let Freshness::Expired { since } = view.freshness {
        return expired(app, view, since);
    }
    let Some((forecast, (paco2, ph))) = view.shown().and_then(|f| Some((f, outlook::at(f, 0.0)?))) else {
        return without_forecast(app, view);
    };
    let still = if let Freshness::StillSo { since } = view.freshness {
        Some(view! { <p class="still-so">{words::still_so(since, &view.now)}</p> })
    } else {
        None
    };
    view! {
        <div class="figures">
            <Figure
                label=words::PACO2_NOW
                value=about(paco2.p50, 0)
                unit=words::MMHG
                band=in_words(&paco2_range(&paco2))
            />
            <Figure label=words::PH_NOW value=about(ph.p50, 2) unit="" band=ph_range(&ph) />
        </div>
        <p class="hint">{words::CALCULATED}</p>
        <p class="sentence">
            {words::heading(paco2.p50, forecast)} " "
            {words::when_settled(&forecast.minutes_to_within_2_mmhg, &view.now)}
        </p>
        {still}
    }
    .into_any()
}

/// An hour unconfirmed: the number is taken away.
fn expired(app: App, view: &View, since: case::Moment) -> AnyView {
    let gas = last_gas(&app.case());
    let said = words::expired(gas.as_ref().map(|(gas, at)| (gas, *at)), since, &view.now);
    let label = app.label().unwrap_or_default();
    view! {
        <p class="lead">{said}</p>
        <div class="ways">
            <button type="button" class="plain" on:click=move |_| write_unchanged(app)>
                {words::nothing_changed(&label)} " "
                <span class="faint">{move || app.still()}</span>
            </button>
        </div>
    }
    .into_any()
}

fn without_forecast(app: App, view: &View) -> AnyView {
    let gas = last_gas(&app.case()).map(|(gas, at)| words::last_gas(&gas, at, &view.now));
    let ratio = app.study.with_untracked(|study| study.as_ref()?.ratio(&view.now));
    let ratio = ratio.map(|ratio| words::ratio(ratio.minute_volume_factor, &ratio.paco2_mmhg));
    view! {
        {gas.map(|said| view! { <p class="lead">{said}</p> })}
        {ratio.map(|said| view! { <p class="sentence">{said}</p> })}
    }
    .into_any()
}
