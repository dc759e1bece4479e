//! What would narrow the band: each assumption with where to type what replaces it.

use bedside::Assumed;
use leptos::prelude::*;

use super::words;
use crate::parts::buttons::link;
use crate::parts::html::{element, said, tag, text};
use crate::state::app::App;
use crate::state::room::Room;

/// Where an assumption is replaced, by what it says; `None` where this version has no place for it.
fn room_for(narrows: &str) -> Option<Room> {
    let has = |names: &[&str]| names.iter().any(|name| narrows.contains(name));
    if has(&["height", "weight", "sex", "age"]) {
        Some(Room::Person)
    } else if has(&["exchanger", "plateau", "PEEP", "FiO", "minute volume", "expired"]) {
        Some(Room::Settings)
    } else if has(&["gas."]) {
        Some(Room::Gas)
    } else {
        None
    }
}

/// The list, and under it what is assumed and can't be replaced from here.
pub fn narrow(app: App) -> AnyView {
    let list = move |narrows: bool| {
        app.present.with(|present| {
            let shown = present.as_ref().filter(|present| present.shown().is_some());
            shown.map(|present| html(&present.answer.assumed, narrows)).unwrap_or_default()
        })
    };
    let (narrowing, rest) = (Memo::new(move |_| list(true)), Memo::new(move |_| list(false)));
    view! {
        <section class="narrow" hidden=move || narrowing.with(String::is_empty)>
            <h2>{words::NARROW}</h2>
            <ul class="plain-list" inner_html=move || narrowing.get()></ul>
            {link(words::SETTINGS_CHANGED.to_owned(), Room::Settings.hash())}
        </section>
        <details class="assumed" hidden=move || rest.with(String::is_empty)>
            <summary>{words::ASSUMED}</summary>
            <ul class="plain-list" inner_html=move || rest.get()></ul>
        </details>
    }
    .into_any()
}

fn html(assumed: &[Assumed], narrows: bool) -> String {
    let mut rows = String::new();
    for item in assumed.iter().filter(|item| room_for(item.narrows).is_some() == narrows) {
        let how = match room_for(item.narrows) {
            _ if item.narrows.is_empty() => String::new(),
            Some(room) => {
                tag("a", &[("class", "narrow-link"), ("href", room.hash())], &text(item.narrows)) + " "
            }
            None => said("span", "narrow-words", item.narrows) + " ",
        };
        rows += &element("li", "", &(how + &said("span", "faint", &words::assumed(item))));
    }
    rows
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_assumption_leads_to_where_it_is_typed() {
        assert_eq!(room_for("Type height and weight."), Some(Room::Person));
        assert_eq!(room_for("Give the sex."), Some(Room::Person));
        assert_eq!(room_for("Type the volume of exchanger and mount."), Some(Room::Settings));
        assert_eq!(room_for("Type PaO₂ with the next gas."), Some(Room::Gas));
        assert_eq!(room_for("Give temperature and sedation."), None);
        assert_eq!(room_for(""), None);
    }
}
