//! Questions before an entry is written, each with its answers as buttons.

use bedside::{Question, QuestionKind};
use leptos::prelude::*;

use super::buttons::plain;
use super::form::Form;
use crate::device::page;
use crate::state::app::App;
use crate::state::asks::unit_of;
use crate::state::field::Field;
use crate::words::form as words;
use crate::words::spoken::spoken;

/// The questions still open, once the form was to be written.
pub fn questions(app: App, form: Form) -> AnyView {
    let open = move || if app.asked.get() { (form.ask)(app) } else { vec![] };
    // Drawn anew only when the questions are others, so that the focus on an answer is not lost.
    let asked = Memo::new(move |_| open().iter().map(|question| question.words.as_str()).collect::<String>());
    let all = move || {
        asked.with(|_| ());
        let mut all = vec![];
        for question in untrack(open) {
            all.push(one(app, question, form));
        }
        all.into_any()
    };
    view! {
        <div id="questions" tabindex="-1" class="questions" hidden=move || asked.with(String::is_empty)>
            {move || all()}
        </div>
    }
    .into_any()
}

fn one(app: App, question: Question, form: Form) -> AnyView {
    let said = question.words.clone();
    let answer = move |unit: Option<(Field, bool)>| {
        let said = said.clone();
        move || {
            app.sheet.update(|sheet| {
                if let Some((field, kpa)) = unit {
                    sheet.set_unit(field, kpa);
                }
                sheet.answered.push(said.clone());
            });
            (form.press)(app);
        }
    };
    let answers = match question.kind {
        QuestionKind::MmhgOrKpa { typed, as_kpa_mmhg } => {
            let field = unit_of(&question);
            vec![
                plain(words::is_mmhg(typed), answer(Some((field, false)))),
                plain(words::is_kpa(typed, as_kpa_mmhg), answer(Some((field, true)))),
            ]
        }
        QuestionKind::Hco3Contradicts { .. } | QuestionKind::Unusual => {
            let field = (form.mend)(&question);
            vec![
                plain(words::AS_TYPED.to_owned(), answer(None)),
                plain(words::MEND_IT.to_owned(), move || page::focus(field.spec().id)),
            ]
        }
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
