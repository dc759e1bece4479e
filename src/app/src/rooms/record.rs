//! Everything written, latest first; export and import.

use case::{Case, Now};
use leptos::prelude::*;
use logbook::SetAside;

use crate::parts::buttons::{main_button, perhaps};
use crate::parts::case_file::{export, import};
use crate::parts::html::{element, said, tag, text};
use crate::state::app::App;
use crate::words::record as words;
use crate::words::values::day_and_clock;

/// The room.
pub fn record(app: App) -> AnyView {
    let html = move || entries(&app.case(), &app.now.get()) + &set_aside(&app.set_aside());
    let save = untrack(|| app.open.with(Option::is_some))
        .then(|| main_button(app, |_| words::EXPORT.to_owned(), |_| None, export));
    view! {
        <div class="scroll record">
            <div inner_html=move || html()></div>
            <div class="ways">{import(app)}</div>
        </div>
        <div class="dock">{perhaps(save)}</div>
    }
    .into_any()
}

fn entries(case: &Case, now: &Now) -> String {
    if case.entries().is_empty() {
        return said("p", "note", words::EMPTY);
    }
    let mut rows = String::new();
    for entry in case.entries().iter().rev() {
        let mut inner = text(&words::entry(entry, case, now));
        if !entry.not_understood.is_empty() {
            inner += &said("span", "entry-unknown", &words::not_understood(&entry.not_understood));
        }
        let time = said("span", "entry-time", &day_and_clock(entry.at, now));
        rows += &element("li", "entry", &(time + &element("span", "entry-words", &inner)));
    }
    element("ol", "entries", &rows)
}

/// Texts that could not be read: moved aside, shown as found, never written over.
fn set_aside(aside: &[SetAside]) -> String {
    if aside.is_empty() {
        return String::new();
    }
    let mut rows = String::new();
    for one in aside {
        let found = tag("pre", &[("class", "aside-text"), ("tabindex", "0")], &text(&one.text));
        rows += &element("li", "", &(said("p", "caution", &one.why) + &said("p", "hint", &one.key) + &found));
    }
    said("h2", "", words::SET_ASIDE) + &element("ul", "plain-list", &rows)
}

#[cfg(test)]
mod tests {
    use super::*;
    use case::{Entry, EntryId, EntryKind, Moment};

    #[test]
    fn what_was_imported_is_shown_and_never_run() {
        let mut case = Case::new("x");
        let entry = Entry {
            id: EntryId("a".into()),
            at: Moment(0),
            written_at: None,
            utc_offset_min: None,
            kind: EntryKind::Note("<script>1</script>".into()),
            not_understood: vec!["<b>".into()],
        };
        case.add(entry).unwrap();
        let html = entries(&case, &Now::at(Moment(0)));
        assert!(html.contains("&lt;script&gt;") && html.contains("&lt;b&gt;") && !html.contains("<script"));
    }
}
