//! A row of chips: one of a few words. Pressing one chooses it and leads on.

use leptos::prelude::*;

use crate::device::clock;
use crate::state::app::app;
use crate::state::choice::Choice;

/// The chips of `choice`; `then` runs after one was chosen.
#[component]
pub fn Chips(
    /// What is chosen.
    choice: Choice,
    /// What is wrong, as a sentence.
    #[prop(into)]
    fault: Signal<Option<String>>,
    /// Runs after a choice.
    then: Callback<()>,
) -> impl IntoView {
    let app = app();
    let spec = choice.spec();
    let label_id = format!("{}-label", spec.id);
    let fault_id = format!("{}-fault", spec.id);
    let (labelled, described) = (label_id.clone(), fault_id.clone());
    let pick = Memo::new(move |_| app.sheet.with(|sheet| sheet.pick(choice)));
    let chips = (0..).zip(spec.options).map(move |(place, words): (u8, &&str)| {
        let chosen = move || pick.get() == Some(place);
        let press = move |_| {
            app.sheet.update(|sheet| sheet.choose(choice, Some(place), &clock::now()));
            then.run(());
        };
        // The first chip carries the group's id, so that focus can be led to the group.
        view! {
            <button
                type="button"
                class="chip"
                id=(place == 0).then_some(spec.id)
                aria-pressed=move || if chosen() { "true" } else { "false" }
                on:click=press
            >
                {*words}
            </button>
        }
    });
    let columns = format!("chips-row chips-{}", spec.columns);
    view! {
        <div
            class="field chips"
            role="group"
            aria-labelledby=labelled
            aria-describedby=described
        >
            <span class="field-label" id=label_id>{spec.label}</span>
            <div class=columns>{chips.collect_view()}</div>
            <Fault id=fault_id words=fault />
        </div>
    }
}

/// What is wrong, beside its control.
#[component]
pub fn Fault(
    /// Its id, for the control it describes.
    id: String,
    /// The sentence; nothing when all is well.
    #[prop(into)]
    words: Signal<Option<String>>,
) -> impl IntoView {
    view! { <p class="fault" id=id hidden=move || words.get().is_none()>{move || words.get()}</p> }
}
