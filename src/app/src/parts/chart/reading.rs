//! Reading the chart without seeing it: a slider over its times, and a table.

use leptos::prelude::*;

use super::{Picture, Source};
use crate::device::page;
use crate::parts::html::{element, said, tag};
use crate::state::app::App;
use crate::words::now as words;
use crate::words::spoken::spoken;
use crate::words::values::{about, paco2_range, ph_range};

/// A native slider over the chart's times.
pub fn slider(app: App, picture: Source, at: RwSignal<usize>) -> AnyView {
    let point = move || {
        let picture = picture(app)?;
        let minute = *picture.listed().get(at.get())?;
        let (paco2, _) = picture.point(minute)?;
        Some(words::chart::point(&picture.clock(minute), &paco2))
    };
    let last = move || picture(app).map_or(0, |picture| picture.listed().len().saturating_sub(1));
    let moved = move |event: leptos::ev::Event| {
        if let Some(place) = page::input(&event).and_then(|input| input.value().parse().ok()) {
            at.set(place);
        }
    };
    view! {
        <div class="chart-slider">
            <label for="chart-slider">
                {words::chart::READ} " " <b>{move || point().unwrap_or_default()}</b>
            </label>
            <input
                type="range"
                id="chart-slider"
                min="0"
                max=move || last().to_string()
                step="1"
                prop:value=move || at.get().to_string()
                aria-valuetext=move || spoken(&point().unwrap_or_default())
                on:input=moved
            />
        </div>
    }
    .into_any()
}

/// The same numbers as a table.
pub fn table(app: App, picture: Source) -> AnyView {
    let html = move || picture(app).as_ref().map(rows).unwrap_or_default();
    view! {
        <details class="numbers">
            <summary>{words::NUMBERS}</summary>
            <div inner_html=move || html()></div>
            <p class="note">{words::BAND_MEANS}</p>
        </details>
    }
    .into_any()
}

fn rows(picture: &Picture) -> String {
    let mut body = String::new();
    for mark in &picture.gases {
        let time = tag("th", &[("scope", "row")], &picture.clock(mark.minute));
        let words = tag("td", &[("colspan", "3")], &words::chart::measured(mark.mmhg));
        body += &element("tr", "", &(time + &words));
    }
    for minute in picture.listed() {
        let index = picture.forecast.minutes.iter().position(|m| *m == minute);
        let reads = index.and_then(|index| picture.forecast.gas_would_read_paco2_mmhg.at(index));
        if let (Some((paco2, ph)), Some(reads)) = (picture.point(minute), reads) {
            let cells = tag("th", &[("scope", "row")], &picture.clock(minute))
                + &said("td", "", &format!("{} ({})", about(paco2.p50, 0), paco2_range(&paco2)))
                + &said("td", "", &format!("{} ({})", about(ph.p50, 2), ph_range(&ph)))
                + &said("td", "", &paco2_range(&reads));
            body += &element("tr", "", &cells);
        }
    }
    let heads: String = words::chart::HEADS.iter().map(|head| tag("th", &[("scope", "col")], head)).collect();
    let head = element("thead", "", &element("tr", "", &heads));
    element("table", "", &(head + &element("tbody", "", &body)))
}
