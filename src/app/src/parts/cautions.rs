//! Sentences to heed: what an answer depends on, why there is none, and cautions.

use bedside::{Caution, Standing};
use leptos::prelude::*;

use crate::words::now as words;

/// What must stay so, and why there is no answer.
#[component]
pub fn Conditions(
    /// The decision.
    #[prop(into)]
    standing: Signal<Option<Standing>>,
) -> impl IntoView {
    let conditions = move || {
        standing.with(|standing| {
            let standing = standing.as_ref()?;
            let all = standing.conditions.iter().map(|c| view! { <p class="condition">{c.words.clone()}</p> });
            Some(all.collect_view())
        })
    };
    let withheld = move || {
        standing.with(|standing| {
            let standing = standing.as_ref()?;
            let all = standing.withheld.iter().map(|why| {
                let help = (!why.would_help.is_empty()).then(|| {
                    view! { <span class="help">{words::WOULD_HELP} " " {why.would_help.clone()}</span> }
                });
                view! { <p class="withheld">{why.words.clone()} " " {help}</p> }
            });
            Some(all.collect_view())
        })
    };
    view! { {withheld} {conditions} }
}

/// Cautions, the most dangerous first and marked.
#[component]
pub fn Sentences(
    /// The cautions.
    #[prop(into)]
    cautions: Signal<Vec<Caution>>,
) -> impl IntoView {
    view! {
        <ul class="cautions-list" hidden=move || cautions.with(Vec::is_empty)>
            {move || {
                let all = cautions.get().into_iter();
                all.map(|caution| view! { <li class="caution">{caution.words}</li> }).collect_view()
            }}
        </ul>
    }
}
