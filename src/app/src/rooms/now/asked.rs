//! What the tool asks back: about a gas that does not fit, and how long the settings had been held.

use bedside::Doubt;
use case::{Airway, EntryKind, GasChoice, GasVerdict};
use leptos::prelude::*;

use super::words;
use crate::device::page;
use crate::parts::buttons::{perhaps, plain};
use crate::parts::chips::{chip, group, row};
use crate::state::app::App;
use crate::state::writing::{Held, held_corrections, held_is_open};

const CHOICES: [GasChoice; 3] = [GasChoice::Sample, GasChoice::Patient, GasChoice::Machine];

/// A gas outside its band, with the three ways to take it.
pub fn doubt(app: App) -> AnyView {
    let doubt = move || app.present.with(|present| present.as_ref().and_then(|p| p.doubt.clone()));
    // Drawn anew only for another gas, so that the focus on an answer is not lost.
    let gas = Memo::new(move |_| doubt().map(|doubt| doubt.gas.0).unwrap_or_default());
    let asked = move || {
        gas.with(|_| ());
        perhaps(untrack(doubt).map(|doubt| ask(app, &doubt)))
    };
    view! { {move || asked()} }.into_any()
}

fn ask(app: App, doubt: &Doubt) -> AnyView {
    let now = app.now.get_untracked();
    let said = words::doubt(doubt.measured_mmhg, doubt.expected_mmhg, doubt.at, &now);
    let mut ways = vec![];
    for (choice, way) in CHOICES.into_iter().zip(words::DOUBT_WAYS) {
        let of = doubt.gas.clone();
        ways.push(plain(way.to_owned(), move || {
            let now = app.tick();
            let verdict = GasVerdict { of: of.clone(), choice };
            app.write(vec![(now.wall, EntryKind::GasVerdict(verdict))]);
            page::focus("room-title");
        }));
    }
    view! {
        <section class="doubt">
            <p class="caution">{said}</p>
            <p>{words::DOUBT_ASK}</p>
            <div class="ways">{ways}</div>
        </section>
    }
    .into_any()
}

/// How long the settings had been held before the first gas, until it is said.
pub fn held(app: App) -> AnyView {
    let open = Memo::new(move |_| app.in_force().airway == Some(Airway::Tube) && held_is_open(&app.case()));
    let asked = move || {
        perhaps(open.get().then(|| {
            let mut chips = vec![];
            for (held, words) in Held::ALL.into_iter().zip(words::HELD_CHIPS) {
                chips.push(chip(
                    words,
                    None,
                    || false,
                    move || {
                        let now = app.tick();
                        let corrections = untrack(|| held_corrections(&app.case(), held));
                        app.write(corrections.into_iter().map(|kind| (now.wall, kind)).collect());
                        // The chips are gone with their answer: the focus goes on from the top of the room.
                        page::focus("room-title");
                    },
                ));
            }
            group(words::HELD, vec![row(3, chips)], None, || None)
        }))
    };
    view! { {move || asked()} }.into_any()
}
