//! What an answer takes for granted, and what at the bedside would narrow it.

use sources as s;

use crate::Assumed;
use crate::study::{Learnt, Study};

/// Everything assumed for this case, the most narrowing first.
pub(crate) fn of(study: &Study, learnt: &Learnt) -> Vec<Assumed> {
    let patient = &study.history.patient;
    let measured = study.history.measured();
    let settings = study.history.settings_at(learnt.last_gas_at);
    let means = learnt.priors.means();
    let mut all = Vec::new();
    let mut add = |missing: bool, assumed: Assumed| {
        if missing {
            all.push(assumed);
        }
    };
    let unsettled = learnt.last_gas.settings_held_min.is_none();
    add(
        unsettled,
        Assumed {
            name: "Start not known to be settled",
            value: 0.0,
            spread: 100.0 * s::START_OFFSET.spread,
            unit: "%",
            source: s::START_OFFSET.id,
            narrows: "Say how long the settings had been held at the gas.",
        },
    );
    let no_size = patient.height_cm.is_none() && patient.weight_kg.is_none();
    add(
        no_size,
        Assumed {
            name: "Size",
            value: s::SIZE_UNKNOWN.value,
            spread: s::SIZE_UNKNOWN.value * s::SIZE_UNKNOWN.spread,
            unit: "kg",
            source: s::SIZE_UNKNOWN.id,
            narrows: "Type height and weight.",
        },
    );
    add(!no_size && patient.height_cm.is_none(), row("Height", s::HEIGHT_UNKNOWN, "cm", "Type the height."));
    add(
        !no_size && patient.weight_kg.is_none(),
        Assumed {
            name: "Weight over the predicted one",
            value: s::WEIGHT_UNKNOWN.value,
            spread: s::WEIGHT_UNKNOWN.spread,
            unit: "",
            source: s::WEIGHT_UNKNOWN.id,
            narrows: "Type the weight.",
        },
    );
    add(
        patient.sex.is_none(),
        Assumed {
            name: "Sex: between the two formulas",
            value: s::SEX_UNKNOWN.value,
            spread: s::SEX_UNKNOWN.spread,
            unit: "",
            source: s::SEX_UNKNOWN.id,
            narrows: "Give the sex.",
        },
    );
    add(patient.age_years.is_none(), row("Age", s::AGE_UNKNOWN, "years", "Give the age."));
    add(
        measured.vco2_ml_min.is_none(),
        Assumed {
            name: "CO₂ production",
            value: means.production_ml_min,
            spread: means.production_ml_min * s::VCO2_ADULT.spread,
            unit: "mL/min",
            source: s::VCO2_ADULT.id,
            narrows: "Give temperature and sedation.",
        },
    );
    let typed_apparatus = settings.apparatus_dead_space_ml.is_some();
    add(
        !typed_apparatus && !patient.is_child(),
        Assumed {
            name: "Apparatus dead space",
            value: s::APPARATUS.value,
            spread: s::APPARATUS.spread,
            unit: "mL",
            source: s::APPARATUS.id,
            narrows: "Type the volume of exchanger and mount.",
        },
    );
    add(
        measured.dead_space_fraction.is_none(),
        Assumed {
            name: "Series dead space",
            value: means.series_ml,
            spread: means.series_ml * s::SERIES_TUBE.spread,
            unit: "mL",
            source: s::SERIES_TUBE.id,
            narrows: "",
        },
    );
    add(
        measured.dead_space_fraction.is_none(),
        Assumed {
            name: "Alveolar dead space, share",
            value: means.alveolar_dead_share,
            spread: s::ALVEOLAR_SHARE.spread,
            unit: "",
            source: s::ALVEOLAR_SHARE.id,
            narrows: "",
        },
    );
    add(
        measured.cardiac_output_l_min.is_none(),
        Assumed {
            name: "Cardiac output",
            value: means.cardiac_output_l_min,
            spread: means.cardiac_output_l_min * s::CARDIAC_OUTPUT.spread,
            unit: "L/min",
            source: s::CARDIAC_OUTPUT.id,
            narrows: "",
        },
    );
    add(
        true,
        Assumed {
            name: "CO₂ stores: how much a litre of tissue takes up",
            value: s::TISSUE_SLOPE.value,
            spread: s::TISSUE_SLOPE.value * s::TISSUE_SLOPE.spread,
            unit: "mL/L/mmHg",
            source: s::TISSUE_SLOPE.id,
            narrows: "",
        },
    );
    add(
        !learnt.hb_known,
        Assumed {
            name: "Haemoglobin",
            value: s::HB_UNKNOWN.value,
            spread: s::HB_UNKNOWN.spread,
            unit: "g/dL",
            source: s::HB_UNKNOWN.id,
            narrows: "Type the haemoglobin from the gas.",
        },
    );
    add(
        !learnt.saturation_known,
        Assumed {
            name: "Arterial saturation",
            value: s::SAO2_UNKNOWN.value,
            spread: s::SAO2_UNKNOWN.spread,
            unit: "",
            source: s::SAO2_UNKNOWN.id,
            narrows: "Type PaO₂ from the gas.",
        },
    );
    add(
        true,
        Assumed {
            name: "VCO₂/(1 − VD/VT) moves with a change of settings by",
            value: 0.0,
            spread: 100.0 * s::JUMP.spread,
            unit: "%",
            source: s::JUMP.id,
            narrows: "Draw a gas after the change.",
        },
    );
    all
}

fn row(name: &'static str, figure: s::Figure, unit: &'static str, narrows: &'static str) -> Assumed {
    Assumed {
        name,
        value: figure.value,
        spread: figure.value * figure.spread,
        unit,
        source: figure.id,
        narrows,
    }
}
