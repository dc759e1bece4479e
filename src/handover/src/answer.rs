//! What every answer carries, as JSON.

use bedside::{Answer, Assumed, Caution, Condition, Status, Withheld};
use serde_json::{Map, Value, json};

/// The frame of an answer: status, conditions, what is withheld, how long it holds, what it rests on.
pub(crate) fn frame<T>(answer: &Answer<T>) -> Map<String, Value> {
    let standing = &answer.standing;
    let valid_until = answer.valid_until.and_then(logbook::write_time);
    let mut map = Map::new();
    let mut put = |name: &str, value: Value| map.insert(name.to_owned(), value);
    put("status", Value::from(status(standing.status)));
    put("conditions", standing.conditions.iter().map(condition).collect());
    put("withheld", standing.withheld.iter().map(withheld).collect());
    put("valid_until", valid_until.map_or(Value::Null, Value::from));
    put("assumed", answer.assumed.iter().map(assumed).collect());
    put("cautions", answer.cautions.iter().map(caution).collect());
    map
}

fn status(status: Status) -> &'static str {
    match status {
        Status::Forecast => "forecast",
        Status::Conditional => "conditional",
        Status::Withheld => "withheld",
    }
}

fn condition(condition: &Condition) -> Value {
    json!({ "id": condition.id, "words": condition.words })
}

fn withheld(withheld: &Withheld) -> Value {
    json!({ "id": withheld.id, "words": withheld.words, "would_help": withheld.would_help })
}

fn assumed(assumed: &Assumed) -> Value {
    json!({
        "name": assumed.name,
        "value": assumed.value,
        "spread": assumed.spread,
        "unit": assumed.unit,
        "source": assumed.source,
        "narrows": assumed.narrows,
    })
}

fn caution(caution: &Caution) -> Value {
    json!({ "id": caution.id, "words": caution.words, "source": caution.source })
}
