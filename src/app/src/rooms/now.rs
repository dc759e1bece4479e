//! Where PaCO2 and pH are at this minute, where they are heading, when they have settled, and what would help.

mod answer;
mod asked;
mod narrow;
mod offers;

use bedside::{Freshness, Status};
use case::{Case, EntryId, EntryKind, Gas, GasChoice, Moment};
use leptos::prelude::*;

use crate::device::page;
use crate::parts::buttons::{link, main_button, perhaps};
use crate::parts::chart::{Picture, drawing, reading};
use crate::state::app::App;
use crate::state::present::Present;
use crate::state::room::Room;
use crate::words::now as words;

/// Height of the chart, in its own units.
const CHART_HEIGHT: f64 = 300.0;

/// The room.
pub fn now(app: App) -> AnyView {
    let at = RwSignal::new(0);
    let moving = Memo::new(move |_| app.present.with(|p| p.as_ref().is_some_and(Present::moves)));
    let middle = move || {
        let mut both = vec![
            view! { <div class="chart-side">{drawing(app, picture, at)} {reading(app, picture, at)}</div> }
                .into_any(),
            offers::offers(app),
        ];
        if !moving.get() {
            both.reverse();
        }
        both.into_any()
    };
    let other = Memo::new(move |_| Next::of(app) != Next::TypeGas);
    let gas = move || perhaps(other.get().then(|| link(words::NEXT_GAS.to_owned(), Room::Gas.hash())));
    view! {
        <div class="scroll now">
            {answer::answer(app)}
            {asked::doubt(app)}
            {asked::held(app)}
            {move || middle()}
            {narrow::narrow(app)}
        </div>
        <div class="dock">
            <div class="dock-buttons">
                {move || gas()}
                {main_button(app, |app| Next::of(app).label(app), |app| Next::of(app).more(app), |app| {
                    untrack(|| Next::of(app)).press(app);
                })}
            </div>
        </div>
    }
    .into_any()
}

fn picture(app: App) -> Option<Picture> {
    let case = app.case();
    app.present.with(|present| {
        let present = present.as_ref()?;
        Picture::new(present.shown()?, None, &case, &present.now, CHART_HEIGHT, present.is_stale())
    })
}

/// The next action, named by the state of the case.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Next {
    TypeGas,
    TypeSettings,
    StillSo,
    Try,
}

impl Next {
    fn of(app: App) -> Next {
        let (gases, airway) = (app.case().gases().len(), app.in_force().airway);
        app.present.with(|present| match present {
            Some(_) if gases > 0 && airway.is_none() => Next::TypeSettings,
            Some(present) if gases > 0 => match present.freshness {
                Freshness::NoEntries | Freshness::Expired { .. } => Next::TypeGas,
                Freshness::StillSo { .. } => Next::StillSo,
                Freshness::Fresh if present.answer.standing.status == Status::Withheld => Next::TypeGas,
                Freshness::Fresh => Next::Try,
            },
            _ => Next::TypeGas,
        })
    }

    fn label(self, app: App) -> String {
        match self {
            Next::TypeGas => words::TYPE_A_GAS.to_owned(),
            Next::TypeSettings => words::TYPE_SETTINGS.to_owned(),
            Next::StillSo => words::still_so_button(&app.label().unwrap_or_default()),
            Next::Try => words::TRY_A_RATE.to_owned(),
        }
    }

    fn more(self, app: App) -> Option<String> {
        if self == Next::StillSo { app.still() } else { None }
    }

    fn press(self, app: App) {
        match self {
            Next::TypeGas => page::go(Room::Gas.hash()),
            Next::TypeSettings => page::go(Room::Settings.hash()),
            Next::StillSo => write_unchanged(app),
            Next::Try => page::go(Room::Change.hash()),
        }
    }
}

/// Somebody looked and nothing has changed.
fn write_unchanged(app: App) {
    let now = app.tick();
    app.write(vec![(now.wall, EntryKind::Unchanged)]);
}

/// The last gas of the case that nobody has called a bad sample.
fn last_gas(app: App) -> Option<(Gas, Moment)> {
    last_believed(&app.case())
}

fn last_believed(case: &Case) -> Option<(Gas, Moment)> {
    let entries = case.resolved();
    let left_out = |id: &EntryId| {
        let verdict = entries.iter().rev().find_map(|entry| match &entry.kind {
            EntryKind::GasVerdict(verdict) if verdict.of == *id => Some(verdict.choice),
            _ => None,
        });
        verdict == Some(GasChoice::Sample)
    };
    case.gases().into_iter().rev().find(|(id, ..)| !left_out(id)).map(|(_, at, gas)| (gas, at))
}

#[cfg(test)]
mod tests {
    use super::*;
    use case::{Entry, GasVerdict, Site};

    fn entry(id: &str, minute: i64, kind: EntryKind) -> Entry {
        Entry {
            id: EntryId(id.into()),
            at: Moment(minute * 60_000),
            written_at: None,
            utc_offset_min: None,
            kind,
            not_understood: vec![],
        }
    }

    fn gas(pco2_mmhg: f64) -> EntryKind {
        EntryKind::Gas(Gas {
            site: Site::Arterial,
            ph: 7.3,
            pco2_mmhg,
            po2_mmhg: None,
            hco3_printed_mmol_l: None,
            hb_g_dl: None,
            temperature_c: None,
            reported_at_c: None,
            analysed_at: None,
            settings_held_min: None,
        })
    }

    #[test]
    fn a_rejected_sample_is_not_the_last_measured() {
        let mut case = Case::new("x");
        case.add(entry("a", 0, gas(71.0))).unwrap();
        case.add(entry("b", 20, gas(40.0))).unwrap();
        let last = |case: &Case| last_believed(case).map(|(gas, _)| gas.pco2_mmhg);
        assert_eq!(last(&case), Some(40.0));
        let say = |choice| EntryKind::GasVerdict(GasVerdict { of: EntryId("b".into()), choice });
        case.add(entry("c", 21, say(GasChoice::Sample))).unwrap();
        assert_eq!(last(&case), Some(71.0));
        case.add(entry("d", 22, say(GasChoice::Patient))).unwrap();
        assert_eq!(last(&case), Some(40.0), "the latest word about it counts");
    }
}
