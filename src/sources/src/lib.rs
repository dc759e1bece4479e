//! Every published figure the engine uses, as data: value, spread, unit, who published it, and how it was
//! seen. A figure that nobody published is marked as assumed, and stands here all the same.

mod acid_base;
mod bedside;
mod body;
mod priors;
mod production;

pub use acid_base::*;
pub use bedside::*;
pub use body::*;
pub use priors::*;
pub use production::*;

/// How well a figure was seen.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Seen {
    /// Read in the paper's abstract or in an excerpt of its text.
    Opened,
    /// Read in another text that quotes it.
    Quoted,
    /// From memory; not opened.
    Memory,
    /// Computed by us from other rows.
    Computed,
    /// Assumed by us: a choice.
    Assumed,
    /// A rule of the trade with no single source.
    CommonPractice,
}

/// One figure.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Figure {
    /// Stable name, as answers cite it.
    pub id: &'static str,
    /// What it is.
    pub what: &'static str,
    /// Its value in `unit`.
    pub value: f64,
    /// One standard deviation in `unit`, of ln where the unit says so; 0 for a definition or a coefficient.
    pub spread: f64,
    /// Unit; "1" for a pure number.
    pub unit: &'static str,
    /// Authors, journal or standard, year.
    pub cite: &'static str,
    /// How it was seen.
    pub seen: Seen,
}

/// Declares figures as constants and lists them.
macro_rules! figures {
    ($list:ident; $( $name:ident = $value:expr, $spread:expr, $unit:literal, $what:literal, $cite:expr, $seen:ident; )+) => {
        $(
            #[doc = $what]
            pub const $name: crate::Figure = crate::Figure {
                id: stringify!($name), what: $what, value: $value, spread: $spread, unit: $unit, cite: $cite,
                seen: crate::Seen::$seen,
            };
        )+
        /// The figures of this file.
        pub const $list: &[crate::Figure] = &[$($name),+];
    };
}
pub(crate) use figures;

/// Every figure, file by file.
pub const ALL: &[&[Figure]] = &[ACID_BASE, BODY, PRODUCTION, PRIORS, BEDSIDE];

/// The figure called `id`.
#[must_use]
pub fn find(id: &str) -> Option<&'static Figure> {
    ALL.iter().flat_map(|list| list.iter()).find(|figure| figure.id == id)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_figure_is_named_once_and_says_where_it_is_from() {
        let all: Vec<&Figure> = ALL.iter().flat_map(|list| list.iter()).collect();
        for (i, figure) in all.iter().enumerate() {
            assert!(all[i + 1..].iter().all(|other| other.id != figure.id), "{} twice", figure.id);
            assert!(
                !figure.what.is_empty() && !figure.cite.is_empty() && !figure.unit.is_empty(),
                "{}",
                figure.id
            );
            assert!(figure.value.is_finite() && figure.spread >= 0.0, "{}", figure.id);
        }
        assert_eq!(find("PBW_PER_CM").map(|f| f.value), Some(0.91));
        assert_eq!(find("no such figure"), None);
    }
}
