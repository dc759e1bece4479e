//! HTML as text, for what is only read. Every text and every attribute's value is escaped here.

/// `text` with the five signs that HTML gives a meaning escaped.
pub fn text(text: &str) -> String {
    let mut safe = String::with_capacity(text.len());
    for sign in text.chars() {
        match sign {
            '&' => safe.push_str("&amp;"),
            '<' => safe.push_str("&lt;"),
            '>' => safe.push_str("&gt;"),
            '"' => safe.push_str("&quot;"),
            '\'' => safe.push_str("&#39;"),
            other => safe.push(other),
        }
    }
    safe
}

/// An element with a class (or none, when it is empty) around `inner`, which is HTML already.
pub fn element(name: &str, class: &str, inner: &str) -> String {
    if class.is_empty() { tag(name, &[], inner) } else { tag(name, &[("class", class)], inner) }
}

/// An element with attributes around `inner`, which is HTML already.
pub fn tag(name: &str, attributes: &[(&str, &str)], inner: &str) -> String {
    let mut html = String::with_capacity(inner.len() + 32);
    html.push('<');
    html.push_str(name);
    for (key, value) in attributes {
        html.push(' ');
        html.push_str(key);
        html.push_str("=\"");
        html.push_str(&text(value));
        html.push('"');
    }
    html.push('>');
    html.push_str(inner);
    html.push_str("</");
    html.push_str(name);
    html.push('>');
    html
}

/// An element around plain text.
pub fn said(name: &str, class: &str, words: &str) -> String {
    element(name, class, &text(words))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn nothing_typed_or_imported_becomes_markup() {
        let html = said("p", "note", "<img src=x onerror=\"alert('1')\"> & more");
        assert_eq!(
            html,
            "<p class=\"note\">&lt;img src=x onerror=&quot;alert(&#39;1&#39;)&quot;&gt; &amp; more</p>"
        );
        assert_eq!(tag("a", &[("href", "\"><script>")], ""), "<a href=\"&quot;&gt;&lt;script&gt;\"></a>");
    }
}
