//! Settings offered, each with where it leads and what it costs; none is chosen.

use bedside::Offer;
use leptos::prelude::*;

use super::{View, words};
use crate::device::page;
use crate::parts::cautions::Sentences;
use crate::state::app::{App, app};
use crate::state::field::Field;
use crate::state::room::Room;
use crate::words::spoken::spoken;
use crate::words::values::{about, as_typed, paco2_range, ph_range};

/// The offers, while the forecast is shown.
#[component]
pub fn Offers(view: Memo<Option<View>>) -> impl IntoView {
    let app = app();
    let offers = Memo::new(move |_| {
        view.with(|view| {
            let view = view.as_ref().filter(|view| view.shown().is_some())?;
            app.study.with(|study| study.as_ref()?.offers(&view.now).value)
        })
    });
    let rows = move || offers.with(|offers| offers.as_ref().map(|all| list(app, &all.offers)));
    let cautions = Signal::derive(move || {
        offers.with(|offers| offers.as_ref().map(|all| all.fewer_because.clone()).unwrap_or_default())
    });
    view! {
        <section class="offers" hidden=move || offers.with(Option::is_none)>
            {rows}
            <Sentences cautions />
        </section>
    }
}

fn list(app: App, offers: &[Offer]) -> Option<impl IntoView + use<>> {
    let heading = match offers.len() {
        0 => return None,
        3 => words::OFFERS,
        _ => words::FEWER,
    };
    let rows = offers.iter().map(|offer| row(app, offer)).collect_view();
    Some(view! {
        <h2>{heading}</h2>
        <ul class="plain-list">{rows}</ul>
        <p class="hint">{words::NONE_CHOSEN}</p>
    })
}

fn row(app: App, offer: &Offer) -> impl IntoView + use<> {
    let change = offer.change;
    let settled = offer.forecast.settled;
    let what = words::offer(&change);
    let paco2 = (about(settled.paco2_mmhg.p50, 0), paco2_range(&settled.paco2_mmhg));
    let ph = (about(settled.ph.p50, 2), ph_range(&settled.ph));
    let price = words::price(&offer.price);
    let name = spoken(&format!(
        "{what}: PaCO₂ {} ({}) mmHg, pH {} ({}), {price}",
        paco2.0, paco2.1, ph.0, ph.1
    ));
    let try_it = move |_| {
        let text = |value: Option<f64>| value.map(as_typed).unwrap_or_default();
        app.sheet.update(|sheet| {
            sheet.set_text(Field::NewRate, text(change.rate_per_min));
            sheet.set_text(Field::NewVolume, text(change.tidal_volume_ml));
        });
        page::go(Room::Change.hash());
    };
    let cautions = offer.cautions.clone();
    view! {
        <li>
            <button type="button" class="offer" aria-label=name on:click=try_it>
                <b class="offer-what">{what}</b>
                <span class="offer-paco2">"PaCO₂ " <b>{paco2.0}</b> <small>{paco2.1}</small></span>
                <span class="offer-ph">"pH " <b>{ph.0}</b> <small>{ph.1}</small></span>
                <small class="offer-price">{price}</small>
            </button>
            <Sentences cautions=Signal::stored(cautions) />
        </li>
    }
}
