//! What every answer carries beside its numbers: whether there may be one, on what it rests, what to heed.

use case::Moment;

/// Whether there may be an answer.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Status {
    /// A forecast, if nothing else changes.
    Forecast,
    /// True if a named thing stays so.
    Conditional,
    /// None, with the reason and what would let it know.
    Withheld,
}

/// A thing that must stay so for a conditional answer.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Condition {
    /// Stable name.
    pub id: &'static str,
    /// The sentence.
    pub words: String,
}

/// Why there is no answer, and what would let the tool know.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Withheld {
    /// Stable name.
    pub id: &'static str,
    /// The sentence.
    pub words: String,
    /// What would let it know.
    pub would_help: String,
}

/// A sentence to heed, with the source it rests on where there is one.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Caution {
    /// Stable name.
    pub id: &'static str,
    /// The sentence.
    pub words: String,
    /// Id of an entry in `sources`.
    pub source: Option<&'static str>,
}

impl Caution {
    /// Whether it says what a change itself could do to this patient.
    pub(crate) fn is_danger(&self) -> bool {
        matches!(self.id, "relaxant" | "obstruction_rate" | "metabolic_less")
    }

    /// Whether it says that this change could hurt or breaks a limit: it then stands over the answer.
    #[must_use]
    pub fn comes_first(&self) -> bool {
        matches!(
            self.id,
            "relaxant"
                | "ph_low"
                | "ph_high"
                | "obstruction_rate"
                | "metabolic_less"
                | "plateau"
                | "rate"
                | "ml_per_kg"
        )
    }
}

/// Something taken for granted because nobody measured it.
#[derive(Debug, Clone, PartialEq)]
pub struct Assumed {
    /// Field's name, "Haemoglobin".
    pub name: &'static str,
    /// Its middle value.
    pub value: f64,
    /// One standard deviation, in the same unit.
    pub spread: f64,
    /// Unit as printed.
    pub unit: &'static str,
    /// Id of an entry in `sources`.
    pub source: &'static str,
    /// What narrows it, "Type the height."; empty where nothing at the bedside does.
    pub narrows: &'static str,
}

/// The decision whether there may be an answer, with its words.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Standing {
    /// The decision.
    pub status: Status,
    /// What must stay so; not empty when conditional.
    pub conditions: Vec<Condition>,
    /// Why silent; not empty when withheld.
    pub withheld: Vec<Withheld>,
}

/// An answer: its standing, its value unless withheld, and what it rests on.
#[derive(Debug, Clone, PartialEq)]
pub struct Answer<T> {
    /// Whether there may be one.
    pub standing: Standing,
    /// The value; `None` when withheld.
    pub value: Option<T>,
    /// The moment after which it must be confirmed: the last entry plus 60 min.
    pub valid_until: Option<Moment>,
    /// What was assumed.
    pub assumed: Vec<Assumed>,
    /// What to heed.
    pub cautions: Vec<Caution>,
}
