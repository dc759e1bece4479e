//! The invented case, "Night ferry": a ventilated woman with pneumonia on a crossing. No real patient.

use case::{Airway, Control, Effort, Leak};
use case::{EntryKind, Gas, HeightHow, Person, Settings, Sex, Site};

use crate::words::start::DEMO_NOTE;

/// The person of the invented case.
pub const PERSON: Person = Person {
    sex: Some(Sex::Female),
    age_years: Some(58.0),
    height_cm: Some(163.0),
    height_how: Some(HeightHow::Stated),
    weight_kg: Some(74.0),
};

/// Its entries, each with the minutes before now.
pub fn entries() -> [(f64, EntryKind); 3] {
    let settings = Settings {
        airway: Some(Airway::Tube),
        control: Some(Control::Volume),
        effort: Some(Effort::None),
        leak: Some(Leak::None),
        rate_per_min: Some(18.0),
        tidal_volume_ml: Some(340.0),
        peep_cmh2o: Some(10.0),
        plateau_cmh2o: Some(27.0),
        fio2: Some(0.6),
        inspiratory_time_s: Some(0.9),
        ..Settings::default()
    };
    let gas = Gas {
        site: Site::Arterial,
        ph: 7.21,
        pco2_mmhg: 71.0,
        po2_mmhg: Some(68.0),
        hco3_printed_mmol_l: Some(27.8),
        hb_g_dl: None,
        temperature_c: None,
        reported_at_c: None,
        analysed_at: None,
        settings_held_min: Some(30.0),
    };
    [
        (40.0, EntryKind::Note(DEMO_NOTE.to_owned())),
        (40.0, EntryKind::Settings(settings)),
        (10.0, EntryKind::Gas(gas)),
    ]
}
