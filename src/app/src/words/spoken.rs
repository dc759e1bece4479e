//! What a screen reader is given in place of signs it reads badly or not at all.

/// `text` with signs and lowered figures in words.
pub fn spoken(text: &str) -> String {
    let mut said = String::with_capacity(text.len() + 16);
    for sign in text.chars() {
        match sign {
            '₂' => said.push('2'),
            '₃' => said.push('3'),
            '⁻' => {}
            '≈' => said.push_str("about "),
            '→' => said.push_str("to"),
            '\u{2212}' => said.push_str("minus "),
            '·' => said.push(','),
            other => said.push(other),
        }
    }
    said
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn signs_are_words() {
        assert_eq!(spoken("PaCO₂ ≈57, rate 18 → 26"), "PaCO2 about 57, rate 18 to 26");
        assert_eq!(spoken("\u{2212}4"), "minus 4");
    }
}
