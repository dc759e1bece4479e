//! What a change costs, as far as it can be said from what was typed.

use bedside::Caution;
use leptos::prelude::*;

use super::{Trial, words};
use crate::parts::cautions::Sentences;
use crate::state::app::app;
use crate::words::values::number;

/// The price in figures, the broken limit before them.
#[component]
pub fn PriceView(trial: Memo<Option<Trial>>, #[prop(into)] cautions: Signal<Vec<Caution>>) -> impl IntoView {
    let app = app();
    let price = Memo::new(move |_| {
        trial.with(|trial| {
            let trial = trial.as_ref()?;
            app.study.with(|study| study.as_ref()?.price(&trial.now, &trial.change))
        })
    });
    let figures = move || {
        let price = price.get()?;
        let values = [
            Ok(number(price.rate_per_min, 0)),
            price.ml_per_kg.map(|value| number(value, 1)).ok_or(words::NO_PER_KG),
            price.plateau_cmh2o.map(|value| number(value, 0)).ok_or(words::NO_PLATEAU),
            Ok(number(price.minute_volume_l_min, 1)),
        ];
        let cells = words::PRICE.into_iter().zip(words::PRICE_UNITS).zip(values).map(|((name, unit), value)| {
            let (value, unit) = match value {
                Ok(value) => (Some(value), unit),
                Err(why) => (None, why),
            };
            view! {
                <div class="price">
                    <dt>{name}</dt>
                    <dd><b>{value}</b> " " <small>{unit}</small></dd>
                </div>
            }
        });
        Some(view! { <dl class="prices">{cells.collect_view()}</dl> })
    };
    view! {
        <Sentences cautions />
        {figures}
    }
}
