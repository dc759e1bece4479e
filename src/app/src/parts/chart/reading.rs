//! Reading the chart without seeing it: a slider over its times, and a table.

use leptos::prelude::*;

use super::Picture;
use crate::device::page;
use crate::words::now as words;
use crate::words::spoken::spoken;
use crate::words::values::{about, clock, paco2_range, ph_range};

/// A native slider over the chart's times.
#[component]
pub fn Slider(#[prop(into)] picture: Signal<Option<Picture>>, at: RwSignal<usize>) -> impl IntoView {
    let last = Memo::new(move |_| picture.with(|p| p.as_ref().map_or(0, |p| p.listed().len() - 1)));
    let said = Memo::new(move |_| {
        picture.with(|picture| {
            let picture = picture.as_ref()?;
            let minute = *picture.listed().get(at.get())?;
            let (paco2, _) = picture.point(minute)?;
            Some(words::chart::point(&picture.clock(minute), &paco2))
        })
    });
    let said = move || said.get().unwrap_or_default();
    let moved = move |event: web_sys::Event| {
        if let Some(place) = page::input(&event).and_then(|input| input.value().parse().ok()) {
            at.set(place);
        }
    };
    view! {
        <div class="chart-slider">
            <label for="chart-slider">{words::chart::READ} " " <b>{said}</b></label>
            <input
                type="range"
                id="chart-slider"
                min="0"
                max=last
                step="1"
                prop:value=move || at.get().to_string()
                aria-valuetext=move || spoken(&said())
                on:input=moved
            />
        </div>
    }
}

/// The same numbers as a table.
#[component]
pub fn Table(#[prop(into)] picture: Signal<Option<Picture>>) -> impl IntoView {
    let rows = move || {
        picture.with(|picture| {
            let picture = picture.as_ref()?;
            let rows = picture.listed().into_iter().filter_map(|minute| {
                let (paco2, ph) = picture.point(minute)?;
                let index = picture.forecast.minutes.iter().position(|m| *m == minute)?;
                let reads = picture.forecast.gas_would_read_paco2_mmhg.at(index)?;
                Some(view! {
                    <tr>
                        <th scope="row">{picture.clock(minute)}</th>
                        <td>{format!("{} ({})", about(paco2.p50, 0), paco2_range(&paco2))}</td>
                        <td>{format!("{} ({})", about(ph.p50, 2), ph_range(&ph))}</td>
                        <td>{paco2_range(&reads)}</td>
                    </tr>
                })
            });
            let gases = picture.gases.iter().map(|(minute, mmhg, _)| {
                let at = clock(picture.now.wall.plus_minutes(*minute), &picture.now);
                view! {
                    <tr>
                        <th scope="row">{at}</th>
                        <td colspan="3">{words::chart::measured(*mmhg)}</td>
                    </tr>
                }
            });
            Some((gases.collect_view(), rows.collect_view()))
        })
    };
    view! {
        <details class="numbers">
            <summary>{words::NUMBERS}</summary>
            <table>
                <thead>
                    <tr>{words::chart::HEADS.map(|head| view! { <th scope="col">{head}</th> }).collect_view()}</tr>
                </thead>
                <tbody>{rows}</tbody>
            </table>
            <p class="note">{words::BAND_MEANS}</p>
        </details>
    }
}
