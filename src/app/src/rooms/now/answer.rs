//! The answer: the two numbers with their bands, one sentence, and what it depends on.

use bedside::Freshness;
use case::{Gas, Moment};
use leptos::prelude::*;

use super::{last_gas, words, write_unchanged};
use crate::parts::buttons::press;
use crate::parts::cautions;
use crate::parts::figure::figure;
use crate::parts::html::{element, said};
use crate::state::app::App;
use crate::state::outlook;
use crate::state::present::Present;
use crate::words::values::{about, in_words, paco2_range, ph_range};

/// The answer, or why there is none.
pub fn answer(app: App) -> AnyView {
    let drawn = move || {
        let gas = last_gas(app);
        app.present.with(|present| html(present.as_ref(), gas))
    };
    let expired = move || {
        app.present.with(|p| matches!(p.as_ref().map(|p| p.freshness), Some(Freshness::Expired { .. })))
    };
    let label = move || words::nothing_changed(&app.label().unwrap_or_default());
    view! {
        <section class="answer">
            <div inner_html=move || drawn()></div>
            <button
                type="button"
                class="plain"
                hidden=move || !expired()
                on:click=press(move || write_unchanged(app))
            >
                {move || label()} " "
                <span class="faint">{move || app.still().unwrap_or_default()}</span>
            </button>
        </section>
    }
    .into_any()
}

fn html(present: Option<&Present>, gas: Option<(Gas, Moment)>) -> String {
    let Some(present) = present else { return said("p", "lead", words::NO_CASE) };
    let now = &present.now;
    if let Freshness::Expired { since } = present.freshness {
        return said("p", "lead", &words::expired(gas.as_ref().map(|(gas, at)| (gas, *at)), since, now))
            + &cautions::cautions(&present.cautions);
    }
    let numbers = numbers(present);
    let answer = if numbers.is_empty() {
        let gas = gas.map(|(gas, at)| said("p", "lead", &words::last_gas(&gas, at, now)));
        let ratio = present
            .ratio
            .map(|ratio| said("p", "sentence", &words::ratio(ratio.minute_volume_factor, &ratio.paco2_mmhg)));
        gas.unwrap_or_default() + &ratio.unwrap_or_default()
    } else {
        // How old the gas is stands beside what was calculated from it.
        let gas = gas.map(|(gas, at)| words::last_gas(&gas, at, now) + " " + &words::age(at, now));
        numbers + &gas.map(|words| said("p", "hint", &words)).unwrap_or_default()
    };
    // A gas that does not fit is asked about right below, with its three answers.
    let standing =
        if present.doubt.is_some() { String::new() } else { cautions::standing(&present.answer.standing) };
    answer + &standing + &cautions::cautions(&present.cautions)
}

/// The two numbers and the sentence; empty where there is no forecast.
fn numbers(present: &Present) -> String {
    let Some(forecast) = present.shown() else { return String::new() };
    let Some((paco2, ph)) = outlook::at(forecast, 0.0) else { return String::new() };
    let now = &present.now;
    let figures =
        figure(words::PACO2_NOW, &about(paco2.p50, 0), words::MMHG, &in_words(&paco2_range(&paco2)))
            + &figure(words::PH_NOW, &about(ph.p50, 2), "", &ph_range(&ph));
    let sentence = format!(
        "{} {}",
        words::heading(paco2.p50, forecast),
        words::when_settled(&forecast.minutes_to_within_2_mmhg, now)
    );
    let still = match present.freshness {
        Freshness::StillSo { since } => said("p", "still-so", &words::still_so(since, now)),
        _ => String::new(),
    };
    element("div", "figures", &figures)
        + &said("p", "hint", words::CALCULATED)
        + &said("p", "sentence", &sentence)
        + &still
}
