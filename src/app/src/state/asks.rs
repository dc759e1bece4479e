//! What is asked about an entry before it is written: the study's questions, and those about how it was typed.

use bedside::{Question, QuestionKind, ask_about_entry};
use case::{Case, EntryKind, Gas, Now, Settings};
use units::{Kpa, Mmhg};

use super::choice::{CLOCK, Choice};
use super::field::Field;
use super::sheet::Sheet;
use crate::words::form as words;

/// A clock time farther back than this is asked about, minutes: it may be meant for later today.
const FAR_BACK_MIN: f64 = 12.0 * 60.0;
/// The question about the unit of PO2.
const PO2_UNIT: &str = "po2_unit";
/// The question about when a gas was drawn.
const DRAWN: &str = "drawn";
/// The question about when settings were changed.
const CHANGED: &str = "changed";

/// What is to be asked about a gas as typed.
pub fn about_gas(sheet: &Sheet, case: &Case, gas: &Gas, now: &Now) -> Vec<Question> {
    let mut questions = ask_about_entry(case, &EntryKind::Gas(*gas));
    // Typed in kPa there is no doubt which of the two it is.
    questions.retain(|q| !(sheet.in_kpa(Field::Pco2) && matches!(q.kind, QuestionKind::MmhgOrKpa { .. })));
    questions.extend(po2_unit(sheet));
    questions.extend(far_back(sheet, Choice::Drawn, DRAWN, now));
    questions
}

/// What is to be asked about settings as typed.
pub fn about_settings(sheet: &Sheet, case: &Case, settings: &Settings, now: &Now) -> Vec<Question> {
    let mut questions = ask_about_entry(case, &EntryKind::Settings(*settings));
    questions.extend(far_back(sheet, Choice::Changed, CHANGED, now));
    questions
}

/// Two units on one printout are unlikely.
fn po2_unit(sheet: &Sheet) -> Option<Question> {
    let typed = units::read_number(sheet.text(Field::Po2)).ok()?;
    let as_kpa_mmhg = Mmhg::from(Kpa(typed)).0;
    (sheet.in_kpa(Field::Pco2) != sheet.in_kpa(Field::Po2)).then(|| Question {
        id: PO2_UNIT,
        kind: QuestionKind::MmhgOrKpa { typed, as_kpa_mmhg },
        words: words::po2_unit(typed, as_kpa_mmhg),
    })
}

/// A time that the phone's clock has not reached yet counts as yesterday's.
fn far_back(sheet: &Sheet, choice: Choice, id: &'static str, now: &Now) -> Option<Question> {
    let at = sheet.moment(choice).filter(|_| sheet.pick(choice) == Some(CLOCK))?;
    (now.wall.minutes_since(at) > FAR_BACK_MIN).then(|| Question {
        id,
        kind: QuestionKind::Unusual,
        words: words::far_back(choice.spec().label, at, now),
    })
}

/// The field whose unit a question is about.
pub fn unit_of(question: &Question) -> Field {
    if question.id == PO2_UNIT { Field::Po2 } else { Field::Pco2 }
}

/// The field that mends a gas.
pub fn mends_gas(question: &Question) -> Field {
    if question.id == DRAWN { Field::DrawnClock } else { Field::Ph }
}

/// The field that mends settings.
pub fn mends_settings(question: &Question) -> Field {
    match question.id {
        CHANGED => Field::ChangedClock,
        "rate" => Field::Rate,
        _ => Field::TidalVolume,
    }
}

/// The field that mends a change.
pub fn mends_change(question: &Question) -> Field {
    if question.id == "rate" { Field::NewRate } else { Field::NewVolume }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::state::writing;
    use case::Moment;
    use units::AgeGroup;

    /// 2026-03-02T21:20Z.
    fn now() -> Now {
        Now::at(Moment(1_772_486_400_000))
    }

    fn typed(pco2: &str, po2: &str) -> Sheet {
        let mut sheet = Sheet::default();
        sheet.choose(Choice::Site, Some(0), &now());
        sheet.choose(Choice::Drawn, Some(0), &now());
        for (field, text) in [(Field::Ph, "7.21"), (Field::Pco2, pco2), (Field::Po2, po2)] {
            sheet.set_text(field, text);
        }
        sheet
    }

    fn asked(sheet: &Sheet) -> Vec<&'static str> {
        let gas = writing::gas(sheet, AgeGroup::Adult, None).unwrap();
        about_gas(sheet, &Case::new("Bed 3"), &gas, &now()).into_iter().map(|q| q.id).collect()
    }

    #[test]
    fn a_po2_already_typed_does_not_change_its_unit_unasked() {
        let mut sheet = typed("9.5", "68");
        assert_eq!(asked(&sheet), ["mmhg_or_kpa"]);
        sheet.set_unit(Field::Pco2, true);
        assert_eq!(asked(&sheet), [PO2_UNIT]);
        let gas = writing::gas(&sheet, AgeGroup::Adult, None).unwrap();
        assert_eq!(gas.po2_mmhg, Some(68.0));
        sheet.set_unit(Field::Po2, true);
        assert!(asked(&sheet).is_empty());
    }

    #[test]
    fn a_clock_time_ahead_of_the_phone_is_asked_about() {
        let mut sheet = typed("71", "");
        sheet.choose(Choice::Drawn, Some(CLOCK), &now());
        sheet.type_text(Field::DrawnClock, "21:22", &now());
        assert_eq!(asked(&sheet), [DRAWN]);
        sheet.type_text(Field::DrawnClock, "21:18", &now());
        assert!(asked(&sheet).is_empty());
    }
}
