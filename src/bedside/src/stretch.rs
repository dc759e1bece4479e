//! The last stretch of the record that can be computed without a gap: since when the breath is known, and what
//! it was. A volume read off a little after a change holds from the change on; what nobody read starts it anew.

use case::{Control, Entry, EntryKind, Moment, Settings};

use crate::standing::{Way, breath, way};

/// What came before a stretch.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Before {
    /// Nothing that is in the record.
    Nothing,
    /// A hand squeezed.
    ByHand,
    /// A mask, own breathing, or a breath that nobody read.
    Unknown,
}

/// A stretch with the settings from each moment on; never empty.
#[derive(Debug, Clone, PartialEq)]
pub(crate) struct Stretch {
    pub from: Moment,
    pub settings: Vec<(Moment, Settings)>,
    pub before: Before,
}

/// A change after which the breath was not read yet.
struct Unread {
    at: Moment,
    settings: Settings,
    /// Something in between is lost for good.
    gap: bool,
}

/// The last stretch, if there is one.
pub(crate) fn last(entries: &[Entry]) -> Option<Stretch> {
    let mut finder =
        Finder { state: Settings::default(), stretch: None, unread: None, before: Before::Nothing };
    for entry in entries {
        match &entry.kind {
            EntryKind::Settings(change) => finder.settings(entry.at, change),
            EntryKind::BreathingStopped(_) | EntryKind::BreathingRestored => {
                if let Some(unread) = &mut finder.unread {
                    (unread.at, unread.gap) = (entry.at, true);
                }
            }
            _ => {}
        }
    }
    finder.stretch
}

struct Finder {
    state: Settings,
    stretch: Option<Stretch>,
    unread: Option<Unread>,
    before: Before,
}

impl Finder {
    fn settings(&mut self, at: Moment, change: &Settings) {
        let driven_anew = self.state.breath_differs(change);
        self.state = self.state.after(change);
        if breath(&self.state).is_some() {
            self.known(at);
        } else if measurable(&self.state) {
            match &mut self.unread {
                Some(unread) if driven_anew => *unread = Unread { at, settings: self.state, gap: true },
                Some(_) => {}
                None => self.unread = Some(Unread { at, settings: self.state, gap: false }),
            }
        } else {
            self.stretch = None;
            self.unread = None;
            self.before =
                if self.state.control == Some(Control::ByHand) { Before::ByHand } else { Before::Unknown };
        }
    }

    /// The breath is known at `at`, perhaps by a reading that holds back to a change.
    fn known(&mut self, at: Moment) {
        let state = self.state;
        match self.unread.take() {
            Some(unread) if unread.answered_by(&state) && !unread.gap => self.push(unread.at, state),
            Some(unread) if unread.answered_by(&state) => self.restart(unread.at, state),
            Some(_) => self.restart(at, state),
            None => self.push(at, state),
        }
    }

    fn push(&mut self, at: Moment, state: Settings) {
        match &mut self.stretch {
            Some(stretch) => stretch.settings.push((at, state)),
            None => {
                self.stretch = Some(Stretch { from: at, settings: vec![(at, state)], before: self.before })
            }
        }
    }

    fn restart(&mut self, at: Moment, state: Settings) {
        self.stretch = Some(Stretch { from: at, settings: vec![(at, state)], before: Before::Unknown });
    }
}

impl Unread {
    /// Whether `state` is this one with its breath read: measured, and made in the same way.
    fn answered_by(&self, state: &Settings) -> bool {
        let measured = state.rate_total_per_min.is_some() || breath(state).is_some_and(|b| b.measured);
        measured && state.control == self.settings.control && state.effort == self.settings.effort
    }
}

/// Whether the breath under these settings can be read off, though it was not yet.
fn measurable(settings: &Settings) -> bool {
    !matches!(way(settings), Way::ByHand | Way::NoCurve | Way::NotSaid)
}
