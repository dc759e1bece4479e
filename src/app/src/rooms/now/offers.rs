//! Settings offered, each with where it leads and what it costs; none is chosen. Each is a link to trying it.

use bedside::{Caution, Offer, Offers};
use leptos::prelude::*;

use super::words;
use crate::parts::cautions::cautions;
use crate::parts::html::{element, said, tag};
use crate::state::app::App;
use crate::state::writing::address_of;
use crate::words::spoken::spoken;
use crate::words::values::{about, paco2_range, ph_range};

/// At most so many are offered.
const MOST: usize = 3;

/// The offers, while the forecast is shown.
pub fn offers(app: App) -> AnyView {
    let one = move |place: usize| of(app, |all| all.offers.get(place).cloned());
    let count = move || of(app, |all| all.offers.len());
    let fewer = move || of(app, because);
    let own = move |offer: &Offer| {
        let shared = of(app, shared);
        offer.cautions.iter().filter(|caution| !shared.contains(caution)).cloned().collect::<Vec<_>>()
    };
    let mut rows = vec![];
    // Three links that stay while their words change, so that the focus on one is not lost each minute.
    for place in 0..MOST {
        let words = move || one(place).map(|offer| html(&offer)).unwrap_or_default();
        let address = move || one(place).map(|offer| address_of(&offer.change)).unwrap_or_default();
        let heed = move || one(place).map(|offer| cautions(&own(&offer))).unwrap_or_default();
        rows.push(
            view! {
                <li hidden=move || one(place).is_none()>
                    <a class="offer" href=move || address() inner_html=move || words()></a>
                    <div inner_html=move || heed()></div>
                </li>
            }
            .into_any(),
        );
    }
    let heading = move || if count() == MOST { words::OFFERS } else { words::FEWER };
    view! {
        <section class="offers">
            <div hidden=move || count() == 0>
                <h2>{move || heading().to_owned()}</h2>
                <ul class="plain-list">{rows}</ul>
                <p class="hint">{words::NONE_CHOSEN}</p>
            </div>
            <div inner_html=move || fewer()></div>
        </section>
    }
    .into_any()
}

/// Something of the offers, or nothing where there are none.
fn of<T: Default>(app: App, what: impl Fn(&Offers) -> T) -> T {
    app.present.with(|present| present.as_ref().and_then(|p| p.offers.as_ref()).map(what)).unwrap_or_default()
}

/// What to heed with every one of them is said once.
fn shared(offers: &Offers) -> Vec<Caution> {
    let Some((first, rest)) = offers.offers.split_first() else { return vec![] };
    let everywhere = |caution: &&Caution| rest.iter().all(|offer| offer.cautions.contains(caution));
    first.cautions.iter().filter(everywhere).cloned().collect()
}

fn because(offers: &Offers) -> String {
    cautions(&shared(offers)) + &cautions(&offers.fewer_because)
}

fn name(offer: &Offer) -> String {
    let settled = offer.forecast.settled;
    spoken(&format!(
        "{}: PaCO₂ {} ({}) mmHg, pH {} ({}), {}",
        words::offer(&offer.change),
        about(settled.paco2_mmhg.p50, 0),
        paco2_range(&settled.paco2_mmhg),
        about(settled.ph.p50, 2),
        ph_range(&settled.ph),
        words::price(&offer.price)
    ))
}

fn html(offer: &Offer) -> String {
    let settled = offer.forecast.settled;
    let figure = |name: &str, value: &str, band: &str| {
        let inner = said("span", "offer-name", name) + &said("b", "", value) + &said("small", "", band);
        element("span", "offer-figure", &inner)
    };
    let seen = said("b", "offer-what", &words::offer(&offer.change))
        + &figure(
            "PaCO₂ ",
            &about(settled.paco2_mmhg.p50, 0),
            &format!("{} {}", paco2_range(&settled.paco2_mmhg), words::MMHG),
        )
        + &figure("pH ", &about(settled.ph.p50, 2), &ph_range(&settled.ph))
        + &said("small", "offer-price", &words::price(&offer.price));
    // Read as one sentence, seen as a row of a table.
    said("span", "unseen", &name(offer))
        + &tag("span", &[("class", "offer-row"), ("aria-hidden", "true")], &seen)
}
