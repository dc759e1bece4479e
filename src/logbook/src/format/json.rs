//! Text to JSON values. Unlike the plain reader it refuses an object that names a field twice: taking
//! the last of two pH values would be guessing.

use std::fmt;

use serde::de::{Deserialize, Deserializer, Error, MapAccess, SeqAccess, Visitor};
use serde_json::{Map, Number, Value};

use super::FileError;
use super::error::shown;

/// Parses one JSON text. Nesting deeper than 128 brackets is refused by the parser.
///
/// # Errors
/// [`FileError::Empty`], [`FileError::CutOff`], [`FileError::NotJson`].
pub(crate) fn parse(text: &str) -> Result<Value, FileError> {
    // Some editors put a byte-order mark in front.
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    if text.trim().is_empty() {
        return Err(FileError::Empty);
    }
    serde_json::from_str(text).map(|Once(value)| value).map_err(|error| {
        if error.is_eof() {
            FileError::CutOff { line: error.line() }
        } else {
            FileError::NotJson { reason: error.to_string() }
        }
    })
}

/// What a value is, for a message: `the text "7,21"`, `a list`.
pub(crate) fn describe(value: &Value) -> String {
    match value {
        Value::Null => "null".to_owned(),
        Value::Bool(yes) => yes.to_string(),
        Value::Number(number) => format!("the number {number}"),
        Value::String(text) => format!("the text \"{}\"", shown(text)),
        Value::Array(_) => "a list".to_owned(),
        Value::Object(_) => "an object".to_owned(),
    }
}

/// A value in which no object names a field twice.
struct Once(Value);

impl<'de> Deserialize<'de> for Once {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        deserializer.deserialize_any(OnceVisitor).map(Once)
    }
}

struct OnceVisitor;

impl<'de> Visitor<'de> for OnceVisitor {
    type Value = Value;

    fn expecting(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str("JSON")
    }

    fn visit_bool<E>(self, value: bool) -> Result<Value, E> {
        Ok(Value::Bool(value))
    }

    fn visit_i64<E>(self, value: i64) -> Result<Value, E> {
        Ok(Value::from(value))
    }

    fn visit_u64<E>(self, value: u64) -> Result<Value, E> {
        Ok(Value::from(value))
    }

    fn visit_f64<E>(self, value: f64) -> Result<Value, E> {
        // JSON has no NaN; the parser refuses what overflows.
        Ok(Number::from_f64(value).map_or(Value::Null, Value::Number))
    }

    fn visit_str<E>(self, value: &str) -> Result<Value, E> {
        Ok(Value::String(value.to_owned()))
    }

    fn visit_string<E>(self, value: String) -> Result<Value, E> {
        Ok(Value::String(value))
    }

    fn visit_unit<E>(self) -> Result<Value, E> {
        Ok(Value::Null)
    }

    fn visit_seq<A: SeqAccess<'de>>(self, mut seq: A) -> Result<Value, A::Error> {
        let mut list = Vec::new();
        while let Some(Once(value)) = seq.next_element()? {
            list.push(value);
        }
        Ok(Value::Array(list))
    }

    fn visit_map<A: MapAccess<'de>>(self, mut access: A) -> Result<Value, A::Error> {
        let mut map = Map::new();
        while let Some(name) = access.next_key::<String>()? {
            let Once(value) = access.next_value()?;
            if map.contains_key(&name) {
                return Err(A::Error::custom(format_args!("\"{}\" stands there twice", shown(&name))));
            }
            map.insert(name, value);
        }
        Ok(Value::Object(map))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn reads_what_the_plain_reader_reads() {
        let text = r#"{"a":[1,-2,0.1,1e-7,18446744073709551615,true,null],"b":{"c":"ä\n"}}"#;
        assert_eq!(parse(text), Ok(serde_json::from_str(text).unwrap()));
        assert_eq!(parse(&format!("\u{feff}{text}")), parse(text));
    }

    #[test]
    fn a_field_twice_is_refused() {
        let error = parse("{\n\"ph\": 7.12,\n\"ph\": 7.21}").unwrap_err();
        assert_eq!(
            error.to_string(),
            "The file can't be read as JSON: \"ph\" stands there twice at line 3 column 11. Check that it is a \
             case file, or export it again."
        );
    }

    #[test]
    fn depth_is_limited() {
        let deep = format!("{}{}", "[".repeat(200_000), "]".repeat(200_000));
        assert!(matches!(parse(&deep), Err(FileError::NotJson { .. })));
    }

    #[test]
    fn a_number_that_overflows_is_refused() {
        assert!(matches!(parse("[1e999]"), Err(FileError::NotJson { .. })));
    }
}
