//! The case as a time line: one total order, corrections resolved, two copies joined.

use crate::{Entry, EntryId, EntryKind, Gas, Moment, Person, Settings};

/// One patient, under a label of the user's choice. Never an identifier.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Case {
    /// The user's label, "Bed 3".
    pub label: String,
    /// Who it is, as far as known.
    pub person: Person,
    entries: Vec<Entry>,
}

/// What can't be put into a case.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum CaseError {
    /// Another entry has the same id and says something else.
    #[error("entry {id}: two entries share this id and differ. Keep both files and tell who wrote them.", id = .0.0)]
    SameIdDiffers(EntryId),
}

impl Case {
    /// An empty case.
    #[must_use]
    pub fn new(label: impl Into<String>) -> Self {
        Self { label: label.into(), ..Self::default() }
    }

    /// Adds an entry in its place. The very same entry again changes nothing.
    ///
    /// # Errors
    /// [`CaseError::SameIdDiffers`] when the id is taken by an entry that says something else.
    pub fn add(&mut self, entry: Entry) -> Result<(), CaseError> {
        if let Some(present) = self.entries.iter().find(|e| e.id == entry.id) {
            return if *present == entry { Ok(()) } else { Err(CaseError::SameIdDiffers(entry.id)) };
        }
        put(&mut self.entries, entry);
        Ok(())
    }

    /// Every entry as written, by (at, written_at, id).
    #[must_use]
    pub fn entries(&self) -> &[Entry] {
        &self.entries
    }

    /// The entries as they stand after corrections: each corrected entry says its latest values, and
    /// the corrections themselves are gone. In order.
    #[must_use]
    pub fn resolved(&self) -> Vec<Entry> {
        let mut resolved: Vec<Entry> = Vec::with_capacity(self.entries.len());
        let mut corrections: Vec<(&Entry, &crate::Correction)> = Vec::new();
        for entry in &self.entries {
            if let EntryKind::Correction(correction) = &entry.kind {
                let written = |e: &Entry| (e.written_at.unwrap_or(e.at), e.id.clone());
                let place = corrections.partition_point(|(earlier, _)| written(earlier) < written(entry));
                corrections.insert(place, (entry, correction));
            } else {
                resolved.push(entry.clone());
            }
        }
        for (_, correction) in corrections {
            if let Some(place) = resolved.iter().position(|e| e.id == correction.of) {
                let mut target = resolved.remove(place);
                target.kind = (*correction.kind).clone();
                target.at = correction.at.unwrap_or(target.at);
                put(&mut resolved, target);
            }
        }
        resolved
    }

    /// The settings in force at `moment`, that moment's own entries included.
    #[must_use]
    pub fn settings_at(&self, moment: Moment) -> Settings {
        self.settings_steps()
            .into_iter()
            .take_while(|(at, _)| *at <= moment)
            .last()
            .map_or_else(Settings::default, |(_, settings)| settings)
    }

    /// Each moment at which settings were written, with the whole state from then on.
    #[must_use]
    pub fn settings_steps(&self) -> Vec<(Moment, Settings)> {
        let mut state = Settings::default();
        let mut steps: Vec<(Moment, Settings)> = Vec::new();
        for entry in self.resolved() {
            if let EntryKind::Settings(change) = &entry.kind {
                state = state.after(change);
                steps.push((entry.at, state));
            }
        }
        steps
    }

    /// The gases in order, with their entry's id and moment, corrections resolved.
    #[must_use]
    pub fn gases(&self) -> Vec<(EntryId, Moment, Gas)> {
        self.resolved()
            .into_iter()
            .filter_map(|e| if let EntryKind::Gas(gas) = e.kind { Some((e.id, e.at, gas)) } else { None })
            .collect()
    }

    /// The moment of the last entry, corrections included.
    #[must_use]
    pub fn last_at(&self) -> Option<Moment> {
        self.entries.last().map(|e| e.at)
    }

    /// Joins another copy of the same case: a union by id, so that the order of joining does not matter.
    ///
    /// # Errors
    /// [`CaseError::SameIdDiffers`] as [`Case::add`]; entries before it have been added.
    pub fn join(&mut self, other: &Case) -> Result<(), CaseError> {
        other.entries.iter().try_for_each(|entry| self.add(entry.clone()))
    }
}

/// Puts an entry in its place among entries in order.
fn put(entries: &mut Vec<Entry>, entry: Entry) {
    let place = entries.partition_point(|e| order(e) < order(&entry));
    entries.insert(place, entry);
}

/// The total order of entries, the same on every phone.
fn order(entry: &Entry) -> (Moment, Option<Moment>, &EntryId) {
    (entry.at, entry.written_at, &entry.id)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::{Correction, Site};

    fn entry(id: &str, at: i64, kind: EntryKind) -> Entry {
        Entry {
            id: EntryId(id.into()),
            at: Moment(at),
            written_at: None,
            utc_offset_min: None,
            kind,
            not_understood: vec![],
        }
    }

    fn gas(ph: f64) -> EntryKind {
        EntryKind::Gas(Gas {
            site: Site::Arterial,
            ph,
            pco2_mmhg: 71.0,
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
    fn order_is_the_same_whatever_the_order_of_writing() {
        let all = [
            entry("b", 5, EntryKind::Unchanged),
            entry("a", 5, EntryKind::Unchanged),
            entry("c", 1, EntryKind::Seizure),
        ];
        let mut forward = Case::new("Bed 3");
        let mut backward = Case::new("Bed 3");
        all.iter().for_each(|e| forward.add(e.clone()).unwrap());
        all.iter().rev().for_each(|e| backward.add(e.clone()).unwrap());
        assert_eq!(forward, backward);
        let ids: Vec<&str> = forward.entries().iter().map(|e| e.id.0.as_str()).collect();
        assert_eq!(ids, ["c", "a", "b"]);
    }

    #[test]
    fn a_correction_replaces_what_is_read_and_erases_nothing() {
        let mut case = Case::new("Bed 3");
        case.add(entry("g", 1, gas(7.12))).unwrap();
        let fix = Correction { of: EntryId("g".into()), at: None, kind: Box::new(gas(7.21)) };
        case.add(entry("k", 2, EntryKind::Correction(fix))).unwrap();
        assert_eq!(case.gases()[0].2.ph, 7.21);
        assert_eq!(case.entries().len(), 2);
    }

    #[test]
    fn the_same_id_with_other_words_is_refused() {
        let mut case = Case::new("Bed 3");
        case.add(entry("g", 1, gas(7.12))).unwrap();
        assert_eq!(case.add(entry("g", 1, gas(7.12))), Ok(()));
        let error = case.add(entry("g", 1, gas(7.21))).unwrap_err();
        assert!(error.to_string().starts_with("entry g: two entries share this id"));
    }

    #[test]
    fn settings_add_up() {
        let mut case = Case::new("Bed 3");
        let first =
            Settings { rate_per_min: Some(18.0), tidal_volume_ml: Some(340.0), ..Settings::default() };
        let second = Settings { rate_per_min: Some(24.0), ..Settings::default() };
        case.add(entry("s", 1, EntryKind::Settings(first))).unwrap();
        case.add(entry("t", 9, EntryKind::Settings(second))).unwrap();
        assert_eq!(case.settings_at(Moment(0)), Settings::default());
        assert_eq!(case.settings_at(Moment(8)).rate_per_min, Some(18.0));
        let now = case.settings_at(Moment(9));
        assert_eq!((now.rate_per_min, now.tidal_volume_ml), (Some(24.0), Some(340.0)));
    }
}
