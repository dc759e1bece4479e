//! Reading a typed number: decimal comma and decimal point are the same key.

/// Why a typed text is not a number.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum NotANumber {
    /// Nothing was typed.
    #[error("Nothing typed.")]
    Empty,
    /// More than one comma or point: grouping and decimals can't be told apart.
    #[error("{0} has two separators. Type one comma or one point.")]
    TwoSeparators(String),
    /// Something that is not a digit, a sign in front, or one separator.
    #[error("{0} is not a number. Type digits with one comma or point.")]
    NotDigits(String),
}

/// Longest text that is tried; anything longer is no bedside number.
const LONGEST: usize = 16;

/// Reads digits with at most one decimal comma or point and at most one leading sign.
///
/// # Errors
/// [`NotANumber`] for anything else; nothing is guessed, exponents and blanks inside are refused.
pub fn read_number(text: &str) -> Result<f64, NotANumber> {
    let trimmed = text.trim();
    if trimmed.is_empty() {
        return Err(NotANumber::Empty);
    }
    let digits = trimmed.strip_prefix(['-', '+', '\u{2212}']).unwrap_or(trimmed);
    let is_separator = |c: char| c == ',' || c == '.';
    let plain = digits.chars().all(|c| c.is_ascii_digit() || is_separator(c));
    if !plain || !digits.chars().any(|c| c.is_ascii_digit()) || trimmed.chars().count() > LONGEST {
        return Err(NotANumber::NotDigits(trimmed.chars().take(LONGEST).collect()));
    }
    if digits.chars().filter(|c| is_separator(*c)).count() > 1 {
        return Err(NotANumber::TwoSeparators(trimmed.to_owned()));
    }
    let value: f64 =
        digits.replace(',', ".").parse().map_err(|_| NotANumber::NotDigits(trimmed.to_owned()))?;
    Ok(if trimmed.starts_with(['-', '\u{2212}']) { -value } else { value })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn comma_and_point_read_alike() {
        assert_eq!(read_number("7,21"), Ok(7.21));
        assert_eq!(read_number(" 7.21 "), Ok(7.21));
        assert_eq!(read_number("7."), Ok(7.0));
        assert_eq!(read_number("-400"), Ok(-400.0));
        assert_eq!(read_number("\u{2212}400"), Ok(-400.0));
    }

    #[test]
    fn what_is_no_number_is_said() {
        assert_eq!(read_number(""), Err(NotANumber::Empty));
        assert_eq!(read_number("1.234,5"), Err(NotANumber::TwoSeparators("1.234,5".into())));
        for text in ["7e2", "inf", "nan", "7 21", ".", "-", "--7", "0x7", "٧"] {
            assert!(matches!(read_number(text), Err(NotANumber::NotDigits(_))), "{text}");
        }
    }

    proptest::proptest! {
        #[test]
        fn never_panics_and_only_finite(text in "\\PC{0,24}") {
            if let Ok(value) = read_number(&text) {
                proptest::prop_assert!(value.is_finite());
            }
        }
    }
}
