//! How long the settings had been held before the first gas.

use leptos::prelude::*;

use super::words;
use crate::state::app::app;
use crate::state::writing::{Held as How, held_corrections, held_is_open};

/// The three chips, until one is chosen.
#[component]
pub fn Held() -> impl IntoView {
    let app = app();
    let open = Memo::new(move |_| app.in_force().airway.is_some() && held_is_open(&app.case()));
    move || {
        open.get().then(|| {
            let chips = How::ALL.into_iter().zip(words::HELD_CHIPS).map(move |(how, chip)| {
                let choose = move |_| {
                    let now = app.tick();
                    let corrections = untrack(|| held_corrections(&app.case(), how));
                    app.write(corrections.into_iter().map(|kind| (now.wall, kind)).collect());
                };
                view! { <button type="button" class="chip" on:click=choose>{chip}</button> }
            });
            view! {
                <section class="field chips" role="group" aria-labelledby="held-label">
                    <span class="field-label" id="held-label">{words::HELD}</span>
                    <div class="chips-row chips-3">{chips.collect_view()}</div>
                </section>
            }
        })
    }
}
