//! Questions before an entry is written, each with its answers as buttons.

use bedside::{Question, QuestionKind};
use leptos::prelude::*;

use super::buttons::plain;
use crate::device::page;
use crate::state::app::App;
use crate::state::field::Field;
use crate::words::form as words;
use crate::words::spoken::spoken;

/// The questions still open; Mend it leads to `mend`, and `then` runs after an answer.
pub fn questions(
    app: App,
    open: Memo<Vec<Question>>,
    mend: Field,
    then: impl Fn() + Copy + Send + 'static,
) -> AnyView {
    let all = move || {
        let mut all = vec![];
        for question in open.get() {
            all.push(one(app, question, mend, then));
        }
        all.into_any()
    };
    view! {
        <div id="questions" tabindex="-1" class="questions" hidden=move || open.with(Vec::is_empty)>
            {move || all()}
        </div>
    }
    .into_any()
}

fn one(app: App, question: Question, mend: Field, then: impl Fn() + Copy + 'static) -> AnyView {
    let said = question.words.clone();
    let as_typed = move || {
        app.sheet.update(|sheet| sheet.answered.push(said.clone()));
        then();
    };
    let answers = match question.kind {
        QuestionKind::MmhgOrKpa { typed, as_kpa_mmhg } => {
            let in_kpa = move || {
                app.sheet.update(|sheet| sheet.kpa = true);
                then();
            };
            vec![plain(words::is_mmhg(typed), as_typed), plain(words::is_kpa(typed, as_kpa_mmhg), in_kpa)]
        }
        QuestionKind::Hco3Contradicts { .. } | QuestionKind::Unusual => vec![
            plain(words::AS_TYPED.to_owned(), as_typed),
            plain(words::MEND_IT.to_owned(), move || page::focus(mend.spec().id)),
        ],
    };
    let name = spoken(&question.words);
    view! {
        <div class="question" role="group" aria-label=name>
            <p>{question.words}</p>
            <div class="two-buttons">{answers}</div>
        </div>
    }
    .into_any()
}
