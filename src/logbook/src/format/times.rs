//! Moments as text: RFC 3339, read with any offset, written in UTC.

use case::Moment;
use time::OffsetDateTime;
use time::format_description::well_known::Rfc3339;

const NS_PER_MS: i128 = 1_000_000;

/// The moment that `text` names by RFC 3339 ("2026-03-02T22:10:00+01:00"), to the millisecond below.
/// `None` when it is no such time.
#[must_use]
pub fn read_time(text: &str) -> Option<Moment> {
    let read = OffsetDateTime::parse(text, &Rfc3339).ok()?;
    i64::try_from(read.unix_timestamp_nanos().div_euclid(NS_PER_MS)).ok().map(Moment)
}

/// "2026-03-02T21:10:00Z", with a fraction only where there is one. `None` outside the years 0 to 9999.
#[must_use]
pub fn write_time(moment: Moment) -> Option<String> {
    let utc = OffsetDateTime::from_unix_timestamp_nanos(i128::from(moment.0) * NS_PER_MS).ok()?;
    utc.format(&Rfc3339).ok()
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn any_offset_is_read_and_z_is_written() {
        let moment = Moment(1_772_485_800_000);
        for text in ["2026-03-02T21:10:00Z", "2026-03-02T22:10:00+01:00", "2026-03-02T11:10:00.000-10:00"] {
            assert_eq!(read_time(text), Some(moment), "{text}");
        }
        assert_eq!(write_time(moment).unwrap(), "2026-03-02T21:10:00Z");
        assert_eq!(write_time(Moment(moment.0 + 250)).unwrap(), "2026-03-02T21:10:00.25Z");
    }

    #[test]
    fn what_is_no_time_is_none() {
        for text in ["", "21:10", "2026-03-02", "2026-02-30T21:10:00Z", "2026-03-02T21:10:00", "yesterday"] {
            assert_eq!(read_time(text), None, "{text}");
        }
        assert_eq!(write_time(Moment(i64::MAX)), None);
        assert_eq!(write_time(Moment(i64::MIN)), None);
    }

    proptest::proptest! {
        #[test]
        fn what_is_written_is_read(ms in -62_167_219_200_000_i64..253_402_300_800_000) {
            let text = write_time(Moment(ms)).unwrap();
            proptest::prop_assert_eq!(read_time(&text), Some(Moment(ms)));
        }
    }
}
