//! Questions before an entry is written, each with its answers as buttons.

use bedside::{Question, QuestionKind};
use leptos::prelude::*;

use crate::device::page;
use crate::state::app::app;
use crate::state::field::Field;
use crate::words::form as words;
use crate::words::spoken::spoken;

/// The questions still open; `then` runs after one was answered.
#[component]
pub fn Questions(
    /// The questions.
    #[prop(into)]
    open: Signal<Vec<Question>>,
    /// Where Mend it leads.
    mend: Field,
    /// Runs after an answer.
    then: Callback<()>,
) -> impl IntoView {
    view! {
        <div id="questions" tabindex="-1" class="questions" hidden=move || open.with(Vec::is_empty)>
            {move || {
                open.get().into_iter().map(|question| view! { <One question mend then /> }).collect_view()
            }}
        </div>
    }
}

#[component]
fn One(question: Question, mend: Field, then: Callback<()>) -> impl IntoView {
    let app = app();
    let said = question.words.clone();
    let as_typed = move |_| {
        app.sheet.update(|sheet| sheet.answered.push(said.clone()));
        then.run(());
    };
    let answers = match question.kind {
        QuestionKind::MmhgOrKpa { typed, as_kpa_mmhg } => {
            let in_kpa = move |_| {
                app.sheet.update(|sheet| sheet.kpa = true);
                then.run(());
            };
            view! {
                <button type="button" class="plain" on:click=as_typed>{words::is_mmhg(typed)}</button>
                <button type="button" class="plain" on:click=in_kpa>{words::is_kpa(typed, as_kpa_mmhg)}</button>
            }
            .into_any()
        }
        QuestionKind::Hco3Contradicts { .. } | QuestionKind::Unusual => view! {
            <button type="button" class="plain" on:click=as_typed>{words::AS_TYPED}</button>
            <button type="button" class="plain" on:click=move |_| page::focus(mend.spec().id)>
                {words::MEND_IT}
            </button>
        }
        .into_any(),
    };
    let name = spoken(&question.words);
    view! {
        <div class="question" role="group" aria-label=name>
            <p>{question.words}</p>
            <div class="two-buttons">{answers}</div>
        </div>
    }
}
