//! The rows of chips, as one table. Nothing is chosen beforehand.

use case::{Airway, Control, Effort, HeightHow, Leak, Sex, Site};

/// One row of chips.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Choice {
    /// Where the sample came from.
    Site,
    /// When it was drawn.
    Drawn,
    /// How the patient breathes.
    Breathes,
    /// What the machine holds constant under own breaths.
    OwnControl,
    /// How much leaks.
    Leak,
    /// When settings were changed.
    Changed,
    /// Sex.
    Sex,
    /// How the height is known.
    HeightHow,
}

/// A row of the table.
#[derive(Debug, Clone, Copy)]
pub struct ChoiceSpec {
    /// Name in the kept draft.
    pub name: &'static str,
    /// Id of its group on the page.
    pub id: &'static str,
    /// Id of the sentence that says what is wrong in it.
    pub fault_id: &'static str,
    /// What is asked.
    pub label: &'static str,
    /// The chips.
    pub options: &'static [&'static str],
    /// Chips in one line of a phone.
    pub columns: u8,
}

/// The id of a group and that of its error.
macro_rules! ids {
    ($id:literal) => {
        ($id, concat!($id, "-fault"))
    };
}

/// Minutes ago that the chips of [`Choice::Drawn`] and [`Choice::Changed`] stand for; the last chip is the clock.
pub const MINUTES_AGO: [f64; 5] = [0.0, 5.0, 10.0, 20.0, 30.0];
/// The chip that asks for a clock time.
pub const CLOCK: u8 = 5;
const TIMES: [&str; 6] = ["now", "5 min ago", "10 min ago", "20 min ago", "30 min ago", "clock"];

/// How the patient breathes, as the chips ask it.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Breathes {
    /// A machine that sets the volume.
    VolumeSet,
    /// A machine that sets the pressure.
    PressureSet,
    /// Own breaths on top.
    OwnToo,
    /// A mask.
    Mask,
    /// No machine.
    Unaided,
}

impl Choice {
    /// Every choice, in the order of [`Choice::index`].
    pub const ALL: [Choice; 8] = [
        Choice::Site,
        Choice::Drawn,
        Choice::Breathes,
        Choice::OwnControl,
        Choice::Leak,
        Choice::Changed,
        Choice::Sex,
        Choice::HeightHow,
    ];

    /// Its place in [`Choice::ALL`].
    pub const fn index(self) -> usize {
        self as usize
    }

    /// Its row of the table.
    pub const fn spec(self) -> ChoiceSpec {
        const fn row(
            name: &'static str,
            (id, fault_id): (&'static str, &'static str),
            label: &'static str,
            options: &'static [&'static str],
            columns: u8,
        ) -> ChoiceSpec {
            ChoiceSpec { name, id, fault_id, label, options, columns }
        }
        match self {
            Choice::Site => row(
                "site",
                ids!("c-site"),
                "Sample from",
                &["arterial", "arm vein", "central line", "capillary"],
                2,
            ),
            Choice::Drawn => row("drawn", ids!("c-drawn"), "Drawn", &TIMES, 3),
            Choice::Breathes => row(
                "breathes",
                ids!("c-breathes"),
                "How the patient breathes",
                &["machine, volume set", "machine, pressure set", "own breaths too", "mask", "unaided"],
                2,
            ),
            Choice::OwnControl => {
                row("own_control", ids!("c-own"), "The machine gives", &["volume", "pressure", "support"], 3)
            }
            Choice::Leak => row("leak", ids!("c-leak"), "Leak", &["none", "small", "large"], 3),
            Choice::Changed => row("changed", ids!("c-changed"), "Changed", &TIMES, 3),
            Choice::Sex => row("sex", ids!("c-sex"), "Sex", &["female", "male"], 2),
            Choice::HeightHow => {
                row("height_how", ids!("c-how"), "Height is", &["measured", "stated", "guessed"], 3)
            }
        }
    }
}

/// The site behind a chip.
pub const fn site(pick: u8) -> Option<Site> {
    match pick {
        0 => Some(Site::Arterial),
        1 => Some(Site::PeripheralVenous),
        2 => Some(Site::CentralVenous),
        3 => Some(Site::Capillary),
        _ => None,
    }
}

/// The way of breathing behind a chip.
pub const fn breathes(pick: u8) -> Option<Breathes> {
    match pick {
        0 => Some(Breathes::VolumeSet),
        1 => Some(Breathes::PressureSet),
        2 => Some(Breathes::OwnToo),
        3 => Some(Breathes::Mask),
        4 => Some(Breathes::Unaided),
        _ => None,
    }
}

/// What the machine gives under own breaths.
pub const fn own_control(pick: u8) -> Option<Control> {
    match pick {
        0 => Some(Control::Volume),
        1 => Some(Control::Pressure),
        2 => Some(Control::PressureSupport),
        _ => None,
    }
}

/// The leak behind a chip.
pub const fn leak(pick: u8) -> Option<Leak> {
    match pick {
        0 => Some(Leak::None),
        1 => Some(Leak::Small),
        2 => Some(Leak::Large),
        _ => None,
    }
}

/// The sex behind a chip.
pub const fn sex(pick: u8) -> Option<Sex> {
    match pick {
        0 => Some(Sex::Female),
        1 => Some(Sex::Male),
        _ => None,
    }
}

/// How a height is known.
pub const fn height_how(pick: u8) -> Option<HeightHow> {
    match pick {
        0 => Some(HeightHow::Measured),
        1 => Some(HeightHow::Stated),
        2 => Some(HeightHow::Guessed),
        _ => None,
    }
}

impl Breathes {
    /// The way settings in force breathe, where they say so; what decides which fields an update asks.
    pub fn of(settings: &case::Settings) -> Option<Breathes> {
        match (settings.airway?, settings.control, settings.effort) {
            (Airway::None, ..) => Some(Breathes::Unaided),
            (Airway::Mask, ..) => Some(Breathes::Mask),
            (_, _, Some(Effort::Present)) => Some(Breathes::OwnToo),
            (_, Some(Control::Pressure), _) => Some(Breathes::PressureSet),
            (_, Some(Control::PressureSupport), _) => Some(Breathes::OwnToo),
            _ => Some(Breathes::VolumeSet),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_chip_means_something_and_no_other_does() {
        let meant = |choice: Choice, means: &dyn Fn(u8) -> bool| {
            let count = u8::try_from(choice.spec().options.len()).unwrap();
            (0..count).all(means) && !means(count)
        };
        assert!(meant(Choice::Site, &|p| site(p).is_some()));
        assert!(meant(Choice::Breathes, &|p| breathes(p).is_some()));
        assert!(meant(Choice::OwnControl, &|p| own_control(p).is_some()));
        assert!(meant(Choice::Leak, &|p| leak(p).is_some()));
        assert!(meant(Choice::Sex, &|p| sex(p).is_some()));
        assert!(meant(Choice::HeightHow, &|p| height_how(p).is_some()));
        for choice in [Choice::Drawn, Choice::Changed] {
            assert_eq!(choice.spec().options.len(), MINUTES_AGO.len() + 1);
            assert_eq!(usize::from(CLOCK), MINUTES_AGO.len());
        }
    }

    #[test]
    fn the_table_is_in_order() {
        for (index, choice) in Choice::ALL.into_iter().enumerate() {
            assert_eq!(choice.index(), index);
        }
    }
}
