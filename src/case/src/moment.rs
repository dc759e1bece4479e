//! Moments: milliseconds of UTC, and the hand-held clock's reading of them.

/// A moment, in milliseconds since 1970-01-01T00:00:00Z.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Default)]
pub struct Moment(pub i64);

const MS_PER_MIN: i64 = 60_000;
const MIN_PER_DAY: i64 = 24 * 60;

impl Moment {
    /// Minutes from `earlier` to this moment; negative when it lies before.
    #[must_use]
    pub fn minutes_since(self, earlier: Moment) -> f64 {
        // Both are whole milliseconds within ±2^53, so the difference is exact.
        (self.0 - earlier.0) as f64 / MS_PER_MIN as f64
    }

    /// The moment `minutes` later (earlier when negative), to the millisecond.
    #[must_use]
    pub fn plus_minutes(self, minutes: f64) -> Moment {
        Moment(self.0 + (minutes * MS_PER_MIN as f64) as i64)
    }

    /// The wall clock "21:10" at an offset of `utc_offset_min` minutes east of UTC.
    #[must_use]
    pub fn clock(self, utc_offset_min: i32) -> String {
        let minute = (self.0.div_euclid(MS_PER_MIN) + i64::from(utc_offset_min)).rem_euclid(MIN_PER_DAY);
        format!("{:02}:{:02}", minute / 60, minute % 60)
    }
}

/// What the clock says, handed down by whoever may read it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Now {
    /// The wall clock, UTC.
    pub wall: Moment,
    /// Minutes that local time is ahead of UTC.
    pub utc_offset_min: i32,
    /// Milliseconds since the page was loaded, by a clock that is never set.
    pub since_load_ms: f64,
}

impl Now {
    /// A reading at `wall` in UTC, for callers without a screen.
    #[must_use]
    pub fn at(wall: Moment) -> Self {
        Self { wall, utc_offset_min: 0, since_load_ms: 0.0 }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_clock_is_local() {
        let moment = Moment(1_772_485_800_000); // 2026-03-02T21:10:00Z
        assert_eq!(moment.clock(0), "21:10");
        assert_eq!(moment.clock(60), "22:10");
        assert_eq!(moment.clock(-22 * 60), "23:10");
        assert_eq!(Moment(-1).clock(0), "23:59");
    }

    #[test]
    fn minutes_add_and_subtract() {
        let start = Moment(0);
        assert_eq!(start.plus_minutes(1.5).minutes_since(start), 1.5);
        assert_eq!(start.plus_minutes(-30.0), Moment(-1_800_000));
    }
}
