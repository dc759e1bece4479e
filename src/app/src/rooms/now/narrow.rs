//! What would narrow the band: each assumption with where to type what replaces it.

use bedside::Assumed;
use leptos::prelude::*;

use super::{View, words};
use crate::state::room::Room;

/// Where an assumption is replaced, by what it is called.
fn room_for(narrows: &str) -> Room {
    let words = narrows.to_lowercase();
    let has = |names: &[&str]| names.iter().any(|name| words.contains(name));
    if has(&["height", "weight", "sex", "age"]) {
        Room::Person
    } else if has(&["haemoglobin", "gas", "sample"]) {
        Room::Gas
    } else {
        Room::Settings
    }
}

/// The list, and under it what is assumed and nothing at the bedside narrows.
#[component]
pub fn Narrow(view: Memo<Option<View>>) -> impl IntoView {
    let assumed = Memo::new(move |_| {
        view.with(|view| {
            let view = view.as_ref().filter(|view| view.shown().is_some());
            view.map(|view| view.answer.assumed.clone()).unwrap_or_default()
        })
    });
    let list = move |narrows: bool| {
        assumed.with(|assumed| {
            let those = assumed.iter().filter(|item| item.narrows.is_empty() != narrows);
            those.map(|item| one(item)).collect_view()
        })
    };
    let any = move |narrows: bool| assumed.with(|all| all.iter().any(|a| a.narrows.is_empty() != narrows));
    view! {
        <section class="narrow" hidden=move || !any(true)>
            <h2>{words::NARROW}</h2>
            <ul class="plain-list">{move || list(true)}</ul>
            <a class="plain" href=Room::Settings.hash()>{words::SETTINGS_CHANGED}</a>
        </section>
        <details class="assumed" hidden=move || !any(false)>
            <summary>{words::ASSUMED}</summary>
            <ul class="plain-list">{move || list(false)}</ul>
        </details>
    }
}

fn one(item: &Assumed) -> impl IntoView + use<> {
    let said = words::assumed(item);
    let link = (!item.narrows.is_empty()).then(|| {
        view! { <a class="narrow-link" href=room_for(item.narrows).hash()>{item.narrows}</a> }
    });
    view! { <li>{link} " " <span class="faint">{said}</span></li> }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_assumption_leads_to_where_it_is_typed() {
        assert_eq!(room_for("Type the height."), Room::Person);
        assert_eq!(room_for("Type sex and age."), Room::Person);
        assert_eq!(room_for("Type the haemoglobin."), Room::Gas);
        assert_eq!(room_for("Type the plateau."), Room::Settings);
    }
}
