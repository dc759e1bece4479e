//! Slips of the hand: asked, never corrected.

use case::{Case, Effort, EntryKind, Gas, Settings, Site};
use physiology::hco3_mmol_l;
use sources as s;
use units::{Kpa, Mmhg};

/// What is asked.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum QuestionKind {
    /// mmHg or kPa: the value fits both. The other reading, in mmHg, is offered as a button.
    MmhgOrKpa {
        /// The number as typed.
        typed: f64,
        /// The same number read as kPa, in mmHg.
        as_kpa_mmhg: f64,
    },
    /// Printed HCO3 and the one from pH and PaCO2 differ.
    Hco3Contradicts {
        /// From pH and PaCO2, mmol/L.
        computed_mmol_l: f64,
        /// As typed, mmol/L.
        typed_mmol_l: f64,
    },
    /// Unusual but possible.
    Unusual,
}

/// A question before an entry is written. The answer "yes, so" writes it as typed.
#[derive(Debug, Clone, PartialEq)]
pub struct Question {
    /// Stable name.
    pub id: &'static str,
    /// What about.
    pub kind: QuestionKind,
    /// The sentence.
    pub words: String,
}

/// What should be asked before `kind` is written into `case`; nothing when it looks right.
#[must_use]
pub fn ask_about_entry(case: &Case, kind: &EntryKind) -> Vec<Question> {
    match kind {
        EntryKind::Gas(gas) => about_gas(case, gas),
        EntryKind::Settings(change) => about_settings(case, change),
        EntryKind::Sedation(sedation) if sedation.relaxant == Some(true) => about_relaxant(case),
        EntryKind::EndTidal(reading) => about_end_tidal(case, reading.etco2_mmhg),
        _ => vec![],
    }
}

fn about_gas(case: &Case, gas: &Gas) -> Vec<Question> {
    let mut questions = Vec::new();
    let unit_confirmed =
        case.gases().iter().any(|(_, _, earlier)| earlier.pco2_mmhg > s::KPA_LIKELY_MOST.value);
    if gas.pco2_mmhg <= s::KPA_LIKELY_MOST.value && !unit_confirmed {
        let as_kpa_mmhg = Mmhg::from(Kpa(gas.pco2_mmhg)).0;
        questions.push(Question {
            id: "mmhg_or_kpa",
            kind: QuestionKind::MmhgOrKpa { typed: gas.pco2_mmhg, as_kpa_mmhg },
            words: format!("{}: did you read mmHg, or kPa ({as_kpa_mmhg:.0} mmHg)?", gas.pco2_mmhg),
        });
        // Until the unit is known the check digit would only repeat the doubt.
        return questions;
    }
    questions.extend(gas.hco3_printed_mmol_l.and_then(|typed| hco3_contradicts(gas, typed)));
    questions
}

fn hco3_contradicts(gas: &Gas, typed_mmol_l: f64) -> Option<Question> {
    let computed_mmol_l = hco3_mmol_l(gas.ph, gas.pco2_mmhg);
    let apart = (typed_mmol_l - computed_mmol_l).abs() / computed_mmol_l;
    (apart > s::HCO3_CHECK.value).then(|| Question {
        id: "hco3_contradicts",
        kind: QuestionKind::Hco3Contradicts { computed_mmol_l, typed_mmol_l },
        words: format!(
            "pH and PaCO₂ give HCO₃ {computed_mmol_l:.1}; you typed {typed_mmol_l:.1}. Check all three."
        ),
    })
}

fn about_settings(case: &Case, change: &Settings) -> Vec<Question> {
    let mut questions = Vec::new();
    let unusual = |id, words| Question { id, kind: QuestionKind::Unusual, words };
    if let Some(rate) = change.rate_per_min.filter(|rate| *rate > s::RATE_UNUSUAL.value) {
        questions.push(unusual("rate", format!("Rate {rate:.0} a minute: is that right?")));
    }
    let patient = crate::history::patient_of(case);
    if let (Some(volume), Some(kg)) = (change.tidal_volume_ml, patient.predicted_body_weight_kg()) {
        let ml_kg = volume / kg;
        if !(s::VT_LOW_ML_KG.value..=s::VT_HIGH_ML_KG.value).contains(&ml_kg) {
            questions
                .push(unusual("ml_per_kg", format!("{volume:.0} mL is {ml_kg:.1} mL/kg: is that right?")));
        }
    }
    questions
}

/// A relaxant takes the patient's own breaths.
fn about_relaxant(case: &Case) -> Vec<Question> {
    let steps = case.settings_steps();
    let Some((_, settings)) = steps.last() else { return vec![] };
    let own = settings.rate_total_per_min.zip(settings.rate_per_min).map(|(total, set)| total - set);
    let words = match own {
        Some(own) if own > 0.0 => {
            format!("He takes {own:.0} breaths of his own. Relaxed, they stop. Raise the rate first.")
        }
        _ if settings.effort == Some(Effort::Present) => {
            "He breathes himself. Relaxed, those breaths stop. Raise the rate first.".to_owned()
        }
        _ => return vec![],
    };
    vec![Question { id: "relaxant", kind: QuestionKind::Unusual, words }]
}

fn about_end_tidal(case: &Case, etco2_mmhg: f64) -> Vec<Question> {
    let last = case.gases().into_iter().rev().find(|(_, _, gas)| gas.site == Site::Arterial);
    match last {
        Some((_, _, gas)) if etco2_mmhg > gas.pco2_mmhg => vec![Question {
            id: "etco2_above_paco2",
            kind: QuestionKind::Unusual,
            words: format!(
                "EtCO₂ {etco2_mmhg:.0} is above PaCO₂ {:.0}. It happens in children, pregnancy and slow breaths. So?",
                gas.pco2_mmhg
            ),
        }],
        _ => vec![],
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn gas(ph: f64, pco2_mmhg: f64, hco3: Option<f64>) -> EntryKind {
        EntryKind::Gas(Gas {
            site: Site::Arterial,
            ph,
            pco2_mmhg,
            po2_mmhg: None,
            hco3_printed_mmol_l: hco3,
            hb_g_dl: None,
            temperature_c: None,
            reported_at_c: None,
            analysed_at: None,
            settings_held_min: None,
        })
    }

    #[test]
    fn low_figures_are_asked_with_both_readings() {
        for (typed, mmhg) in [(5.3, 39.75), (14.0, 105.0)] {
            let questions = ask_about_entry(&Case::new("Bed 3"), &gas(7.3, typed, None));
            let [Question { kind: QuestionKind::MmhgOrKpa { typed: asked, as_kpa_mmhg }, words, .. }] =
                &questions[..]
            else {
                panic!("{questions:?}")
            };
            assert_eq!(*asked, typed);
            assert!((as_kpa_mmhg - mmhg).abs() < 0.05, "{as_kpa_mmhg}");
            assert!(words.contains("mmHg, or kPa"), "{words}");
        }
        assert_eq!(ask_about_entry(&Case::new("Bed 3"), &gas(7.21, 71.0, None)), vec![]);
    }

    #[test]
    fn hco3_is_the_check_digit() {
        assert_eq!(ask_about_entry(&Case::new("Bed 3"), &gas(7.21, 71.0, Some(27.8))), vec![]);
        let questions = ask_about_entry(&Case::new("Bed 3"), &gas(7.12, 71.0, Some(27.8)));
        assert_eq!(questions[0].words, "pH and PaCO₂ give HCO₃ 22.6; you typed 27.8. Check all three.");
    }

    #[test]
    fn volumes_far_from_the_size_are_asked() {
        let mut case = Case::new("Bed 3");
        case.person.sex = Some(case::Sex::Female);
        case.person.height_cm = Some(163.0);
        let settings =
            |volume| EntryKind::Settings(Settings { tidal_volume_ml: Some(volume), ..Settings::default() });
        assert_eq!(ask_about_entry(&case, &settings(340.0)), vec![]);
        assert_eq!(ask_about_entry(&case, &settings(134.0))[0].id, "ml_per_kg");
        assert_eq!(ask_about_entry(&case, &settings(740.0))[0].id, "ml_per_kg");
    }
}
