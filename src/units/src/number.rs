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
    let value = value_of(digits);
    Ok(if trimmed.starts_with(['-', '\u{2212}']) { -value } else { value })
}

/// The value of digits with at most one separator. Sixteen signs at most, so that the digits are an exact
/// whole number over an exact power of ten: one rounding, the same as the standard library's reader, which
/// would bring 14 kB of tables into the page.
fn value_of(digits: &str) -> f64 {
    let (mut whole, mut power, mut after_separator) = (0_u64, 1.0, false);
    for sign in digits.chars() {
        match sign.to_digit(10) {
            Some(digit) => {
                whole = whole * 10 + u64::from(digit);
                power *= if after_separator { 10.0 } else { 1.0 };
            }
            None => after_separator = true,
        }
    }
    whole as f64 / power
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
        fn reads_as_the_standard_library_does(text in "[0-9]{1,8}[.]?[0-9]{0,7}|[.][0-9]{1,15}|[0-9]{16}") {
            proptest::prop_assert_eq!(read_number(&text), Ok(text.parse::<f64>().unwrap()));
        }

        #[test]
        fn never_panics_and_only_finite(text in "\\PC{0,24}") {
            if let Ok(value) = read_number(&text) {
                proptest::prop_assert!(value.is_finite());
            }
        }
    }
}
