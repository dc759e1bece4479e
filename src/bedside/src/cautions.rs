//! What to heed, the most dangerous first. Words are short, plain, and say what to do.

use case::{Condition, Control, Effort, EntryKind, Now, Settings};
use sources as s;
use units::{Kpa, Mmhg};

use crate::offer::{Price, price};
use crate::study::{Learnt, Study};
use crate::{Caution, Settled};

fn caution(id: &'static str, words: impl Into<String>, source: Option<&s::Figure>) -> Caution {
    Caution { id, words: words.into(), source: source.map(|figure| figure.id) }
}

/// Cautions for the case as it stands.
pub(crate) fn of_case(study: &Study, now: &Now) -> Vec<Caution> {
    let mut all = Vec::new();
    let settings = study.history.settings_at(now.wall);
    trapping(study, &settings, &mut all);
    // Whether or not there may be a forecast: the last arterial gas speaks for itself.
    if let Some(gas) = study.history.arterial_gases().last().filter(|g| g.gas.ph < s::CALL_PH.value) {
        let words = format!("Last gas: pH {:.2}. Call for help now.", gas.gas.ph);
        all.push(caution("call", words, Some(&s::CALL_PH)));
    }
    if let Some(learnt) = study.learnt() {
        gas_cautions(study, learnt, &mut all);
    }
    record_cautions(study, &mut all);
    all
}

/// Trapped gas, where something says so.
fn trapping(study: &Study, settings: &Settings, all: &mut Vec<Caution>) {
    let obstructed = study.history.has(|c| *c == Condition::AirflowObstruction) == Some(true);
    let auto_peep =
        matches!((settings.total_peep_cmh2o, settings.peep_cmh2o), (Some(total), Some(set)) if total > set);
    if settings.flow_returns_to_zero == Some(false) || auto_peep {
        all.push(caution(
            "trapping",
            "Gas is being trapped. If blood pressure drops: disconnect and let him breathe out.",
            None,
        ));
    } else if obstructed {
        all.push(caution(
            "trapping_unknown",
            "Airflow obstruction: trapping not known. If pressure drops, disconnect and let him breathe out.",
            None,
        ));
    }
}

fn gas_cautions(study: &Study, learnt: &Learnt, all: &mut Vec<Caution>) {
    let gas = &learnt.last_gas;
    if learnt.surprise.abs() > s::SURPRISE.value {
        let seldom = if learnt.surprise > 0.0 { "high" } else { "low" };
        let words =
            format!("The first PaCO₂ is unusually {seldom} for these settings. Check gas, rate and volume.");
        all.push(caution("surprise", words, Some(&s::SURPRISE)));
    }
    if gas.pco2_mmhg <= s::KPA_LIKELY_MOST.value {
        let kpa = Mmhg::from(Kpa(gas.pco2_mmhg)).0;
        let words = format!("PaCO₂ {} is taken as mmHg. In kPa it would be {kpa:.0} mmHg.", gas.pco2_mmhg);
        all.push(caution("unit", words, Some(&s::KPA_LIKELY_MOST)));
    }
    if study.history.measured().without_spread {
        let words =
            "Measured values are taken as exact, so gases are not learnt from. For comparing models only.";
        all.push(caution("exact", words, None));
    }
    if retainer_unanswered(study, learnt) {
        all.push(caution(
            "retainer_question",
            "High HCO₃: may usually retain CO₂. Ask the history. Aim for a pH, not for PaCO₂ 40.",
            Some(&s::RETAINER_SBE),
        ));
    }
    if learnt.standard_be <= s::METABOLIC_SBE.value {
        all.push(caution(
            "metabolic",
            "Metabolic acidosis: less ventilation than his own drops pH at once. pH assumes no new acid.",
            Some(&s::METABOLIC_SBE),
        ));
    }
    if !learnt.curve_is_sure() {
        all.push(caution(
            "chemistry_edge",
            "pH outside 6.7 to 7.7: the blood's CO₂ curve is less sure here.",
            Some(&s::DOUGLAS_PH_LEAST),
        ));
    }
    if matches!(gas.reported_at_c, Some(t) if (t - s::NORMAL_TEMPERATURE.value).abs() > 0.05) {
        all.push(caution(
            "reported_at",
            "The gas was not reported at 37 °C; the forecast takes it as if it were.",
            None,
        ));
    }
}

/// High base excess with a high PaCO2, and nobody has said whether he is a chronic retainer.
pub(crate) fn retainer_unanswered(study: &Study, learnt: &Learnt) -> bool {
    study.history.has(is_retainer).is_none()
        && learnt.standard_be >= s::RETAINER_SBE.value
        && learnt.last_gas.pco2_mmhg > s::RETAINER_PACO2.value
}

/// Whether a condition is chronic retention.
pub(crate) fn is_retainer(condition: &Condition) -> bool {
    matches!(condition, Condition::ChronicRetainer { .. })
}

/// What the record holds that is not used.
fn record_cautions(study: &Study, all: &mut Vec<Caution>) {
    let count =
        |wanted: fn(&EntryKind) -> bool| study.history.entries.iter().filter(|e| wanted(&e.kind)).count();
    if count(|k| matches!(k, EntryKind::EndTidal(_))) > 0 {
        all.push(caution("end_tidal_kept", "EtCO₂ is kept in the record and not learnt from yet.", None));
    }
    let other_sites = count(|k| matches!(k, EntryKind::Gas(gas) if gas.site != case::Site::Arterial));
    if other_sites > 0 {
        all.push(caution(
            "not_arterial_kept",
            "Gases that are not arterial are kept and not learnt from.",
            None,
        ));
    }
    let unknown = |k: &EntryKind| {
        matches!(k, EntryKind::NotUnderstood(_) | EntryKind::Condition { name: Condition::Other(_), .. })
    };
    let not_understood =
        count(unknown) + study.history.entries.iter().filter(|e| !e.not_understood.is_empty()).count();
    if not_understood > 0 {
        all.push(caution(
            "not_understood",
            format!("{not_understood} in the record could not be understood and is not used. See Record."),
            None,
        ));
    }
}

/// Cautions that a change brings: what can kill, then broken limits, then what to look at.
pub(crate) fn of_change(study: &Study, current: &Settings, change: &Settings) -> Vec<Caution> {
    let planned = current.after(change);
    let mut all = dangers(study, current, &planned);
    let price = price(&study.history.patient, current, change);
    all.extend(price.iter().flat_map(broken_limits));
    let faster = matches!((current.rate_per_min, planned.rate_per_min), (Some(old), Some(new)) if new > old);
    if current.control == Some(Control::Volume) && faster {
        all.push(caution("check_trapping", "After a faster rate look: does flow come back to zero?", None));
    }
    all
}

/// What this change could do to this patient.
fn dangers(study: &Study, current: &Settings, planned: &Settings) -> Vec<Caution> {
    let mut all = Vec::new();
    if study.history.has(|c| *c == Condition::AirflowObstruction) == Some(true)
        && traps_more(current, planned)
    {
        let words =
            "Airflow obstruction: a faster, larger or longer breath can raise PaCO₂ and stop the heart.";
        all.push(caution("obstruction_rate", words, None));
    }
    let own = current.rate_total_per_min.zip(current.rate_per_min).map(|(total, set)| total - set);
    let stilled = planned.effort == Some(Effort::None) && current.effort != Some(Effort::None);
    if let Some(own) = own.filter(|own| stilled && *own > 0.0) {
        let words =
            format!("He takes {own:.0} breaths of his own. Relaxed, they stop. Raise the rate first.");
        all.push(caution("relaxant", words, None));
    }
    let acidosis = study.learnt().is_some_and(|learnt| learnt.standard_be <= s::METABOLIC_SBE.value);
    if acidosis && study.ventilates_less(current, planned) {
        let words = "Metabolic acidosis: less ventilation drops pH at once.";
        all.push(caution("metabolic_less", words, Some(&s::METABOLIC_SBE)));
    }
    all
}

/// Whether a change leaves less time, or more gas, to breathe out.
fn traps_more(current: &Settings, planned: &Settings) -> bool {
    let grew = |old: Option<f64>, new: Option<f64>| match (old, new) {
        (Some(old), Some(new)) => new > old,
        (None, new) => new.is_some(),
        (Some(_), None) => false,
    };
    grew(current.rate_per_min, planned.rate_per_min)
        || grew(current.tidal_volume_ml, planned.tidal_volume_ml)
        || grew(current.inspiratory_time_s, planned.inspiratory_time_s)
        || grew(current.inspiratory_pressure_cmh2o, planned.inspiratory_pressure_cmh2o)
}

/// Limits that settings would break.
pub(crate) fn broken_limits(price: &Price) -> Vec<Caution> {
    let mut all = Vec::new();
    if let Some(plateau) = price.plateau_cmh2o.filter(|p| *p > s::PLATEAU_MOST.value) {
        let words = format!("Plateau about {plateau:.0} cmH₂O, over {:.0}.", s::PLATEAU_MOST.value);
        all.push(caution("plateau", words, Some(&s::PLATEAU_MOST)));
    }
    if price.rate_per_min > s::RATE_MOST.value {
        let words = format!("Rate {:.0}, over {:.0} a minute.", price.rate_per_min, s::RATE_MOST.value);
        all.push(caution("rate", words, Some(&s::RATE_MOST)));
    }
    if let Some(ml_kg) = price.ml_per_kg.filter(|v| *v > s::VT_LUNG_MOST.value) {
        let words = format!("{ml_kg:.1} mL/kg, over {:.0}.", s::VT_LUNG_MOST.value);
        all.push(caution("ml_per_kg", words, Some(&s::VT_LUNG_MOST)));
    }
    all
}

/// Where it is heading, when that could hurt.
pub(crate) fn of_heading(settled: &Settled) -> Vec<Caution> {
    let ph = settled.ph.p50;
    if ph < s::PH_BORNE.value {
        let words = format!("pH would settle at about {ph:.2}, under {:.2}.", s::PH_BORNE.value);
        return vec![caution("ph_low", words, Some(&s::PH_BORNE))];
    }
    if ph > s::PH_GOAL_HIGH.value {
        let words = format!("pH would settle at about {ph:.2}, over {:.2}.", s::PH_GOAL_HIGH.value);
        return vec![caution("ph_high", words, Some(&s::PH_GOAL_HIGH))];
    }
    vec![]
}
