//! A forecast as JSON.

use bedside::{Answer, Band, Forecast, Quantiles};
use serde_json::{Map, Value, json};

use crate::answer::frame;

/// The fields of a forecast; `null` when it is withheld.
const FIELDS: [&str; 8] = [
    "minutes",
    "paco2_mmhg",
    "ph",
    "hco3_mmol_l",
    "gas_would_read",
    "settled",
    "minutes_to_within_2_mmhg",
    "minutes_to_90_percent",
];

/// A forecast as one line of JSON.
#[must_use]
pub fn forecast_json(answer: &Answer<Forecast>) -> String {
    Value::Object(forecast_value(answer)).to_string()
}

/// A forecast as an object, for callers that add to it. Every name is always there; what is withheld is
/// `null`.
#[must_use]
pub fn forecast_value(answer: &Answer<Forecast>) -> Map<String, Value> {
    let mut map = frame(answer);
    let values = answer.value.as_ref().map_or_else(|| FIELDS.map(|_| Value::Null), values);
    map.extend(FIELDS.map(str::to_owned).into_iter().zip(values));
    map
}

/// The values in the order of [`FIELDS`].
fn values(forecast: &Forecast) -> [Value; 8] {
    let settled = &forecast.settled;
    [
        json!(forecast.minutes),
        band(&forecast.paco2_mmhg),
        band(&forecast.ph),
        band(&forecast.hco3_mmol_l),
        json!({
            "paco2_mmhg": band(&forecast.gas_would_read_paco2_mmhg),
            "ph": band(&forecast.gas_would_read_ph),
        }),
        json!({ "paco2_mmhg": quantiles(&settled.paco2_mmhg), "ph": quantiles(&settled.ph) }),
        quantiles(&forecast.minutes_to_within_2_mmhg),
        quantiles(&forecast.minutes_to_90_percent),
    ]
}

fn band(band: &Band) -> Value {
    json!({ "p10": band.p10, "p50": band.p50, "p90": band.p90 })
}

fn quantiles(quantiles: &Quantiles) -> Value {
    json!({ "p10": quantiles.p10, "p50": quantiles.p50, "p90": quantiles.p90 })
}

#[cfg(test)]
mod tests {
    use bedside::{Assumed, Caution, Condition, Settled, Standing, Status, Withheld};
    use case::Moment;

    use super::*;

    fn answer(status: Status, value: Option<Forecast>) -> Answer<Forecast> {
        let conditions = vec![Condition { id: "rate_stays", words: "If he keeps breathing 26.".into() }];
        let withheld =
            vec![Withheld { id: "no_gas", words: "No gas.".into(), would_help: "Type a gas.".into() }];
        let assumed = Assumed {
            name: "Haemoglobin",
            value: 12.0,
            spread: 2.0,
            unit: "g/dL",
            source: "haemoglobin_unknown",
            narrows: "Type the haemoglobin.",
        };
        let caution = Caution { id: "retainer", words: "Aim for a pH.".into(), source: None };
        Answer {
            standing: Standing { status, conditions, withheld },
            value,
            valid_until: Some(Moment(1_772_485_800_000)),
            assumed: vec![assumed],
            cautions: vec![caution],
        }
    }

    fn forecast() -> Forecast {
        let three =
            |x: f64| Band { p10: vec![x - 1.0, x - 2.0], p50: vec![x, x], p90: vec![x + 1.0, x + 2.0] };
        let one = |x: f64| Quantiles { p10: x - 1.0, p50: x, p90: x + 1.0 };
        Forecast {
            minutes: vec![0.0, 2.5],
            paco2_mmhg: three(71.0),
            ph: three(7.21),
            hco3_mmol_l: three(27.8),
            gas_would_read_paco2_mmhg: three(72.0),
            gas_would_read_ph: three(7.2),
            settled: Settled { paco2_mmhg: one(50.0), ph: one(7.3) },
            minutes_to_within_2_mmhg: one(40.0),
            minutes_to_90_percent: one(30.0),
        }
    }

    #[test]
    fn every_number_stands_under_its_name() {
        let read: Value =
            serde_json::from_str(&forecast_json(&answer(Status::Conditional, Some(forecast())))).unwrap();
        assert_eq!(
            read,
            json!({
                "status": "conditional",
                "conditions": [{ "id": "rate_stays", "words": "If he keeps breathing 26." }],
                "withheld": [{ "id": "no_gas", "words": "No gas.", "would_help": "Type a gas." }],
                "valid_until": "2026-03-02T21:10:00Z",
                "assumed": [{
                    "name": "Haemoglobin", "value": 12.0, "spread": 2.0, "unit": "g/dL",
                    "source": "haemoglobin_unknown", "narrows": "Type the haemoglobin.",
                }],
                "cautions": [{ "id": "retainer", "words": "Aim for a pH.", "source": null }],
                "minutes": [0.0, 2.5],
                "paco2_mmhg": { "p10": [70.0, 69.0], "p50": [71.0, 71.0], "p90": [72.0, 73.0] },
                "ph": { "p10": [6.21, 5.21], "p50": [7.21, 7.21], "p90": [8.21, 9.21] },
                "hco3_mmol_l": { "p10": [26.8, 25.8], "p50": [27.8, 27.8], "p90": [28.8, 29.8] },
                "gas_would_read": {
                    "paco2_mmhg": { "p10": [71.0, 70.0], "p50": [72.0, 72.0], "p90": [73.0, 74.0] },
                    "ph": { "p10": [6.2, 5.2], "p50": [7.2, 7.2], "p90": [8.2, 9.2] },
                },
                "settled": {
                    "paco2_mmhg": { "p10": 49.0, "p50": 50.0, "p90": 51.0 },
                    "ph": { "p10": 6.3, "p50": 7.3, "p90": 8.3 },
                },
                "minutes_to_within_2_mmhg": { "p10": 39.0, "p50": 40.0, "p90": 41.0 },
                "minutes_to_90_percent": { "p10": 29.0, "p50": 30.0, "p90": 31.0 },
            })
        );
    }

    #[test]
    fn what_is_withheld_is_null_under_the_same_names() {
        let given = forecast_value(&answer(Status::Forecast, Some(forecast())));
        let withheld = forecast_value(&answer(Status::Withheld, None));
        assert!(given.keys().eq(withheld.keys()));
        assert_eq!(withheld["status"], "withheld");
        assert!(FIELDS.iter().all(|name| withheld[*name].is_null()));
        assert!(FIELDS.iter().all(|name| !given[*name].is_null()));
    }
}
