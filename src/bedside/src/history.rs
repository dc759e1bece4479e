//! From the record to what the engine is given: which stretch of the case can be computed, its steps, its gases.

use case::{
    Case, Circulation, Condition, EntryId, EntryKind, Gas, GasChoice, Moment, SedationLevel, Settings, Site,
};
use physiology::{Patient, SedationDepth, Step, production_factor};
use sources as s;

use crate::Standing;
use crate::standing::{Way, breath, way, withheld};

/// A gas that may be learnt from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct UsableGas<'a> {
    pub id: &'a EntryId,
    pub at: Moment,
    pub gas: &'a Gas,
    pub verdict: Option<GasChoice>,
}

/// The case, resolved once.
#[derive(Debug, Clone)]
pub(crate) struct History {
    /// Entries after corrections, in order.
    pub entries: Vec<case::Entry>,
    /// The patient for the engine.
    pub patient: Patient,
    /// Settings steps with the whole state.
    pub settings: Vec<(Moment, Settings)>,
    verdicts: Vec<(EntryId, GasChoice)>,
}

impl History {
    pub fn of(case: &Case) -> Self {
        let entries = case.resolved();
        let verdicts = entries
            .iter()
            .filter_map(|e| {
                if let EntryKind::GasVerdict(v) = &e.kind { Some((v.of.clone(), v.choice)) } else { None }
            })
            .collect();
        Self { patient: patient_of(case), settings: case.settings_steps(), verdicts, entries }
    }

    /// The settings in force at `moment`.
    pub fn settings_at(&self, moment: Moment) -> Settings {
        self.settings
            .iter()
            .take_while(|(at, _)| *at <= moment)
            .last()
            .map_or_else(Settings::default, |(_, s)| *s)
    }

    /// The last decision about a gas.
    fn verdict(&self, id: &EntryId) -> Option<GasChoice> {
        self.verdicts.iter().rev().find(|(of, _)| of == id).map(|(_, choice)| *choice)
    }

    /// Every arterial gas that was not said to be a bad sample, in order.
    pub fn arterial_gases(&self) -> Vec<UsableGas<'_>> {
        self.entries
            .iter()
            .filter_map(|e| match &e.kind {
                EntryKind::Gas(gas) if gas.site == Site::Arterial => {
                    Some(UsableGas { id: &e.id, at: e.at, gas, verdict: self.verdict(&e.id) })
                }
                _ => None,
            })
            .filter(|gas| gas.verdict != Some(GasChoice::Sample))
            .collect()
    }

    /// The moment from which the record can be computed without a gap: since then the breath is known (or was
    /// read off a little after a change), nobody squeezed by hand, and the circulation was not lost.
    pub fn computable_from(&self) -> Option<Moment> {
        let mut from = None;
        for (at, settings) in &self.settings {
            match (breath(settings), from) {
                (Some(_), None) => from = Some(*at),
                (None, _) if !measurable(settings) => from = None,
                _ => {}
            }
        }
        let steady = self.circulation_steady_from()?;
        from.map(|from| if steady > from { steady } else { from })
    }

    /// When the circulation may be counted on: always, unless an entry says otherwise; `None` while it can't.
    pub fn circulation_steady_from(&self) -> Option<Moment> {
        let mut steady = Some(Moment(i64::MIN));
        for entry in &self.entries {
            if let EntryKind::Circulation(state) = &entry.kind {
                steady = match (state, steady) {
                    // "Steady" said of a circulation that was never lost changes nothing.
                    (Circulation::Steady, Some(since)) => Some(since),
                    (Circulation::Steady, None) => {
                        Some(entry.at.plus_minutes(s::CIRCULATION_STEADY_FOR.value))
                    }
                    _ => None,
                };
            }
        }
        steady
    }

    /// Whether a condition stands as present.
    pub fn has(&self, wanted: fn(&Condition) -> bool) -> Option<bool> {
        self.entries
            .iter()
            .filter_map(|e| match &e.kind {
                EntryKind::Condition { name, present } if wanted(name) => Some(*present),
                _ => None,
            })
            .next_back()
    }

    /// Haemoglobin last measured by `moment`, g/dL.
    pub fn haemoglobin(&self, moment: Moment) -> Option<f64> {
        self.entries
            .iter()
            .filter(|e| e.at <= moment)
            .filter_map(|e| if let EntryKind::Gas(gas) = &e.kind { gas.hb_g_dl } else { None })
            .next_back()
    }

    /// Saturation by the oximeter last read by `moment`, 0–1.
    pub fn saturation(&self, moment: Moment) -> Option<f64> {
        self.entries
            .iter()
            .filter(|e| e.at <= moment)
            .filter_map(|e| {
                if let EntryKind::Saturation(percent) = e.kind { Some(percent / 100.0) } else { None }
            })
            .next_back()
    }

    /// What was measured in place of an assumption, the last of each.
    pub fn measured(&self) -> physiology::Exact {
        let mut all = physiology::Exact::default();
        for entry in &self.entries {
            if let EntryKind::Measured(m) = &entry.kind {
                all.vco2_ml_min = m.vco2_ml_min.or(all.vco2_ml_min);
                all.dead_space_fraction = m.dead_space_fraction.or(all.dead_space_fraction);
                all.cardiac_output_l_min = m.cardiac_output_l_min.or(all.cardiac_output_l_min);
                all.frc_ml = m.frc_ml.or(all.frc_ml);
                all.without_spread |= m.exact;
            }
        }
        all
    }

    /// The engine's steps from `start` on, minutes counted from it, jumps not yet set. Everything that drives
    /// the body is in them: breath, apnoea, temperature, sedation. A volume read off after a change of pressure
    /// or rate holds from the change on.
    pub fn steps(&self, start: Moment) -> Vec<Step> {
        let mut driving = Driving::default();
        let mut settings = Settings::default();
        let mut steps: Vec<Step> = Vec::new();
        let mut unread_since = None;
        for entry in &self.entries {
            let before = (settings, driving);
            if let EntryKind::Settings(change) = &entry.kind {
                settings = settings.after(change);
            }
            driving.apply(&entry.kind);
            if (settings, driving) != before {
                let at_min = entry.at.minutes_since(start);
                match driving.step(&self.patient, &settings, unread_since.unwrap_or(at_min)) {
                    Some(step) => {
                        push_step(&mut steps, step);
                        unread_since = None;
                    }
                    None if measurable(&settings) => unread_since = unread_since.or(Some(at_min)),
                    None => unread_since = None,
                }
            }
        }
        steps
    }

    /// One step for `settings` at `minute`, with what drives the body at that moment.
    pub fn step_for(&self, settings: &Settings, at: Moment, start: Moment) -> Option<Step> {
        let mut driving = Driving::default();
        self.entries.iter().filter(|e| e.at <= at).for_each(|entry| driving.apply(&entry.kind));
        driving.step(&self.patient, settings, at.minutes_since(start))
    }

    /// Whether nobody breathes for him at `moment`.
    pub fn breathing_stopped_at(&self, moment: Moment) -> bool {
        let mut driving = Driving::default();
        self.entries.iter().filter(|e| e.at <= moment).for_each(|entry| driving.apply(&entry.kind));
        driving.stopped
    }

    /// What happened after `gas_at` that a forecast from that gas can't carry.
    pub fn unsettled_since(&self, gas_at: Moment) -> Option<Standing> {
        self.entries.iter().filter(|e| e.at >= gas_at).find_map(|e| match &e.kind {
            EntryKind::NotUnderstood(unknown) if could_change_the_answer(&unknown.kind) => Some(withheld(
                "not_understood",
                format!(
                    "An entry since the last gas ({}) can't be understood, and it could change this.",
                    unknown.kind
                ),
                "Read it in Record and type what it says.",
            )),
            EntryKind::BicarbonateGiven { .. } => Some(withheld(
                "bicarbonate",
                "Bicarbonate was given after the last gas. It adds CO₂ and moves pH.",
                "Draw a gas when it is in.",
            )),
            EntryKind::Seizure => Some(withheld(
                "seizure",
                "A seizure since the last gas: CO₂ and acid made are not known.",
                "Draw a gas when it has stopped.",
            )),
            _ => None,
        })
    }
}

/// What drives the body beside the breath.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
struct Driving {
    temperature_c: Option<f64>,
    depth: Option<SedationDepth>,
    stopped: bool,
}

impl Driving {
    fn apply(&mut self, kind: &EntryKind) {
        match kind {
            EntryKind::BreathingStopped(_) => self.stopped = true,
            EntryKind::BreathingRestored => self.stopped = false,
            EntryKind::Temperature(celsius) => self.temperature_c = Some(*celsius),
            EntryKind::Gas(gas) => self.temperature_c = gas.temperature_c.or(self.temperature_c),
            EntryKind::Sedation(sedation) => self.depth = sedation.level.map(depth_of).or(self.depth),
            _ => {}
        }
    }

    fn step(&self, patient: &Patient, settings: &Settings, at_min: f64) -> Option<Step> {
        let breath = breath(settings)?;
        Some(Step {
            at_min,
            rate_per_min: if self.stopped { 0.0 } else { breath.rate_per_min },
            tidal_volume_ml: breath.tidal_volume_ml,
            apparatus_ml: settings.apparatus_dead_space_ml,
            production_factor: production_factor(
                patient,
                self.depth.unwrap_or(SedationDepth::Moderate),
                self.temperature_c,
            ),
            jump_sd: 0.0,
        })
    }
}

/// Kinds that are read when they are written as they should be: one that is not could hide a change of
/// breath, blood or circulation.
fn could_change_the_answer(kind: &str) -> bool {
    matches!(
        kind,
        "settings"
            | "gas"
            | "gas_verdict"
            | "correction"
            | "breathing_stopped"
            | "breathing_restored"
            | "circulation"
            | "given"
    )
}

/// Whether the breath under these settings can be read off, though it was not yet.
fn measurable(settings: &Settings) -> bool {
    !matches!(way(settings), Way::ByHand | Way::NoCurve | Way::NotSaid)
}

/// Adds a step; several at one moment or before the start leave only the last in force.
fn push_step(steps: &mut Vec<Step>, mut step: Step) {
    if step.at_min <= 0.0 {
        step.at_min = 0.0;
    }
    while steps.last().is_some_and(|last| last.at_min >= step.at_min) {
        steps.pop();
    }
    steps.push(step);
}

fn depth_of(level: SedationLevel) -> SedationDepth {
    match level {
        SedationLevel::None | SedationLevel::Light => SedationDepth::Light,
        SedationLevel::Moderate => SedationDepth::Moderate,
        SedationLevel::Heavy => SedationDepth::Heavy,
    }
}

/// The person as the engine knows him.
pub(crate) fn patient_of(case: &Case) -> Patient {
    let person = &case.person;
    Patient {
        sex: person.sex.map(|sex| match sex {
            case::Sex::Female => physiology::Sex::Female,
            case::Sex::Male => physiology::Sex::Male,
        }),
        age_years: person.age_years,
        height_cm: person.height_cm,
        height_guessed: person.height_how == Some(case::HeightHow::Guessed),
        weight_kg: person.weight_kg,
    }
}
