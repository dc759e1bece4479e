//! What an answer takes for granted, and what at the bedside would narrow it.

use sources::{self as s, Figure};

use crate::Assumed;
use crate::study::{Learnt, Study};

/// Everything assumed for this case, the most narrowing first.
pub(crate) fn of(study: &Study, learnt: &Learnt) -> Vec<Assumed> {
    let mut all = about_the_start(learnt);
    all.extend(about_the_person(study));
    all.extend(about_the_body(study, learnt));
    all.extend(about_the_blood(learnt));
    all.push(per_cent(
        "VCO₂/(1 − VD/VT) moves with a change of settings by",
        s::JUMP,
        "After a change, type the next gas.",
    ));
    all
}

/// One assumption: a middle, one standard deviation in the same unit, and what narrows it.
fn row(
    name: &'static str,
    figure: Figure,
    middle: (f64, f64),
    unit: &'static str,
    narrows: &'static str,
) -> Assumed {
    Assumed { name, value: middle.0, spread: middle.1, unit, source: figure.id, narrows }
}

/// A figure whose spread is of ln, around `value`.
fn relative(
    name: &'static str,
    figure: Figure,
    value: f64,
    unit: &'static str,
    narrows: &'static str,
) -> Assumed {
    row(name, figure, (value, value * figure.spread), unit, narrows)
}

/// A figure that is a spread of ln and nothing else.
fn per_cent(name: &'static str, figure: Figure, narrows: &'static str) -> Assumed {
    row(name, figure, (0.0, 100.0 * figure.spread), "%", narrows)
}

fn about_the_start(learnt: &Learnt) -> Vec<Assumed> {
    let held = "Say how long the settings had been held.";
    match learnt.first_gas.settings_held_min {
        None => vec![per_cent("Start not known to be settled", s::START_OFFSET, held)],
        Some(_) => vec![],
    }
}

fn about_the_person(study: &Study) -> Vec<Assumed> {
    let patient = &study.history.patient;
    let mut all = Vec::new();
    match (patient.height_cm, patient.weight_kg) {
        (None, None) => {
            all.push(relative(
                "Size",
                s::SIZE_UNKNOWN,
                s::SIZE_UNKNOWN.value,
                "kg",
                "Type height and weight.",
            ));
        }
        (None, Some(_)) if !patient.is_child() => {
            all.push(relative(
                "Height",
                s::HEIGHT_UNKNOWN,
                s::HEIGHT_UNKNOWN.value,
                "cm",
                "Type the height.",
            ));
        }
        (Some(_), None) => {
            let name = "Weight over the predicted one";
            all.push(relative(name, s::WEIGHT_UNKNOWN, s::WEIGHT_UNKNOWN.value, "", "Type the weight."));
        }
        _ => {}
    }
    if patient.sex.is_none() && !patient.is_child() {
        let name = "Sex: between the two formulas";
        all.push(row(
            name,
            s::SEX_UNKNOWN,
            (s::SEX_UNKNOWN.value, s::SEX_UNKNOWN.spread),
            "",
            "Give the sex.",
        ));
    }
    if patient.age_years.is_none() {
        all.push(relative("Age", s::AGE_UNKNOWN, s::AGE_UNKNOWN.value, "years", "Give the age."));
    }
    all
}

fn about_the_body(study: &Study, learnt: &Learnt) -> Vec<Assumed> {
    let child = study.history.patient.is_child();
    let measured = study.history.measured();
    let means = learnt.priors.means();
    let mut all = Vec::new();
    if measured.vco2_ml_min.is_none() {
        let figure = if child { s::VCO2_CHILD } else { s::VCO2_ADULT };
        let narrows = "Give temperature and sedation.";
        all.push(relative("CO₂ production", figure, means.production_ml_min, "mL/min", narrows));
    }
    if measured.dead_space_fraction.is_none() {
        if means.apparatus_assumed {
            let middle = (s::APPARATUS.value, s::APPARATUS.spread);
            let narrows = "Type the volume of exchanger and mount.";
            all.push(row("Apparatus dead space", s::APPARATUS, middle, "mL", narrows));
        }
        let series = if means.circuit_in_series { s::SERIES_TUBE_CHILD } else { s::SERIES_TUBE };
        all.push(relative("Series dead space", series, means.series_ml, "mL", ""));
        let middle = (means.alveolar_dead_share, s::ALVEOLAR_SHARE.spread);
        all.push(row("Alveolar dead space, share", s::ALVEOLAR_SHARE, middle, "", ""));
    }
    if measured.cardiac_output_l_min.is_none() {
        all.push(relative("Cardiac output", s::CARDIAC_OUTPUT, means.cardiac_output_l_min, "L/min", ""));
    }
    let stores = "CO₂ stores: how much a litre of tissue takes up";
    all.push(relative(stores, s::TISSUE_SLOPE, s::TISSUE_SLOPE.value, "mL/L/mmHg", ""));
    all
}

fn about_the_blood(learnt: &Learnt) -> Vec<Assumed> {
    let mut all = Vec::new();
    if !learnt.hb_known {
        let middle = (s::HB_UNKNOWN.value, s::HB_UNKNOWN.spread);
        all.push(row(
            "Haemoglobin",
            s::HB_UNKNOWN,
            middle,
            "g/dL",
            "Type the haemoglobin with the next gas.",
        ));
    }
    if !learnt.saturation_known {
        let middle = (s::SAO2_UNKNOWN.value, s::SAO2_UNKNOWN.spread);
        all.push(row("Arterial saturation", s::SAO2_UNKNOWN, middle, "", "Type PaO₂ with the next gas."));
    }
    all
}
