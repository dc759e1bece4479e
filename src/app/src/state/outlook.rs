//! The minutes that a forecast is asked at, and which of its values a screen shows.

use bedside::{Answer, Forecast, Quantiles};
use case::{Moment, Now};

/// The farthest that the chart reaches back, minutes.
const BACK_MIN: f64 = 90.0;
/// Minutes between points of the past.
const BACK_STEP_MIN: usize = 5;
/// Minutes ahead, closer where it moves.
const AHEAD: [f64; 20] = [
    0.0, 1.0, 2.0, 4.0, 6.0, 8.0, 10.0, 15.0, 20.0, 25.0, 30.0, 40.0, 50.0, 60.0, 75.0, 90.0, 120.0, 150.0,
    180.0, 240.0,
];
/// Minutes ahead that the table lists and the slider stops at.
pub const LISTED: [f64; 10] = [0.0, 10.0, 20.0, 30.0, 40.0, 60.0, 90.0, 120.0, 180.0, 240.0];

/// The minutes around now that a chart is drawn from: back to the `start` of what was computed, 240 ahead.
pub fn minutes(start: Option<Moment>, now: &Now) -> Vec<f64> {
    let back = start.map_or(0.0, |start| now.wall.minutes_since(start).min(BACK_MIN)).max(0.0);
    let steps = (1..).map(|n: u32| f64::from(n) * BACK_STEP_MIN as f64).take_while(|minute| *minute < back);
    let mut minutes: Vec<f64> = steps.map(|minute| -minute).collect();
    if back > 0.0 {
        minutes.push(-back);
    }
    minutes.reverse();
    minutes.extend(AHEAD);
    minutes
}

/// PaCO2 and pH at `minute`, where the forecast was asked there.
pub fn at(forecast: &Forecast, minute: f64) -> Option<(Quantiles, Quantiles)> {
    let index = forecast.minutes.iter().position(|m| *m == minute)?;
    Some((forecast.paco2_mmhg.at(index)?, forecast.ph.at(index)?))
}

/// The horizon of the chart: far enough that the time to settle is on it.
pub fn horizon(forecast: &Forecast) -> f64 {
    let late = forecast.minutes_to_within_2_mmhg.p90;
    [90.0, 120.0, 180.0].into_iter().find(|end| late <= end - 15.0).unwrap_or(240.0)
}

/// The forecast of an answer, when it has finite values.
pub fn value(answer: &Answer<Forecast>) -> Option<&Forecast> {
    answer.value.as_ref().filter(|forecast| forecast.settled.paco2_mmhg.p50.is_finite())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn minutes_rise_from_the_start_through_now() {
        let now = Now::at(Moment(1_772_486_400_000));
        let minutes = minutes(Some(now.wall.plus_minutes(-12.0)), &now);
        assert_eq!(&minutes[..4], [-12.0, -10.0, -5.0, 0.0]);
        assert!(minutes.windows(2).all(|pair| pair[0] < pair[1]));
        assert_eq!(super::minutes(None, &now)[0], 0.0);
        assert_eq!(super::minutes(Some(now.wall.plus_minutes(-900.0)), &now)[0], -90.0);
    }

    #[test]
    fn what_is_listed_is_asked_for() {
        assert!(LISTED.iter().all(|minute| AHEAD.contains(minute)));
    }
}
