//! From the record to what the engine is given: which stretch of the case can be computed, its steps, its gases.

use case::{
    Case, Circulation, Condition, EntryId, EntryKind, Gas, GasChoice, Moment, SedationLevel, Settings, Site,
};
use physiology::{Patient, SedationDepth, Step, production_factor};
use sources as s;

use crate::Standing;
use crate::standing::{breath, withheld};
use crate::stretch::{self, Stretch};

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
    /// The last stretch that can be computed.
    pub stretch: Option<Stretch>,
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
        let stretch = stretch::last(&entries);
        Self { patient: patient_of(case), settings: case.settings_steps(), stretch, verdicts, entries }
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

    /// The moment from which the record can be computed: the stretch's, or when the circulation is steady.
    pub fn computable_from(&self) -> Option<Moment> {
        let steady = self.circulation_steady_from()?;
        self.stretch.as_ref().map(|stretch| if steady > stretch.from { steady } else { stretch.from })
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

    /// Haemoglobin last measured by `moment`, g/dL; not from a sample that was left out.
    pub fn haemoglobin(&self, moment: Moment) -> Option<f64> {
        self.entries
            .iter()
            .filter(|e| e.at <= moment && self.verdict(&e.id) != Some(GasChoice::Sample))
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

    /// The engine's steps from `start` on, minutes counted from it, jumps not yet set. Everything that drives the
    /// body is in them: breath, apnoea, temperature, sedation.
    pub fn steps(&self, start: Moment) -> Vec<Step> {
        let Some(stretch) = &self.stretch else { return vec![] };
        let mut moments: Vec<Moment> = stretch.settings.iter().map(|(at, _)| *at).collect();
        for entry in self.entries.iter().filter(|e| self.drives(e)) {
            let place = moments.partition_point(|at| *at <= entry.at);
            moments.insert(place, entry.at);
        }
        moments.dedup();
        let mut steps: Vec<Step> = Vec::new();
        for at in moments {
            let before = stretch.settings.partition_point(|(from, _)| *from <= at);
            let Some((_, settings)) = stretch.settings.get(before.saturating_sub(1)) else { continue };
            if let Some(step) = self.step_for(settings, at, start) {
                push_step(&mut steps, step);
            }
        }
        steps
    }

    /// One step for `settings` at `at`, with what drives the body at that moment.
    pub fn step_for(&self, settings: &Settings, at: Moment, start: Moment) -> Option<Step> {
        let mut step = self.driving_at(at).step(&self.patient, settings, at.minutes_since(start))?;
        step.apparatus_ml = step.apparatus_ml.or_else(|| self.first_apparatus());
        Some(step)
    }

    /// What drives the body beside the breath at `at`. Telling is not changing: the first temperature and the
    /// first depth of sedation hold from the beginning, only later ones are steps.
    fn driving_at(&self, at: Moment) -> Driving {
        let mut driving = Driving::default();
        for entry in self.entries.iter().filter(|e| self.drives(e)) {
            let mut told = driving;
            told.apply(&entry.kind);
            if entry.at <= at {
                driving = told;
            } else {
                driving.temperature_c = driving.temperature_c.or(told.temperature_c);
                driving.depth = driving.depth.or(told.depth);
            }
        }
        driving
    }

    /// Whether an entry changes what drives the body beside the breath.
    fn drives(&self, entry: &case::Entry) -> bool {
        match &entry.kind {
            EntryKind::BreathingStopped(_)
            | EntryKind::BreathingRestored
            | EntryKind::Temperature(_)
            | EntryKind::Sedation(_) => true,
            EntryKind::Gas(gas) => {
                gas.temperature_c.is_some() && self.verdict(&entry.id) != Some(GasChoice::Sample)
            }
            _ => false,
        }
    }

    /// The first apparatus dead space typed: it was there before somebody said so.
    fn first_apparatus(&self) -> Option<f64> {
        self.settings.iter().find_map(|(_, settings)| settings.apparatus_dead_space_ml)
    }

    /// Whether nobody breathes for him at `moment`.
    pub fn breathing_stopped_at(&self, moment: Moment) -> bool {
        self.driving_at(moment).stopped
    }

    /// Whether a relaxant is on board at `moment`.
    pub fn relaxed_at(&self, moment: Moment) -> bool {
        self.entries
            .iter()
            .filter(|e| e.at <= moment)
            .filter_map(|e| if let EntryKind::Sedation(sedation) = e.kind { sedation.relaxant } else { None })
            .next_back()
            .unwrap_or(false)
    }

    /// What happened after `gas_at` that a forecast from that gas can't carry.
    pub fn unsettled_since(&self, gas_at: Moment) -> Option<Standing> {
        let lasting = |e: &case::Entry| match e.kind {
            EntryKind::BicarbonateGiven { over_min, .. } => e.at.plus_minutes(over_min.unwrap_or(0.0)),
            _ => e.at,
        };
        self.entries.iter().filter(|e| lasting(e) >= gas_at).find_map(|e| match &e.kind {
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
