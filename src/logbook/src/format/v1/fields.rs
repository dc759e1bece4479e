//! Reading one object field by field: each getter says what is wrong and remembers what was asked for, so
//! that what is left over is what this version does not know.

use case::Moment;
use serde_json::{Map, Number, Value};
use units::{AgeGroup, Quantity};

use super::words::Words;
use crate::format::error::shown;
use crate::format::json::describe;
use crate::format::{FileError, Place, Problem, read_time};

const A_NUMBER: &str = "a number. Write it without quotes and with a point, as in 7.21";
const A_WHOLE_NUMBER: &str = "a whole number";
const A_TEXT: &str = "a text. Write it in quotes";
const A_FLAG: &str = "true or false. Write one of them without quotes";
const A_WORD: &str = "a word. Write it in quotes";

/// The limits that everything ever accepted keeps: those of children contain those of adults. Whose
/// limits apply is decided later, for what stands after corrections; see `check_limits`.
const WIDEST: AgeGroup = AgeGroup::Child;

/// One number of a struct: its name in the file, its row in the table of limits, its place in the struct.
pub(super) type NumberField<T> = (&'static str, Quantity, fn(&mut T) -> &mut Option<f64>);

/// A word from a fixed list.
pub(super) enum Word<T> {
    /// Not given.
    Absent,
    /// Known.
    Known(T),
    /// Given, and not known to this version.
    Strange,
}

impl<T> Word<T> {
    pub(super) fn known(self) -> Option<T> {
        if let Word::Known(value) = self { Some(value) } else { None }
    }
}

/// An object being read.
pub(super) struct Fields<'a> {
    map: &'a Map<String, Value>,
    place: Place,
    group: AgeGroup,
    known: Vec<&'static str>,
    strange: Vec<String>,
}

impl<'a> Fields<'a> {
    pub(super) fn new(map: &'a Map<String, Value>, place: Place) -> Self {
        Self { map, place, group: WIDEST, known: vec![], strange: vec![] }
    }

    /// The same with the limits of one age group.
    pub(super) fn within(mut self, group: AgeGroup) -> Self {
        self.group = group;
        self
    }

    pub(super) fn place(&self) -> &Place {
        &self.place
    }

    pub(super) fn set_place(&mut self, place: Place) {
        self.place = place;
    }

    pub(super) fn error(&self, field: &str, problem: Problem) -> FileError {
        FileError::field(&self.place, field, problem)
    }

    /// Takes note that `names` belong here.
    pub(super) fn expect(&mut self, names: &[&'static str]) {
        self.known.extend(names);
    }

    /// The value of a field; `null` is the same as not given.
    pub(super) fn value(&mut self, name: &'static str) -> Option<&'a Value> {
        self.known.push(name);
        self.map.get(name).filter(|value| !value.is_null())
    }

    fn wrong_type(&self, name: &str, found: &Value, wanted: &'static str) -> FileError {
        self.error(name, Problem::WrongType { found: describe(found), wanted })
    }

    pub(super) fn number(
        &mut self,
        name: &'static str,
        quantity: Quantity,
    ) -> Result<Option<f64>, FileError> {
        let Some(found) = self.value(name) else { return Ok(None) };
        let value = found.as_f64().ok_or_else(|| self.wrong_type(name, found, A_NUMBER))?;
        units::check(quantity, self.group, value)
            .map(Some)
            .map_err(|refusal| self.error(name, Problem::OutOfLimits(Box::new(refusal))))
    }

    pub(super) fn numbers<T>(&mut self, table: &[NumberField<T>], into: &mut T) -> Result<(), FileError> {
        for (name, quantity, slot) in table {
            *slot(into) = self.number(name, *quantity)?;
        }
        Ok(())
    }

    pub(super) fn whole(&mut self, name: &'static str, quantity: Quantity) -> Result<Option<i32>, FileError> {
        let Some(value) = self.number(name, quantity)? else { return Ok(None) };
        // Within the limits of the table, so that the cast is exact once the fraction is nil.
        if value.fract() == 0.0 {
            Ok(Some(value as i32))
        } else {
            let found = Number::from_f64(value).map_or(Value::Null, Value::Number);
            Err(self.wrong_type(name, &found, A_WHOLE_NUMBER))
        }
    }

    pub(super) fn text(&mut self, name: &'static str) -> Result<Option<&'a str>, FileError> {
        let Some(found) = self.value(name) else { return Ok(None) };
        found.as_str().map(Some).ok_or_else(|| self.wrong_type(name, found, A_TEXT))
    }

    pub(super) fn flag(&mut self, name: &'static str) -> Result<Option<bool>, FileError> {
        let Some(found) = self.value(name) else { return Ok(None) };
        found.as_bool().map(Some).ok_or_else(|| self.wrong_type(name, found, A_FLAG))
    }

    pub(super) fn moment(&mut self, name: &'static str) -> Result<Option<Moment>, FileError> {
        let Some(found) = self.value(name) else { return Ok(None) };
        let read = found.as_str().and_then(read_time);
        read.map(Some).ok_or_else(|| self.error(name, Problem::NotATime { found: describe(found) }))
    }

    pub(super) fn word<T: Copy>(
        &mut self,
        name: &'static str,
        words: Words<T>,
    ) -> Result<Word<T>, FileError> {
        let Some(found) = self.value(name) else { return Ok(Word::Absent) };
        let text = found.as_str().ok_or_else(|| self.wrong_type(name, found, A_WORD))?;
        match words.iter().find(|(word, _)| *word == text) {
            Some((_, value)) => Ok(Word::Known(*value)),
            None => {
                self.strange.push(name.to_owned());
                Ok(Word::Strange)
            }
        }
    }

    pub(super) fn texts(&mut self, name: &'static str) -> Result<Option<Vec<String>>, FileError> {
        const TEXTS: &str = "a list of texts. Write [\"…\", \"…\"]";
        let Some(found) = self.value(name) else { return Ok(None) };
        let list = found.as_array().ok_or_else(|| self.wrong_type(name, found, TEXTS))?;
        let text = |item: &Value| {
            item.as_str().map(str::to_owned).ok_or_else(|| self.wrong_type(name, item, A_TEXT))
        };
        list.iter().map(text).collect::<Result<_, _>>().map(Some)
    }

    pub(super) fn needed<T>(
        &self,
        name: &str,
        value: Option<T>,
        advice: &'static str,
    ) -> Result<T, FileError> {
        value.ok_or_else(|| self.error(name, Problem::Missing { advice }))
    }

    /// Whether a word stood here that is not known.
    pub(super) fn has_strange(&self) -> bool {
        !self.strange.is_empty()
    }

    /// Whether anything stands here that was not asked for.
    pub(super) fn has_more(&self) -> bool {
        self.map.keys().any(|name| !self.known.contains(&name.as_str()))
    }

    /// Names that were not understood: words not known, then fields not asked for.
    pub(super) fn left_over(self) -> Vec<String> {
        let mut names = self.strange;
        names.extend(self.map.keys().filter(|name| !self.known.contains(&name.as_str())).cloned());
        names
    }
}

/// The object that `value` must be.
pub(super) fn object<'a>(
    value: &'a Value,
    place: &Place,
    field: &str,
) -> Result<&'a Map<String, Value>, FileError> {
    const AN_OBJECT: &str = "an object. Write it in braces";
    value.as_object().ok_or_else(|| {
        FileError::field(
            place,
            shown(field),
            Problem::WrongType { found: describe(value), wanted: AN_OBJECT },
        )
    })
}
