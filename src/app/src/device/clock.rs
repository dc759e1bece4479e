//! The clock. Nothing else in the program reads the time.

use case::{Moment, Now};
use leptos::prelude::*;
use std::time::Duration;
use web_sys::js_sys::Date;

/// What the device's clocks say.
pub fn now() -> Now {
    Now {
        // Whole milliseconds, far inside what an f64 holds exactly.
        wall: Moment(Date::now() as i64),
        utc_offset_min: -(Date::new_0().get_timezone_offset() as i32),
        since_load_ms: window().performance().map_or(0.0, |p| p.now()),
    }
}

/// Milliseconds since the page was loaded.
pub fn since_load_ms() -> f64 {
    window().performance().map_or(0.0, |p| p.now())
}

/// How often the minute is looked at; a sleeping phone catches up within this.
const LOOK_EVERY: Duration = Duration::from_secs(2);

/// Calls `minute` whenever another minute has begun, and at once when the page is looked at again.
pub fn each_minute(minute: impl Fn(Now) + Clone + 'static) {
    let last = StoredValue::new(now().wall.0.div_euclid(60_000));
    let look = move || {
        let now = now();
        let this = now.wall.0.div_euclid(60_000);
        if last.try_get_value() != Some(this) {
            last.set_value(this);
            minute(now);
        }
    };
    set_interval(look.clone(), LOOK_EVERY);
    // Dropping the handle leaves the listener in place: it lives as long as the page.
    let _ = window_event_listener_untyped("visibilitychange", move |_| look());
}

/// Calls `act` after `ms` milliseconds.
pub fn after(ms: u64, act: impl FnOnce() + 'static) -> Option<TimeoutHandle> {
    set_timeout_with_handle(act, Duration::from_millis(ms)).ok()
}
