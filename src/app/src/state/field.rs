//! The fields that can be typed, as one table.

use units::Quantity;

/// One typed field.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Field {
    /// Clock time a gas was drawn.
    DrawnClock,
    /// pH.
    Ph,
    /// PCO2.
    Pco2,
    /// PO2.
    Po2,
    /// HCO3 as printed.
    Hco3,
    /// Haemoglobin.
    Hb,
    /// Clock time settings were changed.
    ChangedClock,
    /// Tidal volume set.
    TidalVolume,
    /// Tidal volume read off in expiration.
    ExpiredVolume,
    /// Rate set.
    Rate,
    /// Rate counted, own breaths with it.
    TotalRate,
    /// PEEP.
    Peep,
    /// Plateau.
    Plateau,
    /// FiO2.
    Fio2,
    /// Inspiratory time.
    InspiratoryTime,
    /// Expired minute volume.
    MinuteVolume,
    /// Pressure set above PEEP.
    InspiratoryPressure,
    /// Exchanger, mount and tubing.
    ApparatusDeadSpace,
    /// The case's label.
    Label,
    /// Age.
    Age,
    /// Height.
    Height,
    /// Weight.
    Weight,
    /// Rate tried in Change.
    NewRate,
    /// Tidal volume tried in Change.
    NewVolume,
}

/// How the keys behave in a field.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum KeyStyle {
    /// Digits and one point.
    Plain,
    /// As plain; a first 6 or 7 prints its point.
    Ph,
    /// Hours and minutes.
    Clock,
}

/// A row of the table.
#[derive(Debug, Clone, Copy)]
pub struct FieldSpec {
    /// Name in the kept draft.
    pub name: &'static str,
    /// Id of its input on the page.
    pub id: &'static str,
    /// Id of the sentence that says what is wrong in it.
    pub fault_id: &'static str,
    /// What is typed; `None` for clock times and words.
    pub quantity: Option<Quantity>,
    /// Label where the quantity's own isn't exact enough.
    pub label: Option<&'static str>,
    /// How the keys behave.
    pub keys: KeyStyle,
}

/// The id of an input and that of its error.
macro_rules! ids {
    ($id:literal) => {
        ($id, concat!($id, "-fault"))
    };
}

impl Field {
    /// Every field, in the order of [`Field::index`].
    pub const ALL: [Field; 24] = [
        Field::DrawnClock,
        Field::Ph,
        Field::Pco2,
        Field::Po2,
        Field::Hco3,
        Field::Hb,
        Field::ChangedClock,
        Field::TidalVolume,
        Field::ExpiredVolume,
        Field::Rate,
        Field::TotalRate,
        Field::Peep,
        Field::Plateau,
        Field::Fio2,
        Field::InspiratoryTime,
        Field::MinuteVolume,
        Field::InspiratoryPressure,
        Field::ApparatusDeadSpace,
        Field::Label,
        Field::Age,
        Field::Height,
        Field::Weight,
        Field::NewRate,
        Field::NewVolume,
    ];

    /// Its place in [`Field::ALL`].
    pub const fn index(self) -> usize {
        self as usize
    }

    /// Its row of the table.
    pub const fn spec(self) -> FieldSpec {
        use Quantity as Q;
        type Ids = (&'static str, &'static str);
        const fn plain(
            name: &'static str,
            (id, fault_id): Ids,
            quantity: Quantity,
            label: Option<&'static str>,
        ) -> FieldSpec {
            FieldSpec { name, id, fault_id, quantity: Some(quantity), label, keys: KeyStyle::Plain }
        }
        const fn clock(name: &'static str, (id, fault_id): Ids, label: &'static str) -> FieldSpec {
            FieldSpec { name, id, fault_id, quantity: None, label: Some(label), keys: KeyStyle::Clock }
        }
        match self {
            Field::DrawnClock => clock("drawn_clock", ids!("f-drawn"), "Drawn at"),
            Field::Ph => FieldSpec { keys: KeyStyle::Ph, ..plain("ph", ids!("f-ph"), Q::Ph, None) },
            Field::Pco2 => plain("pco2", ids!("f-pco2"), Q::Paco2Mmhg, None),
            Field::Po2 => plain("po2", ids!("f-po2"), Q::Po2Mmhg, None),
            Field::Hco3 => plain("hco3", ids!("f-hco3"), Q::Hco3MmolL, Some("HCO₃ printed")),
            Field::Hb => plain("hb", ids!("f-hb"), Q::HbGDl, None),
            Field::ChangedClock => clock("changed_clock", ids!("f-changed"), "Changed at"),
            Field::TidalVolume => {
                plain("tidal_volume", ids!("f-vt"), Q::TidalVolumeMl, Some("Tidal volume, set"))
            }
            Field::ExpiredVolume => plain(
                "expired_volume",
                ids!("f-vte"),
                Q::TidalVolumeMl,
                Some("Tidal volume, expired, read off"),
            ),
            Field::Rate => plain("rate", ids!("f-rate"), Q::RatePerMin, Some("Rate, set")),
            Field::TotalRate => {
                plain("total_rate", ids!("f-total"), Q::RatePerMin, Some("Rate in all, own breaths counted"))
            }
            Field::Peep => plain("peep", ids!("f-peep"), Q::PeepCmh2o, None),
            Field::Plateau => plain("plateau", ids!("f-plateau"), Q::PlateauCmh2o, None),
            Field::Fio2 => plain("fio2", ids!("f-fio2"), Q::Fio2, None),
            Field::InspiratoryTime => plain("inspiratory_time", ids!("f-ti"), Q::InspiratoryTimeS, None),
            Field::MinuteVolume => plain(
                "minute_volume",
                ids!("f-mv"),
                Q::MinuteVolumeLMin,
                Some("Minute volume, expired, read off"),
            ),
            Field::InspiratoryPressure => plain(
                "inspiratory_pressure",
                ids!("f-pinsp"),
                Q::InspiratoryPressureCmh2o,
                Some("Pressure above PEEP"),
            ),
            Field::ApparatusDeadSpace => plain(
                "apparatus_dead_space",
                ids!("f-apparatus"),
                Q::ApparatusDeadSpaceMl,
                Some("Exchanger and mount, volume"),
            ),
            Field::Label => FieldSpec {
                name: "label",
                id: "f-label",
                fault_id: "f-label-fault",
                quantity: None,
                label: Some("Label"),
                keys: KeyStyle::Plain,
            },
            Field::Age => plain("age", ids!("f-age"), Q::AgeYears, None),
            Field::Height => plain("height", ids!("f-height"), Q::HeightCm, None),
            Field::Weight => plain("weight", ids!("f-weight"), Q::WeightKg, None),
            Field::NewRate => plain("new_rate", ids!("f-new-rate"), Q::RatePerMin, None),
            Field::NewVolume => plain("new_volume", ids!("f-new-volume"), Q::TidalVolumeMl, None),
        }
    }

    /// Whether it is a pressure of blood gas, which may be typed in kPa.
    pub const fn takes_kpa(self) -> bool {
        matches!(self, Field::Pco2 | Field::Po2)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_table_is_in_order_and_each_name_is_its_own() {
        for (index, field) in Field::ALL.into_iter().enumerate() {
            assert_eq!(field.index(), index);
            let same = Field::ALL
                .into_iter()
                .filter(|f| f.spec().name == field.spec().name || f.spec().id == field.spec().id);
            assert_eq!(same.count(), 1, "{field:?}");
        }
    }
}
