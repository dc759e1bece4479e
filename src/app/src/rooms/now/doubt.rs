//! A gas outside its band: the user says whether sample, patient or machine.

use case::{EntryKind, GasChoice, GasVerdict};
use leptos::prelude::*;

use super::words;
use crate::state::app::app;

const CHOICES: [GasChoice; 3] = [GasChoice::Sample, GasChoice::Patient, GasChoice::Machine];

/// The doubt with its three ways, where there is one.
#[component]
pub fn DoubtView() -> impl IntoView {
    let app = app();
    let doubt = move || app.study.with(|study| study.as_ref().and_then(|study| study.doubt().cloned()));
    move || {
        let doubt = doubt()?;
        let said = words::doubt(doubt.measured_mmhg, doubt.expected_mmhg, doubt.at, &app.now.get());
        let ways = CHOICES.into_iter().zip(words::DOUBT_WAYS).map(move |(choice, way)| {
            let of = doubt.gas.clone();
            let choose = move |_| {
                let verdict = GasVerdict { of: of.clone(), choice };
                let now = app.tick();
                app.write(vec![(now.wall, EntryKind::GasVerdict(verdict))]);
            };
            view! { <button type="button" class="plain" on:click=choose>{way}</button> }
        });
        Some(view! {
            <section class="doubt">
                <p class="caution">{said}</p>
                <p>{words::DOUBT_ASK}</p>
                <div class="ways">{ways.collect_view()}</div>
            </section>
        })
    }
}
