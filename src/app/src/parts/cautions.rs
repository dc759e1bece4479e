//! Sentences to heed: what an answer depends on, why there is none, and cautions.

use bedside::{Caution, Standing};

use super::html::{element, said, text};
use crate::words::now as words;

/// Why there is no answer, and what must stay so.
pub fn standing(standing: &Standing) -> String {
    let mut html = String::new();
    for why in &standing.withheld {
        let mut inner = text(&why.words);
        if !why.would_help.is_empty() {
            let help = format!("{} {}", words::WOULD_HELP, why.would_help);
            inner = inner + " " + &said("span", "help", &help);
        }
        html += &element("p", "withheld", &inner);
    }
    for condition in &standing.conditions {
        html += &said("p", "condition", &condition.words);
    }
    html
}

/// Cautions, the most dangerous first, each marked.
pub fn cautions(cautions: &[Caution]) -> String {
    if cautions.is_empty() {
        return String::new();
    }
    let all: String = cautions.iter().map(|caution| said("li", "caution", &caution.words)).collect();
    element("ul", "cautions-list", &all)
}
