//! Rust source as a flat row of tokens: no comments, no text in quotes, nothing that is compiled for tests only.

use proc_macro2::{Delimiter, TokenStream, TokenTree};
use std::str::FromStr;

/// The tokens of a file in order; brackets stand as tokens of their own.
pub fn of(source: &str) -> Result<Vec<String>, String> {
    let stream = TokenStream::from_str(source).map_err(|error| error.to_string())?;
    let mut row = Vec::new();
    flatten(stream, &mut row);
    Ok(row)
}

fn flatten(stream: TokenStream, row: &mut Vec<String>) {
    let mut trees = stream.into_iter().peekable();
    while let Some(tree) = trees.next() {
        if is_mark(&tree) && trees.peek().is_some_and(is_for_tests) {
            skip_item(&mut trees);
            continue;
        }
        match tree {
            TokenTree::Group(group) => {
                let (open, close) = brackets(group.delimiter());
                row.push(open.into());
                flatten(group.stream(), row);
                row.push(close.into());
            }
            TokenTree::Ident(name) => row.push(name.to_string()),
            TokenTree::Punct(mark) => row.push(mark.as_char().to_string()),
            // A quoted text is no code; a number is.
            TokenTree::Literal(literal) if literal.to_string().contains('"') => row.push("\"\"".into()),
            TokenTree::Literal(literal) => row.push(literal.to_string()),
        }
    }
}

fn is_mark(tree: &TokenTree) -> bool {
    matches!(tree, TokenTree::Punct(mark) if mark.as_char() == '#')
}

fn is_for_tests(tree: &TokenTree) -> bool {
    let TokenTree::Group(group) = tree else { return false };
    let text: String = group.stream().to_string().split_whitespace().collect();
    text == "cfg(test)" || text == "test"
}

/// Passes over an item: to the end of its body, or to its semicolon.
fn skip_item(trees: &mut impl Iterator<Item = TokenTree>) {
    for tree in trees {
        match tree {
            TokenTree::Group(group) if group.delimiter() == Delimiter::Brace => return,
            TokenTree::Punct(mark) if mark.as_char() == ';' => return,
            _ => {}
        }
    }
}

fn brackets(delimiter: Delimiter) -> (&'static str, &'static str) {
    match delimiter {
        Delimiter::Parenthesis => ("(", ")"),
        Delimiter::Brace => ("{", "}"),
        Delimiter::Bracket => ("[", "]"),
        Delimiter::None => ("", ""),
    }
}

/// Whether these tokens stand in the row, one after the other.
pub fn contains(row: &[String], wanted: &[&str]) -> bool {
    row.windows(wanted.len()).any(|window| window == wanted)
}

/// What is named directly behind `first::`, by a path or inside the braces of a `use`.
pub fn behind<'a>(row: &'a [String], first: &str) -> Vec<&'a str> {
    let mut named = Vec::new();
    for at in 0..row.len() {
        if row[at] != first || row.get(at + 1..at + 3).is_none_or(|colons| colons != [":", ":"]) {
            continue;
        }
        match row.get(at + 3).map(String::as_str) {
            Some("{") => named.extend(first_names(&row[at + 4..])),
            Some(name) => named.push(name),
            None => {}
        }
    }
    named
}

/// The first names of the entries in a braced list, up to the brace that closes it.
fn first_names(list: &[String]) -> Vec<&str> {
    let mut depth = 0;
    let mut names = Vec::new();
    let mut fresh = true;
    for token in list {
        match token.as_str() {
            "{" => depth += 1,
            "}" if depth == 0 => break,
            "}" => depth -= 1,
            "," if depth == 0 => fresh = true,
            name if fresh => {
                names.push(name);
                fresh = false;
            }
            _ => {}
        }
    }
    names
}

#[test]
fn comments_texts_and_tests_are_no_code() {
    let source = "/// std::fs\nfn a() { say(\"std::fs\"); } // std::fs\n#[cfg(test)]\nmod tests { use std::fs; }\nfn b() {}";
    let row = of(source).expect("is Rust");
    assert!(behind(&row, "std").is_empty(), "{row:?}");
    assert!(contains(&row, &["fn", "b"]));
}

#[test]
fn names_behind_a_path_are_found_in_every_form() {
    let row = of("use std::{fs::File, time::{Instant, Duration}, io}; fn a() { std::env::args(); }")
        .expect("is Rust");
    assert_eq!(behind(&row, "std"), ["fs", "time", "io", "env"]);
}
